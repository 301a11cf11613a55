package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class SealReaderTest {
    private static String text(String name) throws IOException {
        try (var in = SealReaderTest.class.getResourceAsStream("seals/" + name + ".json")) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        }
    }

    @Test
    void spiral_isReadInSi() throws IOException {
        SealDescription seal = SealReader.read(text("spiral"), "spiral.json");
        assertEquals(0.050, seal.innerRadius(), 1e-15);
        assertEquals(0.068, seal.outerRadius(), 1e-15);
        assertEquals(12, seal.sectors());
        var grooves = (SealDescription.SpiralGrooves) seal.recesses().orElseThrow();
        assertEquals(Math.toRadians(15), grooves.angle(), 1e-15);
        assertEquals(0.5, grooves.grooveShare(), 1e-15);
        assertEquals(SealDescription.Pumping.INWARD, grooves.pumping());
        assertEquals("design", seal.points().get(0).name());
    }

    @Test
    void everySample_saysThatItIsInvented() {
        for (String name : SampleSeals.names()) {
            SealDescription seal = SampleSeals.describe(name);
            assertEquals(name, seal.name());
            assertTrue(seal.description().contains("invented"), name);
            assertTrue(seal.plant().contains("does not exist"), name);
        }
    }

    /** Each slip is refused in one sentence that names the place. */
    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "\"sectors\": 12 | \"sectors\": 0 | /sectors is 0; expected a whole number from 1 to 1000",
                "\"sectors\": 12 | \"sectors\": 12.5 | /sectors is 12.5; expected a whole number from 1 to 1000",
                "\"sectors\": 12, | '' | /sectors is missing; expected a whole number from 1 to 1000",
                "\"clearance_um\": 3.5 | \"clearance_um\": -1 "
                        + "| /film/clearance_um is -1; expected a number from 0.1 to 100.0",
                "\"clearance_um\": 3.5 | \"clearance_um\": \"3.5\" "
                        + "| /film/clearance_um is \"3.5\"; expected a number from 0.1 to 100.0",
                "\"clearance_um\" | \"clearance_mm\" "
                        + "| /film/clearance_um is missing; expected a number from 0.1 to 100.0",
                "\"coning_um\": 0 | \"coning_um\": -3.45 | /film/coning_um closes the film at the outer diameter",
                "\"outer_radius_mm\": 68 | \"outer_radius_mm\": 49 "
                        + "| /rings/outer_radius_mm is not above inner_radius_mm",
                "\"kind\": \"spiral\" | \"kind\": \"waves\" "
                        + "| /recesses/kind is \"waves\"; expected \"spiral\" or \"pockets\"",
                "\"inward\" | \"inwards\" | /recesses/pumps_when_turning_towards_plus_theta is \"inwards\"; "
                        + "expected \"inward\" or \"outward\"",
                "\"kind\": \"porous\" | \"kind\": \"holes\" | /feed/restriction/kind is \"holes\"; "
                        + "expected \"porous\", \"orifices\" or \"given_flow\"",
                "\"low-supply\" | \"design\" | /operating_points/1/name is \"design\", "
                        + "which another operating point has too",
                "\"pressure_supply_pa\": 1000000 | \"pressure_supply_bar\": 10 "
                        + "| /operating_points/0/pressure_supply_pa is missing; expected a number from 1.0 to 1.0E9",
                "\"coning_um\": 0 | \"coning_um\": 0, \"waviness_um\": 1 "
                        + "| /film/waviness_um is not known here; remove it or mend its spelling",
                "\"name\": \"nitrogen\" | \"name\": \" \" | /gas/name must be a text that is not blank"
            })
    void slip_isRefusedWhereItIs(String right, String wrong, String sentence) throws IOException {
        String text = text("spiral");
        assertTrue(text.contains(right), right);
        String changed =
                text.substring(0, text.indexOf(right)) + wrong + text.substring(text.indexOf(right) + right.length());
        IllegalArgumentException refusal =
                assertThrows(IllegalArgumentException.class, () -> SealReader.read(changed, "seal.json"));
        assertEquals("seal.json: " + sentence, refusal.getMessage());
    }

    @Test
    void brokenJson_isRefusedWithItsLine() {
        IllegalArgumentException refusal = assertThrows(
                IllegalArgumentException.class, () -> SealReader.read("{\n\"name\": \"x\",\n oops }", "seal.json"));
        assertTrue(
                refusal.getMessage().startsWith("seal.json is not readable as JSON at line 3"), refusal.getMessage());
        assertThrows(IllegalArgumentException.class, () -> SealReader.read("", "seal.json"));
        assertThrows(IllegalArgumentException.class, () -> SealReader.read("[1]", "seal.json"));
        assertThrows(IllegalArgumentException.class, () -> SealReader.read("{\"a\":1,\"a\":2}", "seal.json"));
    }

    /** A pocket must end before its sector does. */
    @Test
    void pocketBeyondItsSector_isRefused() throws IOException {
        String text = text("pockets").replace("\"angle_to_deg\": 14", "\"angle_to_deg\": 18");
        IllegalArgumentException refusal =
                assertThrows(IllegalArgumentException.class, () -> SealReader.read(text, "seal.json"));
        assertTrue(refusal.getMessage().contains("/recesses/pockets/1/angle_to_deg"), refusal.getMessage());
    }
}
