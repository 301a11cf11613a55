package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.NodalFlow;
import org.whither.film.RadialCase;

class TracerTest {
    private static final FilmGrid GRID = RadialCase.grid(8, RadialCase.radii(100, 80, 2e-4), 6, 0.4);
    private static final FilmFlow FLOW = new ConservingFlow(RadialCase.film(GRID, true));

    private static TraceSettings settings(Frame frame, Direction direction) {
        return new TraceSettings(frame, direction, 1e-8, 1);
    }

    /**
     * The exact law of a tracer in the radial film: it keeps its height, and with ζ = 1 − σ its time to the outer diameter
     * is t̄ / (6 ζ (1 − ζ)) and its turns Ω t̄ / (2π 6 (1 − ζ)); 1.9069639e-3 s and 0.1906964 turns at ζ = 0.5,
     * 2.5426185e-3 s and 0.3813928 at ζ = 0.75. t̄ is computed from the exact pressure. Within 0.1 % on a grid.
     */
    @Test
    void follow_radialFilm_obeysExactLaw() {
        double[][] cases = {{0.5, 1.9069639e-3, 0.1906964}, {0.25, 2.5426185e-3, 0.3813928}};
        for (double[] known : cases) {
            // From the edge of the feed row; the exact law counts from 60 mm, 0.1 mm further in.
            double extra = RadialCase.OUTER_TIME
                    * outerMassWithin(RadialCase.FEED_RADIUS + 1e-4)
                    / outerMassWithin(0.068)
                    / (6 * known[0] * (1 - known[0]));
            Release release = new Release(0.2, RadialCase.FEED_RADIUS + 1e-4, known[0], 1);
            for (Frame frame : Frame.values()) {
                PathEnd end = new Tracer(FLOW, settings(frame, Direction.FORWARD)).follow(release);
                PathEnd.Left left = assertInstanceOf(PathEnd.Left.class, end);
                assertEquals(PathEnd.Border.OUTER, left.border());
                assertEquals(known[1] - extra, left.time(), 1e-3 * known[1]);
                double turns = (left.position().stationaryTheta() - 0.2) / (2 * Math.PI);
                assertEquals(known[2] * (1 - extra / known[1]), turns, 1e-3 * known[2]);
                assertEquals(known[0], left.position().sigma(), 1e-6);
            }
        }
    }

    /** ∫ p r dr from the feed to a radius, to which the gas content is proportional. */
    private static double outerMassWithin(double r) {
        double sum = 0;
        int n = 2000;
        for (int m = 0; m < n; m++) {
            double at = RadialCase.FEED_RADIUS + 1e-12 + (r - RadialCase.FEED_RADIUS) * (m + 0.5) / n;
            sum += RadialCase.pressure(at) * at * (r - RadialCase.FEED_RADIUS) / n;
        }
        return sum;
    }

    /** A path turned from one frame into the other is the path integrated there. */
    @Test
    void follow_bothFrames_endAlike() {
        SplittableRandom random = new SplittableRandom(3);
        Tracer rotating = new Tracer(FLOW, settings(Frame.ROTATING, Direction.FORWARD));
        Tracer stationary = new Tracer(FLOW, settings(Frame.STATIONARY, Direction.FORWARD));
        for (int n = 0; n < 50; n++) {
            Release release = new Release(
                    20 * random.nextDouble() - 10,
                    0.0502 + 0.0175 * random.nextDouble(),
                    0.05 + 0.9 * random.nextDouble(),
                    1);
            PathEnd a = rotating.follow(release);
            PathEnd b = stationary.follow(release);
            assertEquals(a.getClass(), b.getClass());
            assertEquals(a.time(), b.time(), 1e-6 * a.time());
            assertEquals(a.position().stationaryTheta(), b.position().stationaryTheta(), 1e-5);
            assertEquals(b.position().theta(), b.position().stationaryTheta(), 0);
            assertEquals(a.position().sigma(), b.position().sigma(), 1e-6);
        }
    }

    @Test
    void follow_backward_returnsToTheRelease() {
        SplittableRandom random = new SplittableRandom(4);
        for (Frame frame : Frame.values()) {
            Tracer forward = new Tracer(FLOW, settings(frame, Direction.FORWARD));
            Tracer backward = new Tracer(FLOW, settings(frame, Direction.BACKWARD));
            for (int n = 0; n < 30; n++) {
                Release release = new Release(random.nextDouble(), 0.06005, 1, 1);
                PathEnd.Left there = assertInstanceOf(PathEnd.Left.class, forward.follow(release));
                // In the steady frame the gas leaves where it would enter, seen backward from time 0.
                double steady =
                        there.position().theta() - (frame == Frame.STATIONARY ? RadialCase.OMEGA * there.time() : 0);
                Release back = new Release(
                        steady, there.position().radius(), there.position().sigma(), 1);
                PathEnd.Left origin = assertInstanceOf(PathEnd.Left.class, backward.follow(back));
                assertEquals(PathEnd.Border.SUPPLY, origin.border());
                assertEquals(0.06005, origin.position().radius(), 2e-7);
                assertEquals(there.time(), origin.time(), 1e-3 * there.time());
            }
        }
    }

    @Test
    void follow_everyRelease_hasOneEnd() {
        SplittableRandom random = new SplittableRandom(5);
        List<Release> releases = new ArrayList<>();
        for (int n = 0; n < 500; n++) {
            releases.add(new Release(random.nextDouble(), 0.05 + 0.018 * random.nextDouble(), random.nextDouble(), 1));
        }
        releases.add(new Release(0, 0.05, 0.5, 1));
        releases.add(new Release(0, 0.068, 0.5, 1));
        releases.add(new Release(0, 0.055, 0, 1));
        releases.add(new Release(0, 0.055, 1, 1));
        releases.add(new Release(0, 0.04, 0.5, 1));
        releases.add(new Release(0, 0.055, Double.NaN, 1));
        TraceSettings settings = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, 0.1);
        ParallelTracing.Outcome one = ParallelTracing.follow(FLOW, settings, releases, 1, n -> {});
        ParallelTracing.Outcome three = ParallelTracing.follow(FLOW, settings, releases, 3, n -> {});
        assertEquals(releases.size(), one.ends().size());
        assertEquals(one.ends(), three.ends(), "the same ends on any number of threads");
        // On the faces the radial velocity is zero: such a tracer never leaves.
        assertInstanceOf(PathEnd.StillInside.class, one.ends().get(502));
        assertInstanceOf(PathEnd.StillInside.class, one.ends().get(503));
        assertInstanceOf(PathEnd.Failed.class, one.ends().get(504));
        assertInstanceOf(PathEnd.Failed.class, one.ends().get(505));
    }

    /**
     * The full field by plain nodal interpolation, measured and steady in either frame, released outside the feed: the
     * exact law within 0.5 % with 33 levels.
     */
    @Test
    void follow_fullFieldInAnyFrame_obeysExactLaw() {
        double from = 0.0605;
        double part = 1 - outerMassWithin(from) / outerMassWithin(0.068);
        for (Frame measured : Frame.values()) {
            for (Frame steady : Frame.values()) {
                FilmFlow nodal = new NodalFlow(RadialCase.fullFilm(GRID, 33, measured, steady));
                Release release = new Release(0.2, from, 0.5, 1);
                PathEnd end = new Tracer(nodal, settings(Frame.STATIONARY, Direction.FORWARD)).follow(release);
                assertEquals(
                        PathEnd.Border.OUTER,
                        assertInstanceOf(PathEnd.Left.class, end).border());
                assertEquals(part * 1.9069639e-3, end.time(), 0.005 * 1.9069639e-3);
                double turns = (end.position().stationaryTheta() - 0.2) / (2 * Math.PI);
                assertEquals(part * 0.1906964, turns, 0.005 * 0.1906964);
            }
        }
    }

    @Test
    void record_path_runsFromReleaseToEnd() {
        Release release = new Release(0.2, 0.06005, 1, 1);
        Path path = new Tracer(FLOW, settings(Frame.ROTATING, Direction.FORWARD)).record(release);
        PathPoint first = path.points().get(0);
        PathPoint last = path.points().get(path.points().size() - 1);
        assertEquals(0, first.time(), 0);
        assertEquals(0.06005, first.radius(), 1e-15);
        assertEquals(RadialCase.H, first.z(), 1e-12);
        assertEquals(path.end().time(), last.time(), 1e-15);
        assertEquals(path.end().position().radius(), last.radius(), 1e-9);
        for (int n = 1; n < path.points().size(); n++) {
            assertTrue(path.points().get(n).time() >= path.points().get(n - 1).time());
        }
        // Common practice: seen from the rotor, gas near the stator is fast (here as fast as the stator itself).
        assertEquals(RadialCase.OMEGA * 0.06005, first.speed(), 1);
    }

    @Test
    void settings_outOfRange_areRefused() {
        assertThrows(
                IllegalArgumentException.class, () -> new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-13, 1));
        assertThrows(
                IllegalArgumentException.class, () -> new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, 0));
    }
}
