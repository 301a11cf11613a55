package org.whither.render;

import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.util.ArrayList;
import java.util.List;
import java.util.function.BiConsumer;

/** Signs with their words, set in rows from left to right; as many rows as they need. */
final class Legend {
    /** A sign, drawn about a point, and its words. */
    private record Entry(BiConsumer<Double, Double> sign, String words) {}

    private Ink ink;
    private final double room;
    private final List<Entry> entries = new ArrayList<>();

    /**
     * An empty legend.
     *
     * @param room how wide it may be (pixels)
     */
    Legend(Ink ink, double room) {
        this.ink = ink;
        this.room = room;
    }

    Ink ink() {
        return ink;
    }

    /** Adds a sign, which is drawn about a point of the picture, and its words. */
    Legend add(BiConsumer<Double, Double> sign, String words) {
        entries.add(new Entry(sign, ink.fitted(ink.small, words, room - signRoom())));
        return this;
    }

    /** Adds a destination's marker. */
    Legend add(Destination destination, String words) {
        return add((x, y) -> ink.mark(destination.marker(x, y, 10 * ink.unit), destination.colour(), ink.unit), words);
    }

    /** Adds a piece of a line. */
    Legend addLine(int colour, String words) {
        return add(
                (x, y) -> {
                    ink.colour(colour);
                    ink.stroke(2.2 * ink.unit);
                    ink.line(x - 7 * ink.unit, y, x + 7 * ink.unit, y);
                },
                words);
    }

    /** Adds a patch of a colour. */
    Legend addPatch(int colour, String words) {
        return add(
                (x, y) -> ink.mark(
                        new java.awt.geom.Rectangle2D.Double(
                                x - 7 * ink.unit, y - 5 * ink.unit, 14 * ink.unit, 10 * ink.unit),
                        colour,
                        0.6 * ink.unit),
                words);
    }

    /** Adds the filled arrowhead at which a path ends. */
    Legend addFilledHead(String words) {
        double u = ink.unit;
        return add(
                (x, y) -> ink.arrow(
                        new Point2D[] {
                            new Point2D.Double(x - 8 * u, y), new Point2D.Double(x, y), new Point2D.Double(x + 7 * u, y)
                        },
                        1.8 * u,
                        ColourScale.SPEED.colour(0.35)),
                words);
    }

    /** Adds the open arrowhead of a path that goes on. */
    Legend addOpenHead(String words) {
        double u = ink.unit;
        return add(
                (x, y) -> {
                    ink.colour(ColourScale.SPEED.colour(0.35));
                    ink.stroke(1.8 * u);
                    ink.line(x - 8 * u, y, x - 1 * u, y);
                    Path2D.Double head = new Path2D.Double();
                    head.moveTo(x, y - 4.5 * u);
                    head.lineTo(x + 7 * u, y);
                    head.lineTo(x, y + 4.5 * u);
                    ink.pen.draw(head);
                },
                words);
    }

    private double signRoom() {
        return 19 * ink.unit + 3;
    }

    private double pitch() {
        return 1.18 * ink.height(ink.small);
    }

    /** How high it is (pixels). */
    double height() {
        return entries.isEmpty() ? 0 : place(0, 0, false) * pitch();
    }

    /** Draws it below a height, with an ink like the one it was measured with. */
    void draw(Ink with, double left, double top) {
        ink = with;
        place(left, top, true);
    }

    private int place(double left, double top, boolean draw) {
        double x = 0;
        int row = 0;
        for (Entry entry : entries) {
            double wide = signRoom() + ink.width(ink.small, entry.words());
            if (x > 0 && x + wide > room) {
                x = 0;
                row++;
            }
            if (draw) {
                double base = top + row * pitch() + ink.ascent(ink.small) + 2 * ink.unit;
                entry.sign().accept(left + x + 8 * ink.unit, base - 0.35 * ink.small.getSize2D());
                ink.write(ink.small, ink.text, entry.words(), left + x + signRoom(), base, Ink.Side.LEFT);
            }
            x += wide + 16 * ink.unit;
        }
        return row + 1;
    }
}
