package org.whither.io.file;

import java.io.IOException;
import java.nio.channels.FileChannel;
import java.nio.file.FileVisitResult;
import java.nio.file.Files;
import java.nio.file.LinkOption;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.nio.file.SimpleFileVisitor;
import java.nio.file.StandardOpenOption;
import java.nio.file.attribute.BasicFileAttributes;
import java.util.Set;
import java.util.concurrent.ConcurrentHashMap;
import java.util.concurrent.ThreadLocalRandom;

/** The files and folders that are being assembled; those that are left when the program is interrupted are removed. */
final class Unfinished {
    private static final Set<Path> PATHS = ConcurrentHashMap.newKeySet();
    private static final int ATTEMPTS = 5;

    static {
        Runtime.getRuntime().addShutdownHook(new Thread(() -> PATHS.forEach(Unfinished::removeQuietly)));
    }

    private Unfinished() {}

    /** A hidden name beside the final one, which nothing bears yet; removed at the end of the program unless let go. */
    static Path beside(Path target) {
        String number = Long.toHexString(ThreadLocalRandom.current().nextLong() | Long.MIN_VALUE);
        Path path = target.resolveSibling("." + target.getFileName() + "." + number + ".partial");
        PATHS.add(path);
        return path;
    }

    /** Takes charge of a path again: it is removed at the end of the program unless let go. */
    static void take(Path path) {
        PATHS.add(path);
    }

    /** Forgets a path: it was moved into place, or removed. */
    static void letGo(Path path) {
        PATHS.remove(path);
    }

    /** Removes a file, or a folder with all that is in it, and forgets it; symbolic links are not followed. */
    static void remove(Path path) throws IOException {
        for (int attempt = 1; ; attempt++) {
            try {
                removeTree(path);
                break;
            } catch (IOException e) {
                if (attempt == ATTEMPTS) { // another thread may still be adding to the folder
                    throw e;
                }
            }
        }
        letGo(path);
    }

    static void removeQuietly(Path path) {
        try {
            remove(path);
        } catch (IOException e) {
            letGo(path); // the failure that led here is the one to be told
        }
    }

    /** The place that a name stands for: symbolic links that exist are followed, so that they are kept. */
    static Path place(Path target) throws IOException {
        Path absolute = target.toAbsolutePath().normalize();
        return Files.isSymbolicLink(absolute) && Files.exists(absolute) ? absolute.toRealPath() : absolute;
    }

    /** Makes sure that a file, or the names in a folder, are on the disk. */
    static void force(Path path) throws IOException {
        boolean folder = Files.isDirectory(path, LinkOption.NOFOLLOW_LINKS);
        try (FileChannel channel =
                FileChannel.open(path, folder ? StandardOpenOption.READ : StandardOpenOption.WRITE)) {
            channel.force(true);
        } catch (IOException e) {
            if (!folder) {
                throw e;
            }
            // Some systems cannot open a folder; there the move itself is what the system keeps safe.
        }
    }

    private static void removeTree(Path path) throws IOException {
        try {
            Files.walkFileTree(path, new SimpleFileVisitor<>() {
                @Override
                public FileVisitResult visitFile(Path file, BasicFileAttributes attributes) throws IOException {
                    Files.deleteIfExists(file);
                    return FileVisitResult.CONTINUE;
                }

                @Override
                public FileVisitResult postVisitDirectory(Path folder, IOException failure) throws IOException {
                    Files.deleteIfExists(folder);
                    return FileVisitResult.CONTINUE;
                }
            });
        } catch (NoSuchFileException e) {
            return; // it was never made
        }
    }
}
