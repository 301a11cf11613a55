package org.whither.film;

/**
 * Mass fluxes of a full field at its nodes and levels, seen from the frame in which the film is steady. Each is formed
 * when it is asked for; nothing is kept, since a field may fill most of the memory.
 */
final class NodalFluxes {
    private final Film film;
    private final FilmGrid grid;
    private final FullField field;
    private final int nk;
    private final Gas gas;
    private final double temperature;
    private final double turn;

    /**
     * The fluxes of a film.
     *
     * @param film a film whose field is a {@link FullField} and whose faces are given at the nodes
     * @throws IllegalArgumentException where they are not
     */
    NodalFluxes(Film film) {
        if (!(film.field() instanceof FullField full) || film.faces().at() != Location.NODE) {
            throw new IllegalArgumentException("nodal fluxes of a "
                    + film.field().getClass().getSimpleName() + " with faces at "
                    + film.faces().at() + "; expected a full field with faces at the nodes");
        }
        this.film = film;
        this.grid = film.grid();
        this.field = full;
        this.nk = full.nk();
        this.gas = film.gas();
        this.temperature = film.conditions().temperature();
        double observer = film.velocityFrame().angularSpeed(film.conditions().rotationRate());
        this.turn = observer - film.steadyFrameSpeed();
    }

    /** Mass flux ρh u_θ at node (i, j) and level k (kg/(m s)). */
    double theta(int i, int j, int k) {
        int node = grid.node(i, j);
        double ut = field.velocityTheta(node, k) + turn * grid.radius(j);
        return field.density(node, k, gas, temperature) * film.faces().thickness(node) * ut;
    }

    /** Mass flux ρh r u_r at node (i, j) and level k (kg/s a radian). */
    double radial(int i, int j, int k) {
        int node = grid.node(i, j);
        return field.density(node, k, gas, temperature)
                * film.faces().thickness(node)
                * grid.radius(j)
                * field.velocityR(node, k);
    }

    /**
     * Mass fluxes ρh r dσ/dt through all levels at a node (kg/(m s)).
     *
     * @param into nk of them; overwritten
     * @param at where they begin
     */
    void across(int i, int j, double[] into, int at) {
        int node = grid.node(i, j);
        double r = grid.radius(j);
        double rotorTheta = slopeTheta(i, j, false);
        double statorTheta = slopeTheta(i, j, true);
        double rotorR = slopeRadial(i, j, false, rotorTheta);
        double statorR = slopeRadial(i, j, true, statorTheta);
        for (int k = 0; k < nk; k++) {
            double sigma = field.sigma(k);
            double rho = field.density(node, k, gas, temperature);
            double ur = field.velocityR(node, k);
            double ut = field.velocityTheta(node, k) + turn * r;
            double levelTheta = (1 - sigma) * rotorTheta + sigma * statorTheta;
            double levelR = (1 - sigma) * rotorR + sigma * statorR;
            double rise = field.velocityZ(node, k) - ur * levelR - ut / r * levelTheta;
            into[at + k] = rho * r * rise;
        }
        // A sealed face lets nothing through, whatever the last digits of the solver's velocities say.
        Face fed = film.supply().isPresent() && touchesFeed(i, j)
                ? film.supply().get().face()
                : null;
        if (fed != Face.ROTOR) {
            into[at] = 0;
        }
        if (fed != Face.STATOR) {
            into[at + nk - 1] = 0;
        }
    }

    /** Supply gas that enters through cell (i, j) of the feed, as given or by the velocities at its face (kg/s). */
    double supplyFlow(int i, int j) {
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
        double atLower = 0.5 * (across(i, j, k) + across(i + 1, j, k));
        double atUpper = 0.5 * (across(i, j + 1, k) + across(i + 1, j + 1, k));
        // ∫ f(b) Δθ(b) db with both linear in b
        double rise = dr * (atLower * (2 * lower + upper) + atUpper * (lower + 2 * upper)) / 6;
        return stator ? -rise : rise;
    }

    private double across(int i, int j, int k) {
        double[] all = new double[nk];
        across(i, j, all, 0);
        return all[k];
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
}
