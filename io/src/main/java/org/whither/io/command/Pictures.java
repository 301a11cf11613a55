package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.eddy.Zone;
import org.whither.fate.BorderBalance;
import org.whither.fate.DestinationMap;
import org.whither.fate.FedPoint;
import org.whither.fate.FilmMass;
import org.whither.fate.ReleasePlan;
import org.whither.fate.Split;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.io.picture.PictureDescription;
import org.whither.io.picture.PictureFacts;
import org.whither.io.picture.PictureJson;
import org.whither.io.picture.PngFile;
import org.whither.io.picture.Stills;
import org.whither.io.picture.View;
import org.whither.render.Part;
import org.whither.render.PictureSettings;
import org.whither.render.PlanData;
import org.whither.render.Quantity;
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

    /**
     * What some pictures need to be computed.
     *
     * @param paths how many paths
     * @param fed whether points of the feed are shown
     * @param ages whether the age of the gas is shown
     * @param destinations whether the destinations of the gas at mid film are shown
     * @param zones whether zones of held gas are outlined
     */
    record Wanted(int paths, boolean fed, boolean ages, boolean destinations, boolean zones) {
        static Wanted of(List<PictureDescription> pictures, int paths, boolean zones) {
            boolean plans = pictures.stream().anyMatch(p -> p.view() == View.PLAN);
            boolean only = pictures.stream().allMatch(p -> p.view() == View.MERIDIAN);
            return new Wanted(
                    only ? 0 : paths,
                    plans && pictures.stream().anyMatch(p -> p.view() == View.PLAN && p.part() == Part.BOTH),
                    pictures.stream().anyMatch(p -> p.view() == View.PLAN && p.show() == Quantity.AGE),
                    pictures.stream().anyMatch(p -> p.view() == View.PLAN && p.show() == Quantity.DESTINATION),
                    zones && pictures.stream().anyMatch(p -> p.view() != View.RELIEF));
        }
    }

    /** Fails at once where pictures cannot be drawn on this machine, before anything is computed for them. */
    static void needed() {
        PictureSettings.startDrawing();
    }

    /** A film with what pictures of it need. */
    static Stills.Subject subject(FilmFlow flow, Wanted wanted, TracingOptions tracing) {
        TraceSettings settings = settings(flow, tracing.frame(), tracing.tolerance());
        List<FedPoint> fed = wanted.fed() ? fed(flow, settings, tracing.seed(), tracing.threads()) : List.of();
        return subject(flow, fed, wanted, tracing);
    }

    /** As above, with points of the feed that are known already. */
    static Stills.Subject subject(FilmFlow flow, List<FedPoint> fed, Wanted wanted, TracingOptions tracing) {
        TraceSettings settings = settings(flow, tracing.frame(), tracing.tolerance());
        double coarse = Math.max(MAP_TOLERANCE, tracing.tolerance());
        TraceSettings quick = new TraceSettings(
                settings.frame(), Direction.FORWARD, coarse, settings.timeLimit() / Split.PATIENCE * MAP_PATIENCE);
        Optional<AgeMap> ages = wanted.ages()
                ? Optional.of(AgeMap.of(flow, quick, AGE_PHASES, AGE_RADII, AGE_HEIGHTS, tracing.threads(), x -> {}))
                : Optional.empty();
        Optional<DestinationMap> destinations = wanted.destinations()
                ? Optional.of(DestinationMap.of(flow, quick, END_PHASES, END_RADII, 0.5, tracing.threads(), x -> {}))
                : Optional.empty();
        List<Zone> zones = wanted.zones() && BorderBalance.of(flow).inflow() > 0
                ? Eddies.of(
                                flow,
                                new EddySettings(
                                        tracing.frame(),
                                        coarse,
                                        EddySettings.PATIENCE,
                                        EddySettings.BUDGET,
                                        tracing.seed(),
                                        tracing.threads()),
                                x -> {})
                        .zones()
                : List.of();
        return new Stills.Subject(
                flow,
                new PlanData(fed, paths(flow, settings, tracing.seed(), wanted.paths()), ages, destinations),
                zones);
    }

    /** Tolerance of the tracers behind a map, whose points are far coarser. */
    private static final double MAP_TOLERANCE = 1e-5;

    /** Times the mean residence that a tracer of a map is followed. */
    private static final double MAP_PATIENCE = 40;

    private static final int AGE_PHASES = 40;
    private static final int AGE_RADII = 36;
    private static final int AGE_HEIGHTS = 9;
    private static final int END_PHASES = 96;
    private static final int END_RADII = 72;

    /** Draws a picture into a folder, as PNG with its facts and, beside it, its description; gives it back. */
    static BufferedImage draw(
            FieldInput input, Stills.Subject subject, PictureDescription picture, String title, Path into)
            throws IOException {
        PictureDescription full = Stills.resolved(subject, picture, title);
        PictureFacts facts = PictureFacts.of(title, input.file().getFileName().toString(), input.sha256());
        BufferedImage image = Stills.draw(subject, full, title);
        PngFile.write(image, full, facts, into.resolve(full.name() + ".png"));
        Files.writeString(into.resolve(full.name() + ".json"), PictureJson.text(full, facts));
        return image;
    }
}
