package org.whither.io.command;

import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.io.file.RefusedInput;
import org.whither.io.hdf5.FieldReader;

/** A field that the heap cannot take is refused before it is tried. */
class MemoryTest {
    private static final Path FILE = Path.of("src", "test", "resources", "fields", "full-plain.h5");

    @Test
    void require_lessThanNeeded_isRefusedWithTheOptionThatRaisesIt() {
        Film film = FieldReader.read(FILE);
        long needed = ConservingFlow.heap(film);
        assertTrue(needed > 0);
        Memory.require(film, FILE, () -> needed);
        String said = assertThrows(RefusedInput.class, () -> Memory.require(film, FILE, () -> needed - 1))
                .getMessage();
        assertTrue(said.contains("tracing this field takes 1 MiB of memory"), said);
        assertTrue(said.contains("set WHITHER_JAVA_OPTS=-Xmx"), said);
    }
}
