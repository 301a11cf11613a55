package org.whither.render;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.OptionalDouble;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;

/**
 * The film in the (r, z) plane, at an angle or averaged round the ring: the two faces, and at <em>stations</em> along the
 * radius and levels across the film the motion in that plane and the speed. Stations come in <em>pieces</em>, within which
 * the faces do not jump. Averages are over equal angles; those of velocities are weighted by mass.
 */
final class Section {
    /** Number of equal steps across the film. */
    static final int LEVELS = 48;

    private static final int STATIONS = 260;

    /** Share of the section that a speed scale covers, so that few fast places do not leave it empty. */
    private static final double NEARLY = 0.995;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final OptionalDouble angle;
    private final double turning;
    private final List<double[]> pieces = new ArrayList<>();
    private int count;
    private double[] radius;
    private double[] rotorZ;
    private double[] statorZ;
    private boolean[] feed;
    private int[] pieceStart;
    /** Stations × (LEVELS + 1), row-major. */
    private double[] outwards;

    private double[] speed;
    private double[] net;
    private double fastest;
    private double nearlyFastest;

    /**
     * A section.
     *
     * @param shape the film's shape
     * @param angle angle in the frame in which the film is steady, or empty: averaged (rad)
     * @param frame the frame of the speeds
     */
    Section(FilmShape shape, OptionalDouble angle, Frame frame) {
        this.flow = shape.flow();
        this.grid = shape.grid();
        this.angle = angle;
        double rate = flow.film().conditions().rotationRate();
        this.turning = flow.film().steadyFrameSpeed() - frame.angularSpeed(rate);
        findPieces();
        sample();
    }

    private void findPieces() {
        for (int j = 0; j < grid.cellsRadial(); j++) {
            if (angle.isEmpty()) {
                pieces.add(new double[] {j, -1, grid.radius(j), grid.radius(j + 1), 0});
                continue;
            }
            double[] r = crossings(grid, j, angle.getAsDouble());
            for (int n = 0; n + 1 < r.length; n++) {
                double middle = 0.5 * (r[n] + r[n + 1]);
                // Both ends of a piece lie in the same cell, whatever sector rounding would put them in.
                double turn = grid.intoSector(angle.getAsDouble(), j, middle) * grid.pitch();
                int i = grid.column(angle.getAsDouble() - turn, j, middle);
                pieces.add(new double[] {j, i, r[n], r[n + 1], turn});
            }
        }
    }

    /** Radii of row j, ends included and rising, at which the ray at an angle crosses grid lines. */
    static double[] crossings(FilmGrid grid, int j, double theta) {
        List<Double> radii = new ArrayList<>();
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        radii.add(r0);
        radii.add(r1);
        long first = Math.min(grid.intoSector(theta, j, r0), grid.intoSector(theta, j, r1)) - 1;
        long last = Math.max(grid.intoSector(theta, j, r0), grid.intoSector(theta, j, r1)) + 1;
        for (long n = first; n <= last; n++) {
            for (int i = 0; i < grid.ni(); i++) {
                double a = grid.theta(i, j) + n * grid.pitch() - theta;
                double b = grid.theta(i, j + 1) + n * grid.pitch() - theta;
                if (a < 0 != b < 0) {
                    radii.add(r0 + a / (a - b) * (r1 - r0));
                }
            }
        }
        return radii.stream()
                .mapToDouble(Double::doubleValue)
                .sorted()
                .distinct()
                .toArray();
    }

    private double within(int j, double r) {
        double theta = angle.getAsDouble();
        return theta - grid.intoSector(theta, j, r) * grid.pitch();
    }

    private void sample() {
        double fine = (grid.outerRadius() - grid.innerRadius()) / STATIONS;
        int[] steps = new int[pieces.size()];
        for (int n = 0; n < steps.length; n++) {
            steps[n] = Math.max(1, (int) Math.ceil((pieces.get(n)[3] - pieces.get(n)[2]) / fine));
            count += steps[n] + 1;
        }
        radius = new double[count];
        rotorZ = new double[count];
        statorZ = new double[count];
        feed = new boolean[count];
        net = new double[count];
        outwards = new double[count * (LEVELS + 1)];
        speed = new double[outwards.length];
        pieceStart = new int[pieces.size() + 1];
        int c = 0;
        for (int n = 0; n < steps.length; n++) {
            pieceStart[n] = c;
            double[] piece = pieces.get(n);
            int j = (int) piece[0];
            for (int m = 0; m <= steps[n]; m++) {
                double r = piece[2] + (piece[3] - piece[2]) * m / steps[n];
                radius[c] = r;
                if (piece[1] >= 0) {
                    station(c, (int) piece[1], j, angle.getAsDouble() - piece[4], r, 1, 1);
                } else {
                    average(c, j, r);
                }
                c++;
            }
        }
        pieceStart[steps.length] = count;
        double[] sorted = speed.clone();
        Arrays.sort(sorted);
        fastest = sorted[sorted.length - 1];
        nearlyFastest = sorted[(int) (NEARLY * (sorted.length - 1))];
    }

    private void average(int c, int j, double r) {
        double total = 0;
        double[] weight = new double[LEVELS + 1];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            double from = grid.lineTheta(i, j, r);
            double width = grid.lineTheta(i + 1, j, r) - from;
            station(c, i, j, from + 0.5 * width, r, width, -1);
            int k = 0;
            for (int level = 0; level <= LEVELS; level++) {
                k = layer(k, (double) level / LEVELS);
                weight[level] += width * massWeight(i, j, k, from + 0.5 * width, r, (double) level / LEVELS);
            }
            total += width;
        }
        rotorZ[c] /= total;
        statorZ[c] /= total;
        net[c] /= total;
        for (int level = 0; level <= LEVELS; level++) {
            outwards[c * (LEVELS + 1) + level] /= weight[level];
            speed[c * (LEVELS + 1) + level] /= weight[level];
        }
    }

    private double massWeight(int i, int j, int k, double theta, double r, double sigma) {
        return flow.density(i, j, k, theta, r, sigma) * flow.thickness(i, j, theta, r);
    }

    private int layer(int from, double sigma) {
        int k = from;
        while (k + 1 < flow.layers() && flow.level(k + 1) <= sigma) {
            k++;
        }
        return k;
    }

    /** Adds the column of gas at a place to a station; with a sign below 0 velocities are weighted by mass. */
    private void station(int c, int i, int j, double theta, double r, double width, int sign) {
        double h = flow.thickness(i, j, theta, r);
        double z = flow.rotorZ(i, j, theta, r);
        rotorZ[c] += width * z;
        statorZ[c] += width * (z + h);
        feed[c] |= flow.film().feeds(grid.cell(i, j));
        double[] rates = new double[3];
        int k = 0;
        double flux = 0;
        for (int level = 0; level <= LEVELS; level++) {
            double sigma = (double) level / LEVELS;
            k = layer(k, sigma);
            flow.rates(i, j, k, theta, r, sigma, rates);
            double mass = flow.density(i, j, k, theta, r, sigma) * h;
            double weight = sign < 0 ? width * mass : 1;
            outwards[c * (LEVELS + 1) + level] += weight * rates[1];
            speed[c * (LEVELS + 1) + level] += weight * Math.hypot(rates[1], r * (rates[0] + turning));
            flux += (level == 0 || level == LEVELS ? 0.5 : 1) * mass * rates[1] / LEVELS;
        }
        net[c] += width * flux;
    }

    /** Number of stations. */
    int stations() {
        return count;
    }

    /** Number of pieces. */
    int pieces() {
        return pieces.size();
    }

    /** First station of piece n; of n = pieces(), the number of stations. */
    int start(int n) {
        return pieceStart[n];
    }

    /** Radius of a station (m). */
    double radius(int c) {
        return radius[c];
    }

    /** Height of the rotor face at a station (m). */
    double rotorZ(int c) {
        return rotorZ[c];
    }

    /** Height of the stator face at a station (m). */
    double statorZ(int c) {
        return statorZ[c];
    }

    /** Whether the feed lies at a station. */
    boolean feeds(int c) {
        return feed[c];
    }

    /** Speed at a station and level (m/s). */
    double speed(int c, int level) {
        return speed[c * (LEVELS + 1) + level];
    }

    /** Highest speed (m/s). */
    double fastest() {
        return fastest;
    }

    /** Speed below which nearly all of the section lies (m/s). */
    double nearlyFastest() {
        return nearlyFastest;
    }

    /** The station before a radius (or at it), with a station after it in the same piece. */
    int stationAt(double r) {
        int low = 0;
        int high = pieces.size() - 1;
        while (low < high) {
            int middle = (low + high) >>> 1;
            if (pieces.get(middle)[3] < r) {
                low = middle + 1;
            } else {
                high = middle;
            }
        }
        double[] piece = pieces.get(low);
        int steps = pieceStart[low + 1] - pieceStart[low] - 1;
        double f = (r - piece[2]) / (piece[3] - piece[2]) * steps;
        return pieceStart[low] + Math.max(0, Math.min(steps - 1, (int) f));
    }

    /** How far a radius lies between a station and the next, 0 … 1. */
    private double share(int c, double r) {
        return radius[c + 1] > radius[c] ? Math.max(0, Math.min(1, (r - radius[c]) / (radius[c + 1] - radius[c]))) : 0;
    }

    /** Height of a place in the film (m). */
    double z(double r, double sigma) {
        int c = stationAt(r);
        double f = share(c, r);
        double low = rotorZ[c] + f * (rotorZ[c + 1] - rotorZ[c]);
        double high = statorZ[c] + f * (statorZ[c + 1] - statorZ[c]);
        return low + sigma * (high - low);
    }

    /** Radial velocity, or the mass-weighted mean of it (m/s). */
    double outwards(double r, double sigma) {
        int c = stationAt(r);
        double f = share(c, r);
        double s = Math.max(0, Math.min(LEVELS, sigma * LEVELS));
        int k = Math.min(LEVELS - 1, (int) s);
        double g = s - k;
        int n = c * (LEVELS + 1) + k;
        int m = n + LEVELS + 1;
        return (1 - f) * ((1 - g) * outwards[n] + g * outwards[n + 1])
                + f * ((1 - g) * outwards[m] + g * outwards[m + 1]);
    }

    /** Radial mass flux of the whole column at a radius, per length round the ring; outwards positive (kg/(m s)). */
    double net(double r) {
        int c = stationAt(r);
        return net[c] + share(c, r) * (net[c + 1] - net[c]);
    }

    /** Whether gas runs against the way its column goes. */
    boolean reversed(double r, double sigma) {
        return outwards(r, sigma) * net(r) < 0;
    }

    /**
     * Rates in the plane of a section at an angle: dr/dt and dσ/dt.
     *
     * @param rates overwritten; length 3, the last two are what is asked for
     */
    void rates(double r, double sigma, double[] rates) {
        int j = grid.row(r);
        double theta = within(j, r);
        flow.rates(grid.column(theta, j, r), j, layer(0, sigma), theta, r, sigma, rates);
    }
}
