package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
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
import javax.imageio.ImageReader;
import javax.imageio.stream.ImageInputStream;
import org.jsoup.Jsoup;
import org.jsoup.nodes.Document;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.whither.io.motion.VideoFile;

/** Command report from its command line. */
class ReportCommandTest {
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

    /** The same field, seed and settings give the same bytes on any number of threads; only the page has a date. */
    @Test
    void report_repeatedOnOtherThreads_isByteEqual() throws IOException {
        Path first = folder.resolve("first");
        Path again = folder.resolve("again");
        String[] common = {
            "report", FIELD.toString(), "--width", "0.05", "--tolerance", "1e-5", "--no-pictures", "--quiet", "--out"
        };
        Run one = run(Stream.concat(Stream.of(common), Stream.of(first.toString(), "--threads", "1"))
                .toArray(String[]::new));
        assertEquals(0, one.status(), one.err());
        assertTrue(one.out().contains("Of every 100 kg of supply gas"), one.out());
        assertTrue(one.out().contains("The page: " + first.resolve("report.html")), one.out());
        Run two = run(Stream.concat(Stream.of(common), Stream.of(again.toString(), "--threads", "3", "--json"))
                .toArray(String[]::new));
        assertEquals(0, two.status(), two.err());
        assertArrayEquals(
                Files.readAllBytes(first.resolve("report.json")), Files.readAllBytes(again.resolve("report.json")));
        assertEquals(Files.readString(again.resolve("report.json")), two.out(), "--json prints what the file holds");
        assertEquals(undated(first), undated(again));
        try (Stream<Path> files = Files.list(first)) {
            assertEquals(
                    List.of(".whither-results", "report.html", "report.json"),
                    files.map(file -> file.getFileName().toString()).sorted().toList());
        }
        JsonNode numbers = new ObjectMapper().readTree(two.out());
        assertEquals(64, numbers.at("/field/sha256").asText().length());
        assertTrue(numbers.at("/recirculation/tracers").asLong() > 1000);
        assertTrue(numbers.at("/age/ring_p50").size() > 10);
        Document page = Jsoup.parse(first.resolve("report.html"));
        assertTrue(page.text().contains("There are no pictures"));
        assertTrue(page.text().contains("--width 0.05 --seed 1"), "the command line that makes it again");
    }

    private static String undated(Path folder) throws IOException {
        return Files.readString(folder.resolve("report.html")).replaceAll("<time.*?</time>", "");
    }

    @Test
    void report_withRide_putsAnAnimationBesideThePage() throws IOException {
        Path out = folder.resolve("out");
        Run run = run(
                "report",
                FIELD.toString(),
                "--width",
                "0.05",
                "--tolerance",
                "1e-5",
                "--no-pictures",
                "--ride",
                "--ride-size",
                "640x360",
                "--ride-length",
                "0.5",
                "--quiet",
                "--out",
                out.toString());
        assertEquals(0, run.status(), run.err());
        String first = VideoFile.possible() ? "ride.mp4" : "ride.gif";
        assertEquals(!VideoFile.possible(), run.err().contains("ffmpeg"), run.err());
        List<String> expected = new ArrayList<>(List.of(".whither-results", "report.html", "report.json", "ride.gif"));
        if (VideoFile.possible()) {
            expected.add("ride.mp4");
        }
        try (Stream<Path> files = Files.list(out)) {
            assertEquals(
                    expected,
                    files.map(file -> file.getFileName().toString()).sorted().toList());
        }
        try (ImageInputStream in =
                ImageIO.createImageInputStream(out.resolve("ride.gif").toFile())) {
            ImageReader reader = ImageIO.getImageReadersByFormatName("gif").next();
            reader.setInput(in);
            assertEquals(640, reader.getWidth(0));
            assertEquals(360, reader.getHeight(0));
            assertTrue(reader.getNumImages(true) > 10, "frames of half a second");
            reader.dispose();
        }
        Document page = Jsoup.parse(out.resolve("report.html"));
        assertEquals(
                List.of(first),
                page.select("a[href^=ride]").stream().map(a -> a.attr("href")).toList());
        assertTrue(page.text().contains("--ride --ride-size 640x360 --ride-length 0.5"), "what makes it again");
    }

    @Test
    void report_rideThatCannotBe_isRefusedBeforeAnythingIsComputed() {
        Path out = folder.resolve("out");
        String[][] wrong = {
            {"--ride-size 10x10", "expected at least 640"},
            {"--ride-size big", "two whole numbers such as 1280x720"},
            {"--ride-length 0.1", "expected 0.5 … 3600 s"}
        };
        for (String[] each : wrong) {
            String[] option = each[0].split(" ");
            Run run =
                    run("report", FIELD.toString(), "--ride", option[0], option[1], "--quiet", "--out", out.toString());
            assertEquals(2, run.status(), run.err());
            assertTrue(run.err().contains(each[1]), run.err());
            assertFalse(Files.exists(out));
        }
        Run nowhere = run("report", FIELD.toString(), "--ride", "--json", "--quiet");
        assertEquals(2, nowhere.status(), nowhere.err());
        assertTrue(nowhere.err().contains("name a folder with --out"), nowhere.err());
    }

    @Test
    void report_fieldToCompareMissing_isRefused() throws IOException {
        Path out = folder.resolve("out");
        Run run = run(
                "report",
                FIELD.toString(),
                "--compare",
                folder.resolve("gone.h5").toString(),
                "--quiet",
                "--out",
                out.toString());
        assertEquals(3, run.status(), run.err());
        assertEquals(1, run.err().lines().count(), run.err());
        assertTrue(run.err().contains("gone.h5"), run.err());
        assertFalse(Files.exists(out));
    }

    @Test
    void report_folderThatIsAFile_isRefusedAndKept() throws IOException {
        Path file = Files.writeString(folder.resolve("notes"), "mine", StandardCharsets.UTF_8);
        for (Path out : List.of(file, file.resolve("below"), folder.resolve("no/such"))) {
            Run run = run("report", FIELD.toString(), "--quiet", "--out", out.toString());
            assertEquals(3, run.status(), run.err());
            assertEquals(1, run.err().lines().count(), run.err());
        }
        assertEquals("mine", Files.readString(file));
    }
}
