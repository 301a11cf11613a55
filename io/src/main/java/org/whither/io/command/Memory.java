package org.whither.io.command;

import java.nio.file.Path;
import java.util.function.LongSupplier;
import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.io.file.RefusedInput;

/** The memory that a field needs, against what the program was given. */
final class Memory {
    /** What an option -Xmx is rounded up to (MiB). */
    private static final long STEP = 256;

    private Memory() {}

    /**
     * Refuses a field whose motion will not fit into the heap.
     *
     * @param film the film, already read
     * @param file its file
     * @throws RefusedInput where it will not fit
     */
    static void require(Film film, Path file) {
        Runtime runtime = Runtime.getRuntime();
        require(film, file, () -> runtime.maxMemory() - runtime.totalMemory() + runtime.freeMemory());
    }

    /** As {@link #require(Film, Path)}, with the free memory at the time (bytes). */
    static void require(Film film, Path file, LongSupplier free) {
        long needed = ConservingFlow.heap(film);
        if (needed <= free.getAsLong()) {
            return;
        }
        System.gc(); // what reading left behind
        if (needed <= free.getAsLong()) {
            return;
        }
        Runtime runtime = Runtime.getRuntime();
        throw RefusedInput.of(
                file,
                "tracing this field takes " + mebibytes(needed) + " MiB of memory",
                "at most the " + (free.getAsLong() >> 20) + " MiB that are free in the program's heap",
                "set WHITHER_JAVA_OPTS=-Xmx" + option(needed + runtime.totalMemory() - runtime.freeMemory())
                        + "m where the machine has that much, or use a coarser grid");
    }

    /** Words that tell how much heap the program should be given for a film, with the option that gives it. */
    static String words(Film film) {
        Runtime runtime = Runtime.getRuntime();
        long all = ConservingFlow.heap(film) + runtime.totalMemory() - runtime.freeMemory();
        return mebibytes(ConservingFlow.heap(film)) + " MiB of heap beside the field (WHITHER_JAVA_OPTS=-Xmx"
                + option(all) + "m or more; it has " + (runtime.maxMemory() >> 20) + " MiB)";
    }

    private static long mebibytes(long bytes) {
        return (bytes + (1 << 20) - 1) >> 20;
    }

    private static long option(long bytes) {
        return STEP * ((mebibytes(bytes + bytes / 8) + STEP - 1) / STEP);
    }
}
