package org.whither.render;

/**
 * What a look into the gap is to be like.
 *
 * @param picture size, title, background, frame and ranges
 * @param exaggeration how many times too large lengths across the film are drawn, above 0; 1 is true to scale
 */
public record GapSettings(PictureSettings picture, double exaggeration) {
    /** The usual exaggeration: a film of 4 µm is drawn as if it were 4 mm. */
    public static final double USUAL = 1000;

    /** Checks the exaggeration. */
    public GapSettings {
        if (!(exaggeration > 0) || Double.isInfinite(exaggeration)) {
            throw new IllegalArgumentException(
                    "exaggeration of the film thickness " + exaggeration + "; expected a number above 0");
        }
    }

    /** The usual exaggeration. */
    public static GapSettings standard(String title) {
        return new GapSettings(PictureSettings.standard(title), USUAL);
    }
}
