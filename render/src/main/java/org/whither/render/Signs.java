package org.whither.render;

import java.util.EnumMap;
import java.util.Map;

/**
 * Small bodies that show where gas will end, in the colours of {@link Destination} and each of its own shape: a cone that
 * points to the inner diameter, one that points to the outer diameter, a cube, a ball, and a flat cross for gas that was
 * not followed to an end.
 */
final class Signs {
    private final Map<Destination, Scene.Item> signs = new EnumMap<>(Destination.class);

    /** Signs of about so great a radius (mm). */
    Signs(double radius) {
        for (Destination destination : Destination.values()) {
            MeshBuilder mesh = new MeshBuilder();
            switch (destination) {
                case INNER -> Tubes.cone(mesh, new double[3], new double[] {-1, 0, 0}, 2.9 * radius, 1.25 * radius, 1);
                case OUTER -> Tubes.cone(mesh, new double[3], new double[] {1, 0, 0}, 2.9 * radius, 1.25 * radius, 1);
                case BACK -> cube(mesh, 0.85 * radius, 0.85 * radius);
                case HELD -> Tubes.ball(mesh, 0, 0, 0, radius, 1);
                case UNKNOWN -> {
                    cube(mesh, 1.3 * radius, 0.35 * radius);
                    cube(mesh, 0.35 * radius, 1.3 * radius);
                }
            }
            signs.put(destination, new Scene.Item(mesh.build(), Scene.Material.solid(destination.colour(), 0.2), 0));
        }
    }

    private static void cube(MeshBuilder mesh, double x, double y) {
        double z = Math.min(x, y);
        double[] half = {x, y, z};
        for (int axis = 0; axis < 3; axis++) {
            for (int sign = -1; sign <= 1; sign += 2) {
                int b = (axis + 1) % 3;
                int c = (axis + 2) % 3;
                int[] corners = new int[4];
                for (int n = 0; n < 4; n++) {
                    double[] p = new double[3];
                    p[axis] = sign * half[axis];
                    p[b] = (n == 1 || n == 2 ? 1 : -1) * half[b];
                    p[c] = (n >= 2 ? 1 : -1) * half[c];
                    double[] normal = new double[3];
                    normal[axis] = sign;
                    corners[n] = mesh.vertex(p[0], p[1], p[2], normal[0], normal[1], normal[2], 1);
                }
                mesh.quad(corners[0], corners[1], corners[2], corners[3]);
            }
        }
    }

    /** The sign of a destination at a drawn place (mm), turned so that the shaft lies where it points from. */
    Scene.Item item(Destination destination, double[] place) {
        return signs.get(destination).turned(Math.atan2(place[1], place[0])).at(place[0], place[1], place[2]);
    }
}
