package org.whither.render;

/**
 * The colour scales of the pictures: one each for pressure, speed, age and film thickness. All are perceptually even, grow
 * lighter all the way, and can be read with colour vision deficiency. Twenty evenly spaced colours of each published map,
 * straight lines in sRGB between them.
 *
 * <p>Sources. "lapaz" and "imola": F. Crameri, Scientific colour maps, doi:10.5281/zenodo.1243862 (MIT licence); F.
 * Crameri, G. E. Shephard, P. J. Heron, The misuse of colour in science communication, Nature Communications 11, 5444
 * (2020). "inferno": N. J. Smith, S. van der Walt, 2015, published with Matplotlib 1.5 (CC0). "cividis": J. R. Nuñez, C. R.
 * Anderton, R. S. Renslow, Optimizing colormaps with consideration for color vision deficiency to enable accurate
 * interpretation of scientific data, PLoS ONE 13(7), e0199239 (2018), published with Matplotlib 2.2 (CC0).
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
    }),
    /** Age: "inferno". */
    AGE(new int[] {
            0x000004, 0x08061e, 0x190c3e, 0x2f0a5b, 0x460b69,
            0x5c126e, 0x711a6e, 0x87216b, 0x9c2964, 0xb1325b,
            0xc53c4e, 0xd64a40, 0xe55c30, 0xf0701f, 0xf8870e,
            0xfc9f07, 0xfbb91e, 0xf7d440, 0xf1ed6f, 0xfcffa4
    }),
    /** Film thickness: "cividis". */
    THICKNESS(new int[] {
            0x00224e, 0x002c65, 0x0e3570, 0x283e6e, 0x38476c,
            0x46516c, 0x535a6d, 0x5f636f, 0x6b6d72, 0x767676,
            0x828079, 0x8f8a78, 0x9c9576, 0xaa9f73, 0xb8aa6e,
            0xc6b567, 0xd4c15f, 0xe3cd54, 0xf2da44, 0xfee838
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
