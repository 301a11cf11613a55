package org.whither.film;

/**
 * The motion of the gas in a lubrication film by plain interpolation between the nodes, for comparison with
 * {@link ConservingFlow}. The thin-film velocities (Reynolds 1886) are rebuilt from the pressure at each node, whatever mass
 * flows the solver gave: ρh u_θ = ρh r Ω(σ) + 6σ(1 − σ) A and ρh r u_r = 6σ(1 − σ) B, with A = −(ρh³/12µ)(1/r) ∂p/∂θ and B
 * = −(ρh³/12µ) r ∂p/∂r from the cells round the node, each with its own film thickness where that jumps. These and the mass
 * ρh are linear in both directions of a cell, and then divided. The rate across the film follows from what the faces drag
 * along: it is made to vanish at a sealed face and to let in the supply at the feed. Mass is not conserved exactly; how far
 * it is, is told by the closure of the border flows.
 */
public final class NodalThinFilm implements FilmFlow {
    /** Rows beside each other whose film thicknesses differ by no more than this share have no step between them. */
    private static final double SAME_THICKNESS = 0.05;

    private final Film film;
    private final FilmGrid grid;
    private final Columns columns;
    private final double densityOverPressure;
    private final double rotorSpeed;
    private final double statorSpeed;
    /** At the nodes: A (kg/(m s)), B (kg/s a radian), ρh (kg/m²) and its slope round the ring (kg/m² a radian). */
    private final double[] driven;

    private final double[] outward;
    private final double[] mass;
    private final double[] massSlope;
    /** What enters through each cell of the feed (kg/s). */
    private final double[] supply;

    /**
     * The motion of the gas in a film.
     *
     * @param film a film whose field is a {@link LubricationField}
     * @throws IllegalArgumentException where it is not
     */
    public NodalThinFilm(Film film) {
        if (!(film.field() instanceof LubricationField)) {
            throw new IllegalArgumentException("thin-film motion of a "
                    + film.field().getClass().getSimpleName() + "; expected a lubrication field");
        }
        this.film = film;
        this.grid = film.grid();
        this.columns = new Columns(film);
        densityOverPressure = 1 / columns.pressureOverDensity();
        rotorSpeed = film.conditions().rotationRate() - film.steadyFrameSpeed();
        statorSpeed = -film.steadyFrameSpeed();
        driven = new double[grid.nodes()];
        outward = new double[grid.nodes()];
        mass = new double[grid.nodes()];
        massSlope = new double[grid.nodes()];
        supply = new double[grid.cells()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                fill(i, j);
            }
        }
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                massSlope[grid.node(i, j)] = slopeRound(i, j);
            }
        }
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                supply[grid.cell(i, j)] = supplyOf(i, j);
            }
        }
    }

    /** The values of a node: means over the cells round it, for B without those of the feed at its edge. */
    private void fill(int i, int j) {
        int nci = grid.cellsTheta();
        double sumA = 0;
        double sumB = 0;
        double sumFedB = 0;
        double sumH = 0;
        int cells = 0;
        int sealed = 0;
        int line = i % nci;
        double square = columns.nodeSquare(line, j);
        double r = grid.radius(j);
        for (int ci = i - 1; ci <= i; ci++) {
            int column = Math.floorMod(ci, nci);
            for (int cj = Math.max(0, j - 1); cj <= Math.min(j, grid.cellsRadial() - 1); cj++) {
                double h = film.faces().at() == Location.NODE
                        ? film.faces().thickness(grid.node(i, j))
                        : columns.h(column, cj);
                double conductance =
                        densityOverPressure * h * h * h / (24 * film.gas().viscosity());
                double round = (columns.nodeSquare((column + 1) % nci, j) - columns.nodeSquare(column, j))
                        / (grid.theta(column + 1, j) - grid.theta(column, j));
                // In ln r, in which p² of a plain film is linear; at constant θ, not along the line.
                double out = alongLine(line, column, j, cj) - r * grid.lineSlope(line, cj) * round;
                sumA -= conductance * round / r;
                sumH += h;
                cells++;
                if (film.feeds(grid.cell(column, cj))) {
                    sumFedB -= conductance * out;
                } else {
                    sumB -= conductance * out;
                    sealed++;
                }
            }
        }
        int node = grid.node(i, j);
        driven[node] = sumA / cells;
        outward[node] = sealed > 0 ? sumB / sealed : sumFedB / cells;
        mass[node] = densityOverPressure * Math.sqrt(square) * sumH / cells;
    }

    /** ∂(p²)/∂ ln r along a line within row cj; at the two diameters carried on from the row and the one next to it. */
    private double alongLine(int line, int column, int j, int cj) {
        double here = rise(line, cj);
        int next = j == 0 ? 1 : j == grid.nj() - 1 ? cj - 1 : -1;
        if (next < 0
                || next >= grid.cellsRadial()
                || film.feeds(grid.cell(column, cj)) != film.feeds(grid.cell(column, next))
                || Math.abs(columns.h(column, cj) / columns.h(column, next) - 1) > SAME_THICKNESS) {
            return here;
        }
        double half = 0.5 * Math.log(grid.radius(cj + 1) / grid.radius(cj));
        double halfNext = 0.5 * Math.log(grid.radius(next + 1) / grid.radius(next));
        return here + (here - rise(line, next)) * half / (half + halfNext);
    }

    private double rise(int line, int cj) {
        return (columns.nodeSquare(line, cj + 1) - columns.nodeSquare(line, cj))
                / Math.log(grid.radius(cj + 1) / grid.radius(cj));
    }

    /** ∂(ρh)/∂θ at a node, central, over the sector's border as well. */
    private double slopeRound(int i, int j) {
        int last = grid.ni() - 1;
        int before = i > 0 ? i - 1 : last - 1;
        int after = i < last ? i + 1 : 1;
        double from = i > 0 ? grid.theta(before, j) : grid.theta(before, j) - grid.pitch();
        double to = i < last ? grid.theta(after, j) : grid.theta(after, j) + grid.pitch();
        return (mass[grid.node(after, j)] - mass[grid.node(before, j)]) / (to - from);
    }

    private double supplyOf(int i, int j) {
        int cell = grid.cell(i, j);
        if (!film.feeds(cell)) {
            return 0;
        }
        Supply feed = film.supply().orElseThrow();
        if (feed.hasMassFlux()) {
            return feed.massFlux(cell) * grid.cellArea(i, j);
        }
        return around(i + 1, j) - around(i, j) + radial(i, j + 1) - radial(i, j);
    }

    /** Flow of the column through a constant-i face of row j (kg/s). */
    private double around(int i, int j) {
        double dr = grid.radius(j + 1) - grid.radius(j);
        double sum = 0;
        for (int end = j; end <= j + 1; end++) {
            int node = grid.node(i, end);
            double dragged = 0.5 * (rotorSpeed + statorSpeed) * mass[node] * grid.radius(end);
            sum += dragged + driven[node] - grid.lineSlope(i % grid.cellsTheta(), j) * outward[node];
        }
        return 0.5 * sum * dr;
    }

    /** Flow of the column through a constant-j face of column i (kg/s). */
    private double radial(int i, int j) {
        double width = grid.theta(i + 1, j) - grid.theta(i, j);
        return 0.5 * (outward[grid.node(i, j)] + outward[grid.node(i + 1, j)]) * width;
    }

    @Override
    public Film film() {
        return film;
    }

    @Override
    public int layers() {
        return 1;
    }

    @Override
    public double level(int k) {
        return k;
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        double a = across(i, j, theta, r);
        double b = along(j, r);
        double parabola = 6 * sigma * (1 - sigma);
        double column = plane(mass, i, j, a, b);
        double turning = (1 - sigma) * rotorSpeed + sigma * statorSpeed;
        rates[0] = turning + parabola * plane(driven, i, j, a, b) / (column * r);
        rates[1] = parabola * plane(outward, i, j, a, b) / (column * r);
        // What the faces drag below σ changes round the ring: −r Ω(σ) ∂(ρh)/∂θ, integrated from the rotor face.
        double square = sigma * sigma;
        double part = square * (3 - 2 * sigma);
        double change = plane(massSlope, i, j, a, b);
        double ofRotor = 0.5 * rotorSpeed * (2 * sigma - square - part);
        double ofStator = 0.5 * statorSpeed * (square - part);
        rates[2] = -change * (ofRotor + ofStator) / column;
        int cell = grid.cell(i, j);
        if (supply[cell] != 0) {
            double flux = supply[cell] / grid.cellArea(i, j);
            boolean stator = film.supply().orElseThrow().face() == Face.STATOR;
            rates[2] += (stator ? -flux * part : flux * (1 - part)) / column;
        }
    }

    private double across(int i, int j, double theta, double r) {
        double left = grid.lineTheta(i, j, r);
        return (theta - left) / (grid.lineTheta(i + 1, j, r) - left);
    }

    private double along(int j, double r) {
        return (r - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
    }

    private double plane(double[] values, int i, int j, double a, double b) {
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * values[n] + b * values[n + 1]) + a * ((1 - b) * values[m] + b * values[m + 1]);
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return columns.pressure(i, j, k, across(i, j, theta, r), along(j, r), sigma);
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return columns.density(i, j, k, across(i, j, theta, r), along(j, r), sigma);
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        RingFaces faces = film.faces();
        return faces.at() == Location.CELL ? faces.rotorZ(grid.cell(i, j)) : onFace(i, j, theta, r, faces, false);
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        RingFaces faces = film.faces();
        return faces.at() == Location.CELL ? faces.thickness(grid.cell(i, j)) : onFace(i, j, theta, r, faces, true);
    }

    private double onFace(int i, int j, double theta, double r, RingFaces faces, boolean thickness) {
        double a = across(i, j, theta, r);
        double b = along(j, r);
        double value = 0;
        for (int corner = 0; corner < 4; corner++) {
            int node = grid.node(i + (corner & 1), j + (corner >> 1));
            double weight = ((corner & 1) == 0 ? 1 - a : a) * (corner >> 1 == 0 ? 1 - b : b);
            value += weight * (thickness ? faces.thickness(node) : faces.rotorZ(node));
        }
        return value;
    }

    @Override
    public double supplyFlow(int i, int j) {
        return supply[grid.cell(i, j)];
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        return radial(i, j) * sigma * sigma * (3 - 2 * sigma);
    }

    @Override
    public String interpolation() {
        return "nodal";
    }
}
