package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;
import org.whither.trace.Release;

class GapTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final PictureSettings SETTINGS = PictureSettings.standard("Invented face");
    private static final PictureSettings LARGE = SETTINGS.sized(2560, 1440);

    @ParameterizedTest
    @ValueSource(doubles = {500, 1000, 2500})
    void grooveDepth_inThePicture_isTheExaggeratedOne(double exaggeration) {
        GapScene gap = new GapScene(new FilmShape(FILM), exaggeration);
        // Large, so that a pixel is little beside the depth; from low enough that depths are long in the picture.
        Viewpoint view = new Viewpoint(
                Math.PI + Math.toRadians(gap.upstreamIsTo ? 6 : -6), Math.toRadians(54), Math.toRadians(22));
        Camera camera = Gap.camera(gap, LARGE, view);
        BufferedImage image =
                Gap.draw(FILM, List.of(), new GapSettings(LARGE, exaggeration, java.util.Optional.of(view)));
        // Two places on the upper rim of the cut at the open end, one on a land and one on the floor of the groove that
        // the cut crosses outside its inner end.
        double land = gap.from;
        double groove = gap.from;
        double landTop = edge(image, place(camera, gap, land, 0.066, SpiralFilm.DATUM));
        double r = 0.0632;
        assertEquals(SpiralFilm.DATUM - SpiralFilm.DEPTH, gap.rotorAt(groove, r), 1e-12);
        double floor = edge(image, place(camera, gap, groove, r, SpiralFilm.DATUM - SpiralFilm.DEPTH));
        Point2D landThere = place(camera, gap, groove, r, SpiralFilm.DATUM);
        double drawn = floor - landThere.getY();
        // At half depth, since the view is in perspective.
        double half = SpiralFilm.DATUM - 0.5 * SpiralFilm.DEPTH;
        Point2D up = place(camera, gap, groove, r, half + 0.5e-6);
        Point2D foot = place(camera, gap, groove, r, half - 0.5e-6);
        double perMicrometre = foot.getY() - up.getY();
        assertEquals(5, drawn / perMicrometre, 5 * 0.06, "groove of 5 µm, measured in the picture");
        assertEquals(place(camera, gap, land, 0.066, SpiralFilm.DATUM).getY(), landTop, 2.4);
        // And the scale itself: 1 µm is drawn as exaggeration times 1 µm.
        assertEquals(1e-3 * exaggeration, gap.height(SpiralFilm.DATUM + 1e-6), 1e-9);
    }

    private static Point2D place(Camera camera, GapScene gap, double theta, double r, double z) {
        double[] p = gap.place(theta, r, z);
        return camera.project(p[0], p[1], p[2]);
    }

    /** The row near a point, in its column, at which the picture changes most: the rim between a face and its side. */
    private static double edge(BufferedImage image, Point2D near) {
        int x = (int) near.getX();
        double best = -1;
        int row = 0;
        for (int y = (int) near.getY() - 9; y <= near.getY() + 9; y++) {
            double change = PlanTest.distance(PlanTest.rgb(image, x, y - 2), PlanTest.rgb(image, x, y + 1));
            if (change > best) {
                best = change;
                row = y;
            }
        }
        assertTrue(best > 12, "a rim near row " + near.getY() + "; largest change " + best);
        return row;
    }

    @ParameterizedTest
    @ValueSource(doubles = {300, 1000})
    void floors_ofTheGrooves_areSeen(double exaggeration) {
        GapScene gap = new GapScene(new FilmShape(FILM), exaggeration);
        double usual = seenFloors(gap, Gap.camera(gap, SETTINGS));
        double low = seenFloors(gap, Gap.camera(gap, SETTINGS, new Viewpoint(Math.PI, Math.toRadians(40), 0.38)));
        assertTrue(usual > 0.25, usual + " of the floors is seen");
        assertTrue(usual > 1.1 * low, usual + " is more than from lower down, " + low);
    }

    private static double seenFloors(GapScene gap, Camera camera) {
        int seen = 0;
        int all = 0;
        for (int a = 1; a < 60; a++) {
            for (int b = 1; b < 20; b++) {
                double theta = gap.openFrom + (gap.openTo - gap.openFrom) * a / 60;
                double r = SpiralFilm.TIP + (SpiralFilm.OUTER - SpiralFilm.TIP) * b / 20;
                double z = gap.rotorAt(theta, r);
                if (z < SpiralFilm.DATUM - 0.5 * SpiralFilm.DEPTH) {
                    all++;
                    seen += gap.hidden(gap.place(theta, r, z), camera.eye()) ? 0 : 1;
                }
            }
        }
        return (double) seen / all;
    }

    @Test
    void walls_areUprightAndAsHighAsTheStep() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Mesh rotor = gap.rings().get(0).mesh();
        float[] p = rotor.positions();
        float[] n = rotor.normals();
        int walls = 0;
        int[] t = rotor.triangles();
        for (int k = 0; k < t.length; k += 3) {
            int a = t[k];
            double r = Math.hypot(p[3 * a], p[3 * a + 1]);
            boolean upright = n[3 * a + 2] == 0;
            boolean inside = r > 1e3 * SpiralFilm.INNER + 0.01;
            for (int c = 0; c < 3; c++) {
                inside &= Math.hypot(p[3 * t[k + c]], p[3 * t[k + c] + 1]) < 1e3 * SpiralFilm.OUTER - 0.01;
            }
            if (upright && inside) {
                double low = Math.min(p[3 * a + 2], Math.min(p[3 * t[k + 1] + 2], p[3 * t[k + 2] + 2]));
                double high = Math.max(p[3 * a + 2], Math.max(p[3 * t[k + 1] + 2], p[3 * t[k + 2] + 2]));
                assertEquals(5.0, high - low, 1e-4, "5 µm drawn 1000 times too large is 5 mm");
                walls++;
            }
        }
        assertTrue(walls > 60, walls + " triangles of walls");
    }

    @Test
    void directions_areCarriedAsPointsAre() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        double theta = gap.from + 0.3;
        double r = 0.06;
        double z = SpiralFilm.DATUM + 1e-6;
        double[] v = {3, -20, 0.002};
        double dt = 1e-8;
        double[] a = gap.place(theta, r, z);
        double[] b = gap.place(theta + v[1] * dt / r, r + v[0] * dt, z + v[2] * dt);
        double[] d = {b[0] - a[0], b[1] - a[1], b[2] - a[2]};
        double length = Math.sqrt(d[0] * d[0] + d[1] * d[1] + d[2] * d[2]);
        double[] drawn = gap.drawnDirection(theta, v[0], v[1], v[2]);
        assertArrayEquals(new double[] {d[0] / length, d[1] / length, d[2] / length}, drawn, 1e-4);
    }

    /** A path at constant radius over the dam, and its speed. */
    private static Path arc(double from, double to, double r, double sigma, double speed) {
        List<PathPoint> points = new ArrayList<>();
        double z = SpiralFilm.DATUM + sigma * SpiralFilm.LAND;
        for (int n = 0; n <= 40; n++) {
            double theta = from + (to - from) * n / 40;
            points.add(new PathPoint(n * 1e-5, theta, theta, r, z, sigma, speed, 5e5));
        }
        return new Path(
                new Release(from, r, sigma, 1e-6),
                points,
                new org.whither.trace.PathEnd.StillInside(
                        4e-4, new org.whither.trace.PathEnd.Position(to, to, r, sigma)));
    }

    @ParameterizedTest
    @ValueSource(doubles = {8, 25, 52})
    void speed_isReadBackFromTheTube(double speed) {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        double start = gap.openTo - 0.1;
        Path path = arc(start, start - 0.4, 0.055, 0.5, speed);
        BufferedImage image = Gap.draw(FILM, List.of(path), new GapSettings(SETTINGS.speeds(0, 60), 1000));
        // Between two markers, which stand at every twentieth of a millisecond; light changes brightness, not hue.
        Point2D p =
                place(camera, gap, start - 0.4 * 0.45 - 0.4 * 0.02, 0.055, SpiralFilm.DATUM + 0.5 * SpiralFilm.LAND);
        int seen = PlanTest.rgb(image, p.getX(), p.getY());
        double best = 0;
        double least = Double.POSITIVE_INFINITY;
        for (int n = 0; n <= 600; n++) {
            double difference = hueDistance(seen, ColourScale.SPEED.colour(n / 600.0));
            if (difference < least) {
                least = difference;
                best = n / 10.0;
            }
        }
        assertEquals(speed, best, 5, "speed read from the hue of the tube");
    }

    private static double hueDistance(int a, int b) {
        double sum = 0;
        double la = 0;
        double lb = 0;
        double[] p = new double[3];
        double[] q = new double[3];
        for (int c = 0; c < 3; c++) {
            p[c] = Math.pow((a >> (8 * c) & 0xff) / 255.0, 2.2);
            q[c] = Math.pow((b >> (8 * c) & 0xff) / 255.0, 2.2);
            la += p[c] * p[c];
            lb += q[c] * q[c];
        }
        for (int c = 0; c < 3; c++) {
            sum += Math.pow(p[c] / Math.sqrt(la) - q[c] / Math.sqrt(lb), 2);
        }
        return sum;
    }

    @Test
    void markers_standAtEqualTimes() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        double start = gap.openTo - 0.1;
        Path path = arc(start, start - 0.4, 0.055, 0.5, 10);
        BufferedImage image = Gap.draw(FILM, List.of(path), new GapSettings(SETTINGS, 1000));
        // The path lasts 400 µs: a marker each 50 µs.
        for (int n = 0; n < 8; n++) {
            Point2D on = place(camera, gap, start - 0.4 * n / 8, 0.055, SpiralFilm.DATUM + 0.5 * SpiralFilm.LAND);
            assertTrue(whiteness(PlanTest.rgb(image, on.getX(), on.getY())) > 0.9, "marker " + n);
            Point2D between =
                    place(camera, gap, start - 0.4 * (n + 0.5) / 8, 0.055, SpiralFilm.DATUM + 0.5 * SpiralFilm.LAND);
            assertTrue(whiteness(PlanTest.rgb(image, between.getX(), between.getY())) < 0.8, "after marker " + n);
        }
    }

    /** Least over greatest channel: 1 for a grey. */
    private static double whiteness(int colour) {
        int r = colour >> 16 & 0xff;
        int g = colour >> 8 & 0xff;
        int b = colour & 0xff;
        return (double) Math.min(r, Math.min(g, b)) / Math.max(1, Math.max(r, Math.max(g, b)));
    }

    @Test
    void rotationArrow_pointsToTheLeftForPositiveRotation() {
        // The eye is over the bore and the stator above: right = towards the eye × up = −r × z = θ turned round.
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        Point2D[] forward = Gap.rotationArrow(gap, camera, 100, 50, -5);
        Point2D[] backward = Gap.rotationArrow(gap, camera, -100, 50, -5);
        assertTrue(forward[40].getX() < forward[0].getX() - 50);
        assertTrue(backward[40].getX() > backward[0].getX() + 50);
        double[] a = gap.place(gap.middle, 0.068, SpiralFilm.DATUM);
        double[] b = gap.place(gap.middle + 0.01, 0.068, SpiralFilm.DATUM);
        assertTrue(camera.project(b[0], b[1], b[2]).x < camera.project(a[0], a[1], a[2]).x);
        // Inwards is down, as in a plan.
        double[] c = gap.place(gap.middle, 0.060, SpiralFilm.DATUM);
        assertTrue(camera.project(c[0], c[1], c[2]).y > camera.project(a[0], a[1], a[2]).y);
    }

    @ParameterizedTest
    @ValueSource(ints = {0, 1, 5, -7})
    void path_isShownOnceFromTheUpstreamEnd(int sectors) {
        double pitch = FILM.film().grid().pitch();
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        assertEquals(0, Math.IEEEremainder(gap.to - gap.from, pitch), 1e-12);
        // Two and a half times round the shaft.
        double start = gap.openTo - 0.2 + sectors * pitch;
        Path path = arc(start, start - 5 * Math.PI, 0.055, 0.5, 10);
        ShownPath shown = ShownPath.of(path, gap);
        assertEquals(gap.openTo - 0.2, shown.theta(0), 1e-9);
        for (int n = 1; n < shown.size(); n++) {
            assertTrue(shown.theta(n) < shown.theta(n - 1) || n == 1, "the path goes on and never comes back");
            assertTrue(shown.theta(n - 1) - shown.theta(n) < 0.02, "without a gap");
            assertTrue(shown.theta(n) >= gap.from, "inside the part shown");
        }
        assertEquals(gap.from, shown.theta(shown.size() - 1), 1e-12);
        assertEquals(false, shown.whole());
        double share = (shown.theta(0) - gap.from) / (5 * Math.PI);
        assertEquals(4e-4 * share, shown.duration(), 1e-9);
    }

    @Test
    void path_afterItHasLeftThePart_isNotDrawn() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        double start = gap.openTo - 0.2;
        double reach = start - gap.from;
        // Of two paths that are one inside the part, one ends soon after it and the other goes on round the ring.
        Path longer = arc(start, start - 20 * reach, 0.055, 0.5, 10);
        List<PathPoint> few = new ArrayList<>(longer.points().subList(0, 4));
        Path shorter = new Path(longer.release(), few, longer.end());
        BufferedImage a = Gap.draw(FILM, List.of(longer), new GapSettings(SETTINGS, 1000));
        BufferedImage b = Gap.draw(FILM, List.of(shorter), new GapSettings(SETTINGS, 1000));
        for (int y = 0; y < a.getHeight(); y++) {
            for (int x = 0; x < a.getWidth(); x++) {
                assertEquals(b.getRGB(x, y), a.getRGB(x, y), "pixel " + x + ", " + y);
            }
        }
    }

    @Test
    void arrowhead_isOpenWhereThePathGoesOn() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        double r = 0.055;
        // One path ends a hair inside the part shown, the other goes on.
        Path ends = arc(gap.openTo - 0.3, gap.from + 1e-4, r, 0.5, 10);
        Path goesOn = arc(gap.openTo - 0.3, gap.from - 1, r, 0.5, 10);
        double back = 0.85 * GapScene.OPEN_HEAD * gap.tubeRadius();
        double aside = 0.62 * back;
        double theta = gap.from + 1e-3 * back / r;
        int wings = 0;
        for (Path path : List.of(ends, goesOn)) {
            BufferedImage image = Gap.draw(FILM, List.of(path), new GapSettings(SETTINGS.speeds(0, 60), 1000));
            for (int side = -1; side <= 1; side += 2) {
                Point2D p =
                        place(camera, gap, theta, r + 1e-3 * side * aside, SpiralFilm.DATUM + 0.5 * SpiralFilm.LAND);
                int seen = PlanTest.rgb(image, p.getX(), p.getY());
                boolean blue = (seen & 0xff) > (seen >> 16 & 0xff) + 30;
                assertEquals(
                        path.equals(goesOn), blue, "wing " + side + " has the colour " + Integer.toHexString(seen));
                wings++;
            }
        }
        assertEquals(4, wings);
    }

    @Test
    void end_isMarkedWithTheColourOfItsDestination() {
        GapScene gap = new GapScene(new FilmShape(FILM), 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        double start = gap.openTo - 0.1;
        Path held = arc(start, start - 0.4, 0.055, 0.5, 10);
        Path inner = new Path(
                held.release(),
                held.points(),
                new org.whither.trace.PathEnd.Left(
                        org.whither.trace.PathEnd.Border.INNER, 4e-4, held.end().position()));
        for (Path path : List.of(held, inner)) {
            BufferedImage image = Gap.draw(FILM, List.of(path), new GapSettings(SETTINGS, 1000));
            double[] p = gap.endOf(ShownPath.of(path, gap), 9 * gap.tubeRadius())[1];
            Point2D at = camera.project(p[0], p[1], p[2]);
            assertEquals(Destination.of(path.end()).colour(), PlanTest.rgb(image, at.getX(), at.getY()));
        }
    }

    @ParameterizedTest
    @EnumSource(FaceWords.Kind.class)
    void wordsOnTheFace_standOnWhatTheyName(FaceWords.Kind kind) {
        FilmShape shape = new FilmShape(FILM);
        GapScene gap = new GapScene(shape, 1000);
        Camera camera = Gap.camera(gap, SETTINGS);
        FaceWords.Place place = new FaceWords(shape, gap, camera, List.of()).find(kind, 40, 11);
        boolean floor = kind == FaceWords.Kind.GROOVE;
        // By eye of the depth test: only the floors of the grooves are red, all else is not.
        Mesh rotor = gap.rings().get(0).mesh();
        List<Integer> floors = new ArrayList<>();
        int[] t = rotor.triangles();
        for (int k = 0; k < t.length; k += 3) {
            boolean low = true;
            for (int c = 0; c < 3; c++) {
                low &= Math.abs(rotor.positions()[3 * t[k + c] + 2] + 5) < 1e-3;
            }
            if (low) {
                floors.addAll(List.of(t[k], t[k + 1], t[k + 2]));
            }
        }
        Mesh red = new Mesh(
                rotor.positions(),
                rotor.normals(),
                rotor.values(),
                floors.stream().mapToInt(Integer::intValue).toArray());
        List<Scene.Item> items = new ArrayList<>();
        gap.rings().forEach(item -> items.add(new Scene.Item(item.mesh(), Scene.Material.plain(0x0000ff, 1), 0)));
        items.add(new Scene.Item(red, Scene.Material.plain(0xff0000, 1), 0));
        try (Canvas canvas = new Canvas(SETTINGS.width(), SETTINGS.height())) {
            BufferedImage image =
                    canvas.draw(0, List.of(new Canvas.View(new Scene(items, Scene.Light.from(0, 0, 1)), camera)));
            assertEquals(floor ? 0xff0000 : 0x0000ff, PlanTest.rgb(image, place.x(), place.y()), kind.words());
        }
        double radius = place.radius();
        assertEquals(kind == FaceWords.Kind.DAM, radius < SpiralFilm.TIP, "only the dam is inside the grooves' ends");
    }

    @Test
    void speedScale_endsAtRoundNumbersAndIsNotMostlyEmpty() {
        assertEquals(new PictureSettings.Range(0, 80), Gap.range(1.3, 78.2));
        assertEquals(new PictureSettings.Range(40, 46), Gap.range(40.4, 45.1));
        PictureSettings.Range one = Gap.range(10, 10);
        assertTrue(one.low() <= 10 && one.high() >= 10 && one.high() - one.low() <= 2, one.toString());
        for (double high = 1; high < 200; high *= 1.07) {
            PictureSettings.Range range = Gap.range(0, high);
            assertTrue(range.high() >= high * (1 - 1e-9) && high > 0.75 * range.high(), range + " for " + high);
        }
    }

    @Test
    void exaggeration_mustBePositive() {
        assertThrows(IllegalArgumentException.class, () -> new GapSettings(SETTINGS, 0));
        assertThrows(IllegalArgumentException.class, () -> new GapSettings(SETTINGS, Double.NaN));
        assertTrue(Gap.draw(FILM, FILM.paths(Frame.STATIONARY), new GapSettings(SETTINGS.sized(640, 360), 0.5))
                        .getWidth()
                == 640);
    }

    @Test
    void clip_keepsThePartOnOneSide() {
        double[] square = {0, 0, 1, 0, 1, 1, 0, 1};
        double[] part = GapScene.clip(square, 0.25, true);
        double area = 0;
        for (int n = 0; n < part.length; n += 2) {
            int m = (n + 2) % part.length;
            area += 0.5 * (part[n] * part[m + 1] - part[m] * part[n + 1]);
        }
        assertEquals(0.75, area, 1e-12);
        assertEquals(0, GapScene.clip(square, 2, true).length);
    }

    /** A path of no length, of a tracer that leaves where it is released, is no fault of the picture's. */
    @Test
    void draw_pathWithoutLength_isDrawn() {
        SpiralFilm film = new SpiralFilm();
        Path path = film.paths(Frame.ROTATING).get(0);
        PathPoint first = path.points().get(0);
        for (List<PathPoint> points : List.of(List.of(first, first), List.of(first), List.<PathPoint>of())) {
            Path stub = new Path(path.release(), points, path.end());
            BufferedImage image = Gap.draw(film, List.of(stub), GapSettings.standard("short"));
            assertEquals(1280, image.getWidth());
        }
    }
}
