package org.whither.render;

import java.awt.image.BufferedImage;

/** Two pictures of two films side by side, drawn with one description. */
public final class Pair {
    private static final String WORDS = "Both sides: the same colour scales and ranges, the same magnification";

    private Pair() {}

    /** Width of each half of a picture (pixels). */
    public static int halfWidth(PictureSettings whole) {
        return whole.width() / 2;
    }

    /** Height of each half of a picture (pixels). */
    public static int halfHeight(PictureSettings whole) {
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(blank, whole)) {
            return whole.height() - (int) Math.ceil(foot(ink));
        }
    }

    private static double foot(Ink ink) {
        return ink.height(ink.heading) + 12 * ink.unit;
    }

    /**
     * Sets two halves side by side.
     *
     * @param left a picture of the halves' size
     * @param right another one
     * @param whole size and background of the whole
     * @return the picture, opaque
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    public static BufferedImage of(BufferedImage left, BufferedImage right, PictureSettings whole) {
        Canvas.checkSize(whole.width(), whole.height());
        BufferedImage image = new BufferedImage(whole.width(), whole.height(), BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(image, whole)) {
            ink.colour(ink.paper);
            ink.pen.fillRect(0, 0, whole.width(), whole.height());
            ink.pen.drawImage(left, 0, 0, null);
            ink.pen.drawImage(right, whole.width() - right.getWidth(), 0, null);
            ink.colour(ink.line);
            ink.stroke(Math.max(1, ink.unit));
            double bottom = whole.height() - foot(ink);
            ink.line(whole.width() / 2.0, 20 * ink.unit, whole.width() / 2.0, bottom - 8 * ink.unit);
            ink.write(
                    ink.heading,
                    ink.text,
                    WORDS,
                    whole.width() / 2.0,
                    bottom + ink.ascent(ink.heading),
                    Ink.Side.MIDDLE);
        }
        return image;
    }
}
