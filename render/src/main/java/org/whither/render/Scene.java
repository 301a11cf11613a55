package org.whither.render;

import java.util.List;

/**
 * What there is to see, as plain data, in right-handed coordinates x, y, z; independent of OpenGL and of the picture's
 * size. Items are drawn in order, translucent ones after all others.
 *
 * @param items the things
 * @param light where the light comes from
 */
record Scene(List<Item> items, Light light) {
    Scene {
        items = List.copyOf(items);
    }

    /**
     * A mesh in its place. Items that share a mesh share its storage.
     *
     * @param mesh the mesh
     * @param material what it looks like
     * @param turn angle by which it is turned about the z axis, positive by the right-hand rule (rad)
     * @param shift by how much it is then moved; length 3; kept
     * @param from first of its triangles that is drawn
     * @param to end of those that are drawn
     * @param casts whether it casts a shadow where it is lit and hides what is behind
     */
    record Item(Mesh mesh, Material material, double turn, double[] shift, int from, int to, boolean casts) {
        private static final double[] NOWHERE = new double[3];

        Item(Mesh mesh, Material material, double turn) {
            this(mesh, material, turn, NOWHERE, 0, mesh.triangles().length / 3, true);
        }

        /** The same thing moved to a place; small beside the scene, within which it lies. */
        Item at(double x, double y, double z) {
            return new Item(mesh, material, turn, new double[] {x, y, z}, from, to, casts);
        }

        /** The same thing turned by an angle instead (rad). */
        Item turned(double angle) {
            return new Item(mesh, material, angle, shift, from, to, casts);
        }

        /** Only some of its triangles; an empty part draws nothing. */
        Item part(int first, int end) {
            return new Item(mesh, material, turn, shift, first, end, casts);
        }

        /** The same thing, which casts no shadow. */
        Item shadowless() {
            return new Item(mesh, material, turn, shift, from, to, false);
        }

        /** Whether it was moved to a place of its own. */
        boolean placed() {
            return shift[0] != 0 || shift[1] != 0 || shift[2] != 0;
        }
    }

    /**
     * What a mesh looks like.
     *
     * @param colour its colour, sRGB 0xRRGGBB, where there is no scale
     * @param scale the colour scale on which the mesh's values are looked up, or null
     * @param lit whether light and shade fall on it; where not, the colour appears exactly
     * @param gloss strength of the highlight, 0 … 1
     * @param opacity 1 hides what is behind
     */
    record Material(int colour, ColourScale scale, boolean lit, double gloss, double opacity) {
        static Material plain(int colour, double opacity) {
            return new Material(colour, null, false, 0, opacity);
        }

        static Material solid(int colour, double gloss) {
            return new Material(colour, null, true, gloss, 1);
        }

        static Material scaled(ColourScale scale, boolean lit) {
            return new Material(0, scale, lit, lit ? 0.25 : 0, 1);
        }
    }

    /**
     * A distant light that casts shadows.
     *
     * @param x direction towards the light, unit length together with y and z
     * @param y as x
     * @param z as x
     */
    record Light(double x, double y, double z) {
        static Light from(double x, double y, double z) {
            double length = Math.sqrt(x * x + y * y + z * z);
            return new Light(x / length, y / length, z / length);
        }
    }
}
