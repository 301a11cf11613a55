package org.whither.render;

import java.awt.Font;
import java.util.List;

/**
 * What every picture has round its scene: the title, the operating point and what is drawn at the head, the caution at the
 * foot. Words that are too long for a line take more lines, and the scene what is left.
 */
final class Page {
    private final List<String> title;
    private final List<String> facts;
    private final List<String> drawn;
    private final List<String> caution;
    private final Font titleFont;
    /** Left and right edge of what may be written on, and the top and the bottom of the room for the scene (pixels). */
    final double left;

    final double right;
    final double top;
    final double bottom;
    private final double titleBase;
    private final double factsBase;
    private final double drawnBase;
    private final double cautionBase;

    /**
     * A page.
     *
     * @param ink what to measure the words with, and to write them
     * @param settings size and title
     * @param facts the operating point
     * @param drawn what is drawn and to which scale, or empty
     */
    Page(Ink ink, PictureSettings settings, String facts, String drawn) {
        double u = ink.unit;
        left = 26 * u;
        right = settings.width() - left;
        double room = right - left;
        titleFont = ink.fitting(ink.title, settings.title(), room);
        title = ink.lines(titleFont, settings.title(), room, 2);
        this.facts = ink.lines(ink.body, facts, room, 3);
        this.drawn = drawn.isEmpty() ? List.of() : ink.lines(ink.heading, drawn, room, 3);
        caution = ink.lines(ink.small, Words.CAUTION, room, 3);
        titleBase = left + ink.ascent(ink.title);
        double lastTitle = titleBase + (title.size() - 1) * ink.height(titleFont);
        factsBase = lastTitle + 9 * u + ink.ascent(ink.body);
        double lastFacts = factsBase + (this.facts.size() - 1) * ink.height(ink.body);
        drawnBase = lastFacts + 11 * u + ink.ascent(ink.body);
        double lastDrawn =
                this.drawn.isEmpty() ? lastFacts : drawnBase + (this.drawn.size() - 1) * ink.height(ink.heading);
        top = lastDrawn + 12 * u;
        cautionBase = settings.height() - 14 * u - (caution.size() - 1) * ink.height(ink.small);
        bottom = cautionBase - ink.ascent(ink.small) - 12 * u;
    }

    /** Writes the head and the foot. */
    void write(Ink ink) {
        write(ink, titleFont, ink.text, title, titleBase);
        write(ink, ink.body, ink.faint, facts, factsBase);
        write(ink, ink.heading, ink.text, drawn, drawnBase);
        write(ink, ink.small, ink.faint, caution, cautionBase);
    }

    private void write(Ink ink, Font font, int colour, List<String> lines, double base) {
        for (int n = 0; n < lines.size(); n++) {
            ink.write(font, colour, lines.get(n), left, base + n * ink.height(font), Ink.Side.LEFT);
        }
    }
}
