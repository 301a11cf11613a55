package org.whither.render;

import java.util.ArrayList;
import java.util.List;

/**
 * Stream lines of a plane flow, about evenly far apart: a line starts wherever there is room for one, and ends where it
 * comes too near to another (B. Jobard, W. Lefer, Creating evenly-spaced streamlines of arbitrary density, Visualization
 * in Scientific Computing, 1997).
 */
final class EvenLines {
    /** Share of the distance at which a line that comes near another ends. */
    private static final double NEAR = 0.5;

    /** Length of a step, as a share of the distance. */
    private static final double STEP = 0.12;

    private static final int MOST_STEPS = 5000;

    /** The direction of the flow at a point of the picture, and whether there is one. */
    interface Direction {
        /**
         * The direction at a point.
         *
         * @param at x and y (pixels); not modified
         * @param way unit direction; overwritten
         * @return whether there is flow there
         */
        boolean of(double[] at, double[] way);
    }

    private final Direction direction;
    private final double apart;
    private final double left;
    private final double top;
    private final int columns;
    private final List<List<double[]>> cells = new ArrayList<>();

    EvenLines(Direction direction, double left, double top, double width, double height, double apart) {
        this.direction = direction;
        this.apart = apart;
        this.left = left;
        this.top = top;
        this.columns = (int) Math.ceil(width / apart) + 1;
        int rows = (int) Math.ceil(height / apart) + 1;
        for (int n = 0; n < columns * rows; n++) {
            cells.add(new ArrayList<>());
        }
    }

    private int cell(double x, double y) {
        int column = Math.max(0, Math.min(columns - 1, (int) ((x - left) / apart)));
        int row = Math.max(0, Math.min(cells.size() / columns - 1, (int) ((y - top) / apart)));
        return row * columns + column;
    }

    private boolean free(double x, double y, double distance) {
        int at = cell(x, y);
        for (int dy = -1; dy <= 1; dy++) {
            for (int dx = -1; dx <= 1; dx++) {
                int n = at + dy * columns + dx;
                if (n < 0 || n >= cells.size()) {
                    continue;
                }
                for (double[] p : cells.get(n)) {
                    if (Math.hypot(p[0] - x, p[1] - y) < distance) {
                        return false;
                    }
                }
            }
        }
        return true;
    }

    /**
     * The lines.
     *
     * @param seeds points at which lines may start, x and y of each, tried in turn
     * @return lines along the flow, x and y of their points in turn
     */
    List<double[]> from(List<double[]> seeds) {
        List<double[]> lines = new ArrayList<>();
        for (double[] seed : seeds) {
            if (!free(seed[0], seed[1], apart)) {
                continue;
            }
            List<double[]> back = half(seed, -1);
            List<double[]> on = half(seed, 1);
            if (back.size() + on.size() < 4 / STEP) {
                continue;
            }
            List<double[]> line = new ArrayList<>();
            for (int n = back.size() - 1; n >= 0; n--) {
                line.add(back.get(n));
            }
            line.add(seed);
            line.addAll(on);
            double[] points = new double[2 * line.size()];
            for (int n = 0; n < line.size(); n++) {
                points[2 * n] = line.get(n)[0];
                points[2 * n + 1] = line.get(n)[1];
                cells.get(cell(points[2 * n], points[2 * n + 1])).add(line.get(n));
            }
            lines.add(points);
        }
        return lines;
    }

    private List<double[]> half(double[] seed, int sign) {
        List<double[]> line = new ArrayList<>();
        double[] at = seed.clone();
        double[] way = new double[2];
        double[] middle = new double[2];
        double[] before = new double[2];
        double step = STEP * apart;
        for (int n = 0; n < MOST_STEPS; n++) {
            // Where the flow stands still it runs to and fro at neighbouring points: a line ends there.
            if (!direction.of(at, way) || before[0] * way[0] + before[1] * way[1] < 0) {
                break;
            }
            before[0] = way[0];
            before[1] = way[1];
            middle[0] = at[0] + 0.5 * sign * step * way[0];
            middle[1] = at[1] + 0.5 * sign * step * way[1];
            if (!direction.of(middle, way) || before[0] * way[0] + before[1] * way[1] < 0) {
                break;
            }
            double[] next = {at[0] + sign * step * way[0], at[1] + sign * step * way[1]};
            // A line that closes upon itself ends after one round.
            boolean closed = n > 3 / STEP && Math.hypot(next[0] - seed[0], next[1] - seed[1]) < step;
            if (!free(next[0], next[1], NEAR * apart)) {
                break;
            }
            line.add(next);
            at = next;
            if (closed) {
                break;
            }
        }
        return line;
    }
}
