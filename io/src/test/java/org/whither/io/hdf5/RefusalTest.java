package org.whither.io.hdf5;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.function.UnaryOperator;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.whither.io.file.RefusedInput;

/** Every refusal of {@code io/LAYOUT.md} is one sentence: the file, the place, the value, what was expected, the mend. */
class RefusalTest {
    private static final double NAN = Double.NaN;
    private static final double INF = Double.POSITIVE_INFINITY;

    @TempDir
    private Path folder;

    /** A fixture, what is done to it, and what the refusal must then say: place and value; expectation; mend. */
    record Case(String fixture, UnaryOperator<RawField> spoil, String found, String expected, String mend) {
        @Override
        public String toString() {
            return found;
        }
    }

    private static Case full(UnaryOperator<RawField> spoil, String found, String expected, String mend) {
        return new Case("full-plain.h5", spoil, found, expected, mend);
    }

    private static Case cells(UnaryOperator<RawField> spoil, String found, String expected, String mend) {
        return new Case("film-cells.h5", spoil, found, expected, mend);
    }

    private static Case nodes(UnaryOperator<RawField> spoil, String found, String expected, String mend) {
        return new Case("film-nodes.h5", spoil, found, expected, mend);
    }

    static Stream<Case> layoutAndVersion() {
        return Stream.of(
                full(f -> f.attribute("", "layout", null), "no root attribute layout", "film-field", "bring this one"),
                full(f -> f.attribute("", "layout", "other"), "/@layout is \"other\"", "\"film-field\"", "bring this"),
                full(f -> f.attribute("", "layout", 3), "/@layout is the number 3", "one text", "scalar string"),
                full(f -> f.attribute("", "layout_version", null), "/@layout_version is missing", "number", "add it"),
                full(f -> f.attribute("", "layout_version", 2), "/@layout_version is 2", "version 1", "later release"),
                full(f -> f.attribute("", "layout_version", 1.5), "/@layout_version is 1.5", "whole", "an integer"),
                full(f -> f.attribute("", "title", 7), "/@title is the number 7", "one text", "scalar string"));
    }

    static Stream<Case> missingParts() {
        return Stream.of(
                full(f -> f.remove("conditions"), "group /conditions is missing", "a group", "add it"),
                full(f -> f.remove("gas"), "group /gas is missing", "a group", "add it"),
                full(f -> f.remove("grid"), "group /grid is missing", "a group", "add it"),
                full(f -> f.remove("field"), "group /field is missing", "a group", "add it"),
                full(f -> f.remove("grid/radius"), "/grid/radius is missing", "in m", "write it as the layout"),
                full(f -> f.remove("grid/theta"), "/grid/theta is missing", "in rad", "write it as the layout"),
                full(f -> f.remove("grid/rotor_z"), "/grid/rotor_z is missing", "in m", "write it as the layout"),
                full(f -> f.remove("grid/stator_z"), "/grid/stator_z is missing", "in m", "write it as the layout"),
                full(f -> f.remove("grid/sigma"), "/grid/sigma is missing", "in 1", "write it as the layout"),
                full(f -> f.remove("field/pressure"), "/field/pressure is missing", "in Pa", "write it as the layout"),
                full(f -> f.remove("field/velocity_r"), "/field/velocity_r is missing", "in m/s", "write it"),
                full(f -> f.remove("field/velocity_theta"), "/field/velocity_theta is missing", "in m/s", "write it"),
                full(f -> f.remove("field/velocity_z"), "/field/velocity_z is missing", "in m/s", "write it"),
                cells(f -> f.remove("field/mass_flow_r"), "/field/mass_flow_r is missing", "in kg/s", "write it"),
                cells(f -> f.remove("field/mass_flow_theta"), "/field/mass_flow_theta is missing", "in kg", "write"),
                full(f -> f.remove("supply/mask"), "/supply/mask is missing", "a dataset", "write it"),
                nodes(f -> f.attribute("supply", "radius_to", null), "/supply@radius_to is missing", "in m", "add it"),
                nodes(f -> f.attribute("supply", "radius_from", null), "/supply@radius_from is missing", "m", "add"),
                full(f -> f.attribute("grid", "sectors", null), "/grid@sectors is missing", "number", "add it"),
                full(f -> f.attribute("field", "velocity_frame", null), "@velocity_frame is missing", "text", "add"),
                full(f -> f.attribute("gas", "name", null), "/gas@name is missing", "a text", "add it"),
                full(f -> f.attribute("conditions", "temperature", null), "@temperature is missing", "K", "add it"),
                full(f -> f.attribute("conditions", "rotation_rate", null), "@rotation_rate is", "rad/s", "add it"));
    }

    static Stream<Case> shapes() {
        return Stream.of(
                full(f -> f.shape("grid/radius", 1, 5, 2), "/grid/radius is 5 × 2", "a list", "one radius for each"),
                full(f -> f.shape("grid/radius", 1, 1), "/grid/radius is 1", "at least 2", "one radius for each"),
                full(f -> f.shape("grid/theta", 1, 7, 4), "/grid/theta is 7 × 4", "ni × 5", "for each node"),
                full(f -> f.shape("grid/theta", 1, 1), "/grid/theta is 1", "at least 2", "for each node"),
                full(f -> f.shape("grid/rotor_z", 0, 5, 7), "/grid/rotor_z is 5 × 7", "7 × 5 at the nodes", "order"),
                full(f -> f.shape("grid/stator_z", 1, 35), "/grid/stator_z is 35", "6 × 4 at the cell", "order"),
                full(
                        f -> f.shape("grid/stator_z", 1, 6, 4),
                        "stator_z is 6 × 4",
                        "7 × 5, at the nodes",
                        "at its nodes"),
                cells(f -> f.shape("grid/stator_z", 1, 7, 5), "stator_z is 7 × 5 and", "same shape", "both faces at"),
                nodes(f -> f.shape("grid/rotor_z", 0, 6, 4), "rotor_z is 6 × 4", "as the pressure is", "both at the"),
                full(f -> f.shape("grid/sigma", 1, 2, 2), "/grid/sigma is 2 × 2", "a list of at least 2", "one level"),
                full(f -> f.shape("grid/sigma", 0, 1), "/grid/sigma is 1", "a list of at least 2", "one level"),
                full(f -> f.shape("field/pressure", 1, 4, 5, 7), "pressure is 4 × 5 × 7", "7 × 5 × 4", "index order"),
                full(f -> f.shape("field/pressure", 1, 6, 4), "pressure is 6 × 4", "7 × 5 × 4", "index order"),
                full(f -> f.shape("field/velocity_r", 1, 7, 5), "velocity_r is 7 × 5", "7 × 5 × 4", "index order"),
                full(f -> f.shape("field/velocity_z", 1, 6, 4, 3), "velocity_z is 6 × 4 × 3", "7 × 5 × 4", "order"),
                full(f -> f.shape("field/density", 1, 7, 5, 3), "density is 7 × 5 × 3", "7 × 5 × 4", "index order"),
                full(f -> f.shape("field/temperature", 1, 140), "temperature is 140", "7 × 5 × 4", "index order"),
                cells(f -> f.shape("field/pressure", 1, 7, 4), "/field/pressure is 7 × 4", "7 × 5 at", "index order"),
                cells(f -> f.shape("field/pressure", 1, 7, 5, 4), "pressure is 7 × 5 × 4", "7 × 5 at", "velocities"),
                cells(f -> f.shape("field/mass_flow_theta", 1, 6, 5), "mass_flow_theta is 6 × 5", "7 × 4", "order"),
                cells(f -> f.shape("field/mass_flow_r", 1, 7, 4), "mass_flow_r is 7 × 4", "6 × 5", "index order"),
                full(f -> f.shape("supply/mask", 1, 7, 5), "/supply/mask is 7 × 5", "6 × 4", "index order"),
                full(f -> f.shape("supply/mass_flux", 1, 4, 6), "/supply/mass_flux is 4 × 6", "6 × 4", "order"));
    }

    static Stream<Case> units() {
        return Stream.of(
                full(f -> f.attribute("grid/radius", "units", null), "/grid/radius has no attribute units", "m", "add"),
                full(f -> f.attribute("field/pressure", "units", null), "/field/pressure has no", "Pa", "add the"),
                full(f -> f.attribute("grid/radius", "units", "s"), "radius: \"s\" is no unit of length", "m", "write"),
                full(f -> f.attribute("grid/theta", "units", "1"), "theta: \"1\" is no unit of angle", "rad", "write"),
                full(f -> f.attribute("grid/sigma", "units", "m"), "sigma: \"m\" is no unit of pure", "1", "write"),
                full(
                        f -> f.attribute("field/pressure", "units", "N"),
                        "\"N\" is no unit of pressure",
                        "Pa",
                        "absolute"),
                full(f -> f.attribute("field/pressure", "units", "barg"), "gauge pressure", "Pa", "absolute"),
                full(f -> f.attribute("field/velocity_r", "units", "rpm"), "\"rpm\" is no unit of vel", "m/s", "write"),
                full(f -> f.attribute("field/density", "units", "kg"), "\"kg\" is no unit of density", "kg/m^3", "wr"),
                full(f -> f.attribute("field/temperature", "units", "hot"), "\"hot\" is no unit that", "K", "write"),
                cells(f -> f.attribute("field/mass_flow_r", "units", "kg"), "no unit of mass flow", "kg/s", "write"),
                full(f -> f.attribute("supply/mass_flux", "units", "kg/s"), "no unit of mass flux", "kg/(m", "write"),
                full(f -> f.attribute("supply/mask", "units", "K"), "mask: \"K\" is no unit of pure", "1", "write"),
                full(
                        f -> f.attribute("grid/radius", "units", 1),
                        "radius@units is the number 1",
                        "one text",
                        "scalar"));
    }

    static Stream<Case> notFinite() {
        return Stream.of(
                full(f -> f.set("grid/radius", NAN, 2), "/grid/radius[2] is NaN", "a finite length", "find out"),
                full(
                        f -> f.set("grid/theta", INF, 6, 4),
                        "/grid/theta[6, 4] is Infinity",
                        "a finite angle",
                        "find out"),
                full(f -> f.set("grid/rotor_z", NAN, 3, 0), "/grid/rotor_z[3, 0] is NaN", "a finite", "find out"),
                full(f -> f.set("grid/stator_z", -INF, 0, 1), "/grid/stator_z[0, 1] is -Inf", "a finite", "find out"),
                full(f -> f.set("grid/sigma", NAN, 1), "/grid/sigma[1] is NaN", "a finite pure number", "find out"),
                full(f -> f.set("field/pressure", NAN, 1, 2, 3), "pressure[1, 2, 3] is NaN", "finite", "find out"),
                full(f -> f.set("field/velocity_r", INF, 6, 0, 1), "velocity_r[6, 0, 1] is Inf", "finite", "find out"),
                full(f -> f.set("field/velocity_theta", NAN, 0, 4, 0), "theta[0, 4, 0] is NaN", "finite", "find out"),
                full(f -> f.set("field/velocity_z", NAN, 5, 3, 2), "velocity_z[5, 3, 2] is NaN", "finite", "find out"),
                full(f -> f.set("field/density", NAN, 5, 3, 2), "density[5, 3, 2] is NaN", "finite", "find out"),
                full(f -> f.set("field/temperature", NAN, 0, 0, 0), "temperature[0, 0, 0] is NaN", "finite", "find"),
                cells(f -> f.set("field/mass_flow_theta", NAN, 6, 3), "flow_theta[6, 3] is NaN", "finite", "find out"),
                cells(f -> f.set("field/mass_flow_r", NAN, 5, 4), "mass_flow_r[5, 4] is NaN", "finite", "find out"),
                full(f -> f.set("supply/mass_flux", NAN, 1, 1), "mass_flux[1, 1] is NaN", "finite", "find out"),
                full(f -> f.attribute("conditions", "rotation_rate", NAN), "rotation_rate is NaN", "finite", "write"),
                nodes(f -> f.attribute("supply", "radius_to", NAN), "radius_to is NaN", "finite", "write the value"),
                full(f -> f.attribute("gas", "viscosity", INF), "/gas@viscosity is Infinity", "finite", "write the"));
    }

    static Stream<Case> impossibleValues() {
        return Stream.of(
                full(f -> f.set("grid/radius", 0, 0), "/grid/radius[0] is 0.0 m", "above 0 m", "from the shaft axis"),
                full(f -> f.set("grid/radius", -0.01, 0), "/grid/radius[0] is -0.01 m", "above 0 m", "from the shaft"),
                full(f -> f.set("grid/radius", 0.05, 1), "/grid/radius[1] is 0.05 m", "more than the 0.05 m", "inner"),
                full(f -> f.set("grid/theta", -1, 2, 3), "/grid/theta[2, 3] is -1.0 rad", "more than the", "rising"),
                nodes(f -> f.set("grid/theta", 0, 1), "/grid/theta[1] is 0.0 rad", "more than the 0.0", "rising angle"),
                full(f -> f.set("grid/stator_z", -6e-6, 2, 3), "stator_z[2, 3] is -6.0E-6 m", "above 0", "let z run"),
                full(f -> f.set("grid/stator_z", 0, 1, 1), "stator_z[1, 1] is 0.0 m", "film thickness is", "let z run"),
                full(f -> f.set("grid/sigma", 0.1, 0), "/grid/sigma[0] is 0.1", "exactly 0 at the rotor", "fractions"),
                full(f -> f.set("grid/sigma", 0.9, 3), "/grid/sigma[3] is 0.9", "exactly 1 at the stator", "fractions"),
                full(f -> f.set("grid/sigma", 0.2, 2), "/grid/sigma[2] is 0.2", "more than the 0.25", "to the stator"),
                full(f -> f.set("field/pressure", -5, 1, 2, 3), "[1, 2, 3] is -5.0 Pa", "above 0 Pa", "gauge values"),
                cells(f -> f.set("field/pressure", 0, 5, 3), "/field/pressure[5, 3] is 0.0 Pa", "above 0 Pa", "gauge"),
                full(f -> f.set("field/density", 0, 1, 2, 3), "density[1, 2, 3] is 0.0 kg/m^3", "above 0", "absolute"),
                full(f -> f.set("field/temperature", -1, 1, 2, 3), "[1, 2, 3] is -1.0 K", "above 0 K", "absolute"),
                full(f -> f.attribute("conditions", "temperature", -20.0), "temperature is -20.0 K", "above 0", "in K"),
                full(f -> f.attribute("conditions", "pressure_inner", 0.0), "pressure_inner is 0.0", "above 0", "Pa"),
                full(f -> f.attribute("conditions", "pressure_outer", -1.0), "pressure_outer is -1", "above 0", "Pa"),
                full(f -> f.attribute("conditions", "pressure_supply", 0.0), "pressure_supply is 0.", "above 0", "Pa"),
                full(f -> f.attribute("gas", "viscosity", 0.0), "/gas@viscosity is 0.0 Pa·s", "above 0", "in Pa·s"),
                full(f -> f.attribute("gas", "molar_mass", -28.0), "molar_mass is -28.0 kg/mol", "above 0", "kg/mol"),
                full(f -> f.attribute("gas", "compressibility_factor", 0.0), "factor is 0.0", "above 0", "write"),
                full(f -> f.attribute("grid", "sectors", 0), "/grid@sectors is 0", "at least 1", "as an integer"),
                full(f -> f.attribute("grid", "sectors", -3), "/grid@sectors is -3", "at least 1", "as an integer"),
                full(f -> f.attribute("grid", "sectors", 2.5), "/grid@sectors is 2.5", "whole number", "as an integer"),
                full(f -> f.attribute("grid", "sectors", "12"), "sectors is the text \"12\"", "one number", "scalar"),
                full(f -> f.attribute("field", "velocity_frame", "rotor"), "frame is \"rotor\"", "rotating", "frame"),
                full(f -> f.attribute("field", "steady_in", "ROTATING"), "steady_in is \"ROT", "stationary", "frame"),
                full(f -> f.attribute("supply", "face", "housing"), "/supply@face is \"housing\"", "stator", "face"));
    }

    static Stream<Case> sectorsAndFeed() {
        double end = 2 * Math.PI / 12;
        return Stream.of(
                full(f -> f.attribute("grid", "sectors", 11), "/grid/theta[6, 0] is", "one of 11 sectors", "sectors"),
                nodes(f -> f.attribute("grid", "sectors", 13), "/grid/theta[6] is", "one of 13 sectors", "sectors"),
                nodes(f -> f.set("grid/theta", end + 6e-7, 6), "/grid/theta[6] is", "within 5.2359", "both the first"),
                full(f -> f.set("grid/theta", end + 0.1 - 6e-7, 6, 2), "/grid/theta[6, 2] is", "within", "both the"),
                full(
                        f -> f.set("grid/rotor_z", 1e-6, 6, 0),
                        "rotor_z[6, 0] is 1.0E-6 m",
                        "first node line",
                        "both ends"),
                full(
                        f -> f.set("grid/stator_z", 9e-6, 6, 4),
                        "stator_z[6, 4] is 9.0E-6",
                        "first node line",
                        "both ends"),
                full(f -> f.set("field/pressure", 102000, 6, 0, 0), "[6, 0, 0] is 102000.0 Pa", "1.0 %", "both ends"),
                nodes(f -> f.set("field/pressure", 102000, 6, 0), "pressure[6, 0] is 102000", "1.0 %", "both ends"),
                nodes(f -> f.attribute("supply", "radius_to", 0.07), "radius_to is 0.07 m", "0.05 m and 0.06 m", "met"),
                nodes(f -> f.attribute("supply", "radius_from", 0.04), "radius_from is 0.04", "between 0.05", "met"),
                nodes(f -> f.attribute("supply", "radius_to", 0.051), "radius_to is 0.051", "more than", "outer one"),
                nodes(f -> f.shape("supply/mask", 1, 6, 4), "both radius_from", "one of the two", "remove the one"),
                full(
                        f -> f.set("supply/mask", 2, 3, 1),
                        "/supply/mask[3, 1] is 2.0",
                        "1 for a feed",
                        "only these two"));
    }

    @ParameterizedTest
    @MethodSource({
        "layoutAndVersion",
        "missingParts",
        "shapes",
        "units",
        "notFinite",
        "impossibleValues",
        "sectorsAndFeed"
    })
    void read_spoiltField_isRefusedInOneSentence(Case spoilt) throws IOException {
        RawField raw = RawField.of(spoilt.fixture);
        FieldReader.read(raw.write(folder.resolve("sound.h5")));
        Path file = spoilt.spoil.apply(raw).write(folder.resolve("spoilt.h5"));
        assertSentence(refusal(file), file, spoilt.found, spoilt.expected, spoilt.mend);
    }

    static Stream<Case> madeByTheLibrary() {
        return Stream.of(
                bad(
                        "external-raw",
                        "/field/pressure is kept outside the file (external raw",
                        "inside the file",
                        "write"),
                bad(
                        "virtual",
                        "/grid/stator_z is kept outside the file (virtual",
                        "inside the file",
                        "write the numbers"),
                bad(
                        "external-link",
                        "/grid/radius is an external link that leaves",
                        "inside the file",
                        "copy that data"),
                bad("link-through", "/other is an external link that leaves", "inside the file", "copy that data"),
                bad("link-round", "/grid/radius is a soft link that leads back", "of this file", "instead of the link"),
                bad("link-lost", "/grid/radius is a soft link to /grid/rings", "of this file", "instead of the link"),
                bad("never-filled", "/field/pressure was made but never filled", "6 × 4", "write them all"),
                bad(
                        "half-filled",
                        "/field/pressure was made but never filled from index [4, 0]",
                        "6 × 4",
                        "write them"),
                bad(
                        "other-filter",
                        "/field/pressure cannot be read",
                        "no filters but deflate",
                        "with those filters only"),
                bad("compound", "/field/pressure holds 64-bit data", "IEEE 754", "64-bit floating"),
                bad("long-double", "/field/pressure holds 128-bit data", "IEEE 754", "64-bit floating"),
                bad("infinite", "/grid/stator_z[3, 2] is Infinity", "a finite length", "find out"));
    }

    private static Case bad(String name, String found, String expected, String mend) {
        return new Case("bad-" + name + ".h5", UnaryOperator.identity(), found, expected, mend);
    }

    @ParameterizedTest
    @MethodSource("madeByTheLibrary")
    void read_badFileOfTheLibrary_isRefusedInOneSentence(Case spoilt) {
        Path file = FieldFixture.FOLDER.resolve(spoilt.fixture);
        assertSentence(refusal(file), file, spoilt.found, spoilt.expected, spoilt.mend);
    }

    @Test
    void read_noHdf5File_isRefused() throws IOException {
        Path text = folder.resolve("film.h5");
        Files.write(text, "radius,theta\n".repeat(200).getBytes(StandardCharsets.UTF_8));
        assertSentence(refusal(text), text, "this is not an HDF5 file", "the layout film-field", "name another file");
        Path empty = folder.resolve("empty.h5");
        Files.write(empty, new byte[0]);
        assertSentence(refusal(empty), empty, "0 bytes", "the layout film-field", "name another file");
        Path missing = folder.resolve("missing.h5");
        assertSentence(refusal(missing), missing, "there is no such file", "an HDF5 file", "check the name");
        assertSentence(refusal(folder), folder, "this is a folder", "an HDF5 file", "name a file in it");
    }

    @Test
    void read_moreThanTheHeap_isRefusedWithTheOptionThatRaisesIt() {
        Path file = FieldFixture.FOLDER.resolve("full-plain.h5");
        int arrays = 6 * FieldFixture.NI * FieldFixture.NJ * FieldFixture.NK * Double.BYTES;
        FieldReader.read(file, () -> arrays);
        RefusedInput refused = assertThrows(RefusedInput.class, () -> FieldReader.read(file, () -> arrays - 1));
        assertSentence(
                refused.getMessage(),
                file,
                "/field/pressure and its companions take 1 MiB",
                "heap",
                "set WHITHER_JAVA_OPTS=-Xmx");
    }

    private static String refusal(Path file) {
        return assertThrows(RefusedInput.class, () -> FieldReader.read(file)).getMessage();
    }

    private static void assertSentence(String sentence, Path file, String found, String expected, String mend) {
        assertTrue(sentence.startsWith(file + ": "), sentence);
        assertTrue(sentence.endsWith("."), sentence);
        assertFalse(sentence.contains("\n") || sentence.contains("Exception"), sentence);
        String[] parts = sentence.substring(file.toString().length() + 2).split("; ", 3);
        assertEquals(3, parts.length, sentence);
        assertTrue(parts[0].contains(found), sentence + "\nlacks: " + found);
        assertTrue(parts[1].startsWith("expected ") && parts[1].contains(expected), sentence + "\nlacks: " + expected);
        assertTrue(parts[2].contains(mend), sentence + "\nlacks: " + mend);
    }
}
