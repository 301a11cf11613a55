package org.whither.render;

import java.util.Arrays;

/** Collects vertices and triangles into a {@link Mesh}. Used by one thread. */
final class MeshBuilder {
    private float[] positions = new float[3 * 1024];
    private float[] normals = new float[3 * 1024];
    private float[] values = new float[1024];
    private int[] corners = new int[3 * 2048];
    private int vertexCount;
    private int cornerCount;

    /** Adds a vertex and returns its number. */
    int vertex(double x, double y, double z, double nx, double ny, double nz, double value) {
        if (vertexCount == values.length) {
            positions = Arrays.copyOf(positions, positions.length * 2);
            normals = Arrays.copyOf(normals, normals.length * 2);
            values = Arrays.copyOf(values, values.length * 2);
        }
        int at = 3 * vertexCount;
        positions[at] = (float) x;
        positions[at + 1] = (float) y;
        positions[at + 2] = (float) z;
        normals[at] = (float) nx;
        normals[at + 1] = (float) ny;
        normals[at + 2] = (float) nz;
        values[vertexCount] = (float) value;
        return vertexCount++;
    }

    void triangle(int a, int b, int c) {
        if (cornerCount + 3 > corners.length) {
            corners = Arrays.copyOf(corners, corners.length * 2);
        }
        corners[cornerCount++] = a;
        corners[cornerCount++] = b;
        corners[cornerCount++] = c;
    }

    /** Adds the quadrilateral a, b, c, d, in order round it. */
    void quad(int a, int b, int c, int d) {
        triangle(a, b, c);
        triangle(a, c, d);
    }

    boolean isEmpty() {
        return cornerCount == 0;
    }

    Mesh build() {
        return new Mesh(
                Arrays.copyOf(positions, 3 * vertexCount),
                Arrays.copyOf(normals, 3 * vertexCount),
                Arrays.copyOf(values, vertexCount),
                Arrays.copyOf(corners, cornerCount));
    }
}
