package org.whither.eddy;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.Deque;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SplittableRandom;
import java.util.function.DoubleConsumer;
import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.random.SobolSequenceGenerator;
import org.apache.commons.math3.stat.StatUtils;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;

/**
 * From held tracers to zones: groups neighbouring ones, and fills the box around each group with more tracers until the
 * mass of the gas held there is known, or the budget is spent. Places are given here as (phase, part of the radial extent,
 * part of the film thickness).
 */
final class ZoneSearch {
    /** Half width of the interval of a zone's mass at which it is known well enough, as a share. */
    static final double KNOWN = 0.05;

    /** Held tracers that make out a shape. */
    private static final int LEAST = 8;

    /** Independent replicates of the tracers in a box; what they differ by tells how well the mass is known. */
    private static final int REPLICATES = 8;

    private static final int FIRST_OF_REPLICATE = 16;
    /** From so many tracers a replicate on, those that are not held part zones. */
    private static final int PARTING_OF_REPLICATE = 64;

    /** A group smaller than this share of the largest in its box is too small to be measured there. */
    private static final double SECOND = 0.25;

    private static final int MOST_OF_REPLICATE = 4096;
    private static final int MOST_BOXES = 6;
    private static final int MOST_POINTS = 4000;
    private static final int TURNING = 12;
    private static final int EXCHANGE = 64;
    /** Times the time after which gas is held, for which a zone's gas is followed back. */
    private static final double LONGER = 5;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final EddySettings settings;
    private final HoldTest test;
    private final double filmMass;
    private final Optional<Dam> dam;
    private final DoubleConsumer progress;
    private final SplittableRandom random;
    private final Spot spot;
    private final List<Zone> zones = new ArrayList<>();
    private final List<SmallCluster> small = new ArrayList<>();
    /** Held points of the zones so far, and how near a point must be to be one of theirs. */
    private final List<double[][]> shapes = new ArrayList<>();

    private final List<double[]> nearness = new ArrayList<>();
    private boolean settled = true;

    ZoneSearch(FilmFlow flow, EddySettings settings, HoldTest test, double filmMass, DoubleConsumer progress) {
        this.flow = flow;
        this.grid = flow.film().grid();
        this.settings = settings;
        this.test = test;
        this.filmMass = filmMass;
        this.dam = Dam.of(flow);
        this.progress = progress;
        this.random = new SplittableRandom(settings.seed() + 1);
        this.spot = new Spot(flow);
    }

    List<Zone> zones() {
        zones.sort(Comparator.comparingDouble(Zone::massShare).reversed());
        return zones;
    }

    List<SmallCluster> small() {
        return small;
    }

    /** Whether the mass of every zone is known well enough. */
    boolean settled() {
        return settled;
    }

    private record Seed(double[][] points, double[] reach, double mass) {}

    /**
     * Makes zones of held tracers.
     *
     * @param held where they were released
     * @param count among how many tracers of equal mass
     */
    void find(List<Release> held, int count) {
        double even = 2 / Math.cbrt(count);
        double[] reach = {even, even, even};
        double[][] points = held.stream().map(this::point).toArray(double[][]::new);
        Deque<Seed> seeds = new ArrayDeque<>();
        for (Clusters.Cluster cluster : Clusters.of(points, reach, new double[0][])) {
            seeds.add(new Seed(
                    members(points, cluster), reach, cluster.members().length * filmMass / grid.sectors() / count));
        }
        while (!seeds.isEmpty()) {
            Seed seed = seeds.remove();
            if (!known(seed)) {
                fill(seed);
            }
            progress.accept((double) test.tracers() / settings.budget());
        }
    }

    private double[] point(Release at) {
        spot.go(at.theta(), at.radius(), at.sigma());
        return new double[] {
            spot.phase(), (at.radius() - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius()), at.sigma()
        };
    }

    private static double[][] members(double[][] points, Clusters.Cluster cluster) {
        double[][] of = new double[cluster.members().length][];
        for (int n = 0; n < of.length; n++) {
            of[n] = points[cluster.members()[n]].clone();
            of[n][0] = cluster.first()[n];
        }
        return of;
    }

    /** Whether a group lies in a zone that is known already. */
    private boolean known(Seed seed) {
        for (int z = 0; z < shapes.size(); z++) {
            double[] reach = nearness.get(z);
            for (double[] one : seed.points()) {
                for (double[] other : shapes.get(z)) {
                    double ahead = one[0] - other[0];
                    ahead = (ahead - Math.rint(ahead)) / reach[0];
                    double up = (one[1] - other[1]) / reach[1];
                    double across = (one[2] - other[2]) / reach[2];
                    if (ahead * ahead + up * up + across * across <= 1) {
                        return true;
                    }
                }
            }
        }
        return false;
    }

    // ---- one box ---------------------------------------------------------------------------------------------------

    /** A box, and the tracers that were released in it. */
    private final class Box {
        private final double[] low = new double[3];
        private final double[] high = new double[3];
        private final long[][] shift = new long[REPLICATES][3];
        private final List<double[]> held = new ArrayList<>();
        private final List<double[]> others = new ArrayList<>();
        private final List<Double> weight = new ArrayList<>();
        private final List<Integer> replicate = new ArrayList<>();
        private int each;
        private List<Clusters.Cluster> clusters = List.of();

        Box(double[] from, double[] to) {
            boolean round = to[0] - from[0] >= 1;
            low[0] = round ? 0 : from[0];
            high[0] = round ? 1 : to[0];
            for (int c = 1; c < 3; c++) {
                low[c] = Math.max(0, from[c]);
                high[c] = Math.min(1, to[c]);
            }
            for (long[] one : shift) {
                for (int c = 0; c < 3; c++) {
                    one[c] = random.nextLong() >>> 12;
                }
            }
        }

        double length(int c) {
            return high[c] - low[c];
        }

        double volume() {
            return length(0) * length(1) * length(2);
        }

        boolean round() {
            return length(0) >= 1;
        }

        double[] reach() {
            double part = 2 / Math.cbrt((double) each * REPLICATES);
            return new double[] {part * length(0), part * length(1), part * length(2)};
        }

        /** Releases so many more tracers a replicate. */
        void release(int more) {
            List<Release> releases = new ArrayList<>();
            List<double[]> points = new ArrayList<>();
            List<Double> weights = new ArrayList<>();
            for (long[] moved : shift) {
                SobolSequenceGenerator sobol = new SobolSequenceGenerator(3);
                for (int n = each; n < each + more; n++) {
                    double[] at = n == each ? sobol.skipTo(n) : sobol.nextVector();
                    double[] point = new double[3];
                    for (int c = 0; c < 3; c++) {
                        point[c] = low[c] + length(c) * InteriorPlan.shifted(at[c], moved[c]);
                    }
                    double r = radius(point[1]);
                    spot.goPhase(point[0], r, point[2]);
                    releases.add(new Release(spot.theta(), r, point[2], 0));
                    points.add(point);
                    weights.add(
                            spot.massDensity() * grid.pitch() * (grid.outerRadius() - grid.innerRadius()) * volume());
                }
            }
            HoldTest.Stay[] stays = test.test(releases);
            for (int n = 0; n < stays.length; n++) {
                if (stays[n] == HoldTest.Stay.HELD) {
                    held.add(points.get(n));
                    weight.add(weights.get(n));
                    replicate.add(n / more);
                } else {
                    others.add(points.get(n));
                }
            }
            each += more;
            // Too few tracers would be parted by chance.
            double[][] between = each >= PARTING_OF_REPLICATE ? others.toArray(double[][]::new) : new double[0][];
            clusters = Clusters.whole(held.toArray(double[][]::new), reach(), between, LEAST);
        }

        /** The largest group; empty where nothing is held. */
        int[] main() {
            return clusters.isEmpty() ? new int[0] : clusters.get(0).members();
        }

        /** Whether a group is large enough to be measured in this box. */
        boolean measured(int cluster) {
            int size = clusters.get(cluster).members().length;
            return size >= LEAST && size >= SECOND * main().length;
        }

        /** Mass of a group (kg). */
        double mass(int cluster) {
            return StatUtils.mean(masses(cluster));
        }

        /** Half the width of the 95 % interval of the mass of a group, by Student's t over the replicates (kg). */
        double half(int cluster) {
            return new TDistribution(REPLICATES - 1).inverseCumulativeProbability(0.975)
                    * Math.sqrt(StatUtils.variance(masses(cluster)) / REPLICATES);
        }

        /** Mass of a group by each replicate (kg). */
        private double[] masses(int cluster) {
            double[] mass = new double[REPLICATES];
            for (int n : clusters.get(cluster).members()) {
                mass[replicate.get(n)] += weight.get(n) / each;
            }
            return mass;
        }

        /** Whether the masses of all measured groups are known well enough. */
        boolean known() {
            for (int c = 0; c < clusters.size(); c++) {
                if (measured(c) && !(half(c) <= KNOWN * mass(c))) {
                    return false;
                }
            }
            return true;
        }

        /** A box that fits the largest group better, or null where this one does. */
        Box better() {
            double[] from = new double[3];
            double[] to = new double[3];
            double[] reach = reach();
            Arrays.fill(from, Double.POSITIVE_INFINITY);
            Arrays.fill(to, Double.NEGATIVE_INFINITY);
            for (double[] one : members(held.toArray(double[][]::new), clusters.get(0))) {
                for (int c = 0; c < 3; c++) {
                    from[c] = Math.min(from[c], one[c]);
                    to[c] = Math.max(to[c], one[c]);
                }
            }
            boolean tight = false;
            double volume = 1;
            for (int c = 0; c < 3; c++) {
                boolean free = c == 0 && round();
                double margin = 0.25 * reach[c];
                tight |= !free && from[c] - margin < low[c] && (c == 0 || low[c] > 0);
                tight |= !free && to[c] + margin > high[c] && (c == 0 || high[c] < 1);
                from[c] -= free ? 0 : 2 * margin;
                to[c] += free ? 0 : 2 * margin;
            }
            if (round() && (clusters.get(0).wraps() || to[0] - from[0] > 0.9)) {
                from[0] = 0;
                to[0] = 1;
            }
            for (int c = 0; c < 3; c++) {
                volume *= c == 0 ? Math.min(1, to[c] - from[c]) : Math.min(1, to[c]) - Math.max(0, from[c]);
            }
            return tight || volume < 0.5 * volume() ? new Box(from, to) : null;
        }
    }

    private double radius(double part) {
        return grid.innerRadius() + part * (grid.outerRadius() - grid.innerRadius());
    }

    /** Fills the box around a group until what is held in it is known. */
    private void fill(Seed seed) {
        double[] from = new double[3];
        double[] to = new double[3];
        for (int c = 0; c < 3; c++) {
            int coordinate = c;
            from[c] = Arrays.stream(seed.points())
                            .mapToDouble(p -> p[coordinate])
                            .min()
                            .orElseThrow()
                    - seed.reach()[c];
            to[c] = Arrays.stream(seed.points())
                            .mapToDouble(p -> p[coordinate])
                            .max()
                            .orElseThrow()
                    + seed.reach()[c];
        }
        Box box = new Box(from, to);
        int boxes = 1;
        boolean spent;
        while (true) {
            int more = box.each == 0 ? FIRST_OF_REPLICATE : box.each;
            spent = test.tracers() + (long) more * REPLICATES > settings.budget();
            if (spent || more > MOST_OF_REPLICATE) {
                break;
            }
            box.release(more);
            int found = box.main().length;
            if (found < LEAST) {
                if (box.each >= 4 * FIRST_OF_REPLICATE) {
                    break;
                }
                continue;
            }
            if (boxes < MOST_BOXES && box.each < PARTING_OF_REPLICATE) {
                Box better = box.better();
                if (better != null) {
                    box = better;
                    boxes++;
                    continue;
                }
            }
            if (box.each >= PARTING_OF_REPLICATE && found >= 4 * LEAST && box.known()) {
                break;
            }
        }
        if (box.main().length < LEAST) {
            small.add(new SmallCluster(place(mean(seed.points())), seed.points().length, seed.mass()));
            settled &= !spent;
            return;
        }
        told(box);
    }

    private void told(Box box) {
        double[][] all = box.held.toArray(double[][]::new);
        for (int c = 0; c < box.clusters.size(); c++) {
            double[][] points = members(all, box.clusters.get(c));
            if (!box.measured(c)) {
                small.add(new SmallCluster(place(mean(points)), points.length, box.mass(c)));
                continue;
            }
            shapes.add(points);
            nearness.add(box.reach());
            Zone zone = zone(box, box.clusters.get(c), points, box.mass(c), box.half(c));
            settled &= zone.settled();
            zones.add(zone);
        }
    }

    private static double[] mean(double[][] points) {
        double[] sum = new double[3];
        for (double[] point : points) {
            for (int c = 0; c < 3; c++) {
                sum[c] += point[c] / points.length;
            }
        }
        return sum;
    }

    private Place place(double[] point) {
        double r = radius(point[1]);
        return new Place(grid.lineTheta(0, grid.row(r), r) + point[0] * grid.pitch(), r, point[2]);
    }

    // ---- what a zone is like ---------------------------------------------------------------------------------------

    private Zone zone(Box box, Clusters.Cluster cluster, double[][] points, double mass, double half) {
        boolean wraps = cluster.wraps();
        double[] low = {Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY};
        double[] high = {Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY};
        double weights = 0;
        double pressure = 0;
        double emptiness = 0;
        List<Place> places = new ArrayList<>();
        for (int n = 0; n < points.length; n++) {
            Place at = place(points[n]);
            spot.go(at.theta(), at.radius(), at.sigma());
            double weight = box.weight.get(cluster.members()[n]);
            weights += weight;
            pressure += weight * spot.pressure();
            emptiness += weight / spot.density();
            double[] where = {at.theta(), at.radius(), at.sigma()};
            for (int c = 0; c < 3; c++) {
                low[c] = Math.min(low[c], where[c]);
                high[c] = Math.max(high[c], where[c]);
            }
            if (places.size() < MOST_POINTS) {
                places.add(new Place(spot.theta(), at.radius(), at.sigma()));
            }
        }
        int count = wraps ? 1 : grid.sectors();
        int parts = wraps ? grid.sectors() : 1;
        Place middle = place(mean(points));
        Turning.Turn centre = centre(middle).orElse(null);
        Place at = centre == null ? middle : centre.mean();
        return new Zone(
                wraps && centre != null ? new Place(centre.middle().theta(), at.radius(), at.sigma()) : at,
                wraps ? new Range(0, 2 * Math.PI) : new Range(low[0], high[0]),
                new Range(low[1], high[1]),
                new Range(low[2], high[2]),
                parts * mass * emptiness / weights,
                parts * mass,
                parts * Math.max(0, mass - half),
                parts * (mass + half),
                mass * grid.sectors() / filmMass,
                count,
                centre == null ? Sense.NONE : centre.sense(),
                turnover(places, centre),
                pressure / weights,
                dam.map(d -> d.distance(at.radius())),
                exchange(places, parts * mass),
                places,
                half <= KNOWN * mass,
                box.each * REPLICATES);
    }

    private double turningTolerance() {
        return test.tolerance();
    }

    /** Looks for the place round which a zone turns, from some place in it. */
    private Optional<Turning.Turn> centre(Place start) {
        Optional<Turning.Turn> best = Optional.empty();
        Place at = start;
        for (int n = 0; n < 6; n++) {
            Optional<Turning.Turn> turn = Turning.watch(
                    flow, turningTolerance(), new Release(at.theta(), at.radius(), at.sigma(), 0), 2 * test.limit());
            if (turn.isEmpty()
                    || (best.isPresent() && turn.get().size() >= best.get().size())) {
                break;
            }
            best = turn;
            at = turn.get().middle();
        }
        return best;
    }

    /** Median time of a turn of the zone's tracers. */
    private OptionalDouble turnover(List<Place> places, Turning.Turn centre) {
        double[] periods = new double[TURNING];
        int seen = 0;
        for (int n = 0; n < TURNING; n++) {
            Place at = places.get((int) ((n + 0.5) / TURNING * places.size()));
            Optional<Turning.Turn> turn = Turning.watch(
                    flow, turningTolerance(), new Release(at.theta(), at.radius(), at.sigma(), 0), 2 * test.limit());
            if (turn.isPresent() && (centre == null || turn.get().sense() == centre.sense())) {
                periods[seen++] = turn.get().period();
            }
        }
        if (seen == 0) {
            return centre == null ? OptionalDouble.empty() : OptionalDouble.of(centre.period());
        }
        return OptionalDouble.of(StatUtils.percentile(periods, 0, seen, 50));
    }

    /** Where the zone's gas came from, followed back for longer. */
    private Exchange exchange(List<Place> places, double mass) {
        List<Release> releases = new ArrayList<>();
        int count = Math.min(EXCHANGE, places.size());
        for (int n = 0; n < count; n++) {
            Place at = places.get((int) ((n + 0.5) / count * places.size()));
            releases.add(new Release(at.theta(), at.radius(), at.sigma(), 0));
        }
        double time = LONGER * test.limit();
        double[] from = new double[PathEnd.Border.values().length];
        double renewed = 0;
        for (PathEnd end : test.back(releases, time)) {
            if (end instanceof PathEnd.Left left) {
                from[left.border().ordinal()] += 1.0 / count;
                renewed += 1.0 / count;
            }
        }
        return new Exchange(
                time,
                from[PathEnd.Border.SUPPLY.ordinal()],
                from[PathEnd.Border.INNER.ordinal()],
                from[PathEnd.Border.OUTER.ordinal()],
                renewed * mass / time,
                count);
    }
}
