package org.whither.render;

import java.util.Locale;

/** Round numbers for scales, and how numbers are written in pictures. */
final class Ticks {
    private Ticks() {}

    /**
     * The round step (1, 2 or 5 times a power of ten) that divides a length into at most so many parts.
     *
     * @param length the length, above 0
     * @param most most parts, at least 1
     */
    static double step(double length, int most) {
        double power = Math.pow(10, Math.floor(Math.log10(length / most)));
        for (double factor : new double[] {1, 2, 5}) {
            if (length / (factor * power) <= most * (1 + 1e-9)) {
                return factor * power;
            }
        }
        return 10 * power;
    }

    /** Multiples of a round step between two ends, at most so many parts. */
    static double[] between(double low, double high, int most) {
        double step = step(high - low, most);
        long first = (long) Math.ceil(low / step - 1e-9);
        long last = (long) Math.floor(high / step + 1e-9);
        double[] ticks = new double[(int) (last - first + 1)];
        for (int n = 0; n < ticks.length; n++) {
            ticks[n] = (first + n) * step;
        }
        return ticks;
    }

    /** The number of decimals that a step needs. */
    static int decimals(double step) {
        int decimals = 0;
        while (decimals < 9 && Math.abs(step - Math.rint(step)) > 1e-6 * step) {
            step *= 10;
            decimals++;
        }
        return decimals;
    }

    /** A number with so many decimals and thin gaps between thousands. */
    static String number(double value, int decimals) {
        String text = String.format(Locale.ROOT, "%,." + decimals + "f", value).replace(',', '\u2009');
        return text.startsWith("-") ? "\u2212" + text.substring(1) : text;
    }

    /** A number without needless decimals. */
    static String plain(double value) {
        return number(value, decimals(Math.abs(value)));
    }
}
