package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import java.util.function.ToDoubleFunction;

/** The drawn line along the way of gas, with the time at each of its points. */
final class Tube {
    /** Longest step round the shaft (rad). */
    private static final double STEP = Math.toRadians(0.5);

    private final double[] line;
    private final double[] values;
    private final double[] times;

    private Tube(double[] line, double[] values, double[] times) {
        this.line = line;
        this.values = values;
        this.times = times;
    }

    /**
     * The line along a way.
     *
     * @param track the gas
     * @param until time at which it ends (s)
     * @param terrain what it goes over
     * @param speeds ends of the speed scale (m/s)
     * @param least least distance of two points (mm)
     * @param angle the drawn angle of a state (rad)
     */
    static Tube along(
            Track track,
            double until,
            Terrain terrain,
            PictureSettings.Range speeds,
            double least,
            ToDoubleFunction<Track.State> angle) {
        List<double[]> kept = new ArrayList<>();
        List<double[]> timesAndValues = new ArrayList<>();
        for (int n = 0; n < track.size(); n++) {
            double from = n == 0 ? 0 : track.time(n - 1);
            double to = Math.min(until, track.time(n));
            if (to < from) {
                break;
            }
            double turn = angle.applyAsDouble(track.at(to)) - angle.applyAsDouble(track.at(from));
            int parts = Math.max(1, (int) Math.ceil(Math.abs(turn) / STEP));
            for (int m = 1; m <= parts; m++) {
                double when = ShownPath.mix(from, to, (double) m / parts);
                Track.State s = track.at(when);
                double[] p = place(s, terrain, angle);
                if (kept.isEmpty() || apart(p, kept.get(kept.size() - 1)) >= least) {
                    kept.add(p);
                    timesAndValues.add(
                            new double[] {when, (s.speed() - speeds.low()) / (speeds.high() - speeds.low())});
                }
            }
        }
        double[] line = new double[3 * kept.size()];
        for (int n = 0; n < kept.size(); n++) {
            System.arraycopy(kept.get(n), 0, line, 3 * n, 3);
        }
        return new Tube(
                GapScene.rounded(line),
                timesAndValues.stream().mapToDouble(v -> v[1]).toArray(),
                timesAndValues.stream().mapToDouble(v -> v[0]).toArray());
    }

    private static double apart(double[] a, double[] b) {
        return Math.hypot(Math.hypot(a[0] - b[0], a[1] - b[1]), a[2] - b[2]);
    }

    /** The drawn place of gas at a drawn angle (mm). */
    static double[] place(Track.State s, Terrain terrain, ToDoubleFunction<Track.State> angle) {
        double theta = angle.applyAsDouble(s);
        return new double[] {
            1e3 * s.radius() * Math.cos(theta),
            1e3 * s.radius() * Math.sin(theta),
            terrain.height(s.steadyTheta(), s.radius(), s.z())
        };
    }

    /** Adds the tube to a mesh, open at both ends. */
    void addTo(MeshBuilder mesh, double radius) {
        if (values.length > 1) {
            Tubes.open(mesh, line, values, radius);
        }
    }

    /**
     * Which triangles, the first and the end, of a mesh that holds this tube alone show the way until a time and, back from
     * there, as far as it does not come close to an eye, which it would cover.
     *
     * @param time the time (s)
     * @param eye the eye (mm)
     * @param clear least distance from it (mm)
     */
    int[] triangles(double time, double[] eye, double clear) {
        int end = 0;
        while (end < times.length && times[end] <= time) {
            end++;
        }
        int first = Math.max(0, end - 1);
        while (first > 0
                && apart(new double[] {line[3 * first - 3], line[3 * first - 2], line[3 * first - 1]}, eye) > clear) {
            first--;
        }
        return new int[] {first * Tubes.TRIANGLES_A_STEP, Math.max(0, end - 1) * Tubes.TRIANGLES_A_STEP};
    }
}
