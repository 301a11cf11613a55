package org.whither.trace;

/**
 * The embedded Runge–Kutta pair of order 5(4) of J. R. Dormand and P. J. Prince, J. Comput. Appl. Math. 6 (1980) 19–26,
 * with the continuous extension of order 4 that L. F. Shampine gave it, as printed in E. Hairer, S. P. Nørsett and G.
 * Wanner, Solving Ordinary Differential Equations I, 2nd ed., section II.6. It takes one step at a time and leaves it to
 * its caller whether the step is kept. One instance belongs to one path; it is not safe for use from several threads.
 */
public final class DormandPrince54 {
    // spotless:off
    static final double[] C = {0, 1.0 / 5, 3.0 / 10, 4.0 / 5, 8.0 / 9, 1, 1};
    static final double[][] A = {
        {},
        {1.0 / 5},
        {3.0 / 40, 9.0 / 40},
        {44.0 / 45, -56.0 / 15, 32.0 / 9},
        {19372.0 / 6561, -25360.0 / 2187, 64448.0 / 6561, -212.0 / 729},
        {9017.0 / 3168, -355.0 / 33, 46732.0 / 5247, 49.0 / 176, -5103.0 / 18656},
        {35.0 / 384, 0, 500.0 / 1113, 125.0 / 192, -2187.0 / 6784, 11.0 / 84},
    };
    static final double[] B = {35.0 / 384, 0, 500.0 / 1113, 125.0 / 192, -2187.0 / 6784, 11.0 / 84, 0};
    static final double[] B_EMBEDDED = {
        5179.0 / 57600, 0, 7571.0 / 16695, 393.0 / 640, -92097.0 / 339200, 187.0 / 2100, 1.0 / 40};
    static final double[] D = {
        -12715105075.0 / 11282082432.0, 0, 87487479700.0 / 32700410799.0, -10690763975.0 / 1880347072.0,
        701980252875.0 / 199316789632.0, -1453857185.0 / 822651844.0, 69997945.0 / 29380423.0};
    // spotless:on

    private final int n;
    private final double[][] k = new double[7][];
    private final double[] stage;
    private final double[] start;
    private final double[] end;
    private final double[] error;
    private double startTime;
    private double step;

    /**
     * A stepper.
     *
     * @param n length of the state
     */
    public DormandPrince54(int n) {
        this.n = n;
        for (int s = 0; s < 7; s++) {
            k[s] = new double[n];
        }
        stage = new double[n];
        start = new double[n];
        end = new double[n];
        error = new double[n];
    }

    /**
     * Starts a path, or starts it again where the right-hand side changes its form.
     *
     * @param f right-hand side
     * @param t time (s)
     * @param y state, length n; copied
     */
    public void start(RightHandSide f, double t, double[] y) {
        startTime = t;
        System.arraycopy(y, 0, start, 0, n);
        f.evaluate(t, start, k[0]);
    }

    /** Rate of the state at the start of the step, length n; to be read only, and overwritten by the next step. */
    public double[] startRate() {
        return k[0];
    }

    /**
     * Tries a step from the start.
     *
     * @param f right-hand side
     * @param h length of the step (s)
     */
    public void attempt(RightHandSide f, double h) {
        step = h;
        for (int s = 1; s < 7; s++) {
            double[] row = A[s];
            double[] target = s == 6 ? end : stage;
            for (int c = 0; c < n; c++) {
                double sum = 0;
                for (int m = 0; m < s; m++) {
                    sum += row[m] * k[m][c];
                }
                target[c] = start[c] + h * sum;
            }
            f.evaluate(startTime + C[s] * h, target, k[s]);
        }
        for (int c = 0; c < n; c++) {
            double sum = 0;
            for (int s = 0; s < 7; s++) {
                sum += (B[s] - B_EMBEDDED[s]) * k[s][c];
            }
            error[c] = h * sum;
        }
    }

    /** Length of the tried step (s). */
    public double step() {
        return step;
    }

    /** State at the end of the tried step, of order 5; length n; to be read only, and overwritten by the next step. */
    public double[] endState() {
        return end;
    }

    /** Estimated error of the tried step, the difference of the two orders; length n; to be read only. */
    public double[] error() {
        return error;
    }

    /** Keeps the tried step: the next one starts at its end. */
    public void accept() {
        startTime += step;
        System.arraycopy(end, 0, start, 0, n);
        double[] first = k[0];
        k[0] = k[6];
        k[6] = first;
    }

    /**
     * The state within the tried step, by the continuous extension of order 4. To be asked before {@link #accept}.
     *
     * @param fraction 0 … 1 of the step
     * @param y state, length n; overwritten
     */
    public void interpolate(double fraction, double[] y) {
        double rest = 1 - fraction;
        for (int c = 0; c < n; c++) {
            double rise = end[c] - start[c];
            double bend = step * k[0][c] - rise;
            double twist = rise - step * k[6][c] - bend;
            double last = 0;
            for (int s = 0; s < 7; s++) {
                last += D[s] * k[s][c];
            }
            y[c] = start[c] + fraction * (rise + rest * (bend + fraction * (twist + rest * step * last)));
        }
    }

    /** How many numbers {@link #extension} writes for each component of the state. */
    static final int EXTENSION = 5;

    /**
     * Copies the continuous extension of the tried step, for {@link #interpolate(double[], int, double)}. To be asked
     * before {@link #accept}.
     *
     * @param into for each component of the state its {@value #EXTENSION} coefficients; overwritten
     * @param at where in {@code into} they start
     */
    void extension(double[] into, int at) {
        for (int c = 0; c < n; c++) {
            double rise = end[c] - start[c];
            double bend = step * k[0][c] - rise;
            double last = 0;
            for (int s = 0; s < 7; s++) {
                last += D[s] * k[s][c];
            }
            int to = at + c * EXTENSION;
            into[to] = start[c];
            into[to + 1] = rise;
            into[to + 2] = bend;
            into[to + 3] = rise - step * k[6][c] - bend;
            into[to + 4] = step * last;
        }
    }

    /**
     * One component of the state within a step whose extension was copied.
     *
     * @param extension what {@link #extension} wrote; not modified
     * @param at where the component's coefficients start
     * @param fraction 0 … 1 of the step
     * @return the component
     */
    static double interpolate(double[] extension, int at, double fraction) {
        double rest = 1 - fraction;
        return extension[at]
                + fraction
                        * (extension[at + 1]
                                + rest
                                        * (extension[at + 2]
                                                + fraction * (extension[at + 3] + rest * extension[at + 4])));
    }
}
