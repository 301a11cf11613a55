package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.awt.image.BufferedImage;
import java.io.IOException;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import javax.imageio.ImageIO;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class DrawCommandTest {
    private static final Path FIELD = Path.of("..", "samples", "fields", "spiral-24x32.h5");

    @TempDir
    private Path folder;

    private record Run(int status, String err) {}

    private Run draw(String... options) {
        StringWriter out = new StringWriter();
        StringWriter err = new StringWriter();
        List<String> arguments = new ArrayList<>(List.of("draw", FIELD.toString(), "--quiet", "--paths", "2"));
        arguments.addAll(List.of(options));
        if (!arguments.contains("--size")) {
            arguments.add("--size=640x360");
        }
        String[] given = arguments.toArray(new String[0]);
        int status = Program.run(new PrintWriter(out, true), new PrintWriter(err, true), given);
        return new Run(status, err.toString());
    }

    private static JsonNode json(Path file) throws IOException {
        return new ObjectMapper().readTree(Files.readString(file));
    }

    @Test
    void like_makesTheSamePictureAgain() throws IOException {
        Path first = folder.resolve("a");
        Path second = folder.resolve("b");
        Run run = draw("--view", "relief,meridian", "--range", "0..14", "--angle", "12", "--out", first.toString());
        assertEquals(0, run.status(), run.err());
        for (String name : new String[] {"relief", "meridian"}) {
            String file = first.resolve(name + ".json").toString();
            run = draw("--like", file, "--out", second.toString());
            assertEquals(0, run.status(), run.err());
            same(first.resolve(name + ".png"), second.resolve(name + ".png"));
            assertEquals(json(first.resolve(name + ".json")), json(second.resolve(name + ".json")));
        }
        JsonNode relief = json(first.resolve("relief.json"));
        assertEquals(0, relief.at("/ranges/pressure_bar/0").asDouble(), 1e-9);
        assertEquals(14, relief.at("/ranges/pressure_bar/1").asDouble(), 1e-9);
        assertTrue(relief.has("bar_per_mm") && relief.has("camera"), "all that the picture needs");
        assertEquals(12, json(first.resolve("meridian.json")).get("angle_deg").asDouble(), 1e-9);
    }

    private static void same(Path a, Path b) throws IOException {
        BufferedImage first = ImageIO.read(a.toFile());
        BufferedImage second = ImageIO.read(b.toFile());
        for (int y = 0; y < first.getHeight(); y++) {
            for (int x = 0; x < first.getWidth(); x++) {
                assertEquals(first.getRGB(x, y), second.getRGB(x, y), a.getFileName() + " at " + x + ", " + y);
            }
        }
    }

    @Test
    void pair_hasOneScale() throws IOException {
        Path out = folder.resolve("p");
        Run run = draw("--view", "plan", "--size", "1280x720", "--with", FIELD.toString(), "--out", out.toString());
        assertEquals(0, run.status(), run.err());
        BufferedImage image = ImageIO.read(out.resolve("pair-plan.png").toFile());
        assertEquals(1280, image.getWidth());
        // The same field twice: the halves are alike but for the line between them.
        int different = 0;
        for (int y = 0; y < 690; y++) {
            for (int x = 2; x < 638; x++) {
                different += image.getRGB(x, y) != image.getRGB(x + 640, y) ? 1 : 0;
            }
        }
        assertTrue(different < 100, different + " pixels differ");
        JsonNode facts = json(out.resolve("pair-plan.json"));
        assertEquals(2, facts.get("field").size());
        assertTrue(facts.at("/ranges/pressure_bar/1").asDouble() > 5);
    }

    @Test
    void png_carriesItsFacts() throws IOException {
        Path out = folder.resolve("f");
        Run run = draw("--view", "plan", "--show", "thickness", "--title", "Ein Titel, µm", "--out", out.toString());
        assertEquals(0, run.status(), run.err());
        var reader = ImageIO.getImageReadersByFormatName("png").next();
        ObjectNode found = new ObjectMapper().createObjectNode();
        try (var in =
                ImageIO.createImageInputStream(out.resolve("plan-thickness.png").toFile())) {
            reader.setInput(in);
            var texts = ((org.w3c.dom.Element) reader.getImageMetadata(0).getAsTree("javax_imageio_png_1.0"))
                    .getElementsByTagName("iTXtEntry");
            for (int n = 0; n < texts.getLength(); n++) {
                var entry = (org.w3c.dom.Element) texts.item(n);
                found.put(entry.getAttribute("keyword"), entry.getAttribute("text"));
            }
        } finally {
            reader.dispose();
        }
        assertEquals("Ein Titel, µm", found.get("Title").asText());
        assertEquals(
                json(out.resolve("plan-thickness.json")),
                new ObjectMapper().readTree(found.get("Description").asText()));
        assertTrue(found.get("Source").asText().contains("spiral-24x32.h5"));
        assertTrue(found.get("Disclaimer").asText().contains("no approval"));
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "--range 5..5                   | 3 | the range is empty",
                "--range speed:9..2             | 3 | the range is empty",
                "--range much                   | 2 | expected two numbers",
                "--range depth:1..2             | 2 | has no range",
                "--size 90000x60000             | 3 | choose a smaller size",
                "--height 0                     | 2 | above 0",
                "--camera 10                    | 2 | two angles",
                "--camera 10,95                 | 2 | less than 90",
                "--like no-such.json            | 3 | no-such.json",
                "--with no-such.h5              | 3 | no-such.h5"
            })
    void badInput_getsOneSentence_andNothingIsWritten(String options, int status, String words) throws IOException {
        Path out = folder.resolve("n");
        String[] given = (options.strip() + " --out " + out).split("\\s+");
        Run run = draw(given);
        assertEquals(status, run.status(), run.err());
        assertEquals(
                1,
                run.err().lines().filter(line -> line.startsWith("whither: ")).count(),
                run.err());
        assertTrue(run.err().contains(words), run.err());
        assertFalse(run.err().contains("\tat "), run.err());
        assertFalse(Files.exists(out), "nothing is written");
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "not json                                                     | it is not JSON",
                "[1, 2]                                                       | not a JSON object",
                "{\"picture\": \"plan\", \"version\": 2}                      | \"version\" is 2",
                "{\"picture\": \"sky\", \"version\": 1}                       | one of plan, relief, gap, meridian",
                "{\"picture\": \"plan\", \"version\": 1, \"size\": [1]}       | size[1]",
                "{\"picture\": \"plan\", \"version\": 1, \"ranges\": {\"speed_m_s\": [3, 1]}} | low end below",
                "{\"picture\": \"relief\", \"version\": 1, \"camera\": {}}    | camera.azimuth_deg"
            })
    void like_badDescription_isRefused(String text, String words) throws IOException {
        Path file = folder.resolve("picture.json");
        Files.writeString(file, text);
        Run run = draw("--like", file.toString(), "--out", folder.resolve("n").toString());
        assertEquals(3, run.status(), run.err());
        assertTrue(run.err().contains("picture.json") && run.err().contains(words), run.err());
        assertFalse(Files.exists(folder.resolve("n")));
    }
}
