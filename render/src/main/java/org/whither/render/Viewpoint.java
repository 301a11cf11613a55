package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.List;

/**
 * From which direction a scene is looked at; how far away the eye is follows from what must be seen.
 *
 * @param azimuth direction from the scene towards the eye, in the plane of the faces; what it is measured from is said by
 *     the view (rad)
 * @param elevation height of the eye above that plane (rad)
 * @param fieldOfView angle of view from the lower to the upper edge of the window (rad)
 */
public record Viewpoint(double azimuth, double elevation, double fieldOfView) {
    /** Checks the angles. */
    public Viewpoint {
        if (!Double.isFinite(azimuth)) {
            throw new IllegalArgumentException("azimuth of the camera is " + azimuth + "; expected a finite angle");
        }
        if (!(elevation > 0 && elevation < Math.PI / 2)) {
            throw new IllegalArgumentException("elevation of the camera is " + Math.toDegrees(elevation)
                    + "°; expected more than 0° and less than 90°");
        }
        if (!(fieldOfView > Math.toRadians(1) && fieldOfView < Math.toRadians(120))) {
            throw new IllegalArgumentException("field of view of the camera is " + Math.toDegrees(fieldOfView)
                    + "°; expected more than 1° and less than 120°");
        }
    }

    /** The same from another direction in the plane of the faces (rad). */
    Viewpoint turned(double newAzimuth) {
        return new Viewpoint(newAzimuth, elevation, fieldOfView);
    }

    /**
     * The camera that sees some points as large as may be.
     *
     * @param extent the points that must be seen; x, y, z
     * @param window the rectangle of the picture (pixels)
     * @param room the part of the window that they may take (pixels)
     */
    Camera fit(List<double[]> extent, Rectangle window, Rectangle2D room) {
        double[] away = {
            Math.cos(elevation) * Math.cos(azimuth), Math.cos(elevation) * Math.sin(azimuth), Math.sin(elevation)
        };
        double[] right = {-Math.sin(azimuth), Math.cos(azimuth), 0};
        double[] up = {
            -Math.sin(elevation) * Math.cos(azimuth), -Math.sin(elevation) * Math.sin(azimuth), Math.cos(elevation)
        };
        double[] target = new double[3];
        for (double[] point : extent) {
            for (int c = 0; c < 3; c++) {
                target[c] += point[c] / extent.size();
            }
        }
        double size = 0;
        for (double[] point : extent) {
            size = Math.max(
                    size, Math.hypot(Math.hypot(point[0] - target[0], point[1] - target[1]), point[2] - target[2]));
        }
        double distance = 4 * size;
        Camera camera = null;
        for (int round = 0; round < 40; round++) {
            double[] eye = new double[3];
            for (int c = 0; c < 3; c++) {
                eye[c] = target[c] + distance * away[c];
            }
            camera = Camera.perspective(
                    eye,
                    target,
                    fieldOfView,
                    Math.max(0.02 * distance, distance - 2.5 * size),
                    distance + 2.5 * size,
                    window);
            Rectangle2D seen = null;
            for (double[] point : extent) {
                Point2D p = camera.project(point[0], point[1], point[2]);
                if (seen == null) {
                    seen = new Rectangle2D.Double(p.getX(), p.getY(), 0, 0);
                } else {
                    seen.add(p);
                }
            }
            double scale = 2 * distance * Math.tan(fieldOfView / 2) / window.height;
            double dx = (seen.getCenterX() - room.getCenterX()) * scale;
            double dy = (room.getCenterY() - seen.getCenterY()) * scale;
            for (int c = 0; c < 3; c++) {
                target[c] += dx * right[c] + dy * up[c];
            }
            distance *= Math.max(seen.getWidth() / room.getWidth(), seen.getHeight() / room.getHeight());
        }
        return camera;
    }
}
