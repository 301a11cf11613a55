package org.whither.trace;

import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;

/**
 * Finds what there is at a point of a path, on the way or afterwards. A step that is to be asked later is kept as
 * {@value #STEP} numbers: the time of its start, its length and the share of it that was kept; column, row and layer of
 * the piece of film it runs in; whole sectors passed; and the continuous extension of the three components of its state.
 * May be used by many threads.
 */
final class PointFinder {
    /** Where in a kept step the continuous extension starts. */
    static final int EXTENSION_AT = 7;

    /** How many numbers a kept step takes. */
    static final int STEP = EXTENSION_AT + 3 * DormandPrince54.EXTENSION;

    private final FilmFlow flow;
    private final double pitch;
    private final double steadyTurn;
    private final int sign;

    PointFinder(FilmFlow flow, Frame frame, Direction direction) {
        Film film = flow.film();
        this.flow = flow;
        this.pitch = film.grid().pitch();
        this.steadyTurn =
                film.steadyFrameSpeed() - frame.angularSpeed(film.conditions().rotationRate());
        this.sign = direction.sign();
    }

    /** Time of a point of a kept step, since the release (s). */
    static double time(double[] step, int at, double fraction) {
        return step[at] + fraction * step[at + 2] * step[at + 1];
    }

    /** One component of the state, 0 θ, 1 r, 2 σ, at a point of a kept step. */
    static double state(double[] step, int at, double fraction, int component) {
        return DormandPrince54.interpolate(
                step, at + EXTENSION_AT + component * DormandPrince54.EXTENSION, fraction * step[at + 2]);
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
        return point(
                time(step, at, fraction),
                state(step, at, fraction, 0),
                state(step, at, fraction, 1),
                state(step, at, fraction, 2),
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
     * @param place x and y in the plane of the faces, in the frame of integration (m), height along the shaft (m), height
     *     as a fraction of the film thickness, and that thickness (m); overwritten
     */
    void place(double[] step, int at, double fraction, double[] place) {
        double theta = state(step, at, fraction, 0);
        double r = state(step, at, fraction, 1);
        double sigma = within(state(step, at, fraction, 2));
        double inSector = steadyTheta(time(step, at, fraction), theta) - step[at + 6] * pitch;
        int i = (int) step[at + 3];
        int j = (int) step[at + 4];
        double h = flow.thickness(i, j, inSector, r);
        place[0] = r * Math.cos(theta);
        place[1] = r * Math.sin(theta);
        place[2] = flow.rotorZ(i, j, inSector, r) + sigma * h;
        place[3] = sigma;
        place[4] = h;
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
