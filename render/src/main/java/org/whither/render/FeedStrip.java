package org.whither.render;

import java.awt.BasicStroke;
import java.awt.Rectangle;
import java.awt.Shape;
import java.awt.geom.Area;
import java.awt.geom.Point2D;
import java.util.List;
import org.whither.fate.FedPoint;
import org.whither.film.FilmGrid;

/** The feed of one sector, unrolled, with a marker for each point that says where its gas goes. */
final class FeedStrip {
    private final FilmShape shape;
    private final FilmGrid grid;
    private final PictureSettings settings;
    private final List<FedPoint> fed;

    FeedStrip(FilmShape shape, PictureSettings settings, List<FedPoint> fed) {
        this.shape = shape;
        this.grid = shape.grid();
        this.settings = settings;
        this.fed = fed;
    }

    /**
     * Where a point of the feed lies in the unrolled view.
     *
     * @param layout the layout, with a feed
     * @param theta angle in the frame in which the film is steady (rad)
     * @param radius radius (m)
     */
    Point2D.Double unrolled(PlanLayout layout, double theta, double radius) {
        FilmShape.Band feed = shape.feed();
        Rectangle window = layout.feedWindow;
        double r = Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), radius));
        int row = grid.row(r);
        double within = theta - grid.intoSector(theta, row, r) * grid.pitch();
        // The band of the sector is skewed where its borders follow a spiral: straightened about the feed's middle.
        double middle = 0.5 * (feed.from() + feed.to());
        double start = grid.lineTheta(0, grid.row(middle), middle);
        double turns = (within - start) / grid.pitch();
        double along = turns - Math.floor(turns);
        boolean mirrored = settings.seenFrom() == ViewingSide.ROTOR;
        // Up is outwards; seen from the stator +θ runs to the left at the top of the ring.
        double f = mirrored ? along : 1 - along;
        return new Point2D.Double(
                window.x + f * window.width, window.y + (feed.to() - radius) / feed.width() * window.height);
    }

    void draw(Ink ink, PlanLayout layout) {
        Rectangle window = layout.feedWindow;
        FilmShape.Band feed = shape.feed();
        double along = grid.pitch() * 0.5 * (feed.from() + feed.to());
        double stretch = (window.height / feed.width()) / (window.width / along);
        String which = grid.sectors() > 1 ? "one sector" : "whole ring";
        String heading = "Where the gas of the feed goes (" + which + ", unrolled)";
        ink.writeIn(layout.rightEdge - window.x, ink.heading, ink.text, heading, window.x, window.y - 7 * ink.unit);
        ink.colour(ink.dark() ? 0x1d2329 : 0xeff0ee);
        ink.pen.fill(window);
        Shape before = ink.pen.getClip();
        double count = Math.max(1, fed.size());
        double size = Math.sqrt(0.62 * window.width * window.height / count);
        size = Math.max(4 * ink.unit, Math.min(11 * ink.unit, size));
        Area room = new Area(window);
        ink.pen.clip(room);
        for (FedPoint point : fed) {
            Destination destination = Destination.of(point.end());
            Point2D p =
                    unrolled(layout, point.release().theta(), point.release().radius());
            ink.mark(
                    destination.marker(p.getX(), p.getY(), size),
                    destination.colour(),
                    Math.min(0.9 * ink.unit, 0.08 * size));
        }
        ink.pen.setClip(before);
        ink.colour(ink.line);
        ink.pen.setStroke(new BasicStroke((float) Math.max(1, ink.unit)));
        ink.pen.draw(window);

        double x = layout.namesLeft - 14 * ink.unit;
        String upper = Words.diameter(feed.to());
        String lower = Words.diameter(feed.from());
        ink.write(ink.small, ink.text, upper, x, window.y + ink.ascent(ink.small), Ink.Side.LEFT);
        ink.write(
                ink.small,
                ink.faint,
                "towards the outer",
                x,
                window.y + ink.ascent(ink.small) + ink.height(ink.small),
                Ink.Side.LEFT);
        ink.write(ink.small, ink.text, lower, x, window.getMaxY(), Ink.Side.LEFT);
        ink.write(
                ink.small, ink.faint, "towards the inner", x, window.getMaxY() - ink.height(ink.small), Ink.Side.LEFT);
        double line = ink.height(ink.small);
        if (window.height > 6.4 * line) {
            double middle = 0.5 * (window.y + ink.ascent(ink.small) + window.getMaxY());
            double beside = layout.rightEdge - x;
            ink.writeIn(beside, ink.small, ink.text, "each point: same mass flow,", x, middle - 0.5 * line);
            ink.writeIn(beside, ink.small, ink.text, "so dense = much gas", x, middle + 0.5 * line);
        }
        String stretched = stretch >= 1
                ? "drawn " + Ticks.number(stretch, stretch < 10 ? 1 : 0) + " × too wide across the feed"
                : "drawn " + Ticks.number(1 / stretch, 1 / stretch < 10 ? 1 : 0) + " × too long along the feed";
        double length = Ticks.step(1e3 * along * 0.2, 1);
        String alongWords = Ticks.plain(length) + " mm along";
        double bar = length * window.width / (1e3 * along);
        double taken = 20 * ink.unit + Math.max(bar, 0.5 * (bar + ink.width(ink.small, alongWords)));
        ink.write(
                ink.small,
                ink.faint,
                ink.first(
                        ink.small,
                        window.width - taken,
                        stretched,
                        stretched.replaceAll(" (across|along) the feed", ""),
                        stretched.replaceAll("drawn | (across|along) the feed", "")),
                window.getMaxX(),
                window.getMaxY() + ink.height(ink.small),
                Ink.Side.RIGHT);
        ink.scaleBar(
                window.x + 10 * ink.unit, window.getMaxY() + ink.ascent(ink.small) + 13 * ink.unit, bar, alongWords);
    }
}
