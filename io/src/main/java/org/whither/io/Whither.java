package org.whither.io;

import org.whither.io.command.Program;

/** Where the program starts. */
public final class Whither {
    private Whither() {}

    /**
     * Starts the program.
     *
     * @param arguments command, options and file
     */
    public static void main(String[] arguments) {
        // No screen is needed, and a stale one must not be asked for.
        System.setProperty("java.awt.headless", "true");
        System.exit(Program.run(arguments));
    }
}
