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
     */
    record Item(Mesh mesh, Material material, double turn) {}

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
