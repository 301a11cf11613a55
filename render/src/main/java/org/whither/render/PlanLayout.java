package org.whither.render;

import java.awt.Rectangle;
import org.whither.film.Conditions;

/**
 * Where things lie in a plan: the whole ring on the left, one sector enlarged on the right, the feed unrolled below it; or
 * the ring alone, or one sector unrolled, with names on the right. All in pixels of the picture; scenes are in mm.
 */
final class PlanLayout {
    final double unit;
    final Page page;
    /** The whole ring; null where only a sector is shown. */
    final Rectangle ringWindow;

    final Rectangle pressureBar;
    /** The enlarged or unrolled sector; null where only the ring is shown. */
    final Rectangle sectorWindow;
    /** Left edge of the names beside it. */
    final double namesLeft;

    final double rightEdge;
    /** The feed, unrolled; null where there is none. */
    final Rectangle feedWindow;

    final double legendLeft;
    final double legendTop;
    final Camera ring;
    final Chart ringChart;
    final Camera sector;
    final Chart sectorChart;
    /** Pixels for 1 mm in the ring and in the sector. */
    final double ringScale;

    final double sectorScale;
    /** Middle angle of the enlarged sector (rad). */
    final double middle;

    PlanLayout(FilmShape shape, PlanSettings plan, Ink ink, boolean withFeed, boolean withLegend) {
        PictureSettings settings = plan.picture();
        unit = ink.unit;
        int width = settings.width();
        int height = settings.height();
        String drawn = plan.quantity() == Quantity.DESTINATION ? "Where the gas goes that is at mid film now" : "";
        page = new Page(ink, settings, Words.facts(shape.flow().film()), drawn);
        double top = page.top + 4 * unit;
        double bottom = page.bottom;
        boolean bar = plan.quantity() != Quantity.DESTINATION;
        double barRoom = bar ? 2.2 * ink.height(ink.small) + ink.height(ink.heading) + 18 * unit : 0;
        double heading = ink.height(ink.heading) + 6 * unit;
        double barHeight = 12 * unit;
        double barTop = bottom - 2.1 * ink.ascent(ink.small) - barHeight - 4 * unit;
        double names = namesRoom(shape, ink, width);
        rightEdge = page.right;
        double below = ink.ascent(ink.small) + 20 * unit;
        double legendRoom = withLegend ? 2.4 * ink.height(ink.small) + 6 * unit : 0;
        boolean both = plan.part() == Part.BOTH;
        if (plan.part() == Part.SECTOR) {
            ringWindow = null;
            feedWindow = null;
            legendLeft = page.left;
            legendTop = bottom - legendRoom;
            double foot = legendRoom + barRoom + (bar ? 8 * unit : 0);
            barTop = bottom - legendRoom - 2.1 * ink.ascent(ink.small) - barHeight - 8 * unit;
            pressureBar = rectangle(page.left + 8 * unit, barTop, 0.6 * (rightEdge - page.left), barHeight);
            sectorWindow = rectangle(
                    page.left, top + heading, rightEdge - page.left - names, bottom - top - heading - foot - below);
        } else {
            double side = both
                    ? Math.min(bottom - top - barRoom, 0.46 * width - page.left)
                    : Math.min(bottom - top - barRoom - legendRoom, rightEdge - names - page.left - 50 * unit);
            double ringTop = both ? top + 0.5 * (bottom - top - barRoom - side) : top;
            double ringLeft = both ? page.left : 0.5 * (page.left + rightEdge - names - side);
            ringWindow = rectangle(ringLeft, ringTop, side, side);
            double legendBelow = both ? 0 : legendRoom;
            pressureBar = rectangle(ringLeft + 0.04 * side, barTop - legendBelow, 0.92 * side, barHeight);
            double left = page.left + side + 30 * unit;
            if (both) {
                double sectorWidth = rightEdge - left - names;
                double strip = 0.135 * height;
                double feedRoom = withFeed ? heading + strip + below : 0;
                double sectorHeight = bottom - top - heading - legendRoom - feedRoom - below;
                sectorWindow = rectangle(left, top + heading, sectorWidth, sectorHeight);
                feedWindow = withFeed ? rectangle(left, bottom - legendRoom - below - strip, sectorWidth, strip) : null;
                legendLeft = left;
            } else {
                sectorWindow = null;
                feedWindow = null;
                legendLeft = page.left;
            }
            legendTop = bottom - legendRoom + 4 * unit;
        }
        namesLeft = namedWindow().getMaxX() + (sectorWindow == null ? 40 : 22) * unit;

        double inner = 1e3 * shape.grid().innerRadius();
        double outer = 1e3 * shape.grid().outerRadius();
        boolean mirrored = settings.seenFrom() == ViewingSide.ROTOR;
        double span = outer - inner;
        double r = 0.5 * 1e-3 * (inner + outer);
        int row = shape.grid().row(r);
        middle = 0.5
                * (shape.grid().lineTheta(0, row, r)
                        + shape.grid().lineTheta(shape.grid().ni() - 1, row, r));
        ringScale = ringWindow == null ? 0 : 0.45 * ringWindow.width / outer;
        ring = ringWindow == null ? null : Camera.plan(0, 0, ringScale, Math.PI / 2, mirrored, ringWindow);
        ringChart = ring == null ? null : Chart.ring(ring);
        if (sectorWindow == null) {
            sectorScale = 0;
            sector = null;
            sectorChart = null;
        } else if (plan.part() == Part.SECTOR) {
            double along = 1e3 * r * shape.grid().pitch();
            sectorScale = Math.min(sectorWindow.height / (1.12 * span), sectorWindow.width / (1.06 * along));
            sector = Camera.plan(0, 0.5 * (inner + outer), sectorScale, Math.PI / 2, mirrored, sectorWindow);
            sectorChart = Chart.unrolled(sector, middle, r);
        } else {
            sectorScale = sectorWindow.height / (1.22 * span);
            // The face sinks towards the sides of the window: the middle is set a little above the face's own.
            double centre = 0.5 * (inner + outer) - 0.02 * span;
            sector = Camera.plan(
                    centre * Math.cos(middle), centre * Math.sin(middle), sectorScale, middle, mirrored, sectorWindow);
            sectorChart = Chart.ring(sector);
        }
    }

    private static double namesRoom(FilmShape shape, Ink ink, int width) {
        Conditions conditions = shape.flow().film().conditions();
        double names = Math.max(
                ink.width(ink.body, "land, without grooves"),
                ink.width(ink.body, "grooves, in the rotor") + 10 * ink.unit);
        String diameter = ", " + Words.diameter(0.1);
        for (String detail :
                new String[] {"Ø 000.0 – 000.0 mm", conditions.innerSide() + diameter, conditions.outerSide() + diameter
                }) {
            names = Math.max(names, ink.width(ink.small, detail));
        }
        return Math.min(0.21 * width, names + 48 * ink.unit);
    }

    /** The view that the names stand beside. */
    Rectangle namedWindow() {
        return sectorWindow == null ? ringWindow : sectorWindow;
    }

    /** How wide a legend may be. */
    double legendRoom() {
        return rightEdge - legendLeft;
    }

    private static Rectangle rectangle(double x, double y, double w, double h) {
        return new Rectangle((int) Math.round(x), (int) Math.round(y), (int) Math.max(8, Math.round(w)), (int)
                Math.max(8, Math.round(h)));
    }
}
