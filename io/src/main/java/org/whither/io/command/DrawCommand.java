package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Path;
import java.util.EnumSet;
import java.util.List;
import java.util.Locale;
import java.util.Set;
import java.util.concurrent.Callable;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.whither.fate.FedPoint;
import org.whither.film.FilmFlow;
import org.whither.io.file.WholeFolder;
import org.whither.render.Gap;
import org.whither.render.GapSettings;
import org.whither.render.NoOpenGL;
import org.whither.render.PictureSettings;
import org.whither.render.Plan;
import org.whither.trace.TraceSettings;
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
            "plan: the face seen along the shaft, with the pressure, the grooves, the dam and the feed, and where each"
                    + " point of the feed sends its gas. gap: a look into the film, its thickness drawn too large by a"
                    + " factor that the picture tells.",
            "Writes PNG files into the folder. Status 4 where no picture could be drawn.%n"
        },
        sortOptions = false)
final class DrawCommand implements Callable<Integer> {
    private static final Pattern SIZE = Pattern.compile("(\\d{1,6})\\s*[x×,]\\s*(\\d{1,6})");

    /** The kinds of pictures. */
    enum View {
        /** The face seen along the shaft. */
        PLAN,
        /** Inside the film. */
        GAP
    }

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
            description = "plan, gap, or both with a comma between (default: both).")
    private Set<View> views = EnumSet.allOf(View.class);

    @Option(
            names = "--size",
            paramLabel = "WxH",
            defaultValue = "1280x720",
            description = "Size in pixels (default: ${DEFAULT-VALUE}).")
    private String size;

    @Option(
            names = "--exaggeration",
            paramLabel = "X",
            defaultValue = "1000",
            description = "Factor on the film thickness in the gap view (default: ${DEFAULT-VALUE}).")
    private double exaggeration;

    @Option(
            names = "--background",
            paramLabel = "SHADE",
            defaultValue = "light",
            description = "light or dark (default: ${DEFAULT-VALUE}).")
    private PictureSettings.Background background;

    @Option(
            names = "--paths",
            paramLabel = "N",
            defaultValue = "7",
            description = "How many paths to draw from where gas enters, 0 … 500 (default: ${DEFAULT-VALUE}).")
    private int pathCount;

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
        PictureSettings plain = pictureSettings();
        GapSettings gapSettings = gapSettings(plain);
        FieldInput input = FieldInput.read(field, talk);
        PictureSettings titled = new PictureSettings(
                plain.width(),
                plain.height(),
                input.title(),
                plain.background(),
                plain.seenFrom(),
                plain.speedFrame(),
                plain.pressureRange(),
                plain.speedRange());
        Path target = folder.or(input.defaultFolder());
        WholeFolder.check(target);
        FilmFlow flow = input.flow();
        try (Talk.Stretch stretch = talk.begin("Drawing")) {
            TraceSettings settings = Pictures.settings(flow, tracing.frame(), tracing.tolerance());
            List<org.whither.trace.Path> paths = Pictures.paths(flow, settings, tracing.seed(), pathCount);
            stretch.accept(0.3);
            WholeFolder.add(target, into -> {
                for (View view : views) {
                    BufferedImage image = view == View.PLAN
                            ? plan(flow, settings, paths, titled)
                            : Gap.draw(flow, paths, new GapSettings(titled, gapSettings.exaggeration()));
                    Pictures.write(image, into.resolve(view.name().toLowerCase(Locale.ROOT) + ".png"));
                    stretch.accept(0.7);
                }
            });
        } catch (NoOpenGL e) {
            talk.warn(e.getMessage());
            return ExitStatus.SHORT_OF_WANTED;
        }
        talk.say("Written: " + target);
        return ExitStatus.DONE;
    }

    private BufferedImage plan(
            FilmFlow flow, TraceSettings settings, List<org.whither.trace.Path> paths, PictureSettings how) {
        List<FedPoint> fed = Pictures.fed(flow, settings, tracing.seed(), tracing.threads());
        return Plan.draw(flow, fed, paths.subList(0, Math.min(paths.size(), 8)), how);
    }

    private PictureSettings pictureSettings() {
        Matcher matcher = SIZE.matcher(size);
        if (!matcher.matches()) {
            throw new ParameterException(
                    spec.commandLine(), "--size is \"" + size + "\"; expected two whole numbers such as 1280x720");
        }
        try {
            return PictureSettings.standard("")
                    .sized(Integer.parseInt(matcher.group(1)), Integer.parseInt(matcher.group(2)))
                    .on(background)
                    .speedsIn(tracing.frame());
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--size: " + e.getMessage());
        }
    }

    private GapSettings gapSettings(PictureSettings plain) {
        try {
            return new GapSettings(plain, exaggeration);
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--exaggeration: " + e.getMessage());
        }
    }
}
