package org.whither.trace;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.film.PackedFlow;

/**
 * Follows tracers and takes points of their paths, spaced as wanted, from the continuous extension of the steps. An
 * instance may be used for many tracers after one another, but from one thread.
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
    private static final int MOST_KEPT = 1 << 11;

    private final FilmFlow flow;
    private final Settings settings;
    private final int mostKept;
    private long steps;

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
        this.flow = flow;
        this.settings = settings;
        this.mostKept = mostKept;
    }

    /** Steps kept so far, over all tracers. */
    public long steps() {
        return steps;
    }

    /**
     * Follows a tracer to its end or ends with the single-path tracer.
     *
     * @param release where it starts
     * @return its path
     */
    public SampledPath follow(Release release) {
        return follow(List.of(release), Optional.empty()).get(0);
    }

    /**
     * Follows tracers to their ends, side by side where the flow allows that. What becomes of one depends on no other.
     *
     * @param releases where they start; a hundred or so at a time use the machine well
     * @return their paths, in order
     */
    public List<SampledPath> follow(List<Release> releases) {
        boolean limited = settings.turnLimit() < Double.POSITIVE_INFINITY;
        return follow(releases, limited ? Optional.empty() : flow.packed());
    }

    private List<SampledPath> follow(List<Release> releases, Optional<PackedFlow> packed) {
        Leg backward = settings.course() == Course.FORWARD ? null : new Leg(Direction.BACKWARD, releases, packed);
        Leg forward = settings.course() == Course.BACKWARD ? null : new Leg(Direction.FORWARD, releases, packed);
        List<SampledPath> paths = new ArrayList<>(releases.size());
        for (int n = 0; n < releases.size(); n++) {
            paths.add(joined(backward, forward, n, releases.get(n)));
        }
        return paths;
    }

    private SampledPath joined(Leg backward, Leg forward, int n, Release release) {
        PathEnd before = backward == null ? null : backward.ends[n];
        PathEnd after = forward == null ? null : forward.ends[n];
        Strand back = backward == null ? null : backward.strands[n];
        Strand on = forward == null ? null : forward.strands[n];
        if (settings.spacing() instanceof PointSpacing.Equal equal) {
            double start = before == null ? 0 : -before.time();
            double end = after == null ? 0 : after.time();
            double[] times = times(start, end, equal.count());
            int split = 0;
            while (back != null && split < times.length && (times[split] < 0 || (on == null && times[split] <= 0))) {
                split++;
            }
            if (back != null) {
                double[] since = new double[split];
                for (int m = 0; m < split; m++) {
                    since[m] = -times[split - 1 - m];
                }
                backward.take(n, release, since);
            }
            if (on != null) {
                forward.take(n, release, java.util.Arrays.copyOfRange(times, split, times.length));
            }
        }
        return new SampledPath(release, joined(back, on), before, after);
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

    /** The points of both strands in order of time, the release once. */
    private static double[] joined(Strand backward, Strand forward) {
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

    /** All tracers one way from their releases. */
    private final class Leg {
        final PathEnd[] ends;
        final Strand[] strands;
        private final Direction direction;
        private final Optional<PackedFlow> packed;

        Leg(Direction direction, List<Release> releases, Optional<PackedFlow> packed) {
            this.direction = direction;
            this.packed = packed;
            this.ends = new PathEnd[releases.size()];
            this.strands = new Strand[releases.size()];
            PointFinder finder = new PointFinder(flow, settings.frame(), direction, packed.isPresent());
            double tolerance = settings.spacing() instanceof PointSpacing.Within within ? within.tolerance() : 0;
            for (int n = 0; n < strands.length; n++) {
                strands[n] = new Strand(finder, flow.film(), tolerance, mostKept);
            }
            follow(releases, (n, step) -> strands[n].step(step));
            for (Strand strand : strands) {
                strand.end();
            }
        }

        private void follow(List<Release> releases, BatchTracer.StepWatcher watcher) {
            TraceSettings how = settings.tracing(direction);
            if (packed.isPresent()) {
                BatchTracer tracer = new BatchTracer(flow, packed.get(), how, BatchSteps.shared());
                tracer.watch(watcher);
                int[] next = {0};
                tracer.follow(releases, () -> next[0] < releases.size() ? next[0]++ : -1, ends, null, done -> {});
                steps += tracer.steps();
                return;
            }
            Tracer tracer = new Tracer(flow, how);
            double[] kept = new double[PointFinder.STEP];
            for (int n = 0; n < releases.size(); n++) {
                int number = n;
                ends[n] = tracer.follow(releases.get(n), step -> {
                    step.copy(kept, 0);
                    watcher.step(number, kept);
                });
            }
            steps += tracer.steps();
        }

        /** Takes points of one path at times since the release, which rise. */
        void take(int n, Release release, double[] times) {
            Strand strand = strands[n];
            if (strand.takeKept(times)) {
                return;
            }
            PathEnd end = ends[n];
            PathEnd first = ends[0];
            follow(List.of(release), (number, step) -> strand.take(step));
            ends[0] = first;
            ends[n] = end;
            strand.takeRest();
        }
    }
}
