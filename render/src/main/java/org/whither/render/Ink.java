package org.whither.render;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Font;
import java.awt.FontMetrics;
import java.awt.Graphics2D;
import java.awt.GraphicsEnvironment;
import java.awt.RenderingHints;
import java.awt.Shape;
import java.awt.font.GlyphVector;
import java.awt.geom.AffineTransform;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/**
 * Words, legends and lines over a drawn scene, by Java2D, in one hand for all pictures. Sizes follow the picture's, so
 * that a larger picture is the same picture; small pictures keep a least readable size of letters.
 */
final class Ink implements AutoCloseable {
    /** Where a text lies against its point. */
    enum Side {
        LEFT,
        MIDDLE,
        RIGHT
    }

    /** Size of small letters in a picture of 1280 × 720, and their least size in any (pixels). */
    static final double SMALL = 11.5;

    static final double LEAST_SMALL = 9.2;

    private static String family;

    final Graphics2D pen;
    /** Pixels of this picture for one pixel of a picture of 1280 × 720. */
    final double unit;

    final Font title;
    final Font heading;
    final Font body;
    final Font small;
    final int paper;
    final int text;
    final int faint;
    final int line;
    private final boolean dark;

    Ink(BufferedImage image, PictureSettings settings) {
        this.unit = unit(settings);
        this.dark = settings.background() == PictureSettings.Background.DARK;
        this.paper = paper(settings);
        this.text = dark ? 0xe9edf0 : 0x1c2126;
        this.faint = dark ? 0x9aa6b0 : 0x5b656e;
        this.line = dark ? 0x56616b : 0xb4bcc3;
        Graphics2D graphics;
        try {
            graphics = image.createGraphics();
            graphics.setRenderingHint(RenderingHints.KEY_ANTIALIASING, RenderingHints.VALUE_ANTIALIAS_ON);
            graphics.setRenderingHint(RenderingHints.KEY_TEXT_ANTIALIASING, RenderingHints.VALUE_TEXT_ANTIALIAS_ON);
            graphics.setRenderingHint(RenderingHints.KEY_FRACTIONALMETRICS, RenderingHints.VALUE_FRACTIONALMETRICS_ON);
            graphics.setRenderingHint(RenderingHints.KEY_STROKE_CONTROL, RenderingHints.VALUE_STROKE_PURE);
            title = font(Font.BOLD, 21, 13);
            heading = font(Font.BOLD, 13, 9.6);
            body = font(Font.PLAIN, 13, 9.6);
            small = font(Font.PLAIN, SMALL, LEAST_SMALL);
            graphics.setFont(body);
            graphics.getFontMetrics().stringWidth("0");
        } catch (RuntimeException | LinkageError | InternalError problem) {
            throw new NoOpenGL(problem);
        }
        this.pen = graphics;
    }

    static double unit(PictureSettings settings) {
        return Math.min(settings.width() / 1280.0, settings.height() / 720.0);
    }

    /** Background colour, sRGB 0xRRGGBB. */
    static int paper(PictureSettings settings) {
        return settings.background() == PictureSettings.Background.DARK ? 0x12161a : 0xfbfbf9;
    }

    boolean dark() {
        return dark;
    }

    private Font font(int style, double size, double least) {
        return new Font(family(), style, 1).deriveFont((float) Math.max(least, size * unit));
    }

    private static synchronized String family() {
        if (family == null) {
            String[] names = GraphicsEnvironment.getLocalGraphicsEnvironment().getAvailableFontFamilyNames();
            family = Arrays.asList(names).contains("DejaVu Sans") ? "DejaVu Sans" : Font.SANS_SERIF;
        }
        return family;
    }

    double width(Font font, String words) {
        return font.getStringBounds(words, pen.getFontRenderContext()).getWidth();
    }

    /** Height of a line of text, spacing included. */
    double height(Font font) {
        FontMetrics metrics = pen.getFontMetrics(font);
        return metrics.getAscent() + metrics.getDescent();
    }

    double ascent(Font font) {
        return 0.73 * font.getSize2D();
    }

    /** Writes a line of text with its baseline at y. */
    void write(Font font, int colour, String words, double x, double y, Side side) {
        double at = start(font, words, x, side);
        pen.setFont(font);
        pen.setColor(new Color(colour));
        pen.drawString(words, (float) at, (float) y);
    }

    /** Writes a line of text over a picture: with an edge of another colour, so that it can be read on anything. */
    void writeOver(Font font, int colour, int edge, String words, double x, double y, double angle, Side side) {
        AffineTransform before = pen.getTransform();
        pen.translate(x, y);
        pen.rotate(angle);
        GlyphVector glyphs = font.createGlyphVector(pen.getFontRenderContext(), words);
        Shape outline = glyphs.getOutline((float) start(font, words, 0, side), 0);
        pen.setColor(new Color(edge));
        pen.setStroke(
                new BasicStroke((float) (0.28 * font.getSize2D()), BasicStroke.CAP_ROUND, BasicStroke.JOIN_ROUND));
        pen.draw(outline);
        pen.setColor(new Color(colour));
        pen.fill(outline);
        pen.setTransform(before);
    }

    private double start(Font font, String words, double x, Side side) {
        return switch (side) {
            case LEFT -> x;
            case MIDDLE -> x - 0.5 * width(font, words);
            case RIGHT -> x - width(font, words);
        };
    }

    /** The first of some wordings, from long to short, that fits; else the last, cut off where it must be. */
    String first(Font font, double most, String... wordings) {
        for (String words : wordings) {
            if (width(font, words) <= most) {
                return words;
            }
        }
        return fitted(font, wordings[wordings.length - 1], most);
    }

    /** What parts the items of a line of facts: a line is broken there rather than within an item. */
    static final String DOT = "  ·  ";

    /**
     * Words in as many lines as they need, broken between items or, within one that is longer than a line, between words.
     *
     * @param most most lines; what has no room in them is cut off
     */
    List<String> lines(Font font, String words, double room, int most) {
        List<String> lines = new ArrayList<>();
        for (String item : words.split(DOT, -1)) {
            int last = lines.size() - 1;
            if (last >= 0 && width(font, lines.get(last) + DOT + item) <= room) {
                lines.set(last, lines.get(last) + DOT + item);
                continue;
            }
            StringBuilder line = new StringBuilder();
            for (String word : item.split(" ")) {
                if (line.length() > 0 && width(font, line + " " + word) > room) {
                    lines.add(line.toString());
                    line.setLength(0);
                }
                line.append(line.length() > 0 ? " " : "").append(word);
            }
            lines.add(line.toString());
        }
        if (lines.size() > most) {
            String rest = String.join(" ", lines.subList(most - 1, lines.size()));
            lines = new ArrayList<>(lines.subList(0, most - 1));
            lines.add(rest);
        }
        lines.replaceAll(line -> fitted(font, line, room));
        return lines;
    }

    /** The words, or, where they are wider than allowed, as many as fit and an ellipsis. */
    String fitted(Font font, String words, double most) {
        if (width(font, words) <= most) {
            return words;
        }
        String shorter = words;
        while (shorter.length() > 1 && width(font, shorter + "…") > most) {
            shorter = shorter.substring(0, shorter.length() - 1);
        }
        return shorter.stripTrailing() + "…";
    }

    /** A font of the same style, as much smaller as the words need to fit; not below the least size. */
    Font fitting(Font font, String words, double most) {
        double ratio = most / width(font, words);
        return ratio >= 1 ? font : font.deriveFont((float) Math.max(8.5, font.getSize2D() * ratio));
    }

    /** Writes a line of text in a room: in smaller letters where it must, and cut off with an ellipsis where it must. */
    void writeIn(double room, Font font, int colour, String words, double x, double y) {
        Font fits = fitting(font, words, room);
        write(fits, colour, fitted(fits, words, room), x, y, Side.LEFT);
    }

    /** The caution at the foot of a picture, short where the long one has no room. */
    void caution(double room, double x, double y) {
        boolean fits = width(fitting(small, Words.CAUTION, room), Words.CAUTION) <= room;
        writeIn(room, small, faint, fits ? Words.CAUTION : Words.SHORT_CAUTION, x, y);
    }

    void stroke(double width) {
        pen.setStroke(new BasicStroke((float) width, BasicStroke.CAP_ROUND, BasicStroke.JOIN_ROUND));
    }

    void dashes(double width, double on, double off) {
        pen.setStroke(new BasicStroke(
                (float) width,
                BasicStroke.CAP_BUTT,
                BasicStroke.JOIN_ROUND,
                10,
                new float[] {(float) on, (float) off},
                0));
    }

    void colour(int colour) {
        pen.setColor(new Color(colour));
    }

    void colour(int colour, double opacity) {
        pen.setColor(
                new Color(colour >> 16 & 0xff, colour >> 8 & 0xff, colour & 0xff, (int) Math.round(255 * opacity)));
    }

    void line(double x0, double y0, double x1, double y1) {
        pen.draw(new Line2D.Double(x0, y0, x1, y1));
    }

    /** A shape in a colour with a thin edge that sets it off from anything behind. */
    void mark(Shape shape, int colour, double edgeWidth) {
        colour(dark ? 0x0b0d0f : 0x1c2126);
        stroke(edgeWidth);
        pen.draw(shape);
        colour(colour);
        pen.fill(shape);
    }

    /**
     * A colour bar with ticks, lying or standing.
     *
     * @param bounds the bar itself
     * @param scale the colours
     * @param low value at its left or lower end
     * @param high value at its other end
     * @param clippedLow whether there are values below
     * @param clippedHigh whether there are values above
     * @param caption what it shows, with the unit; written above it
     */
    void colourBar(
            Rectangle2D bounds,
            ColourScale scale,
            double low,
            double high,
            boolean clippedLow,
            boolean clippedHigh,
            String caption) {
        int x0 = (int) Math.round(bounds.getX());
        int y0 = (int) Math.round(bounds.getY());
        int w = (int) Math.round(bounds.getWidth());
        int h = Math.max(4, (int) Math.round(bounds.getHeight()));
        for (int n = 0; n < w; n++) {
            colour(scale.colour((n + 0.5) / w));
            pen.fillRect(x0 + n, y0, 1, h);
        }
        if (clippedLow) {
            end(scale.colour(0), x0, y0, h, -1);
        }
        if (clippedHigh) {
            end(scale.colour(1), x0 + w, y0, h, 1);
        }
        int room = (int) Math.max(2, w / (5.2 * small.getSize2D()));
        double[] ticks = Ticks.between(low, high, room);
        int decimals = Ticks.decimals(Ticks.step(high - low, room));
        stroke(Math.max(1, unit));
        for (double tick : ticks) {
            double x = x0 + (tick - low) / (high - low) * w;
            colour(faint);
            line(x, y0 + h, x, y0 + h + 4 * unit);
            write(small, text, Ticks.number(tick, decimals), x, y0 + h + 5.5 * unit + ascent(small) + 1, Side.MIDDLE);
        }
        List<String> captions = lines(heading, caption, w, 2);
        for (int n = 0; n < captions.size(); n++) {
            double up = (captions.size() - 1 - n) * height(heading);
            write(heading, text, captions.get(n), x0, y0 - 6 * unit - up, Side.LEFT);
        }
    }

    private void end(int colour, double x, double y, double h, int way) {
        Path2D.Double path = new Path2D.Double();
        path.moveTo(x, y);
        path.lineTo(x + way * 0.8 * h, y + h / 2);
        path.lineTo(x, y + h);
        path.closePath();
        colour(colour);
        pen.fill(path);
    }

    /** A scale bar with its length written over it; its left end at (x, y). */
    void scaleBar(double x, double y, double length, String words) {
        colour(text);
        stroke(Math.max(1.2, 1.6 * unit));
        double tick = 4 * unit;
        line(x, y, x + length, y);
        line(x, y - tick, x, y + tick);
        line(x + length, y - tick, x + length, y + tick);
        write(small, text, words, x + length / 2, y - 7 * unit, Side.MIDDLE);
    }

    /** A curved or straight shaft that ends in a filled head. */
    void arrow(Point2D[] shaft, double width, int colour) {
        Point2D tip = shaft[shaft.length - 1];
        double head = 5.6 * width;
        int back = shaft.length - 1;
        while (back > 0 && tip.distance(shaft[back]) < head) {
            back--;
        }
        Path2D.Double path = new Path2D.Double();
        path.moveTo(shaft[0].getX(), shaft[0].getY());
        for (int n = 1; n <= back; n++) {
            path.lineTo(shaft[n].getX(), shaft[n].getY());
        }
        colour(colour);
        stroke(width);
        pen.draw(path);
        double dx = tip.getX() - shaft[back].getX();
        double dy = tip.getY() - shaft[back].getY();
        double length = Math.hypot(dx, dy);
        dx /= length;
        dy /= length;
        Path2D.Double point = new Path2D.Double();
        point.moveTo(tip.getX(), tip.getY());
        double bx = tip.getX() - head * dx;
        double by = tip.getY() - head * dy;
        point.lineTo(bx - 0.5 * head * dy, by + 0.5 * head * dx);
        point.lineTo(bx + 0.5 * head * dy, by - 0.5 * head * dx);
        point.closePath();
        pen.fill(point);
    }

    @Override
    public void close() {
        pen.dispose();
    }
}
