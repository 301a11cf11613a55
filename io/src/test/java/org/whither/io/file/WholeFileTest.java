package org.whither.io.file;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.attribute.PosixFilePermissions;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

class WholeFileTest {
    @TempDir
    private Path folder;

    private List<String> names() throws IOException {
        try (Stream<Path> paths = Files.list(folder)) {
            return paths.map(path -> path.getFileName().toString()).sorted().collect(Collectors.toList());
        }
    }

    @Test
    void write_whenDone_isThereUnderItsNameAlone() throws IOException {
        Path target = folder.resolve("split.json");
        WholeFile.write(target, partial -> {
            assertFalse(Files.exists(target), "seen before it is whole");
            Files.writeString(partial, "new");
            assertEquals(folder, partial.getParent());
        });
        assertEquals("new", Files.readString(target));
        assertEquals(List.of("split.json"), names());
    }

    @Test
    void write_overEarlierFile_replacesItOnlyWhenWhole() throws IOException {
        Path target = Files.writeString(folder.resolve("split.json"), "old");
        WholeFile.write(target, partial -> {
            Files.writeString(partial, "new");
            assertEquals("old", Files.readString(target));
        });
        assertEquals("new", Files.readString(target));
    }

    @Test
    void write_failing_leavesEarlierFileAndNothingElse() throws IOException {
        Path target = Files.writeString(folder.resolve("split.json"), "old");
        IOException failure = assertThrows(
                IOException.class,
                () -> WholeFile.write(target, partial -> {
                    Files.writeString(partial, "half");
                    throw new IOException("disk full");
                }));
        assertEquals("disk full", failure.getMessage());
        assertThrows(
                IllegalStateException.class,
                () -> WholeFile.write(folder.resolve("other.json"), partial -> {
                    throw new IllegalStateException("a fault");
                }));
        assertEquals("old", Files.readString(target));
        assertEquals(List.of("split.json"), names());
    }

    @Test
    void write_intoFolderThatIsMissing_saysSo() {
        IOException failure = assertThrows(
                IOException.class, () -> WholeFile.write(folder.resolve("none").resolve("a"), Files::createFile));
        assertTrue(failure.getMessage().contains("does not exist"), failure.getMessage());
    }

    @Test
    void write_ontoFolder_saysSo() {
        IOException failure = assertThrows(IOException.class, () -> WholeFile.write(folder, Files::createFile));
        assertTrue(failure.getMessage().contains("is a folder"), failure.getMessage());
    }

    @Test
    void write_givesTheUsualPermissions() throws IOException {
        assumeTrue(
                folder.getFileSystem().supportedFileAttributeViews().contains("posix"),
                "skipped: no POSIX permissions here");
        Path usual = Files.createFile(folder.resolve("usual"));
        Path target = folder.resolve("written");
        WholeFile.write(target, Files::createFile);
        assertEquals(
                PosixFilePermissions.toString(Files.getPosixFilePermissions(usual)),
                PosixFilePermissions.toString(Files.getPosixFilePermissions(target)));
    }

    @Test
    void write_throughSymbolicLink_keepsTheLink() throws IOException {
        Path real = Files.writeString(folder.resolve("real"), "old");
        Path link = Files.createSymbolicLink(folder.resolve("link"), real);
        WholeFile.write(link, partial -> Files.writeString(partial, "new"));
        assertTrue(Files.isSymbolicLink(link));
        assertEquals("new", Files.readString(real));
    }

    /** A program that is interrupted while it writes leaves the earlier file and nothing else. */
    @Test
    void write_interrupted_leavesNothingBehind() throws Exception {
        Path target = Files.writeString(folder.resolve("split.json"), "old");
        Process process = new ProcessBuilder(
                        Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                        "-cp",
                        System.getProperty("java.class.path"),
                        Interrupted.class.getName(),
                        target.toString())
                .redirectError(ProcessBuilder.Redirect.DISCARD)
                .start();
        assertEquals('h', process.getInputStream().read());
        assertEquals(2, names().size(), "the partial file stands beside");
        process.destroy(); // SIGTERM, as Ctrl-C
        assertTrue(process.waitFor(30, TimeUnit.SECONDS));
        assertEquals("old", Files.readString(target));
        assertEquals(List.of("split.json"), names());
    }

    /** Writes half a file and waits to be interrupted. */
    static final class Interrupted {
        private Interrupted() {}

        public static void main(String[] arguments) throws IOException {
            WholeFile.write(Path.of(arguments[0]), partial -> {
                Files.writeString(partial, "half");
                System.out.print('h');
                System.out.flush();
                try {
                    Thread.sleep(60_000);
                } catch (InterruptedException e) {
                    throw new IOException(e);
                }
            });
        }
    }
}
