package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;

import org.junit.jupiter.api.Test;
import org.whither.fate.Destination;
import org.whither.fate.ReleasePlan;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Direction;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/** A seal that is its own mirror image, turning one way and the other: every path is mirrored, in either frame. */
class MirroredSealTest {
    @Test
    void paths_bidirectionalSealTurningBackwards_areMirrored() {
        GridSize size = new GridSize(36, 51);
        FilmFlow onwards = FilmFlow.of(
                SampleSeals.compute("pockets", "design", size, x -> {}).film());
        FilmFlow backwards = FilmFlow.of(
                SampleSeals.compute("pockets", "backwards", size, x -> {}).film());
        // On a grid of this size the mirror runs through the middle of the sector.
        FilmGrid grid = onwards.film().grid();
        double twice = grid.theta(0, 0) + grid.theta(grid.ni() - 1, 0);
        assertEquals(
                onwards.film().conditions().rotationRate(),
                -backwards.film().conditions().rotationRate(),
                0);
        for (Frame frame : Frame.values()) {
            TraceSettings settings = new TraceSettings(frame, Direction.FORWARD, 1e-8, 1);
            Tracer one = new Tracer(onwards, settings);
            Tracer other = new Tracer(backwards, settings);
            for (Release release :
                    ReleasePlan.entering(onwards, PathEnd.Border.SUPPLY).releases(4, 0, 64)) {
                PathEnd a = one.follow(release);
                PathEnd b = other.follow(
                        new Release(twice - release.theta(), release.radius(), release.sigma(), release.massFlow()));
                assertEquals(Destination.of(a), Destination.of(b));
                assertEquals(a.time(), b.time(), 1e-4 * a.time());
                assertEquals(
                        a.position().stationaryTheta() - release.theta(),
                        -(b.position().stationaryTheta() - (twice - release.theta())),
                        1e-4 * (1 + Math.abs(a.position().stationaryTheta())));
                assertEquals(a.position().sigma(), b.position().sigma(), 1e-3);
            }
        }
    }
}
