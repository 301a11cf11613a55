package org.whither.io.file;

import java.io.IOException;

/**
 * Takes a value and may fail on the way to the disk.
 *
 * @param <T> what it takes
 */
@FunctionalInterface
public interface ThrowingConsumer<T> {
    /**
     * Takes a value.
     *
     * @param value the value
     * @throws IOException where reading or writing fails
     */
    void accept(T value) throws IOException;
}
