package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

class RingSolverTest {
    /** Put back into the equation, the solution gives what was given; few and many cells, powers of two and others. */
    @Test
    void solve_randomRings_satisfyTheEquation() {
        SplittableRandom random = new SplittableRandom(2);
        for (int[] size : new int[][] {{1, 3}, {2, 4}, {3, 1}, {7, 5}, {16, 9}, {60, 31}, {399, 20}, {512, 2}}) {
            for (double alongTheta : new double[] {1, 1e-6, 3.7}) {
                int columns = size[0];
                int rows = size[1];
                double alongRadial = alongTheta == 1 ? 1e-6 : 1;
                double[] ofRow = new double[rows];
                ofRow[rows / 2] = 0.3;
                double[] given = random.doubles(columns * rows, -1, 1).toArray();
                double[] found = new double[given.length];
                new RingSolver(columns, rows, alongTheta, alongRadial, ofRow).solve(given, found);
                double largest = 0;
                for (double value : found) {
                    largest = Math.max(largest, Math.abs(value));
                }
                for (int i = 0; i < columns; i++) {
                    for (int j = 0; j < rows; j++) {
                        double here = found[i * rows + j];
                        double left = found[(i + columns - 1) % columns * rows + j];
                        double right = found[(i + 1) % columns * rows + j];
                        double below = j > 0 ? found[i * rows + j - 1] : 0;
                        double above = j < rows - 1 ? found[i * rows + j + 1] : 0;
                        double leaving = alongTheta * (2 * here - left - right)
                                + alongRadial * (2 * here - below - above)
                                + ofRow[j] * here;
                        assertEquals(given[i * rows + j], leaving, 1e-12 * Math.max(1, largest));
                    }
                }
            }
        }
    }
}
