package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.Set;
import java.util.concurrent.Callable;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.whither.io.file.RefusedInput;
import org.whither.io.file.WholeFolder;
import org.whither.io.picture.PictureDescription;
import org.whither.io.picture.PictureFacts;
import org.whither.io.picture.PictureJson;
import org.whither.io.picture.PngFile;
import org.whither.io.picture.Stills;
import org.whither.io.picture.View;
import org.whither.render.NoOpenGL;
import org.whither.render.Part;
import org.whither.render.PictureSettings;
import org.whither.render.Quantity;
import org.whither.render.ViewingSide;
import org.whither.render.Viewpoint;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Still pictures. */
@Command(
        name = "draw",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Draw still pictures of a field.%n",
        description = {
            "plan: the face seen along the shaft, with pressure, film thickness, speed, age or destination of the gas in"
                    + " colour. relief: the pressure as height over the ring, with paths laid over it. gap: a look into the"
                    + " film, its thickness drawn too large by a factor that the picture tells. meridian: a section along"
                    + " the radius, with stream lines and reversed flow.",
            "Writes PNG files into the folder, and beside each a JSON file from which the same picture of another field can"
                    + " be made (--like). With --with, two fields stand side by side with one scale, as pair-plan.png and"
                    + " so on. Status 4 where no picture could be drawn.%n"
        },
        sortOptions = false)
final class DrawCommand implements Callable<Integer> {
    private static final Pattern SIZE = Pattern.compile("(\\d{1,6})\\s*[x×,]\\s*(\\d{1,6})");

    private static final String NUMBER = "([-+]?[0-9]*\\.?[0-9]+(?:[eE][-+]?[0-9]+)?)";

    private static final Pattern RANGE =
            Pattern.compile("(?:([a-zA-Z]+)\\s*[:=]\\s*)?" + NUMBER + "\\s*\\.\\.\\s*" + NUMBER);

    private static final Pattern CAMERA = Pattern.compile(NUMBER + "\\s*,\\s*" + NUMBER);

    @Spec
    private CommandSpec spec;

    @Mixin
    private FieldParameter field;

    @Mixin
    private FolderOption folder;

    @Option(
            names = "--view",
            paramLabel = "VIEW",
            split = ",",
            description = "plan, relief, gap, meridian, or several with commas between (default: all).")
    private Set<View> views;

    @Option(
            names = "--show",
            paramLabel = "WHAT",
            split = ",",
            description = "What a plan shows in colour: pressure, thickness, speed, age, destination, or several with"
                    + " commas between, a picture for each (default: pressure).")
    private Set<Quantity> shown;

    @Option(
            names = "--part",
            paramLabel = "PART",
            description = "How much of the ring: ring, sector, or for a plan both (default: both; for a relief ring).")
    private Part part;

    @Option(
            names = "--like",
            paramLabel = "PICTURE.json",
            description =
                    "Make the picture that this description tells: its view, size, camera, magnification and ranges;"
                            + " other options given here go before it.")
    private Path like;

    @Option(
            names = "--with",
            paramLabel = "OTHER",
            description = "Another field file: draw both side by side with one scale.")
    private Path with;

    @Option(
            names = "--range",
            paramLabel = "[WHAT:]LOW..HIGH",
            description =
                    "Ends of a colour scale, so that pictures can be compared: pressure in bar(a), thickness in µm,"
                            + " speed in m/s, age in ms, such as 1..12 or speed:0..60; without a name, of what --show says."
                            + " Repeatable.")
    private List<String> ranges = new ArrayList<>();

    @Option(
            names = "--size",
            paramLabel = "WxH",
            description = "Size in pixels (default: 1280x720); 7680x4320 needs about 1 GB of memory.")
    private String size;

    @Option(names = "--title", paramLabel = "TEXT", description = "Title of the pictures (default: that of the field).")
    private String title;

    @Option(
            names = "--exaggeration",
            paramLabel = "X",
            description = "Factor on the film thickness in gap and meridian (default: 1000; in a meridian as much as"
                    + " fits).")
    private Double exaggeration;

    @Option(
            names = "--height",
            paramLabel = "BAR",
            description = "Pressure for one mm of height in the relief, in bar (default: a round number that fits).")
    private Double height;

    @Option(
            names = "--angle",
            paramLabel = "DEG",
            description = "Angle of the meridian in the frame in which the film is steady (default: averaged round the"
                    + " ring).")
    private Double angle;

    @Option(
            names = "--camera",
            paramLabel = "AZIMUTH,ELEVATION",
            description =
                    "Where relief and gap are looked at from, in degrees: round the shaft, counted from θ = 0 for the"
                            + " whole ring and from the middle of the part shown else, and above the face.")
    private String camera;

    @Option(names = "--background", paramLabel = "SHADE", description = "light or dark (default: light).")
    private PictureSettings.Background background;

    @Option(
            names = "--seen-from",
            paramLabel = "SIDE",
            description = "Side from which a plan is seen: stator or rotor (default: stator).")
    private ViewingSide side;

    @Option(
            names = "--paths",
            paramLabel = "N",
            defaultValue = "7",
            description = "How many paths to draw from where gas enters, 0 … 500 (default: ${DEFAULT-VALUE}).")
    private int pathCount;

    @Option(
            names = "--zones",
            description = "Look for zones of held gas and outline them in all views but the relief; takes longer.")
    private boolean zones;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        if (pathCount < 0 || pathCount > 500) {
            throw new ParameterException(
                    spec.commandLine(), "--paths is " + pathCount + "; expected a whole number from 0 to 500");
        }
        List<PictureDescription> pictures = pictures();
        FieldInput input = FieldInput.read(field, talk);
        FieldInput other = with == null ? null : FieldInput.read(with, field.interpolation(), talk);
        Path target = folder.or(input.defaultFolder());
        WholeFolder.check(target);
        try (Talk.Stretch stretch = talk.begin("Drawing")) {
            Pictures.needed();
            Pictures.Wanted wanted = Pictures.Wanted.of(pictures, pathCount, zones);
            Stills.Subject left = Pictures.subject(input.flow(), wanted, tracing);
            Stills.Subject right = other == null ? null : Pictures.subject(other.flow(), wanted, tracing);
            stretch.accept(0.4);
            WholeFolder.add(target, into -> {
                for (PictureDescription picture : pictures) {
                    if (other == null) {
                        Pictures.draw(input, left, picture, titleOf(input), into);
                    } else {
                        pair(input, left, other, right, picture, into);
                    }
                    stretch.accept(0.8);
                }
            });
        } catch (NoOpenGL e) {
            talk.warn(e.getMessage());
            return ExitStatus.SHORT_OF_WANTED;
        }
        talk.say("Written: " + target);
        return ExitStatus.DONE;
    }

    private String titleOf(FieldInput input) {
        return title == null || title.isBlank() ? input.title() : title;
    }

    private void pair(
            FieldInput input,
            Stills.Subject left,
            FieldInput other,
            Stills.Subject right,
            PictureDescription picture,
            Path into)
            throws IOException {
        PictureDescription both = Stills.common(
                Stills.resolved(left, picture, input.title()), Stills.resolved(right, picture, other.title()));
        BufferedImage image = Stills.pair(left, input.title(), right, other.title(), both);
        String words = title == null || title.isBlank() ? input.title() + " | " + other.title() : title;
        PictureFacts facts = PictureFacts.of(
                words,
                input.file().getFileName().toString(),
                input.sha256(),
                other.file().getFileName().toString(),
                other.sha256());
        PngFile.write(image, both, facts, into.resolve("pair-" + both.name() + ".png"));
        Files.writeString(into.resolve("pair-" + both.name() + ".json"), PictureJson.text(both, facts));
    }

    /** The pictures that the options ask for. */
    private List<PictureDescription> pictures() throws IOException {
        PictureDescription model = like == null ? null : PictureJson.read(like);
        Set<View> kinds = views != null
                ? new LinkedHashSet<>(views)
                : model != null ? EnumSet.of(model.view()) : EnumSet.allOf(View.class);
        List<PictureDescription> pictures = new ArrayList<>();
        for (View view : kinds) {
            PictureDescription one = model == null ? PictureDescription.of(view) : model.ofView(view);
            Set<Quantity> quantities = view != View.PLAN
                    ? EnumSet.of(Quantity.PRESSURE)
                    : shown != null ? new LinkedHashSet<>(shown) : EnumSet.of(one.show());
            for (Quantity quantity : quantities) {
                pictures.add(described(one.showing(quantity)));
            }
        }
        return pictures;
    }

    private PictureDescription described(PictureDescription model) {
        PictureDescription one = model;
        if (part != null) {
            one = one.ofPart(one.view() == View.RELIEF && part == Part.BOTH ? Part.RING : part);
        } else if (with != null && like == null && one.view() == View.PLAN) {
            one = one.ofPart(Part.RING);
        }
        if (size != null) {
            int[] pixels = pixels();
            one = one.sized(pixels[0], pixels[1]);
        }
        one = one.seen(
                background == null ? one.background() : background,
                side == null ? one.seenFrom() : side,
                like != null && !spec.commandLine().getParseResult().hasMatchedOption("--frame")
                        ? one.frame()
                        : tracing.frame());
        boolean thick = one.view() == View.GAP || one.view() == View.MERIDIAN;
        one = one.drawn(
                exaggeration != null && thick ? OptionalDouble.of(exaggeration) : one.exaggeration(),
                height != null && one.view() == View.RELIEF ? OptionalDouble.of(height) : one.barPerMillimetre(),
                angle != null && one.view() == View.MERIDIAN ? OptionalDouble.of(Math.toRadians(angle)) : one.angle(),
                camera == null || one.view() == View.PLAN || one.view() == View.MERIDIAN ? one.camera() : camera());
        for (Map.Entry<Quantity, PictureSettings.Range> range : ranges(one).entrySet()) {
            one = one.ranged(range.getKey(), range.getValue());
        }
        try {
            PictureSettings.standard("").sized(one.width(), one.height());
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--size: " + e.getMessage());
        }
        for (double number : new double[] {
            one.exaggeration().orElse(1), one.barPerMillimetre().orElse(1)
        }) {
            if (!(number > 0) || Double.isInfinite(number)) {
                throw new ParameterException(
                        spec.commandLine(),
                        "--exaggeration and --height: " + number + " was given; expected a finite number above 0");
            }
        }
        try {
            PictureSettings.standard("").sized(one.width(), one.height()).checkMemory();
        } catch (IllegalArgumentException e) {
            throw new RefusedInput("--size: " + e.getMessage() + ".", e);
        }
        return one;
    }

    private Map<Quantity, PictureSettings.Range> ranges(PictureDescription one) {
        Map<Quantity, PictureSettings.Range> found = new LinkedHashMap<>();
        for (String text : ranges) {
            Matcher matcher = RANGE.matcher(text.strip());
            if (!matcher.matches()) {
                throw new ParameterException(
                        spec.commandLine(),
                        "--range is \"" + text + "\"; expected two numbers such as 1..12, or speed:0..60");
            }
            Quantity quantity = matcher.group(1) == null ? one.show() : quantity(matcher.group(1));
            double low = Double.parseDouble(matcher.group(2));
            double high = Double.parseDouble(matcher.group(3));
            if (!(low < high) || !Double.isFinite(low) || !Double.isFinite(high)) {
                throw new RefusedInput(
                        "--range " + text + ": the range is empty; expected a low end below the high end;"
                                + " give the smaller number first.");
            }
            found.put(quantity, new PictureSettings.Range(low / quantity.unit(), high / quantity.unit()));
        }
        return found;
    }

    private Quantity quantity(String word) {
        for (Quantity quantity : Quantity.values()) {
            if (quantity != Quantity.DESTINATION && quantity.name().equalsIgnoreCase(word)) {
                return quantity;
            }
        }
        throw new ParameterException(
                spec.commandLine(),
                "--range: \"" + word + "\" has no range; expected pressure, thickness, speed or age");
    }

    private Optional<Viewpoint> camera() {
        Matcher matcher = CAMERA.matcher(camera.strip());
        if (!matcher.matches()) {
            throw new ParameterException(
                    spec.commandLine(), "--camera is \"" + camera + "\"; expected two angles such as 180,45");
        }
        try {
            return Optional.of(new Viewpoint(
                    Math.toRadians(Double.parseDouble(matcher.group(1))),
                    Math.toRadians(Double.parseDouble(matcher.group(2))),
                    Math.toRadians(22)));
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--camera: " + e.getMessage());
        }
    }

    private int[] pixels() {
        Matcher matcher = SIZE.matcher(size);
        if (!matcher.matches()) {
            throw new ParameterException(
                    spec.commandLine(), "--size is \"" + size + "\"; expected two whole numbers such as 1280x720");
        }
        return new int[] {Integer.parseInt(matcher.group(1)), Integer.parseInt(matcher.group(2))};
    }
}
