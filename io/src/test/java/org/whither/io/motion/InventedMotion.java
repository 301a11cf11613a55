package org.whither.io.motion;

import java.awt.Color;
import java.awt.GradientPaint;
import java.awt.Graphics2D;
import java.awt.RadialGradientPaint;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;

/** An invented animation for tests of its files: a colour bar and flat patches that stand still, a shaded ball that moves. */
final class InventedMotion {
    static final int PAPER = 0xfbfbf9;
    static final int[] PATCHES = {0xd55e00, 0x0072b2, 0x56b4e9, 0xf0e442};

    /** The bar: its left end, its width, its upper end, its height (pixels), and its two end colours. */
    static final int BAR_X = 40;

    static final int BAR_WIDTH = 240;
    static final int BAR_Y = 150;
    static final int BAR_HEIGHT = 16;
    static final Color BAR_FROM = new Color(0x1a33b3);
    static final Color BAR_TO = new Color(0xffff66);

    static final int PATCH_Y = 120;

    private InventedMotion() {}

    static BufferedImage frame(int width, int height, double when) {
        BufferedImage image = new BufferedImage(width, height, BufferedImage.TYPE_INT_RGB);
        Graphics2D pen = image.createGraphics();
        pen.setColor(new Color(PAPER));
        pen.fillRect(0, 0, width, height);
        for (int n = 0; n < PATCHES.length; n++) {
            pen.setColor(new Color(PATCHES[n]));
            pen.fillRect(40 + 40 * n, PATCH_Y, 24, 16);
        }
        pen.setPaint(new GradientPaint(BAR_X, 0, BAR_FROM, BAR_X + BAR_WIDTH, 0, BAR_TO));
        pen.fillRect(BAR_X, BAR_Y, BAR_WIDTH, BAR_HEIGHT);
        float x = (float) (40 + (width - 80) * when);
        pen.setPaint(new RadialGradientPaint(
                x, 60, 36, new float[] {0, 1}, new Color[] {new Color(0xffe0b0), new Color(0x503010)}));
        pen.fillOval(Math.round(x) - 32, 28, 64, 64);
        pen.dispose();
        return image;
    }

    static List<BufferedImage> frames(int width, int height, int count) {
        List<BufferedImage> frames = new ArrayList<>();
        for (int n = 0; n < count; n++) {
            frames.add(frame(width, height, n / Math.max(1.0, count - 1)));
        }
        return frames;
    }

    static List<Integer> exact() {
        List<Integer> exact = new ArrayList<>(List.of(PAPER));
        for (int patch : PATCHES) {
            exact.add(patch);
        }
        return exact;
    }

    /** Greatest difference of the three channels of two colours. */
    static int apart(int a, int b) {
        int most = 0;
        for (int shift = 0; shift <= 16; shift += 8) {
            most = Math.max(most, Math.abs((a >> shift & 0xff) - (b >> shift & 0xff)));
        }
        return most;
    }

    /** Greatest difference of the means of two pictures over a square, channel by channel. */
    static double meansApart(BufferedImage a, BufferedImage b, int x0, int y0, int edge) {
        double most = 0;
        for (int shift = 0; shift <= 16; shift += 8) {
            double sum = 0;
            for (int y = y0; y < y0 + edge; y++) {
                for (int x = x0; x < x0 + edge; x++) {
                    sum += (a.getRGB(x, y) >> shift & 0xff) - (b.getRGB(x, y) >> shift & 0xff);
                }
            }
            most = Math.max(most, Math.abs(sum / (edge * edge)));
        }
        return most;
    }
}
