package org.whither.film;

import java.util.stream.IntStream;

/**
 * The motion of the gas of a {@link ConservingFlow}, laid out for following many tracers at once: 32-bit numbers, in
 * blocks that lie beside each other along θ, along which tracers run through most cells. Three planes of blocks hold all:
 * what belongs to a node and a level, what belongs to a cell, and what only the pressure on the way needs.
 *
 * <p>What is packed is what the faces of the grid share, not a polynomial for each piece of the film: a fifth of the
 * memory, and what two pieces have in common stays one number, so that the gas that leaves one enters the next. The flow
 * across the film is packed by itself, level by level, and is exactly 0 at a sealed face.
 */
public final class PackedFlow {
    /*
     * What {@link #load} gives of a piece. 0 and 1 after a name: the constant-i faces i and i + 1, or the constant-j faces
     * j and j + 1. LOW and HIGH: the levels below and above. BEND: a sixth of the second derivative.
     */
    /** Flow density through face i at the level below, without what the faces drag along (kg/s). */
    public static final int AROUND0_LOW = 0;

    public static final int AROUND0_LOW_BEND = 1;
    /** Flow density through face j at the level below (kg/s). */
    public static final int OUT0_LOW = 2;

    public static final int OUT0_LOW_BEND = 3;
    /** What leaves the cell below the level below less what enters (kg/s). */
    public static final int SPREAD_LOW = 4;
    /** Square of the density at a corner; a, b, c in the name (kg²/m⁶). */
    public static final int SQUARE_000 = 5;

    public static final int AROUND1_LOW = 6;
    public static final int AROUND1_LOW_BEND = 7;
    public static final int SQUARE_100 = 8;
    public static final int AROUND0_HIGH = 9;
    public static final int AROUND0_HIGH_BEND = 10;
    public static final int OUT0_HIGH = 11;
    public static final int OUT0_HIGH_BEND = 12;
    public static final int SPREAD_HIGH = 13;
    public static final int SQUARE_001 = 14;
    public static final int AROUND1_HIGH = 15;
    public static final int AROUND1_HIGH_BEND = 16;
    public static final int SQUARE_101 = 17;
    public static final int OUT1_LOW = 18;
    public static final int OUT1_LOW_BEND = 19;
    public static final int SQUARE_010 = 20;
    public static final int SQUARE_110 = 21;
    public static final int OUT1_HIGH = 22;
    public static final int OUT1_HIGH_BEND = 23;
    public static final int SQUARE_011 = 24;
    public static final int SQUARE_111 = 25;
    /** What the rotor drags through face i (kg/s), the stator likewise, and how that leans and bends along r. */
    public static final int DRAG_ROTOR0 = 26;

    public static final int DRAG_STATOR0 = 27;
    public static final int LEAN0 = 28;
    public static final int BEND0 = 29;
    public static final int DRAG_ROTOR1 = 30;
    public static final int DRAG_STATOR1 = 31;
    public static final int LEAN1 = 32;
    public static final int BEND1 = 33;
    /** Film thickness at a corner; a, b in the name (m). */
    public static final int THICKNESS_00 = 34;

    public static final int THICKNESS_01 = 35;
    public static final int THICKNESS_10 = 36;
    public static final int THICKNESS_11 = 37;
    /** Angle that the cell takes up at ring j and at ring j + 1 (rad). */
    public static final int WIDTH_0 = 38;

    public static final int WIDTH_1 = 39;
    /** How far line i turns from ring j to ring j + 1 (rad). */
    public static final int RISE = 40;
    /** Radius of ring j, and the distance to the next (m). */
    public static final int RADIUS = 41;

    public static final int DEPTH = 42;
    /** Height of the level below, and the thickness of the layer, as fractions of the film thickness. */
    public static final int SIGMA = 43;

    public static final int LAYER = 44;
    /** How many numbers {@link #load} gives. */
    public static final int NUMBERS = 45;

    /** Lanes side by side in what is loaded: number n of a lane is at {@code n * LANES + lane}. */
    public static final int LANES = 16;

    /** What {@link #loadMeasure} gives: the height of the rotor face at the corners (m) … */
    public static final int ROTOR_00 = 0;

    public static final int ROTOR_01 = 1;
    public static final int ROTOR_10 = 2;
    public static final int ROTOR_11 = 3;
    /** … and the square of the pressure at the eight corners, a, b, c counting from the last (Pa²). */
    public static final int PRESSURE_000 = 4;
    /** How many numbers {@link #loadMeasure} gives. */
    public static final int MEASURE_NUMBERS = 12;

    private static final int LEVEL = 6;
    private static final int CELL = 16;

    private final int ni;
    private final int nk;
    /** (j, k, i) × LEVEL: flow density around and its bend, flow density out and its bend, spread, density square. */
    private final float[] levels;
    /** (j, i) × CELL: drags, lean, bend of face i; film thickness × 4; widths; rise; rotor face × 4. */
    private final float[] cells;
    /** (j, k, i): square of the pressure; null where it follows from the density. */
    private final float[] pressures;

    private final double pressureSquareOverDensitySquare;
    private final double[] radius;
    private final double[] sigma;
    /** (j, i): whether the cell is fed, at the end of its row false. */
    private final boolean[] fed;

    private final boolean fedThroughRotor;

    /** What of a flow is to be packed. */
    interface Source {
        /** Flow density through constant-i face (i, j) at level k, without what the faces drag along (kg/s). */
        double around(int i, int j, int k);

        /** A sixth of its second derivative in σ, of the layer above the level (kg/s). */
        double aroundBend(int i, int j, int k);

        /** Flow density through constant-j face (i, j) at level k (kg/s). */
        double out(int i, int j, int k);

        /** A sixth of its second derivative. */
        double outBend(int i, int j, int k);

        /** What leaves cell (i, j) below level k less what enters, exactly 0 at a sealed face (kg/s). */
        double spread(int i, int j, int k);

        /** What the rotor drags through constant-i face (i, j) (kg/s). */
        double dragRotor(int i, int j);

        /** What the stator drags through it (kg/s). */
        double dragStator(int i, int j);

        /** How that leans along r. */
        double lean(int i, int j);

        /** How that bends along r. */
        double bend(int i, int j);
    }

    PackedFlow(Film film, double[] sigma, GasState gas, Source source) {
        FilmGrid grid = film.grid();
        this.ni = grid.ni();
        this.nk = sigma.length;
        this.sigma = sigma.clone();
        int nj = grid.nj();
        radius = new double[nj];
        for (int j = 0; j < nj; j++) {
            radius[j] = grid.radius(j);
        }
        double ratio = gas.pressureOverDensity();
        pressureSquareOverDensitySquare = ratio * ratio;
        levels = new float[size(film, LEVEL)];
        pressures = Double.isNaN(ratio) ? new float[size(film, 1)] : null;
        cells = new float[(nj - 1) * ni * CELL];
        fedThroughRotor = film.supply().isPresent() && film.supply().get().face() == Face.ROTOR;
        fed = new boolean[(nj - 1) * ni];
        // All levels of a node together: their profiles across the film are formed once.
        IntStream.range(0, nj).parallel().forEach(j -> {
            for (int i = 0; i < ni; i++) {
                for (int k = 0; k < nk; k++) {
                    packLevel(grid, gas, source, i, j, k);
                }
                if (j < nj - 1) {
                    packCell(film, source, i, j);
                }
            }
        });
    }

    /** Whether a film is small enough for its blocks to be numbered. */
    static boolean fits(Film film, int nk) {
        return (long) film.grid().nodes() * nk * LEVEL < Integer.MAX_VALUE - 64;
    }

    /** Memory that it takes a node of the face, of nk levels, with the pressures or where they follow from the density. */
    static long bytesPerNode(int nk, boolean pressures) {
        return Float.BYTES * (nk * (LEVEL + (pressures ? 1L : 0)) + CELL) + 1;
    }

    private int size(Film film, int block) {
        return film.grid().nodes() * nk * block;
    }

    private void packLevel(FilmGrid grid, GasState gas, Source source, int i, int j, int k) {
        int node = (j * nk + k) * ni + i;
        int at = node * LEVEL;
        if (j < grid.nj() - 1) {
            levels[at] = (float) source.around(i, j, k);
            levels[at + 1] = (float) source.aroundBend(i, j, k);
            if (i < ni - 1) {
                levels[at + 4] = (float) source.spread(i, j, k);
            }
        }
        if (i < ni - 1) {
            levels[at + 2] = (float) source.out(i, j, k);
            levels[at + 3] = (float) source.outBend(i, j, k);
        }
        int cellI = Math.min(i, ni - 2);
        int cellJ = Math.min(j, grid.nj() - 2);
        int layer = Math.min(k, nk - 2);
        double density = gas.density(cellI, cellJ, layer, i - cellI, j - cellJ, sigma[k]);
        levels[at + 5] = (float) (density * density);
        if (pressures != null) {
            double pressure = gas.pressure(cellI, cellJ, layer, i - cellI, j - cellJ, sigma[k]);
            pressures[node] = (float) (pressure * pressure);
        }
    }

    private void packCell(Film film, Source source, int i, int j) {
        FilmGrid grid = film.grid();
        int at = (j * ni + i) * CELL;
        cells[at] = (float) source.dragRotor(i, j);
        cells[at + 1] = (float) source.dragStator(i, j);
        cells[at + 2] = (float) source.lean(i, j);
        cells[at + 3] = (float) source.bend(i, j);
        if (i == ni - 1) {
            return;
        }
        fed[j * ni + i] = film.feeds(grid.cell(i, j));
        RingFaces faces = film.faces();
        int[] corners = faces.at() == Location.CELL
                ? new int[] {grid.cell(i, j), grid.cell(i, j), grid.cell(i, j), grid.cell(i, j)}
                : new int[] {grid.node(i, j), grid.node(i, j + 1), grid.node(i + 1, j), grid.node(i + 1, j + 1)};
        for (int n = 0; n < 4; n++) {
            cells[at + 4 + n] = (float) faces.thickness(corners[n]);
            cells[at + 11 + n] = (float) faces.rotorZ(corners[n]);
        }
        cells[at + 8] = (float) (grid.theta(i + 1, j) - grid.theta(i, j));
        cells[at + 9] = (float) (grid.theta(i + 1, j + 1) - grid.theta(i, j + 1));
        cells[at + 10] = (float) (grid.theta(i, j + 1) - grid.theta(i, j));
    }

    /** Number of layers across the film. */
    public int layers() {
        return nk - 1;
    }

    /** Whether layer k of cell (i, j) touches the rotor face, and that is sealed there. */
    public boolean sealedBelow(int i, int j, int k) {
        return k == 0 && !(fedThroughRotor && fed[j * ni + i]);
    }

    /** Whether layer k of cell (i, j) touches the stator face, and that is sealed there. */
    public boolean sealedAbove(int i, int j, int k) {
        return k == nk - 2 && (fedThroughRotor || !fed[j * ni + i]);
    }

    /** Bytes that it takes up. */
    public long bytes() {
        return 4L * (levels.length + cells.length + (pressures == null ? 0 : pressures.length));
    }

    /**
     * Writes what makes the motion in a piece.
     *
     * @param i column of cells
     * @param j row of cells
     * @param k layer
     * @param into NUMBERS × LANES
     * @param lane the lane to write
     */
    public void load(int i, int j, int k, double[] into, int lane) {
        float[] from = levels;
        int at = ((j * nk + k) * ni + i) * LEVEL;
        // The level below: face i, face j, spread, corner; then face i + 1.
        into[lane] = from[at];
        into[LANES + lane] = from[at + 1];
        into[2 * LANES + lane] = from[at + 2];
        into[3 * LANES + lane] = from[at + 3];
        into[4 * LANES + lane] = from[at + 4];
        into[5 * LANES + lane] = from[at + 5];
        into[6 * LANES + lane] = from[at + 6];
        into[7 * LANES + lane] = from[at + 7];
        into[8 * LANES + lane] = from[at + 11];
        // The level above.
        int above = at + ni * LEVEL;
        into[9 * LANES + lane] = from[above];
        into[10 * LANES + lane] = from[above + 1];
        into[11 * LANES + lane] = from[above + 2];
        into[12 * LANES + lane] = from[above + 3];
        into[13 * LANES + lane] = from[above + 4];
        into[14 * LANES + lane] = from[above + 5];
        into[15 * LANES + lane] = from[above + 6];
        into[16 * LANES + lane] = from[above + 7];
        into[17 * LANES + lane] = from[above + 11];
        // Ring j + 1.
        int outer = at + nk * ni * LEVEL;
        into[18 * LANES + lane] = from[outer + 2];
        into[19 * LANES + lane] = from[outer + 3];
        into[20 * LANES + lane] = from[outer + 5];
        into[21 * LANES + lane] = from[outer + 11];
        outer += ni * LEVEL;
        into[22 * LANES + lane] = from[outer + 2];
        into[23 * LANES + lane] = from[outer + 3];
        into[24 * LANES + lane] = from[outer + 5];
        into[25 * LANES + lane] = from[outer + 11];
        // The cell; its right face is the next one's left.
        from = cells;
        at = (j * ni + i) * CELL;
        into[26 * LANES + lane] = from[at];
        into[27 * LANES + lane] = from[at + 1];
        into[28 * LANES + lane] = from[at + 2];
        into[29 * LANES + lane] = from[at + 3];
        into[30 * LANES + lane] = from[at + CELL];
        into[31 * LANES + lane] = from[at + CELL + 1];
        into[32 * LANES + lane] = from[at + CELL + 2];
        into[33 * LANES + lane] = from[at + CELL + 3];
        into[34 * LANES + lane] = from[at + 4];
        into[35 * LANES + lane] = from[at + 5];
        into[36 * LANES + lane] = from[at + 6];
        into[37 * LANES + lane] = from[at + 7];
        into[38 * LANES + lane] = from[at + 8];
        into[39 * LANES + lane] = from[at + 9];
        into[40 * LANES + lane] = from[at + 10];
        into[41 * LANES + lane] = radius[j];
        into[42 * LANES + lane] = radius[j + 1] - radius[j];
        into[43 * LANES + lane] = sigma[k];
        into[44 * LANES + lane] = sigma[k + 1] - sigma[k];
    }

    /**
     * Writes what more is needed to measure a path in a piece; arguments as in {@link #load}.
     *
     * @param into MEASURE_NUMBERS × LANES
     */
    public void loadMeasure(int i, int j, int k, double[] into, int lane) {
        int at = (j * ni + i) * CELL + 11;
        for (int n = 0; n < 4; n++) {
            into[n * LANES + lane] = cells[at + n];
        }
        int corner = (j * nk + k) * ni + i;
        for (int n = 0; n < 8; n++) {
            int node = corner + ((n >> 2) + (n & 1) * ni + ((n >> 1) & 1) * nk * ni);
            into[(PRESSURE_000 + n) * LANES + lane] =
                    pressures == null ? levels[node * LEVEL + 5] * pressureSquareOverDensitySquare : pressures[node];
        }
    }
}
