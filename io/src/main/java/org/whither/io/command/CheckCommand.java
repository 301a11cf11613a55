package org.whither.io.command;

import java.io.IOException;
import java.util.concurrent.Callable;
import org.whither.io.result.FieldSummary;
import org.whither.io.result.ResultJson;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;

/** Opens and validates a field. */
@Command(
        name = "check",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Open and validate a field; print what it holds.%n",
        description = "Prints what the file holds in the engineer's units, the mass flows over its borders and how they"
                + " close, and how far its film keeps to what a thin film assumes. Status 4 where the border flows do"
                + " not close within 0.5 %%.%n",
        sortOptions = false)
final class CheckCommand implements Callable<Integer> {
    @Mixin
    private FieldParameter field;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        FieldInput input = FieldInput.read(field, talk);
        FieldSummary summary = new FieldSummary(input.flow());
        if (talk.json()) {
            talk.out()
                    .print(ResultJson.text(
                            summary.json(input.file().getFileName().toString(), input.sha256())));
            talk.out().flush();
        }
        summary.warnings().forEach(warning -> talk.say("Warning: " + warning));
        talk.say(summary.text());
        talk.say("Tracing takes " + Memory.words(input.flow().film()) + ".");
        return summary.closes() ? ExitStatus.DONE : ExitStatus.SHORT_OF_WANTED;
    }
}
