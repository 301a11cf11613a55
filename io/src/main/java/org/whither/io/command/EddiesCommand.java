package org.whither.io.command;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.concurrent.Callable;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.eddy.NoThroughFlow;
import org.whither.io.file.RefusedInput;
import org.whither.io.file.WholeFolder;
import org.whither.io.result.EddiesResult;
import org.whither.io.result.ResultJson;
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
            "Writes eddies.json, eddies.csv (the zones), eddies-places.csv (places of held gas) and eddies-reversed.csv (the"
                    + " map of reversed flow) into the folder. With --json and no --out it writes no file. Status 4 where the"
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
        if (files) {
            WholeFolder.add(target, into -> writeNumbers(result, into));
        }
        if (talk.json()) {
            talk.out().print(ResultJson.text(result.json()));
            talk.out().flush();
        }
        talk.say(result.text());
        if (files) {
            talk.say("Written: " + target);
        }
        return result.complete() ? ExitStatus.DONE : ExitStatus.SHORT_OF_WANTED;
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
