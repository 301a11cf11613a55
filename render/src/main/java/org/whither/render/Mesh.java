package org.whither.render;

/**
 * Triangles, as plain data; independent of OpenGL. Built once, never changed: the arrays are handed out without a copy,
 * since they may be large, and nobody may write to them.
 */
final class Mesh {
    private final float[] positions;
    private final float[] normals;
    private final float[] values;
    private final int[] triangles;
    private final float[] box;

    /**
     * A mesh.
     *
     * @param positions x, y, z of each vertex, in the units of the scene; kept
     * @param normals unit normal of each vertex, as many as positions; kept
     * @param values one number a vertex: the position on a colour scale (0 … 1), or how open the place is to the sky
     *     (0 … 1); kept
     * @param triangles three vertex numbers a triangle; kept
     */
    Mesh(float[] positions, float[] normals, float[] values, int[] triangles) {
        if (positions.length % 3 != 0
                || normals.length != positions.length
                || values.length * 3 != positions.length
                || triangles.length % 3 != 0) {
            throw new IllegalArgumentException("mesh of " + positions.length + " coordinates, " + normals.length
                    + " normal components, " + values.length + " values and " + triangles.length
                    + " corners; expected three coordinates, three normal components and a value a vertex");
        }
        this.positions = positions;
        this.normals = normals;
        this.values = values;
        this.triangles = triangles;
        this.box = box(positions);
    }

    private static float[] box(float[] positions) {
        float inf = Float.POSITIVE_INFINITY;
        float[] box = {inf, inf, inf, -inf, -inf, -inf};
        for (int n = 0; n < positions.length; n++) {
            int axis = n % 3;
            box[axis] = Math.min(box[axis], positions[n]);
            box[3 + axis] = Math.max(box[3 + axis], positions[n]);
        }
        return box;
    }

    /** Least x, y, z, then greatest; the least above the greatest for a mesh without vertices. */
    float[] box() {
        return box;
    }

    float[] positions() {
        return positions;
    }

    float[] normals() {
        return normals;
    }

    float[] values() {
        return values;
    }

    int[] triangles() {
        return triangles;
    }
}
