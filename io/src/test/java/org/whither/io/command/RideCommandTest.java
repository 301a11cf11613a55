package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.awt.image.BufferedImage;
import java.io.IOException;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.Stream;
import javax.imageio.ImageIO;
import javax.imageio.ImageReader;
import javax.imageio.stream.ImageInputStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.whither.io.motion.VideoFile;

/** Animations from the command line, in this process. */
class RideCommandTest {
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

    private Run ride(String... options) {
        List<String> arguments = new ArrayList<>(List.of(
                "ride",
                FIELD.toString(),
                "--quiet",
                "--out",
                folder.resolve("out").toString()));
        arguments.addAll(List.of(options));
        return run(arguments.toArray(String[]::new));
    }

    private static List<String> names(Path in) throws IOException {
        try (Stream<Path> list = Files.list(in)) {
            return list.map(path -> path.getFileName().toString()).sorted().toList();
        }
    }

    /** The bar of speeds in a picture of 1280 × 720 (pixels). */
    private static final int BAR_FROM = 860;

    private static final int BAR_TO = 1240;
    private static final int BAR_Y = 660;

    @Test
    void ride_writesFilesWhoseColoursAreThoseOfTheFrames() throws IOException {
        boolean video = VideoFile.possible();
        Run run = ride(
                "--length",
                "0.5",
                "--rate",
                "6",
                "--tracers",
                "20",
                "--as",
                video ? "gif,mp4,frames" : "gif,frames",
                "--json");
        assertEquals(0, run.status(), run.err());
        Path out = folder.resolve("out");
        List<String> expected = new ArrayList<>(List.of(".whither-results", "ride-frames", "ride.gif"));
        if (video) {
            expected.add("ride.mp4");
        }
        assertEquals(expected, names(out));
        assertEquals(List.of("frame-0001.png", "frame-0002.png", "frame-0003.png"), names(out.resolve("ride-frames")));
        JsonNode json = new ObjectMapper().readTree(run.out());
        assertEquals("animation", json.get("result").asText());
        assertEquals(3, json.get("ride").get("frames").asInt());
        assertTrue(json.get("ride").get("shows").asText().contains("times slower than the gas"));
        assertTrue(json.get("caution").asText().contains("no guarantee of leakage"));

        BufferedImage frame =
                ImageIO.read(out.resolve("ride-frames/frame-0001.png").toFile());
        // That it is the bar: from the blue to the yellow end of the scale of speeds.
        assertEquals(0x1a33b3, frame.getRGB(857, BAR_Y + 4) & 0xffffff);
        assertTrue((frame.getRGB(BAR_TO, BAR_Y + 4) >> 8 & 0xff) > 0xf0);
        List<BufferedImage> coded = new ArrayList<>();
        coded.add(firstOfGif(out.resolve("ride.gif")));
        if (video) {
            coded.add(firstOfVideo(out.resolve("ride.mp4")));
        }
        for (BufferedImage image : coded) {
            for (int x = BAR_FROM; x + 8 <= BAR_TO; x += 8) {
                double apart = apart(frame, image, x, BAR_Y, 8);
                // Measured: 2 for the GIF and 4 for the MP4, of 255.
                assertTrue(apart < 6, "the bar at " + x + " is " + apart + " off");
            }
            assertTrue(apart(frame, image, 4, 4, 8) < 3, "paper");
        }
    }

    private static BufferedImage firstOfGif(Path file) throws IOException {
        ImageReader reader = ImageIO.getImageReadersByFormatName("gif").next();
        try (ImageInputStream in = ImageIO.createImageInputStream(file.toFile())) {
            reader.setInput(in);
            assertEquals(3, reader.getNumImages(true));
            return reader.read(0);
        } finally {
            reader.dispose();
        }
    }

    private BufferedImage firstOfVideo(Path file) throws IOException {
        Path image = folder.resolve("first.png");
        Process process = new ProcessBuilder(
                        "ffmpeg",
                        "-v",
                        "error",
                        "-i",
                        file.toString(),
                        "-frames:v",
                        "1",
                        "-vf",
                        "scale=flags=accurate_rnd+full_chroma_int",
                        image.toString())
                .redirectErrorStream(true)
                .start();
        process.getInputStream().readAllBytes();
        return ImageIO.read(image.toFile());
    }

    /** Greatest difference of the means of two pictures over a square, channel by channel. */
    private static double apart(BufferedImage a, BufferedImage b, int x0, int y0, int edge) {
        double most = 0;
        for (int shift = 0; shift <= 16; shift += 8) {
            double sum = 0;
            for (int y = y0; y < y0 + edge; y++) {
                for (int x = x0; x < x0 + edge; x++) {
                    sum += (a.getRGB(x, y) >> shift & 0xff) - (b.getRGB(x, y) >> shift & 0xff);
                }
            }
            most = Math.max(most, Math.abs(sum / (edge * edge)));
        }
        return most;
    }

    @Test
    void turnAndRelease_overTheRelief_andARideFromAPlace() throws IOException {
        Run run = ride(
                "--kind",
                "ride,turn,release",
                "--view",
                "relief",
                "--from",
                "0.3,0.06,0.5",
                "--frame",
                "stationary",
                "--size",
                "640x360",
                "--background",
                "dark",
                "--length",
                "0.5",
                "--rate",
                "4",
                "--tracers",
                "8",
                "--as",
                "gif");
        assertEquals(0, run.status(), run.err());
        assertEquals(List.of(".whither-results", "release.gif", "ride.gif", "turn.gif"), names(folder.resolve("out")));
        assertEquals("", run.err());
    }

    @Test
    void badInput_isOneSentence_andNothingIsWritten() throws IOException {
        String[][] wrong = {
            {"--from", "0.1,0.2,0.5"}, {"expected 0.05 … 0.068 m"},
            {"--from", "0.1,0.06,1.5"}, {"outside the film"},
            {"--from", "0.1,0.06"}, {"expected three numbers"},
            {"--from", "0.1,0.05,0.5"}, {"leaves the film at once"},
            {"--length", "0"}, {"expected 0.5 … 3600 s"},
            {"--rate", "0"}, {"expected 1 … 60"},
            {"--rate", "60"}, {"a GIF takes at most 50"},
            {"--slower", "0"}, {"expected a number above 0"},
            {"--slower", "1e8"}, {"at most 20000"},
            {"--behind", "-3"}, {"expected more than 0"},
            {"--tracers", "-1"}, {"expected a whole number"},
            {"--size", "10"}, {"expected two whole numbers"},
            {"--size", "60000x40000"}, {"memory"},
            {"--exaggeration", "0"}, {"expected a number above 0"},
            {"--as", "avi"}, {"avi"},
            {"--kind", "fall"}, {"fall"}
        };
        for (int n = 0; n < wrong.length; n += 2) {
            Run run = ride(wrong[n]);
            String what = String.join(" ", wrong[n]);
            assertEquals(2, run.status(), what + ": " + run.err());
            assertTrue(run.err().contains(wrong[n + 1][0]), what + ": " + run.err());
            assertEquals(1, run.err().lines().count(), what + ": " + run.err());
            assertFalse(run.err().contains("Exception"), run.err());
            assertEquals(List.of(), names(folder), what + " left something behind");
        }
    }
}
