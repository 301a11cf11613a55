package org.whither.film;

/**
 * Pressure, density and film thickness of a lubrication film, at the cells and at the nodes. The pressure is continuous,
 * so it has nodal values even where the solver gave cell values; the film thickness may jump between cells.
 */
final class Columns {
    private final Film film;
    private final FilmGrid grid;
    private final double[] nodePressure;
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
            for (int i = 0; i < grid.cellsTheta(); i++) {
                for (int j = 0; j < grid.cellsRadial(); j++) {
                    int n = grid.node(i, j);
                    int m = grid.node(i + 1, j);
                    cellPressure[grid.cell(i, j)] =
                            0.25 * (nodePressure[n] + nodePressure[n + 1] + nodePressure[m] + nodePressure[m + 1]);
                }
            }
        } else {
            for (int c = 0; c < cellPressure.length; c++) {
                cellPressure[c] = field.pressure(c);
            }
            spread();
        }
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

    double nodePressure(int i, int j) {
        return nodePressure[grid.node(i, j)];
    }

    /** Mean pressure of the two nodes of a constant-j face (Pa). */
    double nodePair(int i, int j) {
        return 0.5 * (nodePressure[grid.node(i, j)] + nodePressure[grid.node(i + 1, j)]);
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

    /** Density of a pressure (kg/m³). */
    double rho(double pressure) {
        return densityOverPressure * pressure;
    }

    /** Mass flow a pressure gradient drives through a column a unit of width, ρh³/12µ (kg/(m s Pa/m)). */
    double conductance(int i, int j) {
        double h = h(i, j);
        return rho(i, j) * h * h * h / (12 * film.gas().viscosity());
    }

    /** Angle that cell (i, j) takes up at its middle radius (rad). */
    double width(int i, int j) {
        return 0.5 * (grid.theta(i + 1, j) - grid.theta(i, j) + grid.theta(i + 1, j + 1) - grid.theta(i, j + 1));
    }

    /** Mean slope dθ/dr of the two grid lines of cell (i, j) (rad/m). */
    double slope(int i, int j) {
        return 0.5 * (grid.lineSlope(i, j) + grid.lineSlope(i + 1, j));
    }

    /**
     * What a turn of the observer by 1 rad/s adds to the flow through a constant-i face: ∫ρh r dr, with the mean of both
     * sides where the film thickness jumps (kg).
     */
    double rotationMoment(int i, int j) {
        int nci = grid.cellsTheta();
        int left = Math.floorMod(i - 1, nci);
        int right = i % nci;
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        double pressure = 0.5 * (nodePressure[grid.node(right, j)] + nodePressure[grid.node(right, j + 1)]);
        return rho(pressure) * 0.5 * (h(left, j) + h(right, j)) * 0.5 * (r1 * r1 - r0 * r0);
    }
}
