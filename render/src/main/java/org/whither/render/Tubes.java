package org.whither.render;

/** Round tubes, balls and cones as triangles. */
final class Tubes {
    private static final int ROUND = 12;

    /** Triangles of an open tube between one of its points and the next. */
    static final int TRIANGLES_A_STEP = 2 * ROUND;

    private Tubes() {}

    /**
     * Adds a tube along a line, closed by half balls. Its cross-section is carried along without twist.
     *
     * @param mesh where to add it
     * @param line x, y, z of the points in turn; not modified
     * @param values one value a point; not modified
     * @param radius radius of the tube
     */
    static void tube(MeshBuilder mesh, double[] line, double[] values, double radius) {
        int points = values.length;
        if (points < 2) {
            return;
        }
        open(mesh, line, values, radius);
        ball(mesh, line[0], line[1], line[2], radius, values[0]);
        int last = 3 * (points - 1);
        ball(mesh, line[last], line[last + 1], line[last + 2], radius, values[points - 1]);
    }

    /** Adds a tube as above, but open at both ends. */
    static void open(MeshBuilder mesh, double[] line, double[] values, double radius) {
        int points = values.length;
        double[] tangent = new double[3];
        double[] across = new double[3];
        double[] other = new double[3];
        int before = -1;
        for (int n = 0; n < points; n++) {
            int a = Math.max(0, n - 1);
            int b = Math.min(points - 1, n + 1);
            direction(line, a, b, tangent);
            if (n == 0) {
                int least = Math.abs(tangent[2]) < 0.9 ? 2 : 0;
                double[] any = new double[3];
                any[least] = 1;
                cross(tangent, any, across);
            } else {
                double along = across[0] * tangent[0] + across[1] * tangent[1] + across[2] * tangent[2];
                for (int c = 0; c < 3; c++) {
                    across[c] -= along * tangent[c];
                }
            }
            unit(across);
            cross(tangent, across, other);
            int first = -1;
            for (int k = 0; k <= ROUND; k++) {
                double turn = 2 * Math.PI * k / ROUND;
                double cos = Math.cos(turn);
                double sin = Math.sin(turn);
                double nx = cos * across[0] + sin * other[0];
                double ny = cos * across[1] + sin * other[1];
                double nz = cos * across[2] + sin * other[2];
                int at = mesh.vertex(
                        line[3 * n] + radius * nx,
                        line[3 * n + 1] + radius * ny,
                        line[3 * n + 2] + radius * nz,
                        nx,
                        ny,
                        nz,
                        values[n]);
                first = first < 0 ? at : first;
                if (n > 0 && k > 0) {
                    mesh.quad(before + k - 1, before + k, at, at - 1);
                }
            }
            before = first;
        }
    }

    /** Adds a thin bar with a square section between two points, open at its ends. */
    static void bar(MeshBuilder mesh, double[] from, double[] to, double radius) {
        double[] along = {to[0] - from[0], to[1] - from[1], to[2] - from[2]};
        if (!unit(along)) {
            return;
        }
        double[] any = new double[3];
        any[Math.abs(along[2]) < 0.9 ? 2 : 0] = 1;
        double[] across = new double[3];
        double[] other = new double[3];
        cross(along, any, across);
        unit(across);
        cross(along, across, other);
        int before = -1;
        for (int k = 0; k <= 4; k++) {
            double cos = Math.cos(0.5 * Math.PI * k);
            double sin = Math.sin(0.5 * Math.PI * k);
            double[] n = new double[3];
            for (int c = 0; c < 3; c++) {
                n[c] = cos * across[c] + sin * other[c];
            }
            int at = mesh.vertex(
                    from[0] + radius * n[0], from[1] + radius * n[1], from[2] + radius * n[2], n[0], n[1], n[2], 1);
            mesh.vertex(to[0] + radius * n[0], to[1] + radius * n[1], to[2] + radius * n[2], n[0], n[1], n[2], 1);
            if (before >= 0) {
                mesh.quad(before, before + 1, at + 1, at);
            }
            before = at;
        }
    }

    /** Adds a ball. */
    static void ball(MeshBuilder mesh, double x, double y, double z, double radius, double value) {
        int rings = ROUND / 2 + 2;
        for (int a = 0; a <= rings; a++) {
            double polar = Math.PI * a / rings;
            for (int b = 0; b <= ROUND; b++) {
                double turn = 2 * Math.PI * b / ROUND;
                double nx = Math.sin(polar) * Math.cos(turn);
                double ny = Math.sin(polar) * Math.sin(turn);
                double nz = Math.cos(polar);
                int at = mesh.vertex(x + radius * nx, y + radius * ny, z + radius * nz, nx, ny, nz, value);
                if (a > 0 && b > 0) {
                    mesh.quad(at - ROUND - 2, at - ROUND - 1, at, at - 1);
                }
            }
        }
    }

    /** Adds a cone whose middle is at a point and whose tip points along a direction of unit length. */
    static void cone(
            MeshBuilder mesh, double[] middle, double[] direction, double length, double radius, double value) {
        double[] any = new double[3];
        any[Math.abs(direction[2]) < 0.9 ? 2 : 0] = 1;
        double[] across = new double[3];
        double[] other = new double[3];
        cross(direction, any, across);
        unit(across);
        cross(direction, across, other);
        double slope = radius / Math.hypot(radius, length);
        double flat = length / Math.hypot(radius, length);
        for (int k = 0; k <= ROUND; k++) {
            double turn = 2 * Math.PI * k / ROUND;
            double[] out = new double[3];
            for (int c = 0; c < 3; c++) {
                out[c] = Math.cos(turn) * across[c] + Math.sin(turn) * other[c];
            }
            double[] n = new double[3];
            double[] base = new double[3];
            double[] tip = new double[3];
            for (int c = 0; c < 3; c++) {
                n[c] = flat * out[c] + slope * direction[c];
                base[c] = middle[c] - 0.5 * length * direction[c] + radius * out[c];
                tip[c] = middle[c] + 0.5 * length * direction[c];
            }
            int at = mesh.vertex(base[0], base[1], base[2], n[0], n[1], n[2], value);
            mesh.vertex(tip[0], tip[1], tip[2], n[0], n[1], n[2], value);
            mesh.vertex(base[0], base[1], base[2], -direction[0], -direction[1], -direction[2], value);
            int hub = mesh.vertex(
                    middle[0] - 0.5 * length * direction[0],
                    middle[1] - 0.5 * length * direction[1],
                    middle[2] - 0.5 * length * direction[2],
                    -direction[0],
                    -direction[1],
                    -direction[2],
                    value);
            if (k > 0) {
                mesh.quad(at - 4, at, at + 1, at - 3);
                mesh.triangle(at - 2, at + 2, hub);
            }
        }
    }

    private static void direction(double[] line, int a, int b, double[] result) {
        for (int c = 0; c < 3; c++) {
            result[c] = line[3 * b + c] - line[3 * a + c];
        }
        if (!unit(result)) {
            result[0] = 1;
        }
    }

    private static boolean unit(double[] v) {
        double length = Math.sqrt(v[0] * v[0] + v[1] * v[1] + v[2] * v[2]);
        if (length < 1e-30) {
            v[0] = 0;
            v[1] = 0;
            v[2] = 0;
            return false;
        }
        for (int c = 0; c < 3; c++) {
            v[c] /= length;
        }
        return true;
    }

    private static void cross(double[] a, double[] b, double[] result) {
        double x = a[1] * b[2] - a[2] * b[1];
        double y = a[2] * b[0] - a[0] * b[2];
        double z = a[0] * b[1] - a[1] * b[0];
        result[0] = x;
        result[1] = y;
        result[2] = z;
    }
}
