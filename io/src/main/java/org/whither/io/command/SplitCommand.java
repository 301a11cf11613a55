package org.whither.io.command;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.whither.fate.BorderBalance;
import org.whither.fate.Split;
import org.whither.fate.SplitSettings;
import org.whither.io.file.RefusedInput;
import org.whither.io.file.WholeFolder;
import org.whither.io.picture.PictureDescription;
import org.whither.io.picture.Stills;
import org.whither.io.picture.View;
import org.whither.io.result.ResultJson;
import org.whither.io.result.SplitResult;
import org.whither.render.NoOpenGL;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;

/** The origin–destination table. */
@Command(
        name = "split",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Tell where the gas goes: the table of origins and destinations.%n",
        description = {
            "Follows tracers from the feed, and from wherever else gas enters, to where they leave, and back from there;"
                    + " sets beside that the integrals over the borders. Every share has a 95 %% interval.",
            "Writes split.json and plan.png (with plan.json, its description), where each point of the feed sends its gas, into the folder. With --json and"
                    + " no --out it writes no file. Status 4 where the wanted width or closure was not reached, or no"
                    + " picture could be drawn.%n"
        },
        sortOptions = false)
final class SplitCommand implements Callable<Integer> {
    @Mixin
    private FieldParameter field;

    @Mixin
    private FolderOption folder;

    @Mixin
    private TracingOptions tracing;

    @Option(names = "--no-picture", description = "Write no picture.")
    private boolean noPicture;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        SplitSettings settings = tracing.split();
        boolean files = folder.given() || !talk.json();
        FieldInput input = FieldInput.read(field, talk);
        Path target = folder.or(input.defaultFolder());
        if (files) {
            WholeFolder.check(target);
        }
        SplitResult result = find(input, settings, talk);
        Optional<String> noOpenGL = Optional.empty();
        if (files) {
            String[] sentence = new String[1];
            WholeFolder.add(target, into -> {
                writeNumbers(result, into);
                if (!noPicture) {
                    sentence[0] = drawPlan(input, result, into, tracing).orElse(null);
                }
            });
            noOpenGL = Optional.ofNullable(sentence[0]);
        }
        print(result, talk);
        if (files) {
            talk.say("Written: " + target);
        }
        noOpenGL.ifPresent(talk::warn);
        return noOpenGL.isPresent() ? ExitStatus.SHORT_OF_WANTED : status(result);
    }

    static SplitResult find(FieldInput input, SplitSettings settings, Talk talk) {
        if (!(BorderBalance.of(input.flow()).inflow() > 0)) {
            throw RefusedInput.of(
                    input.file(),
                    "no gas enters the film over any border",
                    "inflow through the feed (/supply) or over a diameter",
                    "check the supply region, the pressures and the mass flows in the file");
        }
        long begun = System.nanoTime();
        try (Talk.Stretch stretch = talk.begin("Following tracers")) {
            Split split = Split.of(input.flow(), settings, stretch);
            return new SplitResult(
                    input.flow(),
                    settings,
                    split,
                    input.file().getFileName().toString(),
                    input.sha256(),
                    1e-9 * (System.nanoTime() - begun));
        }
    }

    static void writeNumbers(SplitResult result, Path into) throws IOException {
        Files.writeString(into.resolve("split.json"), ResultJson.text(result.json()));
    }

    /** Draws the plan, or tells in a sentence why it could not. */
    static Optional<String> drawPlan(FieldInput input, SplitResult result, Path into, TracingOptions tracing)
            throws IOException {
        try {
            Pictures.needed();
            PictureDescription plan = PictureDescription.of(View.PLAN);
            plan = plan.seen(plan.background(), plan.seenFrom(), tracing.frame());
            Stills.Subject subject = Pictures.subject(
                    input.flow(),
                    Pictures.few(result.split().fed()),
                    Pictures.Wanted.of(List.of(plan), 8, false),
                    tracing);
            Pictures.draw(input, subject, plan, input.title(), into);
            return Optional.empty();
        } catch (NoOpenGL e) {
            return Optional.of(e.getMessage());
        }
    }

    static void print(SplitResult result, Talk talk) {
        if (talk.json()) {
            talk.out().print(ResultJson.text(result.json()));
            talk.out().flush();
        }
        talk.say(result.text());
    }

    static int status(SplitResult result) {
        return result.closes() && result.complete() && result.split().widthReached()
                ? ExitStatus.DONE
                : ExitStatus.SHORT_OF_WANTED;
    }
}
