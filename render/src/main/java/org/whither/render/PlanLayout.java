package org.whither.render;

import java.awt.Rectangle;
import org.whither.film.Conditions;

/**
 * Where things lie in a plan: the whole ring on the left, one sector enlarged on the right, the feed unrolled below it.
 * All in pixels of the picture; scenes are in mm.
 */
final class PlanLayout {
    final double margin;
    final double unit;
    /** Baseline of the title, of the facts below it, and of the caution at the bottom. */
    final double titleBase;

    final double factsBase;
    final double cautionBase;
    final Rectangle ringWindow;
    final Rectangle pressureBar;
    final Rectangle sectorWindow;
    /** Left edge of the names beside the enlarged sector. */
    final double namesLeft;

    final double rightEdge;
    /** The feed, unrolled; null where there is none. */
    final Rectangle feedWindow;

    final double legendBase;
    final Camera ring;
    final Camera sector;
    /** Pixels for 1 mm in the ring and in the sector. */
    final double ringScale;

    final double sectorScale;
    /** Middle angle of the enlarged sector (rad). */
    final double middle;

    PlanLayout(FilmShape shape, PictureSettings settings, Ink ink, boolean withFeed, boolean withLegend) {
        unit = ink.unit;
        int width = settings.width();
        int height = settings.height();
        margin = 26 * unit;
        titleBase = margin + ink.ascent(ink.title);
        factsBase = titleBase + 9 * unit + ink.ascent(ink.body);
        cautionBase = height - 14 * unit;
        double top = factsBase + 18 * unit;
        double bottom = cautionBase - ink.ascent(ink.small) - 12 * unit;
        double barRoom = 3 * ink.height(ink.small) + 24 * unit;
        double heading = ink.height(ink.heading) + 6 * unit;

        double side = Math.min(bottom - top - barRoom, 0.46 * width - margin);
        double ringTop = top + 0.5 * (bottom - top - barRoom - side);
        ringWindow = rectangle(margin, ringTop, side, side);
        double barHeight = 12 * unit;
        pressureBar = rectangle(
                margin + 0.04 * side,
                bottom - 2.1 * ink.ascent(ink.small) - barHeight - 4 * unit,
                0.92 * side,
                barHeight);

        double left = margin + side + 30 * unit;
        rightEdge = width - margin;
        Conditions conditions = shape.flow().film().conditions();
        double names = ink.width(ink.body, "land, without grooves");
        String diameter = ", " + Words.diameter(0.1);
        for (String detail :
                new String[] {"Ø 000.0 – 000.0 mm", conditions.innerSide() + diameter, conditions.outerSide() + diameter
                }) {
            names = Math.max(names, ink.width(ink.small, detail));
        }
        names = Math.min(0.2 * width, names + 24 * unit);
        double sectorWidth = rightEdge - left - names;
        double below = ink.ascent(ink.small) + 20 * unit;
        double legendRoom = withLegend ? 2.4 * ink.height(ink.small) + 6 * unit : 0;
        double feedRoom = withFeed ? heading + 0.135 * height + below : 0;
        double sectorHeight = bottom - top - heading - legendRoom - feedRoom - below;
        sectorWindow = rectangle(left, top + heading, sectorWidth, sectorHeight);
        namesLeft = left + sectorWidth + 22 * unit;
        if (withFeed) {
            double feedTop = bottom - legendRoom - below - 0.135 * height;
            feedWindow = rectangle(left, feedTop, sectorWidth, 0.135 * height);
        } else {
            feedWindow = null;
        }
        legendBase = bottom - 1.25 * ink.height(ink.small) - 2 * unit;

        double inner = 1e3 * shape.grid().innerRadius();
        double outer = 1e3 * shape.grid().outerRadius();
        boolean mirrored = settings.seenFrom() == ViewingSide.ROTOR;
        ringScale = 0.45 * ringWindow.width / outer;
        ring = Camera.plan(0, 0, ringScale, Math.PI / 2, mirrored, ringWindow);
        double span = outer - inner;
        sectorScale = sectorWindow.height / (1.22 * span);
        double r = 0.5 * 1e-3 * (inner + outer);
        int row = shape.grid().row(r);
        middle = 0.5
                * (shape.grid().lineTheta(0, row, r)
                        + shape.grid().lineTheta(shape.grid().ni() - 1, row, r));
        // The face sinks towards the sides of the window: the middle is set a little above the face's own.
        double centre = 0.5 * (inner + outer) - 0.02 * span;
        sector = Camera.plan(
                centre * Math.cos(middle), centre * Math.sin(middle), sectorScale, middle, mirrored, sectorWindow);
    }

    private static Rectangle rectangle(double x, double y, double w, double h) {
        return new Rectangle((int) Math.round(x), (int) Math.round(y), (int) Math.max(8, Math.round(w)), (int)
                Math.max(8, Math.round(h)));
    }
}
