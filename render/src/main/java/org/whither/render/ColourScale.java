package org.whither.render;

/**
 * The colour scales of the pictures: one for pressure, one for speed. Both are perceptually even, grow lighter all the
 * way, and can be read with colour vision deficiency.
 *
 * <p>Source: F. Crameri, Scientific colour maps, doi:10.5281/zenodo.1243862 (MIT licence); F. Crameri, G. E. Shephard,
 * P. J. Heron, The misuse of colour in science communication, Nature Communications 11, 5444 (2020). Twenty evenly spaced
 * colours of each map, straight lines in sRGB between them.
 */
enum ColourScale {
    /** Pressure: Crameri's "lapaz". */
    // spotless:off
    PRESSURE(new int[] {
            0x1a0c64, 0x1f1d6f, 0x222c7a, 0x263a84, 0x29498d,
            0x2e5695, 0x34639b, 0x3c70a0, 0x467ba3, 0x5487a4,
            0x6390a2, 0x76999f, 0x879f9b, 0x99a497, 0xaeaa95,
            0xc5b49b, 0xdec3ab, 0xf0d4c2, 0xfae5dc, 0xfef2f3
    }),
    /** Speed: Crameri's "imola". */
    SPEED(new int[] {
            0x1a33b3, 0x1f3cae, 0x2446a9, 0x284ea5, 0x2d57a0,
            0x31609c, 0x376896, 0x3e708f, 0x457788, 0x4e8181,
            0x598b7d, 0x66987a, 0x72a576, 0x7fb273, 0x8dc070,
            0x9cce6c, 0xafde69, 0xc6eb67, 0xe4f666, 0xffff66
    });
    // spotless:on

    /** Number of entries of {@link #table}. */
    static final int ENTRIES = 256;

    private final int[] table = new int[ENTRIES];

    ColourScale(int[] key) {
        for (int n = 0; n < ENTRIES; n++) {
            double at = (double) n / (ENTRIES - 1) * (key.length - 1);
            int low = Math.min(key.length - 2, (int) at);
            table[n] = mix(key[low], key[low + 1], at - low);
        }
    }

    /** The colours from the low end to the high end, sRGB 0xRRGGBB; a copy. */
    int[] table() {
        return table.clone();
    }

    /**
     * The colour of a value.
     *
     * @param fraction position on the scale, 0 … 1; values outside get the end colours
     * @return sRGB 0xRRGGBB
     */
    int colour(double fraction) {
        double at = Math.max(0, Math.min(1, fraction)) * (ENTRIES - 1);
        int low = Math.min(ENTRIES - 2, (int) at);
        return mix(table[low], table[low + 1], at - low);
    }

    /** A colour between two, in sRGB. */
    static int mix(int from, int to, double fraction) {
        int result = 0;
        for (int shift = 16; shift >= 0; shift -= 8) {
            double a = from >> shift & 0xff;
            double b = to >> shift & 0xff;
            result |= (int) Math.round(a + fraction * (b - a)) << shift;
        }
        return result;
    }
}
