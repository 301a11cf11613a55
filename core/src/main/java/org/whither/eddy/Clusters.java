package org.whither.eddy;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;

/**
 * Groups of neighbouring points. The first coordinate is periodic with period 1; two points are neighbours where the
 * distance between them, each coordinate measured by its own reach, is at most 1. Points are looked up by the box they lie
 * in, so the cost grows with the number of neighbours, not with its square.
 */
final class Clusters {
    /** The longest reach along the periodic coordinate: beyond it, a neighbour could be met both ways round. */
    static final double LONGEST = 0.34;

    /**
     * A group.
     *
     * @param members indices of its points
     * @param first first coordinate of each, made continuous over the group
     * @param wraps whether the group joins up with itself round the period
     */
    record Cluster(int[] members, double[] first, boolean wraps) {}

    private final double[][] points;
    private final double[] reach;
    private final int around;
    private final Map<Long, List<Integer>> boxes = new HashMap<>();

    private Clusters(double[][] points, double[] reach) {
        this.points = points;
        this.reach = reach.clone();
        this.reach[0] = Math.min(LONGEST, reach[0]);
        this.around = Math.max(1, (int) Math.floor(1 / this.reach[0]));
        for (int n = 0; n < points.length; n++) {
            boxes.computeIfAbsent(key(around(points[n][0]), box(n, 1), box(n, 2)), none -> new ArrayList<>())
                    .add(n);
        }
    }

    /**
     * Groups points.
     *
     * @param points three coordinates each
     * @param reach distance within which points are neighbours along each coordinate
     * @return groups, the largest first
     */
    static List<Cluster> of(double[][] points, double[] reach) {
        return new Clusters(points, reach).find();
    }

    private int around(double phase) {
        return Math.min(around - 1, (int) Math.floor((phase - Math.floor(phase)) * around));
    }

    private int box(int n, int coordinate) {
        return (int) Math.floor(points[n][coordinate] / reach[coordinate]);
    }

    private static long key(int a, int b, int c) {
        return ((long) a * 0x1F_FFFFL + b) * 0x1F_FFFFL + c;
    }

    private List<Cluster> find() {
        List<Cluster> clusters = new ArrayList<>();
        boolean[] seen = new boolean[points.length];
        double[] phase = new double[points.length];
        for (int start = 0; start < points.length; start++) {
            if (!seen[start]) {
                clusters.add(grow(start, seen, phase));
            }
        }
        clusters.sort((one, other) -> Integer.compare(other.members().length, one.members().length));
        return clusters;
    }

    private Cluster grow(int start, boolean[] seen, double[] phase) {
        List<Integer> members = new ArrayList<>();
        ArrayDeque<Integer> edge = new ArrayDeque<>();
        boolean wraps = false;
        seen[start] = true;
        phase[start] = points[start][0];
        edge.add(start);
        while (!edge.isEmpty()) {
            int n = edge.remove();
            members.add(n);
            for (int m : near(n)) {
                double step = points[m][0] - points[n][0];
                step -= Math.rint(step);
                double up = (points[m][1] - points[n][1]) / reach[1];
                double across = (points[m][2] - points[n][2]) / reach[2];
                double ahead = step / reach[0];
                if (ahead * ahead + up * up + across * across > 1) {
                    continue;
                }
                if (!seen[m]) {
                    seen[m] = true;
                    phase[m] = phase[n] + step;
                    edge.add(m);
                } else if (Math.abs(phase[m] - phase[n] - step) > 0.5) {
                    wraps = true;
                }
            }
        }
        int[] indices = members.stream().mapToInt(Integer::intValue).toArray();
        return new Cluster(
                indices, Arrays.stream(indices).mapToDouble(n -> phase[n]).toArray(), wraps);
    }

    private List<Integer> near(int n) {
        int a = around(points[n][0]);
        int b = box(n, 1);
        int c = box(n, 2);
        int[] ahead = around >= 3
                ? new int[] {(a + around - 1) % around, a, (a + 1) % around}
                : around == 2 ? new int[] {0, 1} : new int[] {0};
        List<Integer> found = new ArrayList<>();
        for (int da : ahead) {
            for (int db = -1; db <= 1; db++) {
                for (int dc = -1; dc <= 1; dc++) {
                    found.addAll(boxes.getOrDefault(key(da, b + db, c + dc), List.of()));
                }
            }
        }
        return found;
    }
}
