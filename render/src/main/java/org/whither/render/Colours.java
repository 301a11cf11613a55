package org.whither.render;

/** How bright a colour looks. */
final class Colours {
    private Colours() {}

    /**
     * CIE 1976 lightness L* of a colour, 0 (black) … 100 (white): IEC 61966-2-1 (sRGB) to relative luminance, then CIE
     * 15:2004.
     *
     * @param colour sRGB 0xRRGGBB
     */
    static double lightness(int colour) {
        double luminance = 0.2126 * linear(colour >> 16) + 0.7152 * linear(colour >> 8) + 0.0722 * linear(colour);
        return luminance > 216.0 / 24389 ? 116 * Math.cbrt(luminance) - 16 : 24389.0 / 27 * luminance;
    }

    private static double linear(int channel) {
        double c = (channel & 0xff) / 255.0;
        return c <= 0.04045 ? c / 12.92 : Math.pow((c + 0.055) / 1.055, 2.4);
    }
}
