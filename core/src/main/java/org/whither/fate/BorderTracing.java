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
 * <p>A {@link PatchMap} of the border, in which equal areas are equal mass flows, is refined until little flow is
 * unsettled. Then random points are followed, one in each of many equal parts of the area. They check the settled
 * patches, and since each stands for the same mass flow they also give times and turns without bias. Where the checks
 * find too many wrong patches, the map is mended and checked once more with fresh points. The two rounds have the chances
 * {@code CONFIDENCE}, which together make 95 %.
 */
final class BorderTracing {
    /** Chances of the bounds of the first and the second round of checks: 1 − 0.04 − 0.01 = 0.95. */
    private static final double[] CONFIDENCE = {0.96, 0.99};
    /** Normal deviates of those chances, one-sided. */
    private static final double[] DEVIATE = {1.750686, 2.326348};

    /** The part of the wanted width that what is unsettled may take up, at least and at most. */
    private static final double LEAST_PART = 0.25;

    private static final double MOST_PART = 0.65;
    private static final double LAST_PART = 0.02;
    private static final int FEWEST_CHECKS = 1024;
    private static final int CHECKS_AT_ONCE = 256;
    /** Parts of the budget up to which the map may be made, mended, and its first mesh made. */
    private static final double MAP_PART = 0.6;

    private static final double MENDING_PART = 0.9;
    private static final double MESH_PART = 0.2;
    private static final int SCOUTS = 32;
    private static final int COARSEST = 4;
    private static final int EDGE_SCOUTS = 64;
    private static final double EDGE_REACH = 0.01;
    private static final int FATES = Destination.values().length;

    private final FilmFlow flow;
    private final ReleasePlan plan;
    private final PathEnd.Border border;
    private final Direction direction;
    private final SplitSettings settings;
    private final TraceSettings how;
    private final SplittableRandom random;
    private final DoubleConsumer progress;
    private final double shift;
    private final double edge;

    private final double[] shortest = new double[FATES];
    private long tracers;
    private long steps;
    private PathEnd.Failed failure;

    private PatchMap map;
    private int checks;
    private int wrong;
    private double missedBound = 1;
    private boolean reached;
    private double[] estimate;

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
        this.progress = progress;
        this.shift = random.nextDouble();
        // Gas on a face never leaves: the outermost corners are taken a little inside.
        this.edge = settings.width() / 50;
        Arrays.fill(shortest, Double.POSITIVE_INFINITY);
        run();
    }

    private void run() {
        map = new PatchMap(this::fates, FATES, mesh(), random.split());
        scoutEdges();
        double width = settings.width();
        refine(MOST_PART * width, MAP_PART);
        double target = cheapestPart() * width;
        refine(target, MAP_PART);
        for (int round = 0; round < CONFIDENCE.length; round++) {
            check(checksFor(width, round), CONFIDENCE[round]);
            // What the checks found wrong is mended; the bound stays that of the map as it was. A finer map makes up
            // for a somewhat larger bound, a second round for a much larger one.
            double left = width - 2 * missedBound;
            boolean last = round == CONFIDENCE.length - 1;
            refine(left >= 0.5 * target ? left : last ? Math.max(left, LAST_PART * width) : target, MENDING_PART);
            reached = unsettled() + 2 * missedBound <= width;
            if (reached || !mayGoOn(1)) {
                break;
            }
        }
        estimate = map.estimate();
        reached = Arrays.stream(Destination.values())
                .allMatch(fate -> interval(fate).width() <= width);
        progress.accept(1);
    }

    /** Patches along a side of the first mesh: fewer where a few scouts tell that it would cost too much. */
    private int mesh() {
        double[][] points = stratified(SCOUTS, random);
        fates(points[0], points[1]);
        int mesh = PatchMap.MESH;
        while (mesh > COARSEST && 3.0 * mesh * mesh * steps / SCOUTS > MESH_PART * mostSteps()) {
            mesh /= 2;
        }
        return mesh;
    }

    /**
     * Puts more points near both ends of v into the first mesh: beside the edge of a feed, or a face, there are narrow
     * pockets of gas that is held or goes another way.
     */
    private void scoutEdges() {
        double[] u = new double[2 * EDGE_SCOUTS];
        double[] v = new double[u.length];
        for (int n = 0; n < u.length; n++) {
            u[n] = (n / 2 + random.nextDouble()) / EDGE_SCOUTS;
            double near = edge * Math.pow(EDGE_REACH / edge, random.nextDouble());
            v[n] = n % 2 == 0 ? near : 1 - near;
        }
        if (edge < EDGE_REACH && mayGoOn(MAP_PART)) {
            map.place(u, v, fates(u, v));
        }
    }

    /** Gas followed back only confirms what the gas followed forward told: it may cost half as much. */
    private long mostSteps() {
        return settings.mostSteps() / (direction == Direction.FORWARD ? 1 : 2);
    }

    /**
     * The part of the wanted width to leave to what is unsettled so that map and checks together cost least. The map
     * costs c/U tracers for an unsettled part U, c being known from the tracers it took so far; the checks cost z²/B for a
     * bound B of what was missed, which counts below and above the share: U + 2B is the width.
     */
    private double cheapestPart() {
        double ofMap = Math.sqrt(Math.max(0, map.points() - map.firstPoints()) * map.mixed());
        double ofChecks = Math.sqrt(2) * DEVIATE[0];
        return Math.max(LEAST_PART, Math.min(MOST_PART, ofMap / (ofMap + ofChecks)));
    }

    /**
     * Checks of a round: so many that Wilson's bound leaves the wanted width where none is wrong, z²/(N + z²); in the second
     * round also where one is, for there the first has shown that some gas is easily missed.
     */
    private int checksFor(double width, int round) {
        double bound = 0.5 * Math.max(width - unsettled(), LEAST_PART * width);
        double square = DEVIATE[round] * DEVIATE[round];
        int number = (int) Math.min(settings.mostTracers(), Math.ceil(square * (1 / bound - 1)));
        while (round > 0
                && number < settings.mostTracers()
                && Interval.upperBound(1, number, CONFIDENCE[round]) > bound) {
            number += 1 + number / 16;
        }
        return Math.max(FEWEST_CHECKS, number);
    }

    private boolean mayGoOn(double part) {
        return tracers < part * settings.mostTracers() && steps < part * mostSteps();
    }

    private void refine(double target, double part) {
        double start = Math.max(map.mixed(), 2 * target);
        map.refine(target, () -> {
            progress.accept(0.5
                    * Math.min(
                            1, Math.max(0, Math.log(start / map.mixed()) / Math.log(start / Math.max(1e-9, target)))));
            return mayGoOn(part);
        });
    }

    // ---- tracers of the map ----------------------------------------------------------------------------------------

    private int[] fates(double[] u, double[] v) {
        List<Release> batch = new ArrayList<>(u.length);
        for (int n = 0; n < u.length; n++) {
            batch.add(release(u[n], Math.max(edge, Math.min(1 - edge, v[n])), 0));
        }
        ParallelTracing.Outcome outcome = ParallelTracing.follow(flow, how, batch, settings.threads(), n -> {});
        steps += outcome.steps();
        return note(outcome.ends());
    }

    private Release release(double u, double v, double massFlow) {
        double turned = u + shift;
        return plan.at(turned - Math.floor(turned), v, massFlow);
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

    // ---- random checks ---------------------------------------------------------------------------------------------

    private void check(int wanted, double confidence) {
        double[][] points = stratified(wanted, random);
        int all = points[0].length;
        double each = plan.massFlow() / all;
        int wrongNow = 0;
        int done = 0;
        List<double[]> us = new ArrayList<>();
        List<double[]> vs = new ArrayList<>();
        List<int[]> fates = new ArrayList<>();
        while (done < all && mayGoOn(1)) {
            int count = Math.min(CHECKS_AT_ONCE, all - done);
            double[] u = Arrays.copyOfRange(points[0], done, done + count);
            double[] v = Arrays.copyOfRange(points[1], done, done + count);
            List<Release> batch = new ArrayList<>(count);
            for (int n = 0; n < count; n++) {
                batch.add(release(u[n], v[n], each));
            }
            ParallelTracing.Measured measured = ParallelTracing.measure(flow, how, batch, settings.threads(), n -> {});
            steps += measured.outcome().steps();
            stepsOfChecks += measured.outcome().steps();
            us.add(u);
            vs.add(v);
            fates.add(note(measured.outcome().ends()));
            releases.addAll(batch);
            ends.addAll(measured.outcome().ends());
            measures.addAll(measured.measures());
            done += count;
            progress.accept(0.5 + 0.5 * done / all);
        }
        // Only now: a check must not mend the map that the next one checks.
        for (int n = 0; n < us.size(); n++) {
            wrongNow += map.countWrong(us.get(n), vs.get(n), fates.get(n));
        }
        for (int n = 0; n < us.size(); n++) {
            map.place(us.get(n), vs.get(n), fates.get(n));
        }
        checks += done;
        wrong += wrongNow;
        missedBound = Math.min(missedBound, Interval.upperBound(wrongNow, done, confidence));
    }

    /** At least so many points, one at random in each of as many equal rectangles of the unit square, in random order. */
    static double[][] stratified(int wanted, SplittableRandom random) {
        // Finer along v, along which times differ most: across the film.
        int rows = (int) Math.ceil(Math.sqrt(4.0 * wanted));
        int columns = (wanted + rows - 1) / rows;
        int count = rows * columns;
        int[] order = new int[count];
        for (int n = 0; n < count; n++) {
            int other = random.nextInt(n + 1);
            order[n] = order[other];
            order[other] = n;
        }
        double[][] points = new double[2][count];
        for (int n = 0; n < count; n++) {
            points[0][n] = (order[n] / rows + random.nextDouble()) / columns;
            points[1][n] = (order[n] % rows + random.nextDouble()) / rows;
        }
        return points;
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
        return reached;
    }

    /** Share of the flow whose fate is not settled. */
    double unsettled() {
        return map.mixed() + map.settled(Destination.LOST.ordinal());
    }

    double estimate(Destination fate) {
        return estimate[fate.ordinal()];
    }

    Interval interval(Destination fate) {
        return Interval.ofMap(estimate(fate), map.settled(fate.ordinal()), unsettled(), missedBound);
    }

    BorderMap facts() {
        return new BorderMap(
                border,
                direction,
                plan.massFlow(),
                map.patches(),
                tracers - checks,
                checks,
                wrong,
                unsettled(),
                missedBound,
                steps,
                reached);
    }

    Optional<PathEnd.Failed> failure() {
        return Optional.ofNullable(failure);
    }

    /** The checks as points with their ends, in random order. */
    List<FedPoint> points(int most) {
        List<FedPoint> points = new ArrayList<>();
        for (int n = 0; n < Math.min(most, ends.size()); n++) {
            points.add(new FedPoint(releases.get(n), ends.get(n)));
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
