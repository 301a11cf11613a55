package org.whither.io.command;

import java.nio.file.Path;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;

/** The field file a command works on. */
final class FieldParameter {
    @Parameters(
            index = "0",
            paramLabel = "FIELD",
            description = "Field file in the HDF5 film-field layout (io/LAYOUT.md).")
    private Path file;

    @Option(
            names = "--interpolation",
            paramLabel = "KIND",
            defaultValue = "conserving",
            description = "Between the computed values: conserving keeps the mass of every part of every cell; nodal is"
                    + " plain interpolation between the nodes, for comparison (default: ${DEFAULT-VALUE}).")
    private Interpolation interpolation;

    Interpolation interpolation() {
        return interpolation;
    }

    Path file() {
        return file;
    }
}
