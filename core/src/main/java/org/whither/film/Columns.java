package org.whither.film;

/**
 * Pressure, density and film thickness of a lubrication film, at the cells and at the nodes. The pressure is continuous,
 * so it has nodal values even where the solver gave cell values; the film thickness may jump between cells. Between
 * nodes the square of the pressure is interpolated: it is what the isothermal film obeys, and it is linear in ln r in a
 * plain one.
 */
final class Columns implements GasState {
    private final Film film;
    private final FilmGrid grid;
    private final double[] nodePressure;
    private final double[] nodeSquare;
    private final double[] cellSquare;
    private final double[] cellPressure;
    private final double[] cellThickness;
    private final double densityOverPressure;

    Columns(Film film) {
        this.film = film;
        this.grid = film.grid();
        this.densityOverPressure = film.gas().density(1, film.conditions().temperature());
        LubricationField field = (LubricationField) film.field();
        nodePressure = new double[grid.nodes()];
        cellPressure = new double[grid.cells()];
        cellThickness = new double[grid.cells()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                cellThickness[grid.cell(i, j)] = film.faces().cellThickness(grid, i, j);
            }
        }
        if (field.pressureAt() == Location.NODE) {
            for (int n = 0; n < nodePressure.length; n++) {
                nodePressure[n] = field.pressure(n);
            }
        } else {
            for (int c = 0; c < cellPressure.length; c++) {
                cellPressure[c] = field.pressure(c);
            }
            spread();
        }
        nodeSquare = squares(nodePressure);
        if (field.pressureAt() == Location.NODE) {
            for (int i = 0; i < grid.cellsTheta(); i++) {
                for (int j = 0; j < grid.cellsRadial(); j++) {
                    cellPressure[grid.cell(i, j)] = Math.sqrt(square(i, j, 0.5, 0.5));
                }
            }
        }
        cellSquare = squares(cellPressure);
    }

    private static double[] squares(double[] values) {
        double[] squares = new double[values.length];
        for (int n = 0; n < values.length; n++) {
            squares[n] = values[n] * values[n];
        }
        return squares;
    }

    /** Cell values to the nodes, weighted by nearness; the two diameters have the pressures of their sides. */
    private void spread() {
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        for (int i = 0; i < grid.ni(); i++) {
            int left = Math.floorMod(i - 1, nci);
            int right = i % nci;
            for (int j = 0; j < grid.nj(); j++) {
                double value;
                if (j == 0) {
                    value = film.conditions().pressureInner();
                } else if (j == ncj) {
                    value = film.conditions().pressureOuter();
                } else {
                    double widthLeft = grid.theta(left + 1, j) - grid.theta(left, j);
                    double widthRight = grid.theta(right + 1, j) - grid.theta(right, j);
                    double below = between(left, right, j - 1, widthLeft, widthRight);
                    double above = between(left, right, j, widthLeft, widthRight);
                    double downward = grid.radius(j) - grid.radius(j - 1);
                    double upward = grid.radius(j + 1) - grid.radius(j);
                    value = (below * upward + above * downward) / (upward + downward);
                }
                nodePressure[grid.node(i, j)] = value;
            }
        }
    }

    private double between(int left, int right, int j, double widthLeft, double widthRight) {
        return (cellPressure[grid.cell(left, j)] * widthRight + cellPressure[grid.cell(right, j)] * widthLeft)
                / (widthLeft + widthRight);
    }

    /** Square of the pressure at a place in a cell, linear both ways between the nodes (Pa²). */
    double square(int i, int j, double a, double b) {
        int n = i * grid.nj() + j;
        int m = n + grid.nj();
        return (1 - a) * ((1 - b) * nodeSquare[n] + b * nodeSquare[n + 1])
                + a * ((1 - b) * nodeSquare[m] + b * nodeSquare[m + 1]);
    }

    @Override
    public double pressure(int i, int j, int k, double a, double b, double sigma) {
        return Math.sqrt(square(i, j, a, b));
    }

    @Override
    public double density(int i, int j, int k, double a, double b, double sigma) {
        return densityOverPressure * Math.sqrt(square(i, j, a, b));
    }

    @Override
    public double pressureOverDensity() {
        return 1 / densityOverPressure;
    }

    double nodeSquare(int i, int j) {
        return nodeSquare[grid.node(i, j)];
    }

    double cellSquare(int i, int j) {
        return cellSquare[grid.cell(i, j)];
    }

    double cellPressure(int i, int j) {
        return cellPressure[grid.cell(i, j)];
    }

    double h(int i, int j) {
        return cellThickness[grid.cell(i, j)];
    }

    double rho(int i, int j) {
        return densityOverPressure * cellPressure[grid.cell(i, j)];
    }

    /**
     * What drives the mass flow of a column: h³ / (24 µ R_s T), so that the flow a unit of width is this times the
     * gradient of p², downhill (kg/(m s) a Pa²/m).
     */
    double conductance(int i, int j) {
        double h = h(i, j);
        return densityOverPressure * h * h * h / (24 * film.gas().viscosity());
    }

    /** Angle that cell (i, j) takes up at its middle radius (rad). */
    double width(int i, int j) {
        return 0.5 * (grid.theta(i + 1, j) - grid.theta(i, j) + grid.theta(i + 1, j + 1) - grid.theta(i, j + 1));
    }

    /** Mean slope dθ/dr of the two grid lines of cell (i, j) (rad/m). */
    double slope(int i, int j) {
        return 0.5 * (grid.lineSlope(i, j) + grid.lineSlope(i + 1, j));
    }

    /** With the mean of both sides where the film thickness jumps. */
    @Override
    public double rotationMoment(int i, int j) {
        int nci = grid.cellsTheta();
        int left = Math.floorMod(i - 1, nci);
        int right = i % nci;
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        double[] along = alongLine(right, j);
        double integral = (along[0] + 4 * along[1] + along[2]) / 6 * (r1 - r0);
        return densityOverPressure * integral * 0.5 * (h(left, j) + h(right, j));
    }

    /** p r at the start, the middle and the end of row j along a line, p² linear between the nodes. */
    private double[] alongLine(int i, int j) {
        double start = nodeSquare[grid.node(i, j)];
        double end = nodeSquare[grid.node(i, j + 1)];
        return new double[] {
            Math.sqrt(start) * grid.radius(j),
            Math.sqrt(0.5 * (start + end)) * 0.5 * (grid.radius(j) + grid.radius(j + 1)),
            Math.sqrt(end) * grid.radius(j + 1)
        };
    }

    /** Of ρ r. */
    @Override
    public double leanRadial(int i, int j) {
        double[] along = alongLine(i % grid.cellsTheta(), j);
        double mean = (along[0] + 4 * along[1] + along[2]) / 6;
        return 0.5 * (along[2] - along[0]) / mean;
    }

    /** Of ρ r. */
    @Override
    public double bendRadial(int i, int j) {
        double[] along = alongLine(i % grid.cellsTheta(), j);
        double mean = (along[0] + 4 * along[1] + along[2]) / 6;
        return 0.5 * (along[2] + along[0]) / mean - 1;
    }
}
