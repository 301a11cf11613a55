package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Point2D;
import org.whither.film.FilmGrid;

/**
 * A camera that follows gas as if towed on a rope of a given length: the gas's motion, in angle, radius and height
 * without turns taken off, is smoothed over a short time (by a Gaussian), and the eye is drawn along behind it, on a curve
 * of pursuit (a tractrix), which has no corners. So it is steady wherever the gas passes a border of a sector or the edge
 * of a groove. It is as steady as it can be while the gas stays well inside the picture.
 */
final class TowedCamera {
    /** Steps for one frame. */
    private static final int FINE = 4;

    /** Longest smoothing, and shortest (s of playing). */
    private static final double LONGEST = 0.45;

    private static final double SHORTEST = 0.06;

    /** Largest distance of the gas from where the camera looks, as a share of the length of the rope. */
    private static final double LOOSE = 0.22;

    /** Share of half the picture that the gas keeps to. */
    static final double WITHIN = 0.8;

    private static final double WIDEST = Math.toRadians(80);

    private final double[][] eye;
    private final double[][] aim;
    private double fieldOfView;
    private final double distance;

    /**
     * A camera.
     *
     * @param track the gas
     * @param clock its time
     * @param terrain what it moves over
     * @param grid grid of the film, for its two radii
     * @param distance length of the rope (mm)
     * @param window the rectangle of the picture (pixels)
     */
    TowedCamera(Track track, Clock clock, Terrain terrain, FilmGrid grid, double distance, Rectangle window) {
        this.distance = distance;
        int reach = (int) Math.ceil(3 * LONGEST * clock.rate * FINE);
        int count = (clock.frames - 1) * FINE + 1 + 2 * reach;
        // θ, r, drawn z and steady θ of the gas, from before the first frame to after the last.
        double[][] gas = new double[4][count];
        for (int n = 0; n < count; n++) {
            double playing = (double) (n - reach) / (FINE * clock.rate);
            Track.State s = track.at(Math.max(0, Math.min(clock.end, clock.gas(playing))));
            gas[0][n] = s.theta();
            gas[1][n] = 1e3 * s.radius();
            gas[2][n] = terrain.height(s.steadyTheta(), s.radius(), s.z());
            gas[3][n] = s.steadyTheta();
        }
        double spread = LONGEST;
        double[][] smooth = smooth(gas, spread * clock.rate * FINE);
        while (spread > SHORTEST && apart(gas, smooth, reach) > LOOSE * distance) {
            spread *= 0.85;
            smooth = smooth(gas, spread * clock.rate * FINE);
        }
        eye = new double[clock.frames][];
        aim = new double[clock.frames][];
        tow(smooth, reach, terrain, spread * clock.rate * FINE);
        fieldOfView = terrain.fieldOfView();
        while (fieldOfView < WIDEST && !holds(track, clock, terrain, window)) {
            fieldOfView += Math.toRadians(3);
        }
    }

    /** Each row smoothed by a Gaussian of a standard deviation in steps; beyond its ends a row goes on as it ends. */
    private static double[][] smooth(double[][] rows, double deviation) {
        int half = (int) Math.ceil(3 * deviation);
        double[] weights = new double[half + 1];
        double sum = 0;
        for (int n = 0; n <= half; n++) {
            weights[n] = Math.exp(-0.5 * n * n / (deviation * deviation));
            sum += n == 0 ? weights[n] : 2 * weights[n];
        }
        double[][] result = new double[rows.length][];
        for (int row = 0; row < rows.length; row++) {
            double[] from = rows[row];
            double[] to = new double[from.length];
            for (int n = 0; n < from.length; n++) {
                double total = weights[0] * from[n];
                for (int m = 1; m <= half; m++) {
                    total += weights[m] * (from[Math.max(0, n - m)] + from[Math.min(from.length - 1, n + m)]);
                }
                to[n] = total / sum;
            }
            result[row] = to;
        }
        return result;
    }

    private static double apart(double[][] gas, double[][] smooth, int reach) {
        double most = 0;
        for (int n = reach; n < gas[0].length - reach; n++) {
            double along = smooth[1][n] * (gas[0][n] - smooth[0][n]);
            most = Math.max(most, Math.hypot(Math.hypot(along, gas[1][n] - smooth[1][n]), gas[2][n] - smooth[2][n]));
        }
        return most;
    }

    private void tow(double[][] smooth, int reach, Terrain terrain, double deviation) {
        int count = smooth[0].length;
        double[] x = new double[count];
        double[] y = new double[count];
        for (int n = 0; n < count; n++) {
            x[n] = smooth[1][n] * Math.cos(smooth[0][n]);
            y[n] = smooth[1][n] * Math.sin(smooth[0][n]);
        }
        // At first the rope lies the way the gas is about to go, back along it.
        int ahead = 0;
        while (ahead < count - 1 && Math.hypot(x[ahead] - x[0], y[ahead] - y[0]) < 0.3 * distance) {
            ahead++;
        }
        double dx = x[ahead] - x[0];
        double dy = y[ahead] - y[0];
        double length = Math.hypot(dx, dy);
        if (length < 1e-6) {
            // Gas that hardly moves is looked at along the circle.
            dx = Math.sin(smooth[0][0]);
            dy = -Math.cos(smooth[0][0]);
            length = 1;
        }
        double[][] path = new double[3][count];
        double ex = x[0] - distance * dx / length;
        double ey = y[0] - distance * dy / length;
        for (int n = 0; n < count; n++) {
            double rx = ex - x[n];
            double ry = ey - y[n];
            double l = Math.hypot(rx, ry);
            ex = x[n] + distance * rx / l;
            ey = y[n] + distance * ry / l;
            path[0][n] = ex;
            path[1][n] = ey;
            // The film under the eye is where it was when the gas passed; its turn is that of the gas's two angles.
            double theta = Math.atan2(ey, ex) + smooth[3][n] - smooth[0][n];
            path[2][n] = terrain.eyeHeight(theta, 1e-3 * Math.hypot(ex, ey), smooth[2][n], distance);
        }
        double[] eyeHeight = smooth(new double[][] {path[2]}, Math.max(1, deviation))[0];
        for (int frame = 0; frame < eye.length; frame++) {
            int n = reach + frame * FINE;
            eye[frame] = new double[] {path[0][n], path[1][n], eyeHeight[n]};
            aim[frame] = new double[] {x[n], y[n], terrain.aimHeight(smooth[2][n], eyeHeight[n])};
        }
    }

    private boolean holds(Track track, Clock clock, Terrain terrain, Rectangle window) {
        for (int frame = 0; frame < eye.length; frame++) {
            double[] p = place(track.at(clock.time(frame)), terrain);
            Point2D.Double at = camera(frame, window).project(p[0], p[1], p[2]);
            if (Math.abs(at.x - window.getCenterX()) > WITHIN * 0.5 * window.width
                    || Math.abs(at.y - window.getCenterY()) > WITHIN * 0.5 * window.height) {
                return false;
            }
        }
        return true;
    }

    /** The drawn place of gas (mm). */
    static double[] place(Track.State s, Terrain terrain) {
        return new double[] {
            1e3 * s.radius() * Math.cos(s.theta()),
            1e3 * s.radius() * Math.sin(s.theta()),
            terrain.height(s.steadyTheta(), s.radius(), s.z())
        };
    }

    /** Length of the rope (mm). */
    double distance() {
        return distance;
    }

    /** Where the eye is in a frame; a copy (mm). */
    double[] eye(int frame) {
        return eye[frame].clone();
    }

    /** What it looks at; a copy (mm). */
    double[] aim(int frame) {
        return aim[frame].clone();
    }

    /** The view of a frame. */
    Camera camera(int frame, Rectangle window) {
        return Camera.perspective(eye[frame], aim[frame], fieldOfView, 0.02 * distance, 14 * distance + 200, window);
    }
}
