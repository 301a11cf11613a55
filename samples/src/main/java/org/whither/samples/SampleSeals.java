package org.whither.samples;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.time.Instant;
import java.time.temporal.ChronoUnit;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.DoubleConsumer;
import java.util.stream.Collectors;
import org.whither.film.Conditions;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RingFaces;
import org.whither.film.Supply;
import org.whither.samples.SealDescription.GivenFlow;
import org.whither.samples.SealDescription.OperatingPoint;
import org.whither.samples.SealDescription.Orifices;
import org.whither.samples.SealDescription.PorousLayer;

/** The invented seals, and their computed films. */
public final class SampleSeals {
    private static final List<String> NAMES = List.of("spiral", "pockets", "coned");

    private SampleSeals() {}

    /** Names of the seals, the demo's first. */
    public static List<String> names() {
        return NAMES;
    }

    /**
     * A seal.
     *
     * @param name one of {@link #names}
     * @return its description
     * @throws IllegalArgumentException where there is no such seal
     */
    public static SealDescription describe(String name) {
        if (!NAMES.contains(name)) {
            throw new IllegalArgumentException(
                    "there is no sample seal \"" + name + "\"; there are " + String.join(", ", NAMES));
        }
        String resource = "seals/" + name + ".json";
        try (InputStream in = SampleSeals.class.getResourceAsStream(resource)) {
            if (in == null) {
                throw new IllegalStateException("the program's own file " + resource + " is missing from its jar");
            }
            return SealReader.read(new String(in.readAllBytes(), StandardCharsets.UTF_8), resource);
        } catch (IOException e) {
            throw new UncheckedIOException("the program's own file " + resource + " cannot be read", e);
        }
    }

    /**
     * Computes a seal's film.
     *
     * @param name one of {@link #names}
     * @param point name of one of its operating points, or null for the first
     * @param size grid size, or null for the seal's own
     * @param progress told the share done, 0 … 1
     * @return the film, steady in and measured in the rotating frame, and how well it was solved
     * @throws IllegalArgumentException where there is no such seal or operating point, or the grid has too few cells for
     *     the seal's edges
     * @throws IllegalStateException where the film solver did not converge
     */
    public static SolvedFilm compute(String name, String point, GridSize size, DoubleConsumer progress) {
        SealDescription seal = describe(name);
        return compute(seal, point(seal, point), size == null ? seal.grid() : size, progress);
    }

    private static OperatingPoint point(SealDescription seal, String name) {
        if (name == null) {
            return seal.points().get(0);
        }
        for (OperatingPoint point : seal.points()) {
            if (point.name().equals(name)) {
                return point;
            }
        }
        throw new IllegalArgumentException("the sample seal \"" + seal.name() + "\" has no operating point \"" + name
                + "\"; it has "
                + seal.points().stream().map(OperatingPoint::name).collect(Collectors.joining(", ")));
    }

    static SolvedFilm compute(SealDescription seal, OperatingPoint point, GridSize size, DoubleConsumer progress) {
        FaceModel faces = new FaceModel(seal, size);
        SheetGrid sheet = faces.grid();
        FilmGrid grid = sheet.toFilmGrid();
        FilmProblem problem = problem(seal, point, faces);
        FilmSolver.Solution solution = new FilmSolver(problem).solve(progress);
        double[] rotor = new double[grid.cells()];
        double[] stator = new double[grid.cells()];
        double[] pressure = new double[grid.cells()];
        double[] massFlux = new double[grid.cells()];
        for (int n = 0; n < grid.cells(); n++) {
            rotor[n] = 0 - faces.depth(n);
            stator[n] = faces.stator(n);
            pressure[n] = Math.sqrt(solution.s()[n]);
            FeedLaw law = problem.feed()[n];
            massFlux[n] = law == null ? 0 : law.flux(pressure[n]);
        }
        Film film = new Film(
                new Film.Heading(
                        seal.title() + ", " + point.note(),
                        "invented seal of an invented plant (" + seal.plant()
                                + "), computed with whither's film solver on " + sheet.nx() + " × " + sheet.nr()
                                + " cells",
                        Instant.now().truncatedTo(ChronoUnit.SECONDS).toString()),
                new Conditions(
                        point.rotationRate(),
                        point.pressureInner(),
                        point.pressureOuter(),
                        point.pressureSupply(),
                        seal.temperature(),
                        seal.innerSide(),
                        seal.outerSide()),
                seal.gas(),
                grid,
                new RingFaces(Location.CELL, rotor, stator),
                Frame.ROTATING,
                Frame.ROTATING,
                new LubricationField(
                        Location.CELL, pressure, new MassFlows(solution.massTheta(), solution.massRadial())),
                Optional.of(Supply.ofAnnulus(
                        grid,
                        Face.STATOR,
                        new Supply.Annulus(seal.feed().from(), seal.feed().to()),
                        massFlux)));
        return new SolvedFilm(film, FactFinder.facts(problem, solution));
    }

    /** The film of a seal at an operating point. */
    static FilmProblem problem(SealDescription seal, OperatingPoint point, FaceModel faces) {
        SheetGrid grid = faces.grid();
        double[] area = FilmProblem.cellAreas(grid);
        FeedLaw law = law(seal, point, fedArea(faces, area) * grid.sectors());
        double[] thickness = new double[grid.cells()];
        FeedLaw[] feed = new FeedLaw[grid.cells()];
        for (int i = 0; i < grid.nx(); i++) {
            for (int j = 0; j < grid.nr(); j++) {
                int n = grid.cell(i, j);
                thickness[n] = faces.stator(n) + faces.depth(n);
                feed[n] = faces.fed(j) ? law : null;
            }
        }
        return new FilmProblem(
                grid,
                thickness,
                feed,
                area,
                seal.gas().viscosity(),
                seal.gas().specificGasConstant(),
                seal.temperature(),
                point.rotationRate(),
                point.pressureInner(),
                point.pressureOuter());
    }

    private static double fedArea(FaceModel faces, double[] area) {
        double sum = 0;
        SheetGrid grid = faces.grid();
        for (int i = 0; i < grid.nx(); i++) {
            for (int j = 0; j < grid.nr(); j++) {
                sum += faces.fed(j) ? area[grid.cell(i, j)] : 0;
            }
        }
        return sum;
    }

    private static FeedLaw law(SealDescription seal, OperatingPoint point, double ringArea) {
        OptionalDouble supply = point.pressureSupply();
        if (seal.feed().restriction() instanceof PorousLayer layer) {
            return new FeedLaw.Porous(layer.permeance(), supply.orElseThrow());
        }
        if (seal.feed().restriction() instanceof Orifices orifices) {
            return new FeedLaw.Orifice(
                    supply.orElseThrow(),
                    seal.temperature(),
                    seal.gas().specificGasConstant(),
                    seal.isentropicExponent(),
                    orifices.dischargeCoefficient() * orifices.openShare());
        }
        if (seal.feed().restriction() instanceof GivenFlow) {
            return new FeedLaw.Given(point.supplyFlow().orElseThrow() / ringArea);
        }
        throw new IllegalStateException("unknown restriction " + seal.feed().restriction());
    }
}
