package org.whither.io.motion;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.awt.Graphics2D;
import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import javax.imageio.ImageIO;
import javax.imageio.ImageReader;
import javax.imageio.metadata.IIOMetadataNode;
import javax.imageio.stream.ImageInputStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** Checked by reading the files back with javax.imageio. */
class GifFileTest {
    @TempDir
    private Path folder;

    private Path write(List<BufferedImage> frames, double rate) throws IOException {
        Path file = folder.resolve("motion.gif");
        BufferedImage first = frames.get(0);
        GifFile gif = new GifFile(
                file,
                first.getWidth(),
                first.getHeight(),
                rate,
                "An invented animation, 4 µm",
                InventedMotion.exact(),
                frames);
        for (BufferedImage frame : frames) {
            gif.add(frame);
        }
        gif.finish();
        return file;
    }

    /** The frames as a player shows them, and how long each stays (hundredths of a second). */
    private static List<BufferedImage> read(Path file, List<Integer> delays) throws IOException {
        List<BufferedImage> shown = new ArrayList<>();
        ImageReader reader = ImageIO.getImageReadersByFormatName("gif").next();
        try (ImageInputStream in = ImageIO.createImageInputStream(file.toFile())) {
            reader.setInput(in);
            BufferedImage canvas = null;
            for (int n = 0; n < reader.getNumImages(true); n++) {
                BufferedImage part = reader.read(n);
                IIOMetadataNode root =
                        (IIOMetadataNode) reader.getImageMetadata(n).getAsTree("javax_imageio_gif_image_1.0");
                IIOMetadataNode place = (IIOMetadataNode)
                        root.getElementsByTagName("ImageDescriptor").item(0);
                IIOMetadataNode control = (IIOMetadataNode)
                        root.getElementsByTagName("GraphicControlExtension").item(0);
                assertEquals(0, root.getElementsByTagName("LocalColorTable").getLength(), "one palette for all");
                delays.add(Integer.parseInt(control.getAttribute("delayTime")));
                if (canvas == null) {
                    canvas = new BufferedImage(part.getWidth(), part.getHeight(), BufferedImage.TYPE_INT_RGB);
                    assertEquals(
                            1,
                            root.getElementsByTagName("ApplicationExtension").getLength(),
                            "it runs again and again");
                } else {
                    assertEquals("doNotDispose", control.getAttribute("disposalMethod"));
                }
                Graphics2D pen = canvas.createGraphics();
                pen.drawImage(
                        part,
                        Integer.parseInt(place.getAttribute("imageLeftPosition")),
                        Integer.parseInt(place.getAttribute("imageTopPosition")),
                        null);
                pen.dispose();
                BufferedImage copy = new BufferedImage(canvas.getWidth(), canvas.getHeight(), canvas.getType());
                copy.setData(canvas.getData());
                shown.add(copy);
            }
        } finally {
            reader.dispose();
        }
        return shown;
    }

    @Test
    void coloursThatMatter_areExact_andTheBarCanBeReadBack() throws IOException {
        List<BufferedImage> frames = InventedMotion.frames(320, 180, 9);
        List<BufferedImage> shown = read(write(frames, 10), new ArrayList<>());
        assertEquals(frames.size(), shown.size());
        for (int n = 0; n < shown.size(); n++) {
            BufferedImage image = shown.get(n);
            assertEquals(InventedMotion.PAPER, image.getRGB(5, 5) & 0xffffff);
            for (int p = 0; p < InventedMotion.PATCHES.length; p++) {
                for (int x = 0; x < 24; x++) {
                    assertEquals(
                            InventedMotion.PATCHES[p],
                            image.getRGB(40 + 40 * p + x, InventedMotion.PATCH_Y + x % 16) & 0xffffff);
                }
            }
            // Seen from a little way off, squares of the bar have its colours; no pixel is far from its own. Measured:
            // 1.5 and 9.
            for (int x = InventedMotion.BAR_X; x + 8 <= InventedMotion.BAR_X + InventedMotion.BAR_WIDTH; x += 8) {
                double apart = InventedMotion.meansApart(frames.get(n), image, x, InventedMotion.BAR_Y, 8);
                assertTrue(apart < 3, "the bar at " + x + " is " + apart + " off in the mean");
            }
            for (int x = InventedMotion.BAR_X; x < InventedMotion.BAR_X + InventedMotion.BAR_WIDTH; x++) {
                int apart = InventedMotion.apart(
                        frames.get(n).getRGB(x, InventedMotion.BAR_Y + n), image.getRGB(x, InventedMotion.BAR_Y + n));
                assertTrue(apart <= 14, "a pixel of the bar at " + x + " is " + apart + " off");
            }
        }
    }

    @Test
    void whatStandsStill_doesNotCrawl_andWhatMovesIsShown() throws IOException {
        List<BufferedImage> frames = InventedMotion.frames(320, 180, 7);
        List<BufferedImage> shown = read(write(frames, 25), new ArrayList<>());
        for (int n = 1; n < shown.size(); n++) {
            for (int y = 0; y < 180; y++) {
                for (int x = 0; x < 320; x++) {
                    if (frames.get(n).getRGB(x, y) == frames.get(0).getRGB(x, y)) {
                        assertEquals(shown.get(0).getRGB(x, y), shown.get(n).getRGB(x, y), x + ", " + y);
                    }
                }
            }
            for (int y = 20; y < 100; y += 4) {
                for (int x = 0; x < 320; x += 4) {
                    double apart = InventedMotion.meansApart(frames.get(n), shown.get(n), x, y, 4);
                    assertTrue(apart < 12, "frame " + n + " at " + x + ", " + y + " is " + apart + " off");
                }
            }
        }
    }

    @Test
    void delays_addUpToTheLength() throws IOException {
        for (double rate : new double[] {7, 24, 30, 50}) {
            List<Integer> delays = new ArrayList<>();
            List<BufferedImage> frames = InventedMotion.frames(64, 48, 45);
            assertEquals(45, read(write(frames, rate), delays).size());
            int sum = delays.stream().mapToInt(Integer::intValue).sum();
            assertEquals(Math.round(100 * 45 / rate), sum);
            delays.forEach(delay -> assertTrue(Math.abs(delay - 100 / rate) < 1, delay + " at " + rate));
        }
    }

    @Test
    void onlyWhatChanges_isWritten() throws IOException {
        BufferedImage still = InventedMotion.frame(320, 180, 0.5);
        long one = Files.size(write(List.of(still), 10));
        long twenty = Files.size(write(java.util.Collections.nCopies(20, still), 10));
        assertTrue(twenty - one < 19 * 60, "nineteen frames without a change took " + (twenty - one) + " bytes");
        byte[] bytes = Files.readAllBytes(folder.resolve("motion.gif"));
        assertTrue(new String(bytes, StandardCharsets.UTF_8).contains("An invented animation, 4 µm"));
    }

    @Test
    void fullDisk_isOneSentence() throws IOException {
        Path full = Path.of("/dev/full");
        assumeTrue(Files.exists(full), "there is a disk that is always full");
        Path link = Files.createSymbolicLink(folder.resolve("full.gif"), full);
        List<BufferedImage> frames = InventedMotion.frames(320, 180, 3);
        IOException failure = assertThrows(IOException.class, () -> {
            GifFile gif = new GifFile(link, 320, 180, 10, "", List.of(), frames);
            for (int n = 0; n < 200; n++) {
                gif.add(frames.get(n % 3));
            }
            gif.finish();
        });
        assertEquals(
                "full.gif cannot be written: No space left on device; free space on the disk or name another folder",
                failure.getMessage());
    }
}
