package org.whither.eddy;

import java.util.Arrays;
import java.util.Optional;
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

/**
 * How a tracer turns round: in which plane, how often, and round which place.
 *
 * <p>Gas that goes round the ring while it turns is looked at each time it passes the border of a sector (the section of H.
 * Poincaré, Les méthodes nouvelles de la mécanique céleste, 1892–99), where it is in the same place of the same groove; its
 * turns are those of the section's points round their middle. Other gas is looked at all along its path.
 */
final class Turning implements StepObserver {
    /**
     * Turns that were seen.
     *
     * @param sense plane and direction
     * @param period time of one turn, over whole turns (s)
     * @param turns how many turns were seen
     * @param middle the middle of the turns; of those in a section, at the sector's first grid line
     * @param mean mean place over whole turns, by time
     * @param size how far the path reaches from the middle, as a part of sector, radial extent and film thickness
     */
    record Turn(Sense sense, double period, double turns, Place middle, Place mean, double size) {}

    private static final int PARTS_OF_STEP = 8;
    private static final int LEAST_CROSSINGS = 12;
    private static final double FULL = 2 * Math.PI;
    /** A turn of more than this from one section to the next cannot be told from one the other way round. */
    private static final double LARGEST_ANGLE = 0.3 * FULL;

    private final FilmGrid grid;
    private final double rotation;
    /** Time, angle, radius, height of each sample. */
    private final Samples path = new Samples();

    private final Samples section = new Samples();
    private long sector;
    private long crossed;

    private Turning(FilmFlow flow) {
        this.grid = flow.film().grid();
        this.rotation = flow.film().conditions().rotationRate();
    }

    /**
     * Watches a tracer turn.
     *
     * @param flow the motion of the gas
     * @param tolerance error of a step
     * @param release where it starts
     * @param limit how long it is followed (s)
     * @return its turns; empty where it leaves before it has turned once
     */
    static Optional<Turn> watch(FilmFlow flow, double tolerance, Release release, double limit) {
        Turning turning = new Turning(flow);
        Tracer tracer =
                new Tracer(flow, new TraceSettings(flow.film().steadyIn(), Direction.FORWARD, tolerance, limit));
        PathEnd end = tracer.follow(release, turning);
        if (!(end instanceof PathEnd.StillInside) || turning.path.size < LEAST_CROSSINGS) {
            return Optional.empty();
        }
        return turning.told();
    }

    @Override
    public void step(PathStep step) {
        if (path.size == 0) {
            add(step.at(0), path);
            sector = sectorOf(step.at(0));
        }
        for (int n = 1; n <= PARTS_OF_STEP; n++) {
            add(step.at((double) n / PARTS_OF_STEP), path);
        }
        // A step ends at the border of its cell, so it never goes past that of its sector.
        PathPoint end = step.at(1);
        long now = sectorOf(end);
        if (now != sector) {
            crossed += now - sector;
            sector = now;
            add(end, section);
        }
    }

    private static void add(PathPoint point, Samples samples) {
        samples.add(point.time(), point.steadyTheta(), point.radius(), point.sigma());
    }

    private long sectorOf(PathPoint point) {
        double first = grid.lineTheta(0, grid.row(point.radius()), point.radius());
        return (long) Math.floor((point.steadyTheta() - first) / grid.pitch() + 1e-9);
    }

    private Optional<Turn> told() {
        if (section.size >= LEAST_CROSSINGS && Math.abs(crossed) >= section.size / 2) {
            double[] middle = section.middle();
            Winding winding = section.winding(2, 3, middle, section.spread());
            if (winding.largest < LARGEST_ANGLE && winding.turns() >= 1) {
                double r = middle[2];
                Place at = new Place(grid.lineTheta(0, grid.row(r), r), r, middle[3]);
                return Optional.of(turn(Sense.MERIDIONAL, winding, section, at));
            }
        }
        double[] middle = path.middle();
        double[] spread = path.spread();
        double[] length = {0, middle[2] * spread[1], spread[2], 1e-3 * spread[3]};
        int[][] planes = {{2, 1}, {2, 3}, {1, 3}};
        Winding best = null;
        int[] plane = null;
        double most = 0;
        for (int[] pair : planes) {
            Winding winding = path.winding(pair[0], pair[1], middle, spread);
            double tilt = path.correlation(pair[0], pair[1], middle);
            double score = winding.turns() * Math.sqrt(Math.max(0, 1 - tilt * tilt));
            boolean alike = best != null && Math.abs(score - most) < 0.25 * most;
            if (best == null
                    || (alike && length[pair[0]] * length[pair[1]] > length[plane[0]] * length[plane[1]])
                    || (!alike && score > most)) {
                best = winding;
                plane = pair;
                most = score;
            }
        }
        if (best.turns() < 1) {
            return Optional.empty();
        }
        Place at = new Place(middle[1], middle[2], middle[3]);
        Sense sense = plane == planes[1]
                ? Sense.MERIDIONAL
                : plane == planes[2]
                        ? Sense.CIRCUMFERENTIAL
                        : best.total * rotation >= 0 ? Sense.WITH_ROTATION : Sense.AGAINST_ROTATION;
        return Optional.of(turn(sense, best, path, at));
    }

    private Turn turn(Sense sense, Winding winding, Samples of, Place middle) {
        double whole = Math.floor(winding.turns());
        double until = winding.timeOf(whole);
        double from = of.value(0, 0);
        double[] mean = path.mean(from, until);
        double size = 0;
        double[] centre = {0, middle.theta(), middle.radius(), middle.sigma()};
        double[] unit = {1, grid.pitch(), grid.outerRadius() - grid.innerRadius(), 1};
        for (int c = of == section ? 2 : 1; c < 4; c++) {
            for (int n = 0; n < of.size; n++) {
                size = Math.max(size, Math.abs(of.value(n, c) - centre[c]) / unit[c]);
            }
        }
        return new Turn(
                sense, (until - from) / whole, winding.turns(), middle, new Place(mean[1], mean[2], mean[3]), size);
    }

    /** How far a sequence of points goes round a middle. */
    private static final class Winding {
        private final double[] time;
        private final double[] angle;
        private final double total;
        private double largest;

        Winding(double[] time, double[] angle) {
            this.time = time;
            this.angle = angle;
            this.total = angle[angle.length - 1];
            for (int n = 1; n < angle.length; n++) {
                largest = Math.max(largest, Math.abs(angle[n] - angle[n - 1]));
            }
        }

        double turns() {
            return Math.abs(total) / FULL;
        }

        /** When so many turns were first done. */
        double timeOf(double turns) {
            double wanted = turns * FULL * Math.signum(total);
            for (int n = 1; n < angle.length; n++) {
                if ((angle[n] - wanted) * Math.signum(total) >= 0) {
                    double part = (wanted - angle[n - 1]) / (angle[n] - angle[n - 1]);
                    return time[n - 1] + part * (time[n] - time[n - 1]);
                }
            }
            return time[time.length - 1];
        }
    }

    /** Samples of four values each, row after row: time, angle, radius, height. */
    private static final class Samples {
        private double[] values = new double[4 * 256];
        private int size;

        void add(double time, double theta, double radius, double sigma) {
            if (4 * size == values.length) {
                values = Arrays.copyOf(values, 2 * values.length);
            }
            values[4 * size] = time;
            values[4 * size + 1] = theta;
            values[4 * size + 2] = radius;
            values[4 * size + 3] = sigma;
            size++;
        }

        double value(int n, int c) {
            return values[4 * n + c];
        }

        /** Middle of the points, each with the length of the way to its neighbours as its weight. */
        double[] middle() {
            double[] spread = spread();
            double[] sum = new double[4];
            double total = 0;
            for (int n = 1; n < size; n++) {
                double square = 0;
                for (int c = 1; c < 4; c++) {
                    double step = spread[c] > 0 ? (value(n, c) - value(n - 1, c)) / spread[c] : 0;
                    square += step * step;
                }
                double weight = Math.sqrt(square);
                total += weight;
                for (int c = 1; c < 4; c++) {
                    sum[c] += weight * 0.5 * (value(n, c) + value(n - 1, c));
                }
            }
            for (int c = 1; c < 4; c++) {
                sum[c] = total > 0 ? sum[c] / total : value(0, c);
            }
            return sum;
        }

        /** From the lowest to the highest value of each coordinate. */
        double[] spread() {
            double[] spread = new double[4];
            for (int c = 0; c < 4; c++) {
                double low = Double.POSITIVE_INFINITY;
                double high = Double.NEGATIVE_INFINITY;
                for (int n = 0; n < size; n++) {
                    low = Math.min(low, value(n, c));
                    high = Math.max(high, value(n, c));
                }
                spread[c] = high - low;
            }
            return spread;
        }

        /** Mean of each coordinate over a time. */
        double[] mean(double from, double until) {
            double[] sum = new double[4];
            double total = 0;
            for (int n = 1; n < size; n++) {
                if (value(n - 1, 0) >= from && value(n, 0) <= until) {
                    double weight = value(n, 0) - value(n - 1, 0);
                    total += weight;
                    for (int c = 1; c < 4; c++) {
                        sum[c] += weight * 0.5 * (value(n, c) + value(n - 1, c));
                    }
                }
            }
            for (int c = 1; c < 4; c++) {
                sum[c] /= total;
            }
            return sum;
        }

        /** Correlation of two coordinates along the path. */
        double correlation(int a, int b, double[] middle) {
            double aa = 0;
            double bb = 0;
            double ab = 0;
            for (int n = 1; n < size; n++) {
                double weight = value(n, 0) - value(n - 1, 0);
                double x = value(n, a) - middle[a];
                double y = value(n, b) - middle[b];
                aa += weight * x * x;
                bb += weight * y * y;
                ab += weight * x * y;
            }
            return aa > 0 && bb > 0 ? ab / Math.sqrt(aa * bb) : 1;
        }

        /** Angle gone round a middle in a plane, positive from the first coordinate to the second. */
        Winding winding(int a, int b, double[] middle, double[] spread) {
            double[] time = new double[size];
            double[] angle = new double[size];
            double scale = spread[b] > 0 ? spread[a] / spread[b] : 1;
            for (int n = 0; n < size; n++) {
                time[n] = value(n, 0);
                if (n > 0) {
                    double x0 = value(n - 1, a) - middle[a];
                    double y0 = scale * (value(n - 1, b) - middle[b]);
                    double x1 = value(n, a) - middle[a];
                    double y1 = scale * (value(n, b) - middle[b]);
                    angle[n] = angle[n - 1] + Math.atan2(x0 * y1 - x1 * y0, x0 * x1 + y0 * y1);
                }
            }
            return new Winding(time, angle);
        }
    }
}
