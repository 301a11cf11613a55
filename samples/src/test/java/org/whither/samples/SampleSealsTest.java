package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.Supply;
import org.whither.samples.SealDescription.Pumping;
import org.whither.samples.SealDescription.SpiralGrooves;

class SampleSealsTest {
    private static final GridSize SMALL = new GridSize(32, 56);

    private static SolvedFilm compute(String name, String point, GridSize size) {
        return SampleSeals.compute(name, point, size, share -> {});
    }

    private static LubricationField field(Film film) {
        return (LubricationField) film.field();
    }

    /** What leaves a cell's faces enters through the feed, in the film's own words and areas. */
    @ParameterizedTest
    @CsvSource({
        "spiral, design",
        "spiral, low-supply",
        "spiral, supply-lost",
        "spiral, standstill",
        "pockets, design",
        "pockets, standstill",
        "coned, design",
        "coned, flow-lost"
    })
    void everyCell_isInBalance(String name, String point) {
        SolvedFilm solved = compute(name, point, SMALL);
        Film film = solved.film();
        FilmGrid grid = film.grid();
        MassFlows flows = field(film).massFlows().orElseThrow();
        Supply supply = film.supply().orElseThrow();
        SolverFacts facts = solved.facts();
        double passing = (facts.supplyIn() + facts.innerIn() + facts.outerIn()) / grid.sectors();
        assertTrue(passing > 0);
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double out = flows.theta(grid, i + 1, j)
                        - flows.theta(grid, i, j)
                        + flows.radial(grid, i, j + 1)
                        - flows.radial(grid, i, j);
                int cell = grid.cell(i, j);
                double in = supply.feeds(cell) ? supply.massFlux(cell) * grid.cellArea(i, j) : 0;
                assertEquals(in, out, 1e-12 * passing, "cell " + i + ", " + j);
                assertTrue(supply.feeds(cell) || supply.massFlux(cell) == 0, "supply outside the feed");
            }
        }
        for (int j = 0; j < grid.cellsRadial(); j++) {
            assertEquals(flows.theta(grid, 0, j), flows.theta(grid, grid.cellsTheta(), j), 0, "sector ends");
        }
        assertEquals(0, facts.massClosure(), 1e-11);
        assertTrue(facts.residual() < 1e-12, "residual " + facts.residual());
    }

    @Test
    void film_saysWhatItIs() {
        Film film = compute("spiral", null, SMALL).film();
        assertEquals(Frame.ROTATING, film.velocityFrame());
        assertEquals(Frame.ROTATING, film.steadyIn());
        assertEquals(Location.CELL, film.faces().at());
        assertEquals(Location.CELL, field(film).pressureAt());
        assertTrue(film.heading().origin().contains("invented"));
        assertEquals(0.0615, film.supply().orElseThrow().annulus().orElseThrow().from(), 1e-12);
        // feed edges lie on rings, so the feed's cells fill the annulus exactly
        double area = 0;
        for (int i = 0; i < film.grid().cellsTheta(); i++) {
            for (int j = 0; j < film.grid().cellsRadial(); j++) {
                area += film.feeds(film.grid().cell(i, j)) ? film.grid().cellArea(i, j) : 0;
            }
        }
        assertEquals(Math.PI * (0.0635 * 0.0635 - 0.0615 * 0.0615), 12 * area, 1e-12 * area);
    }

    /** Grooves cover half the ring between their radii, whatever the grid. */
    @ParameterizedTest
    @CsvSource({"8, 8", "13, 21", "32, 56", "64, 112"})
    void grooves_haveTheirTrueArea(int cellsTheta, int cellsRadial) {
        SealDescription seal = SampleSeals.describe("spiral");
        FaceModel faces = new FaceModel(seal, new GridSize(cellsTheta, cellsRadial));
        FilmGrid grid = faces.grid().toFilmGrid();
        assertEquals(cellsTheta, grid.cellsTheta());
        assertEquals(cellsRadial, grid.cellsRadial());
        double area = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                area += faces.depth(grid.cell(i, j)) > 0 ? grid.cellArea(i, j) : 0;
            }
        }
        double expected = 0.5 * Math.PI * (0.0625 * 0.0625 - 0.0555 * 0.0555);
        assertEquals(expected, 12 * area, 1e-11 * expected);
    }

    /** Pockets and slots of the bidirectional face, from their radii and angles. */
    @Test
    void pockets_haveTheirTrueVolume() {
        FaceModel faces = new FaceModel(SampleSeals.describe("pockets"), new GridSize(36, 51));
        FilmGrid grid = faces.grid().toFilmGrid();
        double volume = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                volume += faces.depth(grid.cell(i, j)) * grid.cellArea(i, j);
            }
        }
        double expected = Math.toRadians(2) * (0.057 * 0.057 - 0.050 * 0.050) * 7e-6
                + Math.toRadians(12) * (0.053 * 0.053 - 0.050 * 0.050) * 5e-6;
        assertEquals(expected, volume, 1e-11 * expected);
    }

    /** The same seal seen in a mirror: grooves of the other hand, rotor turning the other way. */
    @Test
    void mirroredSeal_hasTheMirroredField() {
        SealDescription seal = SampleSeals.describe("spiral");
        SpiralGrooves grooves = (SpiralGrooves) seal.recesses().orElseThrow();
        SealDescription mirrored = with(
                seal,
                new SpiralGrooves(
                        grooves.angle(),
                        grooves.grooveToLand(),
                        grooves.depth(),
                        grooves.from(),
                        grooves.to(),
                        Pumping.OUTWARD));
        var point = seal.points().get(0);
        var back = new SealDescription.OperatingPoint(
                "back",
                "backwards",
                -point.rotationRate(),
                point.pressureInner(),
                point.pressureOuter(),
                point.pressureSupply(),
                point.supplyFlow());
        SolvedFilm one = SampleSeals.compute(seal, point, SMALL, share -> {});
        SolvedFilm other = SampleSeals.compute(mirrored, back, SMALL, share -> {});
        assertMirrored(one, other);
        // not the same thing: backwards without the mirror, the grooves pump outwards
        SolvedFilm wrong = SampleSeals.compute(seal, back, SMALL, share -> {});
        assertTrue(wrong.facts().innerOut() < 0.8 * one.facts().innerOut());
    }

    /** A face with symmetric pockets works alike either way round; at standstill the film is its own mirror image. */
    @Test
    void pockets_workEitherWayRound() {
        GridSize size = new GridSize(36, 51);
        SolvedFilm forwards = compute("pockets", "design", size);
        assertMirrored(forwards, compute("pockets", "backwards", size));
        SolvedFilm still = compute("pockets", "standstill", size);
        assertMirrored(still, still);
        assertTrue(
                forwards.facts().openingForce() != still.facts().openingForce()
                        && forwards.facts().peakPressure()
                                > 1.05 * still.facts().peakPressure(),
                "rotation builds pressure in the pockets");
    }

    private static void assertMirrored(SolvedFilm one, SolvedFilm other) {
        FilmGrid grid = one.film().grid();
        int nx = grid.cellsTheta();
        for (int i = 0; i < nx; i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double p = field(one.film()).pressure(grid.cell(i, j));
                double q = field(other.film()).pressure(grid.cell(nx - 1 - i, j));
                assertEquals(p, q, 1e-10 * p, "cell " + i + ", " + j);
            }
        }
        MassFlows flows = field(one.film()).massFlows().orElseThrow();
        MassFlows turned = field(other.film()).massFlows().orElseThrow();
        double scale = TestFilms.largest(flows.thetaValues());
        for (int j = 0; j < grid.cellsRadial(); j++) {
            for (int i = 0; i <= nx; i++) {
                assertEquals(flows.theta(grid, i, j), -turned.theta(grid, nx - i, j), 1e-9 * scale);
            }
        }
        assertEquals(
                one.facts().innerOut(),
                other.facts().innerOut(),
                1e-11 * one.facts().innerOut());
    }

    private static SealDescription with(SealDescription seal, SpiralGrooves grooves) {
        return new SealDescription(
                seal.name(),
                seal.title(),
                seal.description(),
                seal.plant(),
                seal.gas(),
                seal.isentropicExponent(),
                seal.temperature(),
                seal.innerRadius(),
                seal.outerRadius(),
                seal.innerSide(),
                seal.outerSide(),
                seal.clearance(),
                seal.coning(),
                seal.sectors(),
                Optional.of(grooves),
                seal.feed(),
                seal.points(),
                seal.grid());
    }

    /** Common practice: the pressure peaks where the grooves end at the dam, above the supply pressure. */
    @Test
    void demo_peaksWhereTheGroovesEndAtTheDam() {
        SolverFacts facts = compute("spiral", null, null).facts();
        assertTrue(facts.peakRadius() > 0.0555 && facts.peakRadius() < 0.0565, "peak at " + facts.peakRadius());
        assertTrue(facts.peakPressure() > 1.05e6, "peak " + facts.peakPressure());
    }

    /** Common practice: at the design point no process gas enters, and each side gets a good part of the supply. */
    @Test
    void demo_keepsTheProcessGasAway() {
        SolvedFilm solved = compute("spiral", null, null);
        SolverFacts facts = solved.facts();
        assertEquals(0, facts.outerIn());
        assertEquals(0, facts.innerIn());
        assertEquals(0, facts.supplyOut());
        double toInner = facts.innerOut() / facts.supplyIn();
        assertTrue(toInner > 0.25 && toInner < 0.75, "share to the inner diameter " + toInner);
        assertTrue(facts.reducedReynolds() < 1, "reduced Reynolds number " + facts.reducedReynolds());
        assertTrue(facts.knudsen() < 0.03, "mean free path over film thickness " + facts.knudsen());
    }

    /** The point made to draw in process gas does so along part of the edge, and lets gas out along the rest. */
    @Test
    void lowSupply_letsProcessGasIn() {
        SolvedFilm solved = compute("spiral", "low-supply", null);
        SolverFacts facts = solved.facts();
        assertTrue(facts.outerIn() > 0.01 * facts.supplyIn(), "process gas in " + facts.outerIn());
        assertTrue(facts.outerOut() > 0.005 * facts.supplyIn(), "gas out " + facts.outerOut());
        SolverFacts lost = compute("spiral", "supply-lost", SMALL).facts();
        assertEquals(0, lost.outerOut());
        assertTrue(lost.innerOut() > lost.supplyIn(), "process gas must go through to the inner diameter");
    }

    /** Without grooves the film is the same all round, and its power that of shear alone, ∫ µ Ω² r²/h dA. */
    @Test
    void coned_isTheSameAllRound() {
        SolvedFilm solved = compute("coned", null, null);
        FilmGrid grid = solved.film().grid();
        double power = 0;
        for (int j = 0; j < grid.cellsRadial(); j++) {
            double first = field(solved.film()).pressure(grid.cell(0, j));
            for (int i = 1; i < grid.cellsTheta(); i++) {
                assertEquals(first, field(solved.film()).pressure(grid.cell(i, j)), 1e-12 * first);
            }
        }
        int n = 2000;
        double omega = solved.film().conditions().rotationRate();
        for (int m = 0; m < n; m++) {
            double r = 0.060 + 0.016 * (m + 0.5) / n;
            double h = 3.6e-6 + 0.9e-6 * (m + 0.5) / n;
            power += solved.film().gas().viscosity() * omega * omega * r * r * r * 2 * Math.PI / h * 0.016 / n;
        }
        assertEquals(power, solved.facts().filmPower(), 1e-4 * power);
        assertEquals(2.0e-4, solved.facts().supplyIn(), 1e-15);
    }

    @Test
    void compute_tellsProgressThatNeverFalls() {
        List<Double> told = new ArrayList<>();
        SampleSeals.compute("spiral", null, new GridSize(8, 8), told::add);
        assertEquals(0.0, told.get(0));
        assertEquals(1.0, told.get(told.size() - 1));
        for (int n = 1; n < told.size(); n++) {
            assertTrue(told.get(n) >= told.get(n - 1));
        }
        assertTrue(told.size() > 3);
    }

    @Test
    void unknownNames_areRefusedWithWhatThereIs() {
        assertEquals(List.of("spiral", "pockets", "coned"), SampleSeals.names());
        assertEquals(
                "there is no sample seal \"wavy\"; there are spiral, pockets, coned",
                assertThrows(IllegalArgumentException.class, () -> SampleSeals.describe("wavy"))
                        .getMessage());
        assertThrows(IllegalArgumentException.class, () -> compute("wavy", null, null));
        assertEquals(
                "the sample seal \"coned\" has no operating point \"x\"; it has design, flow-lost",
                assertThrows(IllegalArgumentException.class, () -> compute("coned", "x", null))
                        .getMessage());
        assertEquals(
                "a grid of 7 × 8 cells was asked for; expected from 8 to 2048 cells along θ and along r",
                assertThrows(IllegalArgumentException.class, () -> new GridSize(7, 8))
                        .getMessage());
    }

    /** A film that cannot be, since more gas is drawn off than can come in, is refused and not returned half-solved. */
    @Test
    void impossibleFilm_isRefused() {
        FilmProblem film = TestFilms.film(
                TestFilms.even(0.050, 0.060, 12, 8, 8, 90),
                (theta, r) -> 4e-6,
                1000,
                TestFilms.ATMOSPHERE,
                TestFilms.PROCESS);
        film.feed()[film.grid().cell(2, 4)] = new FeedLaw.Given(-100);
        IllegalStateException refusal = assertThrows(IllegalStateException.class, () -> TestFilms.solve(film));
        assertTrue(refusal.getMessage().startsWith("the film solver"), refusal.getMessage());
        assertFalse(refusal.getMessage().contains("NaN"), refusal.getMessage());
    }
}
