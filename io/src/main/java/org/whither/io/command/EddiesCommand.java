package org.whither.io.command;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.eddy.NoThroughFlow;
import org.whither.io.file.RefusedInput;
import org.whither.io.file.WholeFolder;
import org.whither.io.picture.PngFile;
import org.whither.io.result.EddiesResult;
import org.whither.io.result.ResultJson;
import org.whither.render.Meridian;
import org.whither.render.MeridianSettings;
import org.whither.render.NoOpenGL;
import org.whither.render.PictureSettings;
import org.whither.render.Plan;
import org.whither.render.PlanData;
import org.whither.render.PlanSettings;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;

/** Recirculation. */
@Command(
        name = "eddies",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Find gas that turns and stays: recirculation zones, where, how large, how long.%n",
        description = {
            "Releases tracers inside the film, one for each equal mass of gas, follows them both ways in time, and groups"
                    + " those that stay into zones, with place, extent, mass, time of a turn and where their gas came from."
                    + " Tells also where gas runs against its column, where the flow stands still, and where the gas that"
                    + " stays longest spends its time. Says so where nothing is found, and how small a zone would have been"
                    + " seen.",
            "Writes eddies.json, eddies.csv (the zones), eddies-places.csv (places of held gas), eddies-reversed.csv (the"
                    + " map of reversed flow), eddies.png (the film along the radius) and eddies-plan.png (the face), zones outlined, into the folder. With --json and no --out it writes no file. Status 4 where the"
                    + " budget ended before every zone was measured.%n"
        },
        sortOptions = false)
final class EddiesCommand implements Callable<Integer> {
    @Mixin
    private FieldParameter field;

    @Mixin
    private FolderOption folder;

    @Option(
            names = "--patience",
            paramLabel = "X",
            defaultValue = "20",
            description =
                    "Gas is held when it stays longer than so many median residences of the through-going gas, both"
                            + " before and after; 1 … 10000 (default: ${DEFAULT-VALUE}).")
    private double patience;

    @Option(
            names = "--budget",
            paramLabel = "N",
            defaultValue = "40000",
            description =
                    "Most tracers that are released; at least 512. A quarter of them look for zones, the others measure"
                            + " what was found (default: ${DEFAULT-VALUE}).")
    private int budget;

    @Option(names = "--no-picture", description = "Write no picture.")
    private boolean noPicture;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        EddySettings settings = tracing.eddies(patience, budget);
        boolean files = folder.given() || !talk.json();
        FieldInput input = FieldInput.read(field, talk);
        Path target = folder.or(input.defaultFolder());
        if (files) {
            WholeFolder.check(target);
        }
        EddiesResult result = find(input, settings, talk);
        String[] sentence = new String[1];
        if (files) {
            WholeFolder.add(target, into -> {
                writeNumbers(result, into);
                if (!noPicture) {
                    sentence[0] = draw(input, result, into).orElse(null);
                }
            });
        }
        if (talk.json()) {
            talk.out().print(ResultJson.text(result.json()));
            talk.out().flush();
        }
        talk.say(result.text());
        if (files) {
            talk.say("Written: " + target);
        }
        if (sentence[0] != null) {
            talk.warn(sentence[0]);
            return ExitStatus.SHORT_OF_WANTED;
        }
        return result.complete() ? ExitStatus.DONE : ExitStatus.SHORT_OF_WANTED;
    }

    /** Draws the section along the radius and the face with the zones outlined, or tells in a sentence why it could not. */
    private Optional<String> draw(FieldInput input, EddiesResult result, Path into) throws IOException {
        try {
            PictureSettings how = PictureSettings.standard(input.title()).speedsIn(tracing.frame());
            PngFile.write(
                    Meridian.draw(input.flow(), result.eddies().zones(), MeridianSettings.averaged(how)),
                    Map.of("Title", input.title(), "Description", result.answer()),
                    into.resolve("eddies.png"));
            PngFile.write(
                    Plan.draw(
                            input.flow(),
                            new PlanData(
                                    List.of(),
                                    List.of(),
                                    Optional.empty(),
                                    Optional.empty(),
                                    result.eddies().zones()),
                            PlanSettings.standard(how)),
                    Map.of("Title", input.title(), "Description", result.answer()),
                    into.resolve("eddies-plan.png"));
            return Optional.empty();
        } catch (NoOpenGL e) {
            return Optional.of(e.getMessage());
        }
    }

    static EddiesResult find(FieldInput input, EddySettings settings, Talk talk) {
        long begun = System.nanoTime();
        try (Talk.Stretch stretch = talk.begin("Looking for held gas")) {
            Eddies eddies = Eddies.of(input.flow(), settings, stretch);
            return new EddiesResult(
                    input.flow(),
                    eddies,
                    input.file().getFileName().toString(),
                    input.sha256(),
                    1e-9 * (System.nanoTime() - begun));
        } catch (NoThroughFlow e) {
            throw RefusedInput.of(
                    input.file(),
                    e.getMessage(),
                    "gas that goes through, whose residence tells what is long",
                    "check the supply region, the pressures and the mass flows in the file",
                    e);
        }
    }

    static void writeNumbers(EddiesResult result, Path into) throws IOException {
        Files.writeString(into.resolve("eddies.json"), ResultJson.text(result.json()));
        Files.writeString(into.resolve("eddies.csv"), result.zonesCsv());
        Files.writeString(into.resolve("eddies-places.csv"), result.placesCsv());
        Files.writeString(into.resolve("eddies-reversed.csv"), result.reversedCsv());
    }
}
