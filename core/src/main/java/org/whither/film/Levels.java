package org.whither.film;

import java.util.stream.IntStream;

/** Pressure and density of a full field, at the nodes and levels; nothing is kept of it that the field has. */
final class Levels implements GasState {
    private final FilmGrid grid;
    private final RingFaces faces;
    private final FullField field;
    private final int nk;
    private final boolean gasLaw;
    private final double densityOverPressure;
    private final Gas gas;
    private final double temperature;
    private final double[] meanSquare;

    Levels(Film film) {
        grid = film.grid();
        faces = film.faces();
        field = (FullField) film.field();
        nk = field.nk();
        gas = film.gas();
        temperature = film.conditions().temperature();
        densityOverPressure = gas.density(1, temperature);
        gasLaw = !field.hasDensity() && !field.hasTemperature();
        meanSquare = new double[grid.nodes()];
        IntStream.range(0, grid.ni()).parallel().forEach(i -> {
            for (int node = grid.node(i, 0); node < grid.node(i + 1, 0); node++) {
                double mean = 0;
                double before = field.density(node, 0, gas, temperature);
                for (int k = 1; k < nk; k++) {
                    double rho = field.density(node, k, gas, temperature);
                    mean += 0.5 * (before + rho) * (field.sigma(k) - field.sigma(k - 1));
                    before = rho;
                }
                meanSquare[node] = square(mean);
            }
        });
    }

    private static double square(double x) {
        return x * x;
    }

    private double pressureSquare(int node, int k) {
        return square(field.pressure(node, k));
    }

    private double densitySquare(int node, int k) {
        return square(field.density(node, k, gas, temperature));
    }

    @Override
    public double pressure(int i, int j, int k, double a, double b, double sigma) {
        if (field.pressureConstantAcrossFilm()) {
            return Math.sqrt(pressurePlane(i, j, k, a, b));
        }
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        return Math.sqrt((1 - c) * pressurePlane(i, j, k, a, b) + c * pressurePlane(i, j, k + 1, a, b));
    }

    @Override
    public double density(int i, int j, int k, double a, double b, double sigma) {
        if (gasLaw) {
            return densityOverPressure * pressure(i, j, k, a, b, sigma);
        }
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        return Math.sqrt((1 - c) * densityPlane(i, j, k, a, b) + c * densityPlane(i, j, k + 1, a, b));
    }

    @Override
    public double pressureOverDensity() {
        return gasLaw ? 1 / densityOverPressure : Double.NaN;
    }

    private double pressurePlane(int i, int j, int k, double a, double b) {
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * pressureSquare(n, k) + b * pressureSquare(n + 1, k))
                + a * ((1 - b) * pressureSquare(m, k) + b * pressureSquare(m + 1, k));
    }

    private double densityPlane(int i, int j, int k, double a, double b) {
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * densitySquare(n, k) + b * densitySquare(n + 1, k))
                + a * ((1 - b) * densitySquare(m, k) + b * densitySquare(m + 1, k));
    }

    /** Mean density of the column at a node (kg/m³). */
    double columnDensity(int node) {
        return Math.sqrt(meanSquare[node]);
    }

    @Override
    public double rotationMoment(int i, int j) {
        double[] along = alongLine(i, j);
        return mean(along) * (grid.radius(j + 1) - grid.radius(j));
    }

    @Override
    public double leanRadial(int i, int j) {
        double[] along = alongLine(i, j);
        return 0.5 * (along[2] - along[0]) / mean(along);
    }

    @Override
    public double bendRadial(int i, int j) {
        double[] along = alongLine(i, j);
        return 0.5 * (along[2] + along[0]) / mean(along) - 1;
    }

    private static double mean(double[] along) {
        return (along[0] + 4 * along[1] + along[2]) / 6;
    }

    /** ρh r at the start, the middle and the end of row j along a line. */
    private double[] alongLine(int i, int j) {
        int start = grid.node(i % grid.cellsTheta(), j);
        int end = start + 1;
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        double h0 = faces.thickness(start);
        double h1 = faces.thickness(end);
        return new double[] {
            columnDensity(start) * h0 * r0,
            Math.sqrt(0.5 * (meanSquare[start] + meanSquare[end])) * 0.25 * (h0 + h1) * (r0 + r1),
            columnDensity(end) * h1 * r1
        };
    }
}
