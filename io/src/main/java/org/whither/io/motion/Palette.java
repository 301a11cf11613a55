package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.awt.image.DataBufferInt;
import java.awt.image.IndexColorModel;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collection;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.PriorityQueue;
import java.util.Set;

/**
 * The colours of one animation, at most 255, and the picture in them. Colours that matter are among them exactly; the
 * others are chosen from sample frames: boxes of colours are halved where their spread is greatest (after P. Heckbert,
 * Color image quantization for frame buffer display, SIGGRAPH 1982), then moved to the means of what they stand for
 * (S. P. Lloyd 1982).
 *
 * <p>Colours between are made of the chosen ones by a pattern that depends on nothing but the colour and the place in the
 * picture (positional dithering after T. Knoll, from memory), so that it does not crawl where the picture stands still.
 */
final class Palette {
    /** Number of colours; one index more stands for a pixel that does not change. */
    static final int MOST = 255;

    /** Index of a pixel that shows what was there before. */
    static final int UNCHANGED = 255;

    /** Edge of the square pattern (pixels) and number of colours that share a pattern. */
    private static final int PATTERN = 4;

    private static final int MIXED = 8;

    /** Share of a colour's error that is made up for by the colours mixed with it; 1 would be exact, and coarser. */
    private static final double CORRECTION = 0.8;

    /** Frequent colours count less than their number, so that small things keep their colours. */
    private static final double FREQUENT = 0.55;

    private static final int ROUNDS = 8;

    /** Order of a 4 × 4 square in which its pixels are filled, so that they lie far apart (B. E. Bayer 1973). */
    private static final int[] ORDER = {0, 8, 2, 10, 12, 4, 14, 6, 3, 11, 1, 9, 15, 7, 13, 5};

    private final int[] colours;
    /** For each colour of 6 bits a channel, the colours mixed for it, dark to light; filled when first needed. */
    private final byte[][] mixtures = new byte[1 << 18][];
    /** Index of each colour that is in the palette exactly, by a hash of it; −1 where none. */
    private final int[] exactColours = new int[1 << 12];

    private final short[] exactIndices = new short[1 << 12];

    private Palette(int[] colours) {
        this.colours = colours;
        Arrays.fill(exactIndices, (short) -1);
        for (int n = 0; n < colours.length; n++) {
            int at = slot(colours[n]);
            exactColours[at] = colours[n];
            exactIndices[at] = (short) n;
        }
    }

    private int slot(int colour) {
        int at = (colour * 0x9e3779b1) >>> 20;
        while (exactIndices[at] >= 0 && exactColours[at] != colour) {
            at = (at + 1) & 0xfff;
        }
        return at;
    }

    /**
     * A palette.
     *
     * @param exact colours that it must hold, sRGB 0xRRGGBB; the first ones where there are too many
     * @param samples frames whose colours it is to show well
     */
    static Palette of(Collection<Integer> exact, List<BufferedImage> samples) {
        Set<Integer> chosen = new LinkedHashSet<>();
        for (int colour : exact) {
            if (chosen.size() < MOST) {
                chosen.add(colour & 0xffffff);
            }
        }
        List<double[]> seen = histogram(chosen, samples);
        List<double[]> means = split(seen, MOST - chosen.size());
        move(seen, means, chosen);
        for (double[] mean : means) {
            chosen.add(pack(mean));
        }
        return new Palette(chosen.stream().mapToInt(Integer::intValue).toArray());
    }

    /** Mean red, green, blue and weight of the colours that fall together at 5 bits a channel. */
    private static List<double[]> histogram(Set<Integer> without, List<BufferedImage> samples) {
        double[][] bins = new double[1 << 15][];
        for (BufferedImage sample : samples) {
            int last = -1;
            boolean left = false;
            for (int pixel : pixels(sample)) {
                int c = pixel & 0xffffff;
                if (c != last) {
                    last = c;
                    left = without.contains(c);
                }
                if (left) {
                    continue;
                }
                int bin = (c >> 19 & 31) << 10 | (c >> 11 & 31) << 5 | (c >> 3 & 31);
                if (bins[bin] == null) {
                    bins[bin] = new double[4];
                }
                bins[bin][0] += c >> 16 & 0xff;
                bins[bin][1] += c >> 8 & 0xff;
                bins[bin][2] += c & 0xff;
                bins[bin][3]++;
            }
        }
        List<double[]> seen = new ArrayList<>();
        for (double[] bin : bins) {
            if (bin != null) {
                double n = bin[3];
                seen.add(new double[] {bin[0] / n, bin[1] / n, bin[2] / n, Math.pow(n, FREQUENT)});
            }
        }
        return seen;
    }

    static int[] pixels(BufferedImage image) {
        return ((DataBufferInt) image.getRaster().getDataBuffer()).getData();
    }

    /** A group of colours, its mean and its spread. */
    private static final class Group {
        final List<double[]> members;
        final double[] mean = new double[3];
        double spread;
        int axis;

        Group(List<double[]> members) {
            this.members = members;
            double weight = 0;
            for (double[] m : members) {
                weight += m[3];
                for (int c = 0; c < 3; c++) {
                    mean[c] += m[3] * m[c];
                }
            }
            double most = -1;
            for (int c = 0; c < 3; c++) {
                mean[c] /= weight;
                double sum = 0;
                for (double[] m : members) {
                    sum += m[3] * (m[c] - mean[c]) * (m[c] - mean[c]);
                }
                spread += sum;
                if (sum > most) {
                    most = sum;
                    axis = c;
                }
            }
        }
    }

    private static List<double[]> split(List<double[]> seen, int count) {
        List<double[]> means = new ArrayList<>();
        if (seen.isEmpty() || count < 1) {
            return means;
        }
        PriorityQueue<Group> groups = new PriorityQueue<>((a, b) -> Double.compare(b.spread, a.spread));
        groups.add(new Group(seen));
        while (groups.size() < count && groups.peek().spread > 1e-9) {
            Group widest = groups.poll();
            List<double[]> low = new ArrayList<>();
            List<double[]> high = new ArrayList<>();
            for (double[] m : widest.members) {
                (m[widest.axis] < widest.mean[widest.axis] ? low : high).add(m);
            }
            groups.add(new Group(low));
            groups.add(new Group(high));
        }
        groups.forEach(group -> means.add(group.mean));
        return means;
    }

    /** Moves the free colours to the means of the colours that are nearer to them than to any other. */
    private static void move(List<double[]> seen, List<double[]> means, Set<Integer> fixed) {
        if (means.isEmpty()) {
            return;
        }
        List<double[]> all = new ArrayList<>(means);
        fixed.forEach(c -> all.add(new double[] {c >> 16 & 0xff, c >> 8 & 0xff, c & 0xff}));
        for (int round = 0; round < ROUNDS; round++) {
            double[][] sums = new double[means.size()][4];
            for (double[] m : seen) {
                int best = 0;
                double least = Double.POSITIVE_INFINITY;
                for (int n = 0; n < all.size(); n++) {
                    double[] p = all.get(n);
                    double d = distance(m[0] - p[0], m[1] - p[1], m[2] - p[2]);
                    if (d < least) {
                        least = d;
                        best = n;
                    }
                }
                if (best < means.size()) {
                    for (int c = 0; c < 3; c++) {
                        sums[best][c] += m[3] * m[c];
                    }
                    sums[best][3] += m[3];
                }
            }
            for (int n = 0; n < sums.length; n++) {
                for (int c = 0; c < 3 && sums[n][3] > 0; c++) {
                    means.get(n)[c] = sums[n][c] / sums[n][3];
                }
            }
        }
    }

    /** Square of a distance of colours; channels weighted about as the eye does. */
    private static double distance(double red, double green, double blue) {
        return 0.6 * red * red + green * green + 0.45 * blue * blue;
    }

    private static int pack(double[] rgb) {
        return channel(rgb[0]) << 16 | channel(rgb[1]) << 8 | channel(rgb[2]);
    }

    private static int channel(double value) {
        return (int) Math.max(0, Math.min(255, Math.round(value)));
    }

    int size() {
        return colours.length;
    }

    /** A colour, sRGB 0xRRGGBB. */
    int colour(int index) {
        return colours[index];
    }

    /** The palette for Java; index {@link #UNCHANGED} is transparent. */
    IndexColorModel model() {
        byte[][] channels = new byte[3][256];
        for (int n = 0; n < colours.length; n++) {
            for (int c = 0; c < 3; c++) {
                channels[c][n] = (byte) (colours[n] >> (16 - 8 * c));
            }
        }
        return new IndexColorModel(8, 256, channels[0], channels[1], channels[2], UNCHANGED);
    }

    /**
     * A frame in the colours of the palette.
     *
     * @param pixels sRGB 0xRRGGBB, row by row; not modified
     * @param width pixels a row
     * @param indices the index of each pixel; overwritten
     */
    void index(int[] pixels, int width, byte[] indices) {
        int lastColour = -1;
        int lastExact = -1;
        byte[] lastMixture = null;
        for (int at = 0, x = 0, y = 0; at < pixels.length; at++) {
            int c = pixels[at] & 0xffffff;
            if (c != lastColour) {
                lastColour = c;
                lastExact = exactIndices[slot(c)];
                lastMixture = lastExact >= 0 ? null : mixture(c);
            }
            if (lastExact >= 0) {
                indices[at] = (byte) lastExact;
            } else {
                int order = ORDER[(y & PATTERN - 1) * PATTERN + (x & PATTERN - 1)];
                indices[at] = lastMixture[order * MIXED / (PATTERN * PATTERN)];
            }
            if (++x == width) {
                x = 0;
                y++;
            }
        }
    }

    private byte[] mixture(int c) {
        int key = (c >> 18 & 63) << 12 | (c >> 10 & 63) << 6 | (c >> 2 & 63);
        byte[] mixture = mixtures[key];
        if (mixture == null) {
            // The middle of the colours that share the key.
            mixture = mix((c >> 16 & 0xfc) + 1.5, (c >> 8 & 0xfc) + 1.5, (c & 0xfc) + 1.5);
            mixtures[key] = mixture;
        }
        return mixture;
    }

    private byte[] mix(double red, double green, double blue) {
        double er = 0;
        double eg = 0;
        double eb = 0;
        Integer[] picked = new Integer[MIXED];
        for (int n = 0; n < MIXED; n++) {
            int best = nearest(red + CORRECTION * er, green + CORRECTION * eg, blue + CORRECTION * eb);
            picked[n] = best;
            er += red - (colours[best] >> 16 & 0xff);
            eg += green - (colours[best] >> 8 & 0xff);
            eb += blue - (colours[best] & 0xff);
        }
        Arrays.sort(picked, (a, b) -> Double.compare(brightness(colours[a]), brightness(colours[b])));
        byte[] mixture = new byte[MIXED];
        for (int n = 0; n < MIXED; n++) {
            mixture[n] = picked[n].byteValue();
        }
        return mixture;
    }

    private int nearest(double red, double green, double blue) {
        int best = 0;
        double least = Double.POSITIVE_INFINITY;
        for (int n = 0; n < colours.length; n++) {
            int c = colours[n];
            double d = distance(red - (c >> 16 & 0xff), green - (c >> 8 & 0xff), blue - (c & 0xff));
            if (d < least) {
                least = d;
                best = n;
            }
        }
        return best;
    }

    private static double brightness(int c) {
        return 0.299 * (c >> 16 & 0xff) + 0.587 * (c >> 8 & 0xff) + 0.114 * (c & 0xff);
    }
}
