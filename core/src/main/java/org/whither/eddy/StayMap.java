package org.whither.eddy;

import java.util.Arrays;
import java.util.List;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Direction;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;
import org.whither.trace.PathStep;
import org.whither.trace.Release;
import org.whither.trace.StepObserver;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/** Where gas spends its time: the steps of its paths, spread over equal parts of phase, radius and film thickness. */
final class StayMap implements StepObserver {
    private static final int PHASES = 48;
    private static final int RADII = 48;
    private static final int HEIGHTS = 20;

    private final FilmGrid grid;
    private final double[] time = new double[PHASES * RADII * HEIGHTS];
    private PathPoint before;

    private StayMap(FilmGrid grid) {
        this.grid = grid;
    }

    /**
     * The through-going gas that stays longest.
     *
     * @param flow the motion of the gas
     * @param settings how it is followed
     * @param test knows the through-going gas
     * @param share which share of it
     */
    static LongStayers longest(FilmFlow flow, EddySettings settings, HoldTest test, double share) {
        double[] residence = test.residence();
        Integer[] order = new Integer[residence.length];
        Arrays.setAll(order, n -> n);
        Arrays.sort(order, (m, n) -> Double.compare(residence[n], residence[m]));
        int count = Math.max(1, (int) Math.round(share * residence.length));
        double limit = 0;
        for (double time : residence) {
            limit = Math.max(limit, Double.isInfinite(time) ? 0 : time);
        }
        StayMap map = new StayMap(flow.film().grid());
        Tracer tracer = new Tracer(
                flow, new TraceSettings(flow.film().steadyIn(), Direction.FORWARD, settings.tolerance(), 1.01 * limit));
        double[] from = new double[PathEnd.Border.values().length];
        double[] times = new double[count];
        for (int n = 0; n < count; n++) {
            Release release = test.entering().get(order[n]);
            from[test.border(order[n]).ordinal()] += 1.0 / count;
            times[n] = residence[order[n]];
            map.before = null;
            tracer.follow(release, map);
        }
        return map.told(share, times, from);
    }

    @Override
    public void step(PathStep step) {
        if (before == null) {
            before = step.at(0);
        }
        PathPoint after = step.at(1);
        double r = 0.5 * (before.radius() + after.radius());
        double theta = 0.5 * (before.steadyTheta() + after.steadyTheta());
        double sigma = 0.5 * (before.sigma() + after.sigma());
        double phase = (theta - grid.lineTheta(0, grid.row(r), r)) / grid.pitch();
        int p = bin(phase - Math.floor(phase), PHASES);
        int q = bin((r - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius()), RADII);
        time[(p * RADII + q) * HEIGHTS + bin(sigma, HEIGHTS)] += after.time() - before.time();
        before = after;
    }

    private static int bin(double share, int bins) {
        return Math.max(0, Math.min(bins - 1, (int) Math.floor(share * bins)));
    }

    private LongStayers told(double share, double[] times, double[] from) {
        double total = Arrays.stream(time).sum();
        Double[] map = new Double[PHASES * RADII];
        Double[] across = new Double[HEIGHTS];
        Arrays.fill(map, 0.0);
        Arrays.fill(across, 0.0);
        int most = 0;
        for (int n = 0; n < time.length; n++) {
            map[n / HEIGHTS] += time[n] / total;
            across[n % HEIGHTS] += time[n] / total;
            most = time[n] > time[most] ? n : most;
        }
        int p = most / HEIGHTS / RADII;
        int q = most / HEIGHTS % RADII;
        double r = grid.innerRadius() + (q + 0.5) / RADII * (grid.outerRadius() - grid.innerRadius());
        Place place = new Place(
                grid.lineTheta(0, grid.row(r), r) + (p + 0.5) / PHASES * grid.pitch(),
                r,
                (most % HEIGHTS + 0.5) / HEIGHTS);
        return new LongStayers(
                share,
                times[times.length - 1],
                times[times.length / 2],
                from[PathEnd.Border.SUPPLY.ordinal()],
                from[PathEnd.Border.INNER.ordinal()],
                from[PathEnd.Border.OUTER.ordinal()],
                PHASES,
                RADII,
                List.of(map),
                List.of(across),
                place,
                times.length);
    }
}
