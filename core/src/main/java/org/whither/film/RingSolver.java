package org.whither.film;

import org.apache.commons.math3.transform.DftNormalization;
import org.apache.commons.math3.transform.FastFourierTransformer;
import org.apache.commons.math3.transform.TransformType;

/**
 * Solves at once, without iterating, a weighted Laplace equation on the cells of a ring whose weights change from row to row
 * only: what leaves each cell for its neighbours, and by a weight of its row, is given. Round the ring the unknowns are
 * taken apart into Fourier's modes, of which each is a tridiagonal system along the radius (the fast Poisson solver of R. W.
 * Hockney, J. ACM 12 (1965) 95–113). A number of cells that is no power of two is transformed after L. I. Bluestein, IEEE
 * Trans. Audio Electroacoust. 18 (1970) 451–455. Takes some n log n operations for n cells.
 */
final class RingSolver {
    private final int columns;
    private final int rows;
    private final double alongTheta;
    private final double alongRadial;
    private final double[] ofRow;
    private final int size;
    /** Bluestein's factors exp(−iπ m²/n), real and imaginary, and the transform of their wrapped conjugates; or null. */
    private final double[][] chirp;

    private final double[][] chirpTransform;
    private final double[][] work;
    private final double[][] spectrum;

    /**
     * A solver.
     *
     * @param columns cells round the ring, whose last and first are neighbours
     * @param rows cells along the radius; beyond both ends the unknown is 0
     * @param alongTheta weight between neighbours round the ring
     * @param alongRadial weight between neighbours along the radius
     * @param ofRow weight of each row to the outside, where the unknown is 0; kept
     */
    RingSolver(int columns, int rows, double alongTheta, double alongRadial, double[] ofRow) {
        this.columns = columns;
        this.rows = rows;
        this.alongTheta = alongTheta;
        this.alongRadial = alongRadial;
        this.ofRow = ofRow;
        boolean power = Integer.bitCount(columns) == 1;
        size = power ? columns : Integer.highestOneBit(2 * columns - 1) << 1;
        work = new double[2][size];
        spectrum = new double[2][(columns / 2 + 1) * rows];
        chirp = power ? null : new double[2][columns];
        chirpTransform = power ? null : new double[2][size];
        if (!power) {
            for (int m = 0; m < columns; m++) {
                double angle = Math.PI * ((long) m * m % (2L * columns)) / columns;
                chirp[0][m] = Math.cos(angle);
                chirp[1][m] = -Math.sin(angle);
                for (int at : new int[] {m, (size - m) % size}) {
                    chirpTransform[0][at] = chirp[0][m];
                    chirpTransform[1][at] = -chirp[1][m];
                }
            }
            powerOfTwo(chirpTransform, TransformType.FORWARD);
        }
    }

    /**
     * Solves.
     *
     * @param given what leaves each cell, columns × rows, row-major; not modified
     * @param unknown overwritten
     */
    void solve(double[] given, double[] unknown) {
        // Two rows at a time, as real and imaginary part of one signal.
        double[] re = new double[columns];
        double[] im = new double[columns];
        int modes = columns / 2 + 1;
        for (int j = 0; j < rows; j += 2) {
            boolean pair = j + 1 < rows;
            for (int i = 0; i < columns; i++) {
                re[i] = given[i * rows + j];
                im[i] = pair ? given[i * rows + j + 1] : 0;
            }
            transform(re, im);
            for (int k = 0; k < modes; k++) {
                int other = (columns - k) % columns;
                spectrum[0][k * rows + j] = 0.5 * (re[k] + re[other]);
                spectrum[1][k * rows + j] = 0.5 * (im[k] - im[other]);
                if (pair) {
                    spectrum[0][k * rows + j + 1] = 0.5 * (im[k] + im[other]);
                    spectrum[1][k * rows + j + 1] = 0.5 * (re[other] - re[k]);
                }
            }
        }
        double[] above = new double[rows];
        for (int k = 0; k < modes; k++) {
            alongRadius(k, above);
        }
        // Back: the transform of the conjugate, divided by the number of columns.
        for (int j = 0; j < rows; j += 2) {
            boolean pair = j + 1 < rows;
            for (int k = 0; k < columns; k++) {
                int mode = Math.min(k, columns - k);
                double side = k <= columns - k ? 1 : -1;
                double firstRe = spectrum[0][mode * rows + j];
                double firstIm = side * spectrum[1][mode * rows + j];
                double secondRe = pair ? spectrum[0][mode * rows + j + 1] : 0;
                double secondIm = pair ? side * spectrum[1][mode * rows + j + 1] : 0;
                re[k] = firstRe - secondIm;
                im[k] = -(firstIm + secondRe);
            }
            transform(re, im);
            for (int i = 0; i < columns; i++) {
                unknown[i * rows + j] = re[i] / columns;
                if (pair) {
                    unknown[i * rows + j + 1] = -im[i] / columns;
                }
            }
        }
    }

    /** The tridiagonal system of one mode, by elimination (L. H. Thomas, 1949); its matrix is diagonally dominant. */
    private void alongRadius(int k, double[] above) {
        double sine = Math.sin(Math.PI * k / columns);
        double round = 4 * alongTheta * sine * sine;
        double[] re = spectrum[0];
        double[] im = spectrum[1];
        int at = k * rows;
        double before = 0;
        double reBefore = 0;
        double imBefore = 0;
        for (int j = 0; j < rows; j++) {
            double pivot = 1 / (2 * alongRadial + round + ofRow[j] - alongRadial * before);
            above[j] = alongRadial * pivot;
            re[at + j] = (re[at + j] + alongRadial * reBefore) * pivot;
            im[at + j] = (im[at + j] + alongRadial * imBefore) * pivot;
            before = above[j];
            reBefore = re[at + j];
            imBefore = im[at + j];
        }
        for (int j = rows - 2; j >= 0; j--) {
            re[at + j] += above[j] * re[at + j + 1];
            im[at + j] += above[j] * im[at + j + 1];
        }
    }

    /** Σ x_m exp(−2πi k m / n) of a signal of as many values as there are columns; in place. */
    private void transform(double[] re, double[] im) {
        if (chirp == null) {
            powerOfTwo(new double[][] {re, im}, TransformType.FORWARD);
            return;
        }
        java.util.Arrays.fill(work[0], columns, size, 0);
        java.util.Arrays.fill(work[1], columns, size, 0);
        for (int m = 0; m < columns; m++) {
            work[0][m] = re[m] * chirp[0][m] - im[m] * chirp[1][m];
            work[1][m] = re[m] * chirp[1][m] + im[m] * chirp[0][m];
        }
        powerOfTwo(work, TransformType.FORWARD);
        for (int m = 0; m < size; m++) {
            double real = work[0][m] * chirpTransform[0][m] - work[1][m] * chirpTransform[1][m];
            work[1][m] = work[0][m] * chirpTransform[1][m] + work[1][m] * chirpTransform[0][m];
            work[0][m] = real;
        }
        powerOfTwo(work, TransformType.INVERSE);
        for (int m = 0; m < columns; m++) {
            re[m] = work[0][m] * chirp[0][m] - work[1][m] * chirp[1][m];
            im[m] = work[0][m] * chirp[1][m] + work[1][m] * chirp[0][m];
        }
    }

    private static void powerOfTwo(double[][] signal, TransformType type) {
        FastFourierTransformer.transformInPlace(signal, DftNormalization.STANDARD, type);
    }
}
