package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.function.DoubleConsumer;
import javax.imageio.ImageIO;
import org.whither.fate.Destination;
import org.whither.fate.FedPoint;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.io.report.ReportPicture;
import org.whither.io.result.FieldSummary;
import org.whither.io.result.SplitResult;
import org.whither.render.Gap;
import org.whither.render.GapSettings;
import org.whither.render.Meridian;
import org.whither.render.MeridianSettings;
import org.whither.render.PictureSettings;
import org.whither.render.Plan;
import org.whither.render.Relief;
import org.whither.render.ReliefSettings;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.TraceSettings;

/** The pictures of a report, each with what it shows in words and what to look at. */
final class ReportPictures {
    private static final int PLAN_PATHS = 8;
    private static final int GAP_PATHS = 7;

    private final FieldInput input;
    private final FilmFlow flow;
    private final TracingOptions tracing;
    private final TraceSettings how;
    private PictureSettings settings;
    private final String prefix;
    private final String inner;
    private final String outer;

    private ReportPictures(FieldInput input, TracingOptions tracing, String prefix) {
        this.input = input;
        this.flow = input.flow();
        this.tracing = tracing;
        this.how = Pictures.settings(flow, tracing.frame(), tracing.tolerance());
        this.settings = PictureSettings.standard(prefix + input.title()).speedsIn(tracing.frame());
        this.prefix = prefix;
        Conditions conditions = flow.film().conditions();
        this.inner = side(conditions.innerSide(), "inner");
        this.outer = side(conditions.outerSide(), "outer");
    }

    /** The pictures of one field. */
    static List<ReportPicture> of(FieldInput input, SplitResult result, TracingOptions tracing, DoubleConsumer progress)
            throws IOException {
        ReportPictures pictures = new ReportPictures(input, tracing, "");
        List<ReportPicture> all = new ArrayList<>();
        all.add(pictures.plan(result));
        progress.accept(0.4);
        all.add(pictures.relief());
        progress.accept(0.7);
        all.add(pictures.gap());
        all.add(pictures.meridian());
        progress.accept(1);
        return all;
    }

    /** The pictures of two fields that are compared, on the same scales. */
    static List<ReportPicture> of(
            FieldInput a,
            SplitResult resultA,
            FieldInput b,
            SplitResult resultB,
            TracingOptions tracing,
            DoubleConsumer progress)
            throws IOException {
        ReportPictures first = new ReportPictures(a, tracing, "A: ");
        ReportPictures second = new ReportPictures(b, tracing, "B: ");
        double[] rangeA = new FieldSummary(a.flow()).pressures();
        double[] rangeB = new FieldSummary(b.flow()).pressures();
        double low = Math.min(rangeA[0], rangeB[0]);
        double high = Math.max(rangeA[1], rangeB[1]);
        if (high > low) {
            first.settings = first.settings.pressures(low, high);
            second.settings = second.settings.pressures(low, high);
        }
        List<ReportPicture> all = new ArrayList<>();
        all.add(first.plan(resultA));
        progress.accept(0.25);
        all.add(second.plan(resultB));
        progress.accept(0.5);
        all.add(first.gap());
        progress.accept(0.75);
        all.add(second.gap());
        progress.accept(1);
        return all;
    }

    private ReportPicture plan(SplitResult result) throws IOException {
        List<FedPoint> fed = Pictures.few(result.split().fed());
        List<Path> few = Pictures.paths(flow, how, tracing.seed(), PLAN_PATHS);
        return picture(
                "plan",
                "The face",
                Plan.draw(flow, fed, few, settings),
                "The seal face of " + input.title()
                        + " seen along the shaft: its film pressure in colour, footprints of " + few.size()
                        + " paths, and one sector enlarged." + fedWords(fed),
                "Seen along the shaft; colour is the pressure of the film."
                        + (fed.isEmpty()
                                ? " Look at where the footprints of the gas end."
                                : " In the strip of the feed every marker stands for the same amount of supply gas and shows"
                                        + " where it ends. Look at where the two kinds meet: that line parts the supply. The"
                                        + " nearer it comes to an edge of the feed, the less is left for that side."));
    }

    private ReportPicture relief() throws IOException {
        List<Path> paths = Pictures.paths(flow, how, tracing.seed(), GAP_PATHS);
        return picture(
                "relief",
                "The pressure",
                Relief.draw(flow, paths, ReliefSettings.ring(settings)),
                "The film pressure of " + input.title() + " drawn as a landscape over the ring, with " + paths.size()
                        + " paths of gas laid over it: " + ends(paths) + ".",
                "Its height is the film pressure. Gas runs off the ridges to both sides: look at which side of a ridge"
                        + " the feed lies on, and at the wall that holds one side's gas back from the other.");
    }

    private ReportPicture gap() throws IOException {
        List<Path> paths = Pictures.paths(flow, how, tracing.seed(), GAP_PATHS);
        return picture(
                "gap",
                "The film",
                Gap.draw(flow, paths, new GapSettings(settings, GapSettings.USUAL)),
                String.format(
                        Locale.ROOT,
                        "A look into the film of %s from over the bore, its thickness drawn %.0f times too large, with %d"
                                + " paths of gas as tubes coloured by speed: %s.",
                        input.title(),
                        GapSettings.USUAL,
                        paths.size(),
                        ends(paths)),
                String.format(
                        Locale.ROOT,
                        "Seen from over the bore, its thickness %.0f times too large. Follow a tube to its arrow: where"
                                + " markers crowd, gas is slow; where it dips, it runs in a groove.",
                        GapSettings.USUAL));
    }

    private ReportPicture meridian() throws IOException {
        return picture(
                "meridian",
                "The section",
                Meridian.draw(flow, List.of(), MeridianSettings.averaged(settings)),
                "The film of " + input.title()
                        + " cut along the radius, averaged round the ring, its thickness drawn far too"
                        + " large, with the motion of the gas in that plane.",
                "The film cut along the radius, averaged round the ring, its thickness drawn far too large. Look at which"
                        + " way gas runs at each height, and whether it turns back anywhere.");
    }

    private ReportPicture picture(String name, String title, BufferedImage image, String alternative, String caption)
            throws IOException {
        ByteArrayOutputStream png = new ByteArrayOutputStream();
        if (!ImageIO.write(image, "png", png)) {
            throw new IOException("a picture cannot be made: this Java has no PNG writer");
        }
        return new ReportPicture(
                name, prefix + title, png.toByteArray(), image.getWidth(), image.getHeight(), alternative, caption);
    }

    private static String side(String name, String diameter) {
        return name.isBlank() ? "the " + diameter + " diameter" : "the " + name;
    }

    private String fedWords(List<FedPoint> fed) {
        if (fed.isEmpty()) {
            return "";
        }
        long in = fed.stream()
                .filter(p -> Destination.of(p.end()) == Destination.INNER)
                .count();
        long out = fed.stream()
                .filter(p -> Destination.of(p.end()) == Destination.OUTER)
                .count();
        return String.format(
                " Of %d markers of equal gas in the feed, %d lead to %s and %d to %s.",
                fed.size(), out, outer, in, inner);
    }

    private String ends(List<Path> paths) {
        return count(paths, PathEnd.Border.OUTER) + " end at " + outer + ", " + count(paths, PathEnd.Border.INNER)
                + " at " + inner;
    }

    private static long count(List<Path> paths, PathEnd.Border border) {
        return paths.stream()
                .filter(path -> path.end() instanceof PathEnd.Left left && left.border() == border)
                .count();
    }
}
