package org.whither.render;

import java.awt.Shape;
import java.awt.geom.Ellipse2D;
import java.awt.geom.Path2D;
import java.awt.geom.Rectangle2D;
import org.whither.film.Conditions;
import org.whither.trace.PathEnd;

/**
 * Where gas goes, with the colour and the marker that stand for it in every picture. Colours: the qualitative set of M.
 * Okabe and K. Ito, Color Universal Design (2008), made to be told apart with colour vision deficiency; free to use.
 * Of that set without black, these four are the furthest apart under all simulated deficiencies.
 */
enum Destination {
    /** Out at the inner diameter. */
    INNER(0xd55e00),
    /** Out at the outer diameter. */
    OUTER(0x0072b2),
    /** Back into the feed. */
    BACK(0x56b4e9),
    /** Still inside the film when its time was up. */
    HELD(0xf0e442),
    /** Not followed to an end. */
    UNKNOWN(0x808080);

    private final int colour;

    Destination(int colour) {
        this.colour = colour;
    }

    static Destination of(PathEnd end) {
        if (end instanceof PathEnd.Left left) {
            return switch (left.border()) {
                case INNER -> INNER;
                case OUTER -> OUTER;
                case SUPPLY -> BACK;
            };
        }
        return end instanceof PathEnd.StillInside ? HELD : UNKNOWN;
    }

    static Destination of(org.whither.fate.Destination destination) {
        return switch (destination) {
            case INNER -> INNER;
            case OUTER -> OUTER;
            case SUPPLY -> BACK;
            case HELD -> HELD;
            case LOST -> UNKNOWN;
        };
    }

    /** What a legend says of it. */
    String words(Conditions conditions) {
        return switch (this) {
            case INNER -> "to the inner diameter (" + conditions.innerSide() + ")";
            case OUTER -> "to the outer diameter (" + conditions.outerSide() + ")";
            case BACK -> "back into the feed";
            case HELD -> "held in the film";
            case UNKNOWN -> "not followed to an end";
        };
    }

    /** sRGB 0xRRGGBB. */
    int colour() {
        return colour;
    }

    /**
     * Its marker: a triangle that points to the inner diameter, one that points to the outer diameter, a square, a
     * disc, or a cross. In the picture inwards is down.
     *
     * @param x middle (pixels)
     * @param y middle (pixels)
     * @param size across (pixels)
     */
    Shape marker(double x, double y, double size) {
        double h = size / 2;
        return switch (this) {
            case INNER -> triangle(x, y, h, 1);
            case OUTER -> triangle(x, y, h, -1);
            case BACK -> new Rectangle2D.Double(x - 0.8 * h, y - 0.8 * h, 1.6 * h, 1.6 * h);
            case HELD -> new Ellipse2D.Double(x - h, y - h, size, size);
            case UNKNOWN -> cross(x, y, h);
        };
    }

    private static Shape triangle(double x, double y, double h, int down) {
        Path2D.Double path = new Path2D.Double();
        path.moveTo(x, y + down * 1.05 * h);
        path.lineTo(x - 1.05 * h, y - down * 0.8 * h);
        path.lineTo(x + 1.05 * h, y - down * 0.8 * h);
        path.closePath();
        return path;
    }

    private static Shape cross(double x, double y, double h) {
        double t = 0.3 * h;
        double[][] corners = {
            {-h, -t}, {-t, -t}, {-t, -h}, {t, -h}, {t, -t}, {h, -t}, {h, t}, {t, t}, {t, h}, {-t, h}, {-t, t}, {-h, t}
        };
        Path2D.Double path = new Path2D.Double();
        path.moveTo(x + corners[0][0], y + corners[0][1]);
        for (int n = 1; n < corners.length; n++) {
            path.lineTo(x + corners[n][0], y + corners[n][1]);
        }
        path.closePath();
        return path;
    }
}
