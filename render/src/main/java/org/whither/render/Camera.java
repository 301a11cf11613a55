package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Point2D;

/**
 * How a scene falls on a rectangle of the picture. Matrices are 4 × 4, column-major, and act on column vectors; picture
 * coordinates are in pixels from the upper left corner, y downwards.
 */
final class Camera {
    private final double[] matrix;
    private final double[] eye;
    private final Rectangle window;

    private Camera(double[] matrix, double[] eye, Rectangle window) {
        this.matrix = matrix;
        this.eye = eye;
        this.window = new Rectangle(window);
    }

    /**
     * A parallel view along the shaft, true to shape.
     *
     * @param x point of the scene at the middle of the window
     * @param y as x
     * @param scale pixels for one unit of the scene
     * @param up direction in the (x, y) plane that points up in the picture (rad)
     * @param mirrored false when looking against +z, true when looking along +z
     * @param window the rectangle of the picture (pixels)
     */
    static Camera plan(double x, double y, double scale, double up, boolean mirrored, Rectangle window) {
        double ux = Math.cos(up);
        double uy = Math.sin(up);
        // Looking against +z, right is up turned clockwise; looking along +z it is the opposite.
        double side = mirrored ? -1 : 1;
        double rx = side * uy;
        double ry = -side * ux;
        double a = 2 * scale / window.width;
        double b = 2 * scale / window.height;
        double depth = side * 1e-4;
        double[] m = {
            a * rx,
            b * ux,
            0,
            0, //
            a * ry,
            b * uy,
            0,
            0, //
            0,
            0,
            -depth,
            0, //
            -a * (rx * x + ry * y),
            -b * (ux * x + uy * y),
            0,
            1
        };
        double[] eye = {x, y, side * 1e6};
        return new Camera(m, eye, window);
    }

    /**
     * A perspective view.
     *
     * @param eye where the eye is; length 3
     * @param target what it looks at; length 3
     * @param fieldOfView angle of view from the lower to the upper edge of the window (rad)
     * @param near distance of the nearest visible plane
     * @param far distance of the farthest visible plane
     * @param window the rectangle of the picture (pixels)
     */
    static Camera perspective(
            double[] eye, double[] target, double fieldOfView, double near, double far, Rectangle window) {
        double[] f = unit(target[0] - eye[0], target[1] - eye[1], target[2] - eye[2]);
        double[] s = unit(f[1], -f[0], 0);
        double[] u = {s[1] * f[2] - s[2] * f[1], s[2] * f[0] - s[0] * f[2], s[0] * f[1] - s[1] * f[0]};
        double g = 1 / Math.tan(fieldOfView / 2);
        double aspect = (double) window.width / window.height;
        double[] rows = new double[12];
        for (int c = 0; c < 3; c++) {
            rows[c] = s[c];
            rows[4 + c] = u[c];
            rows[8 + c] = -f[c];
        }
        for (int row = 0; row < 3; row++) {
            rows[4 * row + 3] = -(rows[4 * row] * eye[0] + rows[4 * row + 1] * eye[1] + rows[4 * row + 2] * eye[2]);
        }
        double k = -(far + near) / (far - near);
        double t = -2 * far * near / (far - near);
        double[] m = new double[16];
        for (int c = 0; c < 4; c++) {
            m[4 * c] = g / aspect * rows[c];
            m[4 * c + 1] = g * rows[4 + c];
            m[4 * c + 2] = k * rows[8 + c] + (c == 3 ? t : 0);
            m[4 * c + 3] = -rows[8 + c];
        }
        return new Camera(m, eye.clone(), window);
    }

    /** A parallel view from a distant light, whose window is the square from −1 to 1 and whose depth is −1 … 1. */
    static double[] lightMatrix(Scene.Light light, double[] low, double[] high) {
        double[] n = {light.x(), light.y(), light.z()};
        double[] a = Math.abs(n[2]) < 0.9 ? unit(n[1], -n[0], 0) : unit(0, n[2], -n[1]);
        double[] b = {n[1] * a[2] - n[2] * a[1], n[2] * a[0] - n[0] * a[2], n[0] * a[1] - n[1] * a[0]};
        double[][] axes = {a, b, {-n[0], -n[1], -n[2]}};
        double[] m = new double[16];
        m[15] = 1;
        for (int row = 0; row < 3; row++) {
            double least = Double.POSITIVE_INFINITY;
            double most = Double.NEGATIVE_INFINITY;
            for (int corner = 0; corner < 8; corner++) {
                double d = 0;
                for (int c = 0; c < 3; c++) {
                    d += axes[row][c] * ((corner >> c & 1) == 0 ? low[c] : high[c]);
                }
                least = Math.min(least, d);
                most = Math.max(most, d);
            }
            double half = Math.max(1e-9, 0.51 * (most - least));
            for (int c = 0; c < 3; c++) {
                m[4 * c + row] = axes[row][c] / half;
            }
            m[12 + row] = -0.5 * (least + most) / half;
        }
        return m;
    }

    private static double[] unit(double x, double y, double z) {
        double length = Math.sqrt(x * x + y * y + z * z);
        return new double[] {x / length, y / length, z / length};
    }

    /** From the scene to the cube −1 … 1; column-major; a copy. */
    double[] matrix() {
        return matrix.clone();
    }

    /** From the scene to the cube −1 … 1 of a part of the window alone; column-major. */
    double[] matrixOfPart(Rectangle part) {
        double sx = (double) window.width / part.width;
        double sy = (double) window.height / part.height;
        double tx = (2 * (window.getCenterX() - part.getCenterX())) / part.width;
        double ty = (2 * (part.getCenterY() - window.getCenterY())) / part.height;
        double[] m = matrix.clone();
        for (int c = 0; c < 16; c += 4) {
            m[c] = sx * matrix[c] + tx * matrix[c + 3];
            m[c + 1] = sy * matrix[c + 1] + ty * matrix[c + 3];
        }
        return m;
    }

    /** Where the eye is; a copy. */
    double[] eye() {
        return eye.clone();
    }

    /** The rectangle of the picture; a copy. */
    Rectangle window() {
        return new Rectangle(window);
    }

    /** Where a point of the scene appears in the picture (pixels, fractions included). */
    Point2D.Double project(double x, double y, double z) {
        double[] m = matrix;
        double w = m[3] * x + m[7] * y + m[11] * z + m[15];
        double px = (m[0] * x + m[4] * y + m[8] * z + m[12]) / w;
        double py = (m[1] * x + m[5] * y + m[9] * z + m[13]) / w;
        return new Point2D.Double(window.x + 0.5 * (1 + px) * window.width, window.y + 0.5 * (1 - py) * window.height);
    }
}
