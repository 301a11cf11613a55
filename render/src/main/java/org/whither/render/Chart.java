package org.whither.render;

import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.util.List;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;

/**
 * How the face lies in a window of a plan: as a ring, or unrolled, with the angle along and the radius up, both to the same
 * scale at the middle radius.
 */
final class Chart {
    private final Camera camera;
    private final boolean unrolled;
    private final double middle;
    private final double meanRadius;

    private Chart(Camera camera, boolean unrolled, double middle, double meanRadius) {
        this.camera = camera;
        this.unrolled = unrolled;
        this.middle = middle;
        this.meanRadius = meanRadius;
    }

    /** A ring, as the camera sees it. */
    static Chart ring(Camera camera) {
        return new Chart(camera, false, 0, 1);
    }

    /**
     * Unrolled.
     *
     * @param camera sees x = 0 at the middle of its window, y = radius in mm
     * @param middle the angle at x = 0 (rad)
     * @param meanRadius radius at which lengths round the shaft are true (m)
     */
    static Chart unrolled(Camera camera, double middle, double meanRadius) {
        return new Chart(camera, true, middle, meanRadius);
    }

    boolean isUnrolled() {
        return unrolled;
    }

    Camera camera() {
        return camera;
    }

    /** Place of a point in the scene, before the camera: x (mm). */
    double x(double theta, double r) {
        return unrolled ? -1e3 * meanRadius * (theta - middle) : 1e3 * r * Math.cos(theta);
    }

    /** As x. */
    double y(double theta, double r) {
        return unrolled ? 1e3 * r : 1e3 * r * Math.sin(theta);
    }

    /** A mesh of one sector in its place, turned or moved on by so many sectors of a pitch (rad). */
    Scene.Item item(Mesh mesh, Scene.Material material, int sector, double pitch) {
        return unrolled
                ? new Scene.Item(mesh, material, 0).at(-1e3 * meanRadius * sector * pitch, 0, 0)
                : new Scene.Item(mesh, material, sector * pitch);
    }

    /** Where a point of the face appears in the picture (pixels). */
    Point2D.Double at(double theta, double r) {
        return camera.project(x(theta, r), y(theta, r), 0);
    }

    /** How far a path is turned, by whole sectors, so that it starts near the middle of an unrolled view (rad). */
    double shift(Path path, FilmGrid grid) {
        if (!unrolled || path.points().isEmpty()) {
            return 0;
        }
        double first = path.points().get(0).steadyTheta();
        return Math.rint((middle - first) / grid.pitch()) * grid.pitch();
    }

    /** Adds straight pieces of outlines, turned by an angle (rad), to a path. */
    void add(Path2D.Double path, List<FilmShape.Edge> edges, double turn) {
        for (FilmShape.Edge edge : edges) {
            double span = edge.theta1() - edge.theta0();
            int parts = Math.max(1, (int) Math.ceil(Math.abs(span) / Math.toRadians(1)));
            Point2D a = at(edge.theta0() + turn, edge.r0());
            path.moveTo(a.getX(), a.getY());
            for (int n = 1; n <= parts; n++) {
                double f = (double) n / parts;
                Point2D b = at(edge.theta0() + f * span + turn, edge.r0() + f * (edge.r1() - edge.r0()));
                path.lineTo(b.getX(), b.getY());
            }
        }
    }

    /** A closed patch of the face between two radii and two angles. */
    Path2D.Double patch(double theta0, double theta1, double r0, double r1) {
        int parts = Math.max(1, (int) Math.ceil(Math.abs(theta1 - theta0) / Math.toRadians(0.5)));
        Path2D.Double path = new Path2D.Double();
        for (int n = 0; n <= 2 * parts + 1; n++) {
            double f = n <= parts ? (double) n / parts : (2 * parts + 1.0 - n) / parts;
            Point2D p = at(theta0 + f * (theta1 - theta0), n <= parts ? r0 : r1);
            if (n == 0) {
                path.moveTo(p.getX(), p.getY());
            } else {
                path.lineTo(p.getX(), p.getY());
            }
        }
        path.closePath();
        return path;
    }

    /** All round the ring between two radii; its edges are circles, and a seam that is not to be drawn. */
    Path2D.Double band(double r0, double r1) {
        return patch(middle - Math.PI, middle + Math.PI, r0, r1);
    }

    /** The circle of a radius; unrolled, the whole of it as a straight line. */
    Path2D.Double circle(double radius) {
        Path2D.Double path = new Path2D.Double();
        for (int n = 0; n <= 720; n++) {
            Point2D p = at(middle + Math.toRadians(0.5 * n - 180), radius);
            if (n == 0) {
                path.moveTo(p.getX(), p.getY());
            } else {
                path.lineTo(p.getX(), p.getY());
            }
        }
        return path;
    }
}
