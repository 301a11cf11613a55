package org.whither.render;

import java.awt.Rectangle;
import java.awt.Shape;
import java.util.List;
import org.whither.eddy.Zone;
import org.whither.film.FilmGrid;

/** Zones of held gas in a plan: how far each reaches round and along the radius, hatched, with a dashed outline. */
final class PlanZones {
    private static final double WHOLE = 2 * Math.PI * (1 - 1e-9);

    private final List<Zone> zones;
    private final FilmGrid grid;

    PlanZones(List<Zone> zones, FilmGrid grid) {
        this.zones = zones;
        this.grid = grid;
    }

    /** Draws all that lies in a window; the pen is clipped to it already. */
    void draw(Ink ink, Chart chart, Rectangle window, boolean numbered) {
        for (int n = 0; n < zones.size(); n++) {
            Zone zone = zones.get(n);
            double low = zone.radius().low();
            double high = zone.radius().high();
            if (zone.theta().length() >= WHOLE) {
                hatch(ink, chart.band(low, high), window);
                Meridian.zoneLine(ink, chart.circle(low));
                Meridian.zoneLine(ink, chart.circle(high));
            } else {
                for (int copy = 0; copy < zone.count(); copy++) {
                    for (double turn : turns(chart, 2 * Math.PI * copy / zone.count())) {
                        Shape patch = chart.patch(
                                zone.theta().low() + turn, zone.theta().high() + turn, low, high);
                        if (patch.intersects(window)) {
                            hatch(ink, patch, window);
                            Meridian.zoneLine(ink, patch);
                        }
                    }
                }
            }
            if (numbered && zones.size() > 1) {
                number(ink, chart, window, zone, n + 1);
            }
        }
    }

    /** An unrolled face goes on beyond one turn to either side. */
    private static double[] turns(Chart chart, double turn) {
        return chart.isUnrolled() ? new double[] {turn - 2 * Math.PI, turn} : new double[] {turn};
    }

    private void number(Ink ink, Chart chart, Rectangle window, Zone zone, int number) {
        for (int copy = 0; copy < grid.sectors(); copy++) {
            for (double turn : turns(chart, copy * grid.pitch())) {
                var p = chart.at(zone.centre().theta() + turn, zone.centre().radius());
                if (window.contains(p)) {
                    ink.writeOver(
                            ink.heading,
                            0x000000,
                            0xffffff,
                            Integer.toString(number),
                            p.getX(),
                            p.getY() + 0.36 * ink.heading.getSize2D(),
                            0,
                            Ink.Side.MIDDLE);
                }
            }
        }
    }

    /** Hatches a shape, light on dark: it lies over any colour. */
    static void hatch(Ink ink, Shape shape, Rectangle window) {
        Shape before = ink.pen.getClip();
        ink.pen.clip(shape);
        double apart = 11 * ink.unit;
        double high = window.height;
        for (double x = window.x - high; x < window.getMaxX(); x += apart) {
            ink.colour(0xffffff, 0.45);
            ink.stroke(2.4 * ink.unit);
            ink.line(x, window.getMaxY(), x + high, window.y);
            ink.colour(Plan.DARK, 0.85);
            ink.stroke(1.1 * ink.unit);
            ink.line(x, window.getMaxY(), x + high, window.y);
        }
        ink.pen.setClip(before);
    }

    /** The sign of the legend. */
    void legend(Legend legend) {
        if (!zones.isEmpty()) {
            legend.add(
                    (x, y) -> {
                        Ink ink = legend.ink();
                        double u = ink.unit;
                        Rectangle sign = new Rectangle(
                                (int) Math.round(x - 8 * u),
                                (int) Math.round(y - 5 * u),
                                (int) Math.round(16 * u),
                                (int) Math.round(10 * u));
                        ink.colour(0xc8ced3);
                        ink.pen.fill(sign);
                        hatch(ink, sign, sign);
                        Meridian.zoneLine(ink, sign);
                    },
                    zones.size() == 1 ? "held gas (zone)" : "held gas (zones)");
        }
    }
}
