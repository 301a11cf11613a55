package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmGrid;

/** Isobars over a part of the face, with their values written on them. */
final class IsobarLines {
    /** Most isobars. */
    private static final int ISOBARS = 12;

    private IsobarLines() {}

    /** Draws the isobars and returns what writes their values, to be run when all other lines are drawn. */
    static List<Runnable> draw(
            Ink ink, FilmShape shape, Chart chart, Rectangle window, PictureSettings.Range range, int reach) {
        FilmGrid grid = shape.grid();
        List<Rectangle2D> taken = new ArrayList<>();
        List<Runnable> labels = new ArrayList<>();
        double[] one = shape.nodePressures();
        int rows = grid.nj();
        // Long cells are divided, so that the lines follow the circles.
        int fine = Math.max(1, (int) Math.ceil(grid.pitch() / grid.cellsTheta() / Math.toRadians(1.25)));
        int per = grid.cellsTheta() * fine;
        int columns = (2 * reach + 1) * per + 1;
        double[] x = new double[columns * rows];
        double[] y = new double[columns * rows];
        double[] values = new double[columns * rows];
        for (int c = 0; c < columns; c++) {
            int i = c % per / fine;
            double f = (double) (c % fine) / fine;
            double turn = (c / per - reach) * grid.pitch();
            for (int j = 0; j < rows; j++) {
                double theta = grid.theta(i, j) + f * (grid.theta(i + 1, j) - grid.theta(i, j));
                Point2D p = chart.at(theta + turn, grid.radius(j));
                x[c * rows + j] = p.getX();
                y[c * rows + j] = p.getY();
                double a = one[grid.node(i, j)];
                values[c * rows + j] = (a + f * (one[grid.node(i + 1, j)] - a)) / 1e5;
            }
        }
        double step = Ticks.step((range.high() - range.low()) / 1e5, ISOBARS);
        for (double level : Ticks.between(range.low() / 1e5, range.high() / 1e5, ISOBARS)) {
            int colour = ColourScale.PRESSURE.colour((level * 1e5 - range.low()) / (range.high() - range.low()));
            boolean onDark = Colours.lightness(colour) < 58;
            int contrast = onDark ? 0xffffff : 0x14181c;
            for (double[] line : Isobars.lines(rows, x, y, values, level)) {
                Path2D.Double path = new Path2D.Double();
                path.moveTo(line[0], line[1]);
                for (int n = 2; n < line.length; n += 2) {
                    path.lineTo(line[n], line[n + 1]);
                }
                ink.colour(contrast, 0.75);
                ink.stroke(0.7 * ink.unit);
                ink.pen.draw(path);
                String words = Ticks.number(level, Ticks.decimals(step));
                labels.add(() -> label(ink, window, line, words, contrast, colour, taken));
            }
        }
        return labels;
    }

    /** Writes a value on a line where it is straight, inside the window and clear of other values; else not at all. */
    private static void label(
            Ink ink, Rectangle window, double[] line, String words, int colour, int edge, List<Rectangle2D> taken) {
        double wide = ink.width(ink.small, words);
        double tall = ink.height(ink.small);
        int points = line.length / 2;
        double best = Double.POSITIVE_INFINITY;
        double[] place = null;
        for (int n = 0; n < points; n++) {
            int a = n;
            int b = n;
            double px = line[2 * n];
            double py = line[2 * n + 1];
            double bend = 0;
            while (b + 1 < points && Math.hypot(line[2 * b] - px, line[2 * b + 1] - py) < 0.7 * wide) {
                b++;
            }
            while (a > 0 && Math.hypot(line[2 * a] - px, line[2 * a + 1] - py) < 0.7 * wide) {
                a--;
            }
            double length = Math.hypot(line[2 * b] - line[2 * a], line[2 * b + 1] - line[2 * a + 1]);
            if (length < 1.25 * wide) {
                continue;
            }
            for (int m = a; m <= b; m++) {
                double off = Math.abs((line[2 * m] - line[2 * a]) * (line[2 * b + 1] - line[2 * a + 1])
                                - (line[2 * m + 1] - line[2 * a + 1]) * (line[2 * b] - line[2 * a]))
                        / length;
                bend = Math.max(bend, off);
            }
            if (bend > 0.3 * tall) {
                continue;
            }
            double reachX = 0.5 * wide + 6 * ink.unit;
            Rectangle2D box = new Rectangle2D.Double(px - reachX, py - tall, 2 * reachX, 2 * tall);
            if (!window.contains(box) || taken.stream().anyMatch(box::intersects)) {
                continue;
            }
            double cost = bend + 0.02 * Math.abs(px - window.getCenterX());
            if (cost < best) {
                best = cost;
                double angle = Math.atan2(line[2 * b + 1] - line[2 * a + 1], line[2 * b] - line[2 * a]);
                if (Math.abs(angle) > Math.PI / 2) {
                    angle -= Math.signum(angle) * Math.PI;
                }
                place = new double[] {px, py, angle};
            }
        }
        if (place == null) {
            return;
        }
        taken.add(new Rectangle2D.Double(place[0] - wide, place[1] - tall, 2 * wide, 2 * tall));
        double drop = 0.36 * ink.small.getSize2D();
        ink.writeOver(
                ink.small,
                colour,
                edge,
                words,
                place[0] - drop * Math.sin(place[2]),
                place[1] + drop * Math.cos(place[2]),
                place[2],
                Ink.Side.MIDDLE);
    }
}
