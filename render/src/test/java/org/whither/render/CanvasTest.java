package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.awt.Rectangle;
import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.TimeUnit;
import org.junit.jupiter.api.Test;
import org.whither.film.Frame;

class CanvasTest {
    private static final PictureSettings SMALL =
            PictureSettings.standard("Invented face").sized(640, 360);

    private static Canvas.View square(int colour) {
        MeshBuilder mesh = new MeshBuilder();
        mesh.quad(
                mesh.vertex(-1, -1, 0, 0, 0, 1, 0),
                mesh.vertex(1, -1, 0, 0, 0, 1, 0),
                mesh.vertex(1, 1, 0, 0, 0, 1, 0),
                mesh.vertex(-1, 1, 0, 0, 0, 1, 0));
        Scene scene = new Scene(
                List.of(new Scene.Item(mesh.build(), Scene.Material.plain(colour, 1), 0)), Scene.Light.from(0, 0, 1));
        return new Canvas.View(scene, Camera.plan(0, 0, 10, Math.PI / 2, false, new Rectangle(0, 0, 64, 48)));
    }

    @Test
    void draw_placesASquareToThePixel() {
        try (Canvas canvas = new Canvas(64, 48)) {
            BufferedImage image = canvas.draw(0x102030, List.of(square(0xd04020)));
            for (int y = 0; y < 48; y++) {
                for (int x = 0; x < 64; x++) {
                    boolean in = x >= 22 && x < 42 && y >= 14 && y < 34;
                    assertEquals(in ? 0xd04020 : 0x102030, image.getRGB(x, y) & 0xffffff, x + ", " + y);
                }
            }
        }
    }

    @Test
    void tiles_makeTheSamePicture() {
        SpiralFilm film = new SpiralFilm();
        ReliefScene relief =
                Relief.layout(film, List.of(), ReliefSettings.ring(SMALL)).scene();
        Scene scene = new Scene(relief.surface(), Relief.light(-1));
        Rectangle window = new Rectangle(20, 10, 300, 200);
        Camera camera = ReliefSettings.RING_CAMERA.fit(relief.extent(), window, window);
        BufferedImage whole;
        BufferedImage tiled;
        try (Canvas canvas = new Canvas(333, 222)) {
            whole = canvas.draw(0x808080, List.of(new Canvas.View(scene, camera), square(0xd04020)));
        }
        try (Canvas canvas = new Canvas(333, 222, 100)) {
            tiled = canvas.draw(0x808080, List.of(new Canvas.View(scene, camera), square(0xd04020)));
        }
        int different = 0;
        for (int y = 0; y < 222; y++) {
            for (int x = 0; x < 333; x++) {
                different +=
                        PlanTest.distance(whole.getRGB(x, y) & 0xffffff, tiled.getRGB(x, y) & 0xffffff) > 24 ? 1 : 0;
            }
        }
        // Along slanted edges a sample may fall on the other side of a triangle.
        assertTrue(different < 0.002 * 333 * 222, different + " pixels differ");
    }

    @Test
    void picture_beyondTheMemory_isRefusedInASentence() {
        IllegalArgumentException refusal = org.junit.jupiter.api.Assertions.assertThrows(
                IllegalArgumentException.class,
                () -> SMALL.sized(90_000, 60_000).checkMemory());
        assertTrue(refusal.getMessage().contains("90000 × 60000 pixels needs"), refusal.getMessage());
        assertTrue(refusal.getMessage().contains("choose a smaller size"), refusal.getMessage());
    }

    @Test
    void edges_areSmoothed() {
        try (Canvas canvas = new Canvas(64, 48)) {
            Canvas.View view = square(0xffffff);
            Scene.Item item = view.scene().items().get(0);
            Scene turned = new Scene(
                    List.of(new Scene.Item(item.mesh(), item.material(), 0.3)),
                    view.scene().light());
            BufferedImage image = canvas.draw(0, List.of(new Canvas.View(turned, view.camera())));
            int between = 0;
            for (int y = 0; y < 48; y++) {
                for (int x = 0; x < 64; x++) {
                    int grey = image.getRGB(x, y) & 0xff;
                    between += grey > 20 && grey < 235 ? 1 : 0;
                }
            }
            assertTrue(between > 30, between + " pixels between black and white along a slanted edge");
        }
    }

    @Test
    void canvases_workOneAfterAnotherAndSideBySide() {
        try (Canvas first = new Canvas(64, 48)) {
            first.draw(0, List.of(square(0xff0000)));
            try (Canvas second = new Canvas(64, 48)) {
                assertEquals(0x00ff00, second.draw(0, List.of(square(0x00ff00))).getRGB(32, 24) & 0xffffff);
            }
            assertEquals(0x0000ff, first.draw(0, List.of(square(0x0000ff))).getRGB(32, 24) & 0xffffff);
        }
        Canvas third = new Canvas(64, 48);
        third.close();
        third.close();
    }

    @Test
    void morePictures_doNotGrowTheProcess() throws IOException, InterruptedException {
        assumeTrue(Files.exists(STATUS), "resident memory can be read");
        // A heap of fixed size, all of it touched: what grows is not Java's.
        List<String> lines = child(Eighty.class, List.of("-Xms96m", "-Xmx96m", "-XX:+AlwaysPreTouch"), "DISPLAY", "");
        long growth = Long.parseLong(lines.get(lines.size() - 1));
        // Measured: 1 MB over two hundred pictures; with contexts left open, 32 MB a picture.
        assertTrue(growth < 10_000, "resident memory grew by " + growth + " kB or more over each 20 pictures");
    }

    private static final java.nio.file.Path STATUS = java.nio.file.Path.of("/proc/self/status");

    /**
     * Draws twenty pictures, then three times twenty more, and prints by how many kB the process grew at least over each
     * of these: what is lost is lost in each, what the compiler of the virtual machine still takes is not.
     */
    static final class Eighty {
        private Eighty() {}

        public static void main(String[] arguments) throws IOException {
            SpiralFilm film = new SpiralFilm();
            var paths = film.paths(Frame.ROTATING).subList(0, 2);
            long before = 0;
            long least = Long.MAX_VALUE;
            for (int n = 0; n < 80; n++) {
                if (n % 5 != 0) {
                    Plan.draw(film, List.of(), paths, SMALL);
                } else {
                    Gap.draw(film, paths, new GapSettings(SMALL, 1000));
                }
                if (n % 20 == 19) {
                    long now = resident();
                    least = n > 20 ? Math.min(least, now - before) : least;
                    before = now;
                }
            }
            System.out.println(least);
        }

        private static long resident() throws IOException {
            System.gc();
            return Files.readAllLines(STATUS).stream()
                    .filter(line -> line.startsWith("VmRSS:"))
                    .mapToLong(line -> Long.parseLong(line.replaceAll("\\D", "")))
                    .findFirst()
                    .orElseThrow();
        }
    }

    /** Draws twice in a process of its own and says what came of it. */
    static final class Child {
        private Child() {}

        public static void main(String[] arguments) {
            for (int n = 0; n < 2; n++) {
                try {
                    Plan.draw(new SpiralFilm(), List.of(), List.of(), SMALL);
                    System.out.println("drawn");
                } catch (NoOpenGL refusal) {
                    System.out.println(refusal.getMessage());
                }
            }
        }
    }

    private static List<String> child(Class<?> program, List<String> options, String variable, String value)
            throws IOException, InterruptedException {
        List<String> command = new ArrayList<>();
        command.add(java.nio.file.Path.of(System.getProperty("java.home"), "bin", "java")
                .toString());
        command.addAll(options);
        command.add("-cp");
        command.add(System.getProperty("surefire.test.class.path", System.getProperty("java.class.path")));
        command.add(program.getName());
        ProcessBuilder builder = new ProcessBuilder(command).redirectErrorStream(true);
        builder.environment().put(variable, value);
        Process process = builder.start();
        String output = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertTrue(process.waitFor(60, TimeUnit.SECONDS));
        assertEquals(0, process.exitValue(), output);
        return output.lines().toList();
    }

    @Test
    void aFreshProcess_drawsTwiceAndPrintsNothingElse() throws IOException, InterruptedException {
        // A display that does not exist must not matter.
        assertEquals(List.of("drawn", "drawn"), child(Child.class, List.of(), "DISPLAY", ":987"));
    }

    @Test
    void withoutADriver_bothTriesSayWhatToInstall() throws IOException, InterruptedException {
        // Mesa's EGL is found through this list: an empty one is a machine without it.
        List<String> lines = child(Child.class, List.of(), "__EGL_VENDOR_LIBRARY_FILENAMES", "/nowhere/none.json");
        assertEquals(List.of(NoOpenGL.SENTENCE, NoOpenGL.SENTENCE), lines);
        for (String name : List.of("libegl1", "libgl1", "libgles2", "libxrender1", "libfreetype6", "fontconfig")) {
            assertTrue(lines.get(0).contains(name));
        }
    }
}
