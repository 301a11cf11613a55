package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.image.BufferedImage;
import java.util.Arrays;
import java.util.List;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.whither.eddy.Place;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;

class MeridianTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final PictureSettings SETTINGS = PictureSettings.standard("Invented face");

    /** Gas that runs outwards above three tenths of the film and inwards below. */
    private static final class TurningBack extends FilmVariant {
        TurningBack() {
            super(FILM);
        }

        @Override
        public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
            rates[0] = -100;
            rates[1] = 10 * (sigma - 0.3);
            rates[2] = 0;
        }
    }

    @ParameterizedTest
    @ValueSource(doubles = {300, 500})
    void thickness_inThePicture_isTheExaggeratedOne(double exaggeration) {
        // At the middle of a groove where it is outside, over the land inside.
        double angle = SpiralFilm.lean(0.066) + 0.25 * FILM.film().grid().pitch();
        MeridianSettings settings =
                new MeridianSettings(SETTINGS, OptionalDouble.of(angle), OptionalDouble.of(exaggeration));
        BufferedImage image = Meridian.draw(FILM, List.of(), settings);
        Meridian.Layout layout = Meridian.layout(FILM, settings);
        assertEquals(exaggeration, layout.exaggeration);
        assertEquals(layout.window.width / 18.0, layout.scale, 1e-9, "18 mm of face over the window");
        double[] radii = {0.054, 0.066};
        double[] films = {SpiralFilm.LAND, SpiralFilm.LAND + SpiralFilm.DEPTH};
        for (int n = 0; n < 2; n++) {
            int x = (int) layout.x(radii[n]);
            int stator = -1;
            int rotor = -1;
            for (int y = layout.window.y; y < layout.window.getMaxY(); y++) {
                int colour = image.getRGB(x, y) & 0xffffff;
                stator = PlanTest.distance(colour, GapScene.STATOR) < 10 ? y : stator;
                rotor = rotor < 0 && PlanTest.distance(colour, GapScene.ROTOR) < 10 ? y : rotor;
            }
            double drawn = (rotor - stator - 1) / layout.scale;
            // Lines of 1.3 pixels along both faces.
            assertEquals(1e3 * exaggeration * films[n], drawn, 3 / layout.scale, "mm, at radius " + radii[n]);
        }
    }

    @Test
    void speed_isReadBackThroughTheColourBar() {
        MeridianSettings settings = MeridianSettings.at(SETTINGS.speeds(0, 100), 0.1);
        BufferedImage image = Meridian.draw(FILM, List.of(), settings);
        Meridian.Layout layout = Meridian.layout(FILM, settings);
        int[] bar = new int[(int) layout.bar.getWidth()];
        for (int n = 0; n < bar.length; n++) {
            bar[n] = PlanTest.rgb(image, layout.bar.getX() + n, layout.bar.getCenterY());
        }
        double[] rates = new double[3];
        double[] errors = new double[300];
        for (int n = 0; n < errors.length; n++) {
            double r = 0.0505 + 0.0083 * (n % 30) / 30;
            double sigma = 0.05 + 0.9 * (n / 30) / 10;
            FILM.rates(0, FILM.film().grid().row(r), 0, 0.1, r, sigma, rates);
            double expected = Math.hypot(rates[1], r * rates[0]);
            double x = layout.x(r);
            double y = layout.y(SpiralFilm.DATUM + sigma * SpiralFilm.LAND);
            int best = 0;
            int colour = PlanTest.rgb(image, x, y);
            for (int m = 0; m < bar.length; m++) {
                best = PlanTest.distance(bar[m], colour) < PlanTest.distance(bar[best], colour) ? m : best;
            }
            errors[n] = Math.abs(100 * (best + 0.5) / bar.length - expected);
        }
        Arrays.sort(errors);
        // Stream lines lie over some of the points.
        assertTrue(errors[(int) (0.7 * errors.length)] < 1.5, "m/s: " + errors[(int) (0.7 * errors.length)]);
    }

    @Test
    void reversedFlow_isHatched_andNothingElse() {
        FilmFlow film = new TurningBack();
        MeridianSettings settings = MeridianSettings.at(SETTINGS.speeds(0, 100), 0.1);
        BufferedImage image = Meridian.draw(film, List.of(), settings);
        Meridian.Layout layout = Meridian.layout(film, settings);
        for (double sigma : new double[] {0.15, 0.45, 0.66}) {
            int dark = 0;
            int all = 0;
            for (int x = (int) layout.x(0.0505); x < layout.x(0.0585); x++) {
                double r = layout.radius(x + 0.5);
                double y = layout.y(SpiralFilm.DATUM + sigma * SpiralFilm.LAND);
                double speed = Math.hypot(10 * (sigma - 0.3), 100 * r);
                double plain = Colours.lightness(ColourScale.SPEED.colour(speed / 100));
                dark += Colours.lightness(PlanTest.rgb(image, x, y)) < plain - 1.5 ? 1 : 0;
                all++;
            }
            double share = (double) dark / all;
            if (sigma < 0.3) {
                assertTrue(share > 0.9, "hatched where it runs back: " + share);
            } else {
                // A stream line may run along this height for a part of the way.
                assertTrue(share < 0.35, "not hatched at " + sigma + ": " + share);
            }
        }
    }

    @Test
    void betweenTwoLinesOfAnAverage_runsTheFlowThatTheLegendTells() {
        FilmFlow flow = FilmFlow.of(FILM.film());
        MeridianSettings settings = MeridianSettings.averaged(SETTINGS);
        Meridian.Layout layout = Meridian.layout(flow, settings);
        double tube = Meridian.tube(flow, settings);
        List<double[]> lines = Meridian.contours(flow, settings);
        int j = FILM.film().grid().row(0.055);
        double r = 0.5 * (FILM.film().grid().radius(j) + FILM.film().grid().radius(j + 1));
        double x = layout.x(r);
        int crossings = 0;
        for (double[] line : lines) {
            for (int n = 2; n < line.length; n += 2) {
                crossings += line[n - 2] < x != line[n] < x ? 1 : 0;
            }
        }
        double through = 0;
        for (int i = 0; i < FILM.film().grid().cellsTheta(); i++) {
            through += flow.radialFlowBelow(i, j, 1);
        }
        through *= FILM.film().grid().sectors();
        assertEquals(Math.abs(through) / tube, crossings, 1, "lines over the dam");
        assertTrue(crossings > 1);
    }

    @Test
    void zone_isOutlinedWhereItsGasIs() {
        List<Place> points = List.of(
                new Place(0.1, 0.053, 0.2),
                new Place(0.1, 0.056, 0.2),
                new Place(0.1, 0.056, 0.7),
                new Place(0.1, 0.053, 0.7),
                new Place(0.1, 0.0545, 0.5));
        assertArrayEquals(
                new double[] {0.053, 0.2, 0.056, 0.2, 0.056, 0.7, 0.053, 0.7},
                Meridian.hull(points),
                1e-12,
                "corners in turn, without the point inside");
    }

    @Test
    void frame_changesTheSpeeds() {
        Section rotating = new Section(new FilmShape(FILM), OptionalDouble.of(0.1), Frame.ROTATING);
        Section stationary = new Section(new FilmShape(FILM), OptionalDouble.of(0.1), Frame.STATIONARY);
        // At the rotor the gas stands still seen from it, and moves with it seen from the stator; at the stator the
        // other way round.
        double rim = FILM.film().conditions().rotationRate() * rotating.radius(0);
        assertEquals(0, rotating.speed(0, 0), 1e-9);
        assertEquals(rim, stationary.speed(0, 0), 1e-9 * rim);
        assertEquals(rim, rotating.speed(0, Section.LEVELS), 1e-9 * rim);
        assertEquals(0, stationary.speed(0, Section.LEVELS), 1e-9);
    }
}
