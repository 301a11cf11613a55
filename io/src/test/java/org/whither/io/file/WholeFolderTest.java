package org.whither.io.file;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

class WholeFolderTest {
    @TempDir
    private Path folder;

    private List<String> names(Path in) throws IOException {
        try (Stream<Path> paths = Files.list(in)) {
            return paths.map(path -> path.getFileName().toString()).sorted().collect(Collectors.toList());
        }
    }

    private static void fill(Path target, String text) throws IOException {
        WholeFolder.write(target, partial -> {
            Files.writeString(partial.resolve("split.json"), text);
            Files.createDirectory(partial.resolve("pictures"));
            Files.writeString(partial.resolve("pictures").resolve("map.png"), text);
        });
    }

    @Test
    void write_whenDone_isThereUnderItsNameAlone() throws IOException {
        Path target = folder.resolve("film-whither");
        WholeFolder.write(target, partial -> {
            assertFalse(Files.exists(target), "seen before it is whole");
            Files.writeString(partial.resolve("a"), "a");
        });
        assertEquals(List.of("film-whither"), names(folder));
        assertEquals(List.of(WholeFolder.LIST, "a"), names(target));
    }

    @Test
    void write_overEarlierResults_replacesThemAll() throws IOException {
        Path target = folder.resolve("film-whither");
        fill(target, "old");
        WholeFolder.write(target, partial -> {
            Files.writeString(partial.resolve("other"), "new");
            assertEquals("old", Files.readString(target.resolve("split.json")));
        });
        assertEquals(List.of(WholeFolder.LIST, "other"), names(target));
        fill(target, "newest");
        assertEquals("newest", Files.readString(target.resolve("pictures").resolve("map.png")));
        assertEquals(List.of("film-whither"), names(folder));
    }

    @Test
    void write_overEmptyFolder_fillsIt() throws IOException {
        Path target = Files.createDirectory(folder.resolve("film-whither"));
        fill(target, "new");
        assertEquals("new", Files.readString(target.resolve("split.json")));
    }

    @Test
    void write_failing_leavesEarlierResultsAndNothingElse() throws IOException {
        Path target = folder.resolve("film-whither");
        fill(target, "old");
        assertThrows(
                IOException.class,
                () -> WholeFolder.write(target, partial -> {
                    Files.writeString(partial.resolve("split.json"), "half");
                    throw new IOException("disk full");
                }));
        assertEquals("old", Files.readString(target.resolve("split.json")));
        assertEquals(List.of("film-whither"), names(folder));
    }

    @Test
    void write_overForeignFolder_isRefusedAndTouchesNothing() throws IOException {
        Path target = Files.createDirectory(folder.resolve("mine"));
        Files.writeString(target.resolve("thesis.tex"), "years of work");
        RefusedInput refused = assertThrows(RefusedInput.class, () -> fill(target, "new"));
        assertTrue(refused.getMessage().startsWith(target + ": the folder exists and holds thesis.tex"));
        assertTrue(refused.getMessage().contains("name another folder"), refused.getMessage());
        assertEquals(List.of("thesis.tex"), names(target));
        assertEquals(List.of("mine"), names(folder));
    }

    @Test
    void write_overResultsWithForeignFile_isRefusedAndTouchesNothing() throws IOException {
        Path target = folder.resolve("film-whither");
        fill(target, "old");
        Files.writeString(target.resolve("pictures").resolve("notes.txt"), "mine");
        RefusedInput refused = assertThrows(RefusedInput.class, () -> fill(target, "new"));
        assertTrue(refused.getMessage().contains("holds pictures/notes.txt"), refused.getMessage());
        assertEquals("old", Files.readString(target.resolve("split.json")));
        assertEquals("mine", Files.readString(target.resolve("pictures").resolve("notes.txt")));
    }

    @Test
    void write_whereForeignFileCameMeanwhile_isRefusedAndTouchesNothing() throws IOException {
        Path target = folder.resolve("film-whither");
        fill(target, "old");
        assertThrows(
                RefusedInput.class,
                () -> WholeFolder.write(target, partial -> Files.writeString(target.resolve("notes.txt"), "mine")));
        assertEquals("mine", Files.readString(target.resolve("notes.txt")));
        assertEquals("old", Files.readString(target.resolve("split.json")));
        assertEquals(List.of("film-whither"), names(folder));
    }

    @Test
    void check_fileOfThatNameOrNoFolderAround_isRefused() throws IOException {
        Path file = Files.writeString(folder.resolve("film-whither"), "mine");
        RefusedInput refused = assertThrows(RefusedInput.class, () -> WholeFolder.check(file));
        assertTrue(refused.getMessage().contains("a file of that name exists"), refused.getMessage());
        Path nowhere = folder.resolve("none").resolve("film-whither");
        refused = assertThrows(RefusedInput.class, () -> WholeFolder.check(nowhere));
        assertTrue(refused.getMessage().contains("the folder around it does not exist"), refused.getMessage());
        WholeFolder.check(folder.resolve("free"));
        assertEquals("mine", Files.readString(file));
    }
}
