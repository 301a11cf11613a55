package org.whither.io.file;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.LinkOption;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;
import java.util.stream.Stream;

/**
 * Writes a folder of results so that it is seen either whole or not at all. The folder holds a list of its own files,
 * {@value #LIST}; a later run replaces the folder only where everything in it stands on that list, so that nothing of
 * the user's is ever lost.
 */
public final class WholeFolder {
    /** Name of the list of files within a result folder. */
    public static final String LIST = ".whither-results";

    private static final String TITLE = "Results of whither. The next run may replace this folder and these files:";

    private WholeFolder() {}

    /**
     * Says before long work whether a folder may be written.
     *
     * @param target the final name
     * @throws RefusedInput where something is there that was not made by this program, or the folder around it is
     *     missing
     * @throws IOException where the folder cannot be looked into
     */
    public static void check(Path target) throws IOException {
        Path place = Unfinished.place(target);
        if (place.getParent() == null || !Files.isDirectory(place.getParent())) {
            throw RefusedInput.of(
                    target,
                    "the folder around it does not exist",
                    "an existing folder to write the results in",
                    "make that folder or name another one");
        }
        if (!Files.exists(place, LinkOption.NOFOLLOW_LINKS)) {
            return;
        }
        if (!Files.isDirectory(place, LinkOption.NOFOLLOW_LINKS)) {
            throw RefusedInput.of(
                    target,
                    "a file of that name exists",
                    "a free name or a folder of earlier results",
                    "name another folder or move the file away");
        }
        List<String> present = filesIn(place);
        if (present.isEmpty()) {
            return;
        }
        Path list = place.resolve(LIST);
        if (!Files.isRegularFile(list, LinkOption.NOFOLLOW_LINKS)) {
            throw foreign(target, present.get(0));
        }
        List<String> lines =
                Arrays.asList(new String(Files.readAllBytes(list), StandardCharsets.UTF_8).split("\n", -1));
        Set<String> own = lines.get(0).equals(TITLE) ? new HashSet<>(lines.subList(1, lines.size())) : Set.of();
        for (String name : present) {
            if (!own.contains(name)) {
                throw foreign(target, name);
            }
        }
    }

    /**
     * Writes a folder whole: assembled beside its final name, flushed to the disk, and moved into place, replacing an
     * earlier result folder that {@link #check} allows to replace. Where anything fails, or the program is interrupted,
     * an earlier folder stays as it was and nothing else is left behind.
     *
     * @param target the final name; the folder around it must exist
     * @param filler fills the empty folder it is given
     * @throws RefusedInput as {@link #check}
     * @throws IOException where writing fails
     */
    public static void write(Path target, ThrowingConsumer<Path> filler) throws IOException {
        check(target);
        Path place = Unfinished.place(target);
        Path partial = Unfinished.beside(place);
        try {
            Files.createDirectory(partial);
            filler.accept(partial);
            list(partial);
            forceAll(partial);
            check(target); // again: the work may have taken long
            swap(partial, place);
            Unfinished.letGo(partial);
        } finally {
            Unfinished.removeQuietly(partial);
        }
        Unfinished.force(place.getParent());
    }

    /**
     * Like {@link #write}, but files of earlier results that the filler does not write again are kept.
     *
     * @param target the final name; the folder around it must exist
     * @param filler fills the empty folder it is given
     * @throws RefusedInput as {@link #check}
     * @throws IOException where writing fails
     */
    public static void add(Path target, ThrowingConsumer<Path> filler) throws IOException {
        write(target, folder -> {
            filler.accept(folder);
            Path earlier = Unfinished.place(target);
            if (!Files.isDirectory(earlier, LinkOption.NOFOLLOW_LINKS)) {
                return;
            }
            for (String name : filesIn(earlier)) {
                Path copy = folder.resolve(name);
                if (!name.equals(LIST) && !Files.exists(copy, LinkOption.NOFOLLOW_LINKS)) {
                    Files.createDirectories(copy.getParent());
                    Files.copy(earlier.resolve(name), copy, LinkOption.NOFOLLOW_LINKS);
                }
            }
        });
    }

    private static void swap(Path partial, Path place) throws IOException {
        if (!Files.exists(place, LinkOption.NOFOLLOW_LINKS)) {
            Files.move(partial, place);
            return;
        }
        Path earlier = Unfinished.beside(place);
        Unfinished.letGo(earlier); // until the new folder stands in its place, the earlier one must not be removed
        Files.move(place, earlier);
        try {
            Files.move(partial, place);
        } catch (IOException e) {
            Files.move(earlier, place);
            throw e;
        }
        Unfinished.take(earlier);
        Unfinished.remove(earlier);
    }

    private static void list(Path folder) throws IOException {
        StringBuilder text = new StringBuilder(TITLE);
        for (String name : filesIn(folder)) {
            if (!name.equals(LIST)) {
                text.append('\n').append(name);
            }
        }
        text.append('\n').append(LIST).append('\n');
        Files.write(folder.resolve(LIST), text.toString().getBytes(StandardCharsets.UTF_8));
    }

    private static void forceAll(Path folder) throws IOException {
        List<Path> all;
        try (Stream<Path> paths = Files.walk(folder)) {
            all = paths.collect(Collectors.toList());
        }
        for (Path path : all) {
            if (!Files.isSymbolicLink(path)) {
                Unfinished.force(path);
            }
        }
    }

    /** All that is in a folder and its folders except the folders themselves, by name relative to it, in order. */
    private static List<String> filesIn(Path folder) throws IOException {
        try (Stream<Path> paths = Files.walk(folder)) {
            return paths.filter(path -> !Files.isDirectory(path, LinkOption.NOFOLLOW_LINKS))
                    .map(path -> folder.relativize(path).toString().replace('\\', '/'))
                    .sorted()
                    .collect(Collectors.toList());
        }
    }

    private static RefusedInput foreign(Path target, String name) {
        return RefusedInput.of(
                target,
                "the folder exists and holds " + name + ", which this program did not write there",
                "a free name or a folder of earlier results",
                "name another folder or move that file away");
    }
}
