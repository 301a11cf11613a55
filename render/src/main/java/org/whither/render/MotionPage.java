package org.whither.render;

import java.awt.Rectangle;
import java.awt.Shape;
import java.awt.geom.AffineTransform;
import java.awt.geom.Ellipse2D;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;
import java.util.function.BiConsumer;
import org.whither.film.Conditions;
import org.whither.film.FilmGrid;

/**
 * What stands round the moving scene: title, facts and caution, legends, and at the right a column with figures and a
 * small plan of the face that tells where one is. What does not change is drawn once and laid over every frame.
 */
final class MotionPage {
    /** A figure and what it is, also in few words, for a small picture. */
    record Figure(String value, String words, String brief) {}

    /** An entry of the legend: its sign, drawn about a point, and its words. */
    record Entry(Sign sign, String words) {}

    /** Draws a sign about a point. */
    interface Sign {
        void draw(Ink ink, double x, double y);
    }

    /** A colour bar of the foot. */
    record Bar(ColourScale scale, double low, double high, boolean below, boolean above, String caption) {}

    /** Something on the small plan: an angle in the frame of view (rad), a radius (m), and what to draw there. */
    record Spot(double theta, double radius, BiConsumer<Ink, Point2D> draw) {}

    private final PictureSettings settings;
    private final FilmShape shape;
    private final FilmGrid grid;
    private final BufferedImage still;
    private final double unit;
    private final Path2D.Double grooves;
    /** Where the moving scene is seen. */
    final Rectangle window;

    private double columnLeft;
    private double columnTop;
    private double columnBottom;
    private double planX;
    private double planY;
    private double planScale;

    MotionPage(
            PictureSettings settings,
            FilmShape shape,
            List<String> captions,
            List<Entry> legend,
            List<Bar> bars,
            int figures) {
        this.settings = settings;
        this.shape = shape;
        this.grid = shape.grid();
        this.unit = Ink.unit(settings);
        this.still = new BufferedImage(settings.width(), settings.height(), BufferedImage.TYPE_INT_ARGB_PRE);
        this.grooves = grooves();
        try (Ink ink = new Ink(still, settings)) {
            this.window = lay(ink, captions, legend, bars, figures);
        }
    }

    private Path2D.Double grooves() {
        Path2D.Double path = new Path2D.Double();
        for (int n = 0; n < grid.sectors(); n++) {
            double turn = n * grid.pitch();
            for (FilmShape.Edge edge : shape.grooveEdges()) {
                path.moveTo(edge.r0() * Math.cos(edge.theta0() + turn), edge.r0() * Math.sin(edge.theta0() + turn));
                path.lineTo(edge.r1() * Math.cos(edge.theta1() + turn), edge.r1() * Math.sin(edge.theta1() + turn));
            }
        }
        return path;
    }

    private Rectangle lay(Ink ink, List<String> captions, List<Entry> legend, List<Bar> bars, int figures) {
        double u = unit;
        double margin = 26 * u;
        double room = settings.width() - 2 * margin;
        double y = margin + ink.ascent(ink.title);
        ink.write(ink.title, ink.text, ink.fitted(ink.title, settings.title(), room), margin, y, Ink.Side.LEFT);
        y += 9 * u + ink.ascent(ink.body);
        ink.writeIn(room, ink.body, ink.faint, Words.facts(shape.flow().film()), margin, y);
        for (String caption : captions) {
            for (String line : ink.lines(ink.heading, caption, room, 2)) {
                y += 9 * u + ink.ascent(ink.body);
                ink.write(ink.heading, ink.text, line, margin, y, Ink.Side.LEFT);
            }
        }
        double top = y + 12 * u;

        double cautionBase = settings.height() - 14 * u;
        ink.caution(room, margin, cautionBase);
        double pitch = 1.18 * ink.height(ink.small);
        double lastRow = cautionBase - ink.ascent(ink.small) - 12 * u;
        double firstRow = lastRow - 2 * pitch;
        double barRoom = 0;
        double barTop = lastRow - 1.1 * ink.ascent(ink.small) - 6 * u - 12 * u;
        double barLength = (bars.size() > 1 ? 0.24 : 0.31) * settings.width();
        for (int n = 0; n < bars.size(); n++) {
            Bar bar = bars.get(n);
            double x = settings.width() - margin - (bars.size() - n) * barLength - (bars.size() - n - 1) * 30 * u;
            ink.colourBar(
                    new Rectangle2D.Double(x, barTop, barLength - 10 * u, 12 * u),
                    bar.scale(),
                    bar.low(),
                    bar.high(),
                    bar.below(),
                    bar.above(),
                    bar.caption());
            barRoom = Math.max(barRoom, settings.width() - margin - x + 24 * u);
        }
        rows(ink, legend, margin, firstRow, pitch, room - barRoom);
        double foot = Math.min(
                        firstRow - ink.ascent(ink.small),
                        bars.isEmpty() ? firstRow : barTop - 6 * u - ink.height(ink.heading))
                - 12 * u;

        double column = Math.max(236 * u, 15.5 * ink.small.getSize2D());
        columnLeft = settings.width() - margin - column;
        columnTop = top;
        columnBottom = foot;
        plan(ink, column, figures);
        int left = (int) Math.round(margin);
        int upper = (int) Math.round(top);
        return new Rectangle(left, upper, (int) Math.round(columnLeft - 18 * u) - left, (int) Math.round(foot) - upper);
    }

    /** Three rows at the foot, column by column. */
    private void rows(Ink ink, List<Entry> entries, double left, double firstBase, double pitch, double room) {
        double u = unit;
        double sign = 20 * u;
        double x = left;
        for (int first = 0; first < entries.size(); first += 3) {
            double wide = 0;
            for (int n = first; n < Math.min(entries.size(), first + 3); n++) {
                double y = firstBase + (n - first) * pitch;
                double most = left + room - x - sign;
                if (most < 3 * ink.small.getSize2D()) {
                    continue;
                }
                entries.get(n).sign().draw(ink, x + 7 * u, y - 0.35 * ink.small.getSize2D());
                String words = ink.fitted(ink.small, entries.get(n).words(), most);
                ink.write(ink.small, ink.text, words, x + sign, y, Ink.Side.LEFT);
                wide = Math.max(wide, ink.width(ink.small, words));
            }
            x += sign + wide + 18 * u;
        }
    }

    private double figurePitch(Ink ink) {
        return ink.height(ink.title) + 0.9 * ink.height(ink.small) + 3 * unit;
    }

    /** The small plan: the face seen from the stator, its sides and the sense of turning. */
    private void plan(Ink ink, double column, int figures) {
        double u = unit;
        Conditions conditions = shape.flow().film().conditions();
        double line = ink.height(ink.small);
        double upper = columnTop + figures * figurePitch(ink) + 4 * u;
        double below = (u < 0.8 ? 3 : 2) * line + 4 * u;
        double room = columnBottom - below - upper;
        double radius = Math.max(10, Math.min(0.5 * column - 4 * u, 0.5 * (room - 2 * line)));
        planScale = 0.86 * radius / grid.outerRadius();
        planX = columnLeft + 0.5 * column;
        planY = upper + line + 2 * u + radius;
        double rate = conditions.rotationRate();
        String outer = conditions.outerSide() + ", " + Words.bar(conditions.pressureOuter());
        ink.write(
                ink.small,
                ink.text,
                ink.fitted(ink.small, outer, column),
                planX,
                upper + ink.ascent(ink.small),
                Ink.Side.MIDDLE);
        double hole = 1.7 * planScale * grid.innerRadius();
        String bar = Words.bar(conditions.pressureInner());
        boolean inTheHole = ink.width(ink.small, conditions.innerSide()) <= hole && ink.width(ink.small, bar) <= hole;
        if (inTheHole) {
            ink.write(ink.small, ink.text, conditions.innerSide(), planX, planY - 0.1 * line, Ink.Side.MIDDLE);
            ink.write(ink.small, ink.text, bar, planX, planY + 0.9 * line, Ink.Side.MIDDLE);
        }
        double base = planY + radius + 2 * u + line;
        String turning = rate == 0 ? "rotor stands still" : "rotor turns as the arrow";
        ink.write(
                ink.small,
                ink.faint,
                ink.first(ink.small, column, ViewingSide.STATOR.words(), "seen from the stator"),
                planX,
                base,
                Ink.Side.MIDDLE);
        ink.write(ink.small, ink.faint, ink.fitted(ink.small, turning, column), planX, base + line, Ink.Side.MIDDLE);
        if (!inTheHole) {
            String inner = "inside: " + conditions.innerSide() + ", " + bar;
            double y = base + (u < 0.8 ? 2 : -1) * line;
            ink.write(
                    ink.small,
                    ink.text,
                    ink.first(ink.small, column, inner, "inside: " + bar),
                    planX,
                    y,
                    Ink.Side.MIDDLE);
        }
        if (rate != 0) {
            Point2D[] arrow = new Point2D[33];
            double half = Math.toRadians(34) * Math.signum(rate);
            for (int n = 0; n < arrow.length; n++) {
                double theta = Math.PI / 2 - half + 2 * half * n / (arrow.length - 1);
                arrow[n] = new Point2D.Double(
                        planX + 0.96 * radius * Math.cos(theta), planY - 0.96 * radius * Math.sin(theta));
            }
            ink.arrow(arrow, 1.8 * u, ink.text);
        }
    }

    /** A place on the small plan; θ = 0 of the frame of view lies to the right, +θ runs anticlockwise. */
    Point2D.Double onPlan(double theta, double radius) {
        return new Point2D.Double(
                planX + planScale * radius * Math.cos(theta), planY - planScale * radius * Math.sin(theta));
    }

    /** The size of the small plan: pixels for one m. */
    double planScale() {
        return planScale;
    }

    /**
     * Completes a frame.
     *
     * @param image the drawn scene
     * @param figures values that change, from top to bottom of the column
     * @param filmTurn how far the film has turned in the frame of view (rad)
     * @param drawPlan draws over the small plan
     */
    void complete(
            BufferedImage image, List<Figure> figures, double filmTurn, java.util.function.Consumer<Ink> drawPlan) {
        try (Ink ink = new Ink(image, settings)) {
            ink.pen.drawImage(still, 0, 0, null);
            double u = unit;
            double y = columnTop;
            double room = settings.width() - 26 * u - columnLeft;
            for (Figure figure : figures) {
                y += ink.height(ink.title);
                ink.write(ink.title, ink.text, figure.value(), columnLeft, y - 5 * u, Ink.Side.LEFT);
                y += 0.9 * ink.height(ink.small);
                ink.write(
                        ink.small,
                        ink.faint,
                        ink.first(ink.small, room, figure.words(), figure.brief()),
                        columnLeft,
                        y - 3 * u,
                        Ink.Side.LEFT);
                y += 3 * u;
            }
            face(ink, filmTurn);
            drawPlan.accept(ink);
        }
    }

    private void face(Ink ink, double filmTurn) {
        ink.stroke(Math.max(0.8, 1.1 * unit));
        ink.colour(ink.text);
        for (double r : new double[] {grid.innerRadius(), grid.outerRadius()}) {
            double d = planScale * r;
            ink.pen.draw(new Ellipse2D.Double(planX - d, planY - d, 2 * d, 2 * d));
        }
        FilmShape.Band feed = shape.feed();
        if (feed != null && shape.feedEdges().isEmpty()) {
            double d = planScale * 0.5 * (feed.from() + feed.to());
            ink.colour(GapScene.FEED, 0.55);
            ink.stroke(Math.max(1, planScale * feed.width()));
            ink.pen.draw(new Ellipse2D.Double(planX - d, planY - d, 2 * d, 2 * d));
        }
        AffineTransform place = new AffineTransform();
        place.translate(planX, planY);
        place.scale(planScale, -planScale);
        place.rotate(filmTurn);
        Shape outline = place.createTransformedShape(grooves);
        ink.colour(ink.faint);
        ink.stroke(Math.max(0.6, 0.8 * unit));
        ink.pen.draw(outline);
    }

    /** The cone of view of an eye on the small plan. */
    void eye(Ink ink, double[] eye, double[] aim) {
        double dx = aim[0] - eye[0];
        double dy = aim[1] - eye[1];
        double length = Math.hypot(dx, dy);
        Point2D.Double at = onPlan(Math.atan2(eye[1], eye[0]), 1e-3 * Math.hypot(eye[0], eye[1]));
        double reach = 17 * unit;
        Path2D.Double cone = new Path2D.Double();
        cone.moveTo(at.x, at.y);
        for (int side = -1; side <= 1; side += 2) {
            double angle = Math.atan2(dy, dx) + side * Math.toRadians(28);
            if (length > 0) {
                cone.lineTo(at.x + reach * Math.cos(angle), at.y - reach * Math.sin(angle));
            }
        }
        cone.closePath();
        ink.colour(ink.text, 0.3);
        ink.pen.fill(cone);
    }

    /** A line on the small plan along places of the frame of view. */
    void line(Ink ink, List<double[]> thetaAndRadius, int colour) {
        ink.colour(colour);
        ink.stroke(Math.max(1.2, 1.8 * unit));
        List<Point2D> points = new ArrayList<>();
        thetaAndRadius.forEach(p -> points.add(onPlan(p[0], p[1])));
        for (int n = 1; n < points.size(); n++) {
            ink.pen.draw(new Line2D.Double(points.get(n - 1), points.get(n)));
        }
    }
}
