package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.geom.Area;
import java.awt.geom.PathIterator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;

class ColourTest {
    /**
     * Linear-RGB matrices of complete protanopia, deuteranopia and tritanopia: G. M. Machado, M. M. Oliveira, L. A. F.
     * Fernandes, A physiologically-based model for simulation of color vision deficiency, IEEE Trans. Visualization and
     * Computer Graphics 15(6), 2009, severity 1.0. Written down from memory; that each row adds up to 1 (grey stays grey)
     * is checked below.
     */
    private static final double[][] DEFICIENCIES = {
        {1, 0, 0, 0, 1, 0, 0, 0, 1},
        {0.152286, 1.052583, -0.204868, 0.114503, 0.786281, 0.099216, -0.003882, -0.048116, 1.051998},
        {0.367322, 0.860646, -0.227968, 0.280085, 0.672501, 0.047413, -0.011820, 0.042940, 0.968881},
        {1.255528, -0.076749, -0.178779, -0.078411, 0.930809, 0.147602, 0.004733, 0.691367, 0.303900}
    };

    /** Normal colour vision. */
    static final double[] NORMAL = DEFICIENCIES[0];

    private static double[] linear(int colour) {
        double[] result = new double[3];
        for (int c = 0; c < 3; c++) {
            double v = (colour >> (16 - 8 * c) & 0xff) / 255.0;
            result[c] = v <= 0.04045 ? v / 12.92 : Math.pow((v + 0.055) / 1.055, 2.4);
        }
        return result;
    }

    /** CIELAB under D65 of a colour as seen with a deficiency: IEC 61966-2-1 and CIE 15:2004. */
    private static double[] lab(int colour, double[] deficiency) {
        double[] rgb = linear(colour);
        double[] seen = new double[3];
        for (int row = 0; row < 3; row++) {
            double sum = 0;
            for (int c = 0; c < 3; c++) {
                sum += deficiency[3 * row + c] * rgb[c];
            }
            seen[row] = Math.max(0, Math.min(1, sum));
        }
        double x = (0.4124564 * seen[0] + 0.3575761 * seen[1] + 0.1804375 * seen[2]) / 0.95047;
        double y = 0.2126729 * seen[0] + 0.7151522 * seen[1] + 0.0721750 * seen[2];
        double z = (0.0193339 * seen[0] + 0.1191920 * seen[1] + 0.9503041 * seen[2]) / 1.08883;
        return new double[] {116 * f(y) - 16, 500 * (f(x) - f(y)), 200 * (f(y) - f(z))};
    }

    private static double f(double t) {
        return t > 216.0 / 24389 ? Math.cbrt(t) : (24389.0 / 27 * t + 16) / 116;
    }

    static double difference(int a, int b, double[] deficiency) {
        double[] p = lab(a, deficiency);
        double[] q = lab(b, deficiency);
        return Math.sqrt(Math.pow(p[0] - q[0], 2) + Math.pow(p[1] - q[1], 2) + Math.pow(p[2] - q[2], 2));
    }

    @Test
    void deficiencies_keepGrey() {
        for (double[] m : DEFICIENCIES) {
            for (int row = 0; row < 3; row++) {
                assertEquals(1, m[3 * row] + m[3 * row + 1] + m[3 * row + 2], 2e-6);
            }
        }
    }

    @ParameterizedTest
    @EnumSource(ColourScale.class)
    void scale_growsLighterAllTheWay(ColourScale scale) {
        for (double[] m : DEFICIENCIES) {
            double before = -1;
            for (int n = 0; n <= 64; n++) {
                double lightness = lab(scale.colour(n / 64.0), m)[0];
                // With a deficiency the very dark end may be level, but nowhere darker again.
                double least = m == DEFICIENCIES[0] ? before : before - 0.05;
                assertTrue(lightness > least, "lightness " + lightness + " after " + before + " at " + n + " of 64");
                before = lightness;
            }
        }
    }

    @ParameterizedTest
    @EnumSource(ColourScale.class)
    void scale_isEven(ColourScale scale) {
        // Equal steps of the number look alike: no step of a sixteenth is more than 2.2 times the mean one.
        double sum = 0;
        double most = 0;
        for (int n = 0; n < 16; n++) {
            double step = difference(scale.colour(n / 16.0), scale.colour((n + 1) / 16.0), DEFICIENCIES[0]);
            sum += step;
            most = Math.max(most, step);
        }
        assertTrue(most < 2.2 * sum / 16, "largest step " + most + ", mean " + sum / 16);
    }

    @Test
    void lightness_ofKnownColours() {
        assertEquals(0, Colours.lightness(0x000000), 1e-9);
        assertEquals(100, Colours.lightness(0xffffff), 1e-2);
        // L* of middle grey #777777 is 50.03 (CIE 15:2004 applied by hand: Y = 0.18447).
        assertEquals(50.03, Colours.lightness(0x777777), 0.02);
    }

    @Test
    void destinations_canBeToldApartWithColourVisionDeficiency() {
        Destination[] all = Destination.values();
        for (double[] m : DEFICIENCIES) {
            for (int a = 0; a < 4; a++) {
                for (int b = 0; b < a; b++) {
                    double difference = difference(all[a].colour(), all[b].colour(), m);
                    // 2.3 is just noticeable (Mahy et al. 1994); ten times that is seen at a glance, in small markers
                    // too.
                    assertTrue(difference > 23, all[a] + " and " + all[b] + " differ by only " + difference);
                }
            }
        }
    }

    @Test
    void destinations_haveDifferentMarkers() {
        Destination[] all = Destination.values();
        for (int a = 0; a < all.length; a++) {
            for (int b = 0; b < a; b++) {
                Area common = new Area(all[a].marker(0, 0, 100));
                Area either = new Area(common);
                common.intersect(new Area(all[b].marker(0, 0, 100)));
                either.add(new Area(all[b].marker(0, 0, 100)));
                double share = area(common) / area(either);
                assertTrue(share < 0.85, all[a] + " covers " + share + " of " + all[b]);
            }
        }
    }

    private static double area(Area shape) {
        double sum = 0;
        double[] at = new double[6];
        double[] last = new double[2];
        double[] start = new double[2];
        for (PathIterator i = shape.getPathIterator(null, 0.01); !i.isDone(); i.next()) {
            int kind = i.currentSegment(at);
            double[] to = kind == PathIterator.SEG_CLOSE ? start : at;
            if (kind == PathIterator.SEG_MOVETO) {
                start = new double[] {at[0], at[1]};
            } else {
                sum += 0.5 * (last[0] * to[1] - to[0] * last[1]);
            }
            last = new double[] {to[0], to[1]};
        }
        return Math.abs(sum);
    }
}
