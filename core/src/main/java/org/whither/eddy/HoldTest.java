package org.whither.eddy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import org.whither.fate.BorderBalance;
import org.whither.fate.FilmMass;
import org.whither.fate.ReleasePlan;
import org.whither.fate.Split;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * Tells held gas from gas that goes through: what stays longer than {@code patience} median residences of the through-going
 * gas, both before and after, by the plain clock and by the {@link ProfileClock}.
 */
final class HoldTest {
    /** What became of a tracer that was released inside the film. */
    enum Stay {
        /** It comes and goes. */
        THROUGH,
        /** It stays long by the plain clock, but only because it lies close to a face. */
        CREEPING,
        /** It is held. */
        HELD,
        /** Its tracer could not be followed. */
        LOST
    }

    private static final int THROUGH_TRACERS = 4096;

    /** Gas that turns for long is followed at least so precisely: an error of a step adds up over its turns. */
    private static final double TOLERANCE = 1e-7;

    /** Part of the time that the profile clock must show; through-going gas passes in about one median by it. */
    private static final double CLOCK_PART = 0.25;

    private final FilmFlow flow;
    private final ProfileClock clock;
    private final EddySettings settings;
    private final Frame steady;
    private final double tolerance;
    private final List<Release> entering;
    private final List<PathEnd.Border> borders;
    private final double[] residence;
    private final double medianResidence;
    private final double filmMass;
    private final double[] massFlow = new double[PathEnd.Border.values().length];
    private int older;
    private long tracers;
    private long steps;
    private PathEnd.Failed failure;

    HoldTest(FilmFlow flow, EddySettings settings, BorderBalance balance) {
        this.flow = flow;
        this.clock = new ProfileClock(flow);
        this.settings = settings;
        this.steady = flow.film().steadyIn();
        this.tolerance = Math.min(settings.tolerance(), TOLERANCE);
        this.filmMass = FilmMass.of(flow);
        double longest = Split.PATIENCE * filmMass / balance.inflow();
        List<Release> throughGoing = new ArrayList<>();
        List<PathEnd.Border> over = new ArrayList<>();
        for (PathEnd.Border border : PathEnd.Border.values()) {
            ReleasePlan plan = ReleasePlan.entering(flow, border);
            massFlow[border.ordinal()] = plan.massFlow();
            double share = plan.massFlow() / balance.inflow();
            int count = (int) Math.round(share * Math.min(THROUGH_TRACERS, settings.budget() / 4));
            throughGoing.addAll(plan.releases(settings.seed(), 0, count));
            over.addAll(Collections.nCopies(throughGoing.size() - over.size(), border));
        }
        entering = List.copyOf(throughGoing);
        borders = List.copyOf(over);
        residence = follow(flow, settings.frame(), Direction.FORWARD, longest, entering).stream()
                .mapToDouble(end -> end instanceof PathEnd.Left ? end.time() : Double.POSITIVE_INFINITY)
                .toArray();
        medianResidence = median(residence);
    }

    private static double median(double[] values) {
        double[] sorted = values.clone();
        Arrays.sort(sorted);
        return sorted.length == 0 ? Double.NaN : 0.5 * (sorted[(sorted.length - 1) / 2] + sorted[sorted.length / 2]);
    }

    /** Where through-going gas enters, each release standing for the same mass flow. */
    List<Release> entering() {
        return entering;
    }

    /** Over which border one of them enters. */
    PathEnd.Border border(int n) {
        return borders.get(n);
    }

    /** How long each of them stays (s); infinite where it never left within 200 mean residences. */
    double[] residence() {
        return residence;
    }

    /** Median residence of the through-going gas (s); infinite where most of it never leaves. */
    double medianResidence() {
        return medianResidence;
    }

    /** Share of the film's gas that came in longer ago than the limit, by the residences of what enters alone. */
    Unflushed unflushed() {
        return Unflushed.of(filmMass, massFlow, borders, residence, limit());
    }

    /** How many of the releases last tested lie in gas that came in longer ago than the limit, or never. */
    int older() {
        return older;
    }

    /** Time after which gas counts as held (s). */
    double limit() {
        return settings.patience() * medianResidence;
    }

    long tracers() {
        return tracers;
    }

    long steps() {
        return steps;
    }

    /** Some tracer that could not be followed, or null. */
    PathEnd.Failed failure() {
        return failure;
    }

    /** What becomes of each of some releases. */
    Stay[] test(List<Release> releases) {
        Stay[] stays = new Stay[releases.size()];
        Arrays.fill(stays, Stay.HELD);
        sieve(flow, settings.frame(), Direction.BACKWARD, limit(), releases, stays, Stay.THROUGH);
        older = Collections.frequency(Arrays.asList(stays), Stay.HELD);
        sieve(flow, settings.frame(), Direction.FORWARD, limit(), releases, stays, Stay.THROUGH);
        for (Direction direction : Direction.values()) {
            sieve(clock, steady, direction, CLOCK_PART * limit(), releases, stays, Stay.CREEPING);
        }
        tracers += releases.size();
        return stays;
    }

    /** Where releases came from, followed back for a time. */
    List<PathEnd> back(List<Release> releases, double time) {
        return follow(flow, settings.frame(), Direction.BACKWARD, time, releases);
    }

    /** Error of a step with which held gas is followed. */
    double tolerance() {
        return tolerance;
    }

    private void sieve(
            FilmFlow by,
            Frame frame,
            Direction direction,
            double limit,
            List<Release> releases,
            Stay[] stays,
            Stay leaves) {
        List<Release> left = new ArrayList<>();
        for (int n = 0; n < stays.length; n++) {
            if (stays[n] == Stay.HELD) {
                left.add(releases.get(n));
            }
        }
        List<PathEnd> ends = follow(by, frame, direction, limit, left);
        int at = 0;
        for (int n = 0; n < stays.length; n++) {
            if (stays[n] == Stay.HELD) {
                PathEnd end = ends.get(at++);
                if (end instanceof PathEnd.Left) {
                    stays[n] = leaves;
                } else if (end instanceof PathEnd.Failed failed) {
                    stays[n] = Stay.LOST;
                    failure = failed;
                }
            }
        }
    }

    private List<PathEnd> follow(FilmFlow by, Frame frame, Direction direction, double limit, List<Release> releases) {
        if (releases.isEmpty()) {
            return List.of();
        }
        ParallelTracing.Outcome outcome = ParallelTracing.follow(
                by, new TraceSettings(frame, direction, tolerance, limit), releases, settings.threads(), n -> {});
        steps += outcome.steps();
        return outcome.ends();
    }
}
