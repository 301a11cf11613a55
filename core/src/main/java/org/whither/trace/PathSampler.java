package org.whither.trace;

import java.util.Arrays;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;

/**
 * Follows tracers, one at a time, and takes points of their paths, spaced as wanted, from the continuous extension of the
 * steps. An instance may be used for many tracers after one another, but from one thread.
 */
public final class PathSampler {
    /**
     * How paths are followed and sampled.
     *
     * @param frame frame of integration
     * @param course forward, backward or both
     * @param tolerance as in {@link TraceSettings}
     * @param timeLimit as in {@link TraceSettings}, for each way (s)
     * @param turnLimit as in {@link TraceSettings}, for each way (rad)
     * @param spacing how densely the points lie
     */
    public record Settings(
            Frame frame, Course course, double tolerance, double timeLimit, double turnLimit, PointSpacing spacing) {
        TraceSettings tracing(Direction direction) {
            return new TraceSettings(frame, direction, tolerance, timeLimit, turnLimit);
        }
    }

    /** Steps that are kept of a path; the points of a longer one are found by following it again. */
    private static final int MOST_KEPT = 1 << 15;

    private final PointSpacing spacing;
    private final Leg backward;
    private final Leg forward;

    /**
     * A sampler.
     *
     * @param flow the motion of the gas
     * @param settings how to follow and sample
     */
    public PathSampler(FilmFlow flow, Settings settings) {
        this(flow, settings, MOST_KEPT);
    }

    PathSampler(FilmFlow flow, Settings settings, int mostKept) {
        this.spacing = settings.spacing();
        this.backward =
                settings.course() == Course.FORWARD ? null : new Leg(flow, settings, Direction.BACKWARD, mostKept);
        this.forward =
                settings.course() == Course.BACKWARD ? null : new Leg(flow, settings, Direction.FORWARD, mostKept);
    }

    /** Steps kept so far, over all tracers. */
    public long steps() {
        return (backward == null ? 0 : backward.tracer.steps()) + (forward == null ? 0 : forward.tracer.steps());
    }

    /**
     * Follows a tracer to its end or ends.
     *
     * @param release where it starts
     * @return its path
     */
    public SampledPath follow(Release release) {
        PathEnd before = backward == null ? null : backward.follow(release);
        PathEnd after = forward == null ? null : forward.follow(release);
        if (spacing instanceof PointSpacing.Equal equal) {
            double start = before == null ? 0 : -before.time();
            double end = after == null ? 0 : after.time();
            double[] times = times(start, end, equal.count());
            if (backward != null) {
                int count = 0;
                while (count < times.length && (times[count] < 0 || (forward == null && times[count] <= 0))) {
                    count++;
                }
                double[] since = new double[count];
                for (int n = 0; n < count; n++) {
                    since[n] = -times[count - 1 - n];
                }
                backward.take(release, since);
                times = Arrays.copyOfRange(times, count, times.length);
            }
            if (forward != null) {
                forward.take(release, times);
            }
        }
        return new SampledPath(release, joined(), before, after);
    }

    private static double[] times(double start, double end, int count) {
        if (!(end > start)) {
            return new double[] {start};
        }
        double[] times = new double[count];
        for (int n = 0; n < count; n++) {
            double f = (double) n / (count - 1);
            times[n] = (1 - f) * start + f * end;
        }
        return times;
    }

    /** The points of both legs in order of time, the release once. */
    private double[] joined() {
        int width = SampledPath.COLUMNS;
        int back = backward == null ? 0 : backward.count;
        int on = forward == null ? 0 : forward.count;
        boolean twice = back > 0 && on > 0 && backward.points[0] == 0 && forward.points[0] == 0;
        int skip = twice ? 1 : 0;
        double[] all = new double[(back - skip + on) * width];
        for (int n = 0; n < back - skip; n++) {
            int from = (back - 1 - n) * width;
            System.arraycopy(backward.points, from, all, n * width, width);
            all[n * width] = backward.points[from] == 0 ? 0 : -backward.points[from];
        }
        if (on > 0) {
            System.arraycopy(forward.points, 0, all, (back - skip) * width, on * width);
        }
        return all;
    }

    /** One way from the release, with its points by rising time since the release. */
    private static final class Leg {
        final Tracer tracer;
        private final PointFinder finder;
        private final Thinning thinning;
        private final int mostKept;
        private double[] steps = new double[64 * PointFinder.STEP];
        private int kept;
        private boolean all;
        private double[] wanted;
        private int next;
        double[] points = new double[64 * SampledPath.COLUMNS];
        int count;

        Leg(FilmFlow flow, Settings settings, Direction direction, int mostKept) {
            this.mostKept = mostKept;
            this.tracer = new Tracer(flow, settings.tracing(direction));
            this.finder = new PointFinder(flow, settings.frame(), direction);
            this.thinning = settings.spacing() instanceof PointSpacing.Within within
                    ? new Thinning(flow.film(), within.tolerance())
                    : null;
        }

        PathEnd follow(Release release) {
            count = 0;
            kept = 0;
            all = true;
            if (thinning == null) {
                return tracer.follow(release, this::keep);
            }
            thinning.begin();
            PathEnd end = tracer.follow(release, thinning);
            thinning.end();
            return end;
        }

        private void keep(PathStep step) {
            if (kept == mostKept) {
                all = false;
                return;
            }
            if ((kept + 1) * PointFinder.STEP > steps.length) {
                steps = Arrays.copyOf(steps, 2 * steps.length);
            }
            step.copy(steps, kept++ * PointFinder.STEP);
        }

        /** Takes points at times since the release, which rise. */
        void take(Release release, double[] times) {
            wanted = times;
            next = 0;
            if (all) {
                for (int n = 0; n < kept; n++) {
                    take(n * PointFinder.STEP, n == kept - 1);
                }
            } else {
                tracer.follow(release, step -> {
                    step.copy(steps, 0);
                    take(0, false);
                });
                take(0, true);
            }
        }

        private void take(int at, boolean last) {
            double start = steps[at];
            double length = steps[at + 2] * steps[at + 1];
            while (next < wanted.length && (last || wanted[next] <= start + length)) {
                double fraction = length > 0 ? Math.max(0, Math.min(1, (wanted[next] - start) / length)) : 0;
                add(finder.point(steps, at, fraction));
                next++;
            }
        }

        private void add(PathPoint point) {
            int at = count++ * SampledPath.COLUMNS;
            if (at == points.length) {
                points = Arrays.copyOf(points, 2 * at);
            }
            points[at] = point.time();
            points[at + 1] = point.theta();
            points[at + 2] = point.radius();
            points[at + 3] = point.z();
            points[at + 4] = point.sigma();
            points[at + 5] = point.speed();
            points[at + 6] = point.pressure();
        }

        /**
         * Leaves out points that straight lines between the others replace. From the last point taken, a range of slopes
         * of each coordinate against time leads past every later point within the tolerance; the latest point whose own
         * slopes lie in those ranges is the next to be taken. Each point is looked at once, whatever the length of the
         * line.
         */
        private final class Thinning implements StepObserver {
            /** Share of the tolerance that goes to the bend of the path between two points looked at. */
            private static final double BEND = 0.2;

            private static final int MOST_PARTS = 256;
            private static final int COORDINATES = 4;

            private final double tolerance;
            private final double extent;
            private final double[] low = new double[COORDINATES];
            private final double[] high = new double[COORDINATES];
            private final double[] start = new double[COORDINATES + 1];
            private final double[] end = new double[COORDINATES + 1];
            private final double[] probe = new double[COORDINATES + 1];
            private final double[] anchor = new double[COORDINATES + 1];
            private final double[] latest = new double[COORDINATES + 1];
            private final double[] step = new double[PointFinder.STEP];
            private final double[] latestStep = new double[PointFinder.STEP];
            private double latestFraction;
            private double anchorTime;
            private double latestTime;
            private boolean begun;
            private boolean latestTaken;

            Thinning(Film film, double tolerance) {
                this.tolerance = tolerance;
                this.extent = film.grid().outerRadius() - film.grid().innerRadius();
            }

            void begin() {
                begun = false;
                latestTaken = true;
            }

            void end() {
                if (!latestTaken) {
                    takeLatest();
                }
            }

            @Override
            public void step(PathStep kept) {
                kept.copy(step, 0);
                finder.place(step, 0, 0, start);
                finder.place(step, 0, 1, end);
                if (!begun) {
                    begun = true;
                    look(0, start);
                    takeLatest();
                } else if (Math.abs(start[2] - latest[2]) > 0.05 * tolerance * Math.min(start[4], latest[4])) {
                    if (!latestTaken) {
                        takeLatest();
                    }
                    look(0, start);
                    takeLatest();
                }
                int parts = parts();
                for (int n = 1; n <= parts; n++) {
                    double fraction = (double) n / parts;
                    if (n == parts) {
                        System.arraycopy(end, 0, probe, 0, probe.length);
                    } else {
                        finder.place(step, 0, fraction, probe);
                    }
                    consider(fraction);
                }
            }

            /** How many points of the step must be looked at so that it bends little between them. */
            private int parts() {
                double bend = 0;
                for (int n = 1; n < 4; n++) {
                    double f = 0.25 * n;
                    finder.place(step, 0, f, probe);
                    for (int c = 0; c < COORDINATES; c++) {
                        double chord = (1 - f) * start[c] + f * end[c];
                        bend = Math.max(bend, Math.abs(probe[c] - chord) / scale(c, probe));
                    }
                }
                return (int) Math.max(1, Math.min(MOST_PARTS, Math.ceil(Math.sqrt(1.4 * bend / (BEND * tolerance)))));
            }

            private double scale(int c, double[] place) {
                return c < 2 ? extent : c == 2 ? place[4] : 1;
            }

            private void consider(double fraction) {
                double time = PointFinder.time(step, 0, fraction);
                if (!(time > latestTime)) {
                    return; // a step of no length
                }
                if (!latestTaken && !reachable(time)) {
                    takeLatest();
                }
                double span = time - anchorTime;
                for (int c = 0; c < COORDINATES; c++) {
                    double slack = (1 - BEND) * tolerance * scale(c, probe);
                    low[c] = Math.max(low[c], (probe[c] - slack - anchor[c]) / span);
                    high[c] = Math.min(high[c], (probe[c] + slack - anchor[c]) / span);
                }
                look(fraction, probe);
                latestTaken = false;
            }

            private boolean reachable(double time) {
                for (int c = 0; c < COORDINATES; c++) {
                    double slope = (probe[c] - anchor[c]) / (time - anchorTime);
                    if (!(slope >= low[c] && slope <= high[c])) {
                        return false;
                    }
                }
                return true;
            }

            private void look(double fraction, double[] place) {
                System.arraycopy(step, 0, latestStep, 0, step.length);
                latestFraction = fraction;
                latestTime = PointFinder.time(step, 0, fraction);
                System.arraycopy(place, 0, latest, 0, latest.length);
            }

            private void takeLatest() {
                add(finder.point(latestStep, 0, latestFraction));
                latestTaken = true;
                anchorTime = latestTime;
                System.arraycopy(latest, 0, anchor, 0, anchor.length);
                Arrays.fill(low, Double.NEGATIVE_INFINITY);
                Arrays.fill(high, Double.POSITIVE_INFINITY);
            }
        }
    }
}
