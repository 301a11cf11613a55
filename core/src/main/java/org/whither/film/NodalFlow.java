package org.whither.film;

/**
 * The motion of the gas in a full field by plain interpolation between the nodes. What is continuous across a groove edge
 * is interpolated, the mass fluxes ρh u_θ, ρh r u_r, ρh r dσ/dt and the mass ρh, each linear in the three directions of a
 * cell, and then divided. It does not conserve mass exactly; how far it does is told by the closure of its border flows.
 */
public final class NodalFlow implements FilmFlow {
    private final Film film;
    private final FilmGrid grid;
    private final FullField field;
    private final int nk;
    private final NodalFluxes fluxes;
    private final double[] fluxTheta;
    private final double[] fluxRadial;
    private final double[] fluxSigma;
    private final double[] columnDensity;
    private final double densityOverPressure;

    /**
     * The motion of the gas in a film.
     *
     * @param film a film whose field is a {@link FullField} and whose faces are given at the nodes
     * @throws IllegalArgumentException where they are not
     */
    public NodalFlow(Film film) {
        if (!(film.field() instanceof FullField full) || film.faces().at() != Location.NODE) {
            throw new IllegalArgumentException("nodal flow of a "
                    + film.field().getClass().getSimpleName() + " with faces at "
                    + film.faces().at() + "; expected a full field with faces at the nodes");
        }
        this.film = film;
        this.grid = film.grid();
        this.field = full;
        this.nk = full.nk();
        this.densityOverPressure = film.gas().density(1, film.conditions().temperature());
        int size = grid.nodes() * nk;
        fluxTheta = new double[size];
        fluxRadial = new double[size];
        fluxSigma = new double[size];
        columnDensity = new double[size];
        fluxes = new NodalFluxes(film);
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                fill(i, j);
            }
        }
    }

    private void fill(int i, int j) {
        int node = grid.node(i, j);
        double h = film.faces().thickness(node);
        for (int k = 0; k < nk; k++) {
            int at = node * nk + k;
            fluxTheta[at] = fluxes.theta(i, j, k);
            fluxRadial[at] = fluxes.radial(i, j, k);
            columnDensity[at] =
                    field.density(node, k, film.gas(), film.conditions().temperature()) * h;
        }
        fluxes.across(i, j, fluxSigma, node * nk);
    }

    @Override
    public Film film() {
        return film;
    }

    @Override
    public int layers() {
        return nk - 1;
    }

    @Override
    public double level(int k) {
        return field.sigma(k);
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        double a = across(i, j, theta, r);
        double b = along(j, r);
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        double mass = trilinear(columnDensity, i, j, k, a, b, c) * r;
        rates[0] = trilinear(fluxTheta, i, j, k, a, b, c) / mass;
        rates[1] = trilinear(fluxRadial, i, j, k, a, b, c) / mass;
        // The cell beside the feed is sealed: the feed's own nodes on their common edge do not count for it.
        boolean sealed = !film.feeds(grid.cell(i, j));
        double lower = sealed && k == 0 ? 0 : bilinear(fluxSigma, i, j, k, a, b);
        double upper = sealed && k == nk - 2 ? 0 : bilinear(fluxSigma, i, j, k + 1, a, b);
        rates[2] = ((1 - c) * lower + c * upper) / mass;
    }

    private double bilinear(double[] values, int i, int j, int k, double a, double b) {
        int n00 = grid.node(i, j) * nk + k;
        int n10 = grid.node(i + 1, j) * nk + k;
        return (1 - a) * ((1 - b) * values[n00] + b * values[n00 + nk])
                + a * ((1 - b) * values[n10] + b * values[n10 + nk]);
    }

    private double trilinear(double[] values, int i, int j, int k, double a, double b, double c) {
        return (1 - c) * bilinear(values, i, j, k, a, b) + c * bilinear(values, i, j, k + 1, a, b);
    }

    private double across(int i, int j, double theta, double r) {
        double left = grid.lineTheta(i, j, r);
        return (theta - left) / (grid.lineTheta(i + 1, j, r) - left);
    }

    private double along(int j, double r) {
        return (r - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
    }

    private double plane(int i, int j, double theta, double r, java.util.function.IntToDoubleFunction value) {
        double a = across(i, j, theta, r);
        double b = along(j, r);
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * value.applyAsDouble(n) + b * value.applyAsDouble(n + 1))
                + a * ((1 - b) * value.applyAsDouble(m) + b * value.applyAsDouble(m + 1));
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        double below = plane(i, j, theta, r, n -> field.pressure(n, k));
        double above = plane(i, j, theta, r, n -> field.pressure(n, k + 1));
        return (1 - c) * below + c * above;
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        if (!field.hasDensity() && !field.hasTemperature()) {
            return densityOverPressure * pressure(i, j, k, theta, r, sigma);
        }
        double a = across(i, j, theta, r);
        double b = along(j, r);
        double c = (sigma - field.sigma(k)) / (field.sigma(k + 1) - field.sigma(k));
        return trilinear(columnDensity, i, j, k, a, b, c) / thickness(i, j, theta, r);
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        return plane(i, j, theta, r, n -> film.faces().rotorZ(n));
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return plane(i, j, theta, r, n -> film.faces().thickness(n));
    }

    @Override
    public double supplyFlow(int i, int j) {
        return fluxes.supplyFlow(i, j);
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        int left = grid.node(i, j) * nk;
        int right = grid.node(i + 1, j) * nk;
        double width = grid.theta(i + 1, j) - grid.theta(i, j);
        double sum = 0;
        for (int k = 0; k < nk - 1 && field.sigma(k) < sigma; k++) {
            double thick = field.sigma(k + 1) - field.sigma(k);
            double c = Math.min(1, (sigma - field.sigma(k)) / thick);
            double lower = 0.5 * (fluxRadial[left + k] + fluxRadial[right + k]);
            double upper = 0.5 * (fluxRadial[left + k + 1] + fluxRadial[right + k + 1]);
            sum += thick * c * (lower + 0.5 * c * (upper - lower));
        }
        return sum * width;
    }

    @Override
    public String interpolation() {
        return "nodal";
    }
}
