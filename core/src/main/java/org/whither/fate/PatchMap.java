package org.whither.fate;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.PriorityQueue;
import java.util.SplittableRandom;
import java.util.function.IntSupplier;

/**
 * A map of the unit square, whose opposite sides u = 0 and u = 1 are one line, into fates. The square is divided into
 * rectangular patches. A patch is <em>settled</em> while every point known in it, its corners, a point inside (at first
 * two) and whatever else fell into it, has the same fate; else it is <em>mixed</em>, and is halved, the largest first, until
 * the mixed area is as small as wanted. A mixed patch is halved across the direction in which more of its corners differ,
 * so that patches take the shape of the curve that divides the fates: halving the mixed area then costs no more than
 * about twice the points, as many as the curve is long in patches, and less where the curve runs along a side.
 *
 * <p>The corners lie on a lattice of whole numbers, so neighbours share them exactly and areas add up exactly.
 */
final class PatchMap {
    /** Finds the fates of many points at once. */
    @FunctionalInterface
    interface FateFinder {
        /**
         * Fates of points.
         *
         * @param u first coordinates, 0 … 1
         * @param v second coordinates, 0 … 1, same length
         * @return a fate for each, 0 … fates − 1
         */
        int[] find(double[] u, double[] v);
    }

    /** Patches along each side of the first mesh. */
    static final int MESH = 16;

    /** Points of the first mesh: corners, and two in each patch. */
    static final int FIRST_POINTS = MESH * (MESH + 1) + 2 * MESH * MESH;

    private static final int BITS = 26;
    private static final int SIDE = 1 << BITS;
    /** Smaller patches make do with their corners: all together hold little area, and the checks cover them too. */
    private static final long LEAST_WITH_INSIDE = 1L << (2 * BITS - 13);

    /** Points that halving a patch asks for: two corners, and one inside each half. */
    private static final int MOST_POINTS_OF_HALVING = 4;

    private static final int UNKNOWN = -1;

    /** Stands for the fate of a mixed patch. */
    static final int MIXED = -2;

    private final FateFinder finder;
    private final SplittableRandom random;
    private final int mesh;
    private final int first;
    private final Patch[] roots;
    private final Map<Long, Integer> corners = new HashMap<>();
    private final PriorityQueue<Patch> mixed = new PriorityQueue<>();
    private final long[] settledArea;
    private long mixedArea;
    private long patches;

    private double[] pointU = new double[1024];
    private double[] pointV = new double[1024];
    private int[] pointFate = new int[1024];
    private int points;
    private int knownPoints;
    private final List<Patch> fresh = new ArrayList<>();

    /**
     * A map with its first mesh.
     *
     * @param finder finds fates
     * @param fates how many fates there are
     * @param mesh patches along each side of the first mesh, a power of two
     * @param random source of the points inside patches
     */
    PatchMap(FateFinder finder, int fates, int mesh, SplittableRandom random) {
        this.mesh = mesh;
        this.first = SIDE / mesh;
        this.roots = new Patch[mesh * mesh];
        this.finder = finder;
        this.random = random;
        this.settledArea = new long[fates];
        for (int n = 0; n < roots.length; n++) {
            roots[n] = new Patch(n / mesh * first, n % mesh * first, first, first, patches++);
            add(roots[n].u + first / 2.0, roots[n].v + first / 2.0);
            fresh.add(roots[n]);
        }
        completeFresh();
    }

    private static final class Patch implements Comparable<Patch> {
        private final int u;
        private final int v;
        private final int du;
        private final int dv;
        private final long number;
        private int[] inside = new int[8];
        private int count;
        private int fate = UNKNOWN;
        private boolean isMixed;
        private boolean accounted;
        private boolean lastCutAcrossU;
        private Patch low;
        private Patch high;

        Patch(int u, int v, int du, int dv, long number) {
            this.u = u;
            this.v = v;
            this.du = du;
            this.dv = dv;
            this.number = number;
        }

        long area() {
            return (long) du * dv;
        }

        boolean cutAcrossU() {
            return low.du < du;
        }

        boolean holdsInside(double pu, double pv) {
            return pu > u && pu < u + du && pv > v && pv < v + dv;
        }

        /** Largest first, then in order of making. */
        @Override
        public int compareTo(Patch other) {
            int byArea = Long.compare(other.area(), area());
            return byArea != 0 ? byArea : Long.compare(number, other.number);
        }
    }

    // ---- what the map tells ----------------------------------------------------------------------------------------

    /** Area of the settled patches of a fate, 0 … 1. */
    double settled(int fate) {
        return share(settledArea[fate]);
    }

    /** Area of the mixed patches, 0 … 1. */
    double mixed() {
        return share(mixedArea);
    }

    private static double share(long area) {
        return area * 0x1p-52;
    }

    /** Points whose fates were found for the map. */
    int points() {
        return points;
    }

    /** Points of the first mesh: corners, and two in each patch. */
    int firstPoints() {
        return mesh * (mesh + 1) + 2 * mesh * mesh;
    }

    /** Number of mixed patches. */
    int mixedPatches() {
        return mixed.size();
    }

    /** Number of patches. */
    long patches() {
        return (patches + roots.length) / 2;
    }

    /** Estimated area of each fate: settled patches, and mixed ones by the fates of the points in them. */
    double[] estimate() {
        double[] area = new double[settledArea.length];
        for (int fate = 0; fate < area.length; fate++) {
            area[fate] = settled(fate);
        }
        List<Patch> ordered = new ArrayList<>(mixed);
        ordered.sort(null);
        for (Patch patch : ordered) {
            // Points on the two ends of v stand for no flow: there the gas is slow, or held, on a face.
            int counted = 0;
            for (int n = 0; n < patch.count; n++) {
                counted += onEdge(patch.inside[n]) ? 0 : 1;
            }
            for (int n = 0; n < patch.count; n++) {
                if (counted == 0 || !onEdge(patch.inside[n])) {
                    area[pointFate[patch.inside[n]]] += share(patch.area()) / (counted == 0 ? patch.count : counted);
                }
            }
        }
        return area;
    }

    private boolean onEdge(int point) {
        return pointV[point] == 0 || pointV[point] == SIDE;
    }

    // ---- making it -------------------------------------------------------------------------------------------------

    /**
     * Cuts the patches at both ends of v into ever thinner slices towards the end, settled or not.
     *
     * @param thickness how thick the last slices may be, as a part of v
     */
    void sliceEnds(double thickness) {
        double slice = 1.0 / mesh;
        for (int cuts = 0; slice > thickness; cuts++, slice /= 2) {
            for (int n = 0; n < roots.length; n++) {
                if (n % mesh == 0 || n % mesh == mesh - 1) {
                    Patch patch = roots[n];
                    for (int cut = 0; cut < cuts; cut++) {
                        patch = n % mesh == 0 ? patch.low : patch.high;
                    }
                    if (patch.isMixed) {
                        mixed.remove(patch);
                        mixedArea -= patch.area();
                    } else {
                        settledArea[patch.fate] -= patch.area();
                    }
                    halve(patch, false);
                }
            }
            completeFresh();
        }
    }

    /**
     * Halves mixed patches until their area is as small as wanted.
     *
     * @param target wanted area
     * @param affordable asked before each round how many points may be asked for in it; none ends it short of the target
     * @return whether the target was reached
     */
    boolean refine(double target, IntSupplier affordable) {
        while (mixed() > target) {
            if (mixed.isEmpty() || mixed.peek().area() < 4) {
                return false;
            }
            int most = affordable.getAsInt() / MOST_POINTS_OF_HALVING;
            if (most == 0) {
                return false;
            }
            // As many as would bring the area down to the target if one half of each were settled.
            double needed = 2 * (mixed() - target);
            long smallest = mixed.peek().area() / 4;
            double chosen = 0;
            List<Patch> batch = new ArrayList<>();
            while (!mixed.isEmpty()
                    && batch.size() < most
                    && chosen < needed
                    && mixed.peek().area() >= Math.max(4, smallest)) {
                Patch patch = mixed.poll();
                chosen += share(patch.area());
                batch.add(patch);
            }
            for (Patch patch : batch) {
                mixedArea -= patch.area();
                halve(patch);
            }
            completeFresh();
        }
        return true;
    }

    /** The fate of the patch that holds a point, or {@link #MIXED}. */
    int settledFate(double u, double v) {
        Patch leaf = leafAt(u * SIDE, v * SIDE);
        return leaf.isMixed ? MIXED : leaf.fate;
    }

    /**
     * Points in the mixed patches, one at random in each of as many equal parts of their area, which is cut along the order
     * of the patches.
     *
     * @param count how many
     * @param random source of the points
     * @return first and second coordinates, 0 … 1; none where no patch is mixed
     */
    double[][] drawMixed(int count, SplittableRandom random) {
        List<Patch> leaves = new ArrayList<>(mixed.size());
        for (Patch root : roots) {
            collectMixed(root, leaves);
        }
        double[][] drawn = new double[2][leaves.isEmpty() ? 0 : count];
        double each = (double) mixedArea / count;
        double before = 0;
        int at = 0;
        for (int n = 0; n < drawn[0].length; n++) {
            double place = (n + random.nextDouble()) * each;
            while (at < leaves.size() - 1 && place >= before + leaves.get(at).area()) {
                before += leaves.get(at++).area();
            }
            Patch patch = leaves.get(at);
            double along = Math.min(1, (place - before) / patch.area());
            double across = random.nextDouble();
            boolean longer = patch.du > patch.dv;
            drawn[0][n] = (patch.u + patch.du * (longer ? along : across)) / SIDE;
            drawn[1][n] = (patch.v + patch.dv * (longer ? across : along)) / SIDE;
        }
        return drawn;
    }

    private static void collectMixed(Patch patch, List<Patch> leaves) {
        if (patch.low != null) {
            collectMixed(patch.low, leaves);
            collectMixed(patch.high, leaves);
        } else if (patch.isMixed) {
            leaves.add(patch);
        }
    }

    /**
     * Puts points of known fates that were not found for the map into it. A settled patch of another fate becomes a mixed one.
     *
     * @param u first coordinates, 0 … 1
     * @param v second coordinates, 0 … 1
     * @param fates their fates
     */
    void place(double[] u, double[] v, int[] fates) {
        for (int n = 0; n < u.length; n++) {
            int point = add(u[n] * SIDE, v[n] * SIDE);
            pointFate[point] = fates[n];
            place(point);
        }
        knownPoints = points;
    }

    private Patch leafAt(double u, double v) {
        Patch patch = roots[Math.min(mesh - 1, (int) (u / first)) * mesh + Math.min(mesh - 1, (int) (v / first))];
        while (patch.low != null) {
            boolean below = patch.cutAcrossU() ? u < patch.high.u : v < patch.high.v;
            patch = below ? patch.low : patch.high;
        }
        return patch;
    }

    private int add(double u, double v) {
        if (points == pointU.length) {
            pointU = Arrays.copyOf(pointU, 2 * points);
            pointV = Arrays.copyOf(pointV, 2 * points);
            pointFate = Arrays.copyOf(pointFate, 2 * points);
        }
        pointU[points] = u;
        pointV[points] = v;
        pointFate[points] = UNKNOWN;
        return points++;
    }

    /** Halves a patch across the direction in which more of its corners differ; else not as it was halved last. */
    private void halve(Patch patch) {
        halve(patch, widestAcrossU(patch));
    }

    private boolean widestAcrossU(Patch patch) {
        int f00 = cornerFate(patch.u, patch.v);
        int f10 = cornerFate(patch.u + patch.du, patch.v);
        int f01 = cornerFate(patch.u, patch.v + patch.dv);
        int f11 = cornerFate(patch.u + patch.du, patch.v + patch.dv);
        int alongU = (f00 != f10 ? 1 : 0) + (f01 != f11 ? 1 : 0);
        int alongV = (f00 != f01 ? 1 : 0) + (f10 != f11 ? 1 : 0);
        boolean acrossU = alongU != alongV ? alongU > alongV : !patch.lastCutAcrossU;
        return (acrossU ? patch.du < 2 : patch.dv < 2) ? !acrossU : acrossU;
    }

    private void halve(Patch patch, boolean acrossU) {
        int du = acrossU ? patch.du / 2 : patch.du;
        int dv = acrossU ? patch.dv : patch.dv / 2;
        patch.low = new Patch(patch.u, patch.v, du, dv, patches++);
        patch.high = acrossU
                ? new Patch(patch.u + du, patch.v, du, dv, patches++)
                : new Patch(patch.u, patch.v + dv, du, dv, patches++);
        for (Patch child : List.of(patch.low, patch.high)) {
            child.lastCutAcrossU = acrossU;
            for (int n = 0; n < patch.count; n++) {
                int point = patch.inside[n];
                // A point on the line u = 0 also lies on the right side of the last patches, at u = 1.
                double u = pointU[point] < patch.u ? pointU[point] + SIDE : pointU[point];
                if (u >= child.u && u <= child.u + du && pointV[point] >= child.v && pointV[point] <= child.v + dv) {
                    hold(child, point);
                }
            }
            fresh.add(child);
        }
        patch.inside = new int[0];
        patch.count = 0;
    }

    private int cornerFate(int u, int v) {
        return pointFate[corners.get(cornerKey(u, v))];
    }

    private static long cornerKey(int u, int v) {
        return ((long) (u & (SIDE - 1)) << 32) | v;
    }

    /** Gives new patches their corners and a point inside, and tells settled from mixed. */
    private void completeFresh() {
        int known = knownPoints;
        for (Patch patch : fresh) {
            for (int n = 0; n < 4; n++) {
                int u = (patch.u + (n & 1) * patch.du) & (SIDE - 1);
                int v = patch.v + (n >> 1) * patch.dv;
                if (!corners.containsKey(cornerKey(u, v))) {
                    corners.put(cornerKey(u, v), add(u, v));
                }
            }
            boolean any = patch.area() < LEAST_WITH_INSIDE;
            for (int n = 0; n < patch.count; n++) {
                any |= patch.holdsInside(pointU[patch.inside[n]], pointV[patch.inside[n]]);
            }
            if (!any) {
                add(patch.u + patch.du * random.nextDouble(), patch.v + patch.dv * random.nextDouble());
            }
        }
        double[] u = new double[points - known];
        double[] v = new double[u.length];
        for (int n = 0; n < u.length; n++) {
            u[n] = pointU[known + n] / SIDE;
            v[n] = pointV[known + n] / SIDE;
        }
        int[] found = finder.find(u, v);
        for (int n = 0; n < found.length; n++) {
            pointFate[known + n] = found[n];
        }
        knownPoints = points;
        for (int n = 0; n < found.length; n++) {
            place(known + n);
        }
        for (Patch patch : fresh) {
            patch.accounted = true;
            if (patch.isMixed) {
                mixedArea += patch.area();
                mixed.add(patch);
            } else {
                settledArea[patch.fate] += patch.area();
            }
        }
        fresh.clear();
    }

    /** Puts a point of known fate into every patch that holds it, their sides included. */
    private void place(int point) {
        double u = pointU[point];
        double v = pointV[point];
        int column = Math.min(mesh - 1, (int) (u / first));
        int row = Math.min(mesh - 1, (int) (v / first));
        boolean onLineU = u == (double) column * first;
        boolean onLineV = v == (double) row * first && row > 0;
        place(roots[column * mesh + row], u, v, point);
        if (onLineV) {
            place(roots[column * mesh + row - 1], u, v, point);
        }
        if (onLineU) {
            int left = (column + mesh - 1) % mesh;
            double seen = column == 0 ? u + SIDE : u;
            place(roots[left * mesh + row], seen, v, point);
            if (onLineV) {
                place(roots[left * mesh + row - 1], seen, v, point);
            }
        }
    }

    private void place(Patch patch, double u, double v, int point) {
        if (patch.low == null) {
            hold(patch, point);
            return;
        }
        double at = patch.cutAcrossU() ? u : v;
        double cut = patch.cutAcrossU() ? patch.high.u : patch.high.v;
        if (at <= cut) {
            place(patch.low, u, v, point);
        }
        if (at >= cut) {
            place(patch.high, u, v, point);
        }
    }

    private void hold(Patch patch, int point) {
        if (patch.count == patch.inside.length) {
            patch.inside = Arrays.copyOf(patch.inside, 2 * patch.count);
        }
        patch.inside[patch.count++] = point;
        if (patch.fate == UNKNOWN) {
            patch.fate = pointFate[point];
        } else if (patch.fate != pointFate[point] && !patch.isMixed) {
            patch.isMixed = true;
            if (patch.accounted) {
                settledArea[patch.fate] -= patch.area();
                mixedArea += patch.area();
                mixed.add(patch);
            }
        }
    }
}
