package org.whither.trace;

import static org.whither.trace.Lanes.LANES;

import org.whither.film.PackedFlow;

/**
 * One step of every lane of a batch: forms the motion of each lane's piece of the film, tries a step of the pair of
 * {@link DormandPrince54} and finds where its path leaves the piece.
 *
 * <p>The motion is that of {@link org.whither.film.ConservingFlow}, written as polynomials of the place (a, b, c) in the
 * piece. Its rate along c has the form s₀ + s₁ c + c (1 − c) q(c), with s₀ = 0 at a sealed rotor and s₀ + s₁ = 0 at a
 * sealed stator, so that rounding opens no face.
 *
 * <p>Every number is formed by the same operations in the same order as in {@code VectorStep}, each of which IEEE 754
 * rounds in one way: both give the same bits.
 */
class BatchStep {
    /** How far beyond its border a path leaves its piece, as a part of the piece. */
    static final double EDGE = 1e-10;

    /** Steps are longer than the piece takes at the first rates by this factor. */
    static final double BEYOND = 1.1;

    static final int NEWTON_STEPS = 4;
    /** The last of Newton's steps is at most so long: its square is far below rounding. */
    static final double NEWTON_END = 1e-7;

    // spotless:off
    // The pair of DormandPrince54, its numbers by themselves so that the compiler knows them.
    static final double A21 = 1.0 / 5;
    static final double A31 = 3.0 / 40, A32 = 9.0 / 40;
    static final double A41 = 44.0 / 45, A42 = -56.0 / 15, A43 = 32.0 / 9;
    static final double A51 = 19372.0 / 6561, A52 = -25360.0 / 2187, A53 = 64448.0 / 6561, A54 = -212.0 / 729;
    static final double A61 = 9017.0 / 3168, A62 = -355.0 / 33, A63 = 46732.0 / 5247, A64 = 49.0 / 176,
            A65 = -5103.0 / 18656;
    static final double B1 = 35.0 / 384, B3 = 500.0 / 1113, B4 = 125.0 / 192, B5 = -2187.0 / 6784, B6 = 11.0 / 84;
    static final double E1 = B1 - 5179.0 / 57600, E3 = B3 - 7571.0 / 16695, E4 = B4 - 393.0 / 640,
            E5 = B5 + 92097.0 / 339200, E6 = B6 - 187.0 / 2100, E7 = -1.0 / 40;
    static final double D1 = -12715105075.0 / 11282082432.0, D3 = 87487479700.0 / 32700410799.0,
            D4 = -10690763975.0 / 1880347072.0, D5 = 701980252875.0 / 199316789632.0,
            D6 = -1453857185.0 / 822651844.0, D7 = 69997945.0 / 29380423.0;
    // spotless:on

    /**
     * Tries a step of every lane.
     *
     * @param lanes the lanes; raw and, of the state, START, WANTED, LEFT and BOUND are read, the rest is overwritten
     * @param count how many lanes, from the first
     * @param sign 1, or −1 where tracers run against time
     * @param perExtent 1 over the tolerated error in the plane of the face (1/m)
     * @param perThickness 1 over the tolerated error across the film, as a fraction of the film thickness
     */
    void attempt(Lanes lanes, int count, double sign, double perExtent, double perThickness) {
        double[] raw = lanes.raw;
        double[] motion = lanes.motion;
        double[] state = lanes.state;
        compose(raw, motion, sign, count);
        rates(motion, state, Lanes.START, Lanes.RATE, count);
        length(state, count);
        place2(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 3, count);
        place3(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 6, count);
        place4(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 9, count);
        place5(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 12, count);
        place6(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 15, count);
        end(state, count);
        rates(motion, state, Lanes.END, Lanes.RATE + 18, count);
        extend(state, count);
        judge(raw, state, perExtent, perThickness, count);
        leave(state, count);
    }

    /** x y + z. */
    private static double ma(double x, double y, double z) {
        return Math.fma(x, y, z);
    }

    private static double larger(double x, double y) {
        return x > y ? x : y;
    }

    private static double smaller(double x, double y) {
        return x < y ? x : y;
    }

    // ---- the motion of a piece -------------------------------------------------------------------------------------

    void compose(double[] raw, double[] motion, double sign, int count) {
        for (int lane = 0; lane < count; lane++) {
            double layer = number(raw, PackedFlow.LAYER, lane);
            double sigma = number(raw, PackedFlow.SIGMA, lane);
            double squareLayer = layer * layer;
            double under = 2 - (sigma + sigma);
            double over = sigma + sigma;
            double twice = layer + layer;

            double rotor0 = number(raw, PackedFlow.DRAG_ROTOR0, lane);
            double stator0 = number(raw, PackedFlow.DRAG_STATOR0, lane);
            double drag0 = ma(rotor0, under, stator0 * over);
            double dragRise0 = twice * (stator0 - rotor0);
            double rotor1 = number(raw, PackedFlow.DRAG_ROTOR1, lane);
            double stator1 = number(raw, PackedFlow.DRAG_STATOR1, lane);
            double drag1 = ma(rotor1, under, stator1 * over);
            double dragRise1 = twice * (stator1 - rotor1);
            double lean0 = number(raw, PackedFlow.LEAN0, lane);
            double lean1 = number(raw, PackedFlow.LEAN1, lane);
            double bend0 = number(raw, PackedFlow.BEND0, lane);
            double bend1 = number(raw, PackedFlow.BEND1, lane);
            put(motion, Lanes.LEAN, lane, lean0 * drag0);
            put(motion, Lanes.LEAN + 1, lane, lean0 * dragRise0);
            put(motion, Lanes.BEND, lane, bend0 * drag0);
            put(motion, Lanes.BEND + 1, lane, bend0 * dragRise0);
            put(motion, Lanes.LEAN_RISE, lane, lean1 * drag1 - lean0 * drag0);
            put(motion, Lanes.LEAN_RISE + 1, lane, lean1 * dragRise1 - lean0 * dragRise0);
            put(motion, Lanes.BEND_RISE, lane, bend1 * drag1 - bend0 * drag0);
            put(motion, Lanes.BEND_RISE + 1, lane, bend1 * dragRise1 - bend0 * dragRise0);

            // The cubic of a face from its values v and sixths of second derivatives at two levels, p in units of the
            // layer:
            // v₀ + c (v₁ − v₀ − 2p₀ − p₁) + 3p₀ c² + (p₁ − p₀) c³.
            double low = number(raw, PackedFlow.AROUND0_LOW, lane);
            double high = number(raw, PackedFlow.AROUND0_HIGH, lane);
            double lowBend = squareLayer * number(raw, PackedFlow.AROUND0_LOW_BEND, lane);
            double highBend = squareLayer * number(raw, PackedFlow.AROUND0_HIGH_BEND, lane);
            double f0 = low + drag0;
            double f1 = high - low - (lowBend + lowBend) - highBend + dragRise0;
            double f2 = 3 * lowBend;
            double f3 = highBend - lowBend;
            put(motion, Lanes.AROUND, lane, f0);
            put(motion, Lanes.AROUND + 1, lane, f1);
            put(motion, Lanes.AROUND + 2, lane, f2);
            put(motion, Lanes.AROUND + 3, lane, f3);
            low = number(raw, PackedFlow.AROUND1_LOW, lane);
            high = number(raw, PackedFlow.AROUND1_HIGH, lane);
            lowBend = squareLayer * number(raw, PackedFlow.AROUND1_LOW_BEND, lane);
            highBend = squareLayer * number(raw, PackedFlow.AROUND1_HIGH_BEND, lane);
            double e1 = high - low - (lowBend + lowBend) - highBend + dragRise1 - f1;
            double e2 = 3 * lowBend - f2;
            double e3 = highBend - lowBend - f3;
            put(motion, Lanes.AROUND_RISE, lane, low + drag1 - f0);
            put(motion, Lanes.AROUND_RISE + 1, lane, e1);
            put(motion, Lanes.AROUND_RISE + 2, lane, e2);
            put(motion, Lanes.AROUND_RISE + 3, lane, e3);
            low = number(raw, PackedFlow.OUT0_LOW, lane);
            high = number(raw, PackedFlow.OUT0_HIGH, lane);
            lowBend = squareLayer * number(raw, PackedFlow.OUT0_LOW_BEND, lane);
            highBend = squareLayer * number(raw, PackedFlow.OUT0_HIGH_BEND, lane);
            f0 = low;
            f1 = high - low - (lowBend + lowBend) - highBend;
            f2 = 3 * lowBend;
            f3 = highBend - lowBend;
            put(motion, Lanes.OUT, lane, f0);
            put(motion, Lanes.OUT + 1, lane, f1);
            put(motion, Lanes.OUT + 2, lane, f2);
            put(motion, Lanes.OUT + 3, lane, f3);
            low = number(raw, PackedFlow.OUT1_LOW, lane);
            high = number(raw, PackedFlow.OUT1_HIGH, lane);
            lowBend = squareLayer * number(raw, PackedFlow.OUT1_LOW_BEND, lane);
            highBend = squareLayer * number(raw, PackedFlow.OUT1_HIGH_BEND, lane);
            double d1 = high - low - (lowBend + lowBend) - highBend - f1;
            double d2 = 3 * lowBend - f2;
            double d3 = highBend - lowBend - f3;
            put(motion, Lanes.OUT_RISE, lane, low - f0);
            put(motion, Lanes.OUT_RISE + 1, lane, d1);
            put(motion, Lanes.OUT_RISE + 2, lane, d2);
            put(motion, Lanes.OUT_RISE + 3, lane, d3);

            // The integral over c of what leaves the cell, through the flows given at both levels.
            double perLayer = 1 / layer;
            double spreadLow = number(raw, PackedFlow.SPREAD_LOW, lane) * perLayer;
            double spreadHigh = number(raw, PackedFlow.SPREAD_HIGH, lane) * perLayer;
            double q3 = 0.25 * (e3 + d3);
            double q2 = ma(1.0 / 3, e2 + d2, q3);
            put(motion, Lanes.ACROSS, lane, -spreadLow);
            put(motion, Lanes.ACROSS + 1, lane, spreadLow - spreadHigh);
            put(motion, Lanes.ACROSS + 2, lane, ma(0.5, e1 + d1, q2));
            put(motion, Lanes.ACROSS + 3, lane, q2);
            put(motion, Lanes.ACROSS + 4, lane, q3);

            // Linear in a, b, c: a number for each product of them.
            double s000 = number(raw, PackedFlow.SQUARE_000, lane);
            double s100 = number(raw, PackedFlow.SQUARE_100, lane) - s000;
            double s010 = number(raw, PackedFlow.SQUARE_010, lane) - s000;
            double s110 = number(raw, PackedFlow.SQUARE_110, lane) - s000 - s100 - s010;
            double s001 = number(raw, PackedFlow.SQUARE_001, lane);
            double s101 = number(raw, PackedFlow.SQUARE_101, lane) - s001;
            double s011 = number(raw, PackedFlow.SQUARE_011, lane) - s001;
            double s111 = number(raw, PackedFlow.SQUARE_111, lane) - s001 - s101 - s011;
            put(motion, Lanes.SQUARE, lane, s000);
            put(motion, Lanes.SQUARE + 1, lane, s100);
            put(motion, Lanes.SQUARE + 2, lane, s010);
            put(motion, Lanes.SQUARE + 3, lane, s110);
            put(motion, Lanes.SQUARE + 4, lane, s001 - s000);
            put(motion, Lanes.SQUARE + 5, lane, s101 - s100);
            put(motion, Lanes.SQUARE + 6, lane, s011 - s010);
            put(motion, Lanes.SQUARE + 7, lane, s111 - s110);

            double h00 = number(raw, PackedFlow.THICKNESS_00, lane);
            double h10 = number(raw, PackedFlow.THICKNESS_10, lane) - h00;
            double h01 = number(raw, PackedFlow.THICKNESS_01, lane) - h00;
            put(motion, Lanes.THICKNESS, lane, h00);
            put(motion, Lanes.THICKNESS + 1, lane, h10);
            put(motion, Lanes.THICKNESS + 2, lane, h01);
            put(motion, Lanes.THICKNESS + 3, lane, number(raw, PackedFlow.THICKNESS_11, lane) - h00 - h10 - h01);

            double radius = number(raw, PackedFlow.RADIUS, lane);
            double depth = number(raw, PackedFlow.DEPTH, lane);
            double width = number(raw, PackedFlow.WIDTH_0, lane);
            double widening = number(raw, PackedFlow.WIDTH_1, lane) - width;
            double signed = sign * depth;
            put(motion, Lanes.AREA, lane, signed * (radius * width));
            put(motion, Lanes.AREA + 1, lane, signed * ma(depth, width, radius * widening));
            put(motion, Lanes.AREA + 2, lane, signed * (depth * widening));
        }
    }

    private static double number(double[] numbers, int n, int lane) {
        return numbers[n * LANES + lane];
    }

    private static void put(double[] numbers, int n, int lane, double value) {
        numbers[n * LANES + lane] = value;
    }

    /** The rates (1/s) at a place. */
    void rates(double[] motion, double[] state, int place, int rate, int count) {
        for (int lane = 0; lane < count; lane++) {
            double a = number(state, place, lane);
            double b = number(state, place + 1, lane);
            double c = number(state, place + 2, lane);
            double bubble = b * (1 - b);
            double centre = b + b - 1;
            double curve = ma(-6, bubble, 1);
            double leanRise = ma(c, number(motion, Lanes.LEAN_RISE + 1, lane), number(motion, Lanes.LEAN_RISE, lane));
            double bendRise = ma(c, number(motion, Lanes.BEND_RISE + 1, lane), number(motion, Lanes.BEND_RISE, lane));
            double lean = ma(c, number(motion, Lanes.LEAN + 1, lane), number(motion, Lanes.LEAN, lane));
            double bend = ma(c, number(motion, Lanes.BEND + 1, lane), number(motion, Lanes.BEND, lane));
            double rise = ma(curve, bendRise, ma(centre, leanRise, cubic(motion, Lanes.AROUND_RISE, c, lane)));
            double here = ma(curve, bend, ma(centre, lean, cubic(motion, Lanes.AROUND, c, lane)));
            double around = ma(a, rise, here);
            double out = ma(
                    bubble,
                    ma(centre, bendRise, leanRise),
                    ma(b, cubic(motion, Lanes.OUT_RISE, c, lane), cubic(motion, Lanes.OUT, c, lane)));
            double parabola = ma(
                    c,
                    ma(c, number(motion, Lanes.ACROSS + 4, lane), number(motion, Lanes.ACROSS + 3, lane)),
                    number(motion, Lanes.ACROSS + 2, lane));
            double across = ma(
                    c * (1 - c),
                    parabola,
                    ma(c, number(motion, Lanes.ACROSS + 1, lane), number(motion, Lanes.ACROSS, lane)));

            double s0 = ma(c, number(motion, Lanes.SQUARE + 4, lane), number(motion, Lanes.SQUARE, lane));
            double sa = ma(c, number(motion, Lanes.SQUARE + 5, lane), number(motion, Lanes.SQUARE + 1, lane));
            double sb = ma(c, number(motion, Lanes.SQUARE + 6, lane), number(motion, Lanes.SQUARE + 2, lane));
            double sab = ma(c, number(motion, Lanes.SQUARE + 7, lane), number(motion, Lanes.SQUARE + 3, lane));
            double density = Math.sqrt(ma(b, ma(a, sab, sb), ma(a, sa, s0)));
            double thickness = ma(
                    b,
                    ma(a, number(motion, Lanes.THICKNESS + 3, lane), number(motion, Lanes.THICKNESS + 2, lane)),
                    ma(a, number(motion, Lanes.THICKNESS + 1, lane), number(motion, Lanes.THICKNESS, lane)));
            double area = ma(
                    b,
                    ma(b, number(motion, Lanes.AREA + 2, lane), number(motion, Lanes.AREA + 1, lane)),
                    number(motion, Lanes.AREA, lane));
            double perMass = 1 / (density * (thickness * area));
            put(state, rate, lane, around * perMass);
            put(state, rate + 1, lane, out * perMass);
            put(state, rate + 2, lane, across * perMass);
        }
    }

    private static double cubic(double[] motion, int at, double c, int lane) {
        return ma(
                c,
                ma(c, ma(c, number(motion, at + 3, lane), number(motion, at + 2, lane)), number(motion, at + 1, lane)),
                number(motion, at, lane));
    }

    // ---- the step --------------------------------------------------------------------------------------------------

    /** The length of the step: as wanted, or a little more than to cross the piece at the rates of its start. */
    void length(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double a = Math.abs(number(state, Lanes.RATE, lane));
            double b = Math.abs(number(state, Lanes.RATE + 1, lane));
            double c = Math.abs(number(state, Lanes.RATE + 2, lane));
            double fastest = larger(a, b);
            fastest = larger(fastest, c);
            put(state, Lanes.FASTEST, lane, a + b + c);
            double step = BEYOND / fastest;
            double wanted = number(state, Lanes.WANTED, lane);
            double left = number(state, Lanes.LEFT, lane);
            step = smaller(step, wanted);
            put(state, Lanes.STEP, lane, smaller(step, left));
        }
    }

    void place2(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = A21 * rate(state, 1, n, lane);
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    void place3(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = ma(A32, rate(state, 2, n, lane), A31 * rate(state, 1, n, lane));
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    void place4(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = ma(A42, rate(state, 2, n, lane), A41 * rate(state, 1, n, lane));
                sum = ma(A43, rate(state, 3, n, lane), sum);
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    void place5(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = ma(A52, rate(state, 2, n, lane), A51 * rate(state, 1, n, lane));
                sum = ma(A54, rate(state, 4, n, lane), ma(A53, rate(state, 3, n, lane), sum));
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    void place6(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = ma(A62, rate(state, 2, n, lane), A61 * rate(state, 1, n, lane));
                sum = ma(A64, rate(state, 4, n, lane), ma(A63, rate(state, 3, n, lane), sum));
                sum = ma(A65, rate(state, 5, n, lane), sum);
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    void end(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double sum = ma(B3, rate(state, 3, n, lane), B1 * rate(state, 1, n, lane));
                sum = ma(B5, rate(state, 5, n, lane), ma(B4, rate(state, 4, n, lane), sum));
                sum = ma(B6, rate(state, 6, n, lane), sum);
                put(state, Lanes.END + n, lane, ma(step, sum, number(state, Lanes.START + n, lane)));
            }
        }
    }

    private static double rate(double[] state, int stage, int n, int lane) {
        return number(state, Lanes.RATE - 3 + 3 * stage + n, lane);
    }

    /** The difference of the two orders, and the continuous extension as a polynomial of the fraction of the step. */
    void extend(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double step = number(state, Lanes.STEP, lane);
            for (int n = 0; n < 3; n++) {
                double first = rate(state, 1, n, lane);
                double third = rate(state, 3, n, lane);
                double fourth = rate(state, 4, n, lane);
                double fifth = rate(state, 5, n, lane);
                double sixth = rate(state, 6, n, lane);
                double seventh = rate(state, 7, n, lane);
                double sum = ma(E4, fourth, ma(E3, third, E1 * first));
                sum = ma(E7, seventh, ma(E6, sixth, ma(E5, fifth, sum)));
                put(state, Lanes.OFF + n, lane, step * sum);
                double last = ma(D4, fourth, ma(D3, third, D1 * first));
                last = step * ma(D7, seventh, ma(D6, sixth, ma(D5, fifth, last)));
                double linear = step * first;
                double rise = number(state, Lanes.END + n, lane) - number(state, Lanes.START + n, lane);
                double bend = linear - rise;
                double twist = rise - step * seventh - bend;
                put(state, Lanes.POWER + n, lane, linear);
                put(state, Lanes.POWER + 3 + n, lane, twist + last - bend);
                put(state, Lanes.POWER + 6 + n, lane, -twist - (last + last));
                put(state, Lanes.POWER + 9 + n, lane, last);
            }
        }
    }

    /** The error of the step in the terms of the tolerance. */
    void judge(double[] raw, double[] state, double perExtent, double perThickness, int count) {
        for (int lane = 0; lane < count; lane++) {
            double offA = number(state, Lanes.OFF, lane);
            double offB = number(state, Lanes.OFF + 1, lane);
            double offC = number(state, Lanes.OFF + 2, lane);
            double a = number(state, Lanes.START, lane);
            double b = number(state, Lanes.START + 1, lane);
            double narrow = number(raw, PackedFlow.WIDTH_0, lane);
            double depth = number(raw, PackedFlow.DEPTH, lane);
            double widening = number(raw, PackedFlow.WIDTH_1, lane) - narrow;
            double width = ma(b, widening, narrow);
            double rise = ma(a, widening, number(raw, PackedFlow.RISE, lane));
            double radius = ma(b, depth, number(raw, PackedFlow.RADIUS, lane));
            double around = Math.abs(radius * ma(width, offA, rise * offB)) * perExtent;
            double out = Math.abs(depth * offB) * perExtent;
            double across = Math.abs(number(raw, PackedFlow.LAYER, lane) * offC) * perThickness;
            double largest = larger(around, out);
            put(state, Lanes.ERROR, lane, larger(largest, across));
            double ends = number(state, Lanes.END, lane) + number(state, Lanes.END + 1, lane);
            double offs = Math.abs(offA) + Math.abs(offB) + Math.abs(offC);
            put(state, Lanes.CHECK, lane, offs + Math.abs(ends) + Math.abs(number(state, Lanes.END + 2, lane)));
        }
    }

    // ---- the way out -----------------------------------------------------------------------------------------------

    /**
     * Where the path of the step leaves its piece: by the border that it would pass first if the step were straight, found
     * by Newton's method on the continuous extension. Where that does not settle it, the fraction is left negative.
     */
    void leave(double[] state, int count) {
        for (int lane = 0; lane < count; lane++) {
            double lowC = number(state, Lanes.BOUND, lane);
            double highC = number(state, Lanes.BOUND + 1, lane);
            double startA = number(state, Lanes.START, lane);
            double startB = number(state, Lanes.START + 1, lane);
            double startC = number(state, Lanes.START + 2, lane);
            double endA = number(state, Lanes.END, lane);
            double endB = number(state, Lanes.END + 1, lane);
            double endC = number(state, Lanes.END + 2, lane);
            double targetA = endA < 0.5 ? -EDGE : 1 + EDGE;
            double targetB = endB < 0.5 ? -EDGE : 1 + EDGE;
            double targetC = endC < 0.5 ? lowC : highC;
            // Fractions of a straight step; above 1 where its end is inside.
            double fractionA = (targetA - startA) / (endA - startA);
            double fractionB = (targetB - startB) / (endB - startB);
            double fractionC = (targetC - startC) / (endC - startC);
            fractionA = endA < -EDGE || endA > 1 + EDGE ? fractionA : 2;
            fractionB = endB < -EDGE || endB > 1 + EDGE ? fractionB : 2;
            fractionC = endC < lowC || endC > highC ? fractionC : 2;
            boolean byB = fractionB < fractionA;
            double fraction = byB ? fractionB : fractionA;
            boolean byC = fractionC < fraction;
            fraction = byC ? fractionC : fraction;
            double target = byC ? targetC : byB ? targetB : targetA;
            double way = byC ? 3 : byB ? 2 : 1;
            way = target < 0.5 ? -way : way;
            boolean out = fraction <= 1;

            int n = byC ? 2 : byB ? 1 : 0;
            double p0 = (byC ? startC : byB ? startB : startA) - target;
            double p1 = number(state, Lanes.POWER + n, lane);
            double p2 = number(state, Lanes.POWER + 3 + n, lane);
            double p3 = number(state, Lanes.POWER + 6 + n, lane);
            double p4 = number(state, Lanes.POWER + 9 + n, lane);
            double d2 = p2 + p2;
            double d3 = 3 * p3;
            double d4 = 4 * p4;
            double change = 0;
            for (int newton = 0; newton < NEWTON_STEPS; newton++) {
                double value = ma(fraction, ma(fraction, ma(fraction, ma(fraction, p4, p3), p2), p1), p0);
                double slope = ma(fraction, ma(fraction, ma(fraction, d4, d3), d2), p1);
                change = value / slope;
                fraction = fraction - change;
            }
            double at = out ? fraction : 1;
            // Another border may have been passed before, and left behind again by the end: look at the middle too.
            double half = out ? at : 0.5;
            double a = at(state, 0, half, lane);
            double b = at(state, 1, half, lane);
            double c = at(state, 2, half, lane);
            boolean settled = (out && !byB && !byC || !(a < -EDGE || a > 1 + EDGE))
                    && (out && byB && !byC || !(b < -EDGE || b > 1 + EDGE))
                    && (out && byC || !(c < lowC || c > highC));
            boolean found = !out || Math.abs(change) < NEWTON_END && fraction >= 0 && fraction <= 1;
            put(state, Lanes.NEXT, lane, out ? a : endA);
            put(state, Lanes.NEXT + 1, lane, out ? b : endB);
            put(state, Lanes.NEXT + 2, lane, out ? c : endC);
            put(state, Lanes.FRACTION, lane, settled && found ? at : -1);
            put(state, Lanes.WAY, lane, out ? way : 0);
        }
    }

    static double at(double[] state, int n, double fraction, int lane) {
        double p1 = number(state, Lanes.POWER + n, lane);
        double p2 = number(state, Lanes.POWER + 3 + n, lane);
        double p3 = number(state, Lanes.POWER + 6 + n, lane);
        double p4 = number(state, Lanes.POWER + 9 + n, lane);
        return ma(
                fraction,
                ma(fraction, ma(fraction, ma(fraction, p4, p3), p2), p1),
                number(state, Lanes.START + n, lane));
    }
}
