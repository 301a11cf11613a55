package org.whither.io.report;

import java.awt.Font;
import java.awt.font.FontRenderContext;

/** Charts cannot be drawn on this machine: Java's fonts are missing. */
final class NoCharts extends Exception {
    private static final long serialVersionUID = 1L;
    private static final FontRenderContext LETTERS = new FontRenderContext(null, true, true);

    private NoCharts(Throwable cause) {
        super("charts need a font and the packages that io/setup.sh names", cause);
    }

    /** Width of words in the letters in which charts are laid out (pixels). */
    static double width(String words, double size) {
        return new Font(Font.SANS_SERIF, Font.PLAIN, 1)
                .deriveFont((float) size)
                .getStringBounds(words, LETTERS)
                .getWidth();
    }

    /** Tries whether this machine has letters. */
    static void check() throws NoCharts {
        try {
            width("0", 12);
        } catch (RuntimeException | LinkageError | InternalError problem) {
            throw new NoCharts(problem);
        }
    }
}
