package org.whither.render;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Deque;
import java.util.HashMap;
import java.util.List;
import java.util.Map;

/**
 * Lines of equal value on a lattice of points: each cell is cut into four triangles about its middle, the value is linear
 * in each, and the straight pieces are joined into lines.
 */
final class Isobars {
    private Isobars() {}

    /**
     * The lines of one value.
     *
     * @param rows number of points along the second index
     * @param x first coordinate of each point, row-major; not modified
     * @param y second coordinate; not modified
     * @param values value at each point; not modified
     * @param level the wanted value
     * @return lines, each x and y of its points in turn
     */
    static List<double[]> lines(int rows, double[] x, double[] y, double[] values, double level) {
        int columns = values.length / rows;
        // A point of a line lies on an edge of a triangle, which its two ends name; middles come after the points.
        Map<Long, double[]> points = new HashMap<>();
        Map<Long, List<Long>> neighbours = new HashMap<>();
        int points0 = values.length;
        double[] tx = new double[3];
        double[] ty = new double[3];
        double[] tv = new double[3];
        long[] tn = new long[3];
        for (int i = 0; i + 1 < columns; i++) {
            for (int j = 0; j + 1 < rows; j++) {
                int[] c = {i * rows + j, (i + 1) * rows + j, (i + 1) * rows + j + 1, i * rows + j + 1};
                double low = Math.min(Math.min(values[c[0]], values[c[1]]), Math.min(values[c[2]], values[c[3]]));
                double high = Math.max(Math.max(values[c[0]], values[c[1]]), Math.max(values[c[2]], values[c[3]]));
                if (level < low || level > high) {
                    continue;
                }
                for (int side = 0; side < 4; side++) {
                    int a = c[side];
                    int b = c[(side + 1) % 4];
                    set(tx, ty, tv, tn, 0, x[a], y[a], values[a], a);
                    set(tx, ty, tv, tn, 1, x[b], y[b], values[b], b);
                    set(
                            tx,
                            ty,
                            tv,
                            tn,
                            2,
                            0.25 * (x[c[0]] + x[c[1]] + x[c[2]] + x[c[3]]),
                            0.25 * (y[c[0]] + y[c[1]] + y[c[2]] + y[c[3]]),
                            0.25 * (values[c[0]] + values[c[1]] + values[c[2]] + values[c[3]]),
                            points0 + (long) i * rows + j);
                    cut(tx, ty, tv, tn, level, points, neighbours);
                }
            }
        }
        return join(points, neighbours);
    }

    private static void set(
            double[] tx, double[] ty, double[] tv, long[] tn, int n, double x, double y, double v, long name) {
        tx[n] = x;
        ty[n] = y;
        tv[n] = v;
        tn[n] = name;
    }

    private static void cut(
            double[] tx,
            double[] ty,
            double[] tv,
            long[] tn,
            double level,
            Map<Long, double[]> points,
            Map<Long, List<Long>> neighbours) {
        long first = -1;
        for (int a = 0; a < 3; a++) {
            int b = (a + 1) % 3;
            if (tv[a] < level == tv[b] < level) {
                continue;
            }
            double f = (level - tv[a]) / (tv[b] - tv[a]);
            long name = Math.min(tn[a], tn[b]) << 32 | Math.max(tn[a], tn[b]);
            points.put(name, new double[] {tx[a] + f * (tx[b] - tx[a]), ty[a] + f * (ty[b] - ty[a])});
            if (first < 0) {
                first = name;
            } else {
                neighbours.computeIfAbsent(first, key -> new ArrayList<>(2)).add(name);
                neighbours.computeIfAbsent(name, key -> new ArrayList<>(2)).add(first);
            }
        }
    }

    private static List<double[]> join(Map<Long, double[]> points, Map<Long, List<Long>> neighbours) {
        List<double[]> lines = new ArrayList<>();
        Long[] names = neighbours.keySet().toArray(new Long[0]);
        Arrays.sort(names);
        for (Long start : names) {
            if (!neighbours.containsKey(start)) {
                continue;
            }
            Deque<Long> line = new ArrayDeque<>();
            line.add(start);
            walk(start, neighbours, line, true);
            walk(start, neighbours, line, false);
            neighbours.remove(start);
            double[] coordinates = new double[2 * line.size()];
            int n = 0;
            for (Long name : line) {
                coordinates[n++] = points.get(name)[0];
                coordinates[n++] = points.get(name)[1];
            }
            lines.add(coordinates);
        }
        return lines;
    }

    /** Follows a line from a point, taking up each piece on the way, until it ends or closes. */
    private static void walk(Long start, Map<Long, List<Long>> neighbours, Deque<Long> line, boolean forward) {
        Long at = start;
        while (true) {
            List<Long> next = neighbours.get(at);
            if (next == null || next.isEmpty()) {
                if (!at.equals(start)) {
                    neighbours.remove(at);
                }
                return;
            }
            Long to = next.remove(next.size() - 1);
            List<Long> back = neighbours.get(to);
            back.remove(at);
            if (!at.equals(start) && next.isEmpty()) {
                neighbours.remove(at);
            }
            if (forward) {
                line.addLast(to);
            } else {
                line.addFirst(to);
            }
            at = to;
        }
    }
}
