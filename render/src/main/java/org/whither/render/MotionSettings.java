package org.whither.render;

import java.util.Objects;
import java.util.OptionalDouble;

/**
 * What an animation is to be like.
 *
 * @param picture size, title, background, frame of view and ranges
 * @param ground over what it goes: the relief of the pressure, or the film itself
 * @param exaggeration how many times too large lengths across the film are drawn, where the film is shown
 * @param seconds how long it plays (s); empty: as long as the slow-down needs, or {@value #USUAL_SECONDS} s
 * @param rate frames a second
 * @param slower how many times slower than the gas; empty: a round number that fits the length
 * @param behind distance of the eye behind the gas, at the scale of the face (m); empty: a share of the face's width
 */
public record MotionSettings(
        PictureSettings picture,
        Ground ground,
        double exaggeration,
        OptionalDouble seconds,
        double rate,
        OptionalDouble slower,
        OptionalDouble behind) {
    /** Usual length (s). */
    public static final double USUAL_SECONDS = 10;

    /** Most frames of an animation. */
    public static final int MOST_FRAMES = 20_000;

    /** What an animation goes over. */
    public enum Ground {
        /** The film pressure as height. */
        RELIEF,
        /** The film between rotor and stator, its thickness drawn too large. */
        GAP
    }

    /** Checks the numbers. */
    public MotionSettings {
        Objects.requireNonNull(picture);
        Objects.requireNonNull(ground);
        if (!(exaggeration > 0) || Double.isInfinite(exaggeration)) {
            throw new IllegalArgumentException(
                    "exaggeration of the film thickness " + exaggeration + "; expected a number above 0");
        }
        if (!(rate >= 1 && rate <= 60)) {
            throw new IllegalArgumentException(rate + " frames a second; expected 1 … 60");
        }
        if (seconds.isPresent() && !(seconds.getAsDouble() >= 0.5 && seconds.getAsDouble() <= 3600)) {
            throw new IllegalArgumentException("length of " + seconds.getAsDouble() + " s; expected 0.5 … 3600 s");
        }
        if (slower.isPresent() && !(slower.getAsDouble() > 0 && slower.getAsDouble() <= 1e9)) {
            throw new IllegalArgumentException(
                    "slow-down by " + slower.getAsDouble() + "; expected a number above 0, at most 1e9");
        }
        if (behind.isPresent() && !(behind.getAsDouble() > 0 && behind.getAsDouble() <= 1)) {
            throw new IllegalArgumentException("distance behind the gas of " + 1e3 * behind.getAsDouble()
                    + " mm; expected more than 0, at most 1000 mm");
        }
    }

    /** The usual animation inside the film. */
    public static MotionSettings standard(PictureSettings picture) {
        return new MotionSettings(
                picture,
                Ground.GAP,
                GapSettings.USUAL,
                OptionalDouble.empty(),
                25,
                OptionalDouble.empty(),
                OptionalDouble.empty());
    }

    /** The same over another ground. */
    public MotionSettings over(Ground newGround) {
        return new MotionSettings(picture, newGround, exaggeration, seconds, rate, slower, behind);
    }

    /** The same, so long (s) and with so many frames a second. */
    public MotionSettings lasting(double newSeconds, double newRate) {
        return new MotionSettings(
                picture, ground, exaggeration, OptionalDouble.of(newSeconds), newRate, slower, behind);
    }

    /** The same in another picture. */
    public MotionSettings in(PictureSettings newPicture) {
        return new MotionSettings(newPicture, ground, exaggeration, seconds, rate, slower, behind);
    }
}
