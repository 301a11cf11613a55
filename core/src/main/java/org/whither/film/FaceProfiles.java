package org.whither.film;

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

    private final FilmGrid grid;
    private final double[] sigma;
    private final int stride;
    private final double[] theta;
    private final double[] radial;

    /**
     * Profiles from the nodal fluxes.
     *
     * @param nodal the nodal fluxes, seen from the frame in which the film is steady
     * @param levels its density
     * @param rotorSpeed speed of the rotor in that frame (rad/s)
     * @param statorSpeed speed of the stator in that frame (rad/s)
     */
    FaceProfiles(NodalFlow nodal, Levels levels, double rotorSpeed, double statorSpeed) {
        grid = nodal.film().grid();
        RingFaces faces = nodal.film().faces();
        sigma = new double[nodal.layers() + 1];
        for (int k = 0; k < sigma.length; k++) {
            sigma[k] = nodal.level(k);
        }
        stride = NUMBERS * sigma.length;
        double[][] spline = secondDerivatives(sigma);
        double[] density = new double[sigma.length];
        theta = new double[grid.ni() * grid.cellsRadial() * stride];
        for (int i = 0; i < grid.ni(); i++) {
            int line = i % grid.cellsTheta();
            for (int j = 0; j < grid.cellsRadial(); j++) {
                int start = grid.node(line, j);
                double slope = grid.lineSlope(line, j);
                double half = 0.5 * (grid.radius(j + 1) - grid.radius(j));
                double drag = levels.columnDensity(start) * faces.thickness(start) * grid.radius(j)
                        + levels.columnDensity(start + 1) * faces.thickness(start + 1) * grid.radius(j + 1);
                for (int k = 0; k < sigma.length; k++) {
                    double turning = (1 - sigma[k]) * rotorSpeed + sigma[k] * statorSpeed;
                    double through = nodal.fluxTheta(start, k)
                            + nodal.fluxTheta(start + 1, k)
                            - slope * (nodal.fluxRadial(start, k) + nodal.fluxRadial(start + 1, k));
                    density[k] = half * (through - drag * turning);
                }
                fill(theta, thetaPiece(i, j, 0), density, spline);
            }
        }
        radial = new double[grid.cellsTheta() * grid.nj() * stride];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double half = 0.5 * (grid.theta(i + 1, j) - grid.theta(i, j));
                int start = grid.node(i, j);
                int end = grid.node((i + 1) % grid.cellsTheta(), j);
                for (int k = 0; k < sigma.length; k++) {
                    density[k] = half * (nodal.fluxRadial(start, k) + nodal.fluxRadial(end, k));
                }
                fill(radial, radialPiece(i, j, 0), density, spline);
            }
        }
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

    private void fill(double[] profiles, int at, double[] density, double[][] spline) {
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

    /** Where the numbers of layer k of constant-i face (i, j) begin in {@link #theta()}. */
    int thetaPiece(int i, int j, int k) {
        return (i * (grid.nj() - 1) + j) * stride + NUMBERS * k;
    }

    /** Where the numbers of layer k of constant-j face (i, j) begin in {@link #radial()}. */
    int radialPiece(int i, int j, int k) {
        return (i * grid.nj() + j) * stride + NUMBERS * k;
    }

    /** All numbers of the constant-i faces. */
    double[] theta() {
        return theta;
    }

    /** All numbers of the constant-j faces. */
    double[] radial() {
        return radial;
    }

    /** Flow density of constant-i face (i, j) at level k, without what the faces drag along (kg/s). */
    double thetaAt(int i, int j, int k) {
        return theta[thetaPiece(i, j, k) + 1];
    }

    /** A sixth of its second derivative (kg/s). */
    double thetaBend(int i, int j, int k) {
        return theta[thetaPiece(i, j, k) + 2];
    }

    /** Flow density of constant-j face (i, j) at level k (kg/s). */
    double radialAt(int i, int j, int k) {
        return radial[radialPiece(i, j, k) + 1];
    }

    /** A sixth of its second derivative (kg/s). */
    double radialBend(int i, int j, int k) {
        return radial[radialPiece(i, j, k) + 2];
    }

    /** What leaves cell (i, j) below level k less what enters, without what the faces drag along (kg/s). */
    double spread(int i, int j, int k) {
        return theta[thetaPiece(i + 1, j, k)]
                - theta[thetaPiece(i, j, k)]
                + radial[radialPiece(i, j + 1, k)]
                - radial[radialPiece(i, j, k)];
    }

    /** Flow of the whole column in the profile of constant-i face (i, j) (kg/s). */
    double thetaTotal(int i, int j) {
        return theta[thetaPiece(i, j, sigma.length - 1)];
    }

    /** Flow of the whole column in the profile of constant-j face (i, j) (kg/s). */
    double radialTotal(int i, int j) {
        return radial[radialPiece(i, j, sigma.length - 1)];
    }

    /** Makes the profile of constant-i face (i, j) carry a total, the difference spread as a parabola (kg/s). */
    void carryTheta(int i, int j, double total) {
        add(theta, thetaPiece(i, j, 0), total - thetaTotal(i, j));
    }

    /** Makes the profile of constant-j face (i, j) carry a total, the difference spread as a parabola (kg/s). */
    void carryRadial(int i, int j, double total) {
        add(radial, radialPiece(i, j, 0), total - radialTotal(i, j));
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
        return below(radial, radialPiece(i, j, k), (height - sigma[k]) / thick, thick);
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
