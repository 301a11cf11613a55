package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.io.IOException;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.Stream;
import javax.imageio.ImageIO;
import org.jsoup.Jsoup;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.whither.fate.BorderBalance;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.io.hdf5.FieldReader;
import org.whither.io.hdf5.FieldWriter;

/** The program from its command line, in this process. */
class ProgramTest {
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

    private static List<String> names(Path in) throws IOException {
        try (Stream<Path> list = Files.list(in)) {
            return list.map(path -> path.getFileName().toString()).sorted().toList();
        }
    }

    private static JsonNode json(String text) throws IOException {
        return new ObjectMapper().readTree(text);
    }

    @Test
    void demo_coarseGrid_writesItsFolder() throws IOException {
        Path out = folder.resolve("demo");
        Run run = run("demo", "--grid", "24x32", "--width", "0.02", "--out", out.toString());
        assertEquals(0, run.status(), run.err());
        for (String picture : List.of(
                "plan", "plan-thickness", "plan-speed", "plan-age", "plan-destination", "relief", "gap", "meridian")) {
            assertTrue(names(out).contains(picture + ".png"), picture);
            assertTrue(names(out).contains(picture + ".json"), picture);
        }
        assertTrue(names(out)
                .containsAll(List.of(
                        ".whither-results",
                        "field.h5",
                        "report.html",
                        "report.json",
                        "split.json",
                        "eddies.json",
                        "eddies.csv")));
        assertTrue(run.out().contains("The page for the plant: " + out.resolve("report.html")), run.out());
        assertEquals(4, Jsoup.parse(out.resolve("report.html")).select("img").size());
        assertEquals(1280, ImageIO.read(out.resolve("plan.png").toFile()).getWidth());
        assertEquals(720, ImageIO.read(out.resolve("gap.png").toFile()).getHeight());
        assertTrue(run.out().contains("Of every 100 kg of supply gas"), run.out());
        assertTrue(run.out().contains("invented") || run.err().contains("invented"), "says that the seal is invented");
        assertTrue(run.out().contains("Caution"), "prints the cautions");
        assertEquals(List.of("demo"), names(folder), "nothing is left beside the folder");
        assertEquals(
                new ObjectMapper().readTree(out.resolve("eddies.json").toFile()).at("/held_mass_share"),
                new ObjectMapper().readTree(out.resolve("report.json").toFile()).at("/recirculation/held_mass_share"),
                "page and table tell of the same search");
        JsonNode split = json(Files.readString(out.resolve("split.json")));
        assertEquals("split", split.get("result").asText());
        // A second run replaces its own results.
        assertEquals(
                0,
                run("demo", "--grid", "24x32", "--width", "0.05", "--quiet", "--out", out.toString())
                        .status());
    }

    /** The stored field's split by tracers and by boundary integrals agree within the width, and the JSON is complete. */
    @Test
    void split_storedField_jsonAlone() throws IOException {
        Run run = run("split", FIELD.toString(), "--json", "--quiet", "--width", "0.01");
        assertEquals(0, run.status(), run.err());
        assertEquals("", run.err());
        JsonNode split = json(run.out());
        for (String key : List.of(
                "result",
                "version",
                "field",
                "frame",
                "tolerance",
                "width",
                "seed",
                "table",
                "held_share",
                "unsettled_share",
                "backward_table",
                "balance",
                "tracers",
                "steps",
                "wall_seconds",
                "validity",
                "warnings",
                "caution")) {
            assertTrue(split.has(key), key);
        }
        double supply = split.at("/balance/supply_in").asDouble();
        double total = 0;
        for (JsonNode row : split.get("table")) {
            assertEquals("supply", row.get("from").asText());
            total += row.get("share").asDouble();
            if (row.get("to").asText().equals("held")) {
                assertEquals(0, row.get("share").asDouble(), 0.001);
                continue;
            }
            double flow =
                    split.at("/balance/" + row.get("to").asText() + "_out").asDouble();
            assertEquals(flow / supply, row.get("share").asDouble(), 0.01);
            assertTrue(row.get("share_low").asDouble() <= row.get("share").asDouble());
            assertTrue(row.get("share").asDouble() <= row.get("share_high").asDouble());
            assertEquals(
                    row.get("share").asDouble() * supply, row.get("mass_flow").asDouble(), 1e-9 * supply);
            assertTrue(row.at("/residence_time/p10").asDouble()
                    < row.at("/residence_time/p90").asDouble());
            assertTrue(row.at("/revolutions/p50").asDouble() > 0);
        }
        assertEquals(1, total, 1e-9);
        assertEquals(64, split.at("/field/sha256").asText().length());
    }

    @Test
    void split_sameSeed_sameResultOnAnyThreads() throws IOException {
        String[] common = {"split", FIELD.toString(), "--json", "--quiet", "--width", "0.05", "--seed", "5"};
        JsonNode one = json(run(with(common, "--threads", "1")).out());
        JsonNode three = json(run(with(common, "--threads", "3")).out());
        assertEquals(one.get("table"), three.get("table"));
        assertEquals(one.get("backward_table"), three.get("backward_table"));
    }

    private static String[] with(String[] common, String... more) {
        return Stream.concat(Stream.of(common), Stream.of(more)).toArray(String[]::new);
    }

    @Test
    void check_storedField_inEngineersUnits() throws IOException {
        Run run = run("check", FIELD.toString());
        assertEquals(0, run.status(), run.err());
        for (String word : List.of("mm", "µm", "bar(a)", "rpm", "g/h", "Nl/min", "Closure", "Knudsen", "11936.6 rpm")) {
            assertTrue(run.out().contains(word), word);
        }
        JsonNode json = json(run("check", FIELD.toString(), "--json", "--quiet").out());
        assertEquals(0, json.at("/balance/closure").asDouble(), 1e-12);
    }

    @Test
    void check_bothFields_byEitherInterpolation() throws IOException {
        String full =
                Path.of("src", "test", "resources", "fields", "full-plain.h5").toString();
        JsonNode conserving = json(run("check", full, "--json", "--quiet").out());
        assertEquals("conserving", conserving.get("interpolation").asText());
        assertEquals(0, conserving.at("/balance/closure").asDouble(), 1e-9);
        assertTrue(conserving.get("flow_correction").asDouble() > 0, "an invented field without continuity");
        JsonNode nodal = json(run("check", full, "--json", "--quiet", "--interpolation", "nodal")
                .out());
        assertEquals("nodal", nodal.get("interpolation").asText());
        assertFalse(nodal.has("flow_correction"));
        JsonNode film = json(run("check", FIELD.toString(), "--json", "--quiet", "--interpolation", "nodal")
                .out());
        assertEquals("nodal", film.get("interpolation").asText());
        assertFalse(film.has("flow_correction"));
    }

    @Test
    void draw_bothViews_addsToEarlierResults() throws IOException {
        Path out = folder.resolve("r");
        assertEquals(
                0,
                run("split", FIELD.toString(), "--width", "0.05", "--no-picture", "--quiet", "--out", out.toString())
                        .status());
        Run run = run(
                "draw",
                FIELD.toString(),
                "--view",
                "gap",
                "--size",
                "800x450",
                "--background",
                "dark",
                "--quiet",
                "--out",
                out.toString());
        assertEquals(0, run.status(), run.err());
        assertEquals(List.of(".whither-results", "gap.json", "gap.png", "split.json"), names(out));
        assertEquals(800, ImageIO.read(out.resolve("gap.png").toFile()).getWidth());
    }

    @Test
    void help_everyCommand_explainsItself() {
        assertTrue(run("--help").out().contains("Exit status"));
        assertTrue(run("--help").out().contains("Caution"));
        for (String command : List.of("demo", "check", "split", "eddies", "draw", "sample")) {
            Run run = run(command, "--help");
            assertEquals(0, run.status());
            assertTrue(run.out().contains("Usage: whither " + command), run.out());
        }
        assertTrue(run("sample").out().contains("--point low-supply"));
    }

    @Test
    void usage_wrong_isToldInOneLineWithStatus2() {
        String field = FIELD.toString();
        String[][] wrong = {
            {},
            {"nonsense"},
            {"split"},
            {"split", field, "--frame", "sideways"},
            {"split", field, "--tolerance", "1"},
            {"split", field, "--tolerance", "x"},
            {"split", field, "--width", "0"},
            {"split", field, "--threads", "0"},
            {"split", field, "--threads", "1025"},
            {"draw", field, "--size", "10x10"},
            {"draw", field, "--size", "wide"},
            {"draw", field, "--exaggeration", "-1"},
            {"draw", field, "--view", "sky"},
            {"draw", field, "--paths", "-3"},
            {"report"},
            {"report", field, "--width", "2"},
            {"report", field, "--compare"},
            {"report", field, "--interpolation", "wishful"},
            {"sample", "nothing"},
            {"sample", "spiral", "--point", "nowhere"},
            {"sample", "spiral", "--grid", "3"},
            {"sample", "spiral", "--grid", "2x2"},
            {"check", field, "--unknown"},
        };
        for (String[] arguments : wrong) {
            Run run = run(arguments);
            assertEquals(2, run.status(), String.join(" ", arguments) + ": " + run.err());
            assertEquals("", run.out());
            List<String> lines = run.err()
                    .lines()
                    .filter(line -> line.startsWith("whither: "))
                    .toList();
            assertEquals(1, lines.size(), run.err());
            assertFalse(run.err().contains("\tat "), run.err());
        }
    }

    @Test
    void input_refused_isToldInOneSentenceWithStatus3() throws IOException {
        Path text = Files.writeString(folder.resolve("notes.h5"), "not a field\n");
        byte[] bytes = Files.readAllBytes(FIELD);
        Path cut = Files.write(folder.resolve("cut.h5"), java.util.Arrays.copyOf(bytes, bytes.length / 2));
        List<String> before = names(folder);
        for (String command : List.of("check", "split", "draw", "report")) {
            for (Path file : List.of(text, cut, folder.resolve("missing.h5"), folder)) {
                Run run = run(command, file.toString(), "--quiet", "--json");
                assertEquals(3, run.status(), command + " " + file + ": " + run.err());
                assertEquals("", run.out());
                assertEquals(1, run.err().lines().count(), run.err());
                assertTrue(run.err().startsWith("whither: "), run.err());
                assertTrue(run.err().contains(file.getFileName().toString()), run.err());
            }
        }
        assertEquals(before, names(folder), "nothing is left behind");
        assertEquals("not a field\n", Files.readString(text), "the input is not touched");
    }

    @Test
    void folder_withForeignFiles_isNeverTouched() throws IOException {
        Path out = Files.createDirectory(folder.resolve("mine"));
        Files.writeString(out.resolve("letter.txt"), "dear plant", StandardCharsets.UTF_8);
        for (String[] arguments : new String[][] {
            {"demo", "--quiet", "--out", out.toString()},
            {"split", FIELD.toString(), "--quiet", "--out", out.toString()},
            {"draw", FIELD.toString(), "--quiet", "--out", out.toString()},
            {"report", FIELD.toString(), "--quiet", "--out", out.toString()},
            {
                "split",
                FIELD.toString(),
                "--quiet",
                "--out",
                folder.resolve("no/such/place").toString()
            },
        }) {
            Run run = run(arguments);
            assertEquals(3, run.status(), run.err());
            assertEquals(1, run.err().lines().count(), run.err());
        }
        assertEquals(List.of("letter.txt"), names(out));
    }

    /** The file kept in samples/fields is what the solver computes today. */
    @Test
    void storedField_isReproducedByTheSolver() throws IOException {
        Path again = folder.resolve("again.h5");
        assertEquals(
                0,
                run("sample", "spiral", "--grid", "24x32", "--as", again.toString(), "--quiet")
                        .status());
        JsonNode kept = json(run("check", FIELD.toString(), "--json", "--quiet").out());
        JsonNode computed =
                json(run("check", again.toString(), "--json", "--quiet").out());
        for (String key : List.of("supply_in", "inner_out", "outer_out")) {
            double value = kept.at("/balance/" + key).asDouble();
            assertEquals(value, computed.at("/balance/" + key).asDouble(), 1e-9 * value, key);
        }
        assertEquals(kept.get("pressure"), computed.get("pressure"));
    }

    /** A feed that lets nothing in is named, the rest of the table is given, and the status says that something is missing. */
    @Test
    void split_feedWithoutInflow_isNamedAndTheRestGiven() throws IOException {
        Path lost = folder.resolve("lost.h5");
        assertEquals(
                0,
                run("sample", "coned", "--point", "flow-lost", "--grid", "8x16", "--as", lost.toString(), "--quiet")
                        .status());
        Run run = run("split", lost.toString(), "--width", "0.02", "--quiet", "--json");
        assertEquals(4, run.status(), run.err());
        JsonNode split = json(run.out());
        assertTrue(split.get("warnings").get(0).asText().contains("No gas enters through the feed"));
        assertEquals("outer", split.at("/table/0/from").asText());
        assertEquals(1, split.at("/table/0/share").asDouble(), 0.001);
    }

    /**
     * A field with a spoilt value, 1e160 Pa in one cell, past which no tracer can be followed: why and where is said, the
     * rest of the table is given with what is lost in its intervals, and the status says that something is missing.
     */
    @Test
    void split_tracerThatCannotBeFollowed_isNamedAndTheRestGiven() throws IOException {
        Path good = folder.resolve("good.h5");
        Path spoilt = folder.resolve("spoilt.h5");
        assertEquals(
                0,
                run("sample", "coned", "--grid", "8x16", "--as", good.toString(), "--quiet")
                        .status());
        Film film = FieldReader.read(good);
        LubricationField field = (LubricationField) film.field();
        double[] pressure = pressures(field);
        pressure[film.grid().cell(3, 2)] = 1e160;
        FieldWriter.write(
                new Film(
                        film.heading(),
                        film.conditions(),
                        film.gas(),
                        film.grid(),
                        film.faces(),
                        film.velocityFrame(),
                        film.steadyIn(),
                        new LubricationField(
                                field.pressureAt(), pressure, field.massFlows().orElseThrow()),
                        film.supply()),
                spoilt);
        Run run = run("split", spoilt.toString(), "--width", "0.05", "--quiet", "--json");
        assertEquals(4, run.status(), run.err());
        JsonNode split = json(run.out());
        List<String> warnings = new ArrayList<>();
        split.get("warnings").forEach(warning -> warnings.add(warning.asText()));
        assertTrue(
                warnings.stream()
                        .anyMatch(
                                warning -> warning.matches(
                                        "A tracer released at the feed could not be followed beyond r ="
                                                + " \\d\\d\\.\\d+ mm, θ = -?\\d\\.\\d+ rad, σ = 0\\.\\d+: the velocity is not a number\\.")),
                warnings.toString());
        double unsettled = split.get("unsettled_share").asDouble();
        assertTrue(unsettled > 0.01 && unsettled < 0.6, "lost and unsettled " + unsettled);
        JsonNode whole = json(run("split", good.toString(), "--width", "0.05", "--quiet", "--json")
                .out());
        for (int row = 0; row < 2; row++) {
            JsonNode told = split.at("/table/" + row);
            double share = whole.at("/table/" + row + "/share").asDouble();
            assertTrue(told.get("share_low").asDouble() <= share
                    && share <= told.get("share_high").asDouble());
        }
        assertFalse(split.at("/maps/0/reached").asBoolean());
    }

    /** A check says of the closure what a split would: here 3 % of the inflow is too little, so that there is no result. */
    @Test
    void check_fieldThatDoesNotClose_isCalledNotSound() throws IOException {
        Path good = folder.resolve("closed.h5");
        Path open = folder.resolve("open.h5");
        assertEquals(
                0,
                run("sample", "coned", "--grid", "8x16", "--as", good.toString(), "--quiet")
                        .status());
        Film film = FieldReader.read(good);
        LubricationField field = (LubricationField) film.field();
        double[] theta = field.massFlows().orElseThrow().thetaValues();
        double[] radial = field.massFlows().orElseThrow().radialValues();
        double inflow =
                BorderBalance.of(FilmFlow.of(film)).inflow() / film.grid().sectors();
        for (double[] part : new double[][] {{0.01, 0.01}, {0.03, 0.03}}) {
            double[] more = radial.clone();
            // Gas that appears in the last row of cells, so that more leaves than enters.
            for (int i = 0; i < film.grid().cellsTheta(); i++) {
                more[i * film.grid().nj() + film.grid().nj() - 1] +=
                        part[0] * inflow / film.grid().cellsTheta();
            }
            Files.deleteIfExists(open);
            FieldWriter.write(
                    new Film(
                            film.heading(),
                            film.conditions(),
                            film.gas(),
                            film.grid(),
                            film.faces(),
                            film.velocityFrame(),
                            film.steadyIn(),
                            new LubricationField(field.pressureAt(), pressures(field), new MassFlows(theta, more)),
                            film.supply()),
                    open);
            Run check = run("check", open.toString(), "--json", "--quiet");
            assertEquals(4, check.status());
            JsonNode said = json(check.out());
            assertEquals(-part[1], said.get("field_closure").asDouble(), 1e-3);
            JsonNode split = json(run("split", open.toString(), "--width", "0.1", "--json", "--quiet")
                    .out());
            boolean sound = part[0] < 0.02;
            assertEquals(
                    sound ? "doubtful" : "no result",
                    said.get("closure_verdict").asText());
            assertEquals(sound, split.get("is_result").asBoolean());
            String first = said.get("warnings").get(0).asText();
            assertTrue(
                    first.startsWith(sound ? "The border flows of the field do not close: -1.0" : "NOT SOUND: -3.0"),
                    first);
            String firstOfSplit = split.get("warnings").get(0).asText();
            assertTrue(
                    firstOfSplit.startsWith(
                            sound ? "The border flows of the field do not close: -1.0" : "NO RESULT: -3.0"),
                    firstOfSplit);
        }
    }

    private static double[] pressures(LubricationField field) {
        double[] pressure = new double[field.size()];
        for (int n = 0; n < pressure.length; n++) {
            pressure[n] = field.pressure(n);
        }
        return pressure;
    }
}
