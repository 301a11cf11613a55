package org.whither.io.command;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;

/**
 * Chooses few paths out of many for a picture: shares them among the ways that the gas goes, and takes of each way paths
 * that differ from one another in height, in the place where they start and in how far round they run.
 */
final class PathChoice {
    /** A way that a smaller share of the tracers goes is not shown. */
    private static final double LEAST_SHARE = 0.02;

    /** Paths that run round further than this cannot be seen whole, and are taken less readily (rad). */
    private static final double FAR = Math.toRadians(60);

    private PathChoice() {}

    /**
     * The chosen paths.
     *
     * @param candidates what to choose from, each for the same mass flow
     * @param count how many at most
     */
    static List<Path> choose(List<Path> candidates, int count) {
        Map<String, List<Path>> ways = new LinkedHashMap<>();
        for (Path path : candidates) {
            ways.computeIfAbsent(way(path.end()), key -> new ArrayList<>()).add(path);
        }
        List<List<Path>> groups = ways.values().stream()
                .filter(group -> group.size() >= LEAST_SHARE * candidates.size())
                .sorted((a, b) -> b.size() - a.size())
                .toList();
        int[] quota = quotas(groups.stream().mapToInt(List::size).toArray(), count);
        List<Path> chosen = new ArrayList<>();
        for (int n = 0; n < groups.size(); n++) {
            chosen.addAll(different(groups.get(n), quota[n]));
        }
        return chosen;
    }

    private static String way(PathEnd end) {
        return end instanceof PathEnd.Left left
                ? left.border().name()
                : end.getClass().getSimpleName();
    }

    /**
     * How many of each group: one each while there are enough, the rest so that the counts follow the groups' sizes as
     * nearly as they can (the method of D'Hondt).
     *
     * @param sizes sizes of the groups, falling
     * @param count how many in all
     */
    static int[] quotas(int[] sizes, int count) {
        int[] quota = new int[sizes.length];
        for (int n = 0; n < count; n++) {
            int best = -1;
            for (int g = 0; g < sizes.length; g++) {
                if (quota[g] >= sizes[g]) {
                    continue;
                }
                boolean first = quota[g] == 0;
                if (best < 0
                        || (first && quota[best] > 0)
                        || (first == (quota[best] == 0)
                                && (double) sizes[g] / (quota[g] + 1) > (double) sizes[best] / (quota[best] + 1))) {
                    best = g;
                }
            }
            if (best >= 0) {
                quota[best]++;
            }
        }
        return quota;
    }

    /** Paths of one way that lie far apart from one another: each time the one furthest from all those taken. */
    private static List<Path> different(List<Path> group, int count) {
        double[][] features = new double[group.size()][];
        for (int n = 0; n < features.length; n++) {
            features[n] = features(group.get(n));
        }
        for (int f = 0; f < 4; f++) {
            normalise(features, f);
        }
        List<Path> taken = new ArrayList<>();
        List<double[]> there = new ArrayList<>();
        boolean[] used = new boolean[features.length];
        while (taken.size() < count && taken.size() < features.length) {
            int best = -1;
            double most = Double.NEGATIVE_INFINITY;
            for (int n = 0; n < features.length; n++) {
                if (used[n]) {
                    continue;
                }
                double nearest = there.isEmpty() ? -distance(features[n], new double[] {0.5, 0.5, 0.5, 0.5}) : 9;
                for (double[] other : there) {
                    nearest = Math.min(nearest, distance(features[n], other));
                }
                double worth = nearest - 0.9 * Math.min(1, Math.max(0, features[n][4] / FAR - 1));
                if (worth > most) {
                    most = worth;
                    best = n;
                }
            }
            used[best] = true;
            taken.add(group.get(best));
            there.add(features[best]);
        }
        return taken;
    }

    /** Mean height, angle and radius of the start, logarithm of the angle run through; and that angle (rad). */
    private static double[] features(Path path) {
        List<PathPoint> points = path.points();
        double sigma = 0;
        for (PathPoint point : points) {
            sigma += point.sigma() / points.size();
        }
        double run = points.isEmpty()
                ? 0
                : Math.abs(points.get(points.size() - 1).steadyTheta()
                        - points.get(0).steadyTheta());
        return new double[] {sigma, path.release().theta(), path.release().radius(), Math.log(Math.max(1e-3, run)), run
        };
    }

    private static void normalise(double[][] features, int f) {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (double[] each : features) {
            low = Math.min(low, each[f]);
            high = Math.max(high, each[f]);
        }
        for (double[] each : features) {
            each[f] = high > low ? (each[f] - low) / (high - low) : 0.5;
        }
    }

    private static double distance(double[] a, double[] b) {
        double sum = 0;
        for (int f = 0; f < 4; f++) {
            sum += (a[f] - b[f]) * (a[f] - b[f]);
        }
        return Math.sqrt(sum);
    }
}
