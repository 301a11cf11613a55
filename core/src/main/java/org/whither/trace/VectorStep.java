package org.whither.trace;

import static org.whither.trace.Lanes.LANES;

import jdk.incubator.vector.DoubleVector;
import jdk.incubator.vector.VectorMask;
import jdk.incubator.vector.VectorOperators;
import jdk.incubator.vector.VectorSpecies;
import org.whither.film.PackedFlow;

/**
 * The step of {@link BatchStep} on several lanes at once, where the virtual machine has its Vector API: operation by
 * operation the same, so that the bits are the same. Numbers pass from method to method through the arrays, since a vector
 * that leaves a method is put on the heap. Nothing but {@link BatchSteps} may name this class: it does not load without
 * the module.
 */
final class VectorStep extends BatchStep {
    private static final VectorSpecies<Double> S = species();

    private static VectorSpecies<Double> species() {
        VectorSpecies<Double> preferred = DoubleVector.SPECIES_PREFERRED;
        return preferred.length() <= LANES ? preferred : DoubleVector.SPECIES_512;
    }

    /** Lanes that a vector holds. */
    static int width() {
        return S.length();
    }

    @Override
    void compose(double[] raw, double[] motion, double sign, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector layer = DoubleVector.fromArray(S, raw, PackedFlow.LAYER * LANES + lane);
            DoubleVector sigma = DoubleVector.fromArray(S, raw, PackedFlow.SIGMA * LANES + lane);
            DoubleVector squareLayer = layer.mul(layer);
            DoubleVector under = DoubleVector.broadcast(S, 2).sub(sigma.add(sigma));
            DoubleVector over = sigma.add(sigma);
            DoubleVector twice = layer.add(layer);
            DoubleVector rotor0 = DoubleVector.fromArray(S, raw, PackedFlow.DRAG_ROTOR0 * LANES + lane);
            DoubleVector stator0 = DoubleVector.fromArray(S, raw, PackedFlow.DRAG_STATOR0 * LANES + lane);
            DoubleVector drag0 = rotor0.fma(under, stator0.mul(over));
            DoubleVector dragRise0 = twice.mul(stator0.sub(rotor0));
            DoubleVector rotor1 = DoubleVector.fromArray(S, raw, PackedFlow.DRAG_ROTOR1 * LANES + lane);
            DoubleVector stator1 = DoubleVector.fromArray(S, raw, PackedFlow.DRAG_STATOR1 * LANES + lane);
            DoubleVector drag1 = rotor1.fma(under, stator1.mul(over));
            DoubleVector dragRise1 = twice.mul(stator1.sub(rotor1));
            DoubleVector lean0 = DoubleVector.fromArray(S, raw, PackedFlow.LEAN0 * LANES + lane);
            DoubleVector lean1 = DoubleVector.fromArray(S, raw, PackedFlow.LEAN1 * LANES + lane);
            DoubleVector bend0 = DoubleVector.fromArray(S, raw, PackedFlow.BEND0 * LANES + lane);
            DoubleVector bend1 = DoubleVector.fromArray(S, raw, PackedFlow.BEND1 * LANES + lane);
            lean0.mul(drag0).intoArray(motion, Lanes.LEAN * LANES + lane);
            lean0.mul(dragRise0).intoArray(motion, (Lanes.LEAN + 1) * LANES + lane);
            bend0.mul(drag0).intoArray(motion, Lanes.BEND * LANES + lane);
            bend0.mul(dragRise0).intoArray(motion, (Lanes.BEND + 1) * LANES + lane);
            lean1.mul(drag1).sub(lean0.mul(drag0)).intoArray(motion, Lanes.LEAN_RISE * LANES + lane);
            lean1.mul(dragRise1).sub(lean0.mul(dragRise0)).intoArray(motion, (Lanes.LEAN_RISE + 1) * LANES + lane);
            bend1.mul(drag1).sub(bend0.mul(drag0)).intoArray(motion, Lanes.BEND_RISE * LANES + lane);
            bend1.mul(dragRise1).sub(bend0.mul(dragRise0)).intoArray(motion, (Lanes.BEND_RISE + 1) * LANES + lane);
            DoubleVector low = DoubleVector.fromArray(S, raw, PackedFlow.AROUND0_LOW * LANES + lane);
            DoubleVector high = DoubleVector.fromArray(S, raw, PackedFlow.AROUND0_HIGH * LANES + lane);
            DoubleVector lowBend =
                    squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.AROUND0_LOW_BEND * LANES + lane));
            DoubleVector highBend =
                    squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.AROUND0_HIGH_BEND * LANES + lane));
            DoubleVector f0 = low.add(drag0);
            DoubleVector f1 =
                    high.sub(low).sub(lowBend.add(lowBend)).sub(highBend).add(dragRise0);
            DoubleVector f2 = lowBend.mul(3);
            DoubleVector f3 = highBend.sub(lowBend);
            f0.intoArray(motion, Lanes.AROUND * LANES + lane);
            f1.intoArray(motion, (Lanes.AROUND + 1) * LANES + lane);
            f2.intoArray(motion, (Lanes.AROUND + 2) * LANES + lane);
            f3.intoArray(motion, (Lanes.AROUND + 3) * LANES + lane);
            low = DoubleVector.fromArray(S, raw, PackedFlow.AROUND1_LOW * LANES + lane);
            high = DoubleVector.fromArray(S, raw, PackedFlow.AROUND1_HIGH * LANES + lane);
            lowBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.AROUND1_LOW_BEND * LANES + lane));
            highBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.AROUND1_HIGH_BEND * LANES + lane));
            DoubleVector e1 = high.sub(low)
                    .sub(lowBend.add(lowBend))
                    .sub(highBend)
                    .add(dragRise1)
                    .sub(f1);
            DoubleVector e2 = lowBend.mul(3).sub(f2);
            DoubleVector e3 = highBend.sub(lowBend).sub(f3);
            low.add(drag1).sub(f0).intoArray(motion, Lanes.AROUND_RISE * LANES + lane);
            e1.intoArray(motion, (Lanes.AROUND_RISE + 1) * LANES + lane);
            e2.intoArray(motion, (Lanes.AROUND_RISE + 2) * LANES + lane);
            e3.intoArray(motion, (Lanes.AROUND_RISE + 3) * LANES + lane);
            low = DoubleVector.fromArray(S, raw, PackedFlow.OUT0_LOW * LANES + lane);
            high = DoubleVector.fromArray(S, raw, PackedFlow.OUT0_HIGH * LANES + lane);
            lowBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.OUT0_LOW_BEND * LANES + lane));
            highBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.OUT0_HIGH_BEND * LANES + lane));
            f0 = low;
            f1 = high.sub(low).sub(lowBend.add(lowBend)).sub(highBend);
            f2 = lowBend.mul(3);
            f3 = highBend.sub(lowBend);
            f0.intoArray(motion, Lanes.OUT * LANES + lane);
            f1.intoArray(motion, (Lanes.OUT + 1) * LANES + lane);
            f2.intoArray(motion, (Lanes.OUT + 2) * LANES + lane);
            f3.intoArray(motion, (Lanes.OUT + 3) * LANES + lane);
            low = DoubleVector.fromArray(S, raw, PackedFlow.OUT1_LOW * LANES + lane);
            high = DoubleVector.fromArray(S, raw, PackedFlow.OUT1_HIGH * LANES + lane);
            lowBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.OUT1_LOW_BEND * LANES + lane));
            highBend = squareLayer.mul(DoubleVector.fromArray(S, raw, PackedFlow.OUT1_HIGH_BEND * LANES + lane));
            DoubleVector d1 =
                    high.sub(low).sub(lowBend.add(lowBend)).sub(highBend).sub(f1);
            DoubleVector d2 = lowBend.mul(3).sub(f2);
            DoubleVector d3 = highBend.sub(lowBend).sub(f3);
            low.sub(f0).intoArray(motion, Lanes.OUT_RISE * LANES + lane);
            d1.intoArray(motion, (Lanes.OUT_RISE + 1) * LANES + lane);
            d2.intoArray(motion, (Lanes.OUT_RISE + 2) * LANES + lane);
            d3.intoArray(motion, (Lanes.OUT_RISE + 3) * LANES + lane);
            DoubleVector perLayer = DoubleVector.broadcast(S, 1).div(layer);
            DoubleVector spreadLow = DoubleVector.fromArray(S, raw, PackedFlow.SPREAD_LOW * LANES + lane)
                    .mul(perLayer);
            DoubleVector spreadHigh = DoubleVector.fromArray(S, raw, PackedFlow.SPREAD_HIGH * LANES + lane)
                    .mul(perLayer);
            DoubleVector q3 = e3.add(d3).mul(0.25);
            DoubleVector q2 = DoubleVector.broadcast(S, 1.0 / 3).fma(e2.add(d2), q3);
            spreadLow.neg().intoArray(motion, Lanes.ACROSS * LANES + lane);
            spreadLow.sub(spreadHigh).intoArray(motion, (Lanes.ACROSS + 1) * LANES + lane);
            DoubleVector.broadcast(S, 0.5).fma(e1.add(d1), q2).intoArray(motion, (Lanes.ACROSS + 2) * LANES + lane);
            q2.intoArray(motion, (Lanes.ACROSS + 3) * LANES + lane);
            q3.intoArray(motion, (Lanes.ACROSS + 4) * LANES + lane);
            DoubleVector s000 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_000 * LANES + lane);
            DoubleVector s100 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_100 * LANES + lane)
                    .sub(s000);
            DoubleVector s010 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_010 * LANES + lane)
                    .sub(s000);
            DoubleVector s110 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_110 * LANES + lane)
                    .sub(s000)
                    .sub(s100)
                    .sub(s010);
            DoubleVector s001 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_001 * LANES + lane);
            DoubleVector s101 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_101 * LANES + lane)
                    .sub(s001);
            DoubleVector s011 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_011 * LANES + lane)
                    .sub(s001);
            DoubleVector s111 = DoubleVector.fromArray(S, raw, PackedFlow.SQUARE_111 * LANES + lane)
                    .sub(s001)
                    .sub(s101)
                    .sub(s011);
            s000.intoArray(motion, Lanes.SQUARE * LANES + lane);
            s100.intoArray(motion, (Lanes.SQUARE + 1) * LANES + lane);
            s010.intoArray(motion, (Lanes.SQUARE + 2) * LANES + lane);
            s110.intoArray(motion, (Lanes.SQUARE + 3) * LANES + lane);
            s001.sub(s000).intoArray(motion, (Lanes.SQUARE + 4) * LANES + lane);
            s101.sub(s100).intoArray(motion, (Lanes.SQUARE + 5) * LANES + lane);
            s011.sub(s010).intoArray(motion, (Lanes.SQUARE + 6) * LANES + lane);
            s111.sub(s110).intoArray(motion, (Lanes.SQUARE + 7) * LANES + lane);
            DoubleVector h00 = DoubleVector.fromArray(S, raw, PackedFlow.THICKNESS_00 * LANES + lane);
            DoubleVector h10 = DoubleVector.fromArray(S, raw, PackedFlow.THICKNESS_10 * LANES + lane)
                    .sub(h00);
            DoubleVector h01 = DoubleVector.fromArray(S, raw, PackedFlow.THICKNESS_01 * LANES + lane)
                    .sub(h00);
            h00.intoArray(motion, Lanes.THICKNESS * LANES + lane);
            h10.intoArray(motion, (Lanes.THICKNESS + 1) * LANES + lane);
            h01.intoArray(motion, (Lanes.THICKNESS + 2) * LANES + lane);
            DoubleVector.fromArray(S, raw, PackedFlow.THICKNESS_11 * LANES + lane)
                    .sub(h00)
                    .sub(h10)
                    .sub(h01)
                    .intoArray(motion, (Lanes.THICKNESS + 3) * LANES + lane);
            DoubleVector radius = DoubleVector.fromArray(S, raw, PackedFlow.RADIUS * LANES + lane);
            DoubleVector depth = DoubleVector.fromArray(S, raw, PackedFlow.DEPTH * LANES + lane);
            DoubleVector width = DoubleVector.fromArray(S, raw, PackedFlow.WIDTH_0 * LANES + lane);
            DoubleVector widening = DoubleVector.fromArray(S, raw, PackedFlow.WIDTH_1 * LANES + lane)
                    .sub(width);
            DoubleVector signed = depth.mul(sign);
            signed.mul(radius.mul(width)).intoArray(motion, Lanes.AREA * LANES + lane);
            signed.mul(depth.fma(width, radius.mul(widening))).intoArray(motion, (Lanes.AREA + 1) * LANES + lane);
            signed.mul(depth.mul(widening)).intoArray(motion, (Lanes.AREA + 2) * LANES + lane);
        }
    }

    @Override
    void rates(double[] motion, double[] state, int place, int rate, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector a = DoubleVector.fromArray(S, state, place * LANES + lane);
            DoubleVector b = DoubleVector.fromArray(S, state, (place + 1) * LANES + lane);
            DoubleVector c = DoubleVector.fromArray(S, state, (place + 2) * LANES + lane);
            DoubleVector bubble = b.mul(DoubleVector.broadcast(S, 1).sub(b));
            DoubleVector centre = b.add(b).sub(1);
            DoubleVector curve = DoubleVector.broadcast(S, -6).fma(bubble, DoubleVector.broadcast(S, 1));
            DoubleVector leanRise = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.LEAN_RISE + 1) * LANES + lane),
                    DoubleVector.fromArray(S, motion, Lanes.LEAN_RISE * LANES + lane));
            DoubleVector bendRise = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.BEND_RISE + 1) * LANES + lane),
                    DoubleVector.fromArray(S, motion, Lanes.BEND_RISE * LANES + lane));
            DoubleVector lean = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.LEAN + 1) * LANES + lane),
                    DoubleVector.fromArray(S, motion, Lanes.LEAN * LANES + lane));
            DoubleVector bend = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.BEND + 1) * LANES + lane),
                    DoubleVector.fromArray(S, motion, Lanes.BEND * LANES + lane));
            DoubleVector rise = curve.fma(
                    bendRise,
                    centre.fma(
                            leanRise,
                            c.fma(
                                    c.fma(
                                            c.fma(
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.AROUND_RISE + 3) * LANES + lane),
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.AROUND_RISE + 2) * LANES + lane)),
                                            DoubleVector.fromArray(S, motion, (Lanes.AROUND_RISE + 1) * LANES + lane)),
                                    DoubleVector.fromArray(S, motion, Lanes.AROUND_RISE * LANES + lane))));
            DoubleVector here = curve.fma(
                    bend,
                    centre.fma(
                            lean,
                            c.fma(
                                    c.fma(
                                            c.fma(
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.AROUND + 3) * LANES + lane),
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.AROUND + 2) * LANES + lane)),
                                            DoubleVector.fromArray(S, motion, (Lanes.AROUND + 1) * LANES + lane)),
                                    DoubleVector.fromArray(S, motion, Lanes.AROUND * LANES + lane))));
            DoubleVector around = a.fma(rise, here);
            DoubleVector out = bubble.fma(
                    centre.fma(bendRise, leanRise),
                    b.fma(
                            c.fma(
                                    c.fma(
                                            c.fma(
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.OUT_RISE + 3) * LANES + lane),
                                                    DoubleVector.fromArray(
                                                            S, motion, (Lanes.OUT_RISE + 2) * LANES + lane)),
                                            DoubleVector.fromArray(S, motion, (Lanes.OUT_RISE + 1) * LANES + lane)),
                                    DoubleVector.fromArray(S, motion, Lanes.OUT_RISE * LANES + lane)),
                            c.fma(
                                    c.fma(
                                            c.fma(
                                                    DoubleVector.fromArray(S, motion, (Lanes.OUT + 3) * LANES + lane),
                                                    DoubleVector.fromArray(S, motion, (Lanes.OUT + 2) * LANES + lane)),
                                            DoubleVector.fromArray(S, motion, (Lanes.OUT + 1) * LANES + lane)),
                                    DoubleVector.fromArray(S, motion, Lanes.OUT * LANES + lane))));
            DoubleVector parabola = c.fma(
                    c.fma(
                            DoubleVector.fromArray(S, motion, (Lanes.ACROSS + 4) * LANES + lane),
                            DoubleVector.fromArray(S, motion, (Lanes.ACROSS + 3) * LANES + lane)),
                    DoubleVector.fromArray(S, motion, (Lanes.ACROSS + 2) * LANES + lane));
            DoubleVector across = c.mul(DoubleVector.broadcast(S, 1).sub(c))
                    .fma(
                            parabola,
                            c.fma(
                                    DoubleVector.fromArray(S, motion, (Lanes.ACROSS + 1) * LANES + lane),
                                    DoubleVector.fromArray(S, motion, Lanes.ACROSS * LANES + lane)));
            DoubleVector s0 = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 4) * LANES + lane),
                    DoubleVector.fromArray(S, motion, Lanes.SQUARE * LANES + lane));
            DoubleVector sa = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 5) * LANES + lane),
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 1) * LANES + lane));
            DoubleVector sb = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 6) * LANES + lane),
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 2) * LANES + lane));
            DoubleVector sab = c.fma(
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 7) * LANES + lane),
                    DoubleVector.fromArray(S, motion, (Lanes.SQUARE + 3) * LANES + lane));
            DoubleVector density = b.fma(a.fma(sab, sb), a.fma(sa, s0)).sqrt();
            DoubleVector thickness = b.fma(
                    a.fma(
                            DoubleVector.fromArray(S, motion, (Lanes.THICKNESS + 3) * LANES + lane),
                            DoubleVector.fromArray(S, motion, (Lanes.THICKNESS + 2) * LANES + lane)),
                    a.fma(
                            DoubleVector.fromArray(S, motion, (Lanes.THICKNESS + 1) * LANES + lane),
                            DoubleVector.fromArray(S, motion, Lanes.THICKNESS * LANES + lane)));
            DoubleVector area = b.fma(
                    b.fma(
                            DoubleVector.fromArray(S, motion, (Lanes.AREA + 2) * LANES + lane),
                            DoubleVector.fromArray(S, motion, (Lanes.AREA + 1) * LANES + lane)),
                    DoubleVector.fromArray(S, motion, Lanes.AREA * LANES + lane));
            DoubleVector perMass = DoubleVector.broadcast(S, 1).div(density.mul(thickness.mul(area)));
            around.mul(perMass).intoArray(state, rate * LANES + lane);
            out.mul(perMass).intoArray(state, (rate + 1) * LANES + lane);
            across.mul(perMass).intoArray(state, (rate + 2) * LANES + lane);
        }
    }

    @Override
    void length(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector a =
                    DoubleVector.fromArray(S, state, Lanes.RATE * LANES + lane).abs();
            DoubleVector b = DoubleVector.fromArray(S, state, (Lanes.RATE + 1) * LANES + lane)
                    .abs();
            DoubleVector c = DoubleVector.fromArray(S, state, (Lanes.RATE + 2) * LANES + lane)
                    .abs();
            DoubleVector fastest = b.blend(a, b.compare(VectorOperators.LT, a));
            fastest = c.blend(fastest, c.compare(VectorOperators.LT, fastest));
            a.add(b).add(c).intoArray(state, Lanes.FASTEST * LANES + lane);
            DoubleVector step = DoubleVector.broadcast(S, BEYOND).div(fastest);
            DoubleVector wanted = DoubleVector.fromArray(S, state, Lanes.WANTED * LANES + lane);
            DoubleVector left = DoubleVector.fromArray(S, state, Lanes.LEFT * LANES + lane);
            step = wanted.blend(step, step.compare(VectorOperators.LT, wanted));
            left.blend(step, step.compare(VectorOperators.LT, left)).intoArray(state, Lanes.STEP * LANES + lane);
        }
    }

    @Override
    void place2(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                        .mul(A21);
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void place3(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.broadcast(S, A32)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 2 + n) * LANES + lane),
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                                        .mul(A31));
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void place4(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.broadcast(S, A42)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 2 + n) * LANES + lane),
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                                        .mul(A41));
                sum = DoubleVector.broadcast(S, A43)
                        .fma(DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 3 + n) * LANES + lane), sum);
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void place5(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.broadcast(S, A52)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 2 + n) * LANES + lane),
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                                        .mul(A51));
                sum = DoubleVector.broadcast(S, A54)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 4 + n) * LANES + lane),
                                DoubleVector.broadcast(S, A53)
                                        .fma(
                                                DoubleVector.fromArray(
                                                        S, state, (Lanes.RATE - 3 + 3 * 3 + n) * LANES + lane),
                                                sum));
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void place6(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.broadcast(S, A62)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 2 + n) * LANES + lane),
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                                        .mul(A61));
                sum = DoubleVector.broadcast(S, A64)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 4 + n) * LANES + lane),
                                DoubleVector.broadcast(S, A63)
                                        .fma(
                                                DoubleVector.fromArray(
                                                        S, state, (Lanes.RATE - 3 + 3 * 3 + n) * LANES + lane),
                                                sum));
                sum = DoubleVector.broadcast(S, A65)
                        .fma(DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 5 + n) * LANES + lane), sum);
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void end(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector sum = DoubleVector.broadcast(S, B3)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 3 + n) * LANES + lane),
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane)
                                        .mul(B1));
                sum = DoubleVector.broadcast(S, B5)
                        .fma(
                                DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 5 + n) * LANES + lane),
                                DoubleVector.broadcast(S, B4)
                                        .fma(
                                                DoubleVector.fromArray(
                                                        S, state, (Lanes.RATE - 3 + 3 * 4 + n) * LANES + lane),
                                                sum));
                sum = DoubleVector.broadcast(S, B6)
                        .fma(DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 6 + n) * LANES + lane), sum);
                step.fma(sum, DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane))
                        .intoArray(state, (Lanes.END + n) * LANES + lane);
            }
        }
    }

    @Override
    void extend(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector step = DoubleVector.fromArray(S, state, Lanes.STEP * LANES + lane);
            for (int n = 0; n < 3; n++) {
                DoubleVector first = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 1 + n) * LANES + lane);
                DoubleVector third = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 3 + n) * LANES + lane);
                DoubleVector fourth = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 4 + n) * LANES + lane);
                DoubleVector fifth = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 5 + n) * LANES + lane);
                DoubleVector sixth = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 6 + n) * LANES + lane);
                DoubleVector seventh = DoubleVector.fromArray(S, state, (Lanes.RATE - 3 + 3 * 7 + n) * LANES + lane);
                DoubleVector sum = DoubleVector.broadcast(S, E4)
                        .fma(fourth, DoubleVector.broadcast(S, E3).fma(third, first.mul(E1)));
                sum = DoubleVector.broadcast(S, E7)
                        .fma(
                                seventh,
                                DoubleVector.broadcast(S, E6)
                                        .fma(
                                                sixth,
                                                DoubleVector.broadcast(S, E5).fma(fifth, sum)));
                step.mul(sum).intoArray(state, (Lanes.OFF + n) * LANES + lane);
                DoubleVector last = DoubleVector.broadcast(S, D4)
                        .fma(fourth, DoubleVector.broadcast(S, D3).fma(third, first.mul(D1)));
                last = step.mul(DoubleVector.broadcast(S, D7)
                        .fma(
                                seventh,
                                DoubleVector.broadcast(S, D6)
                                        .fma(
                                                sixth,
                                                DoubleVector.broadcast(S, D5).fma(fifth, last))));
                DoubleVector linear = step.mul(first);
                DoubleVector rise = DoubleVector.fromArray(S, state, (Lanes.END + n) * LANES + lane)
                        .sub(DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane));
                DoubleVector bend = linear.sub(rise);
                DoubleVector twist = rise.sub(step.mul(seventh)).sub(bend);
                linear.intoArray(state, (Lanes.POWER + n) * LANES + lane);
                twist.add(last).sub(bend).intoArray(state, (Lanes.POWER + 3 + n) * LANES + lane);
                twist.neg().sub(last.add(last)).intoArray(state, (Lanes.POWER + 6 + n) * LANES + lane);
                last.intoArray(state, (Lanes.POWER + 9 + n) * LANES + lane);
            }
        }
    }

    @Override
    void judge(double[] raw, double[] state, double perExtent, double perThickness, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            DoubleVector offA = DoubleVector.fromArray(S, state, Lanes.OFF * LANES + lane);
            DoubleVector offB = DoubleVector.fromArray(S, state, (Lanes.OFF + 1) * LANES + lane);
            DoubleVector offC = DoubleVector.fromArray(S, state, (Lanes.OFF + 2) * LANES + lane);
            DoubleVector a = DoubleVector.fromArray(S, state, Lanes.START * LANES + lane);
            DoubleVector b = DoubleVector.fromArray(S, state, (Lanes.START + 1) * LANES + lane);
            DoubleVector narrow = DoubleVector.fromArray(S, raw, PackedFlow.WIDTH_0 * LANES + lane);
            DoubleVector depth = DoubleVector.fromArray(S, raw, PackedFlow.DEPTH * LANES + lane);
            DoubleVector widening = DoubleVector.fromArray(S, raw, PackedFlow.WIDTH_1 * LANES + lane)
                    .sub(narrow);
            DoubleVector width = b.fma(widening, narrow);
            DoubleVector rise = a.fma(widening, DoubleVector.fromArray(S, raw, PackedFlow.RISE * LANES + lane));
            DoubleVector radius = b.fma(depth, DoubleVector.fromArray(S, raw, PackedFlow.RADIUS * LANES + lane));
            DoubleVector around =
                    radius.mul(width.fma(offA, rise.mul(offB))).abs().mul(perExtent);
            DoubleVector out = depth.mul(offB).abs().mul(perExtent);
            DoubleVector across = DoubleVector.fromArray(S, raw, PackedFlow.LAYER * LANES + lane)
                    .mul(offC)
                    .abs()
                    .mul(perThickness);
            DoubleVector largest = out.blend(around, out.compare(VectorOperators.LT, around));
            across.blend(largest, across.compare(VectorOperators.LT, largest))
                    .intoArray(state, Lanes.ERROR * LANES + lane);
            DoubleVector ends = DoubleVector.fromArray(S, state, Lanes.END * LANES + lane)
                    .add(DoubleVector.fromArray(S, state, (Lanes.END + 1) * LANES + lane));
            DoubleVector offs = offA.abs().add(offB.abs()).add(offC.abs());
            offs.add(ends.abs())
                    .add(DoubleVector.fromArray(S, state, (Lanes.END + 2) * LANES + lane)
                            .abs())
                    .intoArray(state, Lanes.CHECK * LANES + lane);
        }
    }

    @Override
    void leave(double[] state, int count) {
        for (int lane = 0; lane < count; lane += S.length()) {
            straight(state, lane);
            newton(state, lane);
            settle(state, lane);
        }
    }

    /** Which border a straight step would pass first, and where; see BatchStep.leave. */
    private static void straight(double[] state, int lane) {
        DoubleVector lowC = DoubleVector.fromArray(S, state, Lanes.BOUND * LANES + lane);
        DoubleVector highC = DoubleVector.fromArray(S, state, (Lanes.BOUND + 1) * LANES + lane);
        DoubleVector startA = DoubleVector.fromArray(S, state, Lanes.START * LANES + lane);
        DoubleVector startB = DoubleVector.fromArray(S, state, (Lanes.START + 1) * LANES + lane);
        DoubleVector startC = DoubleVector.fromArray(S, state, (Lanes.START + 2) * LANES + lane);
        DoubleVector endA = DoubleVector.fromArray(S, state, Lanes.END * LANES + lane);
        DoubleVector endB = DoubleVector.fromArray(S, state, (Lanes.END + 1) * LANES + lane);
        DoubleVector endC = DoubleVector.fromArray(S, state, (Lanes.END + 2) * LANES + lane);
        DoubleVector low = DoubleVector.broadcast(S, -EDGE);
        DoubleVector high = DoubleVector.broadcast(S, 1 + EDGE);
        DoubleVector two = DoubleVector.broadcast(S, 2.0);
        DoubleVector targetA = high.blend(low, endA.compare(VectorOperators.LT, 0.5));
        DoubleVector targetB = high.blend(low, endB.compare(VectorOperators.LT, 0.5));
        DoubleVector targetC = highC.blend(lowC, endC.compare(VectorOperators.LT, 0.5));
        DoubleVector fractionA = two.blend(
                targetA.sub(startA).div(endA.sub(startA)),
                endA.compare(VectorOperators.LT, low).or(endA.compare(VectorOperators.GT, high)));
        DoubleVector fractionB = two.blend(
                targetB.sub(startB).div(endB.sub(startB)),
                endB.compare(VectorOperators.LT, low).or(endB.compare(VectorOperators.GT, high)));
        DoubleVector fractionC = two.blend(
                targetC.sub(startC).div(endC.sub(startC)),
                endC.compare(VectorOperators.LT, lowC).or(endC.compare(VectorOperators.GT, highC)));
        VectorMask<Double> byB = fractionB.compare(VectorOperators.LT, fractionA);
        DoubleVector fraction = fractionA.blend(fractionB, byB);
        VectorMask<Double> byC = fractionC.compare(VectorOperators.LT, fraction);
        fraction = fraction.blend(fractionC, byC);
        DoubleVector target = targetA.blend(targetB, byB).blend(targetC, byC);
        DoubleVector way = DoubleVector.broadcast(S, 1.0).blend(two, byB).blend(DoubleVector.broadcast(S, 3.0), byC);
        way = way.blend(way.neg(), target.compare(VectorOperators.LT, 0.5));
        way = way.blend(
                DoubleVector.broadcast(S, 0.0),
                fraction.compare(VectorOperators.LE, 1.0).not());
        startA.blend(startB, byB).blend(startC, byC).sub(target).intoArray(state, Lanes.CHOSEN * LANES + lane);
        for (int n = 0; n < 4; n++) {
            DoubleVector a = DoubleVector.fromArray(S, state, (Lanes.POWER + 3 * n) * LANES + lane);
            DoubleVector b = DoubleVector.fromArray(S, state, (Lanes.POWER + 3 * n + 1) * LANES + lane);
            DoubleVector c = DoubleVector.fromArray(S, state, (Lanes.POWER + 3 * n + 2) * LANES + lane);
            a.blend(b, byB).blend(c, byC).intoArray(state, (Lanes.CHOSEN + 1 + n) * LANES + lane);
        }
        fraction.intoArray(state, Lanes.FRACTION * LANES + lane);
        way.intoArray(state, Lanes.WAY * LANES + lane);
    }

    private static void newton(double[] state, int lane) {
        DoubleVector fraction = DoubleVector.fromArray(S, state, Lanes.FRACTION * LANES + lane);
        DoubleVector p0 = DoubleVector.fromArray(S, state, Lanes.CHOSEN * LANES + lane);
        DoubleVector p1 = DoubleVector.fromArray(S, state, (Lanes.CHOSEN + 1) * LANES + lane);
        DoubleVector p2 = DoubleVector.fromArray(S, state, (Lanes.CHOSEN + 2) * LANES + lane);
        DoubleVector p3 = DoubleVector.fromArray(S, state, (Lanes.CHOSEN + 3) * LANES + lane);
        DoubleVector p4 = DoubleVector.fromArray(S, state, (Lanes.CHOSEN + 4) * LANES + lane);
        DoubleVector d2 = p2.add(p2);
        DoubleVector d3 = p3.mul(3.0);
        DoubleVector d4 = p4.mul(4.0);
        DoubleVector change = d4;
        for (int newton = 0; newton < NEWTON_STEPS; newton++) {
            DoubleVector value = fraction.fma(fraction.fma(fraction.fma(fraction.fma(p4, p3), p2), p1), p0);
            DoubleVector slope = fraction.fma(fraction.fma(fraction.fma(d4, d3), d2), p1);
            change = value.div(slope);
            fraction = fraction.sub(change);
        }
        VectorMask<Double> found = change.abs()
                .compare(VectorOperators.LT, NEWTON_END)
                .and(fraction.compare(VectorOperators.GE, 0.0))
                .and(fraction.compare(VectorOperators.LE, 1.0));
        // Fraction −1 where it is not found, 2 where there is nothing to find.
        VectorMask<Double> inside =
                DoubleVector.fromArray(S, state, Lanes.WAY * LANES + lane).compare(VectorOperators.EQ, 0.0);
        DoubleVector.broadcast(S, -1.0)
                .blend(fraction, found)
                .blend(DoubleVector.broadcast(S, 2.0), inside)
                .intoArray(state, Lanes.FRACTION * LANES + lane);
        DoubleVector.broadcast(S, 0.5).blend(fraction, inside.not()).intoArray(state, Lanes.CHOSEN * LANES + lane);
    }

    /** The place at the way out, and whether it is inside the other borders. */
    private static void settle(double[] state, int lane) {
        DoubleVector half = DoubleVector.fromArray(S, state, Lanes.CHOSEN * LANES + lane);
        DoubleVector fraction = DoubleVector.fromArray(S, state, Lanes.FRACTION * LANES + lane);
        DoubleVector way =
                DoubleVector.fromArray(S, state, Lanes.WAY * LANES + lane).abs();
        VectorMask<Double> inside = way.compare(VectorOperators.EQ, 0.0);
        VectorMask<Double> beyond = fraction.compare(VectorOperators.LT, 0.0);
        for (int n = 0; n < 3; n++) {
            DoubleVector place = half.fma(
                    half.fma(
                            half.fma(
                                    half.fma(
                                            DoubleVector.fromArray(S, state, (Lanes.POWER + 9 + n) * LANES + lane),
                                            DoubleVector.fromArray(S, state, (Lanes.POWER + 6 + n) * LANES + lane)),
                                    DoubleVector.fromArray(S, state, (Lanes.POWER + 3 + n) * LANES + lane)),
                            DoubleVector.fromArray(S, state, (Lanes.POWER + n) * LANES + lane)),
                    DoubleVector.fromArray(S, state, (Lanes.START + n) * LANES + lane));
            DoubleVector low = n == 2
                    ? DoubleVector.fromArray(S, state, Lanes.BOUND * LANES + lane)
                    : DoubleVector.broadcast(S, -EDGE);
            DoubleVector high = n == 2
                    ? DoubleVector.fromArray(S, state, (Lanes.BOUND + 1) * LANES + lane)
                    : DoubleVector.broadcast(S, 1 + EDGE);
            VectorMask<Double> other =
                    way.compare(VectorOperators.EQ, (double) (n + 1)).not();
            beyond = beyond.or(place.compare(VectorOperators.LT, low)
                    .or(place.compare(VectorOperators.GT, high))
                    .and(other));
            place.blend(DoubleVector.fromArray(S, state, (Lanes.END + n) * LANES + lane), inside)
                    .intoArray(state, (Lanes.NEXT + n) * LANES + lane);
        }
        fraction.blend(DoubleVector.broadcast(S, 1.0), inside)
                .blend(DoubleVector.broadcast(S, -1.0), beyond)
                .intoArray(state, Lanes.FRACTION * LANES + lane);
    }
}
