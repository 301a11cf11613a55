package org.whither.render;

import java.util.Objects;
import java.util.OptionalDouble;

/**
 * What a section in the (r, z) plane is to be like.
 *
 * @param picture size, title, background, frame and ranges
 * @param angle angle of the section in the frame in which the film is steady (rad); empty: averaged round the ring
 * @param exaggeration how many times too large lengths across the film are drawn; empty: a round number that fills the
 *     picture
 */
public record MeridianSettings(PictureSettings picture, OptionalDouble angle, OptionalDouble exaggeration) {
    /** Checks the numbers. */
    public MeridianSettings {
        Objects.requireNonNull(picture);
        if (angle.isPresent() && !Double.isFinite(angle.getAsDouble())) {
            throw new IllegalArgumentException("angle of the section " + angle.getAsDouble() + "; expected a number");
        }
        if (exaggeration.isPresent()
                && !(exaggeration.getAsDouble() > 0 && Double.isFinite(exaggeration.getAsDouble()))) {
            throw new IllegalArgumentException(
                    "exaggeration of the film thickness " + exaggeration.getAsDouble() + "; expected a number above 0");
        }
    }

    /** Averaged round the ring, as large as fits. */
    public static MeridianSettings averaged(PictureSettings picture) {
        return new MeridianSettings(picture, OptionalDouble.empty(), OptionalDouble.empty());
    }

    /** At an angle (rad). */
    public static MeridianSettings at(PictureSettings picture, double angle) {
        return new MeridianSettings(picture, OptionalDouble.of(angle), OptionalDouble.empty());
    }
}
