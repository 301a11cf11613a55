package org.whither.bench;

import java.util.ArrayList;
import java.util.List;
import java.util.SplittableRandom;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Direction;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/** The task by which tracing is measured: tracers from random points of the film, to their exits or for 20 revolutions. */
final class Work {
    static final int TRACERS = 20_000;
    static final double TOLERANCE = 1e-6;
    static final int REVOLUTIONS = 20;

    private Work() {}

    /** How tracers are followed. */
    static TraceSettings settings(Film film, double tolerance) {
        double limit = REVOLUTIONS * 2 * Math.PI / Math.abs(film.conditions().rotationRate());
        return new TraceSettings(Frame.ROTATING, Direction.FORWARD, tolerance, limit);
    }

    /** Random points of a film, evenly spread over angle, radius and height. */
    static List<Release> releases(FilmFlow flow, int count) {
        FilmGrid grid = flow.film().grid();
        SplittableRandom random = new SplittableRandom(4);
        List<Release> releases = new ArrayList<>(count);
        for (int n = 0; n < count; n++) {
            releases.add(new Release(
                    2 * Math.PI * random.nextDouble(),
                    grid.innerRadius() + random.nextDouble() * (grid.outerRadius() - grid.innerRadius()),
                    random.nextDouble(),
                    1));
        }
        return releases;
    }
}
