package org.whither.samples;

import java.util.Arrays;

/**
 * The mass balances of the cells of a gas film, as functions of s = p² in the cells, with their derivatives.
 *
 * <p>The column mass flux of the compressible Reynolds equation, m = −(h³/(24 µ Rₛ T)) ∇s − (p h Ω r/(2 Rₛ T)) e_θ in the
 * frame that turns with the rotor, is balanced over cells with the multi-point flux approximation: around every node the
 * halves of the four faces that meet there carry one unknown s each, s is linear in the quarter of each cell, and the four
 * unknowns follow from the continuity of the mass flow through the four half-faces. That flow here includes the rotation
 * part, which jumps with the film thickness, so that the method is consistent at steps on skewed cells. Source:
 * I. Aavatsmark, "An introduction to multipoint flux approximations for quadrilateral grids", Comput. Geosci. 6, 2002,
 * 405–432 (the O-method, continuity points in the middle of the faces); the rotation part in the local balance is our
 * addition.
 *
 * <p>The density in the rotation part is that of the half-face's own s. Where a cell's bearing number, taken along the
 * grid's own lines, is above 2, the pressure upstream is mixed in just so much that neighbours keep the sign of their
 * influence (as in the exponential schemes of D. B. Spalding, Int. J. Numer. Methods Eng. 4, 1972).
 *
 * <p>Not for use from several threads.
 */
final class FilmEquations {
    /** Neighbours of a cell, itself included. */
    static final int STENCIL = 9;

    private static final int PER_NODE = 36;
    private static final int FLUX_C = 16;
    private static final int VALUE_S = 24;
    private static final int VALUE_C = 32;

    private final FilmProblem problem;
    private final SheetGrid grid;
    private final int nx;
    private final int nr;
    private final double smallest;
    /**
     * Per node: flows of the four half-faces by the four s around (4 × 4) and by the two jumps of rotation flow (4 × 2); s
     * of the two upright half-faces by the same (2 × 4 and 2 × 2).
     */
    private final double[] coefficients;

    private final double[] around = new double[4];
    private final double[] flow = new double[4];
    private final double[] flowBy = new double[16];
    private final double[] faceValue = new double[2];
    private final double[] jumpFactor = new double[2];
    private final double[] couetteFactor = new double[2];
    private final double[] peclet = new double[2];
    private final double[] upstream = new double[2];
    private final double[] facePressure = new double[2];
    private final double[] byValue = new double[2];
    private final double[] byUpstream = new double[2];
    private int upwinded;

    FilmEquations(FilmProblem problem) {
        this.problem = problem;
        this.grid = problem.grid();
        this.nx = grid.nx();
        this.nr = grid.nr();
        double low = 1e-3 * Math.min(problem.pressureInner(), problem.pressureOuter());
        this.smallest = low * low;
        this.coefficients = new double[nx * (nr + 1) * PER_NODE];
        for (int i = 0; i < nx; i++) {
            for (int j = 0; j <= nr; j++) {
                prepareNode(i, j);
            }
        }
    }

    /** Half-faces whose rotation part took pressure from upstream when last evaluated. */
    int upwinded() {
        return upwinded;
    }

    /** s below which {@link #pressure} leaves the square root (Pa²). */
    double smallest() {
        return smallest;
    }

    /** √s, and its tangent below a value far under any pressure of the film, so that a bad guess gives no NaN (Pa). */
    double pressure(double s) {
        return s >= smallest ? Math.sqrt(s) : 0.5 * (Math.sqrt(smallest) + s / Math.sqrt(smallest));
    }

    private double pressureSlope(double s) {
        return 0.5 / Math.sqrt(Math.max(s, smallest));
    }

    /**
     * Evaluates the balances.
     *
     * @param s p² of the cells (Pa²); not modified
     * @param omega rotation rate (rad/s)
     * @param residual outflow of each cell less its supply (kg/s); overwritten
     * @param jacobian derivative of cell n's residual by its neighbour's s at n · 9 + 3 (dj + 1) + di + 1, or null;
     *     overwritten
     * @param massTheta mass flows through the constant-i faces towards +θ, (nx + 1) × nr (kg/s), or null; overwritten
     * @param massRadial mass flows outwards through the constant-j faces, nx × (nr + 1) (kg/s), or null; overwritten
     */
    void evaluate(
            double[] s, double omega, double[] residual, double[] jacobian, double[] massTheta, double[] massRadial) {
        Arrays.fill(residual, 0);
        if (jacobian != null) {
            Arrays.fill(jacobian, 0);
        }
        if (massTheta != null) {
            Arrays.fill(massTheta, 0);
            Arrays.fill(massRadial, 0);
        }
        upwinded = 0;
        for (int i = 0; i < nx; i++) {
            int left = i == 0 ? nx - 1 : i - 1;
            for (int j = 0; j <= nr; j++) {
                evaluateNode(s, omega, left, i, j, jacobian != null);
                if (j > 0) {
                    exchange(0, left, j - 1, i, j - 1, j, residual, jacobian);
                }
                if (j < nr) {
                    exchange(1, left, j, i, j, j, residual, jacobian);
                }
                exchange(2, left, j - 1, left, j, j, residual, jacobian);
                exchange(3, i, j - 1, i, j, j, residual, jacobian);
                if (massTheta != null) {
                    if (j > 0) {
                        massTheta[i * nr + j - 1] += flow[0];
                    }
                    if (j < nr) {
                        massTheta[i * nr + j] += flow[1];
                    }
                    massRadial[left * (nr + 1) + j] += flow[2];
                    massRadial[i * (nr + 1) + j] += flow[3];
                }
            }
        }
        if (massTheta != null) {
            System.arraycopy(massTheta, 0, massTheta, nx * nr, nr);
        }
        feed(s, residual, jacobian);
    }

    private void feed(double[] s, double[] residual, double[] jacobian) {
        FeedLaw[] laws = problem.feed();
        for (int n = 0; n < laws.length; n++) {
            if (laws[n] != null) {
                double area = problem.feedArea()[n];
                double p = pressure(s[n]);
                residual[n] -= laws[n].flux(p) * area;
                if (jacobian != null) {
                    jacobian[n * STENCIL + 4] -= laws[n].slope(p) * pressureSlope(s[n]) * area;
                }
            }
        }
    }

    /** Lets half-face k's flow leave one cell and enter another; a row beyond the grid has no balance. */
    private void exchange(
            int k, int fromI, int fromJ, int toI, int toJ, int node, double[] residual, double[] jacobian) {
        if (fromJ >= 0) {
            balance(k, fromI, fromJ, node, 1, residual, jacobian);
        }
        if (toJ < nr) {
            balance(k, toI, toJ, node, -1, residual, jacobian);
        }
    }

    /** Adds a half-face's flow to a cell's balance, and its derivatives. */
    private void balance(int k, int i, int j, int node, int sign, double[] residual, double[] jacobian) {
        int cell = grid.cell(i, j);
        residual[cell] += sign * flow[k];
        if (jacobian == null) {
            return;
        }
        // the four cells around the node, seen from this one, which lies on its left where sideLeft
        boolean sideLeft = k == 2 || (k < 2 && sign > 0);
        int firstColumn = sideLeft ? 1 : 0;
        int firstRow = node - 1 - j + 1;
        for (int c = 0; c < 4; c++) {
            int row = firstRow + c / 2;
            boolean outside = (c < 2 && node == 0) || (c >= 2 && node == nr);
            if (!outside) {
                jacobian[cell * STENCIL + 3 * row + firstColumn + c % 2] += sign * flowBy[4 * k + c];
            }
        }
    }

    /** Flows of the half-faces around a node, and their derivatives by the s around it. */
    private void evaluateNode(double[] s, double omega, int left, int i, int j, boolean derivatives) {
        double inner = problem.pressureInner() * problem.pressureInner();
        double outer = problem.pressureOuter() * problem.pressureOuter();
        around[0] = j > 0 ? s[grid.cell(left, j - 1)] : inner;
        around[1] = j > 0 ? s[grid.cell(i, j - 1)] : inner;
        around[2] = j < nr ? s[grid.cell(left, j)] : outer;
        around[3] = j < nr ? s[grid.cell(i, j)] : outer;
        int at = (i * (nr + 1) + j) * PER_NODE;
        double gasFactor = omega / (4 * problem.specificGasConstant() * problem.temperature());
        int up = omega >= 0 ? 1 : 0;
        for (int m = 0; m < 2; m++) {
            int row = j - 1 + m;
            if (row < 0 || row >= nr) {
                jumpFactor[m] = 0;
                couetteFactor[m] = 0;
                peclet[m] = 0;
                upstream[m] = around[2 * m];
                continue;
            }
            double r = grid.radius(j);
            double middle = grid.middleRadius(row);
            double swept = m == 0 ? (r - middle) * (r + middle) : (middle - r) * (middle + r);
            double hLeft = problem.thickness()[grid.cell(left, row)];
            double hRight = problem.thickness()[grid.cell(i, row)];
            couetteFactor[m] = -hLeft * swept * gasFactor;
            jumpFactor[m] = (hLeft - hRight) * swept * gasFactor;
            double h = Math.min(hLeft, hRight);
            double width = 0.5 * (grid.width(left) + grid.width(i));
            double height = grid.height(row);
            double skew = height * height / (height * height + grid.turn(row) * grid.turn(row));
            peclet[m] = 6 * problem.viscosity() * Math.abs(omega) * middle * middle * width * skew / (h * h);
            upstream[m] = around[2 * m + up];
        }
        for (int m = 0; m < 2; m++) {
            double value = 0;
            for (int c = 0; c < 4; c++) {
                value += coefficients[at + VALUE_S + 4 * m + c] * around[c];
            }
            faceValue[m] = value;
        }
        settleFaceValues(at);
        for (int m = 0; m < 2; m++) {
            upwinded += peclet[m] > 2 * pressure(upstream[m]) ? 1 : 0;
        }
        for (int k = 0; k < 4; k++) {
            double value = coefficients[at + FLUX_C + 2 * k] * jumpFactor[0] * facePressure[0]
                    + coefficients[at + FLUX_C + 2 * k + 1] * jumpFactor[1] * facePressure[1];
            for (int c = 0; c < 4; c++) {
                value += coefficients[at + 4 * k + c] * around[c];
            }
            flow[k] = k < 2 ? value + couetteFactor[k] * facePressure[k] : value;
        }
        if (derivatives) {
            differentiateNode(at, up);
        }
    }

    /** Solves the local balances for s of the two upright half-faces by Newton's method. */
    private void settleFaceValues(int at) {
        double base0 = faceValue[0];
        double base1 = faceValue[1];
        couettePressure(0);
        couettePressure(1);
        if (jumpFactor[0] == 0 && jumpFactor[1] == 0) {
            return;
        }
        double h00 = coefficients[at + VALUE_C] * jumpFactor[0];
        double h01 = coefficients[at + VALUE_C + 1] * jumpFactor[1];
        double h10 = coefficients[at + VALUE_C + 2] * jumpFactor[0];
        double h11 = coefficients[at + VALUE_C + 3] * jumpFactor[1];
        double last = Double.POSITIVE_INFINITY;
        for (int iteration = 0; iteration < 40; iteration++) {
            double g0 = faceValue[0] - base0 - h00 * facePressure[0] - h01 * facePressure[1];
            double g1 = faceValue[1] - base1 - h10 * facePressure[0] - h11 * facePressure[1];
            double a00 = 1 - h00 * byValue[0];
            double a01 = -h01 * byValue[1];
            double a10 = -h10 * byValue[0];
            double a11 = 1 - h11 * byValue[1];
            double determinant = a00 * a11 - a01 * a10;
            double d0 = (a11 * g0 - a01 * g1) / determinant;
            double d1 = (a00 * g1 - a10 * g0) / determinant;
            faceValue[0] -= d0;
            faceValue[1] -= d1;
            couettePressure(0);
            couettePressure(1);
            double change = Math.abs(d0) + Math.abs(d1);
            if (change <= 1e-15 * (Math.abs(faceValue[0]) + Math.abs(faceValue[1]))
                    || (iteration > 3 && change >= last)) {
                return;
            }
            last = change;
        }
    }

    /** Pressure that rides in the rotation part of half-face m, with its derivatives by its own and the upstream s. */
    private void couettePressure(int m) {
        double own = pressure(faceValue[m]);
        double ownSlope = pressureSlope(faceValue[m]);
        double before = pressure(upstream[m]);
        if (peclet[m] <= 2 * before || before <= 0) {
            facePressure[m] = own;
            byValue[m] = ownSlope;
            byUpstream[m] = 0;
            return;
        }
        double share = 1 - 2 * before / peclet[m];
        facePressure[m] = own + share * (before - own);
        byValue[m] = ownSlope * (1 - share);
        byUpstream[m] = pressureSlope(upstream[m]) * (share - 2 / peclet[m] * (before - own));
    }

    private void differentiateNode(int at, int up) {
        double h00 = coefficients[at + VALUE_C] * jumpFactor[0];
        double h01 = coefficients[at + VALUE_C + 1] * jumpFactor[1];
        double h10 = coefficients[at + VALUE_C + 2] * jumpFactor[0];
        double h11 = coefficients[at + VALUE_C + 3] * jumpFactor[1];
        double a00 = 1 - h00 * byValue[0];
        double a01 = -h01 * byValue[1];
        double a10 = -h10 * byValue[0];
        double a11 = 1 - h11 * byValue[1];
        double determinant = a00 * a11 - a01 * a10;
        for (int c = 0; c < 4; c++) {
            double up0 = c == up ? byUpstream[0] : 0;
            double up1 = c == 2 + up ? byUpstream[1] : 0;
            double right0 = coefficients[at + VALUE_S + c] + h00 * up0 + h01 * up1;
            double right1 = coefficients[at + VALUE_S + 4 + c] + h10 * up0 + h11 * up1;
            double pressure0 = byValue[0] * (a11 * right0 - a01 * right1) / determinant + up0;
            double pressure1 = byValue[1] * (a00 * right1 - a10 * right0) / determinant + up1;
            for (int k = 0; k < 4; k++) {
                double value = coefficients[at + 4 * k + c]
                        + coefficients[at + FLUX_C + 2 * k] * jumpFactor[0] * pressure0
                        + coefficients[at + FLUX_C + 2 * k + 1] * jumpFactor[1] * pressure1;
                if (k == 0) {
                    value += couetteFactor[0] * pressure0;
                } else if (k == 1) {
                    value += couetteFactor[1] * pressure1;
                }
                flowBy[4 * k + c] = value;
            }
        }
    }

    /**
     * Eliminates the half-face values of a node. Cells around it: 0 inner left, 1 inner right, 2 outer left, 3 outer right.
     * Half-faces: 0 inner upright, 1 outer upright, 2 left level, 3 right level. At a diameter the two level half-faces hold
     * the given pressure, which stands in the place of the two cells beyond.
     */
    private void prepareNode(int i, int j) {
        int left = i == 0 ? nx - 1 : i - 1;
        double[] a11 = new double[4];
        double[] a12 = new double[4];
        double[] a22 = new double[4];
        boolean[] inside = new boolean[4];
        for (int c = 0; c < 4; c++) {
            int column = c % 2 == 0 ? left : i;
            int row = j - 1 + c / 2;
            inside[c] = row >= 0 && row < nr;
            if (inside[c]) {
                double h = problem.thickness()[grid.cell(column, row)];
                double k =
                        h * h * h / (24 * problem.viscosity() * problem.specificGasConstant() * problem.temperature());
                double width = grid.width(column);
                double height = grid.height(row);
                double turn = grid.turn(row);
                a11[c] = k * (turn * turn + height * height) / (width * height);
                a12[c] = -k * turn / height;
                a22[c] = k * width / height;
            }
        }
        // flow of half-face k from cell c: −(upright? a11, a12 : a12, a22) · (e1 (v − s), e2 (l − s))
        double[][] m = new double[4][4];
        double[][] right = new double[4][6];
        for (int c = 0; c < 4; c++) {
            int e1 = c % 2 == 0 ? 1 : -1;
            int e2 = c < 2 ? 1 : -1;
            int upright = c / 2;
            int level = 2 + c % 2;
            if (inside[c]) {
                // what leaves the left (inner) cell less what enters the right (outer) one
                addFlow(m[upright], right[upright], e1, a11[c] * e1, a12[c] * e2, upright, level, c);
                addFlow(m[level], right[level], e2, a12[c] * e1, a22[c] * e2, upright, level, c);
            }
        }
        right[0][4] = 1;
        right[1][5] = 1;
        if (j == 0 || j == nr) {
            int beyond = j == 0 ? 0 : 2;
            int absent = j == 0 ? 0 : 1;
            for (int k : new int[] {absent, 2, 3}) {
                Arrays.fill(m[k], 0);
                Arrays.fill(right[k], 0);
                m[k][k] = 1;
            }
            right[absent][beyond] = 1;
            right[2][beyond] = 1;
            right[3][beyond + 1] = 1;
        }
        double[][] value = solve(m, right);
        int at = (i * (nr + 1) + j) * PER_NODE;
        for (int k = 0; k < 4; k++) {
            int c = flowCell(k, j);
            if (!inside[c]) {
                continue;
            }
            int e1 = c % 2 == 0 ? 1 : -1;
            int e2 = c < 2 ? 1 : -1;
            double byUpright = -(k < 2 ? a11[c] : a12[c]) * e1;
            double byLevel = -(k < 2 ? a12[c] : a22[c]) * e2;
            for (int n = 0; n < 6; n++) {
                double f = byUpright * value[c / 2][n] + byLevel * value[2 + c % 2][n];
                if (n == c) {
                    f -= byUpright + byLevel;
                }
                if (n < 4) {
                    coefficients[at + 4 * k + n] = f;
                } else {
                    coefficients[at + FLUX_C + 2 * k + n - 4] = f;
                }
            }
        }
        for (int v = 0; v < 2; v++) {
            for (int n = 0; n < 6; n++) {
                if (n < 4) {
                    coefficients[at + VALUE_S + 4 * v + n] = value[v][n];
                } else {
                    coefficients[at + VALUE_C + 2 * v + n - 4] = value[v][n];
                }
            }
        }
    }

    /** The cell from which half-face k's flow is taken: the left or inner one, or the one that exists. */
    private int flowCell(int k, int j) {
        if (k < 2) {
            return 2 * k;
        }
        return j == 0 ? k : k - 2;
    }

    /**
     * Adds the flow of one cell to a half-face's balance, unknowns on the left, cell values on the right. The flow is
     * −(x (v − s) + y (l − s)).
     */
    private static void addFlow(
            double[] unknowns, double[] cells, int sign, double x, double y, int upright, int level, int c) {
        unknowns[upright] -= sign * x;
        unknowns[level] -= sign * y;
        cells[c] -= sign * (x + y);
    }

    /** Gaussian elimination with row exchange. */
    private static double[][] solve(double[][] m, double[][] right) {
        int n = m.length;
        for (int k = 0; k < n; k++) {
            int best = k;
            for (int row = k + 1; row < n; row++) {
                if (Math.abs(m[row][k]) > Math.abs(m[best][k])) {
                    best = row;
                }
            }
            double[] swap = m[k];
            m[k] = m[best];
            m[best] = swap;
            swap = right[k];
            right[k] = right[best];
            right[best] = swap;
            for (int row = 0; row < n; row++) {
                if (row != k && m[row][k] != 0) {
                    double factor = m[row][k] / m[k][k];
                    for (int col = k; col < n; col++) {
                        m[row][col] -= factor * m[k][col];
                    }
                    for (int col = 0; col < right[row].length; col++) {
                        right[row][col] -= factor * right[k][col];
                    }
                }
            }
        }
        for (int k = 0; k < n; k++) {
            for (int col = 0; col < right[k].length; col++) {
                right[k][col] /= m[k][k];
            }
        }
        return right;
    }
}
