package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.Rectangle;
import java.awt.image.BufferedImage;
import java.lang.management.BufferPoolMXBean;
import java.lang.management.ManagementFactory;
import java.util.List;
import org.junit.jupiter.api.Test;

/** Many pictures of one scene by one canvas: things in their places, and nothing that grows. */
class ManyPicturesTest {
    private static final Rectangle WINDOW = new Rectangle(0, 0, 64, 48);

    /** One pixel for one unit; the middle of the window at the origin, x to the right, y up. */
    private static final Camera CAMERA = Camera.plan(0, 0, 1, Math.PI / 2, false, WINDOW);

    private static final Scene.Light LIGHT = Scene.Light.from(0.3, 0.2, 1);

    /** Two squares side by side, the left one from −4 to 0, the right one from 0 to 4, of two triangles each. */
    private static Mesh twoSquares() {
        MeshBuilder mesh = new MeshBuilder();
        for (int n = 0; n < 2; n++) {
            double x = n == 0 ? -4 : 0;
            mesh.quad(
                    mesh.vertex(x, -2, 0, 0, 0, 1, 0),
                    mesh.vertex(x + 4, -2, 0, 0, 0, 1, 0),
                    mesh.vertex(x + 4, 2, 0, 0, 0, 1, 0),
                    mesh.vertex(x, 2, 0, 0, 0, 1, 0));
        }
        return mesh.build();
    }

    private static boolean[][] drawn(Canvas canvas, Scene.Item item) {
        BufferedImage image = canvas.draw(0, List.of(new Canvas.View(new Scene(List.of(item), LIGHT), CAMERA)));
        boolean[][] result = new boolean[48][64];
        for (int y = 0; y < 48; y++) {
            for (int x = 0; x < 64; x++) {
                result[y][x] = (image.getRGB(x, y) & 0xffffff) == 0xffffff;
            }
        }
        return result;
    }

    private static void assertFilled(boolean[][] drawn, double x0, double x1, double y0, double y1) {
        for (int y = 0; y < 48; y++) {
            for (int x = 0; x < 64; x++) {
                double px = x + 0.5 - 32;
                double py = 24 - (y + 0.5);
                assertEquals(px > x0 && px < x1 && py > y0 && py < y1, drawn[y][x], px + ", " + py);
            }
        }
    }

    @Test
    void item_isTurnedThenMoved_andDrawnInPart() {
        try (Canvas canvas = new Canvas(64, 48)) {
            Scene.Item item = new Scene.Item(twoSquares(), Scene.Material.plain(0xffffff, 1), 0);
            assertFilled(drawn(canvas, item), -4, 4, -2, 2);
            assertFilled(drawn(canvas, item.at(10, -7, 0)), 6, 14, -9, -5);
            // A quarter turn carries +x to +y.
            assertFilled(drawn(canvas, item.turned(Math.PI / 2).at(10, -7, 0)), 8, 12, -11, -3);
            assertFilled(drawn(canvas, item.part(2, 4)), 0, 4, -2, 2);
            assertFilled(drawn(canvas, item.part(0, 2).at(5, 0, 0)), 1, 5, -2, 2);
            assertFilled(drawn(canvas, item.part(2, 2)), 0, 0, 0, 0);
            // Partly in the window, and beyond it.
            assertFilled(drawn(canvas, item.at(-32, 0, 0)), -32, -28, -2, 2);
            assertFilled(drawn(canvas, item.at(0, 100, 0)), 0, 0, 0, 0);
            assertEquals(5, held(List.of(item, item)) - held(List.of()), "a vertex array and four buffers");
        }
    }

    private static int held(List<Scene.Item> items) {
        try (Canvas canvas = new Canvas(64, 48)) {
            canvas.draw(0, List.of(new Canvas.View(new Scene(items, LIGHT), CAMERA)));
            return canvas.held();
        }
    }

    @Test
    void fiveHundredPictures_holdNoMoreThanOne() {
        MeshBuilder plate = new MeshBuilder();
        plate.quad(
                plate.vertex(-20, -20, 0, 0, 0, 1, 1),
                plate.vertex(20, -20, 0, 0, 0, 1, 1),
                plate.vertex(20, 20, 0, 0, 0, 1, 1),
                plate.vertex(-20, 20, 0, 0, 0, 1, 1));
        MeshBuilder ball = new MeshBuilder();
        Tubes.ball(ball, 0, 0, 0, 2, 1);
        Scene.Item floor = new Scene.Item(plate.build(), Scene.Material.solid(0x808080, 0), 0);
        Scene.Item marker = new Scene.Item(ball.build(), Scene.Material.solid(0xffffff, 0.2), 0);
        try (Canvas canvas = new Canvas(64, 48)) {
            int held = 0;
            long direct = 0;
            for (int n = 0; n < 500; n++) {
                double turn = 0.01 * n;
                Scene scene = new Scene(
                        List.of(floor.turned(turn), marker.at(10 * Math.cos(turn), 10 * Math.sin(turn), 5)), LIGHT);
                canvas.draw(0, List.of(new Canvas.View(scene, CAMERA)));
                if (n == 0) {
                    held = canvas.held();
                    direct = directMemory();
                    assertTrue(held > 10, held + " things of OpenGL after a picture");
                }
            }
            assertEquals(held, canvas.held());
            assertEquals(direct, directMemory());
        }
    }

    /** Memory outside of Java's heap that is held for buffers (bytes). */
    private static long directMemory() {
        return ManagementFactory.getPlatformMXBeans(BufferPoolMXBean.class).stream()
                .filter(pool -> pool.getName().equals("direct"))
                .mapToLong(BufferPoolMXBean::getMemoryUsed)
                .sum();
    }
}
