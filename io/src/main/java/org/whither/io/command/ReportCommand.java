package org.whither.io.command;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.file.FileSystemException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.ZonedDateTime;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.fate.SplitSettings;
import org.whither.io.file.WholeFolder;
import org.whither.io.picture.Stills;
import org.whither.io.report.Comparison;
import org.whither.io.report.ReportNumbers;
import org.whither.io.report.ReportPage;
import org.whither.io.report.ReportPicture;
import org.whither.io.result.ResultJson;
import org.whither.io.result.SplitResult;
import org.whither.render.MotionSettings;
import org.whither.render.NoOpenGL;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** One page for the plant. */
@Command(
        name = "report",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Make one page that tells where the gas goes, how sure that is, and shows it.%n",
        description = {
            "Writes report.html, which holds everything in itself and prints on two pages A4, and its numbers as"
                    + " report.json, into the folder. With --json and no --out it writes no file. Status 4 where the"
                    + " wanted width or closure was not reached, or pictures or the animation could not be made; it then says"
                    + " so.%n"
        },
        sortOptions = false)
final class ReportCommand implements Callable<Integer> {
    private static final int AGE_PHASES = 12;
    private static final int AGE_RADII = 36;
    private static final int AGE_HEIGHTS = 10;

    /** Tracers inside the film: a page tells of zones of a good part of the gas; command eddies looks closer. */
    static final int EDDY_TRACERS = 8192;

    @Spec
    private CommandSpec spec;

    @Mixin
    private FieldParameter field;

    @Option(
            names = "--compare",
            paramLabel = "OTHER",
            description = "Set another field beside it, such as before and after, or at another speed, and tell the"
                    + " differences in words.")
    private Path other;

    @Option(names = "--plain", description = "Leave out the tables for specialists.")
    private boolean plain;

    @Option(names = "--no-pictures", description = "Draw no pictures; charts stay.")
    private boolean noPictures;

    @Mixin
    private RideOption ride;

    @Mixin
    private FolderOption folder;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    /** What is known of one field. */
    private record Told(FieldInput input, SplitResult result, Eddies eddies, ObjectNode numbers) {}

    @Override
    public Integer call() throws IOException {
        SplitSettings settings = tracing.split();
        boolean files = folder.given() || !talk.json();
        MotionSettings motion = ride.settings(tracing);
        if (ride.asked() && !files) {
            throw new ParameterException(
                    spec.commandLine(),
                    "--ride writes files beside the page, and --json alone writes none; name a folder with --out");
        }
        FieldInput input = FieldInput.read(field, talk);
        Optional<FieldInput> beside =
                other == null ? Optional.empty() : Optional.of(FieldInput.read(other, field.interpolation(), talk));
        Path target = folder.or(input.defaultFolder());
        if (files) {
            WholeFolder.check(target);
        }
        Told a = tell(input, settings);
        Optional<Told> b = Optional.empty();
        if (beside.isPresent()) {
            b = Optional.of(tell(beside.get(), settings));
            Comparison.add(a.numbers(), b.get().numbers());
        }
        List<String> missing = files ? write(a, b, motion, target) : List.of();
        if (talk.json()) {
            talk.out().print(ResultJson.text(a.numbers()));
            talk.out().flush();
        }
        say(a, b);
        if (files) {
            talk.say("The page: " + target.resolve("report.html"));
        }
        missing.forEach(talk::warn);
        int status = Math.max(
                SplitCommand.status(a.result()),
                b.map(told -> SplitCommand.status(told.result())).orElse(ExitStatus.DONE));
        return RideOption.fallsShort(missing) ? ExitStatus.SHORT_OF_WANTED : status;
    }

    private void say(Told a, Optional<Told> b) {
        a.result().warnings().forEach(warning -> talk.say("Warning: " + warning));
        talk.say(a.result().answer());
        b.ifPresent(told -> {
            talk.say("");
            talk.say("B, " + told.input().title() + ":");
            told.result().warnings().forEach(warning -> talk.say("Warning: " + warning));
            talk.say(told.result().answer());
            a.numbers()
                    .at("/comparison/differences")
                    .forEach(difference ->
                            talk.say("- " + difference.get("words").asText()));
        });
    }

    private Told tell(FieldInput input, SplitSettings settings) {
        SplitResult result = SplitCommand.find(input, settings, talk);
        try (Talk.Stretch stretch = talk.begin("Looking for held gas")) {
            Eddies eddies = Eddies.of(input.flow(), tracing.eddies(EddySettings.PATIENCE, EDDY_TRACERS), stretch);
            return told(input, result, eddies, tracing, talk);
        }
    }

    /** The numbers of a report: those of the split and of the held gas, and what else the page tells. */
    private static Told told(FieldInput input, SplitResult result, Eddies eddies, TracingOptions tracing, Talk talk) {
        try (Talk.Stretch stretch = talk.begin("Looking at the age of the gas")) {
            AgeMap age = AgeMap.of(
                    input.flow(),
                    Pictures.settings(input.flow(), tracing.frame(), tracing.tolerance()),
                    AGE_PHASES,
                    AGE_RADII,
                    AGE_HEIGHTS,
                    tracing.threads(),
                    stretch);
            ObjectNode numbers =
                    ReportNumbers.of(result, Program.Version.number(), Optional.of(age), Optional.of(eddies));
            return new Told(input, result, eddies, numbers);
        }
    }

    /** Writes page, numbers and animation; returns a sentence for each thing that could not be made. */
    private List<String> write(Told a, Optional<Told> b, MotionSettings motion, Path target) throws IOException {
        List<ReportPicture> pictures = List.of();
        List<String> missing = new ArrayList<>();
        Optional<String> none = noPictures ? Optional.of("none were asked for.") : Optional.empty();
        if (!noPictures) {
            try (Talk.Stretch stretch = talk.begin("Drawing")) {
                Pictures.needed();
                pictures = b.isPresent()
                        ? ReportPictures.of(a.input(), subject(a), b.get().input(), subject(b.get()), tracing, stretch)
                        : ReportPictures.of(a.input(), subject(a), tracing, stretch);
            } catch (NoOpenGL e) {
                none = Optional.of(e.getMessage());
                missing.add(e.getMessage());
            }
        }
        List<ReportPicture> drawn = pictures;
        Optional<String> whyNone = none;
        try {
            WholeFolder.add(target, into -> {
                Optional<String> animation = animation(a, b, motion, missing, into);
                write(
                        a.numbers(),
                        drawn,
                        new ReportPage.Settings(plain, ZonedDateTime.now(), words(a, b), whyNone, animation),
                        into);
            });
        } catch (FileSystemException e) {
            throw e; // it names the file
        } catch (IOException e) {
            throw new IOException(
                    target + " cannot be written: " + e.getMessage() + "; make room there or name another folder with"
                            + " --out",
                    e);
        }
        return missing;
    }

    private Stills.Subject subject(Told told) {
        return ReportPictures.subject(told.input(), told.result(), told.eddies(), tracing);
    }

    /** Writes the animation where it is asked for; the file to which the page leads. */
    private Optional<String> animation(Told a, Optional<Told> b, MotionSettings motion, List<String> missing, Path into)
            throws IOException {
        if (!ride.asked()) {
            return Optional.empty();
        }
        String title = (b.isPresent() ? "A: " : "") + a.input().title();
        MotionFiles.Written written = RideOption.write(a.input(), title, tracing, motion, talk, into);
        written.missing().stream().filter(s -> !missing.contains(s)).forEach(missing::add);
        return written.files().stream().findFirst();
    }

    private static void write(ObjectNode numbers, List<ReportPicture> pictures, ReportPage.Settings page, Path into)
            throws IOException {
        Files.writeString(into.resolve("report.json"), ResultJson.text(numbers));
        Files.writeString(into.resolve("report.html"), ReportPage.of(numbers, pictures, page));
    }

    /**
     * Writes the report of a field whose split and held gas are known, with pictures that are drawn or a sentence why there
     * are none. Command report makes the same page where the held gas was looked for with {@link #EDDY_TRACERS}.
     */
    static void write(
            FieldInput input,
            SplitResult result,
            Eddies eddies,
            TracingOptions tracing,
            Talk talk,
            List<ReportPicture> pictures,
            Optional<String> missing,
            Path into)
            throws IOException {
        Told told = told(input, result, eddies, tracing, talk);
        String words = new ReportCommand().words(told, Optional.empty());
        write(
                told.numbers(),
                pictures,
                new ReportPage.Settings(false, ZonedDateTime.now(), words, missing, Optional.empty()),
                into);
    }

    /** The command line that makes the same report again, without the folders of the fields. */
    private String words(Told a, Optional<Told> b) {
        SplitResult result = a.result();
        StringBuilder words = new StringBuilder("whither report ").append(quoted(result.file()));
        b.ifPresent(
                told -> words.append(" --compare ").append(quoted(told.result().file())));
        words.append(plain ? " --plain" : "");
        words.append(noPictures ? " --no-pictures" : "");
        words.append(ride == null ? "" : ride.words());
        words.append(" --interpolation ").append(result.flow().interpolation());
        words.append(" --frame ").append(result.settings().frame().name().toLowerCase(Locale.ROOT));
        words.append(" --tolerance ").append(result.settings().tolerance());
        words.append(" --width ").append(result.settings().width());
        words.append(" --seed ").append(result.settings().seed());
        return words.toString();
    }

    private static String quoted(String name) {
        return name.matches("[\\w.+-]+") ? name : "'" + name.replace("'", "'\\''") + "'";
    }
}
