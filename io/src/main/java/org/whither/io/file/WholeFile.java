package org.whither.io.file;

import java.io.IOException;
import java.nio.file.AtomicMoveNotSupportedException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;

/** Writes a file so that it is seen either whole or not at all. */
public final class WholeFile {
    private WholeFile() {}

    /**
     * Writes a file whole: beside its final name first, then flushed to the disk and moved into place, replacing a file
     * that was there. Where anything fails, or the program is interrupted, a file that was there stays as it was and
     * nothing else is left behind.
     *
     * @param target the final name; its folder must exist
     * @param writer writes the file under the name it is given, and closes it; the name is free
     * @throws IOException where the folder does not exist, the target is a folder, or writing fails
     */
    public static void write(Path target, ThrowingConsumer<Path> writer) throws IOException {
        Path place = Unfinished.place(target);
        if (Files.isDirectory(place)) {
            throw new IOException(target + " is a folder; expected the name of a file to write; give another name");
        }
        if (place.getParent() == null || !Files.isDirectory(place.getParent())) {
            throw new IOException("the folder of " + target + " does not exist; make it or give another name");
        }
        Path partial = Unfinished.beside(place);
        try {
            writer.accept(partial);
            Unfinished.force(partial);
            move(partial, place);
            Unfinished.letGo(partial);
        } finally {
            Unfinished.removeQuietly(partial);
        }
        Unfinished.force(place.getParent());
    }

    private static void move(Path from, Path to) throws IOException {
        try {
            Files.move(from, to, StandardCopyOption.ATOMIC_MOVE);
        } catch (AtomicMoveNotSupportedException e) {
            Files.move(from, to, StandardCopyOption.REPLACE_EXISTING);
        }
    }
}
