package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.whither.fate.FedPoint;
import org.whither.film.Face;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

class PlanTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final PictureSettings SETTINGS = PictureSettings.standard("Invented face");

    private static PlanLayout layout(PictureSettings settings, boolean withFeed) {
        return Plan.layout(new FilmShape(FILM), settings, withFeed, withFeed);
    }

    @ParameterizedTest
    @EnumSource(ViewingSide.class)
    void pressure_isReadBackThroughTheColourBar(ViewingSide side) {
        PictureSettings settings = SETTINGS.from(side);
        BufferedImage image = Plan.draw(FILM, List.of(), List.of(), settings);
        PlanLayout layout = layout(settings, false);
        PictureSettings.Range range = new FilmShape(FILM).pressureRange();
        int[] bar = new int[layout.pressureBar.width];
        for (int n = 0; n < bar.length; n++) {
            bar[n] = rgb(image, layout.pressureBar.x + n, layout.pressureBar.getCenterY());
        }
        for (int n = 0; n < 200; n++) {
            // On the dam, between the inner diameter and the feed, where no line is drawn over the ring.
            double r = 0.0512 + 0.0072 * (n % 20) / 20;
            double theta = 2 * Math.PI * (n + 0.37) / 200;
            if (insideFrame(layout, theta, r)) {
                continue;
            }
            Point2D p = layout.ring.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), 0);
            double read = range.low() + (range.high() - range.low()) * nearest(bar, rgb(image, p.getX(), p.getY()));
            double expected = FILM.pressure(0, 0, 0, theta, r, 0.5);
            // Half a pixel of the ring is 0.14 mm, over which the pressure changes by up to 0.2 bar near the bore.
            assertEquals(expected, read, 0.22e5 + 0.01 * (range.high() - range.low()), "at radius " + r);
        }
    }

    /** Whether a point lies near the outline of the enlarged view. */
    private static boolean insideFrame(PlanLayout layout, double theta, double r) {
        Point2D p = layout.sector.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), 0);
        java.awt.Rectangle near = layout.sectorWindow;
        near.grow(40, 40);
        boolean in = near.contains(p);
        near.grow(-40, -40);
        return in;
    }

    @Test
    void dam_isTheRingWhereThePressurePeaks() {
        // Inside the grooves, as wide as it is; and outside them, although the ring on the other side is wider.
        FilmShape.Band usual = new FilmShape(FILM).dam();
        assertEquals(new FilmShape.Band(SpiralFilm.INNER, SpiralFilm.TIP), usual);
        FilmShape other = new FilmShape(SpiralFilm.groovedInside());
        assertEquals(2, other.ungrooved().size());
        assertEquals(new FilmShape.Band(SpiralFilm.TIP, SpiralFilm.OUTER), other.dam());
        assertTrue(other.ungrooved().get(0).width() > other.dam().width());
        assertEquals("dam, without grooves", Plan.name(other, other.dam()));
        assertEquals("land, without grooves", Plan.name(other, other.ungrooved().get(0)));
    }

    @Test
    void footprint_isDrawnForItsFirstTimeRoundOnly() {
        List<PathPoint> points = new java.util.ArrayList<>();
        for (int n = 0; n <= 100; n++) {
            double theta = 1 - 0.3 * n;
            points.add(new PathPoint(n, theta, theta, 0.055, 0, 0.5, 1, 1e5));
        }
        org.whither.trace.PathEnd.Position end = new org.whither.trace.PathEnd.Position(-29, -29, 0.055, 0.5);
        Path path = new Path(
                new org.whither.trace.Release(1, 0.055, 0.5, 1),
                points,
                new org.whither.trace.PathEnd.StillInside(100, end));
        PlanLayout layout = layout(SETTINGS, false);
        Point2D[] shown = Plan.footprint(path, layout.ring);
        double length = 0;
        for (int n = 1; n < shown.length; n++) {
            length += shown[n].distance(shown[n - 1]);
        }
        double round = 2 * Math.PI * 55 * layout.ringScale;
        assertTrue(length < round && length > 0.85 * round, length + " of " + round + " pixels");
    }

    @Test
    void grooveEdges_areDarkWithALightCasing() {
        BufferedImage image = Plan.draw(FILM, List.of(), List.of(), SETTINGS);
        PlanLayout layout = layout(SETTINGS, false);
        java.awt.Rectangle inside = new java.awt.Rectangle(layout.sectorWindow);
        inside.grow(-12, -12);
        int cased = 0;
        int all = 0;
        for (FilmShape.Edge edge : new FilmShape(FILM).grooveEdges()) {
            for (int turn = -1; turn <= 1; turn++) {
                double pitch = turn * FILM.film().grid().pitch();
                double x0 = 1e3 * edge.r0() * Math.cos(edge.theta0() + pitch);
                double y0 = 1e3 * edge.r0() * Math.sin(edge.theta0() + pitch);
                double x1 = 1e3 * edge.r1() * Math.cos(edge.theta1() + pitch);
                double y1 = 1e3 * edge.r1() * Math.sin(edge.theta1() + pitch);
                Point2D a = layout.sector.project(x0, y0, 0);
                Point2D b = layout.sector.project(x1, y1, 0);
                Point2D m = layout.sector.project(0.5 * (x0 + x1), 0.5 * (y0 + y1), 0);
                double length = a.distance(b);
                if (!inside.contains(m) || length < 3) {
                    continue;
                }
                double nx = (b.getY() - a.getY()) / length;
                double ny = (a.getX() - b.getX()) / length;
                all++;
                double dark = Colours.lightness(rgb(image, m.getX(), m.getY()));
                double one = Colours.lightness(rgb(image, m.getX() + 1.6 * nx, m.getY() + 1.6 * ny));
                double two = Colours.lightness(rgb(image, m.getX() - 1.6 * nx, m.getY() - 1.6 * ny));
                cased += dark < 45 && Math.max(one, two) > 80 && Math.min(one, two) > dark + 15 ? 1 : 0;
            }
        }
        assertTrue(all > 20 && cased > 0.85 * all, cased + " of " + all + " edges");
    }

    @Test
    void fixedRange_setsTheBar() {
        BufferedImage image = Plan.draw(FILM, List.of(), List.of(), SETTINGS.pressures(0, 20e5));
        PlanLayout layout = layout(SETTINGS, false);
        double r = 0.0565;
        double theta = Math.PI / 2;
        Point2D p = layout.ring.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), 0);
        int expected = ColourScale.PRESSURE.colour(FILM.pressure(0, 0, 0, theta, r, 0.5) / 20e5);
        assertTrue(distance(expected, rgb(image, p.getX(), p.getY())) < 12);
    }

    @ParameterizedTest
    @CsvSource({"STATOR, 1, 1", "STATOR, -1, -1", "ROTOR, 1, -1", "ROTOR, -1, 1"})
    void rotationArrow_turnsAsTheRotorDoes(ViewingSide side, double rate, int anticlockwise) {
        // Right-hand rule about +z, z from the rotor to the stator: from the stator, +θ is anticlockwise.
        PlanLayout layout = layout(SETTINGS.from(side), false);
        Point2D[] arrow = Plan.rotationArrow(layout.ring, rate * 1000, 37);
        Point2D middle = layout.ring.project(0, 0, 0);
        double turn = 0;
        for (int n = 1; n < arrow.length; n++) {
            double ax = arrow[n - 1].getX() - middle.getX();
            double ay = middle.getY() - arrow[n - 1].getY();
            double bx = arrow[n].getX() - middle.getX();
            double by = middle.getY() - arrow[n].getY();
            turn += Math.atan2(ax * by - ay * bx, ax * bx + ay * by);
        }
        assertEquals(anticlockwise * Math.toRadians(104), turn, 1e-6);
        // The head is drawn at the tip: more ink there than at the tail.
        SpiralFilm film = new SpiralFilm(12, rate * 1000, true, Face.STATOR);
        BufferedImage image = Plan.draw(film, List.of(), List.of(), SETTINGS.from(side));
        assertTrue(inkAround(image, arrow[46]) > 1.4 * inkAround(image, arrow[4]));
    }

    private static int inkAround(BufferedImage image, Point2D point) {
        int count = 0;
        for (int y = -8; y <= 8; y++) {
            for (int x = -8; x <= 8; x++) {
                count += Colours.lightness(rgb(image, point.getX() + x, point.getY() + y)) < 50 ? 1 : 0;
            }
        }
        return count;
    }

    @Test
    void grooveEdges_lieWhereTheRotorSteps() {
        FilmShape shape = new FilmShape(FILM);
        FilmGrid grid = FILM.film().grid();
        List<FilmShape.Edge> edges = shape.grooveEdges();
        // In one sector: twelve columns of groove end at the tip; both walls run over the 18 rows outside it.
        assertEquals(12, edges.stream().filter(e -> e.r0() == e.r1()).count());
        assertEquals(2 * 18, edges.stream().filter(e -> e.r0() != e.r1()).count());
        assertTrue(edges.stream().allMatch(e -> e.r0() >= SpiralFilm.TIP - 1e-12));
        assertEquals(SpiralFilm.INNER, shape.dam().from(), 1e-12);
        assertEquals(SpiralFilm.TIP, shape.dam().to(), 1e-12);

        BufferedImage image = Plan.draw(FILM, List.of(), List.of(), SETTINGS);
        PlanLayout layout = layout(SETTINGS, false);
        int dark = 0;
        for (FilmShape.Edge edge : edges) {
            double theta = 0.5 * (edge.theta0() + edge.theta1()) + grid.pitch() * 4;
            double r = 0.5 * (edge.r0() + edge.r1());
            Point2D p = layout.ring.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), 0);
            double line = Colours.lightness(rgb(image, p.getX(), p.getY()));
            double beside = Colours.lightness(ColourScale.PRESSURE.colour((FILM.pressure(0, 0, 0, theta, r, 0.5)
                            - shape.pressureRange().low())
                    / (shape.pressureRange().high() - shape.pressureRange().low())));
            dark += line < beside - 12 ? 1 : 0;
        }
        assertTrue(dark > 0.9 * edges.size(), dark + " of " + edges.size() + " edges are drawn dark");
    }

    @Test
    void smoothGrooves_areOutlinedAtHalfHeight() {
        SpiralFilm smooth = new SpiralFilm(12, 1000, false, Face.STATOR);
        FilmShape shape = new FilmShape(smooth);
        double half = SpiralFilm.DATUM - 0.5 * SpiralFilm.DEPTH;
        FilmGrid grid = smooth.film().grid();
        List<FilmShape.Edge> edges = shape.grooveEdges();
        assertTrue(edges.size() > 30);
        for (FilmShape.Edge edge : edges) {
            double r = 0.5 * (edge.r0() + edge.r1());
            double theta = 0.5 * (edge.theta0() + edge.theta1());
            int j = grid.row(r);
            double within = theta - grid.intoSector(theta, j, r) * grid.pitch();
            int i = grid.column(within, j, r);
            assertEquals(half, smooth.rotorZ(i, j, within, r), 0.35 * SpiralFilm.DEPTH);
        }
    }

    @ParameterizedTest
    @EnumSource(ViewingSide.class)
    void pathEnds_areMarkedWhereTheyLie(ViewingSide side) {
        PictureSettings settings = SETTINGS.from(side);
        List<Path> paths = FILM.paths(Frame.ROTATING).subList(0, 1);
        BufferedImage image = Plan.draw(FILM, List.of(), paths, settings);
        PlanLayout layout = layout(settings, false);
        PathPoint end = paths.get(0).points().get(paths.get(0).points().size() - 1);
        Point2D p = layout.ring.project(
                1e3 * end.radius() * Math.cos(end.steadyTheta()), 1e3 * end.radius() * Math.sin(end.steadyTheta()), 0);
        assertEquals(Destination.of(paths.get(0).end()).colour(), rgb(image, p.getX(), p.getY()));
    }

    @ParameterizedTest
    @EnumSource(ViewingSide.class)
    void feedMarkers_haveTheColourOfTheirDestination(ViewingSide side) {
        PictureSettings settings = SETTINGS.from(side);
        List<FedPoint> fed = FILM.fed(30, 8);
        BufferedImage image = Plan.draw(FILM, fed, List.of(), settings);
        PlanLayout layout = layout(settings, true);
        int pitchColumns = 30;
        for (int n = 0; n < fed.size(); n++) {
            FedPoint point = fed.get(n);
            // By hand: angle along, radius up; seen from the stator +θ runs to the left where outwards is up.
            double along = (Math.floorDiv(n, 8) + 0.5) / pitchColumns;
            double f = side == ViewingSide.STATOR ? 1 - along : along;
            double x = layout.feedWindow.x + f * layout.feedWindow.width;
            double y = layout.feedWindow.getMaxY() - (n % 8 + 0.5) / 8 * layout.feedWindow.height;
            assertEquals(Destination.of(point.end()).colour(), rgb(image, x, y), "point " + n + " of " + fed.size());
        }
    }

    @ParameterizedTest
    @CsvSource({
        "1280, 720, LIGHT",
        "1280, 720, DARK",
        "1920, 1080, LIGHT",
        "800, 450, DARK",
        "800, 450, LIGHT",
        "640, 360, LIGHT"
    })
    void nothing_touchesTheEdgeOfThePicture(int width, int height, PictureSettings.Background background) {
        PictureSettings settings = SETTINGS.sized(width, height).on(background);
        edgeIsClear(Plan.draw(FILM, FILM.fed(30, 8), FILM.paths(Frame.ROTATING).subList(0, 2), settings), settings);
        edgeIsClear(
                Gap.draw(FILM, FILM.paths(Frame.ROTATING).subList(0, 2), new GapSettings(settings, 1000)), settings);
    }

    @Test
    void longNames_stayInThePicture() {
        SpiralFilm film = SpiralFilm.withLongNames();
        PictureSettings settings = PictureSettings.standard("A title that nobody would read to its end, ".repeat(5));
        List<Path> paths = film.paths(Frame.ROTATING).subList(0, 2);
        edgeIsClear(Plan.draw(film, film.fed(30, 8), paths, settings), settings);
        edgeIsClear(Gap.draw(film, paths, new GapSettings(settings, 1000)), settings);
    }

    static void edgeIsClear(BufferedImage image, PictureSettings settings) {
        int rim = (int) Math.max(3, 8 * Ink.unit(settings));
        int paper = Ink.paper(settings);
        int inked = 0;
        for (int y = 0; y < image.getHeight(); y++) {
            for (int x = 0; x < image.getWidth(); x++) {
                boolean inRim = x < rim || y < rim || x >= image.getWidth() - rim || y >= image.getHeight() - rim;
                boolean clear = (image.getRGB(x, y) & 0xffffff) == paper;
                assertTrue(!inRim || clear, "ink at " + x + ", " + y + " of " + image.getWidth());
                inked += clear ? 0 : 1;
            }
        }
        assertTrue(inked > 0.1 * image.getWidth() * image.getHeight(), "there is a picture");
    }

    @Test
    void size_outOfBounds_isRefused() {
        assertThrows(IllegalArgumentException.class, () -> SETTINGS.sized(200, 100));
        assertThrows(IllegalArgumentException.class, () -> new PictureSettings.Range(2, 2));
        IllegalArgumentException refusal = assertThrows(
                IllegalArgumentException.class,
                () -> Plan.draw(FILM, List.of(), List.of(), SETTINGS.sized(60000, 30000)));
        assertTrue(refusal.getMessage().contains("60000 × 30000 pixels"), refusal.getMessage());
    }

    static int rgb(BufferedImage image, double x, double y) {
        return image.getRGB((int) Math.floor(x), (int) Math.floor(y)) & 0xffffff;
    }

    static double distance(int a, int b) {
        double sum = 0;
        for (int shift = 0; shift <= 16; shift += 8) {
            sum += Math.pow((a >> shift & 0xff) - (b >> shift & 0xff), 2);
        }
        return Math.sqrt(sum);
    }

    /** Where along a bar of colours a colour lies, 0 … 1. */
    private static double nearest(int[] bar, int colour) {
        int best = 0;
        for (int n = 0; n < bar.length; n++) {
            best = distance(bar[n], colour) < distance(bar[best], colour) ? n : best;
        }
        return (best + 0.5) / bar.length;
    }
}
