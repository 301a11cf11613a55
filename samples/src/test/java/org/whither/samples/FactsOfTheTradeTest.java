package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.FilmMass;
import org.whither.fate.ReleasePlan;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.LubricationField;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/**
 * What the trade knows of the gas in a spiral-groove film, on the demo seal. Every check here is of common practice, not
 * of a published figure.
 */
class FactsOfTheTradeTest {
    private static FilmFlow flow;
    private static FilmGrid grid;
    private static TraceSettings settings;

    @BeforeAll
    static void solve() {
        flow = FilmFlow.of(SampleSeals.compute("spiral", null, new GridSize(32, 56), x -> {})
                .film());
        grid = flow.film().grid();
        double limit = 200 * FilmMass.of(flow) / BorderBalance.of(flow).inflow();
        settings = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, limit);
    }

    /** Common practice: seen from the rotor, gas near the rotor is slow and gas near the stator fast. */
    @Test
    void speed_seenFromTheRotor_growsTowardsTheStator() {
        double[] rates = new double[3];
        int slower = 0;
        int cells = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                flow.rates(i, j, 0, theta, r, 0.05, rates);
                double nearRotor = Math.hypot(r * rates[0], rates[1]);
                flow.rates(i, j, 0, theta, r, 0.95, rates);
                double nearStator = Math.hypot(r * rates[0], rates[1]);
                assertTrue(nearStator > 0.8 * 1250 * 0.05, "near the stator the gas keeps up with it");
                slower += nearRotor < 0.5 * nearStator ? 1 : 0;
                cells++;
            }
        }
        assertTrue(slower > 0.95 * cells, slower + " of " + cells);
    }

    /** Common practice: axial velocities are tiny beside the others. */
    @Test
    void velocity_alongTheShaft_isTiny() {
        double[] rates = new double[3];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                flow.rates(i, j, 0, theta, r, 0.6, rates);
                double along = Math.hypot(r * rates[0], rates[1]);
                double across = Math.abs(rates[2]) * flow.thickness(i, j, theta, r);
                assertTrue(across < 0.05 * along, across + " m/s against " + along + " m/s");
            }
        }
    }

    /**
     * Common practice: gas fed inside the dividing circle of the feed goes to the inner diameter, outside it to the outer.
     * With grooves the circle is a wavy line: at each angle one radius parts the two.
     */
    @Test
    void feed_dividingLine_partsInnerFromOuter() {
        List<Release> releases =
                ReleasePlan.entering(flow, PathEnd.Border.SUPPLY).releases(1, 0, 2048);
        List<PathEnd> ends =
                ParallelTracing.follow(flow, settings, releases, 2, n -> {}).ends();
        int bins = 24;
        List<List<Integer>> byAngle = new ArrayList<>();
        for (int n = 0; n < bins; n++) {
            byAngle.add(new ArrayList<>());
        }
        for (int n = 0; n < releases.size(); n++) {
            double phase = releases.get(n).theta() / grid.pitch();
            byAngle.get((int) Math.floor((phase - Math.floor(phase)) * bins)).add(n);
        }
        int misplaced = 0;
        for (List<Integer> bin : byAngle) {
            bin.sort(Comparator.comparingDouble(n -> releases.get(n).radius()));
            long inner = bin.stream()
                    .filter(n -> Destination.of(ends.get(n)) == Destination.INNER)
                    .count();
            for (int n = 0; n < bin.size(); n++) {
                Destination expected = n < inner ? Destination.INNER : Destination.OUTER;
                misplaced += Destination.of(ends.get(bin.get(n))) == expected ? 0 : 1;
            }
        }
        // Within a bin the line itself leans a little.
        assertTrue(misplaced < 0.06 * releases.size(), misplaced + " of " + releases.size());
        assertEquals(Destination.INNER, destination(releases, ends, Comparator.comparingDouble(Release::radius)));
        assertEquals(
                Destination.OUTER,
                destination(
                        releases,
                        ends,
                        Comparator.comparingDouble(Release::radius).reversed()));
    }

    private static Destination destination(List<Release> releases, List<PathEnd> ends, Comparator<Release> order) {
        Release first = releases.stream().min(order).orElseThrow();
        return Destination.of(ends.get(releases.indexOf(first)));
    }

    /** Common practice: the grooves' effect on a path is strongest near the grooved face. */
    @Test
    void direction_nearTheGroovedFace_variesMostWithTheGrooves() {
        assertTrue(swing(0.15) > 3 * swing(0.85), swing(0.15) + " rad against " + swing(0.85) + " rad");
    }

    /** Spread over a groove pitch of the direction in which gas moves at a height, in the grooved rows (rad). */
    private static double swing(double sigma) {
        double[] rates = new double[3];
        double sum = 0;
        int rows = 0;
        for (int j = 0; j < grid.cellsRadial(); j++) {
            double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
            if (r < 0.0565 || r > 0.0610) {
                continue;
            }
            double low = Double.POSITIVE_INFINITY;
            double high = Double.NEGATIVE_INFINITY;
            for (int i = 0; i < grid.cellsTheta(); i++) {
                double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                flow.rates(i, j, 0, theta, r, sigma, rates);
                double angle = Math.atan2(rates[1], -r * rates[0]);
                low = Math.min(low, angle);
                high = Math.max(high, angle);
            }
            sum += high - low;
            rows++;
        }
        return sum / rows;
    }

    /** Common practice: pressure peaks where grooves end at the dam. */
    @Test
    void pressure_highest_whereGroovesEndAtTheDam() {
        LubricationField field = (LubricationField) flow.film().field();
        int best = 0;
        for (int n = 1; n < field.size(); n++) {
            best = field.pressure(n) > field.pressure(best) ? n : best;
        }
        int j = best % grid.cellsRadial();
        assertTrue(grid.radius(j) >= 0.0555 - 1e-9 && grid.radius(j + 1) < 0.0563, "peak at " + grid.radius(j));
        assertTrue(field.pressure(best) > 1.05e6);
    }

    /** Paths of the demo run from the feed to an end, with pressures within the film's and radii within the face. */
    @Test
    void paths_ofTheDemo_areWhole() {
        Tracer tracer = new Tracer(flow, settings);
        for (Release release : ReleasePlan.entering(flow, PathEnd.Border.SUPPLY).releases(3, 0, 16)) {
            Path path = tracer.record(release);
            assertTrue(path.end() instanceof PathEnd.Left, path.end().toString());
            for (PathPoint point : path.points()) {
                assertTrue(point.pressure() > 1.0e5 && point.pressure() < 1.2e6);
                assertTrue(point.radius() >= 0.05 - 1e-9 && point.radius() <= 0.068 + 1e-9);
                assertTrue(point.sigma() >= 0 && point.sigma() <= 1);
            }
        }
    }

    /** The demo seal's split by tracers and by boundary integrals agree within 0.3 % of the supply. */
    @Test
    void split_byTracers_agreesWithBoundaryIntegrals() {
        BorderBalance balance = BorderBalance.of(flow);
        ReleasePlan plan = ReleasePlan.entering(flow, PathEnd.Border.SUPPLY);
        List<PathEnd> ends = ParallelTracing.follow(flow, settings, plan.releases(9, 0, 8192), 2, n -> {})
                .ends();
        double inner = ends.stream()
                        .filter(end -> Destination.of(end) == Destination.INNER)
                        .count()
                / (double) ends.size();
        assertEquals(balance.innerOut() / balance.supplyIn(), inner, 0.003);
        assertEquals(plan.massFlow(), balance.supplyIn(), 1e-12 * plan.massFlow());
    }
}
