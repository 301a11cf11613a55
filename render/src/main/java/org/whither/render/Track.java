package org.whither.render;

import java.util.List;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/** A recorded path as a motion: where its gas is at any time since its release. Angles are unwrapped. */
final class Track {
    /**
     * Where the gas is.
     *
     * @param theta angle in the frame of view (rad)
     * @param steadyTheta angle in the frame in which the film is steady (rad)
     * @param radius radius (m)
     * @param z height along the shaft (m)
     * @param sigma height over the rotor as a share of the film thickness
     * @param speed speed in the frame of view (m/s)
     * @param pressure absolute pressure (Pa)
     */
    record State(
            double theta, double steadyTheta, double radius, double z, double sigma, double speed, double pressure) {}

    private final double[] time;
    private final double[][] columns;
    private final Destination destination;

    /**
     * A track.
     *
     * @param path a path of at least two points, integrated in the frame of view
     */
    Track(Path path) {
        List<PathPoint> points = path.points();
        int count = points.size();
        time = new double[count];
        columns = new double[7][count];
        for (int n = 0; n < count; n++) {
            PathPoint p = points.get(n);
            time[n] = p.time();
            double[] values = {p.theta(), p.steadyTheta(), p.radius(), p.z(), p.sigma(), p.speed(), p.pressure()};
            for (int c = 0; c < values.length; c++) {
                columns[c][n] = values[c];
            }
        }
        destination = Destination.of(path.end());
    }

    Destination destination() {
        return destination;
    }

    /** Time from the release to the end (s). */
    double duration() {
        return time[time.length - 1];
    }

    int size() {
        return time.length;
    }

    double time(int n) {
        return time[n];
    }

    /** The state at a time; before the release and after the end that of the release and of the end. */
    State at(double when) {
        int low = 0;
        int high = time.length - 1;
        while (high - low > 1) {
            int middle = (low + high) >>> 1;
            if (time[middle] <= when) {
                low = middle;
            } else {
                high = middle;
            }
        }
        double step = time[high] - time[low];
        double f = step > 0 ? Math.max(0, Math.min(1, (when - time[low]) / step)) : when >= time[high] ? 1 : 0;
        double[] v = new double[columns.length];
        for (int c = 0; c < v.length; c++) {
            v[c] = ShownPath.mix(columns[c][low], columns[c][high], f);
        }
        return new State(v[0], v[1], v[2], v[3], v[4], v[5], v[6]);
    }
}
