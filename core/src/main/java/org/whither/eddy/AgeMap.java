package org.whither.eddy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.function.DoubleConsumer;
import java.util.stream.IntStream;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * How long the gas at each place has been in the film: the time since it entered, found by following it back from points
 * of the film to where it came in. The points lie at the middles of equal parts of the sector's phase, of the radius and
 * of the film thickness.
 *
 * <p>Gas at a face is held by it, so the mean age of a column of gas is infinite (its age goes as 1/σ there): columns are
 * told by quantiles.
 */
public final class AgeMap {
    private final FilmGrid grid;
    private final int phases;
    private final int radii;
    private final int heights;
    private final double limit;
    /** phases × radii × heights, row-major (s). */
    private final double[] age;
    /** Gas of each point, likewise (kg). */
    private final double[] mass;

    private AgeMap(FilmFlow flow, int phases, int radii, int heights, double limit) {
        this.grid = flow.film().grid();
        this.phases = phases;
        this.radii = radii;
        this.heights = heights;
        this.limit = limit;
        this.age = new double[phases * radii * heights];
        this.mass = new double[age.length];
    }

    /**
     * Maps the age of the gas.
     *
     * @param flow the motion of the gas
     * @param how how tracers are followed; its direction does not count, gas older than its time limit is told as such
     * @param phases points round the sector
     * @param radii points along the radius
     * @param heights points across the film: at (n + ½)/heights of the film thickness
     * @param threads how many threads
     * @param progress told the part done, 0 … 1, from any thread
     * @return the map
     */
    public static AgeMap of(
            FilmFlow flow,
            TraceSettings how,
            int phases,
            int radii,
            int heights,
            int threads,
            DoubleConsumer progress) {
        if (phases < 1 || radii < 1 || heights < 1) {
            throw new IllegalArgumentException(
                    phases + " × " + radii + " × " + heights + " points; expected at least one each way");
        }
        AgeMap map = new AgeMap(flow, phases, radii, heights, how.timeLimit());
        Spot spot = new Spot(flow);
        List<Release> releases = new ArrayList<>(map.age.length);
        for (int p = 0; p < phases; p++) {
            for (int q = 0; q < radii; q++) {
                for (int s = 0; s < heights; s++) {
                    spot.goPhase((p + 0.5) / phases, map.radius(q), map.sigma(s));
                    map.mass[map.index(p, q, s)] = spot.massDensity()
                            * map.grid.pitch()
                            / phases
                            * (map.grid.outerRadius() - map.grid.innerRadius())
                            / radii
                            / heights;
                    releases.add(new Release(spot.theta(), map.radius(q), map.sigma(s), 0));
                }
            }
        }
        TraceSettings back = new TraceSettings(how.frame(), Direction.BACKWARD, how.tolerance(), how.timeLimit());
        List<PathEnd> ends = ParallelTracing.follow(
                        flow, back, releases, threads, n -> progress.accept((double) n / releases.size()))
                .ends();
        for (int n = 0; n < map.age.length; n++) {
            PathEnd end = ends.get(n);
            map.age[n] = end instanceof PathEnd.Left
                    ? end.time()
                    : end instanceof PathEnd.StillInside ? Double.POSITIVE_INFINITY : Double.NaN;
        }
        return map;
    }

    private int index(int p, int q, int s) {
        return (p * radii + q) * heights + s;
    }

    /** Points round the sector. */
    public int phases() {
        return phases;
    }

    /** Points along the radius. */
    public int radii() {
        return radii;
    }

    /** Points across the film. */
    public int heights() {
        return heights;
    }

    /** Age beyond which gas is only told to be older (s). */
    public double limit() {
        return limit;
    }

    /** Angle of point p at radius point q, in the frame in which the film is steady (rad). */
    public double theta(int p, int q) {
        double r = radius(q);
        return grid.lineTheta(0, grid.row(r), r) + (p + 0.5) / phases * grid.pitch();
    }

    /** Radius of point q (m). */
    public double radius(int q) {
        return grid.innerRadius() + (q + 0.5) / radii * (grid.outerRadius() - grid.innerRadius());
    }

    /** Height of point s as a fraction of the film thickness. */
    public double sigma(int s) {
        return (s + 0.5) / heights;
    }

    /** The point across the film nearest to a height. */
    public int height(double sigma) {
        return Math.max(0, Math.min(heights - 1, (int) Math.floor(sigma * heights)));
    }

    /**
     * Age of the gas at a point.
     *
     * @return age (s); infinite where it is older than the limit, not a number where its tracer could not be followed
     */
    public double age(int p, int q, int s) {
        return age[index(p, q, s)];
    }

    /**
     * A quantile of the age of a column of gas, weighted by mass.
     *
     * @param p point round the sector
     * @param q point along the radius
     * @param share share of the column's gas that is younger, such as 0.5 for the median
     * @return age (s); infinite where that is older than the limit, not a number where no tracer could be followed
     */
    public double column(int p, int q, double share) {
        return quantile(index(p, q, 0), index(p, q, 0) + heights, share);
    }

    /**
     * Age of the gas at any place: the column's median, or that of one height, interpolated between the points.
     *
     * @param theta angle, of any sector (rad)
     * @param r radius (m)
     * @param s point across the film, or −1 for the column's median
     * @return age (s); of the nearest point where one of those around has no number or is older than the limit
     */
    public double at(double theta, double r, int s) {
        double phase = (theta - grid.lineTheta(0, grid.row(r), r)) / grid.pitch();
        double x = (phase - Math.floor(phase)) * phases - 0.5;
        double y = (r - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius()) * radii - 0.5;
        y = Math.max(0, Math.min(radii - 1, y));
        int p = (int) Math.floor(x);
        int q = Math.min((int) Math.floor(y), Math.max(0, radii - 2));
        double a = x - p;
        double b = y - q;
        int q1 = Math.min(q + 1, radii - 1);
        double low = (1 - a) * value(p, q, s) + a * value(p + 1, q, s);
        double high = (1 - a) * value(p, q1, s) + a * value(p + 1, q1, s);
        double mixed = (1 - b) * low + b * high;
        return Double.isNaN(mixed) || Double.isInfinite(mixed)
                ? value(a < 0.5 ? p : p + 1, b < 0.5 ? q : q1, s)
                : mixed;
    }

    private double value(int p, int q, int s) {
        int wrapped = Math.floorMod(p, phases);
        return s < 0 ? column(wrapped, q, 0.5) : age(wrapped, q, s);
    }

    /** A quantile of the age of all gas of the film, weighted by mass; as {@link #column}. */
    public double film(double share) {
        return quantile(0, age.length, share);
    }

    /** A quantile of the age of all gas at one radius, weighted by mass; as {@link #column}. */
    public double ring(int q, double share) {
        int[] those = new int[phases * heights];
        for (int n = 0; n < those.length; n++) {
            those[n] = index(n / heights, q, n % heights);
        }
        return quantile(those, share);
    }

    private double quantile(int from, int to, double share) {
        return quantile(IntStream.range(from, to).toArray(), share);
    }

    private double quantile(int[] those, double share) {
        Integer[] order = new Integer[those.length];
        double total = 0;
        int known = 0;
        for (int n : those) {
            if (!Double.isNaN(age[n])) {
                order[known++] = n;
                total += mass[n];
            }
        }
        if (known == 0) {
            return Double.NaN;
        }
        Arrays.sort(order, 0, known, (m, n) -> Double.compare(age[m], age[n]));
        // Each point stands for the gas half before and half after it.
        double below = 0;
        double wanted = share * total;
        for (int n = 0; n < known; n++) {
            double middle = below + 0.5 * mass[order[n]];
            if (middle >= wanted) {
                if (n == 0 || Double.isInfinite(age[order[n]])) {
                    return age[order[n]];
                }
                double before = below - 0.5 * mass[order[n - 1]];
                double part = (wanted - before) / (middle - before);
                return age[order[n - 1]] + part * (age[order[n]] - age[order[n - 1]]);
            }
            below += mass[order[n]];
        }
        return age[order[known - 1]];
    }
}
