package org.whither.io.command;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.FileSystemException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.EnumSet;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import java.util.concurrent.Callable;
import java.util.stream.Collectors;
import org.whither.film.Conditions;
import org.whither.io.file.WholeFolder;
import org.whither.io.paths.Fate;
import org.whither.io.paths.PathAccount;
import org.whither.io.paths.PathExport;
import org.whither.io.paths.PathTotals;
import org.whither.io.paths.Releases;
import org.whither.io.result.Cautions;
import org.whither.trace.Course;
import org.whither.trace.PathSampler;
import org.whither.trace.PointSpacing;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Paths to take away. */
@Command(
        name = "paths",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Follow tracers and write their paths for other programs.%n",
        description = {
            "Writes paths.json, with the release, fate, residence time and revolutions of each tracer, and the points of the"
                    + " paths as paths.csv, paths.h5 or paths.glb into the folder. With --json and no --out it prints"
                    + " paths.json and writes no file. Status 4 where a tracer could not be followed to an end.",
            "Times count from the release, in s, negative before it; angles are unwrapped, in the frame chosen, in rad;"
                    + " revolutions are counted in the stationary frame, positive towards +θ. Where the height of a path"
                    + " jumps, at the edge of a groove, there are two points of the same time.%n"
        },
        sortOptions = false)
final class PathsCommand implements Callable<Integer> {
    @Spec
    private CommandSpec spec;

    @Mixin
    private FieldParameter field;

    @Mixin
    private FolderOption folder;

    @Mixin
    private ReleaseOption release;

    @Option(
            names = "--direction",
            paramLabel = "WAY",
            defaultValue = "forward",
            description = "forward to where the gas goes, backward to where it came from, or both as one path (default:"
                    + " ${DEFAULT-VALUE}).")
    private Course course;

    @Option(
            names = "--time",
            paramLabel = "S",
            description =
                    "Stop each tracer after so many seconds, each way (default: when it leaves the film, or after 20"
                            + " times the mean residence of the gas).")
    private Double time;

    @Option(
            names = "--revolutions",
            paramLabel = "N",
            description = "Stop each tracer after so many turns about the shaft in the stationary frame, each way.")
    private Double revolutions;

    @Option(
            names = "--points",
            paramLabel = "N|X",
            defaultValue = "0.001",
            description =
                    "How densely a path is written. A whole number from 2: so many points, equal in time. A fraction"
                            + " below 1: as few points as keep straight lines between them, run through evenly in time, that near"
                            + " to the path, as a part of the film thickness across the film and of its radial extent along it"
                            + " (default: ${DEFAULT-VALUE}).")
    private String points;

    @Option(
            names = "--as",
            paramLabel = "FORMAT",
            split = ",",
            description =
                    "csv, hdf5, gltf, or several with commas between (default: csv). A scene (gltf) shows at most 100"
                            + " paths, evenly taken.")
    private Set<PathExport.Kind> kinds = EnumSet.of(PathExport.Kind.CSV);

    @Option(
            names = "--exaggeration",
            paramLabel = "X",
            defaultValue = "1000",
            description = "Factor on lengths across the film in a scene (default: ${DEFAULT-VALUE}).")
    private double exaggeration;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        PointSpacing spacing = spacing();
        positive("--time", time, "a number of seconds above 0");
        positive("--revolutions", revolutions, "a number of turns above 0");
        positive("--exaggeration", exaggeration, "a number above 0");
        tracing.tolerance();
        int threads = tracing.threads();
        release.check(course);
        boolean files = folder.given() || !talk.json();
        FieldInput input = FieldInput.read(field, talk);
        Path target = folder.or(input.defaultFolder());
        if (files) {
            WholeFolder.check(target);
        }
        PathExport export = export(input, spacing);
        PathTotals[] totals = new PathTotals[1];
        try (Talk.Stretch stretch = talk.begin("Following paths")) {
            if (files) {
                WholeFolder.add(target, into -> totals[0] = export.write(kinds, into, threads, exaggeration, stretch));
            } else {
                totals[0] = export.print(talk.out(), threads, stretch);
            }
        } catch (FileSystemException e) {
            throw e; // it names its file
        } catch (IOException e) {
            throw new IOException(
                    target + " cannot be written: " + e.getMessage()
                            + "; make room or mend that, or name another folder with --out",
                    e);
        }
        if (files && talk.json()) {
            talk.out().print(Files.readString(target.resolve("paths.json"), StandardCharsets.UTF_8));
        }
        talk.out().flush();
        say(input, totals[0], target);
        if (totals[0].lost() > 0) {
            talk.warn(totals[0].lost() + " of " + totals[0].tracers() + " tracers could not be followed to an end ("
                    + totals[0].reason() + "); their paths break off, and paths.json says which.");
            return ExitStatus.SHORT_OF_WANTED;
        }
        return ExitStatus.DONE;
    }

    private PathExport export(FieldInput input, PointSpacing spacing) throws IOException {
        Releases releases = release.in(input.flow(), course, tracing.seed());
        double patience = Pictures.settings(input.flow(), tracing.frame(), tracing.tolerance())
                .timeLimit();
        PathSampler.Settings settings = new PathSampler.Settings(
                tracing.frame(),
                course,
                tracing.tolerance(),
                time == null ? patience : time,
                revolutions == null ? Double.POSITIVE_INFINITY : 2 * Math.PI * revolutions,
                spacing);
        String until = (time == null ? "exit" : "exit or " + time + " s")
                + (revolutions == null ? "" : " or " + revolutions + " revolutions");
        PathAccount account = new PathAccount(
                input.file().getFileName().toString(),
                input.flow().film().heading().title(),
                input.sha256(),
                tracing.frame(),
                course,
                until,
                tracing.tolerance(),
                tracing.seed(),
                spacing instanceof PointSpacing.Equal equal
                        ? equal.count() + " equal in time"
                        : "within " + points.strip() + " of the film thickness and of the radial extent",
                input.flow().interpolation(),
                release.words());
        return new PathExport(
                input.flow(), settings, releases, time == null ? Double.POSITIVE_INFINITY : time, account);
    }

    private PointSpacing spacing() {
        String text = points.strip();
        try {
            if (text.matches("\\d{1,9}")) {
                int count = Integer.parseInt(text);
                if (count >= 2 && count <= 1_000_000) {
                    return new PointSpacing.Equal(count);
                }
            } else {
                double tolerance = Double.parseDouble(text);
                if (tolerance >= 1e-9 && tolerance < 1) {
                    return new PointSpacing.Within(tolerance);
                }
            }
        } catch (NumberFormatException e) {
            throw wrongPoints(text);
        }
        throw wrongPoints(text);
    }

    private ParameterException wrongPoints(String text) {
        return new ParameterException(
                spec.commandLine(),
                "--points is \"" + text
                        + "\"; expected a whole number from 2 to 1000000, or a fraction from 1e-9 to below 1");
    }

    private void positive(String option, Double value, String expected) {
        if (value != null && !(value > 0 && value < Double.POSITIVE_INFINITY)) {
            throw new ParameterException(spec.commandLine(), option + " is " + value + "; expected " + expected);
        }
    }

    private void say(FieldInput input, PathTotals totals, Path target) {
        Conditions conditions = input.flow().film().conditions();
        talk.say(String.format(
                Locale.ROOT, "%,d tracers, %,d points of their paths.", totals.tracers(), totals.points()));
        if (!totals.from().isEmpty()) {
            talk.say("They come from: " + words(totals.from(), conditions) + ".");
        }
        if (!totals.fates().isEmpty()) {
            talk.say("They go to: " + words(totals.fates(), conditions) + ".");
        }
        if (kinds.contains(PathExport.Kind.GLTF) && totals.tracers() > PathExport.MOST_PATHS_IN_SCENE) {
            talk.say("The scene shows " + PathExport.pathsInScene(totals.tracers())
                    + " of them, evenly taken, so that it" + " opens quickly.");
        }
        talk.say(Cautions.TEXT);
        if (!talk.json()) {
            talk.say("Written: " + target);
        }
    }

    private static String words(Map<Fate, Integer> counts, Conditions conditions) {
        return counts.entrySet().stream()
                .map(entry -> String.format(
                        Locale.ROOT,
                        "%s %,d",
                        switch (entry.getKey()) {
                            case INNER -> "inner diameter (" + conditions.innerSide() + ")";
                            case OUTER -> "outer diameter (" + conditions.outerSide() + ")";
                            case SUPPLY -> "the feed";
                            case HELD -> "held inside";
                            case STOPPED -> "stopped inside as asked";
                            case LOST -> "lost";
                        },
                        entry.getValue()))
                .collect(Collectors.joining(", "));
    }
}
