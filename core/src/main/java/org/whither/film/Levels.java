package org.whither.film;

/** Pressure and density of a full field, at the nodes and levels. */
final class Levels implements GasState {
    private final FilmGrid grid;
    private final RingFaces faces;
    private final FullField field;
    private final int nk;
    private final boolean gasLaw;
    private final double densityOverPressure;
    /** nodes × nk, or one value a node where the pressure is constant across the film. */
    private final double[] pressureSquare;

    private final int pressureStride;
    /** Likewise; the array of the pressures where the gas law at one temperature gives the density. */
    private final double[] densitySquare;

    private final int densityStride;
    private final double[] meanSquare;

    Levels(Film film) {
        grid = film.grid();
        faces = film.faces();
        field = (FullField) film.field();
        nk = field.nk();
        double temperature = film.conditions().temperature();
        densityOverPressure = film.gas().density(1, temperature);
        pressureStride = field.pressureConstantAcrossFilm() ? 1 : nk;
        pressureSquare = new double[grid.nodes() * pressureStride];
        gasLaw = !field.hasDensity() && !field.hasTemperature();
        densityStride = gasLaw ? pressureStride : nk;
        densitySquare = gasLaw ? pressureSquare : new double[grid.nodes() * nk];
        meanSquare = new double[grid.nodes()];
        for (int node = 0; node < grid.nodes(); node++) {
            for (int k = 0; k < pressureStride; k++) {
                pressureSquare[node * pressureStride + k] = square(field.pressure(node, k));
            }
            double mean = 0;
            double before = field.density(node, 0, film.gas(), temperature);
            for (int k = 0; k < nk; k++) {
                double rho = field.density(node, k, film.gas(), temperature);
                if (!gasLaw) {
                    densitySquare[node * nk + k] = square(rho);
                }
                mean += k == 0 ? 0 : 0.5 * (before + rho) * (field.sigma(k) - field.sigma(k - 1));
                before = rho;
            }
            meanSquare[node] = square(mean);
        }
    }

    private static double square(double x) {
        return x * x;
    }

    @Override
    public double pressure(int i, int j, int k, double a, double b, double sigma) {
        return Math.sqrt(interpolate(pressureSquare, pressureStride, i, j, k, a, b, sigma));
    }

    @Override
    public double density(int i, int j, int k, double a, double b, double sigma) {
        double root = Math.sqrt(interpolate(densitySquare, densityStride, i, j, k, a, b, sigma));
        return gasLaw ? densityOverPressure * root : root;
    }

    @Override
    public double pressureOverDensity() {
        return gasLaw ? 1 / densityOverPressure : Double.NaN;
    }

    private double interpolate(double[] values, int stride, int i, int j, int k, double a, double b, double sigma) {
        int n = grid.node(i, j) * stride;
        int m = grid.node(i + 1, j) * stride;
        if (stride == 1) {
            return plane(values, n, m, 1, a, b);
        }
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        return (1 - c) * plane(values, n + k, m + k, stride, a, b)
                + c * plane(values, n + k + 1, m + k + 1, stride, a, b);
    }

    private static double plane(double[] values, int n, int m, int stride, double a, double b) {
        return (1 - a) * ((1 - b) * values[n] + b * values[n + stride])
                + a * ((1 - b) * values[m] + b * values[m + stride]);
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
