package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmGrid;

/** The names of diameters and bands beside a plan, each with a leader to its place. */
final class PlanNames {
    private final FilmShape shape;
    private final FilmGrid grid;

    PlanNames(FilmShape shape) {
        this.shape = shape;
        this.grid = shape.grid();
    }

    /** The line that stands for something named, as a sample beside its name. */
    private enum Sample {
        NONE,
        GROOVE,
        FEED
    }

    private record Name(double wantedY, double radius, String words, String detail, Sample sample) {}

    /** Names of diameters and bands beside the enlarged sector, each with a leader to its place at the window's edge. */
    void draw(Ink ink, PlanLayout layout) {
        var conditions = shape.flow().film().conditions();
        List<Name> names = new ArrayList<>();
        Rectangle window = layout.namedWindow();
        add(
                names,
                layout,
                grid.outerRadius(),
                "outer diameter",
                Words.diameter(grid.outerRadius()) + ", " + conditions.outerSide(),
                Sample.NONE);
        for (FilmShape.Band band : shape.grooveBands()) {
            add(names, layout, 0.5 * (band.from() + band.to()), shape.groovedFaces(), between(band), Sample.GROOVE);
        }
        FilmShape.Band feed = shape.feed();
        if (feed != null) {
            String face = shape.flow().film().supply().orElseThrow().face() == org.whither.film.Face.STATOR
                    ? "feed, in the stator"
                    : "feed, in the rotor";
            add(names, layout, 0.5 * (feed.from() + feed.to()), face, between(feed), Sample.FEED);
        }
        for (FilmShape.Band band : shape.ungrooved()) {
            add(names, layout, besideFeed(band, feed), name(shape, band), between(band), Sample.NONE);
        }
        add(
                names,
                layout,
                grid.innerRadius(),
                "inner diameter",
                Words.diameter(grid.innerRadius()) + ", " + conditions.innerSide(),
                Sample.NONE);
        names.sort((a, b) -> Double.compare(a.wantedY(), b.wantedY()));
        double pitch = ink.height(ink.body) + ink.height(ink.small) + 3 * ink.unit;
        double[] y = spread(
                names.stream().mapToDouble(Name::wantedY).toArray(),
                pitch,
                window.y + 0.3 * pitch,
                window.getMaxY() - 0.2 * pitch);
        double room = layout.rightEdge - layout.namesLeft;
        double edge = window.getMaxX();
        for (int n = 0; n < y.length; n++) {
            Name name = names.get(n);
            ink.colour(ink.faint);
            ink.stroke(Math.max(1, ink.unit));
            Point2D start = start(layout, name);
            Path2D.Double leader = new Path2D.Double();
            leader.moveTo(start.getX(), start.getY());
            if (layout.sectorWindow != null) {
                leader.lineTo(edge + 5 * ink.unit, name.wantedY());
            }
            leader.lineTo(layout.namesLeft - 9 * ink.unit, y[n]);
            leader.lineTo(layout.namesLeft - 4 * ink.unit, y[n]);
            ink.pen.draw(leader);
            ink.mark(Destination.HELD.marker(start.getX(), start.getY(), 4 * ink.unit), ink.text, 1);
            ink.write(
                    ink.body,
                    ink.text,
                    ink.first(ink.body, room, name.words(), name.words().replaceAll(",.*", "")),
                    layout.namesLeft,
                    y[n] + 0.25 * ink.body.getSize2D(),
                    Ink.Side.LEFT);
            double signs = layout.namesLeft + ink.width(ink.body, name.words()) + 9 * ink.unit;
            if (signs + 24 * ink.unit < layout.rightEdge) {
                sample(ink, name.sample(), signs, y[n]);
            }
            ink.write(
                    ink.small,
                    ink.faint,
                    ink.first(
                            ink.small,
                            room,
                            name.detail(),
                            name.detail().replaceAll(",.*", ""),
                            name.detail().replace(" mm", ""),
                            name.detail().replaceAll(" .*", "")),
                    layout.namesLeft,
                    y[n] + 0.25 * ink.body.getSize2D() + ink.height(ink.small),
                    Ink.Side.LEFT);
        }
    }

    /** Where the leader of a name starts: at the right edge of a view, or on the ring. */
    private Point2D start(PlanLayout layout, Name name) {
        if (layout.sectorWindow != null) {
            return new Point2D.Double(layout.namedWindow().getMaxX(), name.wantedY());
        }
        Point2D middle = layout.ring.project(0, 0, 0);
        double reach = 1e3 * name.radius() * layout.ringScale;
        double up = middle.getY() - name.wantedY();
        return new Point2D.Double(middle.getX() + Math.sqrt(Math.max(0, reach * reach - up * up)), name.wantedY());
    }

    /** A short piece of the line that stands for something, on the ground that it has in the enlarged view. */
    private static void sample(Ink ink, Sample sample, double x, double y) {
        double length = 24 * ink.unit;
        if (sample == Sample.NONE) {
            return;
        }
        ink.colour(ColourScale.PRESSURE.colour(0.6));
        ink.pen.fill(new Rectangle2D.Double(x, y - 5 * ink.unit, length, 10 * ink.unit));
        Line2D.Double line = new Line2D.Double(x + 3 * ink.unit, y, x + length - 3 * ink.unit, y);
        if (sample == Sample.GROOVE) {
            Plan.grooveLine(ink, line);
        } else {
            ink.colour(Plan.DARK, 0.85);
            ink.dashes(1.25 * ink.unit, 4 * ink.unit, 2.4 * ink.unit);
            ink.pen.draw(line);
        }
    }

    /** What a ring without grooves is called. */
    static String name(FilmShape shape, FilmShape.Band band) {
        return band.equals(shape.dam()) ? "dam, without grooves" : "land, without grooves";
    }

    private static double besideFeed(FilmShape.Band band, FilmShape.Band feed) {
        if (feed == null || feed.to() < band.from() || feed.from() > band.to()) {
            return 0.5 * (band.from() + band.to());
        }
        // Beside the feed, on the wider part.
        return feed.from() - band.from() > band.to() - feed.to()
                ? 0.5 * (band.from() + feed.from())
                : 0.5 * (feed.to() + band.to());
    }

    private static String between(FilmShape.Band band) {
        return "Ø " + Ticks.number(2e3 * band.from(), 1) + " – " + Ticks.number(2e3 * band.to(), 1) + " mm";
    }

    /** Finds where the circle of a radius meets the right edge of the view, or for a ring where its leader starts. */
    private void add(List<Name> names, PlanLayout layout, double radius, String words, String detail, Sample sample) {
        Rectangle window = layout.namedWindow();
        double y;
        if (layout.sectorWindow == null) {
            // Round the right-hand side of the ring, from its upper to its lower part, the outermost first.
            double share = (radius - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius());
            y = window.getCenterY() - (share - 0.5) * 0.7 * window.height;
        } else if (layout.sectorChart.isUnrolled()) {
            y = layout.sectorChart.at(layout.middle, radius).getY();
        } else {
            Point2D shaft = layout.sector.project(0, 0, 0);
            double across = window.getMaxX() - shaft.getX();
            double reach = 1e3 * radius * layout.sectorScale;
            y = reach > across ? shaft.getY() - Math.sqrt(reach * reach - across * across) : window.getMaxY();
        }
        y = Math.max(window.y + 2, Math.min(window.getMaxY() - 2, y));
        names.add(new Name(y, radius, words, detail, sample));
    }

    /** Moves wanted places, in rising order, apart to a least distance, within two ends, as little as need be. */
    static double[] spread(double[] wanted, double pitch, double low, double high) {
        double[] y = wanted.clone();
        for (int round = 0; round < 200; round++) {
            for (int n = 0; n + 1 < y.length; n++) {
                double lack = pitch - (y[n + 1] - y[n]);
                if (lack > 0) {
                    y[n] -= 0.5 * lack;
                    y[n + 1] += 0.5 * lack;
                }
            }
            if (y.length > 0) {
                y[0] = Math.max(y[0], low);
                y[y.length - 1] = Math.min(y[y.length - 1], high);
            }
        }
        return y;
    }
}
