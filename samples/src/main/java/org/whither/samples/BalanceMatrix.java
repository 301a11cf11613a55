package org.whither.samples;

import org.ejml.data.DMatrixRMaj;
import org.ejml.data.DMatrixSparseCSC;
import org.ejml.interfaces.linsol.LinearSolverSparse;
import org.ejml.sparse.FillReducing;
import org.ejml.sparse.csc.factory.LinearSolverFactory_DSCC;

/** The Jacobian of the balances as a sparse matrix in elimination order, and its direct solution. */
final class BalanceMatrix {
    private final int cells;
    /** Place of each cell in the elimination order. */
    private final int[] place;

    private final int[] columnStart;
    private final int[] rows;
    /** Where in the Jacobian's stencils each entry of the matrix comes from. */
    private final int[] source;

    private final DMatrixSparseCSC matrix;
    private final DMatrixRMaj right;
    private final DMatrixRMaj solution;

    /**
     * A matrix for a grid.
     *
     * @param nx cells along θ, at least 3
     * @param nr cells along r
     * @param order cell index at each place of the elimination order; not modified
     */
    BalanceMatrix(int nx, int nr, int[] order) {
        this.cells = nx * nr;
        this.place = new int[cells];
        for (int n = 0; n < cells; n++) {
            place[order[n]] = n;
        }
        this.columnStart = new int[cells + 1];
        this.rows = new int[cells * FilmEquations.STENCIL];
        this.source = new int[cells * FilmEquations.STENCIL];
        int entries = 0;
        for (int n = 0; n < cells; n++) {
            int i = order[n] / nr;
            int j = order[n] % nr;
            int first = entries;
            for (int dj = -1; dj <= 1; dj++) {
                for (int di = -1; di <= 1; di++) {
                    int row = j + dj;
                    if (row < 0 || row >= nr) {
                        continue;
                    }
                    int neighbour = (i + di + nx) % nx * nr + row;
                    // seen from the neighbour, this cell lies at (−di, −dj)
                    int at = entries++;
                    int value = place[neighbour];
                    while (at > first && rows[at - 1] > value) {
                        rows[at] = rows[at - 1];
                        source[at] = source[at - 1];
                        at--;
                    }
                    rows[at] = value;
                    source[at] = neighbour * FilmEquations.STENCIL + 3 * (1 - dj) + 1 - di;
                }
            }
            columnStart[n + 1] = entries;
        }
        this.matrix = new DMatrixSparseCSC(cells, cells, entries);
        this.right = new DMatrixRMaj(cells, 1);
        this.solution = new DMatrixRMaj(cells, 1);
    }

    /**
     * Solves J x = b.
     *
     * @param jacobian stencils as {@link FilmEquations#evaluate} gives them; not modified
     * @param scale factor on all entries that brings them near 1
     * @param b right-hand side, by cell; not modified
     * @param x solution, by cell; overwritten
     * @return whether the matrix could be factored
     */
    boolean solve(double[] jacobian, double scale, double[] b, double[] x) {
        System.arraycopy(columnStart, 0, matrix.col_idx, 0, cells + 1);
        matrix.nz_length = columnStart[cells];
        System.arraycopy(rows, 0, matrix.nz_rows, 0, matrix.nz_length);
        for (int n = 0; n < matrix.nz_length; n++) {
            matrix.nz_values[n] = jacobian[source[n]] * scale;
        }
        matrix.indicesSorted = true;
        for (int n = 0; n < cells; n++) {
            right.data[place[n]] = b[n] * scale;
        }
        LinearSolverSparse<DMatrixSparseCSC, DMatrixRMaj> solver = LinearSolverFactory_DSCC.lu(FillReducing.NONE);
        if (!solver.setA(matrix)) {
            return false;
        }
        solver.solve(right, solution);
        for (int n = 0; n < cells; n++) {
            x[n] = solution.data[place[n]];
        }
        return true;
    }
}
