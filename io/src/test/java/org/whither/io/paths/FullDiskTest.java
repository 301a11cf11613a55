package org.whither.io.paths;

import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.film.Frame;
import org.whither.trace.Course;

/** Outputs on a device that is always full: Linux's /dev/full. */
class FullDiskTest {
    private static final Path FULL = Path.of("/dev/full");
    private static final PathAccount ACCOUNT = new PathAccount(
            "f", "t", "s", Frame.ROTATING, Course.FORWARD, "exit", 1e-6, 1, "2 equal in time", "conserving", List.of());

    @Test
    void fullDisk_isToldAtTheLatestAtTheEnd() {
        assumeTrue(Files.exists(FULL), "skipped: no /dev/full here");
        assertFull(assertThrows(IOException.class, () -> new CsvOutput(FULL).finish(new PathTotals())));
        assertFull(assertThrows(
                IOException.class, () -> JsonOutput.toFile(FULL, ACCOUNT).finish(new PathTotals())));
        assertFull(assertThrows(IOException.class, () -> new GltfWriter().write(FULL, 0)));
    }

    private static void assertFull(IOException failure) {
        assertTrue(failure.getMessage().contains("No space left"), failure.getMessage());
    }
}
