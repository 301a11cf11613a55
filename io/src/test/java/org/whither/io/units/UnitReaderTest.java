package org.whither.io.units;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.junit.jupiter.params.provider.ValueSource;

/**
 * Factors are those of the SI brochure, 9th edition, tables 8 and A; those of inch, pound and degree Fahrenheit of NIST
 * Special Publication 811, appendix B.
 */
class UnitReaderTest {
    @ParameterizedTest
    @CsvSource({
        "LENGTH, m, 1, 1",
        "LENGTH, mm, 61.6, 0.0616",
        "LENGTH, um, 4, 4e-6",
        "LENGTH, µm, 4, 4e-6",
        "LENGTH, μm, 4, 4e-6",
        "LENGTH, in, 1, 0.0254",
        "PRESSURE, Pa, 101325, 101325",
        "PRESSURE, kPa, 101.325, 101325",
        "PRESSURE, MPa, 0.7, 7e5",
        "PRESSURE, bar, 1.01325, 101325",
        "PRESSURE, mbar, 1013.25, 101325",
        "PRESSURE, N/m^2, 5, 5",
        "PRESSURE, kg m-1 s-2, 5, 5",
        "PRESSURE, psi, 1, 6894.757293168361",
        "ANGLE, rad, 0.5, 0.5",
        "ANGLE, deg, 180, 3.141592653589793",
        "ANGLE, °, 90, 1.5707963267948966",
        "ANGLE, rev, 1, 6.283185307179586",
        "ROTATION_RATE, rad/s, 3, 3",
        "ROTATION_RATE, rpm, 12000, 1256.6370614359173",
        "ROTATION_RATE, rev/min, 12000, 1256.6370614359173",
        "ROTATION_RATE, deg/s, 180, 3.141592653589793",
        "VELOCITY, m/s, 2, 2",
        "VELOCITY, m s-1, 2, 2",
        "VELOCITY, m·s⁻¹, 2, 2",
        "VELOCITY, mm/s, 2, 0.002",
        "TEMPERATURE, K, 300, 300",
        "TEMPERATURE, degC, 26.85, 300",
        "TEMPERATURE, °C, -273.15, 0",
        "TEMPERATURE, ℃, 0, 273.15",
        "TEMPERATURE, degF, 32, 273.15",
        "MASS_FLOW, kg/s, 1, 1",
        "MASS_FLOW, g/s, 1, 0.001",
        "MASS_FLOW, g/h, 206.59799, 5.738833055555556e-5",
        "MASS_FLOW, kg/h, 3.6, 0.001",
        "MASS_FLOW, g/min, 60, 0.001",
        "DENSITY, kg/m^3, 1.25, 1.25",
        "DENSITY, kg/m**3, 1.25, 1.25",
        "DENSITY, kg/m3, 1.25, 1.25",
        "DENSITY, kg/m³, 1.25, 1.25",
        "DENSITY, kg.m-3, 1.25, 1.25",
        "DENSITY, kg m-3, 1.25, 1.25",
        "DENSITY, kg m^-3, 1.25, 1.25",
        "DENSITY, kg·m⁻³, 1.25, 1.25",
        "DENSITY, g/cm^3, 1.25, 1250",
        "MASS_FLUX, kg/(m^2*s), 2, 2",
        "MASS_FLUX, kg/(m2.s), 2, 2",
        "MASS_FLUX, kg/(m² s), 2, 2",
        "MASS_FLUX, kg m-2 s-1, 2, 2",
        "MASS_FLUX, kg/m^2/s, 2, 2",
        "MASS_FLUX, kg / m^2 / s, 2, 2",
        "MASS_FLUX, g/(m^2*h), 3.6e6, 1",
        "NUMBER, 1, 0.25, 0.25",
        "NUMBER, '', 0.25, 0.25",
        "NUMBER, %, 25, 0.25",
        "NUMBER, m/m, 0.25, 0.25",
    })
    void read_knownSpelling_convertsToSi(Quantity quantity, String spelling, double value, double si) throws Exception {
        double got = UnitReader.read(spelling, quantity).convert(value);
        assertEquals(si, got, 4 * Math.ulp(Math.max(Math.abs(si), quantity == Quantity.TEMPERATURE ? 273.15 : 0)));
    }

    @Test
    void read_decimalFractions_areRoundedOnce() throws Exception {
        ToSi millimetres = UnitReader.read("mm", Quantity.LENGTH);
        ToSi micrometres = UnitReader.read("um", Quantity.LENGTH);
        for (int n = 1; n < 2000; n++) {
            assertEquals(n / 1000.0, millimetres.convert(n));
            assertEquals(n / 1e6, micrometres.convert(n));
        }
    }

    @ParameterizedTest
    @CsvSource({
        "LENGTH, s",
        "LENGTH, m^2",
        "LENGTH, ''",
        "LENGTH, rad",
        "PRESSURE, kg",
        "PRESSURE, bar/m",
        "ANGLE, 1",
        "ANGLE, m/m",
        "ANGLE, ''",
        "ANGLE, rad^2",
        "ROTATION_RATE, Hz",
        "ROTATION_RATE, 1/s",
        "NUMBER, rad",
        "NUMBER, deg",
        "NUMBER, m",
        "VELOCITY, rad/s",
        "MASS_FLUX, kg/m^2 s",
        "MASS_FLOW, kg",
        "DENSITY, kg/m2",
        "TEMPERATURE, J",
    })
    void read_otherQuantity_isRefusedByName(Quantity quantity, String spelling) {
        UnitException refusal = assertThrows(UnitException.class, () -> UnitReader.read(spelling, quantity));
        assertEquals("\"" + spelling + "\" is no unit of " + quantity.words(), refusal.getMessage());
    }

    @ParameterizedTest
    @ValueSource(
            strings = {"furlongs", "m^", "m^x", "(m", "m)", "m//s", "/m", "2", "m-", "**", "kg..m", "µ", "?", "m^9999"})
    void read_nonsense_isRefused(String spelling) {
        UnitException refusal = assertThrows(UnitException.class, () -> UnitReader.read(spelling, Quantity.LENGTH));
        assertEquals("\"" + spelling + "\" is no unit that is understood", refusal.getMessage());
    }

    @ParameterizedTest
    @ValueSource(strings = {"barg", "bar(g)", "psig", "bar g"})
    void read_gaugePressure_isRefusedAsSuch(String spelling) {
        UnitException refusal = assertThrows(UnitException.class, () -> UnitReader.read(spelling, Quantity.PRESSURE));
        assertTrue(refusal.getMessage().contains("gauge pressure"), refusal.getMessage());
    }

    @ParameterizedTest
    @EnumSource(Quantity.class)
    void siSpelling_readBack_changesNothing(Quantity quantity) throws Exception {
        assertEquals(0.1234567, UnitReader.read(quantity.siSpelling(), quantity).convert(0.1234567));
    }
}
