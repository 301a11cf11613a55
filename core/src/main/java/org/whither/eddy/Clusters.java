package org.whither.eddy;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.IntStream;

/**
 * Groups of neighbouring points. The first coordinate is periodic with period 1; two points are neighbours where the
 * distance between them, each coordinate measured by its own reach, is at most 1, and no point of others lies near the
 * line between them, seeing them at more than 120° (a stricter neighbourhood in the manner of K. R. Gabriel and R. R. Sokal,
 * Syst. Zool. 18 (1969) 259–278, who say 90°). Points are looked up by the
 * box they lie in, so the cost grows with the number of neighbours, not with its square.
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
    private final double[][] others;
    private final Map<Long, List<Integer>> otherBoxes = new HashMap<>();

    private Clusters(double[][] points, double[] reach, double[][] others) {
        this.points = points;
        this.others = others;
        this.reach = reach.clone();
        this.reach[0] = Math.min(LONGEST, reach[0]);
        this.around = Math.max(1, (int) Math.floor(1 / this.reach[0]));
        fill(boxes, points);
        fill(otherBoxes, others);
    }

    private void fill(Map<Long, List<Integer>> map, double[][] of) {
        for (int n = 0; n < of.length; n++) {
            map.computeIfAbsent(key(around(of[n][0]), box(of[n], 1), box(of[n], 2)), none -> new ArrayList<>())
                    .add(n);
        }
    }

    /**
     * Groups points.
     *
     * @param points three coordinates each
     * @param reach distance within which points are neighbours along each coordinate
     * @param others points that part those between which they lie
     * @return groups, the largest first
     */
    static List<Cluster> of(double[][] points, double[] reach, double[][] others) {
        return new Clusters(points, reach, others).find();
    }

    /**
     * As {@link #of}, with each small group that has neighbours in a larger one put to it: at the border of what is held,
     * points are parted by chance.
     *
     * @param least groups of fewer points, or of less than a tenth of the largest, are small
     */
    static List<Cluster> whole(double[][] points, double[] reach, double[][] others, int least) {
        Clusters finder = new Clusters(points, reach, others);
        List<Cluster> found = finder.find();
        if (found.isEmpty()) {
            return found;
        }
        double small = Math.max(least, 0.1 * found.get(0).members().length);
        int[] owner = new int[points.length];
        double[] phase = new double[points.length];
        for (int c = 0; c < found.size(); c++) {
            for (int n = 0; n < found.get(c).members().length; n++) {
                owner[found.get(c).members()[n]] = c;
                phase[found.get(c).members()[n]] = found.get(c).first()[n];
            }
        }
        for (int c = 0; c < found.size(); c++) {
            if (found.get(c).members().length < small) {
                finder.join(found, c, small, owner, phase);
            }
        }
        List<Cluster> whole = new ArrayList<>();
        for (int c = 0; c < found.size(); c++) {
            int group = c;
            int[] members = IntStream.range(0, points.length)
                    .filter(n -> owner[n] == group)
                    .toArray();
            if (members.length > 0) {
                whole.add(new Cluster(
                        members,
                        Arrays.stream(members).mapToDouble(n -> phase[n]).toArray(),
                        found.get(c).wraps()));
            }
        }
        whole.sort((one, other) -> Integer.compare(other.members().length, one.members().length));
        return whole;
    }

    /** Puts a small group to the larger one of the nearest point within reach, where there is one. */
    private void join(List<Cluster> found, int small, double size, int[] owner, double[] phase) {
        int best = -1;
        double bestPhase = 0;
        int from = 0;
        double nearest = 1;
        for (int n : found.get(small).members()) {
            for (int m : near(boxes, points[n])) {
                if (found.get(owner[m]).members().length < size) {
                    continue;
                }
                double step = points[n][0] - points[m][0];
                step -= Math.rint(step);
                double up = (points[n][1] - points[m][1]) / reach[1];
                double across = (points[n][2] - points[m][2]) / reach[2];
                double away = step * step / (reach[0] * reach[0]) + up * up + across * across;
                if (away <= nearest) {
                    nearest = away;
                    best = owner[m];
                    bestPhase = phase[m] + step;
                    from = n;
                }
            }
        }
        if (best >= 0) {
            double move = bestPhase - phase[from];
            for (int n : found.get(small).members()) {
                owner[n] = best;
                phase[n] += move;
            }
        }
    }

    private int around(double phase) {
        return Math.min(around - 1, (int) Math.floor((phase - Math.floor(phase)) * around));
    }

    private int box(double[] point, int coordinate) {
        return (int) Math.floor(point[coordinate] / reach[coordinate]);
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
            for (int m : near(boxes, points[n])) {
                if (seen[m] && wraps) {
                    continue;
                }
                double step = points[m][0] - points[n][0];
                step -= Math.rint(step);
                double up = (points[m][1] - points[n][1]) / reach[1];
                double across = (points[m][2] - points[n][2]) / reach[2];
                double ahead = step / reach[0];
                if (ahead * ahead + up * up + across * across > 1) {
                    continue;
                }
                boolean round = seen[m] && Math.abs(phase[m] - phase[n] - step) > 0.5;
                if ((seen[m] && !round) || parted(points[n], points[m])) {
                    continue;
                }
                if (round) {
                    wraps = true;
                } else {
                    seen[m] = true;
                    phase[m] = phase[n] + step;
                    edge.add(m);
                }
            }
        }
        int[] indices = members.stream().mapToInt(Integer::intValue).toArray();
        return new Cluster(
                indices, Arrays.stream(indices).mapToDouble(n -> phase[n]).toArray(), wraps);
    }

    /** Whether one of the others lies between two points: it sees them at more than 120°. */
    private boolean parted(double[] one, double[] two) {
        for (int n : near(otherBoxes, one)) {
            double sum = 0;
            double toSquare = 0;
            double fromSquare = 0;
            for (int c = 0; c < 3; c++) {
                double to = one[c] - others[n][c];
                double from = two[c] - others[n][c];
                if (c == 0) {
                    to -= Math.rint(to);
                    from -= Math.rint(from);
                }
                double unit = reach[c] * reach[c];
                sum += to * from / unit;
                toSquare += to * to / unit;
                fromSquare += from * from / unit;
            }
            if (sum < -0.5 * Math.sqrt(toSquare * fromSquare)) {
                return true;
            }
        }
        return false;
    }

    private List<Integer> near(Map<Long, List<Integer>> map, double[] point) {
        int a = around(point[0]);
        int b = box(point, 1);
        int c = box(point, 2);
        int[] ahead = around >= 3
                ? new int[] {(a + around - 1) % around, a, (a + 1) % around}
                : around == 2 ? new int[] {0, 1} : new int[] {0};
        List<Integer> found = new ArrayList<>();
        for (int da : ahead) {
            for (int db = -1; db <= 1; db++) {
                for (int dc = -1; dc <= 1; dc++) {
                    found.addAll(map.getOrDefault(key(da, b + db, c + dc), List.of()));
                }
            }
        }
        return found;
    }
}
