package org.whither.render;

import java.util.Objects;
import java.util.Optional;

/**
 * What a look into the gap is to be like.
 *
 * @param picture size, title, background, frame and ranges
 * @param exaggeration how many times too large lengths across the film are drawn, above 0; 1 is true to scale
 * @param camera from where it is looked at; azimuths count from the direction from the shaft to the middle of the part
 *     shown; empty: from over the bore, and from the higher the deeper the grooves are drawn, so that their floors are seen
 */
public record GapSettings(PictureSettings picture, double exaggeration, Optional<Viewpoint> camera) {
    /** The usual exaggeration: a film of 4 µm is drawn as if it were 4 mm. */
    public static final double USUAL = 1000;

    /** Checks the exaggeration. */
    public GapSettings {
        Objects.requireNonNull(picture);
        Objects.requireNonNull(camera);
        if (!(exaggeration > 0) || Double.isInfinite(exaggeration)) {
            throw new IllegalArgumentException(
                    "exaggeration of the film thickness " + exaggeration + "; expected a number above 0");
        }
    }

    /** Seen from the usual place. */
    public GapSettings(PictureSettings picture, double exaggeration) {
        this(picture, exaggeration, Optional.empty());
    }

    /** The usual exaggeration. */
    public static GapSettings standard(String title) {
        return new GapSettings(PictureSettings.standard(title), USUAL);
    }
}
