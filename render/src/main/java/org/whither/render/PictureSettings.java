package org.whither.render;

import java.util.Objects;
import java.util.Optional;
import org.whither.film.Frame;

/**
 * What a picture is to be like. Sizes are in pixels, ranges in SI units.
 *
 * @param width width, at least {@value #LEAST_WIDTH}
 * @param height height, at least {@value #LEAST_HEIGHT}
 * @param title its title
 * @param background light or dark
 * @param seenFrom from which side a face is looked at
 * @param speedFrame the frame in which the speeds of the paths are measured, as written in the picture
 * @param pressureRange ends of the pressure scale (Pa), or empty: the lowest and highest pressure of the film
 * @param speedRange ends of the speed scale (m/s), or empty: from 0 to the highest speed of the paths
 */
public record PictureSettings(
        int width,
        int height,
        String title,
        Background background,
        ViewingSide seenFrom,
        Frame speedFrame,
        Optional<Range> pressureRange,
        Optional<Range> speedRange) {
    /** Least width (pixels): below, the words of a picture have no room. */
    public static final int LEAST_WIDTH = 640;

    /** Least height (pixels). */
    public static final int LEAST_HEIGHT = 360;

    /** What lies behind a picture. */
    public enum Background {
        /** Near white, for print. */
        LIGHT,
        /** Near black, for a dark slide. */
        DARK
    }

    /**
     * The ends of a colour scale.
     *
     * @param low value at its low end
     * @param high value at its high end, above {@code low}
     */
    public record Range(double low, double high) {
        /** Checks the order. */
        public Range {
            if (!(low < high) || Double.isInfinite(low) || Double.isInfinite(high)) {
                throw new IllegalArgumentException(
                        "colour range from " + low + " to " + high + "; expected a finite low end below the high end");
            }
        }
    }

    /** Checks the size. */
    public PictureSettings {
        Objects.requireNonNull(title);
        Objects.requireNonNull(background);
        Objects.requireNonNull(seenFrom);
        Objects.requireNonNull(speedFrame);
        Objects.requireNonNull(pressureRange);
        Objects.requireNonNull(speedRange);
        if (width < LEAST_WIDTH || height < LEAST_HEIGHT || (double) width / height < 0.8 || width > 4L * height) {
            throw new IllegalArgumentException("picture of " + width + " × " + height + " pixels; expected at least "
                    + LEAST_WIDTH + " × " + LEAST_HEIGHT + ", and between 0.8 and 4 times as wide as high");
        }
    }

    /** 1280 × 720 pixels, light, seen from the stator, speeds in the rotating frame, ranges from the film. */
    public static PictureSettings standard(String title) {
        return new PictureSettings(
                1280,
                720,
                title,
                Background.LIGHT,
                ViewingSide.STATOR,
                Frame.ROTATING,
                Optional.empty(),
                Optional.empty());
    }

    /**
     * Starts what draws pictures, which drawing does by itself: to fail early.
     *
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     */
    public static void startDrawing() {
        HeadlessGL.start();
    }

    /**
     * Checks that the memory can hold the picture.
     *
     * @throws IllegalArgumentException where it cannot, in a sentence that says how to mend it
     */
    public void checkMemory() {
        Canvas.checkSize(width, height);
    }

    /** The same at another size (pixels). */
    public PictureSettings sized(int newWidth, int newHeight) {
        return new PictureSettings(
                newWidth, newHeight, title, background, seenFrom, speedFrame, pressureRange, speedRange);
    }

    /** The same on another background. */
    public PictureSettings on(Background newBackground) {
        return new PictureSettings(
                width, height, title, newBackground, seenFrom, speedFrame, pressureRange, speedRange);
    }

    /** The same seen from another side. */
    public PictureSettings from(ViewingSide newSide) {
        return new PictureSettings(width, height, title, background, newSide, speedFrame, pressureRange, speedRange);
    }

    /** The same with speeds of another frame. */
    public PictureSettings speedsIn(Frame newFrame) {
        return new PictureSettings(width, height, title, background, seenFrom, newFrame, pressureRange, speedRange);
    }

    /** The same with a pressure scale of given ends (Pa). */
    public PictureSettings pressures(double low, double high) {
        return new PictureSettings(
                width, height, title, background, seenFrom, speedFrame, Optional.of(new Range(low, high)), speedRange);
    }

    /** The same with a speed scale of given ends (m/s). */
    public PictureSettings speeds(double low, double high) {
        return new PictureSettings(
                width,
                height,
                title,
                background,
                seenFrom,
                speedFrame,
                pressureRange,
                Optional.of(new Range(low, high)));
    }
}
