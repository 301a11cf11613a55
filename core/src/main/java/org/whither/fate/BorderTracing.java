package org.whither.fate;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SplittableRandom;
import java.util.function.DoubleConsumer;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.PathMeasure;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * Maps one border into the destinations of the gas that enters over it, or the origins of the gas that leaves.
 *
 * <p>Points of the unit square, whose equal areas are equal mass flows (see {@link ReleasePlan}), are followed until a
 * {@link MapSurvey} of the square tells the shares as sharply as wanted. Its checks each stand for the same mass flow, so
 * they also give times and turns without bias.
 */
final class BorderTracing {
    /** Part of what may be spent that the first mesh may take. */
    private static final double MESH_PART = 0.2;

    private static final int SCOUTS = 32;
    private static final int COARSEST = 4;
    private static final int FATES = Destination.values().length;

    private final FilmFlow flow;
    private final ReleasePlan plan;
    private final PathEnd.Border border;
    private final Direction direction;
    private final SplitSettings settings;
    private final TraceSettings how;
    private final SplittableRandom random;
    private final double shift;
    private final double edge;

    private final double[] shortest = new double[FATES];
    private long tracers;
    private long steps;
    private PathEnd.Failed failure;

    private final MapSurvey survey;
    private final List<Release> releases = new ArrayList<>();
    private final List<PathEnd> ends = new ArrayList<>();
    private final List<PathMeasure> measures = new ArrayList<>();
    private long stepsOfChecks;

    BorderTracing(
            FilmFlow flow,
            ReleasePlan plan,
            PathEnd.Border border,
            Direction direction,
            SplitSettings settings,
            double timeLimit,
            SplittableRandom random,
            DoubleConsumer progress) {
        this.flow = flow;
        this.plan = plan;
        this.border = border;
        this.direction = direction;
        this.settings = settings;
        this.how = new TraceSettings(settings.frame(), direction, settings.tolerance(), timeLimit);
        this.random = random;
        this.shift = random.nextDouble();
        // Gas on a face never leaves: the outermost corners are taken a little inside.
        this.edge = settings.width() / 5;
        Arrays.fill(shortest, Double.POSITIVE_INFINITY);
        survey = new MapSurvey(
                new Explorer(),
                FATES,
                Destination.LOST.ordinal(),
                settings.width(),
                mesh(),
                edge,
                random.split(),
                progress);
        progress.accept(1);
    }

    /** Patches along a side of the first mesh: fewer where a few scouts tell that it would cost too much. */
    private int mesh() {
        double[][] points = MapSurvey.stratified(SCOUTS, random);
        explore(points[0], points[1]);
        int mesh = PatchMap.MESH;
        while (mesh > COARSEST && 3.0 * mesh * mesh * steps / SCOUTS > MESH_PART * mostSteps()) {
            mesh /= 2;
        }
        return mesh;
    }

    /** Gas followed back only confirms what the gas followed forward told: it may cost half as much. */
    private long mostSteps() {
        return settings.mostSteps() / (direction == Direction.FORWARD ? 1 : 2);
    }

    /** Follows points of the square for the survey. */
    private final class Explorer implements MapSurvey.Explorer {
        @Override
        public int[] explore(double[] u, double[] v) {
            return BorderTracing.this.explore(u, v);
        }

        @Override
        public int[] check(double[] u, double[] v) {
            return BorderTracing.this.check(u, v);
        }

        @Override
        public int affordable(double part) {
            double left = part * settings.mostTracers() - tracers;
            double leftBySteps = (part * mostSteps() - steps) * tracers / Math.max(1, steps);
            return (int) Math.max(0, Math.min(left, leftBySteps));
        }
    }

    // ---- tracers ----------------------------------------------------------------------------------------

    private int[] explore(double[] u, double[] v) {
        List<Release> batch = new ArrayList<>(u.length);
        for (int n = 0; n < u.length; n++) {
            batch.add(release(u[n], Math.max(edge, Math.min(1 - edge, v[n]))));
        }
        ParallelTracing.Outcome outcome = ParallelTracing.follow(flow, how, batch, settings.threads(), n -> {});
        steps += outcome.steps();
        return note(outcome.ends());
    }

    private Release release(double u, double v) {
        double turned = u + shift;
        return plan.at(turned - Math.floor(turned), v, 0);
    }

    private int[] note(List<PathEnd> found) {
        tracers += found.size();
        int[] fates = new int[found.size()];
        for (int n = 0; n < fates.length; n++) {
            PathEnd end = found.get(n);
            fates[n] = Destination.of(end).ordinal();
            shortest[fates[n]] = Math.min(shortest[fates[n]], end.time());
            if (end instanceof PathEnd.Failed failed && failure == null) {
                failure = failed;
            }
        }
        return fates;
    }

    private int[] check(double[] u, double[] v) {
        List<Release> batch = new ArrayList<>(u.length);
        for (int n = 0; n < u.length; n++) {
            batch.add(release(u[n], v[n]));
        }
        ParallelTracing.Measured measured = ParallelTracing.measure(flow, how, batch, settings.threads(), n -> {});
        steps += measured.outcome().steps();
        stepsOfChecks += measured.outcome().steps();
        releases.addAll(batch);
        ends.addAll(measured.outcome().ends());
        measures.addAll(measured.measures());
        return note(measured.outcome().ends());
    }

    // ---- what was found --------------------------------------------------------------------------------------------

    PathEnd.Border border() {
        return border;
    }

    Direction direction() {
        return direction;
    }

    double massFlow() {
        return plan.massFlow();
    }

    long tracers() {
        return tracers;
    }

    long steps() {
        return steps;
    }

    boolean reached() {
        return survey.reached();
    }

    /** Share of the flow whose fate is left open in the map. */
    double unsettled() {
        return survey.unsettled();
    }

    double estimate(Destination fate) {
        return survey.estimate(fate.ordinal());
    }

    Interval interval(Destination fate) {
        return survey.interval(fate.ordinal());
    }

    BorderMap facts() {
        return new BorderMap(
                border,
                direction,
                plan.massFlow(),
                survey.patches(),
                tracers - survey.samples() - survey.checks(),
                survey.mixed(),
                survey.samples(),
                survey.unsettled(),
                survey.checks(),
                survey.wrongChecks(),
                survey.missedBound(),
                steps,
                survey.reached());
    }

    Optional<PathEnd.Failed> failure() {
        return Optional.ofNullable(failure);
    }

    /** The checks as points with their ends, in random order. */
    List<FedPoint> points(int most) {
        List<FedPoint> points = new ArrayList<>();
        for (int n = 0; n < Math.min(most, ends.size()); n++) {
            Release at = releases.get(n);
            points.add(new FedPoint(
                    new Release(at.theta(), at.radius(), at.sigma(), plan.massFlow() / ends.size()), ends.get(n)));
        }
        return points;
    }

    /** The row of a pair, told with an interval of its own. */
    SplitRow row(Optional<PathEnd.Border> from, Destination to, Destination found, Interval told) {
        double massFlow = plan.massFlow() * estimate(found);
        int[] those = java.util.stream.IntStream.range(0, ends.size())
                .filter(n -> Destination.of(ends.get(n)) == found)
                .toArray();
        double least = shortest[found.ordinal()];
        boolean left = found != Destination.HELD && found != Destination.LOST && Double.isFinite(least);
        if (!left || those.length == 0) {
            return new SplitRow(
                    from,
                    to,
                    massFlow,
                    told,
                    Optional.empty(),
                    Optional.empty(),
                    left ? OptionalDouble.of(least) : OptionalDouble.empty(),
                    Optional.empty());
        }
        double[] times = new double[those.length];
        double[] turns = new double[those.length];
        double[] lengths = new double[those.length];
        double[] lows = new double[those.length];
        double[] highs = new double[those.length];
        double[] phase = new double[Travel.PHASE_BINS];
        double[] height = new double[Travel.HEIGHT_BINS];
        double lowest = Double.POSITIVE_INFINITY;
        double highest = Double.NEGATIVE_INFINITY;
        for (int n = 0; n < those.length; n++) {
            PathEnd end = ends.get(those[n]);
            Release release = releases.get(those[n]);
            PathMeasure measure = measures.get(those[n]);
            times[n] = end.time();
            turns[n] = direction.sign() * (end.position().stationaryTheta() - release.theta()) / (2 * Math.PI);
            lengths[n] = measure.length();
            lows[n] = measure.lowestPressure();
            highs[n] = measure.highestPressure();
            lowest = Math.min(lowest, lows[n]);
            highest = Math.max(highest, highs[n]);
            double share = 1.0 / those.length;
            phase[bin(exitPhase(release, end), phase.length)] += share;
            double sigma = direction == Direction.FORWARD ? end.position().sigma() : release.sigma();
            height[bin(sigma, height.length)] += share;
        }
        Travel travel = new Travel(
                Quantiles.of(lengths),
                Quantiles.of(lows),
                Quantiles.of(highs),
                lowest,
                highest,
                Arrays.stream(phase).boxed().toList(),
                Arrays.stream(height).boxed().toList(),
                those.length);
        return new SplitRow(
                from,
                to,
                massFlow,
                told,
                Optional.of(Quantiles.of(times)),
                Optional.of(Quantiles.of(turns)),
                OptionalDouble.of(least),
                Optional.of(travel));
    }

    private static int bin(double part, int bins) {
        return Math.max(0, Math.min(bins - 1, (int) (part * bins)));
    }

    /** Where round the sector gas leaves the film, 0 … 1 from the first grid line at that radius. */
    private double exitPhase(Release release, PathEnd end) {
        FilmGrid grid = flow.film().grid();
        double radius;
        double theta;
        if (direction == Direction.FORWARD) {
            radius = end.position().radius();
            theta = end.position().stationaryTheta() - flow.film().steadyFrameSpeed() * end.time();
        } else {
            radius = release.radius();
            theta = release.theta();
        }
        double phase = (theta - grid.lineTheta(0, grid.row(radius), radius)) / grid.pitch();
        return phase - Math.floor(phase);
    }

    // ---- the same with another tolerance ---------------------------------------------------------------------------

    /**
     * Some of the checks followed once more.
     *
     * @param tracers how many
     * @param changed how many of them have another destination
     * @param residence relative change of the residence time of each that left both times
     * @param steps integration steps kept
     */
    record Again(int tracers, int changed, double[] residence, long steps) {}

    Again again(double tolerance, int wanted) {
        // Fewer where each takes long, as where much gas is held.
        long mean = 1 + stepsOfChecks / Math.max(1, ends.size());
        int count = (int) Math.min(Math.min(wanted, ends.size()), Math.max(32, 2_000_000 / mean));
        TraceSettings other = new TraceSettings(how.frame(), direction, tolerance, how.timeLimit());
        ParallelTracing.Outcome outcome =
                ParallelTracing.follow(flow, other, releases.subList(0, count), settings.threads(), n -> {});
        int changed = 0;
        double[] change = new double[count];
        int left = 0;
        for (int n = 0; n < count; n++) {
            PathEnd first = ends.get(n);
            PathEnd second = outcome.ends().get(n);
            if (Destination.of(first) != Destination.of(second)) {
                changed++;
            } else if (first instanceof PathEnd.Left) {
                change[left++] = Math.abs(second.time() - first.time()) / second.time();
            }
        }
        return new Again(count, changed, Arrays.copyOf(change, left), outcome.steps());
    }
}
