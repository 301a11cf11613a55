package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.RingFaces;
import org.whither.io.hdf5.FieldReader;
import org.whither.io.hdf5.FieldWriter;

/** Command {@code eddies} from the command line, in this process. */
class EddiesCommandTest {
    private static final Path FIELD = Path.of("..", "samples", "fields", "spiral-24x32.h5");

    @TempDir
    private Path folder;

    private record Run(int status, String out, String err) {}

    private static Run run(String... arguments) {
        StringWriter out = new StringWriter();
        StringWriter err = new StringWriter();
        int status = Program.run(new PrintWriter(out, true), new PrintWriter(err, true), arguments);
        return new Run(status, out.toString(), err.toString());
    }

    /**
     * The grooves of the stored film, with gas that the stator holds back, make one eddy all round the ring: found in place
     * and size whatever the number of threads. Non-regression: the values are those of this program.
     */
    @Test
    void eddies_storedField_findsTheRingOverTheGrooves() throws IOException {
        Run run = run(
                "eddies",
                FIELD.toString(),
                "--json",
                "--quiet",
                "--budget",
                "4096",
                "--threads",
                "2",
                "--out",
                folder.resolve("out").toString());
        assertTrue(run.status() == 0 || run.status() == 4, run.err());
        JsonNode found = new ObjectMapper().readTree(run.out());
        assertEquals("eddies", found.get("result").asText());
        assertEquals("rotating", found.get("frame").asText());
        assertEquals(1, found.get("zones").size());
        JsonNode zone = found.get("zones").get(0);
        assertEquals(1, zone.get("count").asInt());
        assertEquals("meridional", zone.get("sense").asText());
        assertEquals(0.0585, zone.get("centre").get("radius").asDouble(), 0.0005);
        assertEquals(0.85, zone.get("centre").get("sigma").asDouble(), 0.05);
        assertEquals(0.0385, found.get("held_mass_share").asDouble(), 0.006);
        assertEquals(0.003, zone.get("dam").get("from_outer_edge").asDouble(), 0.0005);
        assertTrue(zone.get("turnover_time").asDouble()
                > 3 * found.get("median_residence").asDouble());
        for (String key : List.of(
                "reversed_volume_share",
                "median_residence",
                "long_stayers",
                "critical_points",
                "warnings",
                "caution")) {
            assertTrue(found.has(key), key);
        }
        List<String> rows = Files.readAllLines(folder.resolve("out").resolve("eddies.csv"));
        assertEquals(2, rows.size());
        assertEquals(rows.get(0).split(",").length, rows.get(1).split(",", -1).length);
        assertTrue(Files.readAllLines(folder.resolve("out").resolve("eddies-places.csv"))
                        .size()
                > 20);
        assertEquals(
                24 * 32 + 1,
                Files.readAllLines(folder.resolve("out").resolve("eddies-reversed.csv"))
                        .size());

        assertTrue(Files.isRegularFile(folder.resolve("out").resolve("eddies.png")));
        assertTrue(Files.isRegularFile(folder.resolve("out").resolve("eddies-plan.png")));

        Run again = run("eddies", FIELD.toString(), "--json", "--quiet", "--budget", "4096", "--threads", "1");
        ObjectNode other = (ObjectNode) new ObjectMapper().readTree(again.out());
        other.remove("wall_seconds");
        ((ObjectNode) found).remove("wall_seconds");
        assertEquals(found, other);
    }

    /**
     * Film mass − mass flow × mean of min(residence, T) of what enters is the mass that came in more than T ago or never
     * (Danckwerts 1953): what tracers released inside say of the same gas, and a little more than what is held.
     */
    @Test
    void eddies_storedField_holdsWhatResidencesLeaveUnflushed() throws IOException {
        Run run = run("eddies", FIELD.toString(), "--json", "--quiet", "--budget", "16384", "--threads", "2");
        JsonNode found = new ObjectMapper().readTree(run.out());
        JsonNode unflushed = found.get("held_by_residence");
        double low = unflushed.get("low").asDouble();
        double high = unflushed.get("high").asDouble();
        double inside = unflushed.get("share_by_tracers_inside").asDouble();
        // Intervals of other seeds at this budget are 0.025 to 0.035 wide.
        assertTrue(high - low > 0.005 && high - low < 0.05, unflushed.toString());
        assertTrue(low < inside && inside < high, unflushed.toString());
        assertEquals(
                found.get("held_after").asDouble(), unflushed.get("older_than").asDouble(), 0);
        assertTrue(found.get("held_mass_share").asDouble() < inside, found.toString());
        assertTrue(found.get("held_mass_share").asDouble() > low - 0.01, found.toString());
        assertTrue(low > 0, unflushed.toString());
    }

    @Test
    void eddies_facesWithoutGrooves_saysThatNothingWasFound() {
        Path field = folder.resolve("coned.h5");
        assertEquals(
                0,
                run("sample", "coned", "--grid", "12x32", "--quiet", "--as", field.toString())
                        .status());
        Run run = run(
                "eddies",
                field.toString(),
                "--quiet",
                "--budget",
                "4096",
                "--out",
                folder.resolve("out").toString());
        assertEquals(0, run.status(), run.err());
        assertTrue(run.out().contains("No recirculation found"), run.out());
        assertTrue(run.out().contains("0.292 %"), run.out());
        assertTrue(run.out().contains("Caution"), run.out());
    }

    @Test
    void eddies_budgetTooSmallToMeasure_endsWithStatus4() {
        Run run = run(
                "eddies",
                FIELD.toString(),
                "--quiet",
                "--budget",
                "600",
                "--out",
                folder.resolve("out").toString());
        assertEquals(4, run.status(), run.out());
        assertTrue(run.out().contains("The budget of 600 tracers ended"), run.out());
    }

    @Test
    void eddies_wrongOptions_areToldInOneLine() {
        for (String[] wrong : new String[][] {{"--patience", "0.5"}, {"--budget", "100"}, {"--patience", "x"}}) {
            Run run = run("eddies", FIELD.toString(), wrong[0], wrong[1]);
            assertEquals(2, run.status(), run.err());
            assertEquals(1, run.err().lines().count(), run.err());
            assertTrue(run.err().contains(wrong[0]), run.err());
        }
    }

    @Test
    void eddies_nothingGoesThrough_isRefused() throws IOException {
        Film film = FieldReader.read(FIELD);
        double[] pressure = new double[film.grid().nodes()];
        Arrays.fill(pressure, 5e5);
        Film still = new Film(
                film.heading(),
                new Conditions(100, 5e5, 5e5, OptionalDouble.empty(), 300, "atmosphere", "process"),
                film.gas(),
                film.grid(),
                new RingFaces(Location.NODE, new double[pressure.length], even(pressure.length)),
                film.velocityFrame(),
                film.steadyIn(),
                new LubricationField(Location.NODE, pressure, null),
                Optional.empty());
        Path file = folder.resolve("still.h5");
        FieldWriter.write(still, file);
        Run run = run(
                "eddies",
                file.toString(),
                "--quiet",
                "--out",
                folder.resolve("out").toString());
        assertEquals(3, run.status(), run.err());
        assertEquals(1, run.err().lines().count(), run.err());
        assertTrue(run.err().contains("no gas enters the film"), run.err());
        assertFalse(Files.exists(folder.resolve("out")));
    }

    private static double[] even(int size) {
        double[] stator = new double[size];
        Arrays.fill(stator, 5e-6);
        return stator;
    }
}
