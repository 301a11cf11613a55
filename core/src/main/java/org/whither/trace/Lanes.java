package org.whither.trace;

import org.whither.film.PackedFlow;

/**
 * The tracers that are being followed side by side, one a lane. Number n of a lane is at {@code n * LANES + lane} of its
 * array, so that a step of one kind works on neighbouring numbers. A tracer's place is (a, b, c), each 0 … 1 across its
 * piece of the film along θ, r and σ.
 */
final class Lanes {
    /** Lanes side by side. */
    static final int LANES = PackedFlow.LANES;

    // What the motion in a piece is made of, in {@code motion}; see BatchStep.compose.
    /** Flow density through the face a = 0, a cubic in c. */
    static final int AROUND = 0;
    /** How much more goes through the face a = 1, a cubic in c. */
    static final int AROUND_RISE = 4;
    /** How the flow through the face a = 0 leans along b, linear in c. */
    static final int LEAN = 8;
    /** How it bends along b, linear in c. */
    static final int BEND = 10;
    /** How much more the face a = 1 leans. */
    static final int LEAN_RISE = 12;
    /** How much more it bends. */
    static final int BEND_RISE = 14;
    /** Flow density through the face b = 0, a cubic in c. */
    static final int OUT = 16;
    /** How much more goes through the face b = 1, a cubic in c. */
    static final int OUT_RISE = 20;
    /** Flow towards the level above: linear in c, and c (1 − c) times a parabola. */
    static final int ACROSS = 24;
    /** Square of the density, linear in a, b and c. */
    static final int SQUARE = 29;
    /** Film thickness, linear in a and b. */
    static final int THICKNESS = 37;
    /** Area of the cell a unit of a and b, a parabola in b; negative where tracers run against time. */
    static final int AREA = 41;

    static final int MOTION_NUMBERS = 44;

    // A lane's state and its step, in {@code state}; three numbers each where nothing else is said.
    /** Place at the start of the step. */
    static final int START = 0;
    /** Place at which the motion is asked for; at last the end of the step. */
    static final int END = 3;
    /** The seven rates of the step (1/s), 21 numbers. */
    static final int RATE = 6;
    /** Coefficients of the fraction of the step, of its square, cube and fourth power, in the place; 12 numbers. */
    static final int POWER = 27;
    /** Where the path leaves its piece, or the end of the step. */
    static final int NEXT = 39;
    /** Length of the step (s), 1 number. */
    static final int STEP = 42;
    /** Wanted length of the step (s), 1 number. */
    static final int WANTED = 43;
    /** Time left (s), 1 number. */
    static final int LEFT = 44;
    /** Error of the step; 1 is just tolerated; 1 number. */
    static final int ERROR = 45;
    /** A number that is not finite where something of the step is not. */
    static final int CHECK = 46;
    /** Fraction of the step at which the path leaves its piece, 1 where it does not; negative where that is to be searched. */
    static final int FRACTION = 47;
    /** Way out: 0 none, −1 and 1 along a, −2 and 2 along b, −3 and 3 along c; 1 number. */
    static final int WAY = 48;
    /** Bounds of c beyond which the path has left its piece: infinite at a sealed face; 2 numbers. */
    static final int BOUND = 49;
    /** Largest of the first rates (1/s), 1 number. */
    static final int FASTEST = 51;

    /** Difference of the two orders. */
    static final int OFF = 52;

    /** The path towards the border that is passed first, less that border: a polynomial; 5 numbers. */
    static final int CHOSEN = 55;

    static final int STATE_NUMBERS = 60;

    /** As {@link PackedFlow#load} gives it. */
    final double[] raw = new double[PackedFlow.NUMBERS * LANES];
    /** As {@link PackedFlow#loadMeasure} gives it. */
    final double[] rawMeasure = new double[PackedFlow.MEASURE_NUMBERS * LANES];

    final double[] motion = new double[MOTION_NUMBERS * LANES];
    final double[] state = new double[STATE_NUMBERS * LANES];
}
