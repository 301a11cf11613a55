package org.whither.render;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The one piece of a path that a look into the gap shows: moved round the shaft by whole sectors, all of which are equal,
 * so that it starts near the upstream end of the part shown, and followed until it ends or leaves that part. Nothing of
 * it comes back at the other end, so that no place of a path is drawn twice.
 */
final class ShownPath {
    /** Longest step round the shaft (rad). */
    private static final double STEP = Math.toRadians(0.5);

    private final double[] theta;
    private final double[] radius;
    private final double[] z;
    private final double[] speed;
    private final double[] time;
    private final boolean whole;
    private final Destination destination;

    private ShownPath(List<double[]> points, boolean whole, Destination destination) {
        this.theta = column(points, 0);
        this.radius = column(points, 1);
        this.z = column(points, 2);
        this.speed = column(points, 3);
        this.time = column(points, 4);
        this.whole = whole;
        this.destination = destination;
    }

    private static double[] column(List<double[]> points, int which) {
        return points.stream().mapToDouble(point -> point[which]).toArray();
    }

    /**
     * The piece of a path that is shown.
     *
     * @param path the path
     * @param gap the part of the ring that is shown
     * @return the piece, or null where the path starts outside the part shown
     */
    static ShownPath of(Path path, GapScene gap) {
        List<PathPoint> points = path.points();
        if (points.size() < 2) {
            return null;
        }
        double shift = gap.shift(points.get(0).steadyTheta());
        List<double[]> shown = new ArrayList<>();
        boolean whole = true;
        for (int n = 0; n < points.size() && whole; n++) {
            PathPoint b = points.get(n);
            PathPoint a = n == 0 ? b : points.get(n - 1);
            double turn = b.steadyTheta() - a.steadyTheta();
            int parts = n == 0 ? 1 : Math.max(1, (int) Math.ceil(Math.abs(turn) / STEP));
            for (int m = 1; m <= parts && whole; m++) {
                double f = (double) m / parts;
                double theta = a.steadyTheta() + f * turn + shift;
                double border = Math.max(gap.from, Math.min(gap.to, theta));
                if (border != theta && turn != 0) {
                    // The last point lies on the border itself.
                    f = (border - shift - a.steadyTheta()) / turn;
                    whole = false;
                }
                if (border != theta && n == 0) {
                    return null;
                }
                shown.add(new double[] {
                    border,
                    mix(a.radius(), b.radius(), f),
                    mix(a.z(), b.z(), f),
                    mix(a.speed(), b.speed(), f),
                    mix(a.time(), b.time(), f)
                });
            }
        }
        return new ShownPath(shown, whole, Destination.of(path.end()));
    }

    /** The pieces of several paths; those that start outside the part shown are left out. */
    static List<ShownPath> of(List<Path> paths, GapScene gap) {
        List<ShownPath> shown = new ArrayList<>();
        for (Path path : paths) {
            ShownPath piece = of(path, gap);
            if (piece != null) {
                shown.add(piece);
            }
        }
        return shown;
    }

    static double mix(double a, double b, double f) {
        return a + f * (b - a);
    }

    int size() {
        return theta.length;
    }

    /** Angle of a point, without turns taken off (rad). */
    double theta(int n) {
        return theta[n];
    }

    /** Radius of a point (m). */
    double radius(int n) {
        return radius[n];
    }

    /** Height of a point along the shaft (m). */
    double z(int n) {
        return z[n];
    }

    /** Speed at a point (m/s). */
    double speed(int n) {
        return speed[n];
    }

    /** Time of a point since the release (s). */
    double time(int n) {
        return time[n];
    }

    /** Time that the piece lasts (s). */
    double duration() {
        return time[time.length - 1] - time[0];
    }

    /** Whether the path ends inside the part shown; else it goes on outside. */
    boolean whole() {
        return whole;
    }

    /** Where the gas of the path goes in the end. */
    Destination destination() {
        return destination;
    }

    /**
     * The speeds between which a share of the drawn lengths lies.
     *
     * @param shown the pieces
     * @param share share of the length left out at the fast end
     * @return lowest speed, speed at the upper end, highest speed (m/s); null where there are no pieces
     */
    static double[] speeds(List<ShownPath> shown, double share) {
        List<double[]> steps = new ArrayList<>();
        double total = 0;
        double most = 0;
        for (ShownPath path : shown) {
            for (int n = 1; n < path.size(); n++) {
                double length = Math.hypot(
                        path.radius[n] - path.radius[n - 1], path.radius[n] * (path.theta[n] - path.theta[n - 1]));
                steps.add(new double[] {path.speed[n], length});
                most = Math.max(most, path.speed[n]);
                total += length;
            }
        }
        if (steps.isEmpty()) {
            return null;
        }
        double[][] sorted = steps.toArray(new double[0][]);
        Arrays.sort(sorted, (a, b) -> Double.compare(a[0], b[0]));
        double left = share * total;
        int n = sorted.length - 1;
        while (n > 0 && left >= sorted[n][1]) {
            left -= sorted[n--][1];
        }
        return new double[] {sorted[0][0], sorted[n][0], most};
    }
}
