package org.whither.io.motion;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Checked by reading the files back with ffmpeg and ffprobe. */
class VideoFileTest {
    @TempDir
    private Path folder;

    @BeforeEach
    void ffmpegIsThere() {
        assumeTrue(VideoFile.possible(), "ffmpeg is installed");
    }

    private Path write(List<BufferedImage> frames) throws IOException {
        Path file = folder.resolve("motion.mp4");
        BufferedImage first = frames.get(0);
        VideoFile video = new VideoFile(file, first.getWidth(), first.getHeight(), 24, "Invented", "4 µm; a = b");
        for (BufferedImage frame : frames) {
            video.add(frame);
        }
        video.finish();
        return file;
    }

    private static byte[] output(String... command) throws IOException {
        Process process = new ProcessBuilder(command)
                .redirectError(ProcessBuilder.Redirect.DISCARD)
                .start();
        return process.getInputStream().readAllBytes();
    }

    private static List<BufferedImage> read(Path file, int width, int height) throws IOException {
        byte[] bytes = output(
                "ffmpeg",
                "-v",
                "error",
                "-i",
                file.toString(),
                "-vf",
                "scale=flags=accurate_rnd+full_chroma_int",
                "-f",
                "rawvideo",
                "-pix_fmt",
                "rgb24",
                "pipe:1");
        List<BufferedImage> frames = new ArrayList<>();
        for (int at = 0; at + 3 * width * height <= bytes.length; at += 3 * width * height) {
            BufferedImage image = new BufferedImage(width, height, BufferedImage.TYPE_INT_RGB);
            for (int n = 0; n < width * height; n++) {
                int p = at + 3 * n;
                image.setRGB(
                        n % width,
                        n / width,
                        (bytes[p] & 0xff) << 16 | (bytes[p + 1] & 0xff) << 8 | (bytes[p + 2] & 0xff));
            }
            frames.add(image);
        }
        return frames;
    }

    @Test
    void colours_surviveTheCoding() throws IOException {
        List<BufferedImage> frames = InventedMotion.frames(320, 180, 12);
        List<BufferedImage> shown = read(write(frames), 320, 180);
        assertEquals(frames.size(), shown.size());
        for (int n = 0; n < shown.size(); n++) {
            BufferedImage image = shown.get(n);
            int paper = InventedMotion.apart(InventedMotion.PAPER, image.getRGB(5, 5));
            assertTrue(paper <= 3, "paper is " + paper + " off");
            for (int p = 0; p < InventedMotion.PATCHES.length; p++) {
                int apart = InventedMotion.apart(
                        InventedMotion.PATCHES[p], image.getRGB(40 + 40 * p + 12, InventedMotion.PATCH_Y + 8));
                assertTrue(apart <= 6, "patch " + p + " of frame " + n + " is " + apart + " off");
            }
            // Measured: 3.
            for (int x = InventedMotion.BAR_X + 8; x + 16 <= InventedMotion.BAR_X + InventedMotion.BAR_WIDTH; x += 8) {
                double apart = InventedMotion.meansApart(frames.get(n), image, x, InventedMotion.BAR_Y + 4, 8);
                assertTrue(apart < 5, "the bar at " + x + " of frame " + n + " is " + apart + " off");
            }
        }
    }

    @Test
    void theFile_saysHowItsColoursAreCoded_andBeginsWithItsIndex() throws IOException {
        Path file = write(InventedMotion.frames(320, 180, 6));
        String told = new String(
                output("ffprobe", "-v", "error", "-show_streams", "-show_format", file.toString()),
                StandardCharsets.UTF_8);
        for (String line : List.of(
                "codec_name=h264",
                "pix_fmt=yuv420p",
                "color_range=tv",
                "color_space=bt709",
                "color_transfer=bt709",
                "color_primaries=bt709",
                "avg_frame_rate=24/1",
                "TAG:title=Invented",
                "TAG:comment=4 µm; a = b")) {
            assertTrue(told.contains(line + "\n"), line + " in:\n" + told);
        }
        String bytes = new String(Files.readAllBytes(file), StandardCharsets.ISO_8859_1);
        assertTrue(bytes.indexOf("moov") < bytes.indexOf("mdat"), "the index stands before the pictures");
    }

    @Test
    void oddSizes_areMadeEven() throws IOException {
        Path file = write(InventedMotion.frames(321, 181, 3));
        List<BufferedImage> shown = read(file, 322, 182);
        assertEquals(3, shown.size());
        assertTrue(InventedMotion.apart(InventedMotion.PAPER, shown.get(1).getRGB(319, 178)) <= 3);
    }

    @Test
    void aKilledProgram_isOneSentence() throws IOException, InterruptedException {
        Path file = folder.resolve("motion.mp4");
        List<BufferedImage> frames = InventedMotion.frames(320, 180, 4);
        VideoFile video = new VideoFile(file, 320, 180, 24, "", "");
        video.add(frames.get(0));
        video.process().destroyForcibly();
        IOException failure = assertThrows(IOException.class, () -> {
            for (int n = 0; n < 400; n++) {
                video.add(frames.get(n % 4));
            }
            video.finish();
        });
        assertEquals("motion.mp4 was not written: ffmpeg ended before its time; try again", failure.getMessage());
        assertFalse(video.process().isAlive());
    }

    @Test
    void aFullDisk_isOneSentence() throws IOException {
        Path full = Path.of("/dev/full");
        assumeTrue(Files.exists(full), "there is a disk that is always full");
        Path link = Files.createSymbolicLink(folder.resolve("full.mp4"), full);
        VideoFile video = new VideoFile(link, 320, 180, 24, "", "");
        IOException failure = assertThrows(IOException.class, () -> {
            for (BufferedImage frame : InventedMotion.frames(320, 180, 8)) {
                video.add(frame);
            }
            video.finish();
        });
        assertTrue(failure.getMessage().startsWith("full.mp4 was not written: "), failure.getMessage());
        assertEquals(1, failure.getMessage().lines().count());
    }

    @Test
    void aMissingProgram_isNamed() {
        assertFalse(VideoFile.possible("ffmpeg-that-is-not-there"));
        IOException failure = assertThrows(
                IOException.class,
                () -> new VideoFile("ffmpeg-that-is-not-there", folder.resolve("a.mp4"), 320, 180, 24, "", ""));
        assertEquals(VideoFile.MISSING, failure.getMessage());
        assertTrue(failure.getMessage().contains("package ffmpeg"));
    }
}
