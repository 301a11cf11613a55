package org.whither.film;

import java.util.Optional;

/**
 * The motion of the gas in a film, conserving mass at every point.
 *
 * <p>Let a, b in 0 … 1 be the place within a cell along θ and r. The mass flow in (a, b, σ) is the derivative of two
 * column potentials: P, the flow below σ through a line of constant a, linear between the two constant-i faces of the
 * cell, and Q likewise for the constant-j faces. Then da/dt = ∂P/∂σ / m, db/dt = ∂Q/∂σ / m and dσ/dt = −(∂P/∂a + ∂Q/∂b) /
 * m, m = ρ h r Δr Δθ, which is free of divergence whatever P and Q are, has both faces sealed and lets in exactly the
 * supply of the cell through its feed. With P and Q even along the faces it is the lowest-order Raviart–Thomas
 * interpolation, the one under D. W. Pollock's closed-form paths (Ground Water 26(6), 1988). That is kept for what the
 * pressure drives, which is even along a face; what the faces drag along follows ρ r along it, by a factor w = 1 + κ (2b −
 * 1) + λ (6b² − 6b + 1) of mean 1, so that the speed is right at every point of a row over which the pressure falls
 * steeply; a term b − ∫w in Q takes up what that shifts, so that the divergence stays even over the cell.
 *
 * <p>Across the film each face of the grid has one profile, shared by both cells. Sharing it keeps the gas level by level
 * across a groove edge. For a lubrication field it is the exact one of the thin film (Reynolds 1886), a part linear in σ
 * that the turning faces drag along and a parabola that the pressure drives, so that ψ(σ) = R (2σ − σ²) + S σ² + (F − R −
 * S)(3σ² − 2σ³), with F the column flow and R, S what rotor and stator drag along. For a full field the rest beside R and
 * S is a spline through the fluxes of the nodes (see {@link FaceProfiles}), and what the column flows need to balance is
 * spread over it as that parabola. The rate across the film then follows from continuity; of the velocities along the
 * shaft only those at the feed count.
 */
public final class ConservingFlow implements FilmFlow {
    private final Film film;
    private final FilmGrid grid;
    private final GasState gas;
    private final ColumnFlows flows;
    /** Profiles across the film of a full field; null for a lubrication field, whose profiles are parabolas. */
    private final FaceProfiles profiles;

    private final double[] levels;
    private final double[] dragRotor;
    private final double[] dragStator;
    private final double[] leanRadial;
    private final double[] bendRadial;
    private final boolean nodalThickness;
    private final boolean fedThroughRotor;
    private PackedFlow packed;

    /**
     * The motion of the gas in a film.
     *
     * @param film a film
     * @throws IllegalArgumentException where its field is a {@link FullField} and its faces are not given at the nodes
     */
    public ConservingFlow(Film film) {
        this(film, FaceProfiles.MOST_KEPT);
    }

    /** As {@link #ConservingFlow(Film)}, with the most bytes that profiles across the film may be kept in. */
    ConservingFlow(Film film, long mostKept) {
        this.film = film;
        this.grid = film.grid();
        this.nodalThickness = film.faces().at() == Location.NODE;
        this.fedThroughRotor = film.supply().isPresent() && film.supply().get().face() == Face.ROTOR;
        double rotor = film.conditions().rotationRate() - film.steadyFrameSpeed();
        double stator = -film.steadyFrameSpeed();
        dragRotor = new double[grid.ni() * grid.cellsRadial()];
        dragStator = new double[dragRotor.length];
        leanRadial = new double[dragRotor.length];
        bendRadial = new double[dragRotor.length];
        if (film.field() instanceof FullField full) {
            NodalFluxes nodal = new NodalFluxes(film);
            Levels atLevels = new Levels(film);
            gas = atLevels;
            drag(rotor, stator);
            profiles = new FaceProfiles(film, nodal, atLevels, rotor, stator, mostKept);
            levels = new double[full.nk()];
            for (int k = 0; k < levels.length; k++) {
                levels[k] = full.sigma(k);
            }
            flows = balanced(nodal);
        } else {
            Columns columns = new Columns(film);
            gas = columns;
            drag(rotor, stator);
            profiles = null;
            levels = new double[] {0, 1};
            flows = ColumnFlows.of(film, columns);
        }
    }

    /**
     * Memory that the motion of a film takes, beside the film itself, when it is made and laid out for tracing: the
     * packed numbers, profiles across the film where they are kept, and some forty numbers a node of the face, most of
     * them while the flows are balanced.
     *
     * @param film a film
     * @return bytes
     */
    public static long heap(Film film) {
        long nodes = film.grid().nodes();
        long face = 40L * Double.BYTES * nodes;
        if (!(film.field() instanceof FullField full)) {
            return face + nodes * PackedFlow.bytesPerNode(2, false);
        }
        long profiles = FaceProfiles.bytes(film.grid(), full.nk());
        return face
                + (profiles <= FaceProfiles.MOST_KEPT ? profiles : 0)
                + nodes * PackedFlow.bytesPerNode(full.nk(), full.hasDensity() || full.hasTemperature());
    }

    private void drag(double rotor, double stator) {
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double moment = gas.rotationMoment(i, j);
                leanRadial[i * grid.cellsRadial() + j] = gas.leanRadial(i, j);
                bendRadial[i * grid.cellsRadial() + j] = gas.bendRadial(i, j);
                dragRotor[i * grid.cellsRadial() + j] = 0.5 * rotor * moment;
                dragStator[i * grid.cellsRadial() + j] = 0.5 * stator * moment;
            }
        }
    }

    /** Balances the column flows of the profiles, and makes the profiles carry them. */
    private ColumnFlows balanced(NodalFluxes nodal) {
        int ncj = grid.cellsRadial();
        double[] theta = new double[grid.ni() * ncj];
        double[] radial = new double[grid.cellsTheta() * grid.nj()];
        double[] supply = new double[grid.cells()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < ncj; j++) {
                int face = i * ncj + j;
                theta[face] = profiles.thetaTotal(i, j) + dragRotor[face] + dragStator[face];
            }
        }
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                radial[i * grid.nj() + j] = profiles.radialTotal(i, j);
            }
            for (int j = 0; j < ncj; j++) {
                supply[grid.cell(i, j)] = nodal.supplyFlow(i, j);
            }
        }
        ColumnFlows balanced = ColumnFlows.of(film, theta, radial, supply);
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < ncj; j++) {
                int face = i * ncj + j;
                profiles.carryTheta(i, j, balanced.theta(i, j) - dragRotor[face] - dragStator[face]);
            }
        }
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                profiles.carryRadial(i, j, balanced.radial(i, j));
            }
        }
        return balanced;
    }

    /** The balanced flows of the columns. */
    public ColumnFlows columnFlows() {
        return flows;
    }

    @Override
    public Film film() {
        return film;
    }

    @Override
    public int layers() {
        return levels.length - 1;
    }

    @Override
    public double level(int k) {
        return levels[k];
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        double r0 = grid.radius(j);
        double dr = grid.radius(j + 1) - r0;
        double b = (r - r0) / dr;
        double left0 = grid.theta(i, j);
        double leftRise = grid.theta(i, j + 1) - left0;
        double right0 = grid.theta(i + 1, j);
        double rightRise = grid.theta(i + 1, j + 1) - right0;
        double left = left0 + b * leftRise;
        double width = right0 + b * rightRise - left;
        double a = (theta - left) / width;
        double mass = gas.density(i, j, k, a, b, sigma) * localThickness(i, j, a, b) * r * dr * width;

        // Here: the flow density at this height; below: the flow under it, what leaves the cell less what enters.
        int face = i * (grid.nj() - 1) + j;
        int next = face + grid.nj() - 1;
        double square = sigma * sigma;
        double rotorHere = 2 - 2 * sigma;
        double statorHere = 2 * sigma;
        double drag0 = dragRotor[face] * rotorHere + dragStator[face] * statorHere;
        double drag1 = dragRotor[next] * rotorHere + dragStator[next] * statorHere;
        double spread = (dragRotor[next] - dragRotor[face]) * (2 * sigma - square)
                + (dragStator[next] - dragStator[face]) * square;
        double driven0;
        double driven1;
        double inner;
        double outer;
        if (profiles == null) {
            double pressureHere = 6 * sigma * (1 - sigma);
            double column0 = flows.theta(i, j) - dragRotor[face] - dragStator[face];
            double column1 = flows.theta(i + 1, j) - dragRotor[next] - dragStator[next];
            double columnInner = flows.radial(i, j);
            double columnOuter = flows.radial(i, j + 1);
            driven0 = column0 * pressureHere;
            driven1 = column1 * pressureHere;
            inner = columnInner * pressureHere;
            outer = columnOuter * pressureHere;
            spread += (column1 - column0 + columnOuter - columnInner) * square * (3 - 2 * sigma);
        } else {
            double thick = levels[k + 1] - levels[k];
            double c = (sigma - levels[k]) / thick;
            double[] around0 = profiles.theta(i, j);
            double[] around1 = profiles.theta(i + 1, j);
            double[] out0 = profiles.radial(i, j);
            double[] out1 = profiles.radial(i, j + 1);
            int at0 = profiles.thetaPiece(i, j, k);
            int at1 = profiles.thetaPiece(i + 1, j, k);
            int atInner = profiles.radialPiece(i, j, k);
            int atOuter = profiles.radialPiece(i, j + 1, k);
            driven0 = FaceProfiles.density(around0, at0, c, thick);
            driven1 = FaceProfiles.density(around1, at1, c, thick);
            inner = FaceProfiles.density(out0, atInner, c, thick);
            outer = FaceProfiles.density(out1, atOuter, c, thick);
            spread += FaceProfiles.below(around1, at1, c, thick)
                    - FaceProfiles.below(around0, at0, c, thick)
                    + FaceProfiles.below(out1, atOuter, c, thick)
                    - FaceProfiles.below(out0, atInner, c, thick);
        }

        double bCentre = 2 * b - 1;
        double bBubble = b * (1 - b);
        double bCurve = 1 - 6 * bBubble;
        double aRate = ((1 - a) * (drag0 * (1 + leanRadial[face] * bCentre + bendRadial[face] * bCurve) + driven0)
                        + a * (drag1 * (1 + leanRadial[next] * bCentre + bendRadial[next] * bCurve) + driven1))
                / mass;
        double bRate = ((1 - b) * inner
                        + b * outer
                        + bBubble
                                * ((leanRadial[next] + bendRadial[next] * bCentre) * drag1
                                        - (leanRadial[face] + bendRadial[face] * bCentre) * drag0))
                / mass;
        if (fedThroughRotor) {
            spread -= flows.supply(i, j);
        }
        rates[0] = aRate * width + bRate * ((1 - a) * leftRise + a * rightRise);
        rates[1] = bRate * dr;
        rates[2] = -spread / mass;
    }

    private double localThickness(int i, int j, double a, double b) {
        if (!nodalThickness) {
            return film.faces().thickness(grid.cell(i, j));
        }
        RingFaces faces = film.faces();
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * faces.thickness(n) + b * faces.thickness(n + 1))
                + a * ((1 - b) * faces.thickness(m) + b * faces.thickness(m + 1));
    }

    private double across(int i, int j, double theta, double r) {
        double left = grid.lineTheta(i, j, r);
        return (theta - left) / (grid.lineTheta(i + 1, j, r) - left);
    }

    private double along(int j, double r) {
        return (r - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return gas.pressure(i, j, k, across(i, j, theta, r), along(j, r), sigma);
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return gas.density(i, j, k, across(i, j, theta, r), along(j, r), sigma);
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        RingFaces faces = film.faces();
        if (!nodalThickness) {
            return faces.rotorZ(grid.cell(i, j));
        }
        double a = across(i, j, theta, r);
        double b = along(j, r);
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * faces.rotorZ(n) + b * faces.rotorZ(n + 1))
                + a * ((1 - b) * faces.rotorZ(m) + b * faces.rotorZ(m + 1));
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return localThickness(i, j, across(i, j, theta, r), along(j, r));
    }

    @Override
    public double supplyFlow(int i, int j) {
        return film.feeds(grid.cell(i, j)) ? flows.supply(i, j) : 0;
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        return profiles == null
                ? flows.radial(i, j) * sigma * sigma * (3 - 2 * sigma)
                : profiles.radialBelow(i, j, sigma);
    }

    @Override
    public Optional<Correction> correction() {
        return Optional.of(new Correction(flows.closure(), flows.correction(), flows.largestCorrection()));
    }

    @Override
    public synchronized Optional<PackedFlow> packed() {
        if (packed == null && PackedFlow.fits(film, levels.length)) {
            packed = new PackedFlow(film, levels, gas, new Numbers());
        }
        return Optional.ofNullable(packed);
    }

    @Override
    public String interpolation() {
        return "conserving";
    }

    /** What is packed; the parabola of a lubrication field is a spline through 0 at both faces. */
    private final class Numbers implements PackedFlow.Source {
        private int face(int i, int j) {
            return i * grid.cellsRadial() + j;
        }

        @Override
        public double around(int i, int j, int k) {
            return profiles == null ? 0 : profiles.thetaAt(i, j, k);
        }

        @Override
        public double aroundBend(int i, int j, int k) {
            return profiles == null
                    ? -2 * (flows.theta(i, j) - dragRotor[face(i, j)] - dragStator[face(i, j)])
                    : profiles.thetaBend(i, j, k);
        }

        @Override
        public double out(int i, int j, int k) {
            return profiles == null ? 0 : profiles.radialAt(i, j, k);
        }

        @Override
        public double outBend(int i, int j, int k) {
            return profiles == null ? -2 * flows.radial(i, j) : profiles.radialBend(i, j, k);
        }

        @Override
        public double spread(int i, int j, int k) {
            double supply = flows.supply(i, j);
            if (k == 0) {
                return fedThroughRotor ? -supply : 0;
            }
            if (k == levels.length - 1) {
                return fedThroughRotor ? 0 : supply;
            }
            double sigma = levels[k];
            double square = sigma * sigma;
            int left = face(i, j);
            int right = face(i + 1, j);
            return (dragRotor[right] - dragRotor[left]) * (2 * sigma - square)
                    + (dragStator[right] - dragStator[left]) * square
                    + profiles.spread(i, j, k)
                    - (fedThroughRotor ? supply : 0);
        }

        @Override
        public double dragRotor(int i, int j) {
            return dragRotor[face(i, j)];
        }

        @Override
        public double dragStator(int i, int j) {
            return dragStator[face(i, j)];
        }

        @Override
        public double lean(int i, int j) {
            return leanRadial[face(i, j)];
        }

        @Override
        public double bend(int i, int j) {
            return bendRadial[face(i, j)];
        }
    }
}
