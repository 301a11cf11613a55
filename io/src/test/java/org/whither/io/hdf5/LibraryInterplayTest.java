package org.whither.io.hdf5;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.whither.film.Film;
import org.whither.film.FullField;
import org.whither.film.LubricationField;

/**
 * Both ways between this program and the HDF5 C library: h5py (Debian's {@code python3-h5py}) and h5dump (Debian's
 * {@code hdf5-tools}). Where they are not installed these tests are skipped and say so; the fixtures of
 * {@link FieldReaderTest} are always read.
 */
class LibraryInterplayTest {
    private static final Path LAYOUT_PAGE = Path.of("LAYOUT.md");
    private static final Pattern NUMBER = Pattern.compile("-?\\d[\\d.]*(?:e[+-]?\\d+)?");

    /** Stores the fields of a file anew; their numbers are exact in 32 bits. A pressure in kPa is not in SI. */
    private static final List<String> STORE = List.of(
            "import sys, shutil, h5py",
            "ways = {'piece': {}, 'chunks': dict(chunks=(4, 2, 3)), 'deflate': dict(chunks=(3, 5, 4), compression=4),",
            "    'shuffle': dict(chunks=(2, 3, 3), compression=9, shuffle=True, fletcher32=True)}",
            "for unit in 'Pa', 'kPa':",
            "    for dtype in '<f4', '>f4', '<f8', '>f8':",
            "        for way, storage in ways.items():",
            "            name = f'{sys.argv[2]}/stored-{unit}-{dtype[1:]}-{ord(dtype[0])}-{way}.h5'",
            "            shutil.copy(sys.argv[1], name)",
            "            with h5py.File(name, 'r+') as file:",
            "                for key in list(file['field']):",
            "                    old = file['field'][key]",
            "                    values, units = old[...], old.attrs['units']",
            "                    del file['field'][key]",
            "                    if key == 'pressure' and unit == 'kPa':",
            "                        values, units = values / 1000, 'kPa'",
            "                        dtype_here = dtype[0] + 'f8'",
            "                    else:",
            "                        dtype_here = dtype",
            "                    new = file['field'].create_dataset(key, data=values.astype(dtype_here), **storage)",
            "                    new.attrs['units'] = units");

    @TempDir
    private Path folder;

    @Test
    void fieldsMadeAfresh_areReadEqualToTheirNumbers() throws Exception {
        String python = python();
        run(python, "-B", FieldFixture.FOLDER.resolve("make_fields.py").toString(), folder.toString());
        int read = 0;
        for (String name : FieldReaderTest.FIXTURES) {
            FieldFixture.assertSame(
                    FieldReaderTest.expected(name),
                    FieldReader.read(folder.resolve(name)),
                    FieldReaderTest.tolerance(name));
            read++;
        }
        assertEquals(8, read);
    }

    /** Every way of storing numbers that the layout allows, chunks with partial edges, mapped and copied. */
    @Test
    void everyStorage_isReadEqual() throws Exception {
        String python = python();
        Path script = folder.resolve("store.py");
        Files.writeString(script, String.join("\n", STORE) + "\n");
        run(
                python,
                "-B",
                script.toString(),
                FieldFixture.FOLDER.resolve("full-plain.h5").toString(),
                folder.toString());
        List<Path> files;
        try (var found = Files.list(folder)) {
            files = found.filter(file -> file.getFileName().toString().startsWith("stored-"))
                    .sorted()
                    .toList();
        }
        assertEquals(32, files.size());
        for (Path file : files) {
            for (long mappedFrom : new long[] {0, Long.MAX_VALUE}) {
                Film read = FieldReader.read(file, () -> Long.MAX_VALUE, mappedFrom);
                FieldFixture.assertSame(FieldFixture.full(), read, 0);
            }
        }
    }

    @ParameterizedTest
    @ValueSource(strings = {"full", "nodes", "cells"})
    void writtenField_isReadByTheLibrary(String kind) throws Exception {
        String python = python();
        Film film = kind.equals("full")
                ? FieldFixture.full()
                : kind.equals("nodes") ? FieldFixture.filmNodes() : FieldFixture.filmCells();
        Path written = folder.resolve("written.h5");
        FieldWriter.write(film, written);
        String said = run(
                python, "-B", FieldFixture.FOLDER.resolve("check_written.py").toString(), written.toString(), kind);
        assertTrue(said.endsWith("objects agree\n"), said);
    }

    @Test
    void writtenField_isDumpedByTheLibrary() throws Exception {
        assumeTrue(works("h5dump", "--version"), "skipped: h5dump is missing; install the package hdf5-tools");
        Path written = folder.resolve("written.h5");
        FieldWriter.write(FieldFixture.full(), written);
        String all = run("h5dump", "-A", written.toString());
        assertTrue(all.contains("\"film-field\"") && all.contains("ATTRIBUTE \"units\""), all);
        String dump = run("h5dump", "-y", "-w", "0", "-m", "%.17g", "-d", "/field/velocity_z", written.toString());
        assertTrue(dump.contains("H5T_IEEE_F64LE") || dump.contains("H5T_IEEE_F64BE"), dump);
        assertTrue(dump.contains("( 7, 5, 4 )"), dump);
        String data = dump.substring(dump.indexOf("DATA {") + 6, dump.indexOf('}', dump.indexOf("DATA {")));
        List<Double> values = new ArrayList<>();
        Matcher matcher = NUMBER.matcher(data);
        while (matcher.find()) {
            values.add(Double.valueOf(matcher.group()));
        }
        FullField field = (FullField) FieldFixture.full().field();
        assertEquals(FieldFixture.NI * FieldFixture.NJ * FieldFixture.NK, values.size());
        for (int n = 0; n < values.size(); n++) {
            assertEquals(field.velocityZ(n / FieldFixture.NK, n % FieldFixture.NK), values.get(n), 0.0);
        }
    }

    @Test
    void exampleOfTheLayoutPage_isAFieldThatIsRead() throws Exception {
        String python = python();
        Path script = folder.resolve("example.py");
        Files.writeString(script, block("python"));
        run(python, "-B", script.toString(), folder.resolve("film.h5").toString());
        Film film = FieldReader.read(folder.resolve("film.h5"));
        assertEquals(1, film.grid().sectors());
        assertTrue(film.supply().orElseThrow().annulus().isPresent());
        assertEquals("nitrogen", film.gas().name());
        // Ring 10 lies at 55 mm, halfway to the inner diameter; 726401 Pa there is the closed solution in double
        // precision, computed apart from the page.
        assertEquals(0.055, film.grid().radius(10), 1e-12);
        assertEquals(
                726401, ((LubricationField) film.field()).pressure(film.grid().node(3, 10)), 0.5);
        assertEquals(block("text"), HdfTree.of(folder.resolve("film.h5")), "the tree on the page");
    }

    /** The first fenced block of a kind on the layout page. */
    private static String block(String kind) throws IOException {
        String page = Files.readString(LAYOUT_PAGE);
        int start = page.indexOf("```" + kind + "\n");
        assertTrue(start >= 0, "no block of " + kind + " in " + LAYOUT_PAGE);
        start = page.indexOf('\n', start) + 1;
        return page.substring(start, page.indexOf("```", start));
    }

    private static String python() {
        for (String python : List.of("/usr/bin/python3", "python3")) {
            if (works(python, "-c", "import h5py")) {
                return python;
            }
        }
        assumeTrue(false, "skipped: h5py is missing; install the package python3-h5py");
        return null;
    }

    private static boolean works(String... command) {
        try {
            Process process = new ProcessBuilder(command)
                    .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                    .redirectError(ProcessBuilder.Redirect.DISCARD)
                    .start();
            return process.waitFor() == 0;
        } catch (IOException e) {
            return false;
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            return false;
        }
    }

    private static String run(String... command) throws IOException, InterruptedException {
        Process process = new ProcessBuilder(command).redirectErrorStream(true).start();
        String said = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertTrue(process.waitFor(60, TimeUnit.SECONDS), said);
        assertEquals(0, process.exitValue(), said);
        return said;
    }
}
