package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.Rectangle;
import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.whither.film.Face;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;
import org.whither.trace.Release;

/** Animations of the invented film: what the camera does, where the gas is seen, and that nothing grows. */
class MotionTest {
    private static final PictureSettings SMALL =
            PictureSettings.standard("Invented face").sized(640, 360);

    private static final SpiralFilm FILM = new SpiralFilm();

    private static MotionSettings settings(MotionSettings.Ground ground, double seconds, double rate) {
        return MotionSettings.standard(SMALL).over(ground).lasting(seconds, rate);
    }

    /**
     * An invented path from the feed to the inner diameter, which runs against the rotation over several sectors, dives
     * into a groove, turns back on itself and crosses the borders of sectors; in the rotating frame.
     */
    private static Path wild(double turns) {
        return path(turns, true);
    }

    private static Path path(double turns, boolean dives) {
        List<PathPoint> points = new ArrayList<>();
        double end = 2e-3;
        for (int n = 0; n <= 400; n++) {
            double f = n / 400.0;
            double theta = 0.2 - 2 * Math.PI * turns * f + 0.05 * Math.sin(25 * f);
            double r = SpiralFilm.FEED_TO + (SpiralFilm.INNER - SpiralFilm.FEED_TO) * f * f;
            // Down a wall of a groove within a hundredth of the way, and up another.
            double sigma = f < 0.4 ? 0.9 - 0.5 * f : f < 0.41 ? 0.7 - 60 * (f - 0.4) : f < 0.7 ? 0.1 : 0.3;
            double z = SpiralFilm.DATUM + (dives && f > 0.4 && f < 0.7 ? -4e-6 : sigma * SpiralFilm.LAND);
            points.add(new PathPoint(end * f, theta, theta, r, z, sigma, 40 + 30 * Math.cos(9 * f), 6e5));
        }
        PathPoint last = points.get(400);
        return new Path(
                new Release(0.2, SpiralFilm.FEED_TO, 0.9, 1e-6),
                points,
                new PathEnd.Left(
                        PathEnd.Border.INNER,
                        end,
                        new PathEnd.Position(last.theta(), last.theta(), last.radius(), last.sigma())));
    }

    @Test
    void ride_keepsTheGasWellInsideThePicture_atItsDistance() {
        for (MotionSettings.Ground ground : MotionSettings.Ground.values()) {
            for (double turns : new double[] {0.02, 1.3}) {
                MotionSettings how = settings(ground, 8, 25);
                try (Ride ride = (Ride) Ride.of(FILM, wild(turns), "since the start", List.of(), how)) {
                    Rectangle window = ride.window();
                    for (int n = 0; n < ride.frames(); n++) {
                        Point2D.Double p = ride.seen(n);
                        assertTrue(
                                Math.abs(p.x - window.getCenterX()) < 0.9 * 0.5 * window.width
                                        && Math.abs(p.y - window.getCenterY()) < 0.9 * 0.5 * window.height,
                                ground + " " + turns + ", frame " + n + ": the gas is seen at " + p);
                        double[] eye = ride.camera().eye(n);
                        double[] aim = ride.camera().aim(n);
                        assertEquals(
                                ground == MotionSettings.Ground.GAP ? 0.7 * 18 : 2.1 * 18,
                                Math.hypot(eye[0] - aim[0], eye[1] - aim[1]),
                                1e-6,
                                "the rope's length on the face");
                    }
                }
            }
        }
    }

    @Test
    void camera_isSteady_alsoOverBordersOfSectorsAndEdgesOfGrooves() {
        for (MotionSettings.Ground ground : MotionSettings.Ground.values()) {
            MotionSettings how = settings(ground, 8, 25);
            try (Ride ride = (Ride) Ride.of(FILM, wild(0.4), "since the start", List.of(), how)) {
                double fastest = 0;
                double jump = 0;
                double twist = 0;
                for (int n = 1; n + 1 < ride.frames(); n++) {
                    double[] a = ride.camera().eye(n - 1);
                    double[] b = ride.camera().eye(n);
                    double[] c = ride.camera().eye(n + 1);
                    fastest = Math.max(fastest, length(b[0] - a[0], b[1] - a[1], b[2] - a[2]));
                    jump = Math.max(
                            jump, length(a[0] - 2 * b[0] + c[0], a[1] - 2 * b[1] + c[1], a[2] - 2 * b[2] + c[2]));
                    twist = Math.max(
                            twist,
                            Math.abs(angle(heading(ride, n - 1), heading(ride, n))
                                    - angle(heading(ride, n), heading(ride, n + 1))));
                }
                // Going over 140 mm in 8 s the eye never changes its speed by more than a part of it from frame to
                // frame.
                assertTrue(jump < 0.2 * fastest, ground + ": jumps of " + jump + " mm at " + fastest + " mm a frame");
                assertTrue(twist < Math.toRadians(1), ground + ": twists by " + Math.toDegrees(twist) + "°");
            }
        }
    }

    private static double heading(Ride ride, int n) {
        double[] eye = ride.camera().eye(n);
        double[] aim = ride.camera().aim(n);
        return Math.atan2(aim[1] - eye[1], aim[0] - eye[0]);
    }

    private static double angle(double a, double b) {
        return Math.IEEEremainder(b - a, 2 * Math.PI);
    }

    private static double length(double x, double y, double z) {
        return Math.sqrt(x * x + y * y + z * z);
    }

    @Test
    void camera_doesNotCareWhereASectorBegins() {
        // The same path a third of a sector further on: the same camera, turned.
        double shift = 2 * Math.PI / 12;
        Path path = wild(0.3);
        List<PathPoint> moved = path.points().stream()
                .map(p -> new PathPoint(
                        p.time(),
                        p.theta() + shift,
                        p.steadyTheta() + shift,
                        p.radius(),
                        p.z(),
                        p.sigma(),
                        p.speed(),
                        p.pressure()))
                .toList();
        MotionSettings how = settings(MotionSettings.Ground.GAP, 4, 10);
        try (Ride a = (Ride) Ride.of(FILM, path, "", List.of(), how);
                Ride b = (Ride) Ride.of(FILM, new Path(path.release(), moved, path.end()), "", List.of(), how)) {
            for (int n = 0; n < a.frames(); n++) {
                double[] p = a.camera().eye(n);
                double[] q = b.camera().eye(n);
                assertEquals(Math.cos(shift) * p[0] - Math.sin(shift) * p[1], q[0], 1e-6);
                assertEquals(Math.sin(shift) * p[0] + Math.cos(shift) * p[1], q[1], 1e-6);
                assertEquals(p[2], q[2], 1e-6);
            }
        }
    }

    @Test
    void rideTurnAndRelease_holdNoMoreAfterManyFrames_andReportNoErrors() {
        MotionSettings how = settings(MotionSettings.Ground.GAP, 2, 10);
        List<Path> paths = FILM.paths(Frame.ROTATING);
        try (Ride ride = (Ride) Ride.of(FILM, wild(0.3), "since the start", paths, how)) {
            grows(ride, ride.canvas());
        }
        try (Turn turn = (Turn) Turn.of(FILM, paths, how.over(MotionSettings.Ground.RELIEF))) {
            grows(turn, turn.canvas());
        }
        try (LetGo release = (LetGo) LetGo.of(FILM, paths, "since the start", how)) {
            grows(release, release.canvas());
        }
    }

    private static void grows(Animation animation, Canvas canvas) {
        animation.draw(0);
        int held = canvas.held();
        for (int n = 1; n < animation.frames(); n++) {
            BufferedImage image = animation.draw(n);
            assertEquals(animation.width(), image.getWidth());
            assertEquals(animation.height(), image.getHeight());
            assertEquals(BufferedImage.TYPE_INT_RGB, image.getType());
        }
        // Signs of gas that has left may be let go, nothing may be added.
        assertTrue(
                canvas.held() <= held, canvas.held() + " things of OpenGL after the last frame, " + held + " at first");
    }

    @Test
    void release_showsEachPieceWhereItIs_inTheColourOfItsEnd() {
        MotionSettings how = settings(MotionSettings.Ground.GAP, 4, 10).in(SMALL.sized(1280, 720));
        Path path = path(0.2, false);
        // At standstill what is left of the stator does not pass over the gas.
        SpiralFilm still = new SpiralFilm(12, 0, true, Face.STATOR);
        try (LetGo release = (LetGo) LetGo.of(still, List.of(path), "since the start", how)) {
            assertEquals(Destination.INNER, release.destination(0));
            for (int n = 0; n < release.frames(); n += 6) {
                double[] p = release.place(0, n);
                Point2D.Double at = release.camera().project(p[0], p[1], p[2]);
                BufferedImage image = release.draw(n);
                int seen = 0;
                for (int y = -4; y <= 4; y++) {
                    for (int x = -4; x <= 4; x++) {
                        int colour = image.getRGB((int) at.x + x, (int) at.y + y);
                        int red = colour >> 16 & 0xff;
                        // Vermilion in light or shade, which nothing else of this scene is.
                        seen += red > 1.6 * (colour >> 8 & 0xff) && red > 3 * (colour & 0xff) ? 1 : 0;
                    }
                }
                assertTrue(seen >= 5, seen + " pixels of its colour about " + at + " in frame " + n);
            }
        }
    }

    @Test
    void turn_endsWhereItBegins() {
        MotionSettings how = settings(MotionSettings.Ground.GAP, 6, 10);
        try (Turn turn = (Turn) Turn.of(FILM, FILM.paths(Frame.ROTATING), how)) {
            assertEquals(60, turn.frames());
            BufferedImage first = turn.draw(0);
            BufferedImage second = turn.draw(1);
            BufferedImage next = turn.draw(60);
            assertEquals(0, differing(first, next), 20, "one frame after the last is the first");
            assertTrue(differing(first, second) > 500, "the eye moves");
        }
    }

    private static int differing(BufferedImage a, BufferedImage b) {
        int count = 0;
        for (int y = 0; y < a.getHeight(); y++) {
            for (int x = 0; x < a.getWidth(); x++) {
                int p = a.getRGB(x, y);
                int q = b.getRGB(x, y);
                count += Math.abs((p >> 8 & 0xff) - (q >> 8 & 0xff)) > 12 ? 1 : 0;
            }
        }
        return count;
    }

    @Test
    void clock_runsEvenly_soManyTimesSlower() {
        Clock clock = new Clock(settings(MotionSettings.Ground.GAP, 10, 25), 2.6e-3);
        assertEquals(250, clock.frames);
        // 10 s less lead and tail over 2.6 ms is 3077: the next round number below.
        assertEquals(3000, clock.slower);
        assertEquals(0, clock.time(0));
        assertEquals(2.6e-3, clock.time(249), 1e-15);
        assertEquals(1 / (25 * 3000.0), clock.time(101) - clock.time(100), 1e-15);
        assertEquals("3\u2009000 times slower than the gas: one second shows 333 µs", clock.words());
        MotionSettings slow = new MotionSettings(
                SMALL,
                MotionSettings.Ground.GAP,
                1000,
                OptionalDouble.empty(),
                10,
                OptionalDouble.of(10_000),
                OptionalDouble.empty());
        Clock other = new Clock(slow, 2.6e-3);
        assertEquals(Math.rint(10 * 26 / 0.8), other.frames);
        assertEquals("10\u2009000 times slower than the gas: one second shows 100 µs", other.words());
    }

    @Test
    void tooManyFramesOrNone_areOneSentence() {
        MotionSettings endless = new MotionSettings(
                SMALL,
                MotionSettings.Ground.GAP,
                1000,
                OptionalDouble.empty(),
                25,
                OptionalDouble.of(1e8),
                OptionalDouble.empty());
        String many = assertThrows(IllegalArgumentException.class, () -> new Clock(endless, 2.6e-3))
                .getMessage();
        assertTrue(many.contains("at most " + MotionSettings.MOST_FRAMES), many);
        assertThrows(IllegalArgumentException.class, () -> settings(MotionSettings.Ground.GAP, 0, 25));
        assertThrows(IllegalArgumentException.class, () -> settings(MotionSettings.Ground.GAP, 10, 0));
        Path none = new Path(
                new Release(0, 0.06, 0.5, 0),
                List.of(),
                new PathEnd.Failed(0, new PathEnd.Position(0, 0, 0.06, 0.5), "released outside the film"));
        String gone = assertThrows(
                        IllegalArgumentException.class,
                        () -> Ride.of(FILM, none, "", List.of(), settings(MotionSettings.Ground.GAP, 4, 10)))
                .getMessage();
        assertTrue(gone.contains("leaves the film where it starts"), gone);
    }

    @Test
    void otherFilms_canBeShownToo() {
        // Rotor the other way with the feed in it, smooth; a whole ring in one sector that stands still; long names.
        MotionSettings how = settings(MotionSettings.Ground.GAP, 1, 3);
        List<SpiralFilm> films = List.of(
                new SpiralFilm(12, -1000, false, Face.ROTOR),
                new SpiralFilm(1, 0, true, Face.STATOR),
                SpiralFilm.withLongNames());
        for (SpiralFilm film : films) {
            Frame frame = film == films.get(0) ? Frame.ROTATING : Frame.STATIONARY;
            MotionSettings seen = how.in(SMALL.speedsIn(frame).on(PictureSettings.Background.DARK));
            List<Path> paths = film.paths(frame);
            try (Animation ride = Ride.of(film, paths.get(0), "since the start", paths, seen);
                    Animation release = LetGo.of(film, paths, "since the start", seen)) {
                ride.draw(1);
                release.draw(2);
            }
        }
    }
}
