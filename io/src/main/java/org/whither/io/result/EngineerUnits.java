package org.whither.io.result;

import java.util.Locale;
import org.whither.film.Gas;

/** Values in the units that engineers of the trade use, as text. */
public final class EngineerUnits {
    private static final double NORMAL_PRESSURE = 101_325;
    private static final double NORMAL_TEMPERATURE = 273.15;
    /** 14.696 psia as the trade writes it; a pound-force is 4.4482216152605 N, an inch 0.0254 m (exact). */
    private static final double STANDARD_PRESSURE = 14.696 * 4.4482216152605 / (0.0254 * 0.0254);
    /** 60 °F. */
    private static final double STANDARD_TEMPERATURE = (60 + 459.67) / 1.8;

    private static final double CUBIC_FOOT = 0.3048 * 0.3048 * 0.3048;

    private EngineerUnits() {}

    /** Pressure (Pa) as bar absolute. */
    public static String pressure(double pascal) {
        return text("%.3f bar(a)", pascal / 1e5);
    }

    /** Length (m) as mm. */
    public static String millimetres(double metres) {
        return text("%.3f mm", 1e3 * metres);
    }

    /** Length (m) as µm. */
    public static String micrometres(double metres) {
        return text("%.3f µm", 1e6 * metres);
    }

    /** Rotation rate (rad/s) as rpm. */
    public static String speed(double radiansPerSecond) {
        return text("%.1f rpm", radiansPerSecond * 30 / Math.PI);
    }

    /** Mass flow (kg/s) in g/h. */
    public static double gramsPerHour(double massFlow) {
        return massFlow * 3.6e6;
    }

    /**
     * Mass flow (kg/s) in normal litres a minute, at 0 °C and 101.325 kPa as an ideal gas.
     *
     * @param massFlow mass flow (kg/s)
     * @param gas the gas
     */
    public static double normalLitresPerMinute(double massFlow, Gas gas) {
        return massFlow / density(NORMAL_PRESSURE, NORMAL_TEMPERATURE, gas) * 60_000;
    }

    /**
     * Mass flow (kg/s) in standard cubic feet a minute, at 60 °F and 14.696 psia as an ideal gas.
     *
     * @param massFlow mass flow (kg/s)
     * @param gas the gas
     */
    public static double standardCubicFeetPerMinute(double massFlow, Gas gas) {
        return massFlow / density(STANDARD_PRESSURE, STANDARD_TEMPERATURE, gas) * 60 / CUBIC_FOOT;
    }

    private static double density(double pressure, double temperature, Gas gas) {
        return pressure * gas.molarMass() / (Gas.MOLAR_GAS_CONSTANT * temperature);
    }

    /** Pressure (Pa) in bar. */
    public static double bar(double pascal) {
        return pascal / 1e5;
    }

    /** Rotation rate (rad/s) in revolutions a minute. */
    public static double revolutionsPerMinute(double radiansPerSecond) {
        return radiansPerSecond * 30 / Math.PI;
    }

    /** Mass flow (kg/s) in g/h and in Nl/min. */
    public static String massFlow(double massFlow, Gas gas) {
        return text("%s g/h (%s Nl/min)", digits(gramsPerHour(massFlow)), digits(normalLitresPerMinute(massFlow, gas)));
    }

    /** Time (s) as ms. */
    public static String milliseconds(double seconds) {
        return text("%.3f ms", 1e3 * seconds);
    }

    /** Four digits of a value, without an exponent where that is readable. */
    public static String digits(double value) {
        double size = Math.abs(value);
        if (size == 0) {
            return "0";
        }
        if (size >= 1e6 || size < 1e-3) {
            return text("%.3e", value);
        }
        int decimals = Math.max(0, 3 - (int) Math.floor(Math.log10(size)));
        return String.format(Locale.ROOT, "%." + decimals + "f", value);
    }

    /** A share as a percentage with two decimals. */
    public static String percent(double share) {
        return text("%.2f %%", 100 * share);
    }

    private static String text(String format, Object... values) {
        return String.format(Locale.ROOT, format, values);
    }
}
