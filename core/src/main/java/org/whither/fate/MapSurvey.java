package org.whither.fate;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import java.util.function.DoubleConsumer;

/**
 * Finds what share of the unit square has each fate, with an interval that holds with a chance of 95 %, from as few points
 * as it can.
 *
 * <p>A {@link PatchMap} divides the square into settled patches, of one fate each as far as is known, and mixed ones. What
 * is left to know of both is found by drawing points at random, one in each of as many equal parts of the area:
 *
 * <ul>
 *   <li>The parts of each fate in the mixed patches are those of the <em>samples</em> drawn there, within the exact limits
 *       of C. J. Clopper and E. S. Pearson, Biometrika 26 (1934) 404–413. A mixed area U takes (z U / w)² samples for an
 *       interval of width w, so that it need not be mapped away: that would take many more where the fates lie in layers.
 *   <li>What was overlooked in the settled patches is bounded by <em>checks</em> drawn over the whole square. For each fate
 *       the checks that found it elsewhere, and those that found another fate in its patches, have an upper bound each (E.
 *       B. Wilson, J. Am. Stat. Assoc. 22 (1927) 209–212). Only one of the two can make the interval miss the truth, that
 *       above it or that below.
 * </ul>
 *
 * Draws of unequal chances, as one in each part of an area are, only make such bounds safer (W. Hoeffding, Ann. Math. Stat.
 * 27 (1956) 713–721). How finely to map and how the width is shared between samples and checks is chosen for the fewest
 * points. Where checks find too much wrong, either more are drawn, or what they found is mapped and all is drawn anew,
 * whichever is cheaper; each such round has a part of the 5 % of its own.
 */
final class MapSurvey {
    /** What finds the fates of points, and has only so much patience. */
    interface Explorer {
        /** Fates of points of the map, and of samples; arguments as in {@link PatchMap.FateFinder}. */
        int[] explore(double[] u, double[] v);

        /** Fates of checks; likewise. */
        int[] check(double[] u, double[] v);

        /**
         * How many points more may be asked for.
         *
         * @param part the part of all that may be spent which is not to be passed, 0 … 1
         * @return a number of points; none where that part is spent
         */
        int affordable(double part);
    }

    /** Chances that the bounds from the checks fail, round by round, and those of the samples: 0.05 in all. */
    private static final double[] CHECKS_FAIL = {0.025, 0.01, 0.005};

    private static final double[] SAMPLES_FAIL = {0.007, 0.002, 0.001};
    /** Squares of the normal deviates of the first of each, one-sided and two-sided. */
    private static final double CHECKS_SQUARE = 3.8415;

    private static final double SAMPLES_SQUARE = 7.2728;

    /** The least part of the wanted width for which checks are drawn. */
    private static final double LEAST_PART = 0.2;

    /** Points asked for at once, at most. */
    private static final int AT_ONCE = 8192;

    private static final int MOST_POINTS = 1 << 28;
    private static final int FEWEST_CHECKS = 1024;
    private static final int FEWEST_SAMPLES = 64;
    /** Parts of what may be spent up to which the first mesh, the map and the samples go. */
    private static final double MAP_PART = 0.5;

    private static final double SAMPLES_PART = 0.85;

    /** Points that halving a mixed patch takes: two corners, and often one inside. */
    private static final double POINTS_OF_HALVING = 2.5;

    private static final double ENOUGH = 1.1;
    /** Points put near each end of v: so many over the width, within limits. */
    private static final double SCOUTED = 0.1;

    private static final int FEWEST_SCOUTS = 32;
    private static final int MOST_SCOUTS = 256;
    /** Thickness of the last slices at the ends of v, in widths. */
    private static final double SLICE = 4;

    /**
     * The part of the mixed area that as much area of wrong fate lies beside, in corners that the map cuts off: measured
     * on the demo seal, 0.02 to 0.03.
     */
    private static final double CUT_OFF = 0.025;

    private static final double MOST_WIDTHS = 6;

    private static final double EDGE_REACH = 0.01;

    private final Explorer explorer;
    private final int fates;
    private final int unknown;
    private final double width;
    private final double edge;
    private final SplittableRandom random;
    private final DoubleConsumer progress;

    private final PatchMap map;
    private final int[] sampled;
    private int samples;
    private int samplesInAll;
    private final int[] cameIn;
    private final int[] wentOut;
    private int checks;
    private int wrong;
    private int checksInAll;
    private int wrongInAll;
    private final List<double[]> checkedU = new ArrayList<>();
    private final List<double[]> checkedV = new ArrayList<>();
    private final List<int[]> checkedFates = new ArrayList<>();
    private double checksFail = 1;
    private double samplesFail = SAMPLES_FAIL[0];
    private boolean reached;

    /**
     * A survey.
     *
     * @param explorer finds fates
     * @param fates how many fates there are
     * @param unknown the fate that tells that the fate could not be found
     * @param width wanted width of every interval
     * @param mesh patches along each side of the first mesh of the map, a power of two
     * @param edge how near the two ends of v fates may be asked for
     * @param random source of all that is drawn
     * @param progress told the part done, 0 … 1
     */
    MapSurvey(
            Explorer explorer,
            int fates,
            int unknown,
            double width,
            int mesh,
            double edge,
            SplittableRandom random,
            DoubleConsumer progress) {
        this.explorer = explorer;
        this.fates = fates;
        this.unknown = unknown;
        this.width = width;
        this.edge = edge;
        this.random = random;
        this.progress = progress;
        sampled = new int[fates];
        cameIn = new int[fates];
        wentOut = new int[fates];
        map = new PatchMap(explorer::explore, fates, mesh, random.split());
        scoutEnds();
        refine();
        sample(0);
        check(neededChecks(1 - CHECKS_FAIL[0]), 0);
        for (int round = 1; round < CHECKS_FAIL.length && mayStillReach(); round++) {
            int more = neededChecks(1 - CHECKS_FAIL[round]);
            if (more - checks <= anew(round)) {
                check(more - checks, round);
            } else {
                mend(round);
            }
        }
        reached = isReached();
    }

    /** How many points may be asked for at once. */
    private int atOnce(double part) {
        return Math.min(AT_ONCE, explorer.affordable(part));
    }

    // ---- the map ---------------------------------------------------------------------------------------------------

    /**
     * Puts more points near both ends of v into the first mesh: beside the edge of a feed, or a face, there are narrow
     * pockets of gas that is held or goes another way.
     */
    private void scoutEnds() {
        int scouts = (int) Math.max(FEWEST_SCOUTS, Math.min(MOST_SCOUTS, SCOUTED / width));
        double[] u = new double[2 * scouts];
        double[] v = new double[u.length];
        for (int n = 0; n < u.length; n++) {
            u[n] = (n / 2 + random.nextDouble()) / scouts;
            double near = edge * Math.pow(EDGE_REACH / edge, random.nextDouble());
            v[n] = n % 2 == 0 ? near : 1 - near;
        }
        if (edge < EDGE_REACH && explorer.affordable(MAP_PART) >= 2 * u.length) {
            map.sliceEnds(SLICE * width);
            map.place(u, v, explorer.explore(u, v));
        }
    }

    /** Refines the map as far as that makes the whole cheaper. */
    private void refine() {
        double start = map.mixed();
        int first = map.points();
        while (map.mixed() > 0) {
            double best = cheapestMixed();
            // Where fates lie in layers thinner than the patches, halving settles none: no more is spent on it than
            // samples would cost as things are.
            if (map.mixed() <= ENOUGH * best
                    || map.points() - first > map.firstPoints() + samplesFor(map.mixed(), cheapestOfMixed())) {
                return;
            }
            progress.accept(0.4 * Math.log(start / map.mixed()) / Math.log(start / best));
            if (!map.refine(Math.max(best, 0.5 * map.mixed()), () -> atOnce(MAP_PART))) {
                return;
            }
        }
    }

    /**
     * The mixed area that makes map, samples and checks together cheapest. Halving n mixed patches of area U takes
     * some 2.5 n points and halves U where the fates meet in curves, so that a mixed area A costs 2.5 n U / A.
     */
    private double cheapestMixed() {
        double now = map.mixed();
        double ofMap = POINTS_OF_HALVING * map.mixedPatches() * now;
        double best = now;
        double least = Double.POSITIVE_INFINITY;
        for (double part = 0.02; part < 0.99; part += 0.02) {
            double ofMixed = part * width;
            double sampledAway = Math.cbrt(0.5 * ofMap * ofMixed * ofMixed / SAMPLES_SQUARE);
            for (double mixed : new double[] {Math.min(now, sampledAway), Math.min(now, ofMixed)}) {
                double cost = ofMap * (1 / mixed - 1 / now) + cost(mixed, ofMixed);
                if (cost < least) {
                    least = cost;
                    best = mixed;
                }
            }
        }
        return best;
    }

    /** Samples and checks for a mixed area, of which an interval of a given width is to be left. */
    private double cost(double mixed, double ofMixed) {
        double checksWanted = 0;
        for (int n = 0; n < 4; n++) {
            double found = cutOff(mixed) * checksWanted;
            checksWanted = (found + 1.5 * CHECKS_SQUARE + Math.sqrt(CHECKS_SQUARE * (found + 0.25 * CHECKS_SQUARE)))
                    / (width - ofMixed);
        }
        return samplesFor(mixed, ofMixed) + checksWanted;
    }

    /** Area that checks are expected to find wrong; never so much that no number of checks would do. */
    private double cutOff(double mixed) {
        return CUT_OFF * Math.min(mixed, MOST_WIDTHS * width);
    }

    /** The width of the interval to be left of the mixed area as it is, so that samples and checks together cost least. */
    private double cheapestOfMixed() {
        double best = width;
        double least = Double.POSITIVE_INFINITY;
        for (double part = 0.01; part < 0.995; part += 0.01) {
            double cost = cost(map.mixed(), part * width);
            if (cost < least) {
                least = cost;
                best = part * width;
            }
        }
        return best;
    }

    private static double samplesFor(double mixed, double ofMixed) {
        double ratio = mixed / ofMixed;
        // The width of the exact interval of one half is about z / √n + 1 / n.
        return ratio <= 1 ? 0 : SAMPLES_SQUARE * ratio * ratio + 2 * ratio;
    }

    // ---- samples of the mixed patches ------------------------------------------------------------------------------

    private void sample(int round) {
        Arrays.fill(sampled, 0);
        samples = 0;
        samplesFail = SAMPLES_FAIL[round];
        int wanted = (int) Math.min(MOST_POINTS, Math.ceil(samplesFor(map.mixed(), cheapestOfMixed())));
        wanted = wanted == 0 ? 0 : Math.min(Math.max(FEWEST_SAMPLES, wanted), explorer.affordable(SAMPLES_PART));
        if (wanted == 0) {
            return;
        }
        double[][] points = map.drawMixed(wanted, random);
        int all = points[0].length;
        // In random order, so that what is left out at the end of the budget is left out at random.
        shuffle(points);
        while (samples < all) {
            int count = Math.min(all - samples, atOnce(SAMPLES_PART));
            if (count == 0) {
                break;
            }
            int[] found = explorer.explore(
                    Arrays.copyOfRange(points[0], samples, samples + count),
                    Arrays.copyOfRange(points[1], samples, samples + count));
            for (int fate : found) {
                sampled[fate]++;
            }
            samples += count;
        }
        samplesInAll += samples;
    }

    private void shuffle(double[][] points) {
        for (int n = points[0].length - 1; n > 0; n--) {
            int other = random.nextInt(n + 1);
            for (double[] coordinate : points) {
                double kept = coordinate[n];
                coordinate[n] = coordinate[other];
                coordinate[other] = kept;
            }
        }
    }

    // ---- checks of the settled patches -----------------------------------------------------------------------------

    /** Checks in all that leave every interval as narrow as wanted if they find as much wrong as those so far. */
    private int neededChecks(double confidence) {
        int needed = FEWEST_CHECKS;
        for (int fate = 0; fate < fates; fate++) {
            if (fate == unknown) {
                continue;
            }
            double left = Math.max(width - ofMixed(fate), LEAST_PART * width);
            double many = needed;
            while (many < MOST_POINTS
                    && missed(cameIn(fate), many, confidence) + missed(wentOut[fate], many, confidence) > left) {
                many *= 1.02;
            }
            needed = (int) Math.max(needed, Math.ceil(many));
        }
        return needed;
    }

    private double missed(int found, double many, double confidence) {
        double expected = checks == 0 ? cutOff(map.mixed()) * many : found * Math.max(1, many / checks);
        return Interval.upperBound((int) Math.round(expected), (int) many, confidence);
    }

    /** Points that mapping what was found wrong, and drawing all anew, takes. */
    private double anew(int round) {
        double bound = 0.5 * Math.max(LEAST_PART * width, width - widestOfMixed());
        double deviate = Interval.upperBound(1, 1_000_000, 1 - CHECKS_FAIL[round]) * 1e6;
        return deviate / bound + samples;
    }

    private void check(int wanted, int round) {
        int can = explorer.affordable(1);
        if (can == 0) {
            return;
        }
        double[][] points = stratified(Math.max(1, Math.min(wanted, can)), random);
        int all = points[0].length;
        int done = 0;
        while (done < all) {
            int count = Math.min(all - done, atOnce(1));
            if (count == 0) {
                break;
            }
            double[] u = Arrays.copyOfRange(points[0], done, done + count);
            double[] v = Arrays.copyOfRange(points[1], done, done + count);
            int[] found = explorer.check(u, v);
            checkedU.add(u);
            checkedV.add(v);
            checkedFates.add(found);
            for (int n = 0; n < count; n++) {
                int told = map.settledFate(u[n], v[n]);
                if (told != PatchMap.MIXED && told != found[n]) {
                    wentOut[told]++;
                    cameIn[found[n]]++;
                    wrong++;
                }
            }
            done += count;
            progress.accept(0.5 + 0.5 * done / all);
        }
        checks += done;
        checksInAll += done;
        checksFail = CHECKS_FAIL[round];
    }

    /** Maps what the checks found wrong, and draws samples and checks anew. */
    private void mend(int round) {
        for (int n = 0; n < checkedU.size(); n++) {
            map.place(checkedU.get(n), checkedV.get(n), checkedFates.get(n));
        }
        checkedU.clear();
        checkedV.clear();
        checkedFates.clear();
        wrongInAll += wrong;
        wrong = 0;
        checks = 0;
        Arrays.fill(cameIn, 0);
        Arrays.fill(wentOut, 0);
        refine();
        sample(round);
        check(neededChecks(1 - CHECKS_FAIL[round]), round);
    }

    /** At least so many points, one at random in each of as many equal rectangles of the unit square, in random order. */
    static double[][] stratified(int wanted, SplittableRandom random) {
        // Finer along v, along which times differ most: across the film.
        int rows = (int) Math.ceil(Math.sqrt(4.0 * wanted));
        int columns = (wanted + rows - 1) / rows;
        int count = rows * columns;
        int[] order = new int[count];
        for (int n = 0; n < count; n++) {
            int other = random.nextInt(n + 1);
            order[n] = order[other];
            order[other] = n;
        }
        double[][] points = new double[2][count];
        for (int n = 0; n < count; n++) {
            points[0][n] = (order[n] / rows + random.nextDouble()) / columns;
            points[1][n] = (order[n] % rows + random.nextDouble()) / rows;
        }
        return points;
    }

    // ---- what was found --------------------------------------------------------------------------------------------

    /** Whether another round may help: neither reached, nor is what is open in the mixed patches alone too much. */
    private boolean mayStillReach() {
        return !isReached() && widestOfMixed() < width && explorer.affordable(1) > 0;
    }

    private boolean isReached() {
        for (int fate = 0; fate < fates; fate++) {
            if (interval(fate).width() > width) {
                return false;
            }
        }
        return true;
    }

    /** Part of the mixed area, at least and at most, that has a fate; points whose fate is not known may have any. */
    private double[] inMixed(int fate) {
        if (samples == 0) {
            return new double[] {0, 1};
        }
        int most = fate == unknown ? sampled[fate] : sampled[fate] + sampled[unknown];
        return new double[] {
            Interval.exact(sampled[fate], samples, 1 - samplesFail).low(),
            Interval.exact(most, samples, 1 - samplesFail).high()
        };
    }

    /** Checks in patches of other fates that found this one, or may have. */
    private int cameIn(int fate) {
        return fate == unknown ? cameIn[fate] : cameIn[fate] + cameIn[unknown];
    }

    private double ofMixed(int fate) {
        double[] part = inMixed(fate);
        return map.mixed() * (part[1] - part[0]) + (fate == unknown ? 0 : map.settled(unknown));
    }

    private double widestOfMixed() {
        double widest = 0;
        for (int fate = 0; fate < fates; fate++) {
            widest = Math.max(widest, ofMixed(fate));
        }
        return widest;
    }

    /** Share of a fate as far as is known. */
    double estimate(int fate) {
        double mixed = samples == 0 ? map.estimate()[fate] : map.settled(fate) + map.mixed() * sampled[fate] / samples;
        double mended = checks == 0 ? 0 : (double) (cameIn[fate] - wentOut[fate]) / checks;
        return Math.max(0, Math.min(1, mixed + mended));
    }

    /** Share of a fate with its interval. */
    Interval interval(int fate) {
        double[] part = inMixed(fate);
        double low =
                map.settled(fate) + map.mixed() * part[0] - Interval.upperBound(wentOut[fate], checks, 1 - checksFail);
        double high = map.settled(fate)
                + map.mixed() * part[1]
                + Interval.upperBound(cameIn(fate), checks, 1 - checksFail)
                + (fate == unknown ? 0 : map.settled(unknown));
        return Interval.within(estimate(fate), low, high);
    }

    /** What the map and its samples leave open: the widest interval they leave of a fate, checks aside. */
    double unsettled() {
        return widestOfMixed();
    }

    /** Area of mixed patches, whose fates are known from samples. */
    double mixed() {
        return map.mixed();
    }

    /** Number of patches. */
    long patches() {
        return map.patches();
    }

    /** Samples drawn in mixed patches. */
    int samples() {
        return samplesInAll;
    }

    /** Checks drawn. */
    int checks() {
        return checksInAll;
    }

    /** Checks that found another fate than that of their settled patch. */
    int wrongChecks() {
        return wrongInAll + wrong;
    }

    /** Upper bound of the area in settled patches that has another fate. */
    double missedBound() {
        return Interval.upperBound(wrong, checks, 1 - checksFail);
    }

    /** Whether every interval is as narrow as wanted. */
    boolean reached() {
        return reached;
    }
}
