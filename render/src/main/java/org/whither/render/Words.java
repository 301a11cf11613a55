package org.whither.render;

import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.Frame;

/** Sentences that several pictures share. */
final class Words {
    static final String CAUTION = "Shows the supplied computed field, not the machine: no approval and no guarantee of"
            + " leakage. Local codes, the seal maker and licensed practice decide.";

    static final String SHORT_CAUTION =
            "Shows the supplied computed field, not the machine: no approval, no guarantee of leakage.";

    private Words() {}

    /** The operating point in one line. */
    static String facts(Film film) {
        Conditions c = film.conditions();
        StringBuilder words = new StringBuilder();
        words.append(speed(c.rotationRate()));
        c.pressureSupply().ifPresent(p -> words.append("  ·  supply ").append(bar(p)));
        words.append("  ·  inner diameter ").append(bar(c.pressureInner()));
        words.append("  ·  outer diameter ").append(bar(c.pressureOuter()));
        words.append("  ·  ").append(film.gas().name());
        words.append(" at ").append(Ticks.number(c.temperature() - 273.15, 0)).append(" °C");
        return words.toString();
    }

    static String speed(double rotationRate) {
        double rpm = Math.abs(rotationRate) * 30 / Math.PI;
        return rpm < 0.5 ? "rotor stands still" : Ticks.number(rpm, 0) + " rpm";
    }

    /** An absolute pressure. */
    static String bar(double pascal) {
        return Ticks.number(pascal / 1e5, 2) + " bar(a)";
    }

    static String diameter(double radius) {
        return "Ø " + Ticks.number(2e3 * radius, 1) + " mm";
    }

    static String frame(Frame frame) {
        return frame == Frame.ROTATING
                ? "seen from the rotor (rotating frame)"
                : "seen from the stator (stationary frame)";
    }
}
