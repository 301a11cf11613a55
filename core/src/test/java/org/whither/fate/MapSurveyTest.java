package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.SplittableRandom;
import java.util.function.DoubleBinaryOperator;
import org.junit.jupiter.api.Test;

/** Surveys of invented maps, of which every area is known. */
class MapSurveyTest {
    private static final int FATES = 4;
    private static final int UNKNOWN = 3;
    private static final int PLENTY = 1 << 22;

    /** Finds fates by a formula, and counts what it is asked. */
    private static final class Formula implements MapSurvey.Explorer {
        private final DoubleBinaryOperator fate;
        private final int most;
        private int asked;

        Formula(DoubleBinaryOperator fate, int most) {
            this.fate = fate;
            this.most = most;
        }

        @Override
        public int[] explore(double[] u, double[] v) {
            asked += u.length;
            int[] found = new int[u.length];
            for (int n = 0; n < found.length; n++) {
                found[n] = (int) fate.applyAsDouble(u[n], v[n]);
            }
            return found;
        }

        @Override
        public int[] check(double[] u, double[] v) {
            return explore(u, v);
        }

        @Override
        public int affordable(double part) {
            return (int) Math.max(0, part * most - asked);
        }
    }

    private static MapSurvey survey(Formula formula, double width, long seed) {
        return new MapSurvey(
                formula, FATES, UNKNOWN, width, PatchMap.MESH, width / 5, new SplittableRandom(seed), x -> {});
    }

    /** Below a wave; area 0.4. */
    private static double wave(double u, double v) {
        return v < 0.4 + 0.25 * Math.sin(2 * Math.PI * u) ? 1 : 0;
    }

    /** 40 layers, each as thick as the next, in the upper half; area of the odd ones 0.25. */
    private static double layers(double u, double v) {
        return v > 0.5 ? Math.floorMod((int) Math.floor((v - 0.5) * 80 + 4 * u), 2) : 0;
    }

    /** A wave, and 40 islands of a third fate, of an area of 2e-4 in all, that the first mesh does not see. */
    private static double islands(double u, double v) {
        double column = u * 40 - Math.floor(u * 40);
        return column < 0.08 && v > 0.0037 && v < 0.0037 + 2e-4 / 0.08 ? 2 : wave(u, v);
    }

    private record Case(String name, DoubleBinaryOperator fate, double[] areas, double width, int seeds) {}

    /** Of many surveys, at least 95 % hold each area; more, since every part of the interval is on the safe side. */
    @Test
    void survey_manySeeds_intervalsHoldTheAreas() {
        Case[] cases = {
            new Case("wave", MapSurveyTest::wave, new double[] {0.6, 0.4, 0}, 0.01, 200),
            new Case("layers", MapSurveyTest::layers, new double[] {0.75, 0.25, 0}, 0.04, 40),
            new Case("islands", MapSurveyTest::islands, new double[] {0.6, 0.3998, 2e-4}, 0.004, 60),
        };
        for (Case one : cases) {
            int[] missed = new int[FATES];
            int reached = 0;
            double[] mean = new double[FATES];
            for (int seed = 0; seed < one.seeds(); seed++) {
                MapSurvey survey = survey(new Formula(one.fate(), PLENTY), one.width(), seed);
                reached += survey.reached() ? 1 : 0;
                for (int fate = 0; fate < one.areas().length; fate++) {
                    Interval interval = survey.interval(fate);
                    double area = one.areas()[fate];
                    missed[fate] += interval.low() <= area && area <= interval.high() ? 0 : 1;
                    mean[fate] += survey.estimate(fate) / one.seeds();
                    assertTrue(!survey.reached() || interval.width() <= one.width());
                }
            }
            for (int fate = 0; fate < one.areas().length; fate++) {
                assertTrue(missed[fate] <= 0.05 * one.seeds(), one.name() + ": " + missed[fate] + " missed");
                assertEquals(one.areas()[fate], mean[fate], 0.1 * one.width(), one.name());
            }
            assertTrue(reached >= 0.8 * one.seeds(), one.name() + ": " + reached + " reached");
        }
    }

    /**
     * Halving the width costs about twice the points, where fates meet in a curve, and less than three times where they lie in layers; released
     * uniformly at random, four times as many, for an area of 0.4 (1.96 / width)² · 4 · 0.24.
     */
    @Test
    void survey_halfTheWidth_costsTwiceThePoints() {
        double wave = costOfHalving(MapSurveyTest::wave, 0.001, 2.2);
        assertTrue(wave < 0.01 * 4 * 0.24 * (1.96 / 0.001) * (1.96 / 0.001), wave + " points");
        costOfHalving(MapSurveyTest::layers, 0.005, 3);
    }

    private static double costOfHalving(DoubleBinaryOperator fate, double narrowest, double most) {
        double before = Double.POSITIVE_INFINITY;
        for (double width = 16 * narrowest; width > 0.9 * narrowest; width /= 2) {
            double asked = 0;
            for (int seed = 0; seed < 4; seed++) {
                Formula formula = new Formula(fate, PLENTY);
                survey(formula, width, seed);
                asked += formula.asked / 4.0;
            }
            assertTrue(asked < most * before, "width " + width + ": " + asked + " points after " + before);
            before = asked;
        }
        return before;
    }

    /** With too few points the interval still holds the truth, and says that it is too wide. */
    @Test
    void survey_fewPoints_isWideAndHonest() {
        for (int seed = 0; seed < 50; seed++) {
            Formula formula = new Formula(MapSurveyTest::layers, 3000);
            MapSurvey survey = survey(formula, 0.001, seed);
            assertFalse(survey.reached());
            assertTrue(formula.asked <= 3000 + 64);
            Interval interval = survey.interval(1);
            assertTrue(interval.width() > 0.001);
            assertTrue(interval.low() <= 0.25 && 0.25 <= interval.high(), interval.toString());
        }
    }

    /** Points whose fate could not be found may have any: the intervals of all fates are wider by them. */
    @Test
    void survey_unknownFates_countForEach() {
        DoubleBinaryOperator hidden = (u, v) -> Math.abs(u - 0.5) < 0.01 ? UNKNOWN : wave(u, v);
        MapSurvey survey = survey(new Formula(hidden, PLENTY), 0.05, 1);
        for (int fate = 0; fate < 2; fate++) {
            Interval interval = survey.interval(fate);
            double area = fate == 0 ? 0.6 : 0.4;
            assertTrue(
                    interval.low() <= area - 0.02 * 0.6 && area + 0.02 * 0.4 <= interval.high(), interval.toString());
        }
        assertEquals(0.02, survey.estimate(UNKNOWN), 0.005);
    }
}
