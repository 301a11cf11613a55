package org.whither.io.hdf5;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTimeoutPreemptively;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.Arrays;
import java.util.SplittableRandom;
import java.util.TreeSet;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.whither.io.file.RefusedInput;

/** Files that are cut short or whose bytes were changed are refused, or read where the change does no harm. */
class DamageTest {
    private static final Duration LONGEST = Duration.ofSeconds(20);
    private static final int SPOILT_FILES = 250;

    @TempDir
    private Path folder;

    @ParameterizedTest
    @ValueSource(strings = {"full-plain.h5", "full-units.h5", "full-latest.h5", "full-user-block.h5", "film-cells.h5"})
    void read_fileCutShort_isRefusedAtEveryLength(String name) throws IOException {
        byte[] whole = Files.readAllBytes(FieldFixture.FOLDER.resolve(name));
        Path cut = folder.resolve("cut.h5");
        TreeSet<Integer> lengths = new TreeSet<>();
        for (int n = 0; n < 150; n++) {
            lengths.add(n * 7);
            lengths.add(whole.length - 1 - n);
            lengths.add((int) ((long) n * whole.length / 150));
        }
        for (int length : lengths) {
            Files.write(cut, Arrays.copyOf(whole, length));
            assertTrue(refused(cut, name + " cut to " + length), name + " cut to " + length + " bytes was read");
        }
    }

    /** The layout of what this program writes has the length of the file in its header, too. */
    @ParameterizedTest
    @ValueSource(strings = {"full-plain.h5", "film-cells.h5"})
    void read_ownFileCutShort_isRefusedAtEveryLength(String name) throws IOException {
        Path own = folder.resolve("own.h5");
        FieldWriter.write(FieldReader.read(FieldFixture.FOLDER.resolve(name)), own);
        byte[] whole = Files.readAllBytes(own);
        Path cut = folder.resolve("cut.h5");
        for (int length = 0; length < whole.length; length += 41) {
            Files.write(cut, Arrays.copyOf(whole, length));
            assertTrue(refused(cut, name + " cut to " + length), name + " cut to " + length + " bytes was read");
        }
    }

    @ParameterizedTest
    @ValueSource(strings = {"full-plain.h5", "full-units.h5", "full-latest.h5", "full-user-block.h5", "film-cells.h5"})
    void read_bytesChanged_isRefusedOrRead(String name) throws IOException {
        byte[] whole = Files.readAllBytes(FieldFixture.FOLDER.resolve(name));
        Path spoilt = folder.resolve("spoilt.h5");
        int refused = 0;
        for (int seed = 0; seed < SPOILT_FILES; seed++) {
            SplittableRandom random = new SplittableRandom(seed);
            byte[] bytes = whole.clone();
            int changes = 1 + random.nextInt(seed % 2 == 0 ? 1 : 40);
            for (int n = 0; n < changes; n++) {
                int at = random.nextInt(bytes.length);
                // Single bits, and the bytes that lengths and addresses are made of.
                bytes[at] = (byte) (random.nextBoolean() ? bytes[at] ^ 1 << random.nextInt(8) : random.nextInt(-2, 2));
            }
            Files.write(spoilt, bytes);
            if (refused(spoilt, name + " seed " + seed)) {
                refused++;
            }
        }
        assertTrue(refused > SPOILT_FILES / 10, name + ": only " + refused + " refused");
        assertTrue(refused < SPOILT_FILES, name + ": none could be read");
    }

    /** Reads a file; any failure but a refusal, or taking too long, fails the test. */
    private static boolean refused(Path file, String what) {
        return assertTimeoutPreemptively(
                LONGEST,
                () -> {
                    try {
                        FieldReader.read(file);
                        return false;
                    } catch (RefusedInput e) {
                        assertTrue(e.getMessage().startsWith(file + ": "), what + ": " + e.getMessage());
                        assertFalse(e.getMessage().contains("\n"), what + ": " + e.getMessage());
                        assertEquals(3, e.getMessage().split("; ", 3).length, what + ": " + e.getMessage());
                        return true;
                    }
                },
                what);
    }
}
