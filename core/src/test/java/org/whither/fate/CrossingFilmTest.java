package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SplittableRandom;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.whither.film.Conditions;
import org.whither.film.ConservingFlow;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RadialCase;
import org.whither.film.Supply;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd.Border;
import org.whither.trace.TraceSettings;

/**
 * A Hele-Shaw film (no rotation, pressure flow alone; H. S. Hele-Shaw, Trans. Inst. Nav. Archit. 40, 1898) in which process
 * gas crosses between the feeds. Its mass flow comes from a stream function Ψ(θ): radial flow −Ψ′(θ) dθ inwards over every
 * ring inside the feed row, −Ψ′(θ) − s outwards beyond it, s the even flow of the feed. So what happens is known column by
 * column of the sector, at every height: where the flow beyond the feed runs inwards too, all of it crosses, and all the
 * supply gas goes inwards; elsewhere the process sends nothing, and the supply gas divides as the two flows do.
 */
class CrossingFilmTest {
    private static final int COLUMNS = 48;
    private static final int SECTORS = 10;
    private static final double SUPPLY = 3e-6;
    private static final FilmGrid GRID = RadialCase.grid(COLUMNS, RadialCase.radii(6, 5, 4e-4), SECTORS, 0.0);

    /** Flow inwards through a column inside the feed (kg/s), from the stream function. */
    private static double inward(int i) {
        return psi(i + 1) - psi(i);
    }

    private static double psi(int i) {
        double x = (double) i / COLUMNS;
        return SUPPLY * (0.9 * x + 0.95 / (2 * Math.PI) * Math.sin(2 * Math.PI * x) * 0.9);
    }

    private static double supply() {
        return SUPPLY / COLUMNS;
    }

    private static ConservingFlow flow() {
        double[] theta = new double[GRID.ni() * GRID.cellsRadial()];
        double[] radial = new double[COLUMNS * GRID.nj()];
        for (int i = 0; i < COLUMNS; i++) {
            for (int j = 0; j < GRID.nj(); j++) {
                radial[i * GRID.nj() + j] = GRID.radius(j) < RadialCase.FEED_RADIUS ? -inward(i) : supply() - inward(i);
            }
        }
        double[] pressure = new double[GRID.nodes()];
        Arrays.fill(pressure, 5e5);
        Film film = new Film(
                new Film.Heading("crossing", "stream function", ""),
                new Conditions(0, 1e5, 5e5, OptionalDouble.empty(), 300, "atmosphere", "process"),
                RadialCase.NITROGEN,
                GRID,
                RadialCase.flatFaces(GRID, Location.NODE),
                Frame.STATIONARY,
                Frame.STATIONARY,
                new LubricationField(Location.NODE, pressure, new MassFlows(theta, radial)),
                Optional.of(Supply.ofAnnulus(
                        GRID,
                        Face.STATOR,
                        new Supply.Annulus(RadialCase.FEED_RADIUS - 1e-5, RadialCase.FEED_RADIUS + 1e-5),
                        null)));
        return new ConservingFlow(film);
    }

    private static double sum(java.util.function.IntToDoubleFunction part) {
        return SECTORS * IntStream.range(0, COLUMNS).mapToDouble(part).sum();
    }

    private static void assertHolds(Interval interval, double known) {
        assertTrue(interval.low() <= known + 1e-12 && known - 1e-12 <= interval.high(), interval + " but " + known);
    }

    @Test
    void split_processGasCrosses_holdsWhatTheStreamFunctionTells() {
        ConservingFlow flow = flow();
        double supplyToInner = sum(i -> Math.max(0, Math.min(supply(), inward(i))));
        double supplyToOuter = sum(i -> Math.max(0, supply() - Math.max(0, inward(i))));
        double processToInner = sum(i -> Math.max(0, inward(i) - supply()));
        double innerIn = sum(i -> Math.max(0, -inward(i)));
        assertEquals(SECTORS * SUPPLY, supplyToInner + supplyToOuter, 1e-15);
        assertTrue(processToInner > 0.1 * SECTORS * SUPPLY && supplyToOuter > 0.1 * SECTORS * SUPPLY);
        assertEquals(0, innerIn, 0);
        for (double width : new double[] {0.02, 0.005}) {
            Split split = Split.of(
                    flow, new SplitSettings(Frame.STATIONARY, 1e-6, width, 3, 2, SplitSettings.MOST_TRACERS), x -> {});
            BorderBalance balance = split.balance();
            assertEquals(processToInner, balance.outerIn(), 1e-12 * balance.supplyIn());
            Interval inner =
                    split.row(Border.SUPPLY, Destination.INNER).orElseThrow().share();
            Interval outer =
                    split.row(Border.SUPPLY, Destination.OUTER).orElseThrow().share();
            Interval crossing =
                    split.row(Border.OUTER, Destination.INNER).orElseThrow().share();
            assertTrue(split.widthReached());
            assertHolds(inner, supplyToInner / balance.supplyIn());
            assertHolds(outer, supplyToOuter / balance.supplyIn());
            // Crossing gas creeps under the supply gas along the rotor; a little of it takes longer than the time
            // limit.
            Interval held = split.row(Border.OUTER, Destination.HELD)
                    .map(SplitRow::share)
                    .orElse(new Interval(0, 0, 0));
            assertTrue(held.share() < 0.015, held.toString());
            assertTrue(crossing.low() >= 1 - width - held.share() && crossing.high() + held.high() >= 1);
            // The other crossing is told although it has no gas, by its upper bound.
            SplitRow back = split.row(Border.OUTER, Destination.OUTER).orElseThrow();
            assertEquals(0, back.massFlow(), 1e-3 * balance.outerIn());
            assertTrue(back.share().high() > 0 && back.share().high() <= width);
            // A border over which nothing enters is left out.
            assertTrue(split.table().stream().noneMatch(row -> row.from().equals(Optional.of(Border.INNER))));
            // The border integral lies within what the intervals allow.
            double low = inner.low() * balance.supplyIn() + crossing.low() * balance.outerIn();
            double high =
                    inner.high() * balance.supplyIn() + Math.min(1, crossing.high() + held.high()) * balance.outerIn();
            assertTrue(low <= balance.innerOut() && balance.innerOut() <= high);
            for (SplitRow row : split.backwardTable()) {
                if (row.from().isPresent()) {
                    double origin = row.from().get() == Border.OUTER ? balance.outerIn() : balance.supplyIn();
                    double known = row.from().get() == Border.OUTER
                            ? 1
                            : (row.to() == Destination.INNER ? supplyToInner : supplyToOuter) / origin;
                    double leaving = row.to() == Destination.INNER ? balance.innerOut() : balance.outerOut();
                    double untraced = split.backwardTable().stream()
                            .filter(other -> other.from().isEmpty() && other.to() == row.to())
                            .mapToDouble(other -> other.share().high() * leaving / origin)
                            .sum();
                    assertTrue(row.share().low() <= known + 1e-12, row + " but " + known);
                    assertTrue(row.share().high() + untraced >= known - 1e-12, row + " but " + known);
                    assertTrue(untraced < 0.2);
                }
            }
            // No rotation: nothing turns, and gas leaves in the column in which it entered.
            assertEquals(
                    0,
                    split.row(Border.OUTER, Destination.INNER)
                            .orElseThrow()
                            .revolutions()
                            .orElseThrow()
                            .p90(),
                    1e-9);
        }
    }

    /** The releases stand for equal mass flows: so many of each column as its part of the inflow, columns of none left out. */
    @Test
    void at_pointsOfTheSquare_followTheInflow() {
        ConservingFlow flow = flow();
        ReleasePlan plan = ReleasePlan.entering(flow, Border.OUTER);
        SplittableRandom random = new SplittableRandom(9);
        int[] hits = new int[COLUMNS];
        int count = 20_000;
        for (int n = 0; n < count; n++) {
            double theta = plan.at(random.nextDouble(), random.nextDouble(), 1).theta();
            hits[(int) (theta / GRID.pitch() * COLUMNS)]++;
        }
        double all = sum(i -> Math.max(0, inward(i) - supply()));
        for (int i = 0; i < COLUMNS; i++) {
            double share = SECTORS * Math.max(0, inward(i) - supply()) / all;
            assertEquals(share, (double) hits[i] / count, 4.5 * Math.sqrt(share * (1 - share) / count));
        }
        assertEquals(all, plan.massFlow(), 1e-12 * all);
    }

    /** Released uniformly instead, 4096 tracers tell the same share within four standard deviations. */
    @Test
    void split_uniformRelease_agrees() {
        ConservingFlow flow = flow();
        ReleasePlan plan = ReleasePlan.entering(flow, Border.SUPPLY);
        SplittableRandom random = new SplittableRandom(10);
        var releases = IntStream.range(0, 4096)
                .mapToObj(n -> plan.at(random.nextDouble(), random.nextDouble(), 1))
                .toList();
        var ends = ParallelTracing.follow(
                        flow, new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-6, 1e3), releases, 2, n -> {})
                .ends();
        double share = ends.stream()
                        .filter(end -> Destination.of(end) == Destination.INNER)
                        .count()
                / 4096.0;
        double known = sum(i -> Math.max(0, Math.min(supply(), inward(i)))) / (SECTORS * SUPPLY);
        assertEquals(known, share, 4 * Math.sqrt(known * (1 - known) / 4096));
    }
}
