package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.function.DoubleConsumer;
import javax.imageio.ImageIO;
import org.whither.eddy.Eddies;
import org.whither.fate.Destination;
import org.whither.fate.FedPoint;
import org.whither.film.Conditions;
import org.whither.io.picture.PictureDescription;
import org.whither.io.picture.Stills;
import org.whither.io.picture.View;
import org.whither.io.report.ReportPicture;
import org.whither.io.result.SplitResult;
import org.whither.render.GapSettings;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;

/** The pictures of a report, each with what it shows in words and what to look at. */
final class ReportPictures {
    static final int PATHS = 7;

    /** The pictures of one field, in their order. */
    static final List<View> VIEWS = List.of(View.PLAN, View.RELIEF, View.GAP, View.MERIDIAN);

    private final FieldInput input;
    private final Stills.Subject subject;
    private final String prefix;
    private final String inner;
    private final String outer;

    private ReportPictures(FieldInput input, Stills.Subject subject, String prefix) {
        this.input = input;
        this.subject = subject;
        this.prefix = prefix;
        Conditions conditions = input.flow().film().conditions();
        this.inner = side(conditions.innerSide(), "inner");
        this.outer = side(conditions.outerSide(), "outer");
    }

    /** A film with what the pictures of a report show of it. */
    static Stills.Subject subject(FieldInput input, SplitResult result, Eddies eddies, TracingOptions tracing) {
        Pictures.Wanted wanted = new Pictures.Wanted(PATHS, true, false, false, false);
        Stills.Subject plain =
                Pictures.subject(input.flow(), Pictures.few(result.split().fed()), wanted, tracing);
        return new Stills.Subject(plain.flow(), plain.data(), eddies.zones());
    }

    /** The pictures of one field. */
    static List<ReportPicture> of(
            FieldInput input, Stills.Subject subject, TracingOptions tracing, DoubleConsumer progress)
            throws IOException {
        Map<View, BufferedImage> images = new EnumMap<>(View.class);
        for (View view : VIEWS) {
            images.put(view, Stills.draw(subject, usual(view, tracing), input.title()));
            progress.accept((double) images.size() / VIEWS.size());
        }
        return of(input, subject, images);
    }

    /**
     * The pictures of one field that are drawn already.
     *
     * @param subject what they were drawn from
     * @param images one for each of {@link #VIEWS}
     */
    static List<ReportPicture> of(FieldInput input, Stills.Subject subject, Map<View, BufferedImage> images)
            throws IOException {
        ReportPictures pictures = new ReportPictures(input, subject, "");
        return List.of(
                pictures.plan(images.get(View.PLAN)),
                pictures.relief(images.get(View.RELIEF)),
                pictures.gap(images.get(View.GAP)),
                pictures.meridian(images.get(View.MERIDIAN)));
    }

    /** The pictures of two fields that are compared, on the same scales. */
    static List<ReportPicture> of(
            FieldInput a,
            Stills.Subject subjectA,
            FieldInput b,
            Stills.Subject subjectB,
            TracingOptions tracing,
            DoubleConsumer progress)
            throws IOException {
        ReportPictures first = new ReportPictures(a, subjectA, "A: ");
        ReportPictures second = new ReportPictures(b, subjectB, "B: ");
        PictureDescription plan = first.common(second, usual(View.PLAN, tracing));
        PictureDescription gap = first.common(second, plan.ofView(View.GAP));
        List<ReportPicture> all = new ArrayList<>();
        all.add(first.plan(first.draw(plan)));
        progress.accept(0.25);
        all.add(second.plan(second.draw(plan)));
        progress.accept(0.5);
        all.add(first.gap(first.draw(gap)));
        progress.accept(0.75);
        all.add(second.gap(second.draw(gap)));
        progress.accept(1);
        return all;
    }

    private static PictureDescription usual(View view, TracingOptions tracing) {
        PictureDescription usual = PictureDescription.of(view);
        return usual.seen(usual.background(), usual.seenFrom(), tracing.frame());
    }

    private PictureDescription common(ReportPictures other, PictureDescription picture) {
        return Stills.common(
                Stills.resolved(subject, picture, title()), Stills.resolved(other.subject, picture, other.title()));
    }

    private BufferedImage draw(PictureDescription picture) {
        return Stills.draw(subject, picture, title());
    }

    private String title() {
        return prefix + input.title();
    }

    private ReportPicture plan(BufferedImage image) throws IOException {
        List<FedPoint> fed = subject.data().fed();
        List<Path> few = subject.data().paths();
        return picture(
                "plan",
                "The face",
                image,
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

    private ReportPicture relief(BufferedImage image) throws IOException {
        List<Path> paths = subject.data().paths();
        return picture(
                "relief",
                "The pressure",
                image,
                "The film pressure of " + input.title() + " drawn as a landscape over the ring, with " + paths.size()
                        + " paths of gas laid over it: " + ends(paths) + ".",
                "Its height is the film pressure. Gas runs off the ridges to both sides: look at which side of a ridge"
                        + " the feed lies on, and at the wall that holds one side's gas back from the other.");
    }

    private ReportPicture gap(BufferedImage image) throws IOException {
        List<Path> paths = subject.data().paths();
        return picture(
                "gap",
                "The film",
                image,
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

    private ReportPicture meridian(BufferedImage image) throws IOException {
        return picture(
                "meridian",
                "The section",
                image,
                "The film of " + input.title()
                        + " cut along the radius, averaged round the ring, its thickness drawn far too"
                        + " large, with the motion of the gas in that plane." + heldWords(),
                "The film cut along the radius, averaged round the ring, its thickness drawn far too large. Look at which"
                        + " way gas runs at each height, and whether it turns back anywhere."
                        + (subject.zones().isEmpty() ? "" : " Where gas is held, its zone is outlined."));
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

    private String heldWords() {
        int zones = subject.zones().size();
        return zones == 0
                ? ""
                : zones == 1 ? " A zone of held gas is outlined." : " " + zones + " zones of held gas are outlined.";
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
