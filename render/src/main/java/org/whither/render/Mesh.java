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
