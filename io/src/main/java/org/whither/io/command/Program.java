package org.whither.io.command;

import java.io.IOException;
import java.io.PrintWriter;
import java.nio.charset.StandardCharsets;
import java.nio.file.AccessDeniedException;
import java.nio.file.FileSystemException;
import java.util.concurrent.Callable;
import org.whither.io.file.RefusedInput;
import picocli.CommandLine;
import picocli.CommandLine.Command;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** The program as a whole: its commands, and how it ends when one of them fails. */
@Command(
        name = "whither",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        synopsisSubcommandLabel = "COMMAND",
        header = "Where the gas of a face seal's film goes.%n",
        description = {
            "Reads a computed gas film from an HDF5 file (io/LAYOUT.md describes the layout), traces massless particles"
                    + " through it, and tells how much of the supply gas leaves to the inner and to the outer diameter,"
                    + " with an interval, and shows it.%n",
            "Start with: whither demo%n"
        },
        commandListHeading = "%nCommands:%n",
        footerHeading = "%nExit status:%n",
        footer = {
            "  0 done · 1 a fault in the program · 2 wrong usage · 3 the input is refused ·"
                    + " 4 done, but short of what was wanted (width, closure, a whole table, pictures)",
            "",
            "Caution:",
            "  A result describes the computed field it was given, not the machine. It is no approval and no leakage"
                    + " guarantee, and nothing to set trips, alarms, zones or exposure limits by. Local codes, the seal"
                    + " maker, the plant's safety studies and licensed practice come first. Nitrogen asphyxiates."
        },
        subcommands = {
            DemoCommand.class,
            CheckCommand.class,
            SplitCommand.class,
            EddiesCommand.class,
            PathsCommand.class,
            DrawCommand.class,
            RideCommand.class,
            ReportCommand.class,
            SampleCommand.class
        })
public final class Program implements Callable<Integer> {
    @Spec
    private CommandSpec spec;

    private Program() {}

    /**
     * Runs the program.
     *
     * @param arguments command, options and file
     * @return exit status
     */
    public static int run(String... arguments) {
        return run(
                new PrintWriter(System.out, true, StandardCharsets.UTF_8),
                new PrintWriter(System.err, true, StandardCharsets.UTF_8),
                arguments);
    }

    static int run(PrintWriter out, PrintWriter err, String... arguments) {
        CommandLine line = new CommandLine(new Program());
        line.setOut(out);
        line.setErr(err);
        line.setCaseInsensitiveEnumValuesAllowed(true);
        line.setUsageHelpAutoWidth(true);
        line.setExecutionExceptionHandler((failure, command, parsed) -> ending(failure, command.getErr()));
        line.setParameterExceptionHandler(Program::wrongUsage);
        try {
            return line.execute(arguments);
        } catch (OutOfMemoryError e) {
            return ending(e, err); // errors pass the handler of exceptions by
        }
    }

    @Override
    public Integer call() {
        throw new ParameterException(spec.commandLine(), "a command is missing");
    }

    private static int wrongUsage(ParameterException failure, String[] arguments) {
        CommandLine command = failure.getCommandLine();
        String message = failure.getMessage();
        command.getErr()
                .println("whither: " + message + (message.endsWith(".") ? "" : ".") + " Type: "
                        + command.getCommandSpec().qualifiedName() + " --help");
        return ExitStatus.USAGE;
    }

    /** One sentence on the way out; a stack trace only for a fault of the program itself. */
    private static int ending(Throwable failure, PrintWriter err) {
        if (failure instanceof RefusedInput) {
            err.println("whither: " + failure.getMessage());
            return ExitStatus.REFUSED;
        }
        if (failure instanceof IOException) {
            err.println("whither: " + sentence((IOException) failure));
            return ExitStatus.REFUSED;
        }
        for (Throwable cause = failure; cause != null; cause = cause.getCause()) {
            if (cause instanceof OutOfMemoryError) {
                long given = Runtime.getRuntime().maxMemory() >> 20;
                err.println("whither: the " + given
                        + " MiB of memory that the program has are not enough for this; give it"
                        + " more, as with WHITHER_JAVA_OPTS=-Xmx" + 2 * given + "m in the environment, or use a coarser"
                        + " grid");
                return ExitStatus.REFUSED;
            }
        }
        err.println("whither: a fault in the program; please report it with these lines and, if you may, the field:");
        failure.printStackTrace(err);
        return ExitStatus.FAULT;
    }

    private static String sentence(IOException failure) {
        if (failure instanceof FileSystemException denied) {
            String reason = denied.getReason() == null
                    ? (failure instanceof AccessDeniedException ? "permission denied" : "not possible")
                    : denied.getReason();
            return denied.getFile() + " cannot be read or written: " + reason
                    + "; free what is in the way or name another place";
        }
        return failure.getMessage();
    }

    /** Tells the version from the jar. */
    static final class Version implements CommandLine.IVersionProvider {
        @Override
        public String[] getVersion() {
            return new String[] {"whither " + number()};
        }

        static String number() {
            String version = Program.class.getPackage().getImplementationVersion();
            return version == null ? "(not packaged)" : version;
        }
    }
}
