package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** A program that is stopped, or that has too little memory, in a process of its own. */
class InterruptionTest {
    private static final Path FIELD = Path.of("..", "samples", "fields", "spiral-24x32.h5");

    @TempDir
    private Path folder;

    @Test
    void split_terminatedAtWork_leavesNothing() throws Exception {
        Path said = folder.resolve("said.txt");
        Process process = start(said, List.of(), "split", FIELD.toString(), "--width", "1e-6", "--out", "out");
        try {
            // At work once it has told progress; the work itself would take minutes.
            while (process.isAlive() && !Files.readString(said).contains("%")) {
                Thread.sleep(20);
            }
            assertTrue(process.isAlive(), Files.readString(said));
            process.destroy(); // SIGTERM where there are signals
            assertTrue(process.waitFor(20, TimeUnit.SECONDS), "it goes on");
            assertNotEquals(0, process.exitValue());
            assertEquals(List.of("said.txt"), names());
        } finally {
            process.destroyForcibly();
        }
    }

    @Test
    void check_heapTooSmall_isRefusedInOneSentence() throws Exception {
        Path said = folder.resolve("said.txt");
        Process process = start(said, List.of("-Xmx12m", "-Xss256k"), "demo", "--grid", "512x512", "--out", "out");
        try {
            assertTrue(process.waitFor(60, TimeUnit.SECONDS), "it goes on");
            String text = Files.readString(said);
            assertEquals(ExitStatus.REFUSED, process.exitValue(), text);
            assertTrue(text.contains("WHITHER_JAVA_OPTS=-Xmx"), text);
            assertTrue(!text.contains("\tat "), text);
            assertEquals(List.of("said.txt"), names());
        } finally {
            process.destroyForcibly();
        }
    }

    private Process start(Path said, List<String> options, String... arguments) throws IOException {
        Files.createFile(said);
        List<String> line = new java.util.ArrayList<>();
        line.add(Path.of(System.getProperty("java.home"), "bin", "java").toString());
        line.addAll(options);
        line.addAll(List.of("-cp", System.getProperty("java.class.path"), "org.whither.io.Whither"));
        for (String argument : arguments) {
            line.add(argument.equals("out") ? folder.resolve("out").toString() : argument);
        }
        return new ProcessBuilder(line)
                .redirectErrorStream(true)
                .redirectOutput(said.toFile())
                .start();
    }

    private List<String> names() throws IOException {
        try (Stream<Path> all = Files.list(folder)) {
            return all.map(path -> path.getFileName().toString()).sorted().toList();
        }
    }
}
