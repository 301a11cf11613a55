package org.whither.fate;

import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.SplittableRandom;
import java.util.function.DoubleConsumer;
import org.whither.film.FilmFlow;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * Where the gas of a film goes: its table of origins and destinations, forward from where gas enters, backward from where
 * it leaves, and the balance of the borders, which no tracer has a part in.
 *
 * @param table forward, a row for each pair that has gas
 * @param backwardTable backward, likewise; an empty origin stands for gas that was not traced back to a border
 * @param balance border flows
 * @param fed where each point of the feed sends its gas
 * @param heldShare share of all entering gas that was still inside at the time limit
 * @param lostShare share of all entering gas whose tracers could not be integrated
 * @param widthReached whether every interval is as narrow as wanted
 * @param timeLimit time after which gas counted as held (s)
 * @param filmMass mass of the gas in the film (kg)
 * @param tracers tracers followed
 * @param steps integration steps kept
 * @param notes what a user must know of it, a sentence each
 */
public record Split(
        List<SplitRow> table,
        List<SplitRow> backwardTable,
        BorderBalance balance,
        List<FedPoint> fed,
        double heldShare,
        double lostShare,
        boolean widthReached,
        double timeLimit,
        double filmMass,
        long tracers,
        long steps,
        List<String> notes) {

    /** Times the mean residence after which a tracer counts as held. */
    public static final double PATIENCE = 200;

    private static final int REPLICATES = 16;
    private static final int FIRST_SIZE = 32;
    /** Steps a leg may use: where much gas is held, tracers go round until the time limit. */
    private static final long MOST_STEPS = 100_000_000;

    private static final double NEGLIGIBLE = 1e-9;

    /**
     * Finds the split.
     *
     * @param flow the motion of the gas
     * @param settings how
     * @param progress told the part done, 0 … 1, from any thread
     * @return the split
     * @throws IllegalArgumentException where no gas enters the film at all
     */
    public static Split of(FilmFlow flow, SplitSettings settings, DoubleConsumer progress) {
        BorderBalance balance = BorderBalance.of(flow);
        if (!(balance.inflow() > 0)) {
            throw new IllegalArgumentException(
                    "no gas enters the film over any border; expected inflow through the feed or over a diameter");
        }
        double filmMass = FilmMass.of(flow);
        double timeLimit = PATIENCE * filmMass / balance.inflow();
        List<SplitRow> table = new ArrayList<>();
        List<SplitRow> backwardTable = new ArrayList<>();
        List<FedPoint> fed = new ArrayList<>();
        List<String> notes = new ArrayList<>();
        Tally whole = new Tally();

        Map<PathEnd.Border, Double> inflow = new EnumMap<>(PathEnd.Border.class);
        inflow.put(PathEnd.Border.SUPPLY, balance.supplyIn());
        inflow.put(PathEnd.Border.INNER, balance.innerIn());
        inflow.put(PathEnd.Border.OUTER, balance.outerIn());
        List<Leg> legs = new ArrayList<>();
        for (PathEnd.Border border : List.of(PathEnd.Border.SUPPLY, PathEnd.Border.OUTER, PathEnd.Border.INNER)) {
            legs.add(new Leg(border, Direction.FORWARD, ReleasePlan.entering(flow, border)));
        }
        for (PathEnd.Border border : List.of(PathEnd.Border.INNER, PathEnd.Border.OUTER, PathEnd.Border.SUPPLY)) {
            legs.add(new Leg(border, Direction.BACKWARD, ReleasePlan.leaving(flow, border)));
        }
        legs.removeIf(leg -> leg.plan().massFlow() <= NEGLIGIBLE * balance.inflow());

        SplittableRandom seeds = new SplittableRandom(settings.seed());
        for (int n = 0; n < legs.size(); n++) {
            Leg leg = legs.get(n);
            double done = (double) n / legs.size();
            double part = 1.0 / legs.size();
            Followed followed =
                    follow(flow, leg, settings, timeLimit, seeds.split(), x -> progress.accept(done + part * x));
            whole.tracers += followed.ends().size();
            whole.steps += followed.steps();
            whole.narrow &= followed.narrow();
            double flowOfLeg = leg.plan().massFlow();
            if (leg.direction() == Direction.FORWARD) {
                rows(leg, followed, table);
                whole.held += flowOfLeg * followed.share(Destination.HELD);
                whole.lost += flowOfLeg * followed.share(Destination.LOST);
                if (leg.border() == PathEnd.Border.SUPPLY) {
                    for (int m = 0; m < followed.ends().size(); m++) {
                        fed.add(new FedPoint(
                                followed.releases().get(m), followed.ends().get(m)));
                    }
                }
            } else {
                backwardRows(leg, followed, inflow, backwardTable);
            }
            firstFailure(followed).ifPresent(end -> notes.add(lost(leg, end)));
        }
        progress.accept(1);
        return new Split(
                List.copyOf(table),
                List.copyOf(backwardTable),
                balance,
                List.copyOf(fed),
                whole.held / balance.inflow(),
                whole.lost / balance.inflow(),
                whole.narrow,
                timeLimit,
                filmMass,
                whole.tracers,
                whole.steps,
                List.copyOf(notes));
    }

    /** The row of a pair, where it has gas. */
    public Optional<SplitRow> row(PathEnd.Border from, Destination to) {
        return table.stream()
                .filter(row -> row.from().equals(Optional.of(from)) && row.to() == to)
                .findFirst();
    }

    // ---- one origin or destination ---------------------------------------------------------------------------------

    private record Leg(PathEnd.Border border, Direction direction, ReleasePlan plan) {}

    private static final class Tally {
        private long tracers;
        private long steps;
        private double held;
        private double lost;
        private boolean narrow = true;
    }

    /** The tracers of one leg, replicate after replicate within each doubling. */
    private record Followed(
            List<Release> releases, List<PathEnd> ends, List<Integer> replicate, int size, long steps, boolean narrow) {

        Interval interval(Destination destination) {
            int[] hits = new int[REPLICATES];
            for (int n = 0; n < ends.size(); n++) {
                if (Destination.of(ends.get(n)) == destination) {
                    hits[replicate.get(n)]++;
                }
            }
            return Interval.ofReplicates(hits, size);
        }

        double share(Destination destination) {
            return interval(destination).share();
        }
    }

    private static Followed follow(
            FilmFlow flow,
            Leg leg,
            SplitSettings settings,
            double timeLimit,
            SplittableRandom random,
            DoubleConsumer progress) {
        TraceSettings how = new TraceSettings(settings.frame(), leg.direction(), settings.tolerance(), timeLimit);
        long[] seeds = random.longs(REPLICATES).toArray();
        List<Release> releases = new ArrayList<>();
        List<PathEnd> ends = new ArrayList<>();
        List<Integer> replicate = new ArrayList<>();
        long steps = 0;
        int size = 0;
        while (true) {
            int more = size == 0 ? FIRST_SIZE : size;
            List<Release> batch = new ArrayList<>();
            for (int n = 0; n < REPLICATES; n++) {
                batch.addAll(leg.plan().releases(seeds[n], size, more));
                for (int m = 0; m < more; m++) {
                    replicate.add(n);
                }
            }
            double doneBefore = Math.min(0.9, (double) size / (size + 4.0 * FIRST_SIZE));
            ParallelTracing.Outcome outcome = ParallelTracing.follow(
                    flow,
                    how,
                    batch,
                    settings.threads(),
                    count -> progress.accept(doneBefore + (1 - doneBefore) * 0.5 * count / batch.size()));
            releases.addAll(batch);
            ends.addAll(outcome.ends());
            steps += outcome.steps();
            size += more;
            Followed followed = new Followed(releases, ends, replicate, size, steps, true);
            boolean narrow = true;
            for (Destination destination : Destination.values()) {
                narrow &= followed.interval(destination).width() <= settings.width();
            }
            if (narrow) {
                return followed;
            }
            if (2L * size * REPLICATES > settings.mostTracers() || 2 * steps > MOST_STEPS) {
                return new Followed(releases, ends, replicate, size, steps, false);
            }
        }
    }

    private static void rows(Leg leg, Followed followed, List<SplitRow> table) {
        for (Destination destination : Destination.values()) {
            boolean through = destination == Destination.INNER || destination == Destination.OUTER;
            Interval interval = followed.interval(destination);
            // Whether gas crosses the film is always told, with its upper bound where none was found to.
            boolean crossing = through && leg.border() != PathEnd.Border.SUPPLY;
            if (destination == Destination.LOST || (interval.share() == 0 && !crossing)) {
                continue;
            }
            table.add(row(Optional.of(leg.border()), destination, leg, followed, interval, interval));
        }
    }

    private static void backwardRows(
            Leg leg, Followed followed, Map<PathEnd.Border, Double> inflow, List<SplitRow> table) {
        Destination to = Destination.of(new PathEnd.Left(leg.border(), 0, null));
        for (Destination origin : Destination.values()) {
            Interval ofLeaving = followed.interval(origin);
            if (origin == Destination.LOST || ofLeaving.share() == 0) {
                continue;
            }
            Optional<PathEnd.Border> from =
                    origin == Destination.HELD ? Optional.empty() : Optional.of(PathEnd.Border.valueOf(origin.name()));
            // A share of the leaving gas, told as a share of the gas of its origin.
            double scale =
                    from.isPresent() && inflow.get(from.get()) > 0 ? leg.plan().massFlow() / inflow.get(from.get()) : 1;
            Interval ofOrigin =
                    new Interval(ofLeaving.share() * scale, ofLeaving.low() * scale, ofLeaving.high() * scale);
            SplitRow row = row(from, origin, leg, followed, ofLeaving, ofOrigin);
            table.add(new SplitRow(row.from(), to, row.massFlow(), ofOrigin, row.residenceTime(), row.revolutions()));
        }
    }

    private static SplitRow row(
            Optional<PathEnd.Border> from,
            Destination found,
            Leg leg,
            Followed followed,
            Interval ofLeg,
            Interval told) {
        List<PathEnd> all = followed.ends();
        int[] those = java.util.stream.IntStream.range(0, all.size())
                .filter(n -> Destination.of(all.get(n)) == found)
                .toArray();
        Optional<Quantiles> residence = Optional.empty();
        Optional<Quantiles> revolutions = Optional.empty();
        if (those.length > 0 && found != Destination.HELD && found != Destination.LOST) {
            double[] times = new double[those.length];
            double[] turns = new double[those.length];
            for (int n = 0; n < those.length; n++) {
                PathEnd end = all.get(those[n]);
                times[n] = end.time();
                double turned = end.position().stationaryTheta()
                        - followed.releases().get(those[n]).theta();
                turns[n] = leg.direction().sign() * turned / (2 * Math.PI);
            }
            residence = Optional.of(Quantiles.of(times));
            revolutions = Optional.of(Quantiles.of(turns));
        }
        return new SplitRow(from, found, leg.plan().massFlow() * ofLeg.share(), told, residence, revolutions);
    }

    private static Optional<PathEnd.Failed> firstFailure(Followed followed) {
        return followed.ends().stream()
                .filter(end -> end instanceof PathEnd.Failed)
                .map(PathEnd.Failed.class::cast)
                .findFirst();
    }

    private static String lost(Leg leg, PathEnd.Failed end) {
        return String.format(
                java.util.Locale.ROOT,
                "A tracer released at the %s could not be followed beyond r = %.4f mm, θ = %.5f rad, σ = %.4f: %s.",
                leg.border() == PathEnd.Border.SUPPLY
                        ? "feed"
                        : leg.border().name().toLowerCase(java.util.Locale.ROOT) + " diameter",
                1000 * end.position().radius(),
                end.position().theta(),
                end.position().sigma(),
                end.reason());
    }
}
