package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import io.jhdf.HdfFile;
import java.io.IOException;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** The paths of the stored field, from the command line to the files. */
class PathsCommandTest {
    private static final Path FIELD = Path.of("..", "samples", "fields", "spiral-24x32.h5");
    private static final Path SCRIPTS = Path.of("src", "test", "resources", "org", "whither", "io", "paths");

    @TempDir
    private Path folder;

    private record Run(int status, String out, String err) {}

    private static Run run(String... arguments) {
        StringWriter out = new StringWriter();
        StringWriter err = new StringWriter();
        int status = Program.run(new PrintWriter(out, true), new PrintWriter(err, true), arguments);
        return new Run(status, out.toString(), err.toString());
    }

    private static Run paths(String... options) {
        List<String> arguments = new ArrayList<>(List.of("paths", FIELD.toString(), "--quiet"));
        arguments.addAll(List.of(options));
        return run(arguments.toArray(String[]::new));
    }

    private Path written(String name, String... options) {
        List<String> arguments = new ArrayList<>(List.of(options));
        arguments.addAll(List.of("--out", folder.resolve(name).toString()));
        Run run = paths(arguments.toArray(String[]::new));
        assertEquals(0, run.status(), run.err());
        assertEquals("", run.err());
        return folder.resolve(name);
    }

    private static double[][] table(Path csv) throws IOException {
        List<String> lines = Files.readAllLines(csv);
        return lines.subList(1, lines.size()).stream()
                .map(line -> Stream.of(line.split(","))
                        .mapToDouble(Double::parseDouble)
                        .toArray())
                .toArray(double[][]::new);
    }

    private static JsonNode json(Path file) throws IOException {
        return new ObjectMapper().readTree(Files.readString(file));
    }

    private static List<String> names(Path in) throws IOException {
        try (Stream<Path> list = Files.list(in)) {
            return list.map(path -> path.getFileName().toString()).sorted().toList();
        }
    }

    /** The numbers are the same in every file, read back by this program's library and, where it is there, by h5py. */
    @Test
    void files_holdTheSameNumbers() throws Exception {
        for (String direction : List.of("forward", "both")) {
            Path out = written(
                    direction,
                    "--release",
                    "feed:40",
                    "--release",
                    "at:0.7,0.06,0.4",
                    "--direction",
                    direction,
                    "--frame",
                    "stationary",
                    "--as",
                    "csv,hdf5");
            assertEquals(List.of(".whither-results", "paths.csv", "paths.h5", "paths.json"), names(out));
            double[][] table = table(out.resolve("paths.csv"));
            JsonNode said = json(out.resolve("paths.json"));
            assertEquals(41, said.get("tracers").size());
            assertEquals(table.length, said.get("point_count").asInt());
            try (HdfFile file = new HdfFile(out.resolve("paths.h5"))) {
                String[] columns = {"time", "theta", "radius", "z", "sigma", "speed", "pressure"};
                for (int c = 0; c < columns.length; c++) {
                    double[] values = (double[])
                            file.getDatasetByPath("points/" + columns[c]).getData();
                    assertEquals(table.length, values.length);
                    for (int n = 0; n < values.length; n++) {
                        assertEquals(table[n][c + 1], values[n], 0.0, columns[c]);
                    }
                }
                long[] offset =
                        (long[]) file.getDatasetByPath("tracers/point_offset").getData();
                for (int n = 0; n < 41; n++) {
                    JsonNode tracer = said.get("tracers").get(n);
                    double[] first = table[(int) offset[n]];
                    double[] last = table[(int) offset[n + 1] - 1];
                    assertEquals(n, first[0]);
                    assertEquals(n, last[0]);
                    double end = tracer.get("fate").asText().equals("inner") ? 0.05 : 0.068;
                    assertEquals(end, last[3], 1e-9, "it leaves where its fate says");
                    assertEquals(tracer.get("residence_time").asDouble(), last[1] - first[1], 1e-12);
                    assertEquals(
                            tracer.get("revolutions").asDouble() * 2 * Math.PI,
                            last[2] - first[2],
                            1e-9,
                            "θ is unwrapped, in the stationary frame");
                    if (direction.equals("both")) {
                        assertEquals("supply", tracer.get("from").asText());
                        assertTrue(first[1] < 0 && first[5] > 1 - 1e-8, "it came in through the stator");
                    }
                }
            }
            for (String python : List.of("/usr/bin/python3", "python3")) {
                if (works(python, "-c", "import h5py")) {
                    String agreed = output(
                            python, "-B", SCRIPTS.resolve("check_paths.py").toString(), out.toString(), direction);
                    assertEquals("41 tracers agree\n", agreed);
                    break;
                }
            }
        }
    }

    @Test
    void files_areTheSameForAnyNumberOfThreads() throws IOException {
        Path first = null;
        for (String threads : List.of("1", "2", "5", "2")) {
            Path out = written(
                    "with" + threads,
                    "--release",
                    "feed:70",
                    "--release",
                    "grid:supply,5x2",
                    "--as",
                    "csv,hdf5,gltf",
                    "--threads",
                    threads);
            if (first == null) {
                first = out;
            }
            for (String name : List.of("paths.csv", "paths.h5", "paths.glb", "paths.json")) {
                assertArrayEquals(Files.readAllBytes(first.resolve(name)), Files.readAllBytes(out.resolve(name)), name);
            }
        }
    }

    /** Both frames give the same points, once the angle is turned by Ω t. */
    @Test
    void frames_agreeAfterTurning() throws IOException {
        String[] options = {"--release", "feed:20", "--points", "30", "--tolerance", "1e-8", "--frame"};
        double[][][] tables = new double[2][][];
        for (int n = 0; n < 2; n++) {
            String frame = n == 0 ? "rotating" : "stationary";
            List<String> all = new ArrayList<>(List.of(options));
            all.add(frame);
            tables[n] = table(written(frame, all.toArray(String[]::new)).resolve("paths.csv"));
        }
        Run check = run("check", FIELD.toString(), "--json", "--quiet");
        double rate = new ObjectMapper()
                .readTree(check.out())
                .findValue("rotation_rate")
                .asDouble();
        assertTrue(Math.abs(rate) > 100);
        assertEquals(600, tables[0].length);
        for (int n = 0; n < 600; n++) {
            double[] turning = tables[0][n];
            double[] standing = tables[1][n];
            assertEquals(standing[1], turning[1], 1e-7 * (1e-3 + standing[1]));
            assertEquals(standing[2], turning[2] + rate * turning[1], 1e-4);
            assertEquals(standing[3], turning[3], 1e-6);
            assertEquals(standing[5], turning[5], 1e-4);
        }
    }

    /** Points within a tolerance lie on what many points equal in time trace, over groove edges too. */
    @Test
    void pointsWithinTolerance_followThePath() throws IOException {
        String[] release = {"--release", "feed:12", "--frame", "rotating", "--points"};
        List<String> options = new ArrayList<>(List.of(release));
        options.add("0.01");
        double[][] few = table(written("few", options.toArray(String[]::new)).resolve("paths.csv"));
        options.set(options.size() - 1, "4001");
        double[][] many = table(written("many", options.toArray(String[]::new)).resolve("paths.csv"));
        assertTrue(few.length < 12 * 120, few.length + " points");
        int a = 0;
        double worst = 0;
        int jumps = 0;
        for (double[] point : many) {
            while (few[a + 1][0] < point[0] || (few[a + 1][0] == point[0] && few[a + 1][1] < point[1])) {
                a++;
                jumps += few[a][0] == few[a + 1][0] && few[a][1] == few[a + 1][1] ? 1 : 0;
            }
            double span = few[a + 1][1] - few[a][1];
            double f = few[a][0] != few[a + 1][0] || span == 0 ? 1 : (point[1] - few[a][1]) / span;
            for (int axis = 0; axis < 2; axis++) {
                double line = (1 - f) * flat(few[a], axis) + f * flat(few[a + 1], axis);
                worst = Math.max(worst, Math.abs(line - flat(point, axis)) / 0.018);
            }
            worst = Math.max(worst, Math.abs((1 - f) * few[a][5] + f * few[a + 1][5] - point[5]));
        }
        assertTrue(worst <= 0.01 && worst > 0.003, "furthest " + worst);
        assertTrue(jumps > 0, "paths pass over groove edges");
    }

    private static double flat(double[] point, int axis) {
        return point[3] * (axis == 0 ? Math.cos(point[2]) : Math.sin(point[2]));
    }

    @Test
    void limits_stopThePaths() throws IOException {
        Path time = written("time", "--release", "feed:10", "--time", "2e-4");
        for (JsonNode tracer : json(time.resolve("paths.json")).get("tracers")) {
            assertEquals("stopped", tracer.get("fate").asText());
            assertEquals(2e-4, tracer.get("residence_time").asDouble(), 1e-12);
        }
        Path turns = written("turns", "--release", "feed:10", "--revolutions", "0.02");
        for (JsonNode tracer : json(turns.resolve("paths.json")).get("tracers")) {
            assertEquals("stopped", tracer.get("fate").asText());
            assertEquals(0.02, tracer.get("revolutions").asDouble(), 1e-8);
        }
    }

    /** What leaves, followed back, comes from the feed; the grid stands for all that leaves. */
    @Test
    void grid_overAnOutflow_isFollowedBack() throws IOException {
        Run run = paths("--release", "grid:outer,4x3", "--direction", "backward", "--json");
        assertEquals(0, run.status(), run.err());
        JsonNode said = new ObjectMapper().readTree(run.out());
        double flow = 0;
        Set<Double> heights = new HashSet<>();
        for (JsonNode tracer : said.get("tracers")) {
            assertEquals("supply", tracer.get("from").asText());
            assertEquals(0.068, tracer.at("/release/radius").asDouble());
            assertFalse(tracer.has("fate"));
            heights.add(tracer.at("/release/sigma").asDouble());
            flow += tracer.get("mass_flow").asDouble();
        }
        JsonNode balance = new ObjectMapper()
                .readTree(run("check", FIELD.toString(), "--json", "--quiet").out())
                .get("balance");
        assertEquals(balance.get("outer_out").asDouble(), flow, 1e-6 * flow);
        assertTrue(heights.size() >= 3);
        assertEquals(List.of(), names(folder), "with --json alone no file is written");
    }

    @Test
    void releaseFiles_areRead() throws IOException {
        Path csv = Files.writeString(
                folder.resolve("points.csv"),
                "\uFEFF# by hand\r\nname,sigma,radius_m,theta_rad\r\na,0.25,0.06,0.5\r\n\r\nb,1,0.055,-7\r\n");
        Path bare = Files.writeString(folder.resolve("bare.csv"), "0.5, 0.06, 0.25\n-7,0.055,1\n");
        Path json = Files.writeString(
                folder.resolve("points.json"),
                "[{\"theta\": 0.5, \"radius\": 0.06, \"sigma\": 0.25, \"name\": {\"x\": [1]}},\n"
                        + " {\"theta\": -7, \"radius\": 0.055, \"sigma\": 1}]\n");
        List<JsonNode> read = new ArrayList<>();
        for (Path file : List.of(csv, bare, json)) {
            Run run = paths("--release", "file:" + file, "--json", "--points", "2");
            assertEquals(0, run.status(), run.err());
            read.add(new ObjectMapper().readTree(run.out()).get("tracers"));
        }
        assertEquals(-7, read.get(0).at("/1/release/theta").asDouble());
        assertEquals(0.25, read.get(0).at("/0/release/sigma").asDouble());
        assertEquals(read.get(0), read.get(1));
        assertEquals(read.get(0), read.get(2));
    }

    @Test
    void brokenReleaseFile_isRefusedWithItsLine() throws IOException {
        String[][] cases = {
            {"0.5,0.06,0.25\n0.5,0.06\n", "line 2", "2 values"},
            {"theta_rad,radius_m,sigma\n\n0.5,6 cm,0.25\n", "line 3", "6 cm"},
            {"0.5,0.06,0.25\n0.5,0.09,0.25\n", "line 2", "outside the film"},
            {"0.5,60,0.25\n", "line 1", "not millimetres"},
            {"0.5,0.06,1.25\n", "line 1", "outside the film"},
            {"0.5,0.06,NaN\n", "line 1", "NaN"},
            {"angle,radius_m,sigma\n1,0.06,0.5\n", "line 1", "angle"},
            {
                "[{\"theta\": 0.5, \"radius\": 0.06, \"sigma\": 0.25},\n{\"theta\": 0.5, \"radius\": 0.06}]",
                "line 2",
                "sigma"
            },
            {"[{\"theta\": 0.5,\n\"radius\": \"wide\", \"sigma\": 0.25}]", "line 2", "wide"},
            {"[{\"theta\": 0.5,\n\"radius\": 0.06,, \"sigma\": 0.25}]", "line 2", "JSON"},
            {"[{\"theta\": 0.5, \"radius\": 0.06, \"sigma\": 0.25}", "line 1", "JSON"},
            {"{\"points\": []}", "line 1", "array"},
            {"[1, 2]", "line 1", "object"},
            {"# nothing\n", "no point", "at least one"},
        };
        for (String[] each : cases) {
            Path file = Files.writeString(folder.resolve("broken"), each[0]);
            assertRefused(
                    3,
                    paths(
                            "--release",
                            "file:" + file,
                            "--out",
                            folder.resolve("o").toString()),
                    each[1],
                    each[2]);
        }
        Files.write(folder.resolve("broken"), new byte[] {(byte) 0xff, (byte) 0xfe, 0, 1});
        assertRefused(3, paths("--release", "file:" + folder.resolve("broken")), "UTF-8", "broken");
        assertRefused(3, paths("--release", "file:" + folder.resolve("missing")), "missing", "no such file");
        assertEquals(List.of("broken"), names(folder), "nothing half-written");
    }

    @Test
    void wrongUsage_isOneSentence() throws IOException {
        String[][] cases = {
            {"--release", "feed", "whole number"},
            {"--release", "feed:0", "whole number"},
            {"--release", "feed:99999999", "10000000"},
            {"--release", "nowhere:3", "not known"},
            {"--release", "at:0,0.06", "three"},
            {"--release", "at:0,0.06,high", "high"},
            {"--release", "at:0,0.2,0.5", "outside the film"},
            {"--release", "at:0,0.06,1.5", "outside the film"},
            {"--release", "grid:outer", "NxM"},
            {"--release", "grid:outer,4x4", "no gas enters"},
            {"--release", "file:", "missing"},
            {"--direction", "backward", "nowhere else"},
            {"--points", "1", "--points"},
            {"--points", "1.5", "--points"},
            {"--points", "many", "--points"},
            {"--as", "vtk", "vtk"},
            {"--time", "-1", "--time"},
            {"--revolutions", "0", "--revolutions"},
            {"--exaggeration", "0", "--exaggeration"},
            {"--threads", "0", "--threads"},
            {"--tolerance", "1", "--tolerance"},
        };
        for (String[] each : cases) {
            assertRefused(
                    2, paths(each[0], each[1], "--out", folder.resolve("o").toString()), each[2], "whither: ");
        }
        assertEquals(List.of(), names(folder), "nothing half-written");
        assertRefused(3, paths("--out", folder.resolve("no/such").toString()), "no/such", "does not exist");
    }

    private static void assertRefused(int status, Run run, String... words) {
        assertEquals(status, run.status(), run.err());
        assertEquals(1, run.err().strip().lines().count(), run.err());
        assertEquals("", run.out());
        for (String word : words) {
            assertTrue(run.err().contains(word), word + ": " + run.err());
        }
    }

    // ---- the scene
    // ---------------------------------------------------------------------------------------------------

    /** Its bounds are those of the seal, the film 1000 times too thick; it says so; and it names what it shows. */
    @Test
    void scene_holdsTheSealExaggerated() throws IOException {
        Path out = written("scene", "--release", "feed:150", "--as", "gltf");
        ByteBuffer bytes =
                ByteBuffer.wrap(Files.readAllBytes(out.resolve("paths.glb"))).order(ByteOrder.LITTLE_ENDIAN);
        assertEquals("glTF", new String(bytes.array(), 0, 4, StandardCharsets.US_ASCII));
        assertEquals(bytes.capacity(), bytes.getInt(8));
        JsonNode scene =
                new ObjectMapper().readTree(new String(bytes.array(), 20, bytes.getInt(12), StandardCharsets.UTF_8));
        JsonNode root = scene.get("nodes").get(scene.at("/scenes/0/nodes/0").asInt());
        assertEquals(1000, root.at("/extras/exaggeration").asDouble());
        assertEquals(75, root.at("/extras/paths_shown").asInt());
        assertEquals(150, root.at("/extras/paths_followed").asInt());
        Set<String> names = new HashSet<>();
        scene.get("nodes").forEach(node -> names.add(node.get("name").asText()));
        assertTrue(names.containsAll(List.of("rotor", "stator", "feed", "paths", "rotor sector 1")), names.toString());
        assertTrue(names.contains("path 0 to outer") || names.contains("path 0 to inner"), names.toString());

        JsonNode stator = bounds(scene, "stator");
        JsonNode rotor = bounds(scene, "rotor");
        double film = stator.at("/min/1").asDouble() - rotor.at("/max/1").asDouble();
        assertEquals(3.5e-3, film, 1e-8, "a film of 3.5 µm is drawn 3.5 mm thick, y upwards");
        assertEquals(0, rotor.at("/max/1").asDouble(), 1e-9);
        for (JsonNode mesh : scene.get("meshes")) {
            if (mesh.get("name").asText().startsWith("path")) {
                JsonNode path = scene.get("accessors")
                        .get(mesh.at("/primitives/0/attributes/POSITION").asInt());
                assertTrue(mesh.at("/primitives/0/attributes").has("COLOR_0"));
                assertTrue(path.at("/max/1").asDouble() < 3.5e-3 + 3e-4, "it keeps within the film");
                assertTrue(Math.abs(path.at("/max/0").asDouble()) < 0.0685);
            }
        }
    }

    private static JsonNode bounds(JsonNode scene, String name) {
        for (JsonNode mesh : scene.get("meshes")) {
            if (mesh.get("name").asText().equals(name)) {
                return scene.get("accessors")
                        .get(mesh.at("/primitives/0/attributes/POSITION").asInt());
            }
        }
        throw new AssertionError("no mesh " + name);
    }

    /**
     * The Khronos validator (npm package gltf-validator, which {@code io/setup.sh test} puts into {@code target/node}) finds
     * nothing, not so much as a hint. Skipped where it is missing.
     */
    @Test
    void scene_isValid() throws Exception {
        Path validator =
                Path.of("target", "node", "node_modules", "gltf-validator").toAbsolutePath();
        assumeTrue(Files.isDirectory(validator), "skipped: gltf-validator is missing; run sh io/setup.sh test");
        assumeTrue(works("node", "--version"), "skipped: node is missing; install the package nodejs");
        Path out = written(
                "scene", "--release", "feed:30", "--release", "at:0.7,0.06,0.0", "--direction", "both", "--as", "gltf");
        assertEquals(
                "[]\n",
                output(
                        "node",
                        SCRIPTS.resolve("validate.js").toString(),
                        validator.toString(),
                        out.resolve("paths.glb").toString()));
    }

    private static boolean works(String... command) throws InterruptedException {
        try {
            return new ProcessBuilder(command)
                            .redirectErrorStream(true)
                            .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                            .start()
                            .waitFor()
                    == 0;
        } catch (IOException e) {
            return false;
        }
    }

    private static String output(String... command) throws IOException, InterruptedException {
        Process process = new ProcessBuilder(command).redirectErrorStream(true).start();
        String said = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertTrue(process.waitFor(60, TimeUnit.SECONDS), said);
        assertEquals(0, process.exitValue(), said);
        return said;
    }
}
