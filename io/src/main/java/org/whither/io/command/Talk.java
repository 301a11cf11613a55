package org.whither.io.command;

import java.io.PrintWriter;
import java.util.Locale;
import java.util.function.DoubleConsumer;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.Spec;

/** What a command says while it works and when it is done, and the options about that. */
final class Talk {
    private static final int BAR = 30;

    @Spec(Spec.Target.MIXEE)
    private CommandSpec spec;

    @Option(names = "--json", description = "Print the result as JSON on standard output, and nothing else there.")
    private boolean json;

    @Option(names = "--quiet", description = "Say nothing of the progress.")
    private boolean quiet;

    boolean json() {
        return json;
    }

    PrintWriter out() {
        return spec.commandLine().getOut();
    }

    /** A sentence that must be seen whatever the options: on standard error. */
    void warn(String sentence) {
        spec.commandLine().getErr().println("whither: " + sentence);
    }

    /** A line of plain words, unless JSON is wanted. */
    void say(String text) {
        if (!json) {
            out().println(text);
        }
    }

    /**
     * A stretch of work whose progress is shown on standard error: a bar on a terminal, plain lines otherwise.
     *
     * @param name what is done
     * @return to be told the share done, 0 … 1, from any thread
     */
    Stretch begin(String name) {
        return new Stretch(name);
    }

    /** A stretch of work. */
    final class Stretch implements DoubleConsumer, AutoCloseable {
        private final String name;
        private final boolean terminal = "yes".equals(System.getenv("WHITHER_TERMINAL"));
        private final long begun = System.nanoTime();
        private long told = begun;
        private double share;

        Stretch(String name) {
            this.name = name;
            if (!quiet) {
                show();
            }
        }

        @Override
        public synchronized void accept(double done) {
            share = Math.max(share, Math.min(1, done));
            long now = System.nanoTime();
            if (!quiet && now - told > (terminal ? 100_000_000L : 5_000_000_000L)) {
                told = now;
                show();
            }
        }

        private void show() {
            PrintWriter err = spec.commandLine().getErr();
            if (terminal) {
                int full = (int) Math.round(share * BAR);
                err.print("\r" + "█".repeat(full) + "░".repeat(BAR - full)
                        + String.format(Locale.ROOT, " %3.0f %%  %s ", 100 * share, name));
                err.flush();
            } else if (share == 0) {
                err.println(name + " …");
            } else {
                err.println(String.format(Locale.ROOT, "%s: %.0f %%", name, 100 * share));
            }
        }

        @Override
        public synchronized void close() {
            if (quiet) {
                return;
            }
            PrintWriter err = spec.commandLine().getErr();
            double seconds = 1e-9 * (System.nanoTime() - begun);
            String line = String.format(Locale.ROOT, "%s: %.1f s", name, seconds);
            err.println(terminal ? "\r" + line + " ".repeat(BAR + 10) : line);
        }
    }
}
