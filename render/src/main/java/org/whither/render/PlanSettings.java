package org.whither.render;

import java.util.Objects;
import java.util.Optional;

/**
 * What a plan is to be like.
 *
 * @param picture size, title, background, side and frame
 * @param quantity what it shows in colour
 * @param part the whole ring with one sector enlarged, the ring alone, or one sector unrolled
 * @param range ends of the colour scale (SI), or empty: those of what is shown
 */
public record PlanSettings(
        PictureSettings picture, Quantity quantity, Part part, Optional<PictureSettings.Range> range) {
    /** Checks that all is there. */
    public PlanSettings {
        Objects.requireNonNull(picture);
        Objects.requireNonNull(quantity);
        Objects.requireNonNull(part);
        Objects.requireNonNull(range);
    }

    /** The pressure over the ring and one sector enlarged. */
    public static PlanSettings standard(PictureSettings picture) {
        return new PlanSettings(picture, Quantity.PRESSURE, Part.BOTH, picture.pressureRange());
    }
}
