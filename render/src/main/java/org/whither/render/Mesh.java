package org.whither.render;

/**
 * Triangles, as plain data; independent of OpenGL. Built once, never changed: nobody may write to the arrays.
 *
 * @param positions x, y, z of each vertex, in the units of the scene
 * @param normals unit normal of each vertex, as many as positions
 * @param values one number a vertex: the position on a colour scale (0 … 1), or how open the place is to the sky (0 … 1)
 * @param triangles three vertex numbers a triangle
 */
record Mesh(float[] positions, float[] normals, float[] values, int[] triangles) {
    Mesh {
        if (positions.length % 3 != 0
                || normals.length != positions.length
                || values.length * 3 != positions.length
                || triangles.length % 3 != 0) {
            throw new IllegalArgumentException("mesh of " + positions.length + " coordinates, " + normals.length
                    + " normal components, " + values.length + " values and " + triangles.length
                    + " corners; expected three coordinates, three normal components and a value a vertex");
        }
    }

    int vertices() {
        return values.length;
    }
}
