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
        double observer = film.velocityFrame().angularSpeed(film.conditions().rotationRate());
        double turn = observer - film.steadyFrameSpeed();
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                fill(i, j, turn);
            }
        }
    }

    private void fill(int i, int j, double turn) {
        int node = grid.node(i, j);
        RingFaces faces = film.faces();
        double r = grid.radius(j);
        double h = faces.thickness(node);
        double rotorTheta = slopeTheta(i, j, false);
        double statorTheta = slopeTheta(i, j, true);
        double rotorR = slopeRadial(i, j, false, rotorTheta);
        double statorR = slopeRadial(i, j, true, statorTheta);
        for (int k = 0; k < nk; k++) {
            double sigma = field.sigma(k);
            double rho = field.density(node, k, film.gas(), film.conditions().temperature());
            double ur = field.velocityR(node, k);
            double ut = field.velocityTheta(node, k) + turn * r;
            double levelTheta = (1 - sigma) * rotorTheta + sigma * statorTheta;
            double levelR = (1 - sigma) * rotorR + sigma * statorR;
            double rise = field.velocityZ(node, k) - ur * levelR - ut / r * levelTheta;
            int at = node * nk + k;
            fluxTheta[at] = rho * h * ut;
            fluxRadial[at] = rho * h * r * ur;
            fluxSigma[at] = rho * r * rise;
            columnDensity[at] = rho * h;
        }
        // A sealed face lets nothing through, whatever the last digits of the solver's velocities say.
        Face fed = film.supply().isPresent() && touchesFeed(i, j)
                ? film.supply().get().face()
                : null;
        if (fed != Face.ROTOR) {
            fluxSigma[node * nk] = 0;
        }
        if (fed != Face.STATOR) {
            fluxSigma[node * nk + nk - 1] = 0;
        }
    }

    private boolean touchesFeed(int i, int j) {
        int nci = grid.cellsTheta();
        for (int di = -1; di <= 0; di++) {
            for (int dj = -1; dj <= 0; dj++) {
                int cj = j + dj;
                if (cj >= 0 && cj < grid.cellsRadial() && film.feeds(grid.cell(Math.floorMod(i + di, nci), cj))) {
                    return true;
                }
            }
        }
        return false;
    }

    private double faceZ(int i, int j, boolean stator) {
        int node = grid.node(i, j);
        return stator ? film.faces().statorZ(node) : film.faces().rotorZ(node);
    }

    /** ∂z/∂θ of a face at a node (m/rad), central, over the sector's border as well. */
    private double slopeTheta(int i, int j, boolean stator) {
        int last = grid.ni() - 1;
        int before = i > 0 ? i - 1 : last - 1;
        int after = i < last ? i + 1 : 1;
        double thetaBefore = i > 0 ? grid.theta(before, j) : grid.theta(before, j) - grid.pitch();
        double thetaAfter = i < last ? grid.theta(after, j) : grid.theta(after, j) + grid.pitch();
        return (faceZ(after, j, stator) - faceZ(before, j, stator)) / (thetaAfter - thetaBefore);
    }

    /** ∂z/∂r of a face at a node at constant θ (m/m), central, one-sided at the two diameters. */
    private double slopeRadial(int i, int j, boolean stator, double slopeTheta) {
        int below = Math.max(0, j - 1);
        int above = Math.min(grid.nj() - 1, j + 1);
        double dr = grid.radius(above) - grid.radius(below);
        double alongLine = (faceZ(i, above, stator) - faceZ(i, below, stator)) / dr;
        double lineSlope = (grid.theta(i, above) - grid.theta(i, below)) / dr;
        return alongLine - lineSlope * slopeTheta;
    }

    /** Mass flux ρh u_θ at a node index and level, in the frame in which the film is steady (kg/(m s)). */
    double fluxTheta(int node, int k) {
        return fluxTheta[node * nk + k];
    }

    /** Mass flux ρh r u_r at a node index and level (kg/s a radian). */
    double fluxRadial(int node, int k) {
        return fluxRadial[node * nk + k];
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
        int cell = grid.cell(i, j);
        if (!film.feeds(cell)) {
            return 0;
        }
        Supply supply = film.supply().orElseThrow();
        if (supply.hasMassFlux()) {
            return supply.massFlux(cell) * grid.cellArea(i, j);
        }
        boolean stator = supply.face() == Face.STATOR;
        int k = stator ? nk - 1 : 0;
        double dr = grid.radius(j + 1) - grid.radius(j);
        double lower = grid.theta(i + 1, j) - grid.theta(i, j);
        double upper = grid.theta(i + 1, j + 1) - grid.theta(i, j + 1);
        double atLower = 0.5 * (fluxSigma[grid.node(i, j) * nk + k] + fluxSigma[grid.node(i + 1, j) * nk + k]);
        double atUpper = 0.5 * (fluxSigma[grid.node(i, j + 1) * nk + k] + fluxSigma[grid.node(i + 1, j + 1) * nk + k]);
        // ∫ f(b) Δθ(b) db with both linear in b
        double rise = dr * (atLower * (2 * lower + upper) + atUpper * (lower + 2 * upper)) / 6;
        return stator ? -rise : rise;
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
