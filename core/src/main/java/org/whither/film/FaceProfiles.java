package org.whither.film;

import java.util.stream.IntStream;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.RealMatrix;

/**
 * How the mass flow through each face of the grid is spread across the film, for a full field: a cubic spline through the
 * flow density at the levels, in σ, whose integral from the rotor face is the column potential of the face, a quartic
 * with three continuous derivatives. Beyond the first and last inner level the spline keeps its third derivative ("not a
 * knot", C. de Boor, A Practical Guide to Splines, 1978, chapter IV), so that the parabola of the thin film comes out
 * exactly on three levels or more. On the constant-i faces what the turning faces drag along is left out: it is linear in
 * σ, and its place along the face is known better than by its ends.
 *
 * <p>A face has three numbers a level, side by side: the flow below the level (kg/s), the flow density there (kg/s) and a
 * sixth of its second derivative (kg/s).
 */
final class FaceProfiles {
    private static final int NUMBERS = 3;

    /** Profiles of more bytes than this are not kept but formed anew where they are asked for. */
    static final long MOST_KEPT = 256L << 20;

    /** Faces whose profiles a thread remembers where they are not kept; a power of 2. */
    private static final int REMEMBERED_BITS = 8;

    private final FilmGrid grid;
    private final NodalFluxes fluxes;
    private final Levels levels;
    private final RingFaces faces;
    private final double rotorSpeed;
    private final double statorSpeed;
    private final double[] sigma;
    private final double[][] spline;
    private final int stride;
    /** All numbers of the faces, or null where there are too many to be kept. */
    private final double[] theta;

    private final double[] radial;
    /** Flow of the whole column by the nodes, and, once carried, what was added to it (kg/s). */
    private final double[] addedTheta;

    private final double[] addedRadial;
    private final ThreadLocal<Recent> recentTheta = ThreadLocal.withInitial(Recent::new);
    private final ThreadLocal<Recent> recentRadial = ThreadLocal.withInitial(Recent::new);

    /** Profiles that a thread has lately asked for. */
    private static final class Recent {
        private final int[] faces = new int[1 << REMEMBERED_BITS];
        private final double[][] numbers = new double[1 << REMEMBERED_BITS][];

        /** Where a face is remembered, if it is. */
        private static int place(int face) {
            return (face * 0x9E3779B1) >>> (Integer.SIZE - REMEMBERED_BITS);
        }
    }

    /**
     * Profiles from the nodal fluxes.
     *
     * @param film the film
     * @param fluxes its nodal fluxes, seen from the frame in which the film is steady
     * @param levels its density
     * @param rotorSpeed speed of the rotor in that frame (rad/s)
     * @param statorSpeed speed of the stator in that frame (rad/s)
     * @param mostKept the most bytes that profiles may be kept in
     */
    FaceProfiles(Film film, NodalFluxes fluxes, Levels levels, double rotorSpeed, double statorSpeed, long mostKept) {
        grid = film.grid();
        faces = film.faces();
        this.fluxes = fluxes;
        this.levels = levels;
        this.rotorSpeed = rotorSpeed;
        this.statorSpeed = statorSpeed;
        FullField field = (FullField) film.field();
        sigma = new double[field.nk()];
        for (int k = 0; k < sigma.length; k++) {
            sigma[k] = field.sigma(k);
        }
        stride = NUMBERS * sigma.length;
        spline = secondDerivatives(sigma);
        addedTheta = new double[grid.ni() * grid.cellsRadial()];
        addedRadial = new double[grid.cellsTheta() * grid.nj()];
        boolean kept = bytes(grid, sigma.length) <= mostKept;
        theta = kept ? new double[addedTheta.length * stride] : null;
        radial = kept ? new double[addedRadial.length * stride] : null;
        IntStream.range(0, grid.ni()).parallel().forEach(i -> {
            double[] one = kept ? null : new double[stride];
            for (int j = 0; j < grid.cellsRadial(); j++) {
                int face = thetaFace(i, j);
                int at = kept ? face * stride : 0;
                formTheta(i, j, kept ? theta : one, at);
                addedTheta[face] = (kept ? theta : one)[at + stride - NUMBERS];
            }
            for (int j = 0; j < grid.nj() && i < grid.cellsTheta(); j++) {
                int face = radialFace(i, j);
                int at = kept ? face * stride : 0;
                formRadial(i, j, kept ? radial : one, at);
                addedRadial[face] = (kept ? radial : one)[at + stride - NUMBERS];
            }
        });
    }

    /** Memory that the profiles of a grid take where they are kept (bytes). */
    static long bytes(FilmGrid grid, int nk) {
        long faces = (long) grid.ni() * grid.cellsRadial() + (long) grid.cellsTheta() * grid.nj();
        return faces * nk * NUMBERS * Double.BYTES;
    }

    private void formTheta(int i, int j, double[] into, int at) {
        double[] density = new double[sigma.length];
        int line = i % grid.cellsTheta();
        int start = grid.node(line, j);
        double slope = grid.lineSlope(line, j);
        double half = 0.5 * (grid.radius(j + 1) - grid.radius(j));
        double drag = levels.columnDensity(start) * faces.thickness(start) * grid.radius(j)
                + levels.columnDensity(start + 1) * faces.thickness(start + 1) * grid.radius(j + 1);
        for (int k = 0; k < sigma.length; k++) {
            double turning = (1 - sigma[k]) * rotorSpeed + sigma[k] * statorSpeed;
            double through = fluxes.theta(line, j, k)
                    + fluxes.theta(line, j + 1, k)
                    - slope * (fluxes.radial(line, j, k) + fluxes.radial(line, j + 1, k));
            density[k] = half * (through - drag * turning);
        }
        fill(into, at, density);
    }

    private void formRadial(int i, int j, double[] into, int at) {
        double[] density = new double[sigma.length];
        double half = 0.5 * (grid.theta(i + 1, j) - grid.theta(i, j));
        int end = (i + 1) % grid.cellsTheta();
        for (int k = 0; k < sigma.length; k++) {
            density[k] = half * (fluxes.radial(i, j, k) + fluxes.radial(end, j, k));
        }
        fill(into, at, density);
    }

    /** The matrix that takes values at the levels to a sixth of the second derivatives of their spline. */
    private static double[][] secondDerivatives(double[] x) {
        int n = x.length;
        RealMatrix left = new Array2DRowRealMatrix(n, n);
        RealMatrix right = new Array2DRowRealMatrix(n, n);
        for (int k = 1; k < n - 1; k++) {
            double below = x[k] - x[k - 1];
            double above = x[k + 1] - x[k];
            left.setEntry(k, k - 1, below);
            left.setEntry(k, k, 2 * (below + above));
            left.setEntry(k, k + 1, above);
            right.setEntry(k, k - 1, 1 / below);
            right.setEntry(k, k, -1 / below - 1 / above);
            right.setEntry(k, k + 1, 1 / above);
        }
        end(left, x, 0, 1);
        end(left, x, n - 1, -1);
        return new LUDecomposition(left, 0).getSolver().solve(right).getData();
    }

    private static void end(RealMatrix left, double[] x, int at, int way) {
        if (x.length == 2) {
            left.setEntry(at, at, 1);
        } else if (x.length == 3) {
            left.setEntry(at, at, 1);
            left.setEntry(at, at + way, -1);
        } else {
            double first = Math.abs(x[at + way] - x[at]);
            double second = Math.abs(x[at + 2 * way] - x[at + way]);
            left.setEntry(at, at, second);
            left.setEntry(at, at + way, -first - second);
            left.setEntry(at, at + 2 * way, first);
        }
    }

    private void fill(double[] profiles, int at, double[] density) {
        for (int k = 0; k < density.length; k++) {
            double second = 0;
            for (int n = 0; n < density.length; n++) {
                second += spline[k][n] * density[n];
            }
            profiles[at + NUMBERS * k + 1] = density[k];
            profiles[at + NUMBERS * k + 2] = second;
        }
        for (int k = 0; k < density.length - 1; k++) {
            double thick = sigma[k + 1] - sigma[k];
            int low = at + NUMBERS * k;
            int high = low + NUMBERS;
            profiles[high] = profiles[low]
                    + 0.5 * thick * (profiles[low + 1] + profiles[high + 1])
                    - 0.25 * thick * thick * thick * (profiles[low + 2] + profiles[high + 2]);
        }
    }

    private int thetaFace(int i, int j) {
        return i * (grid.nj() - 1) + j;
    }

    private int radialFace(int i, int j) {
        return i * grid.nj() + j;
    }

    /** An array that holds the numbers of constant-i face (i, j), from {@link #thetaPiece} on. */
    double[] theta(int i, int j) {
        if (theta != null) {
            return theta;
        }
        int face = thetaFace(i, j);
        Recent recent = recentTheta.get();
        int place = Recent.place(face);
        if (recent.numbers[place] == null || recent.faces[place] != face) {
            double[] numbers = new double[stride];
            formTheta(i, j, numbers, 0);
            add(numbers, 0, addedTheta[face]);
            recent.numbers[place] = numbers;
            recent.faces[place] = face;
        }
        return recent.numbers[place];
    }

    /** An array that holds the numbers of constant-j face (i, j), from {@link #radialPiece} on. */
    double[] radial(int i, int j) {
        if (radial != null) {
            return radial;
        }
        int face = radialFace(i, j);
        Recent recent = recentRadial.get();
        int place = Recent.place(face);
        if (recent.numbers[place] == null || recent.faces[place] != face) {
            double[] numbers = new double[stride];
            formRadial(i, j, numbers, 0);
            add(numbers, 0, addedRadial[face]);
            recent.numbers[place] = numbers;
            recent.faces[place] = face;
        }
        return recent.numbers[place];
    }

    /** Where the numbers of layer k of constant-i face (i, j) begin in {@link #theta(int, int)}. */
    int thetaPiece(int i, int j, int k) {
        return (theta == null ? 0 : thetaFace(i, j) * stride) + NUMBERS * k;
    }

    /** Where the numbers of layer k of constant-j face (i, j) begin in {@link #radial(int, int)}. */
    int radialPiece(int i, int j, int k) {
        return (radial == null ? 0 : radialFace(i, j) * stride) + NUMBERS * k;
    }

    /** Flow density of constant-i face (i, j) at level k, without what the faces drag along (kg/s). */
    double thetaAt(int i, int j, int k) {
        return theta(i, j)[thetaPiece(i, j, k) + 1];
    }

    /** A sixth of its second derivative (kg/s). */
    double thetaBend(int i, int j, int k) {
        return theta(i, j)[thetaPiece(i, j, k) + 2];
    }

    /** Flow density of constant-j face (i, j) at level k (kg/s). */
    double radialAt(int i, int j, int k) {
        return radial(i, j)[radialPiece(i, j, k) + 1];
    }

    /** A sixth of its second derivative (kg/s). */
    double radialBend(int i, int j, int k) {
        return radial(i, j)[radialPiece(i, j, k) + 2];
    }

    /** What leaves cell (i, j) below level k less what enters, without what the faces drag along (kg/s). */
    double spread(int i, int j, int k) {
        return theta(i + 1, j)[thetaPiece(i + 1, j, k)]
                - theta(i, j)[thetaPiece(i, j, k)]
                + radial(i, j + 1)[radialPiece(i, j + 1, k)]
                - radial(i, j)[radialPiece(i, j, k)];
    }

    /** Flow of the whole column of constant-i face (i, j) by the nodes (kg/s); to be asked before it is carried. */
    double thetaTotal(int i, int j) {
        return addedTheta[thetaFace(i, j)];
    }

    /** Flow of the whole column of constant-j face (i, j) by the nodes (kg/s); to be asked before it is carried. */
    double radialTotal(int i, int j) {
        return addedRadial[radialFace(i, j)];
    }

    /** Makes the profile of constant-i face (i, j) carry a total, the difference spread as a parabola (kg/s); once. */
    void carryTheta(int i, int j, double total) {
        int face = thetaFace(i, j);
        addedTheta[face] = total - addedTheta[face];
        if (theta != null) {
            add(theta, face * stride, addedTheta[face]);
        }
    }

    /** Makes the profile of constant-j face (i, j) carry a total, the difference spread as a parabola (kg/s); once. */
    void carryRadial(int i, int j, double total) {
        int face = radialFace(i, j);
        addedRadial[face] = total - addedRadial[face];
        if (radial != null) {
            add(radial, face * stride, addedRadial[face]);
        }
    }

    private void add(double[] profiles, int at, double flow) {
        for (int k = 0; k < sigma.length; k++) {
            double s = sigma[k];
            profiles[at + NUMBERS * k] += flow * s * s * (3 - 2 * s);
            profiles[at + NUMBERS * k + 1] += flow * 6 * s * (1 - s);
            profiles[at + NUMBERS * k + 2] -= 2 * flow;
        }
    }

    /** Flow below a height in the profile of constant-j face (i, j) (kg/s). */
    double radialBelow(int i, int j, double height) {
        int k = 0;
        while (k < sigma.length - 2 && sigma[k + 1] <= height) {
            k++;
        }
        double thick = sigma[k + 1] - sigma[k];
        return below(radial(i, j), radialPiece(i, j, k), (height - sigma[k]) / thick, thick);
    }

    /**
     * Flow density of a face in a layer, so that its integral over σ is a mass flow (kg/s).
     *
     * @param numbers the numbers of the faces
     * @param at where those of the layer begin
     * @param c height within the layer, 0 … 1
     * @param thick thickness of the layer in σ
     */
    static double density(double[] numbers, int at, double c, double thick) {
        double e = 1 - c;
        return e * numbers[at + 1]
                + c * numbers[at + 4]
                - thick * thick * (e * (1 - e * e) * numbers[at + 2] + c * (1 - c * c) * numbers[at + 5]);
    }

    /** Flow below a height of a layer, of a face (kg/s); its derivative is {@link #density}, whose arguments it takes. */
    static double below(double[] numbers, int at, double c, double thick) {
        double half = 0.5 * c * c;
        return numbers[at]
                + thick * ((c - half) * numbers[at + 1] + half * numbers[at + 4])
                + thick
                        * thick
                        * thick
                        * ((2 * half * (c - 1) - half * half) * numbers[at + 2]
                                + (half * half - half) * numbers[at + 5]);
    }
}
