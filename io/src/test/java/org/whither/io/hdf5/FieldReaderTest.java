package org.whither.io.hdf5;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.whither.film.Film;
import org.whither.film.FullField;

/** Files made by the HDF5 C library (through h5py, see {@code fields/make_fields.py}) are read equal to their numbers. */
class FieldReaderTest {
    /** Sums in the formulas round differently in the two languages. */
    private static final double DOUBLE = 4e-16;
    /** Half a unit in the last place of a 32-bit number, 2⁻²⁴, and the shift of 273.15 K in one. */
    private static final double SINGLE = 0x1p-23;

    static final List<String> FIXTURES = List.of(
            "full-plain.h5",
            "full-units.h5",
            "full-big-endian.h5",
            "full-latest.h5",
            "full-user-block.h5",
            "film-nodes.h5",
            "film-cells.h5",
            "film-mixed.h5");

    @TempDir
    private Path folder;

    static List<String> fixtures() {
        return FIXTURES;
    }

    static Film expected(String name) {
        if (name.startsWith("full")) {
            return FieldFixture.full();
        }
        return switch (name) {
            case "film-nodes.h5" -> FieldFixture.filmNodes();
            case "film-cells.h5" -> FieldFixture.filmCells();
            default -> FieldFixture.filmMixed();
        };
    }

    static double tolerance(String name) {
        return name.equals("full-units.h5") ? SINGLE : DOUBLE;
    }

    @ParameterizedTest
    @MethodSource("fixtures")
    void read_fileOfTheLibrary_equalsItsNumbers(String name) {
        FieldFixture.assertSame(expected(name), FieldReader.read(FieldFixture.FOLDER.resolve(name)), tolerance(name));
    }

    @ParameterizedTest
    @MethodSource("fixtures")
    void write_readBack_changesNothing(String name) throws IOException {
        Film film = FieldReader.read(FieldFixture.FOLDER.resolve(name));
        Path written = folder.resolve("written.h5");
        FieldWriter.write(film, written);
        FieldFixture.assertSame(film, FieldReader.read(written), 0);
    }

    @ParameterizedTest
    @CsvSource({"full-plain.h5", "film-cells.h5"})
    void write_twice_givesTheSameBytes(String name) throws IOException {
        Film film = FieldReader.read(FieldFixture.FOLDER.resolve(name));
        FieldWriter.write(film, folder.resolve("one.h5"));
        FieldWriter.write(film, folder.resolve("two.h5"));
        assertEquals(-1, Files.mismatch(folder.resolve("one.h5"), folder.resolve("two.h5")));
    }

    @Test
    void read_fullFieldWithoutWhatMayBeLeftOut_takesTheDefaults() throws IOException {
        Path file = RawField.of("full-plain.h5")
                .attribute("conditions", "rotation_rate", 0)
                .shape("field/pressure", 250000, FieldFixture.NI, FieldFixture.NJ)
                .remove("field/density")
                .remove("field/temperature")
                .remove("supply")
                .write(folder.resolve("least.h5"));
        Film film = FieldReader.read(file);
        FullField field = (FullField) film.field();
        assertEquals(0, film.conditions().rotationRate());
        assertTrue(field.pressureConstantAcrossFilm());
        assertFalse(
                field.hasDensity() || field.hasTemperature() || film.supply().isPresent());
        assertEquals(250000, field.pressure(film.grid().node(6, 4), 3));
        FieldWriter.write(film, folder.resolve("again.h5"));
        FieldFixture.assertSame(film, FieldReader.read(folder.resolve("again.h5")), 0);
    }

    /** The unrounded end of a sector, and a seam off by less than the tolerances, are taken as they are. */
    @Test
    void read_seamWithinTheTolerance_isTaken() throws IOException {
        double end = 2 * Math.PI / FieldFixture.SECTORS;
        Path file = RawField.of("film-nodes.h5")
                .set("grid/theta", end * (1 + 0.9e-6), FieldFixture.NI - 1)
                .set("grid/stator_z", 4e-6 * 1.009, FieldFixture.NI - 1, 0)
                .set("field/pressure", 100900, FieldFixture.NI - 1, 0)
                .write(folder.resolve("seam.h5"));
        assertEquals(end * (1 + 0.9e-6), FieldReader.read(file).grid().theta(FieldFixture.NI - 1, 0));
    }
}
