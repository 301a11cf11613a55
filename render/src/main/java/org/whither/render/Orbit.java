package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Point2D;

/** Eyes at one distance and height all round the ring, from which all of it is seen. */
final class Orbit {
    private static final double FIELD_OF_VIEW = Math.toRadians(24);

    /** Share of half the window that the ring may take. */
    private static final double SHARE = 0.97;

    private final double elevation;
    private final double radius;
    private final double low;
    private final double high;
    private final Rectangle window;
    private double distance;
    private double aim;

    /**
     * The eyes.
     *
     * @param elevation height of the eye over the plane of the faces, as seen from the middle of the ring (rad)
     * @param radius outer radius of the ring (mm)
     * @param low lowest drawn height (mm)
     * @param high highest drawn height (mm)
     * @param window where the ring is seen (pixels)
     */
    Orbit(double elevation, double radius, double low, double high, Rectangle window) {
        this.elevation = elevation;
        this.radius = radius;
        this.low = low;
        this.high = high;
        this.window = window;
        this.aim = 0.5 * (low + high);
        this.distance = 5 * radius;
        for (int round = 0; round < 30; round++) {
            Camera camera = camera(0);
            double wide = 0;
            double upper = Double.POSITIVE_INFINITY;
            double lower = Double.NEGATIVE_INFINITY;
            for (int n = 0; n < 72; n++) {
                for (double z : new double[] {low, high}) {
                    double theta = 2 * Math.PI * n / 72;
                    Point2D.Double p = camera.project(radius * Math.cos(theta), radius * Math.sin(theta), z);
                    wide = Math.max(wide, Math.abs(p.x - window.getCenterX()));
                    upper = Math.min(upper, p.y);
                    lower = Math.max(lower, p.y);
                }
            }
            double scale = 2 * distance * Math.tan(FIELD_OF_VIEW / 2) / window.height;
            aim -= (0.5 * (upper + lower) - window.getCenterY()) * scale / Math.cos(elevation) * 0.7;
            distance *= Math.max(
                    wide / (SHARE * 0.5 * window.width), 0.5 * (lower - upper) / (SHARE * 0.5 * window.height));
        }
    }

    double[] eye(double azimuth) {
        return new double[] {
            distance * Math.cos(elevation) * Math.cos(azimuth),
            distance * Math.cos(elevation) * Math.sin(azimuth),
            aim + distance * Math.sin(elevation)
        };
    }

    /** The view from an azimuth (rad). */
    Camera camera(double azimuth) {
        double near = Math.max(0.1 * distance, distance - 2 * radius);
        return Camera.perspective(
                eye(azimuth),
                new double[] {0, 0, aim},
                FIELD_OF_VIEW,
                near,
                distance + 2 * radius + high - low,
                window);
    }
}
