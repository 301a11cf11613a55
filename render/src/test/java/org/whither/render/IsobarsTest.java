package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.List;
import org.junit.jupiter.api.Test;

class IsobarsTest {
    @Test
    void lines_ofACone_areOneClosedCircleEach() {
        int n = 61;
        double[] x = new double[n * n];
        double[] y = new double[n * n];
        double[] v = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                x[i * n + j] = i - 30.2;
                y[i * n + j] = j - 29.7;
                v[i * n + j] = Math.hypot(i - 30.2, j - 29.7);
            }
        }
        List<double[]> lines = Isobars.lines(n, x, y, v, 20);
        assertEquals(1, lines.size());
        double[] line = lines.get(0);
        assertEquals(line[0], line[line.length - 2], 1e-12);
        assertEquals(line[1], line[line.length - 1], 1e-12);
        double length = 0;
        for (int k = 0; k < line.length; k += 2) {
            // Linear in each triangle: off by at most 1/(8 R) of a cell, plus the like across.
            assertEquals(20, Math.hypot(line[k], line[k + 1]), 0.02);
            length += k > 0 ? Math.hypot(line[k] - line[k - 2], line[k + 1] - line[k - 1]) : 0;
        }
        assertEquals(2 * Math.PI * 20, length, 0.1);
    }

    @Test
    void lines_thatLeaveTheLattice_areOpen() {
        double[] x = {0, 0, 1, 1, 2, 2};
        double[] y = {0, 1, 0, 1, 0, 1};
        double[] v = {0, 1, 0, 1, 0, 1};
        List<double[]> lines = Isobars.lines(2, x, y, v, 0.25);
        assertEquals(1, lines.size());
        double[] line = lines.get(0);
        assertEquals(2, Math.abs(line[line.length - 2] - line[0]), 1e-12);
    }

    @Test
    void lines_ofAValueThatIsNotReached_areNone() {
        assertEquals(
                0,
                Isobars.lines(2, new double[4], new double[4], new double[4], 1).size());
    }

    @Test
    void ticks_areRound() {
        assertArrayEquals(new double[] {2, 4, 6, 8, 10}, Ticks.between(1.01, 11.8, 6), 1e-9);
        assertEquals(0.5, Ticks.step(2.3, 5), 1e-12);
        assertEquals("12\u2009000", Ticks.number(12000, 0));
        assertEquals("\u22120.25", Ticks.number(-0.25, 2));
        assertEquals(2, Ticks.decimals(0.05));
        assertEquals("0.2", Ticks.plain(0.2));
        assertEquals("500 µs", Gap.time(5e-4));
        assertEquals("20 ms", Gap.time(0.02));
    }
}
