package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import javax.imageio.ImageIO;
import org.whither.fate.BorderBalance;
import org.whither.fate.FedPoint;
import org.whither.fate.FilmMass;
import org.whither.fate.ReleasePlan;
import org.whither.fate.Split;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/** What the pictures of a field are made of, and their files. */
final class Pictures {
    private static final int MOST_FED_POINTS = 1024;

    private Pictures() {}

    /** How a picture's tracers are followed; the time limit as in a split. */
    static TraceSettings settings(FilmFlow flow, Frame frame, double tolerance) {
        double inflow = BorderBalance.of(flow).inflow();
        double limit = inflow > 0 ? Split.PATIENCE * FilmMass.of(flow) / inflow : 1;
        return new TraceSettings(frame, Direction.FORWARD, tolerance, limit);
    }

    /** Points over the feed with the ends of their tracers; none where nothing enters through it. */
    static List<FedPoint> fed(FilmFlow flow, TraceSettings settings, long seed, int threads) {
        List<Release> releases =
                ReleasePlan.entering(flow, PathEnd.Border.SUPPLY).releases(seed, 0, MOST_FED_POINTS);
        List<PathEnd> ends = ParallelTracing.follow(flow, settings, releases, threads, n -> {})
                .ends();
        List<FedPoint> fed = new ArrayList<>();
        for (int n = 0; n < ends.size(); n++) {
            fed.add(new FedPoint(releases.get(n), ends.get(n)));
        }
        return fed;
    }

    /** So many of the points of a split as a picture can show. */
    static List<FedPoint> few(List<FedPoint> fed) {
        return fed.subList(0, Math.min(fed.size(), MOST_FED_POINTS));
    }

    /**
     * Paths from where gas enters, chosen to differ: from many tracers few that show every way that a good part of the
     * gas goes, at different heights, from different places of the feed. Where gas enters at a diameter too, a quarter
     * of them starts there.
     *
     * @param count how many paths in all
     */
    static List<org.whither.trace.Path> paths(FilmFlow flow, TraceSettings settings, long seed, int count) {
        List<PathEnd.Border> entries = new ArrayList<>();
        double inflow = BorderBalance.of(flow).inflow();
        for (PathEnd.Border border : PathEnd.Border.values()) {
            if (ReleasePlan.entering(flow, border).massFlow() > 1e-9 * inflow) {
                entries.add(border);
            }
        }
        List<org.whither.trace.Path> paths = new ArrayList<>();
        int atDiameters = entries.contains(PathEnd.Border.SUPPLY) ? (count + 2) / 4 : count;
        int diameters =
                (int) entries.stream().filter(b -> b != PathEnd.Border.SUPPLY).count();
        for (PathEnd.Border border : entries) {
            int number = border != PathEnd.Border.SUPPLY
                    ? atDiameters / diameters
                    : diameters > 0 ? count - atDiameters / diameters * diameters : count;
            paths.addAll(PathChoice.choose(recorded(flow, settings, border, seed, 8 * number), number));
        }
        return paths;
    }

    private static List<org.whither.trace.Path> recorded(
            FilmFlow flow, TraceSettings settings, PathEnd.Border border, long seed, int number) {
        Tracer tracer = new Tracer(flow, settings);
        List<org.whither.trace.Path> paths = new ArrayList<>();
        for (Release release :
                ReleasePlan.entering(flow, border).releases(seed, 0, Math.min(number, MOST_FED_POINTS))) {
            paths.add(tracer.record(release));
        }
        return paths;
    }

    /** Writes a picture as PNG. */
    static void write(BufferedImage image, Path file) throws IOException {
        if (!ImageIO.write(image, "png", file.toFile())) {
            throw new IOException(file + " cannot be written: this Java has no PNG writer");
        }
    }
}
