package org.whither.io.command;

import java.nio.file.Path;
import picocli.CommandLine.Option;

/** Where results go. */
final class FolderOption {
    @Option(
            names = "--out",
            paramLabel = "FOLDER",
            description =
                    "Folder for the results (default: ./NAME-whither). Results that whither wrote there earlier are"
                            + " replaced; anything else in it is never touched.")
    private Path folder;

    boolean given() {
        return folder != null;
    }

    Path or(Path standard) {
        return folder == null ? standard : folder;
    }
}
