package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.SplittableRandom;
import java.util.function.DoubleBinaryOperator;
import org.junit.jupiter.api.Test;

class PatchMapTest {
    private static PatchMap map(DoubleBinaryOperator fate) {
        PatchMap.FateFinder finder = (u, v) -> {
            int[] found = new int[u.length];
            for (int n = 0; n < found.length; n++) {
                found[n] = (int) fate.applyAsDouble(u[n], v[n]);
            }
            return found;
        };
        return new PatchMap(finder, 3, PatchMap.MESH, new SplittableRandom(5));
    }

    /** A disc over the line where u = 0 and u = 1 meet; area π r². */
    private static double disc(double u, double v) {
        double across = Math.min(u, 1 - u);
        return across * across + (v - 0.45) * (v - 0.45) < 0.09 ? 1 : 0;
    }

    @Test
    void refine_disc_intervalHoldsItsArea() {
        PatchMap map = map(PatchMapTest::disc);
        for (double target : new double[] {0.1, 0.03, 0.01, 0.003, 0.001, 0.0003}) {
            assertTrue(map.refine(target, () -> 1000));
            assertTrue(map.mixed() <= target);
            assertEquals(1, map.settled(0) + map.settled(1) + map.settled(2) + map.mixed(), 0, "areas add up exactly");
            double area = Math.PI * 0.09;
            assertTrue(map.settled(1) <= area && area <= map.settled(1) + map.mixed());
            assertEquals(area, map.estimate()[1], 0.2 * target + 1e-4);
            assertEquals(0, map.estimate()[2], 0);
        }
    }

    /** A curve, not an area: half the mixed area costs about twice the points, and less where the curve runs along u. */
    @Test
    void refine_halfTheArea_costsTwiceThePoints() {
        PatchMap disc = map(PatchMapTest::disc);
        PatchMap line = map((u, v) -> v < 0.371 ? 1 : 0);
        disc.refine(0.01, () -> 1000);
        line.refine(0.01, () -> 1000);
        int before = disc.points();
        for (double target = 0.005; target > 1e-4; target /= 2) {
            disc.refine(target, () -> 1000);
            assertTrue(disc.points() < 2.3 * before, disc.points() + " after " + before);
            assertTrue(disc.points() > 1.3 * before, disc.points() + " after " + before);
            before = disc.points();
            int lineBefore = line.points();
            line.refine(target, () -> 1000);
            assertTrue(line.points() <= lineBefore + 3 * PatchMap.MESH);
        }
        assertTrue(line.points() < 1500, line.points() + " points");
    }

    /** An island between the points of the first mesh: checks find it, and it is mapped from there. */
    @Test
    void place_missedIsland_isFoundAndMapped() {
        double size = 0.004;
        PatchMap map = map((u, v) -> Math.abs(u - 0.51) < size && Math.abs(v - 0.52) < size ? 1 : 0);
        assertEquals(0, map.mixed(), 0);
        double[] u = {0.2, 0.511, 0.7};
        double[] v = {0.2, 0.521, 0.9};
        int[] fates = {0, 1, 0};
        assertEquals(0, map.settledFate(u[1], v[1]));
        assertEquals(0, map.mixed(), 0);
        map.place(u, v, fates);
        assertEquals(1.0 / 256, map.mixed(), 0);
        assertEquals(PatchMap.MIXED, map.settledFate(u[1], v[1]));
        assertTrue(map.refine(1e-6, () -> 1000));
        assertEquals(4 * size * size, map.settled(1), 2e-6);
    }

    /** Where fates are mixed finely, no budget is enough: the map ends, and says what is not settled. */
    @Test
    void refine_scatteredFates_endsWithTheBudget() {
        PatchMap map = map((u, v) -> ((long) (u * 1e7) * 31 + (long) (v * 1e7)) % 2);
        assertFalse(map.refine(0.01, () -> map.points() < 20_000 ? 1000 : 0));
        assertTrue(map.points() < 22_000);
        assertTrue(map.mixed() > 0.5);
        assertEquals(0.5, map.estimate()[0], 0.05);
    }

    @Test
    void refine_sameSeed_sameMap() {
        PatchMap one = map(PatchMapTest::disc);
        PatchMap two = map(PatchMapTest::disc);
        one.refine(0.001, () -> 1000);
        two.refine(0.001, () -> 1000);
        assertEquals(one.points(), two.points());
        assertEquals(one.settled(1), two.settled(1), 0);
        assertEquals(one.estimate()[1], two.estimate()[1], 0);
    }
}
