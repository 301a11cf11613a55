package org.whither.trace;

import java.util.Arrays;
import org.whither.film.Film;

/**
 * One way of a path from its release, as points by rising time since the release, which it takes from the steps handed to
 * it: those that a tolerance asks for as the steps come, or those at given times once the steps are known.
 *
 * <p>To keep within a tolerance it leaves out points that straight lines between the others replace. From the last point
 * taken, a range of slopes of each coordinate against time leads past every later point within the tolerance; the latest
 * point whose own slopes lie in those ranges is the next to be taken. Each point is looked at once, whatever the length of
 * the line.
 */
final class Strand {
    /** Share of the tolerance that goes to the bend of the path between two points looked at. */
    private static final double BEND = 0.2;

    private static final int MOST_PARTS = 256;
    private static final int COORDINATES = 4;

    private final PointFinder finder;
    private final double tolerance;
    private final int mostKept;
    private final double extent;

    /** Points taken, {@link SampledPath#COLUMNS} numbers each. */
    double[] points = new double[32 * SampledPath.COLUMNS];
    /** How many points were taken. */
    int count;

    // Steps kept, where points at given times are wanted.
    private double[] steps;
    private int kept;
    private boolean all = true;
    private double[] wanted;
    private int next;

    // The line on its way: x, y (m), z (m) and σ of the point taken last and of the latest one.
    private double[] anchor;
    private double[] latest;
    private double[] probe;
    private double[] low;
    private double[] high;
    private double[] start;
    private double[] end;
    private double[] latestStep;
    private double latestFraction;
    private double latestTime;
    private double anchorTime;
    private boolean begun;
    private boolean latestTaken = true;

    /**
     * A strand.
     *
     * @param finder finds the points of steps
     * @param film the film
     * @param tolerance as in {@link PointSpacing.Within}; 0 where points at given times are wanted
     * @param mostKept how many steps are kept
     */
    Strand(PointFinder finder, Film film, double tolerance, int mostKept) {
        this.finder = finder;
        this.tolerance = tolerance;
        this.mostKept = mostKept;
        this.extent = film.grid().outerRadius() - film.grid().innerRadius();
        if (tolerance > 0) {
            anchor = new double[COORDINATES];
            latest = new double[COORDINATES];
            probe = new double[COORDINATES];
            low = new double[COORDINATES];
            high = new double[COORDINATES];
            start = new double[PointFinder.PLACE];
            end = new double[PointFinder.PLACE];
            latestStep = new double[PointFinder.STEP];
        } else {
            steps = new double[64 * PointFinder.STEP];
        }
    }

    /** Hands over the next step; it is copied. */
    void step(double[] step) {
        if (tolerance > 0) {
            thin(step);
        } else if (kept == mostKept) {
            all = false;
        } else {
            if ((kept + 1) * PointFinder.STEP > steps.length) {
                steps = Arrays.copyOf(steps, 2 * steps.length);
            }
            System.arraycopy(step, 0, steps, kept++ * PointFinder.STEP, PointFinder.STEP);
        }
    }

    /** Tells that there is no further step. */
    void end() {
        if (!latestTaken) {
            takeLatest();
        }
    }

    private void add(PathPoint point) {
        int at = count++ * SampledPath.COLUMNS;
        if (at == points.length) {
            points = Arrays.copyOf(points, 2 * at);
        }
        points[at] = point.time();
        points[at + 1] = point.theta();
        points[at + 2] = point.radius();
        points[at + 3] = point.z();
        points[at + 4] = point.sigma();
        points[at + 5] = point.speed();
        points[at + 6] = point.pressure();
    }

    // ---- points at given times -------------------------------------------------------------------------------------

    /** Takes points at times since the release, which rise, from the steps kept; false where not all were. */
    boolean takeKept(double[] times) {
        wanted = times;
        next = 0;
        if (!all) {
            return false;
        }
        for (int n = 0; n < kept; n++) {
            take(steps, n * PointFinder.STEP, n == kept - 1);
        }
        steps = null;
        return true;
    }

    /** Takes those points that lie in a step, of a path followed again. */
    void take(double[] step) {
        System.arraycopy(step, 0, steps, 0, PointFinder.STEP);
        take(steps, 0, false);
    }

    /** Takes what rounding has left of the points wanted, at the end of the last step. */
    void takeRest() {
        take(steps, 0, true);
        steps = null;
    }

    private void take(double[] step, int at, boolean last) {
        double from = step[at];
        double length = step[at + 2] * step[at + 1];
        while (next < wanted.length && (last || wanted[next] <= from + length)) {
            double fraction = length > 0 ? Math.max(0, Math.min(1, (wanted[next] - from) / length)) : 0;
            add(finder.point(step, at, fraction));
            next++;
        }
    }

    // ---- points within a tolerance ---------------------------------------------------------------------------------

    private void thin(double[] step) {
        if (!begun) {
            begun = true;
            finder.place(step, 0, 0, start);
            look(step, 0, start);
            takeLatest();
        } else if (step[3] != latestStep[3] || step[4] != latestStep[4] || step[5] != latestStep[5]) {
            finder.enter(step, start);
            if (Math.abs(start[0] - latest[2]) > 0.05 * tolerance * start[1]) {
                if (!latestTaken) {
                    takeLatest();
                }
                look(step, 0, start);
                takeLatest();
            }
        }
        finder.place(step, 0, 1, end);
        double bend = finder.bend(step, start, end);
        int parts = bend <= BEND * tolerance
                ? 1
                : (int) Math.min(MOST_PARTS, Math.ceil(Math.sqrt(bend / (BEND * tolerance))));
        for (int n = 1; n < parts; n++) {
            double fraction = (double) n / parts;
            finder.place(step, 0, fraction, start);
            consider(step, fraction, start);
        }
        consider(step, 1, end);
        double[] free = start;
        start = end; // where the next step starts
        end = free;
    }

    private void consider(double[] step, double fraction, double[] place) {
        double time = PointFinder.time(step, 0, fraction);
        if (!(time > latestTime)) {
            return; // a step of no length
        }
        flat(place, probe);
        if (!latestTaken && !reachable(time)) {
            takeLatest();
        }
        double perSpan = 1 / (time - anchorTime);
        double part = (1 - BEND) * tolerance;
        for (int c = 0; c < COORDINATES; c++) {
            double slack = part * (c < 2 ? extent : c == 2 ? place[1] : 1);
            double from = probe[c] - anchor[c];
            low[c] = Math.max(low[c], (from - slack) * perSpan);
            high[c] = Math.min(high[c], (from + slack) * perSpan);
        }
        look(step, fraction, time);
        double[] free = latest;
        latest = probe;
        probe = free;
        latestTaken = false;
    }

    private static void flat(double[] place, double[] coordinates) {
        coordinates[0] = place[4] * Math.cos(place[3]);
        coordinates[1] = place[4] * Math.sin(place[3]);
        coordinates[2] = place[0];
        coordinates[3] = place[5];
    }

    private boolean reachable(double time) {
        double perSpan = 1 / (time - anchorTime);
        for (int c = 0; c < COORDINATES; c++) {
            double slope = (probe[c] - anchor[c]) * perSpan;
            if (!(slope >= low[c] && slope <= high[c])) {
                return false;
            }
        }
        return true;
    }

    private void look(double[] step, double fraction, double[] place) {
        look(step, fraction, PointFinder.time(step, 0, fraction));
        flat(place, latest);
    }

    private void look(double[] step, double fraction, double time) {
        System.arraycopy(step, 0, latestStep, 0, PointFinder.STEP);
        latestFraction = fraction;
        latestTime = time;
    }

    private void takeLatest() {
        add(finder.point(latestStep, 0, latestFraction));
        latestTaken = true;
        anchorTime = latestTime;
        System.arraycopy(latest, 0, anchor, 0, COORDINATES);
        Arrays.fill(low, Double.NEGATIVE_INFINITY);
        Arrays.fill(high, Double.POSITIVE_INFINITY);
    }
}
