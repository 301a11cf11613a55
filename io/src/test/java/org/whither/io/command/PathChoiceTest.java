package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;
import org.whither.trace.Release;

class PathChoiceTest {
    private static Path path(PathEnd.Border border, double theta, double sigma, double run) {
        List<PathPoint> points = List.of(
                new PathPoint(0, theta, theta, 0.06, 0, sigma, 1, 1e5),
                new PathPoint(1, theta + run, theta + run, 0.06, 0, sigma, 1, 1e5));
        PathEnd.Position end = new PathEnd.Position(theta + run, theta + run, 0.06, sigma);
        return new Path(new Release(theta, 0.06, sigma, 1), points, new PathEnd.Left(border, 1, end));
    }

    @Test
    void quotas_giveEachWayOneAndThenFollowTheSizes() {
        assertArrayEquals(new int[] {5, 2}, PathChoice.quotas(new int[] {40, 16}, 7));
        assertArrayEquals(new int[] {6, 1}, PathChoice.quotas(new int[] {98, 2}, 7));
        assertArrayEquals(new int[] {1, 1, 0}, PathChoice.quotas(new int[] {5, 4, 3}, 2));
        assertArrayEquals(new int[] {2, 1}, PathChoice.quotas(new int[] {2, 1}, 9));
    }

    @Test
    void choice_showsEveryWayAndDifferentHeights() {
        List<Path> candidates = new ArrayList<>();
        for (int n = 0; n < 40; n++) {
            candidates.add(path(PathEnd.Border.INNER, 0.01 * n, n < 36 ? 0.95 : 0.1, 0.5));
        }
        for (int n = 0; n < 8; n++) {
            candidates.add(path(PathEnd.Border.OUTER, 0.05 * n, 0.5, n == 0 ? 0.4 : 9));
        }
        List<Path> chosen = PathChoice.choose(candidates, 6);
        assertEquals(6, chosen.size());
        assertEquals(6, new HashSet<>(chosen).size());
        List<Path> inner = chosen.stream()
                .filter(p -> ((PathEnd.Left) p.end()).border() == PathEnd.Border.INNER)
                .toList();
        assertEquals(5, inner.size());
        assertTrue(inner.stream().anyMatch(p -> p.release().sigma() < 0.2), "the few low ones are among them");
        // Of the paths outwards, the one that can be seen whole is preferred to those that run round the ring.
        assertEquals(candidates.get(40), chosen.get(5));
        assertEquals(List.of(), PathChoice.choose(List.of(), 3));
        assertEquals(List.of(), PathChoice.choose(candidates, 0));
    }
}
