package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.whither.fate.Destination;
import org.whither.film.ConservingFlow;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.NodalFlow;
import org.whither.film.RadialCase;
import org.whither.film.Supply;
import org.whither.film.WavyCase;

/** The batch tracer against the single-path one, and against what is known exactly. */
class BatchTracerTest {
    private static final WavyCase WAVY = new WavyCase(12, 20, 16, 3);
    private static final WavyCase COARSE = new WavyCase(8, 10, 8, 3);

    private static List<Release> anywhere(FilmGrid grid, int count, long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        List<Release> releases = new ArrayList<>();
        for (int n = 0; n < count; n++) {
            releases.add(new Release(
                    20 * random.nextDouble() - 10,
                    grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * random.nextDouble(),
                    random.nextDouble(),
                    1));
        }
        return releases;
    }

    /**
     * Follows the same tracers both ways: equal ends, and times, turns, lengths and pressures alike, but for the few beside a
     * dividing surface or a stagnation point, where paths part whatever the tolerance.
     */
    private static void compare(String name, FilmFlow flow, TraceSettings settings, int count) {
        List<Release> releases = anywhere(flow.film().grid(), count, 7);
        ParallelTracing.Measured batch = ParallelTracing.measure(flow, settings, releases, 2, n -> {});
        PathMeasure[] measures = new PathMeasure[count];
        ParallelTracing.Outcome single =
                ParallelTracing.run(flow, settings, releases, 2, n -> {}, measures, Optional.empty());
        int alike = 0;
        int differ = 0;
        for (int n = 0; n < count; n++) {
            PathEnd a = single.ends().get(n);
            PathEnd b = batch.outcome().ends().get(n);
            if (Destination.of(a) != Destination.of(b)) {
                differ++;
                continue;
            }
            double time = a.time();
            PathMeasure one = measures[n];
            PathMeasure other = batch.measures().get(n);
            boolean same = Math.abs(b.time() - time) <= 1e-4 * time
                    && Math.abs(b.position().theta() - a.position().theta()) <= 1e-3
                    && Math.abs(b.position().stationaryTheta() - a.position().stationaryTheta()) <= 1e-3
                    && Math.abs(b.position().radius() - a.position().radius()) <= 2e-6
                    && Math.abs(b.position().sigma() - a.position().sigma()) <= 1e-3
                    && Math.abs(other.length() - one.length()) <= 1e-4 * one.length()
                    && Math.abs(other.lowestPressure() - one.lowestPressure()) <= 1e-4 * one.lowestPressure()
                    && Math.abs(other.highestPressure() - one.highestPressure()) <= 1e-4 * one.highestPressure();
            alike += same ? 1 : 0;
        }
        assertTrue(differ <= count / 100, name + ": " + differ + " of " + count + " have another destination");
        assertTrue(alike >= 0.97 * count, name + ": only " + alike + " of " + count + " are alike");
        double more = (double) batch.outcome().steps() / single.steps();
        assertTrue(more > 0.9 && more < 1.1, name + ": " + more + " times the steps");
    }

    @Test
    void follow_lubricationField_isAsTheSinglePath() {
        FilmFlow flow = new ConservingFlow(WAVY.lubrication());
        for (Frame frame : Frame.values()) {
            for (Direction direction : Direction.values()) {
                compare(frame + " " + direction, flow, new TraceSettings(frame, direction, 1e-7, 0.05), 200);
            }
        }
    }

    @Test
    void follow_fullField_isAsTheSinglePath() {
        for (Frame measured : Frame.values()) {
            FilmFlow flow = new ConservingFlow(WAVY.full(9, measured));
            for (Direction direction : Direction.values()) {
                TraceSettings settings = new TraceSettings(Frame.STATIONARY, direction, 1e-7, 0.05);
                compare("full " + measured + " " + direction, flow, settings, 200);
            }
        }
        FilmFlow mirrored = new ConservingFlow(WavyCase.mirrored(WAVY.full(5, Frame.ROTATING)));
        compare("mirrored", mirrored, new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-7, 0.05), 200);
    }

    /** A film that is steady in the stationary frame, met by tracers in both. */
    @Test
    void follow_filmSteadyInTheOtherFrame_isAsTheSinglePath() {
        FilmGrid grid = RadialCase.grid(8, RadialCase.radii(20, 16, 2e-4), 6, 0.4);
        FilmFlow flow = new ConservingFlow(RadialCase.fullFilm(grid, 7, Frame.ROTATING, Frame.STATIONARY));
        for (Frame frame : Frame.values()) {
            compare("steady " + frame, flow, new TraceSettings(frame, Direction.FORWARD, 1e-7, 0.05), 200);
        }
    }

    @Test
    void follow_feedThroughTheRotor_isAsTheSinglePath() {
        for (Film film : List.of(WAVY.lubrication(), WAVY.full(6, Frame.ROTATING))) {
            FilmGrid grid = film.grid();
            Supply supply = Supply.ofAnnulus(
                    grid,
                    Face.ROTOR,
                    new Supply.Annulus(RadialCase.FEED_RADIUS - 1e-5, RadialCase.FEED_RADIUS + 1e-5),
                    null);
            FilmFlow flow = new ConservingFlow(new Film(
                    film.heading(),
                    film.conditions(),
                    film.gas(),
                    grid,
                    film.faces(),
                    film.velocityFrame(),
                    film.steadyIn(),
                    film.field(),
                    Optional.of(supply)));
            for (Direction direction : Direction.values()) {
                TraceSettings settings = new TraceSettings(Frame.ROTATING, direction, 1e-7, 0.05);
                compare("rotor feed " + direction, flow, settings, 200);
            }
        }
    }

    /** Large tolerances on a coarse grid: steps are limited by their error, not by the cells, and some are thrown away. */
    @Test
    void follow_coarseGrid_losesNoTracer() {
        FilmFlow flow = new ConservingFlow(COARSE.full(4, Frame.ROTATING));
        for (Direction direction : Direction.values()) {
            List<Release> releases = anywhere(flow.film().grid(), 3000, 11);
            for (double tolerance : new double[] {1e-2, 1e-5, 1e-10}) {
                TraceSettings settings = new TraceSettings(Frame.ROTATING, direction, tolerance, 0.02);
                for (PathEnd end : ParallelTracing.follow(flow, settings, releases, 2, n -> {})
                        .ends()) {
                    assertTrue(!(end instanceof PathEnd.Failed), end.toString());
                    assertTrue(end.position().sigma() >= 0 && end.position().sigma() <= 1);
                    if (end instanceof PathEnd.Left left && left.border() == PathEnd.Border.SUPPLY) {
                        assertEquals(1, left.position().sigma(), 0);
                        assertEquals(RadialCase.FEED_RADIUS, left.position().radius(), 1.01e-4);
                    }
                }
            }
        }
    }

    @Test
    void follow_anyNumberOfThreads_givesTheSameBits() {
        FilmFlow flow = new ConservingFlow(WAVY.full(6, Frame.ROTATING));
        TraceSettings settings = new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-6, 0.02);
        List<Release> releases = anywhere(flow.film().grid(), 1000, 5);
        releases.add(17, new Release(0, 0.04, 0.5, 1));
        releases.add(new Release(0, 0.055, Double.NaN, 1));
        ParallelTracing.Measured one = ParallelTracing.measure(flow, settings, releases, 1, n -> {});
        for (int threads : new int[] {2, 7}) {
            ParallelTracing.Measured more = ParallelTracing.measure(flow, settings, releases, threads, n -> {});
            assertEquals(one, more, threads + " threads");
        }
        // Nor does it matter which tracers share a batch.
        List<Release> some = releases.subList(333, 400);
        assertEquals(
                one.outcome().ends().subList(333, 400),
                ParallelTracing.follow(flow, settings, some, 1, n -> {}).ends());
        assertInstanceOf(PathEnd.Failed.class, one.outcome().ends().get(17));
    }

    /**
     * The exact law of a tracer in the radial film (see {@link TracerTest}), on a fine grid: with ζ = 1 − σ it needs t̄ / (6 ζ
     * (1 − ζ)) to the outer diameter, 1.9069639e-3 s at ζ = 0.5 and 2.5426185e-3 s at ζ = 0.75, and 0.1906964 and 0.3813928
     * turns, of which the part from 60.1 mm on.
     */
    @Test
    void follow_radialFilm_obeysExactLaw() {
        double[][] cases = {{0.5, 1.9069639e-3, 0.1906964}, {0.25, 2.5426185e-3, 0.3813928}};
        FilmGrid grid = RadialCase.grid(8, RadialCase.radii(100, 320, 2e-4), 6, 0.4);
        FilmFlow flow = new ConservingFlow(RadialCase.film(grid, true));
        double from = RadialCase.FEED_RADIUS + 1e-4;
        double part = 1 - content(RadialCase.FEED_RADIUS, from) / content(RadialCase.FEED_RADIUS, 0.068);
        for (double[] known : cases) {
            for (Frame frame : Frame.values()) {
                PathEnd end = ParallelTracing.follow(
                                flow,
                                new TraceSettings(frame, Direction.FORWARD, 1e-9, 1),
                                List.of(new Release(0.2, from, known[0], 1)),
                                1,
                                n -> {})
                        .ends()
                        .get(0);
                assertEquals(
                        PathEnd.Border.OUTER,
                        assertInstanceOf(PathEnd.Left.class, end).border());
                assertEquals(part * known[1], end.time(), 2e-6 * known[1]);
                double turns = (end.position().stationaryTheta() - 0.2) / (2 * Math.PI);
                assertEquals(part * known[2], turns, 2e-5 * known[2]);
                assertEquals(known[0], end.position().sigma(), 1e-7);
            }
        }
    }

    /** ∫ p r dr, to which the gas content is proportional. */
    private static double content(double from, double to) {
        double sum = 0;
        int n = 4000;
        for (int m = 0; m < n; m++) {
            double at = from + (to - from) * (m + 0.5) / n;
            sum += RadialCase.pressure(at) * at * (to - from) / n;
        }
        return sum;
    }

    /**
     * The mean residence of gas released by equal flows is film mass over flow (P. V. Danckwerts, Chem. Eng. Sci. 2, 1953),
     * and its distribution that of parallel plates, F(1) = 0.769800, F(2) = 0.952579 (see {@link ThinFilmLawTest}).
     */
    @Test
    void follow_equalFlows_haveThePlatesResidenceDistribution() {
        FilmGrid grid = RadialCase.grid(8, RadialCase.radii(100, 80, 2e-4), 6, 0.0);
        FilmFlow flow = new ConservingFlow(RadialCase.film(grid, true));
        double from = RadialCase.FEED_RADIUS + 1e-4;
        int count = 2000;
        List<Release> releases = new ArrayList<>();
        for (int n = 0; n < count; n++) {
            releases.add(new Release(0.1, from, ThinFilmLawTest.height((n + 0.5) / count), 1));
        }
        TraceSettings settings = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, 10);
        double mean = RadialCase.OUTER_TIME * content(from, 0.068) / content(RadialCase.FEED_RADIUS, 0.068);
        double[] times = ParallelTracing.follow(flow, settings, releases, 2, n -> {}).ends().stream()
                .mapToDouble(end -> end.time() / mean)
                .sorted()
                .toArray();
        assertEquals(0.769800, (double) Arrays.stream(times).filter(t -> t < 1).count() / count, 1.5 / count);
        assertEquals(0.952579, (double) Arrays.stream(times).filter(t -> t < 2).count() / count, 1.5 / count);
        // The slowest thousandth, near the faces, takes much of the mean: 1 − ∫ of the tail beyond the last release.
        assertEquals(1, Arrays.stream(times).average().orElseThrow(), 0.02);
    }

    /** Lane by lane and on vectors: the same bits, whatever the tolerance makes of the steps. */
    @Test
    void follow_onVectors_givesTheSameBits() {
        BatchStep vectors = BatchSteps.onVectors();
        assumeTrue(vectors != null, "the virtual machine was started without jdk.incubator.vector");
        for (FilmFlow flow : List.of(
                new ConservingFlow(WAVY.full(6, Frame.ROTATING)),
                new ConservingFlow(COARSE.lubrication()),
                new ConservingFlow(WavyCase.mirrored(COARSE.full(3, Frame.STATIONARY))))) {
            List<Release> releases = anywhere(flow.film().grid(), 333, 13);
            for (Direction direction : Direction.values()) {
                for (double tolerance : new double[] {1e-2, 1e-6, 1e-9}) {
                    TraceSettings settings = new TraceSettings(Frame.STATIONARY, direction, tolerance, 0.02);
                    PathEnd[] ends = new PathEnd[releases.size()];
                    PathMeasure[] measures = new PathMeasure[ends.length];
                    long steps = follow(flow, settings, releases, new BatchStep(), ends, measures);
                    PathEnd[] others = new PathEnd[ends.length];
                    PathMeasure[] otherMeasures = new PathMeasure[ends.length];
                    assertEquals(steps, follow(flow, settings, releases, vectors, others, otherMeasures));
                    assertArrayEquals(ends, others);
                    assertArrayEquals(measures, otherMeasures);
                }
            }
        }
    }

    private static long follow(
            FilmFlow flow,
            TraceSettings settings,
            List<Release> releases,
            BatchStep step,
            PathEnd[] ends,
            PathMeasure[] measures) {
        BatchTracer tracer = new BatchTracer(flow, flow.packed().orElseThrow(), settings, BatchSteps.only(step));
        int[] next = {0};
        tracer.follow(releases, () -> next[0] < ends.length ? next[0]++ : -1, ends, measures, n -> {});
        return tracer.steps() + 1_000_000_000L * tracer.rejectedSteps();
    }

    /** The powers of the control of the step, to the accuracy that it promises. */
    @Test
    void control_ofTheBatch_isThatOfTheSinglePath() {
        StepControl exact = new StepControl();
        QuickControl quick = new QuickControl(1);
        quick.begin(0);
        for (double error = 1e-12; error < 1e6; error *= 3.7) {
            if (error <= 1) {
                double factor = exact.afterAccepted(error);
                assertEquals(factor, quick.afterAccepted(0, error), 0.01 * factor);
            } else {
                double factor = exact.afterRejected(error);
                assertEquals(factor, quick.afterRejected(0, error), 0.01 * factor);
            }
        }
        assertEquals(exact.afterAccepted(1e-8), quick.afterAccepted(0, 1e-8), 0);
        assertEquals(0.2, quick.afterRejected(0, Double.NaN), 0);
    }

    /** An interpolation that is not packed goes to the single-path tracer. */
    @Test
    void follow_nodalFlow_isFollowedOneByOne() {
        FilmGrid grid = RadialCase.grid(4, RadialCase.radii(6, 5, 2e-4), 6, 0.2);
        FilmFlow nodal = new NodalFlow(RadialCase.fullFilm(grid, 5, Frame.ROTATING, Frame.ROTATING));
        TraceSettings settings = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, 0.1);
        List<Release> releases = anywhere(grid, 40, 2);
        Tracer tracer = new Tracer(nodal, settings);
        List<PathEnd> ends = releases.stream().map(tracer::follow).toList();
        assertEquals(
                ends,
                ParallelTracing.follow(nodal, settings, releases, 2, n -> {}).ends());
    }
}
