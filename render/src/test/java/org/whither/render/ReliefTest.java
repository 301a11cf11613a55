package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

class ReliefTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final PictureSettings SETTINGS = PictureSettings.standard("Invented face");

    @ParameterizedTest
    @CsvSource({"0.5", "1", "2"})
    void surface_isAsHighAsThePrintedScaleSays(double barPerMillimetre) {
        ReliefSettings settings =
                new ReliefSettings(SETTINGS, Part.RING, OptionalDouble.of(barPerMillimetre), Optional.empty());
        ReliefScene scene = Relief.layout(FILM, List.of(), settings).scene();
        double base = new FilmShape(FILM).pressureRange().low();
        FilmGrid grid = FILM.film().grid();
        Mesh mesh = scene.surface().get(0).mesh();
        float[] p = mesh.positions();
        double worst = 0;
        for (int n = 0; n < p.length; n += 3) {
            double r = 1e-3 * Math.hypot(p[n], p[n + 1]);
            double theta = Math.atan2(p[n + 1], p[n]);
            double expected = 1e-5 * (FILM.pressure(0, 0, 0, theta, r, 0.5) - base) / barPerMillimetre;
            // Between nodes the surface is straight, so that it misses a little of a ridge.
            worst = Math.max(worst, Math.abs(p[n + 2] - expected));
        }
        double highest = 1e-5 * (new FilmShape(FILM).pressureRange().high() - base) / barPerMillimetre;
        assertTrue(worst < 0.005 * highest, worst + " mm of " + highest);
        assertTrue(p.length / 3 >= grid.nodes());
    }

    @Test
    void ridges_inThePicture_areAsHighAsTheScaleSays() {
        // On dark paper: the highest pressures are nearly as light as light paper.
        PictureSettings dark = SETTINGS.on(PictureSettings.Background.DARK);
        ReliefSettings settings =
                new ReliefSettings(dark, Part.RING, OptionalDouble.of(0.5), Optional.of(ReliefSettings.RING_CAMERA));
        BufferedImage image = Relief.draw(FILM, List.of(), settings);
        Relief.Layout layout = Relief.layout(FILM, List.of(), settings);
        double base = new FilmShape(FILM).pressureRange().low();
        // The far side's outline against the paper, from the formula of the pressure alone.
        double[] top = new double[image.getWidth()];
        double[] perMillimetre = new double[image.getWidth()];
        java.util.Arrays.fill(top, image.getHeight());
        for (int a = 0; a < 2600; a++) {
            double theta = Math.toRadians(35 + 110.0 * a / 2600);
            for (int b = 0; b <= 110; b++) {
                double r = 0.057 + 0.0109 * b / 110;
                double z = 1e-5 * (FILM.pressure(0, 0, 0, theta, r, 0.5) - base) / 0.5;
                double x = 1e3 * r * Math.cos(theta);
                double y = 1e3 * r * Math.sin(theta);
                Point2D p = layout.camera.project(x, y, z);
                int column = (int) p.getX();
                if (p.getY() < top[column]) {
                    top[column] = p.getY();
                    perMillimetre[column] =
                            p.getY() - layout.camera.project(x, y, z + 1).getY();
                }
            }
        }
        int paper = Ink.paper(dark);
        for (int x = 500; x < 840; x += 5) {
            int y = (int) layout.page.top;
            while (PlanTest.distance(image.getRGB(x, y) & 0xffffff, paper) < 30) {
                y++;
            }
            // Half a bar is one mm of height here.
            double error = (y + 0.5 - top[x]) / perMillimetre[x] * 0.5;
            assertEquals(0, error, 0.35, "bar, at column " + x + ": outline at " + y + ", expected at " + top[x]);
        }
    }

    @Test
    void pathEnds_areMarkedWhereTheyLie() {
        List<Path> paths = FILM.paths(Frame.ROTATING).subList(0, 1);
        ReliefSettings settings = ReliefSettings.ring(SETTINGS);
        BufferedImage image = Relief.draw(FILM, paths, settings);
        Relief.Layout layout = Relief.layout(FILM, paths, settings);
        PathPoint end = paths.get(0).points().get(paths.get(0).points().size() - 1);
        // On the surface, from the formula of the pressure.
        double base = new FilmShape(FILM).pressureRange().low();
        double z = 1e-5
                * (FILM.pressure(0, 0, 0, end.steadyTheta(), end.radius(), 0.5) - base)
                / layout.scene().barPerMillimetre();
        Point2D p = layout.camera.project(
                1e3 * end.radius() * Math.cos(end.steadyTheta()), 1e3 * end.radius() * Math.sin(end.steadyTheta()), z);
        assertEquals(Destination.of(paths.get(0).end()).colour(), PlanTest.rgb(image, p.getX(), p.getY()));
    }

    @ParameterizedTest
    @CsvSource({"1, 1", "-1, -1"})
    void rotationArrow_turnsAsTheRotorDoes_seenFromTheStator(double rate, double anticlockwise) {
        Camera camera = Relief.layout(FILM, List.of(), ReliefSettings.ring(SETTINGS)).camera;
        Point2D[] arrow = Relief.rotationArrow(camera, rate, 0.036, Math.PI / 2, 0);
        Point2D middle = camera.project(0, 0, 0);
        double turn = 0;
        for (int n = 1; n < arrow.length; n++) {
            double ax = arrow[n - 1].getX() - middle.getX();
            double ay = middle.getY() - arrow[n - 1].getY();
            double bx = arrow[n].getX() - middle.getX();
            double by = middle.getY() - arrow[n].getY();
            turn += Math.atan2(ax * by - ay * bx, ax * bx + ay * by);
        }
        assertTrue(anticlockwise * turn > Math.toRadians(60), "turned by " + Math.toDegrees(turn) + "°");
    }

    @Test
    void sector_endsAPathThatLeavesIt() {
        ReliefScene scene =
                Relief.layout(FILM, List.of(), ReliefSettings.sector(SETTINGS)).scene();
        Path path = FILM.paths(Frame.ROTATING).get(1);
        double[][] line = scene.line(path, new PictureSettings.Range(0, 60));
        FilmGrid grid = FILM.film().grid();
        double before = Double.NaN;
        for (int n = 0; n < line[1].length; n++) {
            double theta = Math.atan2(line[0][3 * n + 1], line[0][3 * n]);
            double r = 1e-3 * Math.hypot(line[0][3 * n], line[0][3 * n + 1]);
            double along = theta - grid.lineTheta(0, grid.row(r), r);
            assertTrue(along > -1e-6 && along < 2 * grid.pitch() + 1e-6, "inside the two sectors: " + along);
            assertTrue(n == 0 || Math.abs(theta - before) < 0.03, "without a jump");
            before = theta;
        }
        assertTrue(line[1].length > 5);
    }

    @Test
    void settings_outOfBounds_areRefused() {
        assertThrows(
                IllegalArgumentException.class,
                () -> new ReliefSettings(SETTINGS, Part.RING, OptionalDouble.of(0), Optional.empty()));
        assertThrows(IllegalArgumentException.class, () -> new Viewpoint(0, Math.PI / 2, 0.3));
    }
}
