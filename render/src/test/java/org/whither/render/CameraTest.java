package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.Rectangle;
import java.awt.geom.Point2D;
import org.junit.jupiter.api.Test;

class CameraTest {
    private static final Rectangle WINDOW = new Rectangle(100, 50, 400, 300);

    @Test
    void plan_fromTheStator_hasXToTheRightAndYUp() {
        Camera camera = Camera.plan(0, 0, 2, Math.PI / 2, false, WINDOW);
        near(300 + 2 * 30, 200, camera.project(30, 0, 0));
        near(300, 200 - 2 * 30, camera.project(0, 30, 0));
    }

    @Test
    void plan_fromTheRotor_hasXToTheLeft() {
        Camera camera = Camera.plan(0, 0, 2, Math.PI / 2, true, WINDOW);
        near(300 - 2 * 30, 200, camera.project(30, 0, 0));
        near(300, 200 - 2 * 30, camera.project(0, 30, 0));
    }

    @Test
    void plan_turned_putsTheWantedDirectionUp() {
        double up = Math.toRadians(15);
        Camera camera = Camera.plan(59 * Math.cos(up), 59 * Math.sin(up), 10, up, false, WINDOW);
        near(300, 200, camera.project(59 * Math.cos(up), 59 * Math.sin(up), 0));
        near(300, 190, camera.project(60 * Math.cos(up), 60 * Math.sin(up), 0));
        // A little further along +θ lies to the left, seen from the stator.
        assertTrue(camera.project(60 * Math.cos(up + 0.01), 60 * Math.sin(up + 0.01), 0).x < 300);
    }

    @Test
    void perspective_followsThePinhole() {
        double[] eye = {40, -30, 20};
        double[] target = {1, 2, 3};
        Camera camera = Camera.perspective(eye, target, Math.toRadians(30), 1, 200, WINDOW);
        near(300, 200, camera.project(1, 2, 3));
        // By hand: offset to the right of the line of sight, in the plane z = const, over the distance along it.
        double dx = target[0] - eye[0];
        double dy = target[1] - eye[1];
        double dz = target[2] - eye[2];
        double flat = Math.hypot(dx, dy);
        double distance = Math.sqrt(flat * flat + dz * dz);
        double rightX = dy / flat;
        double rightY = -dx / flat;
        double pixels = 150 / Math.tan(Math.toRadians(15)) * 5 / distance;
        near(300 + pixels, 200, camera.project(1 + 5 * rightX, 2 + 5 * rightY, 3));
        assertTrue(camera.project(1, 2, 4).y < 200, "up is up");
    }

    private static void near(double x, double y, Point2D point) {
        assertEquals(x, point.getX(), 1e-6);
        assertEquals(y, point.getY(), 1e-6);
    }
}
