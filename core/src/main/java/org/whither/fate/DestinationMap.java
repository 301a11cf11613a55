package org.whither.fate;

import java.util.ArrayList;
import java.util.List;
import java.util.function.DoubleConsumer;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * Where the gas at each place of the face goes: the ends of tracers released at one height of the film, at the middles of
 * equal parts of the sector's phase and of the radius, followed forward.
 */
public final class DestinationMap {
    private final FilmGrid grid;
    private final int phases;
    private final int radii;
    private final double sigma;
    private final Destination[] destinations;

    private DestinationMap(FilmGrid grid, int phases, int radii, double sigma) {
        this.grid = grid;
        this.phases = phases;
        this.radii = radii;
        this.sigma = sigma;
        this.destinations = new Destination[phases * radii];
    }

    /**
     * Maps where the gas goes.
     *
     * @param flow the motion of the gas
     * @param how how tracers are followed; its direction does not count
     * @param phases points round the sector
     * @param radii points along the radius
     * @param sigma height of the points as a fraction of the film thickness, 0 … 1
     * @param threads how many threads
     * @param progress told the part done, 0 … 1, from any thread
     * @return the map
     */
    public static DestinationMap of(
            FilmFlow flow,
            TraceSettings how,
            int phases,
            int radii,
            double sigma,
            int threads,
            DoubleConsumer progress) {
        if (phases < 1 || radii < 1 || !(sigma > 0 && sigma < 1)) {
            throw new IllegalArgumentException(phases + " × " + radii + " points at " + sigma
                    + " of the film thickness; expected at least one each way, and a height between 0 and 1");
        }
        DestinationMap map = new DestinationMap(flow.film().grid(), phases, radii, sigma);
        List<Release> releases = new ArrayList<>(phases * radii);
        for (int p = 0; p < phases; p++) {
            for (int q = 0; q < radii; q++) {
                releases.add(new Release(map.theta(p, q), map.radius(q), sigma, 0));
            }
        }
        TraceSettings forward = new TraceSettings(how.frame(), Direction.FORWARD, how.tolerance(), how.timeLimit());
        List<PathEnd> ends = ParallelTracing.follow(
                        flow, forward, releases, threads, n -> progress.accept((double) n / releases.size()))
                .ends();
        for (int n = 0; n < ends.size(); n++) {
            map.destinations[n] = Destination.of(ends.get(n));
        }
        return map;
    }

    /** Points round the sector. */
    public int phases() {
        return phases;
    }

    /** Points along the radius. */
    public int radii() {
        return radii;
    }

    /** Height of the points as a fraction of the film thickness. */
    public double sigma() {
        return sigma;
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

    /** Where the gas of a point goes. */
    public Destination destination(int p, int q) {
        return destinations[p * radii + q];
    }

    /** Where the gas goes of the point nearest to a place of any sector (rad, m). */
    public Destination at(double theta, double r) {
        double share = (r - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius());
        int q = Math.max(0, Math.min(radii - 1, (int) Math.floor(share * radii)));
        double phase = (theta - grid.lineTheta(0, grid.row(r), r)) / grid.pitch();
        int p = (int) Math.floor((phase - Math.floor(phase)) * phases);
        return destination(Math.min(phases - 1, p), q);
    }
}
