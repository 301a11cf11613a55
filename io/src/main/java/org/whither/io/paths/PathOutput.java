package org.whither.io.paths;

import java.io.Closeable;
import java.io.IOException;
import java.util.List;

/**
 * Somewhere paths are written to.
 *
 * @param <T> paths made ready for writing
 */
interface PathOutput<T> extends Closeable {
    /**
     * Makes paths ready, from any thread.
     *
     * @param paths some paths that follow one another
     * @return what {@link #write} is to write
     */
    T prepare(List<EndedPath> paths);

    /** Writes what was made ready, in the order of the paths, from one thread. */
    void write(T prepared) throws IOException;

    /** Completes the output after the last path. */
    void finish(PathTotals totals) throws IOException;
}
