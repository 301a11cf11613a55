package org.whither.render;

import java.awt.geom.Point2D;
import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmGrid;

/**
 * Finds places on the open part of the rotor face, as it is seen, for the words that name it: where the words lie wholly
 * on what they name, hidden by nothing, and as clear of the paths as may be.
 */
final class FaceWords {
    /** What a place of the rotor face is. */
    enum Kind {
        /** The floor of a groove. */
        GROOVE("groove"),
        /** Between two grooves. */
        LAND("land"),
        /** The ring without grooves at which the grooves end. */
        DAM("dam");

        private final String words;

        Kind(String words) {
            this.words = words;
        }

        String words() {
            return words;
        }
    }

    /**
     * Where words stand.
     *
     * @param theta angle of their middle (rad)
     * @param radius radius of their middle (m)
     * @param x picture place of their middle (pixels)
     * @param y as x
     * @param angle by which they are turned in the picture, clockwise (rad)
     */
    record Place(double theta, double radius, double x, double y, double angle) {}

    private final FilmShape shape;
    private final GapScene gap;
    private final Camera camera;
    private final FilmGrid grid;
    private final List<Point2D> avoid;

    /**
     * A search.
     *
     * @param avoid picture places that words should keep away from (pixels)
     */
    FaceWords(FilmShape shape, GapScene gap, Camera camera, List<Point2D> avoid) {
        this.shape = shape;
        this.gap = gap;
        this.camera = camera;
        this.grid = shape.grid();
        this.avoid = new ArrayList<>(avoid);
    }

    /** What a place of the rotor face is, or null. */
    Kind kind(double theta, double r) {
        if (!shape.rotorGrooved() || r < grid.innerRadius() || r > grid.outerRadius()) {
            return null;
        }
        FilmShape.Band dam = shape.dam();
        if (dam != null && r > dam.from() && r < dam.to()) {
            return Kind.DAM;
        }
        if (gap.rotorAt(theta, r) < 0.5 * (shape.rotorLow() + shape.rotorHigh())) {
            return Kind.GROOVE;
        }
        for (FilmShape.Band band : shape.grooveBands()) {
            if (r > band.from() && r < band.to()) {
                return Kind.LAND;
            }
        }
        return null;
    }

    private Point2D.Double at(double theta, double r) {
        double[] p = gap.place(theta, r, gap.rotorAt(theta, r));
        return camera.project(p[0], p[1], p[2]);
    }

    /**
     * The best place for words of a size, or null where there is none.
     *
     * @param kind what they name
     * @param width width of the words (pixels)
     * @param height height of the words (pixels)
     */
    Place find(Kind kind, double width, double height) {
        Place best = null;
        double most = Double.NEGATIVE_INFINITY;
        double span = grid.outerRadius() - grid.innerRadius();
        for (int a = 3; a < 97; a++) {
            double theta = gap.openFrom + (gap.openTo - gap.openFrom) * a / 100;
            for (int b = 1; b < 40; b++) {
                double r = grid.innerRadius() + span * b / 40;
                if (kind(theta, r) != kind) {
                    continue;
                }
                Place place = place(theta, r);
                double worth = worth(kind, place, width, height);
                if (worth > most) {
                    most = worth;
                    best = place;
                }
            }
        }
        if (best != null) {
            // Other words keep away from these.
            for (int n = -4; n <= 4; n++) {
                double s = n / 4.0 * 0.6 * width;
                avoid.add(new Point2D.Double(
                        best.x() + s * Math.cos(best.angle()), best.y() + s * Math.sin(best.angle())));
            }
        }
        return best;
    }

    /** Words follow the circle through their place. */
    private Place place(double theta, double r) {
        Point2D.Double p = at(theta, r);
        double[] here = gap.place(theta, r, gap.datum);
        double[] next = gap.place(theta + 1e-3, r, gap.datum);
        Point2D.Double a = camera.project(here[0], here[1], here[2]);
        Point2D.Double b = camera.project(next[0], next[1], next[2]);
        double angle = Math.atan2(b.y - a.y, b.x - a.x);
        if (Math.abs(angle) > Math.PI / 2) {
            angle -= Math.signum(angle) * Math.PI;
        }
        return new Place(theta, r, p.x, p.y, angle);
    }

    /** How good a place is: how much of the words lies on what they name, then how far they are from what to avoid. */
    private double worth(Kind kind, Place place, double width, double height) {
        double theta = place.theta();
        double r = place.radius();
        double dt = 2e-3;
        double dr = 1e-3 * (grid.outerRadius() - grid.innerRadius());
        double[] p0 = gap.place(theta, r, gap.rotorAt(theta, r));
        Point2D.Double o = camera.project(p0[0], p0[1], p0[2]);
        double[] p1 = gap.place(theta + dt, r, gap.rotorAt(theta, r));
        Point2D.Double t = camera.project(p1[0], p1[1], p1[2]);
        double[] p2 = gap.place(theta, r + dr, gap.rotorAt(theta, r));
        Point2D.Double u = camera.project(p2[0], p2[1], p2[2]);
        double tx = (t.x - o.x) / dt;
        double ty = (t.y - o.y) / dt;
        double rx = (u.x - o.x) / dr;
        double ry = (u.y - o.y) / dr;
        double det = tx * ry - rx * ty;
        double cos = Math.cos(place.angle());
        double sin = Math.sin(place.angle());
        int good = 0;
        int all = 0;
        double[] eye = camera.eye();
        for (int a = -3; a <= 3; a++) {
            for (int b = -1; b <= 1; b++) {
                double along = a / 3.0 * 0.5 * width;
                double down = b * 0.5 * height;
                double px = along * cos - down * sin;
                double py = along * sin + down * cos;
                double there = theta + (px * ry - rx * py) / det;
                double radius = r + (tx * py - ty * px) / det;
                all++;
                if (kind(there, radius) == kind && there > gap.openFrom && there < gap.openTo) {
                    boolean middle = a == 0 && b == 0;
                    boolean seen = !gap.hidden(gap.place(there, radius, gap.rotorAt(there, radius)), eye);
                    good += seen ? 1 : 0;
                    if (middle && !seen) {
                        return Double.NEGATIVE_INFINITY;
                    }
                }
            }
        }
        if (good < 0.5 * all) {
            return Double.NEGATIVE_INFINITY;
        }
        double clear = Double.POSITIVE_INFINITY;
        for (Point2D point : avoid) {
            double px = point.getX() - place.x();
            double py = point.getY() - place.y();
            double along = Math.abs(px * cos + py * sin);
            double down = Math.abs(py * cos - px * sin);
            clear = Math.min(clear, Math.hypot(Math.max(0, along - 0.5 * width), Math.max(0, down - 0.5 * height)));
        }
        return 2.0 * good / all + 2 * Math.min(1, clear / height);
    }
}
