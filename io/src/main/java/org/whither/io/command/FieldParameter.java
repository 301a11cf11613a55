package org.whither.io.command;

import java.nio.file.Path;
import picocli.CommandLine.Parameters;

/** The field file a command works on. */
final class FieldParameter {
    @Parameters(
            index = "0",
            paramLabel = "FIELD",
            description = "Field file in the HDF5 film-field layout (io/LAYOUT.md).")
    private Path file;

    Path file() {
        return file;
    }
}
