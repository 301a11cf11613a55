package org.whither.fate;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.EnumMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.SplittableRandom;
import java.util.function.DoubleConsumer;
import org.whither.film.Correction;
import org.whither.film.FilmFlow;
import org.whither.trace.Direction;
import org.whither.trace.PathEnd;

/**
 * Where the gas of a film goes: its table of origins and destinations, forward from where gas enters, backward from where
 * it leaves, and the balance of the borders, which no tracer has a part in.
 *
 * @param table forward, a row for each pair that has gas
 * @param backwardTable backward, likewise; an empty origin stands for gas that was not traced back to a border
 * @param balance border flows
 * @param fed where points of the feed send their gas, of equal mass flow and in random order
 * @param heldShare share of all entering gas that was still inside at the time limit
 * @param lostShare share of all entering gas whose tracers could not be integrated
 * @param unsettledShare share of all entering gas in patches whose fate is not settled
 * @param widthReached whether every interval of the forward table is as narrow as wanted
 * @param maps how the map of each border came out
 * @param uncertainty what the shares are uncertain by
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
        double unsettledShare,
        boolean widthReached,
        List<BorderMap> maps,
        Uncertainty uncertainty,
        double timeLimit,
        double filmMass,
        long tracers,
        long steps,
        List<String> notes) {

    /** Times the mean residence after which a tracer counts as held. */
    public static final double PATIENCE = 200;

    /** A border flow below this share of all inflow counts as none. */
    public static final double NEGLIGIBLE = 1e-9;

    private static final int MOST_FED_POINTS = 3072;
    private static final int AGAIN = 256;

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
        List<Leg> legs = new ArrayList<>();
        for (PathEnd.Border border : List.of(PathEnd.Border.SUPPLY, PathEnd.Border.OUTER, PathEnd.Border.INNER)) {
            legs.add(new Leg(border, Direction.FORWARD, ReleasePlan.entering(flow, border)));
        }
        for (PathEnd.Border border : List.of(PathEnd.Border.INNER, PathEnd.Border.OUTER, PathEnd.Border.SUPPLY)) {
            legs.add(new Leg(border, Direction.BACKWARD, ReleasePlan.leaving(flow, border)));
        }
        legs.removeIf(leg -> leg.plan().massFlow() <= NEGLIGIBLE * balance.inflow());

        SplittableRandom seeds = new SplittableRandom(settings.seed());
        Gathered gathered = new Gathered(balance, settings);
        for (int n = 0; n < legs.size(); n++) {
            Leg leg = legs.get(n);
            double done = (double) n / legs.size();
            double part = 1.0 / legs.size();
            gathered.add(new BorderTracing(
                    flow,
                    leg.plan(),
                    leg.border(),
                    leg.direction(),
                    settings,
                    timeLimit,
                    seeds.split(),
                    x -> progress.accept(done + part * x)));
        }
        progress.accept(1);
        return new Split(
                List.copyOf(gathered.table),
                List.copyOf(gathered.backwardTable),
                balance,
                List.copyOf(gathered.fed),
                gathered.held / balance.inflow(),
                gathered.lost / balance.inflow(),
                gathered.unsettled / balance.inflow(),
                gathered.narrow,
                List.copyOf(gathered.maps),
                gathered.uncertainty(flow),
                timeLimit,
                filmMass,
                gathered.tracers,
                gathered.steps,
                List.copyOf(gathered.notes));
    }

    /** The row of a pair, where it has gas. */
    public Optional<SplitRow> row(PathEnd.Border from, Destination to) {
        return table.stream()
                .filter(row -> row.from().equals(Optional.of(from)) && row.to() == to)
                .findFirst();
    }

    // ---- one border after another ----------------------------------------------------------------------------------

    private record Leg(PathEnd.Border border, Direction direction, ReleasePlan plan) {}

    /** What the borders told so far. */
    private static final class Gathered {
        private final BorderBalance balance;
        private final Map<PathEnd.Border, Double> inflow = new EnumMap<>(PathEnd.Border.class);
        private final double otherTolerance;
        private final List<SplitRow> table = new ArrayList<>();
        private final List<SplitRow> backwardTable = new ArrayList<>();
        private final List<FedPoint> fed = new ArrayList<>();
        private final List<BorderMap> maps = new ArrayList<>();
        private final List<String> notes = new ArrayList<>();
        private final List<double[]> residenceChanges = new ArrayList<>();
        private int again;
        private double changedFlow;
        private double widest;
        private long tracers;
        private long steps;
        private double held;
        private double lost;
        private double unsettled;
        private boolean narrow = true;

        Gathered(BorderBalance balance, SplitSettings settings) {
            this.balance = balance;
            inflow.put(PathEnd.Border.SUPPLY, balance.supplyIn());
            inflow.put(PathEnd.Border.INNER, balance.innerIn());
            inflow.put(PathEnd.Border.OUTER, balance.outerIn());
            otherTolerance = settings.tolerance() >= 1e-11 ? settings.tolerance() / 10 : 10 * settings.tolerance();
        }

        void add(BorderTracing found) {
            tracers += found.tracers();
            steps += found.steps();
            maps.add(found.facts());
            if (found.direction() == Direction.FORWARD) {
                narrow &= found.reached();
                rows(found);
                held += found.massFlow() * found.estimate(Destination.HELD);
                lost += found.massFlow() * found.estimate(Destination.LOST);
                unsettled += found.massFlow() * found.unsettled();
                for (Destination destination : Destination.values()) {
                    widest = Math.max(widest, found.interval(destination).width());
                }
                if (found.border() == PathEnd.Border.SUPPLY) {
                    fed.addAll(found.points(MOST_FED_POINTS));
                }
                BorderTracing.Again other = found.again(otherTolerance, AGAIN);
                again += other.tracers();
                tracers += other.tracers();
                steps += other.steps();
                if (other.tracers() > 0) {
                    changedFlow += found.massFlow() * other.changed() / other.tracers();
                }
                residenceChanges.add(other.residence());
            } else {
                backwardRows(found);
            }
            found.failure().ifPresent(end -> notes.add(lost(found.border(), end)));
        }

        private void rows(BorderTracing found) {
            for (Destination destination : Destination.values()) {
                boolean through = destination == Destination.INNER || destination == Destination.OUTER;
                // Whether gas crosses the film is always told, with its upper bound where none was found to.
                boolean crossing = through && found.border() != PathEnd.Border.SUPPLY;
                if (destination != Destination.LOST && (found.estimate(destination) > 0 || crossing)) {
                    table.add(found.row(
                            Optional.of(found.border()), destination, destination, found.interval(destination)));
                }
            }
        }

        private void backwardRows(BorderTracing found) {
            Destination to = Destination.of(new PathEnd.Left(found.border(), 0, null));
            for (Destination origin : Destination.values()) {
                if (origin == Destination.LOST || found.estimate(origin) == 0) {
                    continue;
                }
                Optional<PathEnd.Border> from = origin == Destination.HELD
                        ? Optional.empty()
                        : Optional.of(PathEnd.Border.valueOf(origin.name()));
                // A share of the leaving gas, told as a share of the gas of its origin.
                double scale =
                        from.isPresent() && inflow.get(from.get()) > 0 ? found.massFlow() / inflow.get(from.get()) : 1;
                backwardTable.add(
                        found.row(from, to, origin, found.interval(origin).times(scale)));
            }
        }

        Uncertainty uncertainty(FilmFlow flow) {
            double[] changes =
                    residenceChanges.stream().flatMapToDouble(Arrays::stream).toArray();
            double median =
                    changes.length == 0 ? Double.NaN : Quantiles.of(changes).p50();
            return new Uncertainty(
                    new Uncertainty.Integration(
                            otherTolerance, again, again > 0 ? changedFlow / balance.inflow() : Double.NaN, median),
                    widest,
                    Math.abs(BorderBalance.closureOfField(flow, balance)),
                    flow.correction().stream().mapToDouble(Correction::share).findFirst());
        }
    }

    private static String lost(PathEnd.Border border, PathEnd.Failed end) {
        return String.format(
                Locale.ROOT,
                "A tracer released at the %s could not be followed beyond r = %.4f mm, θ = %.5f rad, σ = %.4f: %s.",
                border == PathEnd.Border.SUPPLY ? "feed" : border.name().toLowerCase(Locale.ROOT) + " diameter",
                1000 * end.position().radius(),
                end.position().theta(),
                end.position().sigma(),
                end.reason());
    }
}
