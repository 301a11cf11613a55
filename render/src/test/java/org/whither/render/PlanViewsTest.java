package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Exchange;
import org.whither.eddy.Place;
import org.whither.eddy.Range;
import org.whither.eddy.Sense;
import org.whither.eddy.Zone;
import org.whither.fate.DestinationMap;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Direction;
import org.whither.trace.TraceSettings;

class PlanViewsTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final FilmGrid GRID = FILM.film().grid();
    private static final PictureSettings SETTINGS = PictureSettings.standard("Invented face");
    private static final TraceSettings HOW = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-4, 0.2);

    private static PlanSettings plan(PictureSettings settings, Quantity quantity, Part part) {
        return new PlanSettings(settings, quantity, part, Optional.empty());
    }

    private static int[] bar(BufferedImage image, PlanLayout layout) {
        int[] bar = new int[layout.pressureBar.width];
        for (int n = 0; n < bar.length; n++) {
            bar[n] = PlanTest.rgb(image, layout.pressureBar.x + n, layout.pressureBar.getCenterY());
        }
        return bar;
    }

    private static double read(int[] bar, int colour) {
        int best = 0;
        for (int n = 0; n < bar.length; n++) {
            best = PlanTest.distance(bar[n], colour) < PlanTest.distance(bar[best], colour) ? n : best;
        }
        return (best + 0.5) / bar.length;
    }

    /** A value by hand, at any angle. */
    private static double expected(Quantity quantity, Frame frame, double theta, double r) {
        int j = GRID.row(r);
        double within = theta - GRID.intoSector(theta, j, r) * GRID.pitch();
        int i = GRID.column(within, j, r);
        if (quantity == Quantity.THICKNESS) {
            return FILM.thickness(i, j, within, r);
        }
        double[] rates = new double[3];
        FILM.rates(i, j, 0, within, r, 0.5, rates);
        double turning = frame == Frame.ROTATING ? 0 : FILM.film().conditions().rotationRate();
        return Math.hypot(rates[1], r * (rates[0] + turning));
    }

    @ParameterizedTest
    @CsvSource({
        "THICKNESS, RING, STATOR, ROTATING",
        "THICKNESS, SECTOR, ROTOR, ROTATING",
        "SPEED, RING, STATOR, STATIONARY",
        "SPEED, SECTOR, STATOR, ROTATING",
        "SPEED, SECTOR, ROTOR, STATIONARY"
    })
    void value_isReadBackThroughTheColourBar(Quantity quantity, Part part, ViewingSide side, Frame frame) {
        PlanSettings settings = plan(SETTINGS.from(side).speedsIn(frame), quantity, part);
        BufferedImage image = Plan.draw(FILM, PlanData.of(List.of(), List.of()), settings);
        PlanLayout layout = Plan.layout(new FilmShape(FILM), settings, false, false);
        Chart chart = part == Part.RING ? layout.ringChart : layout.sectorChart;
        PictureSettings.Range range = Plan.range(FILM, quantity, frame, Optional.empty());
        int[] bar = bar(image, layout);
        double[] errors = new double[240];
        for (int n = 0; n < errors.length; n++) {
            double r = 0.0512 + 0.0165 * (n % 20) / 20;
            double theta = layout.middle + (part == Part.RING ? 2 * Math.PI : GRID.pitch()) * (n / 20 - 5.6) / 12;
            Point2D p = chart.at(theta, r);
            double value =
                    range.low() + (range.high() - range.low()) * read(bar, PlanTest.rgb(image, p.getX(), p.getY()));
            double wanted = Math.min(range.high(), expected(quantity, frame, theta, r));
            errors[n] = Math.abs(value - wanted) / (range.high() - range.low());
        }
        Arrays.sort(errors);
        // Outlines and the borders of cells lie over some points.
        assertTrue(errors[(int) (0.85 * errors.length)] < 0.02, "error " + errors[(int) (0.85 * errors.length)]);
    }

    @Test
    void unrolled_isTrueToScaleAtTheMiddleRadius() {
        PlanSettings settings = plan(SETTINGS, Quantity.PRESSURE, Part.SECTOR);
        PlanLayout layout = Plan.layout(new FilmShape(FILM), settings, false, false);
        double r = 0.059;
        Point2D a = layout.sectorChart.at(layout.middle, r);
        Point2D b = layout.sectorChart.at(layout.middle + 0.1, r);
        Point2D c = layout.sectorChart.at(layout.middle, r + 0.002);
        assertEquals(0.1 * 59 * layout.sectorScale, a.distance(b), 1e-6);
        assertEquals(2 * layout.sectorScale, a.distance(c), 1e-6);
        assertTrue(b.getX() < a.getX(), "seen from the stator, outwards up, +θ runs to the left");
        assertTrue(c.getY() < a.getY());
    }

    @ParameterizedTest
    @EnumSource(Part.class)
    void destinations_haveTheirColours(Part part) {
        FilmFlow flow = FilmFlow.of(FILM.film());
        DestinationMap map = DestinationMap.of(flow, HOW, 12, 12, 0.5, 2, x -> {});
        PlanSettings settings = plan(SETTINGS, Quantity.DESTINATION, part);
        BufferedImage image =
                Plan.draw(flow, new PlanData(List.of(), List.of(), Optional.empty(), Optional.of(map)), settings);
        PlanLayout layout = Plan.layout(new FilmShape(flow), settings, false, true);
        Chart chart = part == Part.SECTOR ? layout.sectorChart : layout.ringChart;
        int right = 0;
        int all = 0;
        for (int p = 0; p < map.phases(); p++) {
            for (int q = 0; q < map.radii(); q++) {
                Point2D at = chart.at(map.theta(p, q), map.radius(q));
                int seen = PlanTest.rgb(image, at.getX(), at.getY());
                right += seen == Destination.of(map.destination(p, q)).colour() ? 1 : 0;
                all++;
            }
        }
        // Markers, outlines and the frame of the enlarged view lie over some.
        assertTrue(right > 0.75 * all, right + " of " + all);
    }

    @Test
    void ages_areReadBack() {
        FilmFlow flow = FilmFlow.of(FILM.film());
        AgeMap ages = AgeMap.of(flow, HOW, 12, 12, 3, 2, x -> {});
        PlanSettings settings = plan(SETTINGS, Quantity.AGE, Part.SECTOR);
        BufferedImage image =
                Plan.draw(flow, new PlanData(List.of(), List.of(), Optional.of(ages), Optional.empty()), settings);
        PlanLayout layout = Plan.layout(new FilmShape(flow), settings, false, false);
        PictureSettings.Range range = Plan.range(flow, Quantity.AGE, Frame.ROTATING, Optional.of(ages));
        int[] bar = bar(image, layout);
        double[] errors = new double[144];
        for (int n = 0; n < errors.length; n++) {
            double r = ages.radius(n % 12);
            double theta = ages.theta(n / 12, n % 12);
            double turns = Math.rint((layout.middle - theta) / GRID.pitch());
            Point2D p = layout.sectorChart.at(theta + turns * GRID.pitch(), r);
            double value =
                    range.low() + (range.high() - range.low()) * read(bar, PlanTest.rgb(image, p.getX(), p.getY()));
            double wanted = Math.min(range.high(), ages.column(n / 12, n % 12, 0.5));
            errors[n] = Math.abs(value - wanted) / (range.high() - range.low());
        }
        Arrays.sort(errors);
        assertTrue(errors[(int) (0.8 * errors.length)] < 0.03, "error " + errors[(int) (0.8 * errors.length)]);
    }

    @Test
    void whatIsNotThere_cannotBeShown() {
        for (Quantity quantity : new Quantity[] {Quantity.AGE, Quantity.DESTINATION}) {
            IllegalArgumentException refusal = assertThrows(
                    IllegalArgumentException.class,
                    () -> Plan.draw(FILM, PlanData.of(List.of(), List.of()), plan(SETTINGS, quantity, Part.RING)));
            assertTrue(refusal.getMessage().contains("expected one"), refusal.getMessage());
        }
    }

    @Test
    void groovesOfTheStator_areOutlinedToo() {
        // The same grooves, cut into the other face.
        FilmFlow turned = new FilmVariant(FILM) {
            @Override
            public double rotorZ(int i, int j, double theta, double r) {
                return SpiralFilm.DATUM;
            }
        };
        FilmShape shape = new FilmShape(turned);
        assertEquals(new FilmShape(FILM).grooveEdges(), shape.grooveEdges());
        assertEquals(List.of(), shape.rotorEdges());
        assertEquals("grooves, in the stator", shape.groovedFaces());
        assertEquals(new FilmShape(FILM).dam(), shape.dam());
    }

    @ParameterizedTest
    @CsvSource({"640, 360", "1280, 720", "900, 1100"})
    void pictures_haveAClearRim_atAnySize(int width, int height) {
        for (Part part : Part.values()) {
            BufferedImage image = Plan.draw(
                    FILM,
                    PlanData.of(FILM.fed(30, 8), FILM.paths(Frame.ROTATING).subList(0, 2)),
                    plan(SETTINGS.sized(width, height), Quantity.THICKNESS, part));
            PlanTest.edgeIsClear(image, SETTINGS.sized(width, height));
        }
        PictureSettings settings = SETTINGS.sized(width, height);
        PlanTest.edgeIsClear(Relief.draw(FILM, FILM.paths(Frame.ROTATING), ReliefSettings.sector(settings)), settings);
        PlanTest.edgeIsClear(Relief.draw(FILM, List.of(), ReliefSettings.ring(settings)), settings);
        PlanTest.edgeIsClear(Meridian.draw(FILM, List.of(), MeridianSettings.at(settings, 0.2)), settings);
    }

    private static Zone zone(Range theta, Range radius, int count) {
        Place centre = new Place(0.5 * (theta.low() + theta.high()), 0.5 * (radius.low() + radius.high()), 0.5);
        return new Zone(
                centre,
                theta,
                radius,
                new Range(0.2, 0.8),
                1e-12,
                1e-12,
                1e-12,
                1e-12,
                0.01,
                count,
                Sense.NONE,
                OptionalDouble.empty(),
                1e5,
                Optional.empty(),
                new Exchange(1, 0, 0, 0, 0, 1),
                List.of(),
                true,
                1);
    }

    private static BufferedImage with(Zone zone, PlanSettings settings) {
        PlanData data = new PlanData(List.of(), List.of(), Optional.empty(), Optional.empty(), List.of(zone));
        return Plan.draw(FILM, data, settings);
    }

    /** Two pictures that differ in a zone differ where these zones lie, all over, and nowhere else. */
    @ParameterizedTest
    @CsvSource({"BOTH,STATOR", "RING,ROTOR"})
    void draw_zones_areMarkedWhereTheyLieAndOnlyThere(Part part, ViewingSide side) {
        PictureSettings picture = SETTINGS.from(side);
        PlanSettings settings = plan(picture, Quantity.PRESSURE, part);
        double span = GRID.outerRadius() - GRID.innerRadius();
        Range low = new Range(GRID.innerRadius() + 0.15 * span, GRID.innerRadius() + 0.4 * span);
        Range high = new Range(GRID.innerRadius() + 0.6 * span, GRID.innerRadius() + 0.85 * span);
        Range narrow = new Range(0.1 * GRID.pitch(), 0.5 * GRID.pitch());
        BufferedImage round = with(zone(new Range(0, 2 * Math.PI), low, 1), settings);
        BufferedImage many = with(zone(narrow, high, GRID.sectors()), settings);
        PlanLayout layout = Plan.layout(new FilmShape(FILM), settings, false, true);
        double margin = 4e-3 / layout.ringScale;
        int[] changed = new int[3];
        int[] all = new int[3];
        for (double r = GRID.innerRadius() + margin; r < GRID.outerRadius() - margin; r += span / 60) {
            for (double theta = 0; theta < 2 * Math.PI; theta += 0.003) {
                double within = theta % GRID.pitch() / GRID.pitch();
                boolean inLow = r > low.low() + margin && r < low.high() - margin;
                boolean inHigh = r > high.low() + margin && r < high.high() - margin && within > 0.15 && within < 0.45;
                boolean near = r > low.low() - margin && r < low.high() + margin
                        || r > high.low() - margin
                                && r < high.high() + margin
                                && (within < 0.5 + 2 * margin / r / GRID.pitch()
                                        && within > 0.1 - 2 * margin / r / GRID.pitch());
                int kind = inLow ? 0 : inHigh ? 1 : near ? -1 : 2;
                if (kind >= 0) {
                    Point2D p = layout.ringChart.at(theta, r);
                    all[kind]++;
                    int a = PlanTest.rgb(round, p.getX(), p.getY());
                    changed[kind] += a != PlanTest.rgb(many, p.getX(), p.getY()) ? 1 : 0;
                }
            }
        }
        for (int kind = 0; kind < 2; kind++) {
            assertTrue(all[kind] > 500, Arrays.toString(all));
            assertTrue(changed[kind] > 0.2 * all[kind], kind + ": " + changed[kind] + " of " + all[kind]);
        }
        assertEquals(0, changed[2], Arrays.toString(changed));
    }

    /** The edges of a zone's box lie where the zone reaches, between the faces. */
    @Test
    void draw_zoneInALookIntoTheFilm_isOutlinedWhereItReaches() {
        GapSettings settings = new GapSettings(SETTINGS, GapSettings.USUAL, Optional.empty());
        double span = GRID.outerRadius() - GRID.innerRadius();
        Range radius = new Range(GRID.innerRadius() + 0.2 * span, GRID.innerRadius() + 0.4 * span);
        Zone zone = zone(new Range(0, 2 * Math.PI), radius, 1);
        BufferedImage without = Gap.draw(FILM, List.of(), settings);
        BufferedImage with = Gap.draw(FILM, List.of(), List.of(zone), settings);
        GapScene gap = new GapScene(new FilmShape(FILM), GapSettings.USUAL);
        Camera camera = Gap.camera(gap, SETTINGS);
        for (int n = 1; n < 10; n++) {
            double theta = gap.openFrom + 0.1 * n * (gap.openTo - gap.openFrom);
            for (double r : new double[] {radius.low(), radius.high()}) {
                double rotor = gap.rotorAt(theta, r);
                double z = rotor + zone.sigma().high() * (gap.statorAt(theta, r) - rotor);
                double[] place = gap.place(theta, r, z);
                Point2D p = camera.project(place[0], place[1], place[2]);
                int marked = PlanTest.rgb(with, p.getX(), p.getY());
                assertTrue(marked != PlanTest.rgb(without, p.getX(), p.getY()), "θ = " + theta + ", r = " + r);
            }
        }
    }
}
