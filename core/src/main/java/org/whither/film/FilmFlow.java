package org.whither.film;

import java.util.Optional;

/**
 * The motion of the gas in a film, interpolated between what the solver computed. It is smooth inside each
 * <em>piece</em>: cell (i, j) of the grid, layer k between two levels across the film. All rates are seen from the frame
 * in which the film is steady; all flows are those of one sector. Implementations can be used from many threads.
 */
public interface FilmFlow {
    /** Parts of a layer in which a profile of several layers is taken to run one way. */
    int PARTS_OF_LAYER = 8;

    /**
     * The motion of the gas in a film, by the interpolation that conserves mass at every point.
     *
     * @param film the film
     * @return its motion
     */
    static FilmFlow of(Film film) {
        return new ConservingFlow(film);
    }

    /** The film. */
    Film film();

    /** Number of layers across the film. */
    int layers();

    /** Lower bound of layer k, or 1 for k = layers(), as a fraction of the film thickness. */
    double level(int k);

    /**
     * Rates of a particle of gas.
     *
     * @param i column of cells
     * @param j row of cells
     * @param k layer
     * @param theta angle within the sector, in the frame in which the film is steady (rad)
     * @param r radius (m)
     * @param sigma height above the rotor face as a fraction of the film thickness
     * @param rates dθ/dt (rad/s), dr/dt (m/s), dσ/dt (1/s); length 3; overwritten
     */
    void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates);

    /** Absolute pressure at a point of a piece (Pa); arguments as in {@link #rates}. */
    double pressure(int i, int j, int k, double theta, double r, double sigma);

    /** Density at a point of a piece (kg/m³); arguments as in {@link #rates}. */
    double density(int i, int j, int k, double theta, double r, double sigma);

    /** Height of the rotor face at a point of cell (i, j) (m). */
    double rotorZ(int i, int j, double theta, double r);

    /** Film thickness at a point of cell (i, j) (m). */
    double thickness(int i, int j, double theta, double r);

    /** Supply gas that enters through cell (i, j) of the feed (kg/s); negative where film gas leaves through it. */
    double supplyFlow(int i, int j);

    /**
     * Mass flow outwards through the part of a constant-j face that lies below a height.
     *
     * @param i column of cells
     * @param j ring of nodes, 0 … nj − 1
     * @param sigma height as a fraction of the film thickness; 1 gives the flow of the whole column
     * @return mass flow (kg/s)
     */
    double radialFlowBelow(int i, int j, double sigma);

    /**
     * Number of parts, each between two heights, in which the radial flow through a constant-j face is taken to run one
     * way: 1 where a pressure that is constant across the film drives it, else several a layer.
     */
    default int profileParts() {
        return layers() == 1 ? 1 : layers() * PARTS_OF_LAYER;
    }

    /** Lower bound of such a part, or 1 for part = profileParts(), as a fraction of the film thickness. */
    default double profilePart(int part) {
        if (layers() == 1) {
            return part;
        }
        int k = Math.min(layers() - 1, part / PARTS_OF_LAYER);
        double c = (part - k * PARTS_OF_LAYER) / (double) PARTS_OF_LAYER;
        return level(k) + c * (level(k + 1) - level(k));
    }

    /** What had to be changed in the field so that mass is conserved; empty for an interpolation that takes it as it is. */
    default Optional<Correction> correction() {
        return Optional.empty();
    }

    /** The motion laid out for following many tracers at once, where this interpolation can be; made at the first call. */
    default Optional<PackedFlow> packed() {
        return Optional.empty();
    }

    /** Which interpolation this is, as written in results: {@code conserving} or {@code nodal}. */
    String interpolation();
}
