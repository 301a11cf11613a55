package org.whither.trace;

import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;

/**
 * Finds what there is at a point of a path, on the way or afterwards. A step that is to be asked later is kept as
 * {@value #STEP} numbers: the time of its start, its length and the share of it that was kept; column, row and layer of
 * the piece of film it runs in; whole sectors passed; and the continuous extension of three coordinates. For a step of
 * {@link Tracer} these are θ, r and σ, in the form of {@link DormandPrince54#extension}; for one of {@link BatchTracer} the
 * place as parts of the piece, each a polynomial of the fraction of the step. May be used by many threads.
 */
final class PointFinder {
    /** Where in a kept step the continuous extension starts. */
    static final int EXTENSION_AT = 7;

    /** How many numbers a kept step takes. */
    static final int STEP = EXTENSION_AT + 3 * DormandPrince54.EXTENSION;

    /** How many numbers tell where a point lies. */
    static final int PLACE = 6;

    private static final int WIDTH = DormandPrince54.EXTENSION;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final double pitch;
    private final double steadyTurn;
    private final double extent;
    private final int sign;
    private final boolean parts;

    /**
     * A finder.
     *
     * @param flow the film
     * @param frame frame of integration
     * @param direction with or against time
     * @param parts whether kept steps are those of the batch tracer
     */
    PointFinder(FilmFlow flow, Frame frame, Direction direction, boolean parts) {
        Film film = flow.film();
        this.flow = flow;
        this.grid = film.grid();
        this.pitch = grid.pitch();
        this.steadyTurn =
                film.steadyFrameSpeed() - frame.angularSpeed(film.conditions().rotationRate());
        this.extent = grid.outerRadius() - grid.innerRadius();
        this.sign = direction.sign();
        this.parts = parts;
    }

    /** Time of a point of a kept step, since the release (s). */
    static double time(double[] step, int at, double fraction) {
        return step[at] + fraction * step[at + 2] * step[at + 1];
    }

    private static double power(double[] step, int at, double f) {
        return step[at] + f * (step[at + 1] + f * (step[at + 2] + f * (step[at + 3] + f * step[at + 4])));
    }

    /** θ in the frame of integration, r and σ of a point of a kept step; into the last three numbers of a place. */
    private void locate(double[] step, int at, double fraction, double[] place) {
        double f = fraction * step[at + 2];
        int first = at + EXTENSION_AT;
        if (!parts) {
            place[3] = DormandPrince54.interpolate(step, first, f);
            place[4] = DormandPrince54.interpolate(step, first + WIDTH, f);
            place[5] = within(DormandPrince54.interpolate(step, first + 2 * WIDTH, f));
            return;
        }
        int i = (int) step[at + 3];
        int j = (int) step[at + 4];
        int k = (int) step[at + 5];
        double b = power(step, first + WIDTH, f);
        double inner = grid.radius(j);
        double r = inner + b * (grid.radius(j + 1) - inner);
        double left = (1 - b) * grid.theta(i, j) + b * grid.theta(i, j + 1);
        double right = (1 - b) * grid.theta(i + 1, j) + b * grid.theta(i + 1, j + 1);
        double steady = left + power(step, first, f) * (right - left) + step[at + 6] * pitch;
        double low = flow.level(k);
        place[3] = steady + steadyTurn * sign * time(step, at, fraction);
        place[4] = r;
        place[5] = within(low + power(step, first + 2 * WIDTH, f) * (flow.level(k + 1) - low));
    }

    /**
     * A point of a kept step.
     *
     * @param step holds the step; not modified
     * @param at where it starts
     * @param fraction 0 at its start, 1 at its end
     * @return the point
     */
    PathPoint point(double[] step, int at, double fraction) {
        double[] place = new double[PLACE];
        locate(step, at, fraction, place);
        return point(
                time(step, at, fraction),
                place[3],
                place[4],
                place[5],
                (int) step[at + 3],
                (int) step[at + 4],
                (int) step[at + 5],
                (long) step[at + 6]);
    }

    /**
     * Where a point of a kept step lies.
     *
     * @param step holds the step; not modified
     * @param at where it starts
     * @param fraction 0 at its start, 1 at its end
     * @param place height along the shaft (m), the film thickness (m), angle in the sector (rad), and, in the frame of
     *     integration, θ (rad), r (m) and σ; overwritten
     */
    void place(double[] step, int at, double fraction, double[] place) {
        locate(step, at, fraction, place);
        height(step, at, time(step, at, fraction), place);
    }

    /**
     * Turns the place at the end of one step into that at the start of the next, in another piece: the same but for what
     * jumps between pieces.
     *
     * @param step the next step; not modified
     * @param place see {@link #place}; its first three numbers are overwritten
     */
    void enter(double[] step, double[] place) {
        height(step, 0, step[0], place);
    }

    private void height(double[] step, int at, double since, double[] place) {
        double inSector = steadyTheta(since, place[3]) - step[at + 6] * pitch;
        int i = (int) step[at + 3];
        int j = (int) step[at + 4];
        double h = flow.thickness(i, j, inSector, place[4]);
        place[0] = flow.rotorZ(i, j, inSector, place[4]) + place[5] * h;
        place[1] = h;
        place[2] = inSector;
    }

    /**
     * How far a kept step bends away from its chord at most, from the coefficients of its continuous extension.
     *
     * @param step the step; not modified
     * @param start where it starts; see {@link #place}
     * @param end where it ends
     * @return part of the radial extent in the plane of the faces, or of the film thickness across, whichever is larger
     */
    double bend(double[] step, double[] start, double[] end) {
        double share = step[2] * step[2];
        double first = share * bend(step, EXTENSION_AT);
        double second = share * bend(step, EXTENSION_AT + WIDTH);
        double third = share * bend(step, EXTENSION_AT + 2 * WIDTH);
        double r = end[4];
        double around = first;
        double out = second;
        double across = third;
        if (parts) {
            int i = (int) step[3];
            int j = (int) step[4];
            int k = (int) step[5];
            double depth = grid.radius(j + 1) - grid.radius(j);
            double width = grid.theta(i + 1, j) - grid.theta(i, j);
            double widening = grid.theta(i + 1, j + 1) - grid.theta(i, j + 1) - width;
            around = first * (Math.abs(width) + Math.abs(widening))
                    + second * Math.abs(grid.theta(i, j + 1) - grid.theta(i, j))
                    + 0.25 * Math.abs(widening);
            out = second * depth;
            across = third * (flow.level(k + 1) - flow.level(k));
        }
        // In the plane, an arc of angle φ is r φ²/8 from its chord, and a turning radius adds Δr φ/4.
        double turn = Math.abs(end[3] - start[3]);
        double rise = Math.abs(end[4] - start[4]);
        double plane = r * around + out + 0.125 * r * turn * turn + 0.25 * rise * turn;
        // Of a height σ h, the product of what both change.
        double height = 0.25 * Math.abs(end[5] - start[5]) * Math.abs(end[1] - start[1]) / Math.min(start[1], end[1]);
        return Math.max(plane / extent, across + height);
    }

    /** Largest distance of a polynomial of 0 … 1 from its chord, at most: f (1 − f) ≤ 1/4, f − f³ ≤ 0.385, f − f⁴ ≤ 0.473. */
    private double bend(double[] step, int at) {
        double second = Math.abs(step[at + 2]);
        double third = Math.abs(step[at + 3]);
        double fourth = Math.abs(step[at + 4]);
        return parts ? 0.25 * second + 0.385 * third + 0.473 * fourth : 0.25 * (second + third + 0.25 * fourth);
    }

    private double steadyTheta(double since, double theta) {
        return theta - steadyTurn * sign * since;
    }

    private static double within(double sigma) {
        return Math.max(0, Math.min(1, sigma));
    }

    /** A point of a path: its time and state, the piece of film that it runs in, and the sectors passed. */
    PathPoint point(double since, double theta, double r, double height, int i, int j, int k, long sectorsPassed) {
        double steady = steadyTheta(since, theta);
        double inSector = steady - sectorsPassed * pitch;
        double sigma = within(height);
        double[] rates = new double[3];
        flow.rates(i, j, k, inSector, r, sigma, rates);
        double h = flow.thickness(i, j, inSector, r);
        double around = r * (rates[0] + steadyTurn);
        double across = h * rates[2];
        double speed = Math.sqrt(around * around + rates[1] * rates[1] + across * across);
        return new PathPoint(
                since,
                theta,
                steady,
                r,
                flow.rotorZ(i, j, inSector, r) + sigma * h,
                sigma,
                speed,
                flow.pressure(i, j, k, inSector, r, sigma));
    }
}
