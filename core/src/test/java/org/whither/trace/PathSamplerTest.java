package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.film.RadialCase;
import org.whither.film.WavyCase;

/** Points taken from paths: where they lie, how they are spaced, and in which order. */
class PathSamplerTest {
    private static final double OUTSIDE_FEED = RadialCase.FEED_RADIUS * (1 + 1e-15);

    private static PathSampler.Settings settings(
            Frame frame, Course course, double tolerance, PointSpacing spacing, double turns) {
        return new PathSampler.Settings(frame, course, tolerance, 0.5, 2 * Math.PI * turns, spacing);
    }

    private static PathSampler.Settings settings(Frame frame, Course course, double tolerance, PointSpacing spacing) {
        return settings(frame, course, tolerance, spacing, Double.POSITIVE_INFINITY);
    }

    /**
     * Time from the feed to a radius: u_r = −(h²/2µ) p′ σ(1 − σ) (Reynolds 1886) with p p′ r constant, so dt = r p dr / (…),
     * integrated by Simpson's rule.
     */
    private static double lawTime(double radius, double sigma) {
        int parts = 2000;
        double sum = 0;
        double width = (radius - RadialCase.FEED_RADIUS) / parts;
        for (int n = 0; n <= parts; n++) {
            double r = Math.max(OUTSIDE_FEED, RadialCase.FEED_RADIUS + n * width);
            double speed = -RadialCase.H * RadialCase.H / (2 * 1.78e-5) * RadialCase.gradient(r) * sigma * (1 - sigma);
            sum += (n == 0 || n == parts ? 1 : n % 2 == 1 ? 4 : 2) / speed;
        }
        return sum * width / 3;
    }

    @ParameterizedTest
    @EnumSource(Frame.class)
    void equalPoints_exactFilm_lieOnTheLaw(Frame frame) {
        for (double sigma : new double[] {0.02, 0.3, 0.8}) {
            SampledPath path = new PathSampler(
                            ThinFilmLawTest.EXACT, settings(frame, Course.FORWARD, 1e-11, new PointSpacing.Equal(41)))
                    .follow(new Release(0.1, OUTSIDE_FEED, sigma, 1));
            assertEquals(41, path.size());
            double whole = RadialCase.OUTER_TIME / (6 * sigma * (1 - sigma));
            assertEquals(whole, path.duration(), 1e-8 * whole);
            double rate = frame == Frame.STATIONARY ? RadialCase.OMEGA * (1 - sigma) : -RadialCase.OMEGA * sigma;
            for (int n = 0; n < 41; n++) {
                double time = path.value(n, 0);
                double r = path.value(n, 2);
                assertEquals(path.duration() * n / 40, time, 1e-12 * whole);
                assertEquals(time, lawTime(r, sigma), 2e-8 * whole);
                assertEquals(0.1 + rate * time, path.value(n, 1), 1e-7, "θ runs on without a jump");
                assertEquals(sigma, path.value(n, 4), 1e-12);
                assertEquals(sigma * RadialCase.H, path.value(n, 3), 1e-17);
                assertEquals(RadialCase.pressure(r), path.value(n, 6), 1e-4);
                double out =
                        -RadialCase.H * RadialCase.H / (2 * 1.78e-5) * RadialCase.gradient(r) * sigma * (1 - sigma);
                assertEquals(Math.hypot(out, rate * r), path.value(n, 5), 1e-9 * path.value(n, 5));
            }
            double turns = RadialCase.OMEGA * (1 - sigma) * whole / (2 * Math.PI);
            assertEquals(turns, path.revolutions(), 1e-8 * turns);
            assertTrue(sigma > 0.1 || turns > 4, "one path goes round several times");
        }
    }

    /** Straight lines in time between the points keep within the tolerance of the path, and few points do it. */
    @Test
    void pointsWithinTolerance_keepNearThePath() {
        for (FilmFlow flow :
                new FilmFlow[] {ThinFilmLawTest.EXACT, new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication())}) {
            // Followed back, the exact film's tracer would come to rest at the circle on which its feed lies.
            Course course = flow == ThinFilmLawTest.EXACT ? Course.FORWARD : Course.BOTH;
            int coarse = 0;
            for (double tolerance : new double[] {1e-2, 1e-4}) {
                PathSampler.Settings how = settings(Frame.STATIONARY, course, 1e-8, new PointSpacing.Within(tolerance));
                Release release = new Release(0.1, 0.064, 0.31, 1);
                SampledPath few = new PathSampler(flow, how).follow(release);
                SampledPath many = new PathSampler(
                                flow, settings(Frame.STATIONARY, course, 1e-8, new PointSpacing.Equal(20001)))
                        .follow(release);
                double worst = worst(few, many, flow);
                assertTrue(worst <= tolerance, worst + " > " + tolerance);
                assertTrue(worst > 0.2 * tolerance, "no closer than asked for: " + worst + " of " + tolerance);
                // An arc's distance from its chord falls with the square of the chord.
                if (coarse == 0) {
                    coarse = few.size();
                    assertTrue(coarse < 100, coarse + " points");
                } else {
                    assertTrue(few.size() > 5 * coarse && few.size() < 15 * coarse, coarse + ", " + few.size());
                }
            }
        }
    }

    /** Furthest distance of a path from straight lines between few of its points, in parts of extent and thickness. */
    private static double worst(SampledPath few, SampledPath many, FilmFlow flow) {
        double extent = flow.film().grid().outerRadius() - flow.film().grid().innerRadius();
        double worst = 0;
        int a = 0;
        for (int n = 0; n < many.size(); n++) {
            double time = many.value(n, 0);
            while (a + 2 < few.size() && few.value(a + 1, 0) < time) {
                a++;
            }
            double f = (time - few.value(a, 0)) / (few.value(a + 1, 0) - few.value(a, 0));
            double x = (1 - f) * x(few, a) + f * x(few, a + 1) - x(many, n);
            double y = (1 - f) * y(few, a) + f * y(few, a + 1) - y(many, n);
            double sigma = (1 - f) * few.value(a, 4) + f * few.value(a + 1, 4) - many.value(n, 4);
            worst = Math.max(worst, Math.max(Math.max(Math.abs(x), Math.abs(y)) / extent, Math.abs(sigma)));
        }
        return worst;
    }

    private static double x(SampledPath path, int n) {
        return path.value(n, 2) * Math.cos(path.value(n, 1));
    }

    private static double y(SampledPath path, int n) {
        return path.value(n, 2) * Math.sin(path.value(n, 1));
    }

    /** In either frame the same points, once the angle is turned by Ω t. */
    @Test
    void frames_agreeAfterTurning() {
        FilmFlow flow = new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication());
        Release release = new Release(0.4, 0.062, 0.55, 1);
        PointSpacing spacing = new PointSpacing.Equal(50);
        SampledPath turning =
                new PathSampler(flow, settings(Frame.ROTATING, Course.BOTH, 1e-10, spacing)).follow(release);
        SampledPath standing =
                new PathSampler(flow, settings(Frame.STATIONARY, Course.BOTH, 1e-10, spacing)).follow(release);
        double rate = flow.film().conditions().rotationRate();
        assertEquals(standing.revolutions(), turning.revolutions(), 1e-7);
        for (int n = 0; n < 50; n++) {
            assertEquals(standing.value(n, 0), turning.value(n, 0), 1e-9 * standing.duration());
            assertEquals(standing.value(n, 1), turning.value(n, 1) + rate * turning.value(n, 0), 1e-6);
            assertEquals(standing.value(n, 2), turning.value(n, 2), 1e-9);
            assertEquals(standing.value(n, 4), turning.value(n, 4), 1e-6);
            assertEquals(standing.value(n, 6), turning.value(n, 6), 1e-6 * standing.value(n, 6));
        }
    }

    /** Both ways make one path in order of time through the release; each half is what the one way gives. */
    @Test
    void bothWays_areOnePathThroughTheRelease() {
        FilmFlow flow = new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication());
        Release release = new Release(0.4, 0.064, 0.55, 1);
        PointSpacing within = new PointSpacing.Within(1e-3);
        SampledPath both = new PathSampler(flow, settings(Frame.ROTATING, Course.BOTH, 1e-8, within)).follow(release);
        SampledPath back =
                new PathSampler(flow, settings(Frame.ROTATING, Course.BACKWARD, 1e-8, within)).follow(release);
        SampledPath on = new PathSampler(flow, settings(Frame.ROTATING, Course.FORWARD, 1e-8, within)).follow(release);
        assertEquals(back.size() + on.size() - 1, both.size());
        assertEquals(0, both.value(back.size() - 1, 0));
        assertEquals(0, back.value(back.size() - 1, 0));
        for (int n = 1; n < both.size(); n++) {
            assertTrue(both.value(n, 0) >= both.value(n - 1, 0));
        }
        for (int column = 0; column < SampledPath.COLUMNS; column++) {
            assertEquals(back.value(0, column), both.value(0, column));
            assertEquals(on.value(on.size() - 1, column), both.value(both.size() - 1, column));
        }
        assertEquals(back.duration() + on.duration(), both.duration());
        assertEquals(back.revolutions() + on.revolutions(), both.revolutions(), 1e-12);
        assertTrue(back.value(0, 0) < 0);
        // Released where the gas came from, it takes the same way.
        PathEnd.Position origin = both.before().orElseThrow().position();
        double steady = origin.stationaryTheta() + flow.film().conditions().rotationRate() * back.duration();
        SampledPath again = new PathSampler(flow, settings(Frame.ROTATING, Course.FORWARD, 1e-8, within))
                .follow(new Release(steady, origin.radius(), origin.sigma(), 1));
        assertEquals(both.duration(), again.duration(), 1e-5 * both.duration());
    }

    /** A path of more steps than are kept gives the very same points. */
    @Test
    void longPath_isFollowedAgain() {
        FilmFlow flow = new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication());
        Release release = new Release(0.4, 0.064, 0.55, 1);
        PathSampler.Settings how = settings(Frame.STATIONARY, Course.BOTH, 1e-6, new PointSpacing.Equal(33));
        SampledPath kept = new PathSampler(flow, how).follow(release);
        SampledPath again = new PathSampler(flow, how, 3).follow(release);
        assertEquals(33, again.size());
        for (int n = 0; n < 33 * SampledPath.COLUMNS; n++) {
            assertEquals(kept.value(n / 7, n % 7), again.value(n / 7, n % 7));
        }
    }

    /** Ω t (1 − σ) is the angle turned in the stationary frame; half a turn is half a turn in either frame, to either side. */
    @ParameterizedTest
    @EnumSource(Frame.class)
    void turnLimit_stopsThePathThere(Frame frame) {
        for (Course course : new Course[] {Course.FORWARD, Course.BACKWARD}) {
            SampledPath path = new PathSampler(
                            ThinFilmLawTest.EXACT, settings(frame, course, 1e-11, new PointSpacing.Within(1e-3), 0.05))
                    .follow(new Release(0.1, 0.064, 0.3, 1));
            assertInstanceOf(
                    PathEnd.StillInside.class,
                    course == Course.FORWARD
                            ? path.after().orElseThrow()
                            : path.before().orElseThrow());
            assertEquals(0.05, path.revolutions(), 1e-9);
            assertEquals(0.05 * 2 * Math.PI / (RadialCase.OMEGA * 0.7), path.duration(), 1e-9);
            int last = course == Course.FORWARD ? path.size() - 1 : 0;
            assertEquals(path.duration(), Math.abs(path.value(last, 0)), 1e-15);
        }
    }

    /** Followed back from where it came in, a tracer leaves at once, but for the hair by which borders are passed. */
    @Test
    void backFromTheFeed_endsAtOnce() {
        for (PointSpacing spacing : new PointSpacing[] {new PointSpacing.Equal(5), new PointSpacing.Within(1e-3)}) {
            SampledPath path = new PathSampler(
                            new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication()),
                            settings(Frame.ROTATING, Course.BACKWARD, 1e-6, spacing))
                    .follow(new Release(0.1, RadialCase.FEED_RADIUS, 1, 1));
            PathEnd.Left left =
                    assertInstanceOf(PathEnd.Left.class, path.before().orElseThrow());
            assertEquals(PathEnd.Border.SUPPLY, left.border());
            assertEquals(0, path.duration(), 1e-11);
            assertEquals(0, path.value(path.size() - 1, 0));
            assertEquals(1, path.value(0, 4), 1e-9);
        }
    }

    /** Side by side the paths are the same to the tolerance, and none depends on those beside it. */
    @Test
    void sideBySide_areTheSamePaths() {
        FilmFlow flow = new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication());
        assertTrue(flow.packed().isPresent());
        List<Release> releases = new ArrayList<>();
        for (int n = 0; n < 40; n++) {
            releases.add(new Release(0.9 * n, 0.055 + 0.0002 * n, 0.15 + 0.018 * n, 1));
        }
        for (PointSpacing spacing : new PointSpacing[] {new PointSpacing.Equal(21), new PointSpacing.Within(1e-3)}) {
            PathSampler.Settings how = settings(Frame.STATIONARY, Course.BOTH, 1e-8, spacing);
            List<SampledPath> together = new PathSampler(flow, how).follow(releases);
            List<SampledPath> again = new PathSampler(flow, how, 3).follow(releases.subList(17, 40));
            int less = 0;
            for (int n = 0; n < 40; n++) {
                SampledPath path = together.get(n);
                SampledPath alone = new PathSampler(flow, how).follow(releases.get(n));
                assertEquals(alone.duration(), path.duration(), 1e-5 * alone.duration());
                assertEquals(alone.revolutions(), path.revolutions(), 1e-5);
                if (spacing instanceof PointSpacing.Equal) {
                    assertEquals(alone.size(), path.size());
                    for (int point = 0; point < path.size(); point++) {
                        assertEquals(alone.value(point, 1), path.value(point, 1), 1e-4);
                        assertEquals(alone.value(point, 2), path.value(point, 2), 1e-6);
                        assertEquals(alone.value(point, 3), path.value(point, 3), 1e-9);
                        assertEquals(alone.value(point, 4), path.value(point, 4), 1e-4);
                        assertEquals(alone.value(point, 5), path.value(point, 5), 1e-3 * alone.value(point, 5));
                        assertEquals(alone.value(point, 6), path.value(point, 6), 1e-4 * alone.value(point, 6));
                    }
                } else {
                    assertTrue(path.size() > 0.5 * alone.size() && path.size() < 2 * alone.size());
                    less += path.size() - alone.size();
                }
                if (n >= 17) {
                    SampledPath other = again.get(n - 17);
                    assertEquals(path.size(), other.size());
                    for (int v = 0; v < path.size() * SampledPath.COLUMNS; v++) {
                        assertEquals(path.value(v / 7, v % 7), other.value(v / 7, v % 7));
                    }
                }
            }
            assertTrue(Math.abs(less) < 400, "about as many points: " + less);
        }
    }

    @Test
    void sideBySide_withinTolerance_keepNearThePath() {
        FilmFlow flow = new ConservingFlow(new WavyCase(16, 8, 8, 0.5).lubrication());
        List<Release> releases = List.of(new Release(0.1, 0.064, 0.31, 1), new Release(0.1, 0.056, 0.7, 1));
        for (double tolerance : new double[] {1e-2, 1e-4}) {
            List<SampledPath> few = new PathSampler(
                            flow, settings(Frame.STATIONARY, Course.BOTH, 1e-8, new PointSpacing.Within(tolerance)))
                    .follow(releases);
            List<SampledPath> many = new PathSampler(
                            flow, settings(Frame.STATIONARY, Course.BOTH, 1e-8, new PointSpacing.Equal(20001)))
                    .follow(releases);
            for (int n = 0; n < 2; n++) {
                double worst = worst(few.get(n), many.get(n), flow);
                assertTrue(worst <= tolerance && worst > 0.2 * tolerance, worst + " of " + tolerance);
            }
        }
    }
}
