package org.whither.trace;

import static org.whither.trace.Lanes.LANES;

/** Finds where the path of a step leaves its piece of the film where {@link BatchStep#leave} does not. */
final class WayOut {
    private static final int MOST_ROUNDS = 6;
    private static final int MOST_BISECTIONS = 200;

    private WayOut() {}

    /**
     * Searches the step of a lane, and sets its NEXT and WAY.
     *
     * @param state the state of all lanes
     * @param lane the lane
     * @return fraction of the step at which the path leaves its piece, 1 where it does not
     */
    static double search(double[] state, int lane) {
        double until = 1;
        int way = earliest(state, 1, lane);
        if (way == 0) {
            until = 0.5;
            way = earliest(state, 0.5, lane);
        }
        if (way == 0) {
            put(state, Lanes.WAY, lane, 0);
            note(state, 1, lane);
            return 1;
        }
        double fraction = until;
        // By the point found the path may be beyond another border, which it then passed before.
        for (int round = 0; round < MOST_ROUNDS; round++) {
            int found = 0;
            double at = fraction;
            for (int n = 0; n < 3; n++) {
                double place = BatchStep.at(state, n, fraction, lane);
                for (int side = -1; side <= 1; side += 2) {
                    int border = side * (n + 1);
                    if (beyond(place, border, state, lane) > 0 && (round == 0 || border != way)) {
                        double root = root(state, border, fraction, lane);
                        if (found == 0 || root < at) {
                            at = root;
                            found = border;
                        }
                    }
                }
            }
            if (found == 0) {
                break;
            }
            way = found;
            fraction = at;
        }
        put(state, Lanes.WAY, lane, way);
        note(state, fraction, lane);
        return fraction;
    }

    private static int earliest(double[] state, double at, int lane) {
        for (int n = 0; n < 3; n++) {
            double place = BatchStep.at(state, n, at, lane);
            for (int side = -1; side <= 1; side += 2) {
                if (beyond(place, side * (n + 1), state, lane) > 0) {
                    return side * (n + 1);
                }
            }
        }
        return 0;
    }

    /** How far a place is beyond a border, as a part of the piece; negative within. */
    private static double beyond(double place, int border, double[] state, int lane) {
        switch (border) {
            case -3:
                return state[Lanes.BOUND * LANES + lane] - place;
            case 3:
                return place - state[(Lanes.BOUND + 1) * LANES + lane];
            default:
                return border < 0 ? -BatchStep.EDGE - place : place - 1 - BatchStep.EDGE;
        }
    }

    /** The fraction at which the path passes a border that it is beyond at {@code until}: by halving and secants. */
    private static double root(double[] state, int border, double until, int lane) {
        int n = Math.abs(border) - 1;
        double low = 0;
        double atLow = beyond(BatchStep.at(state, n, 0, lane), border, state, lane);
        if (atLow >= 0) {
            return 0;
        }
        double high = until;
        double atHigh = beyond(BatchStep.at(state, n, until, lane), border, state, lane);
        for (int halving = 0; halving < MOST_BISECTIONS && high - low > 1e-13; halving++) {
            double middle = halving % 3 == 2 ? 0.5 * (low + high) : low - atLow * (high - low) / (atHigh - atLow);
            double at = beyond(BatchStep.at(state, n, middle, lane), border, state, lane);
            if (at == 0) {
                return middle;
            }
            if (at > 0) {
                high = middle;
                atHigh = at;
            } else {
                low = middle;
                atLow = at;
            }
        }
        return high;
    }

    private static void note(double[] state, double fraction, int lane) {
        for (int n = 0; n < 3; n++) {
            double place =
                    fraction == 1 ? state[(Lanes.END + n) * LANES + lane] : BatchStep.at(state, n, fraction, lane);
            put(state, Lanes.NEXT + n, lane, place);
        }
    }

    private static void put(double[] state, int n, int lane, double value) {
        state[n * LANES + lane] = value;
    }
}
