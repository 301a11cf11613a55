package org.whither.render;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotNull;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.Graphics2D;
import java.awt.RenderingHints;
import java.awt.image.BufferedImage;
import java.io.File;
import java.io.IOException;
import java.io.InputStream;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.function.Supplier;
import javax.imageio.ImageIO;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;

/**
 * Pictures compared with stored ones, small and by how different they look: not that they are right, which other tests
 * measure, but that nobody changed them without looking. {@link #main} writes them anew into a folder, to be looked at.
 */
class GoldenTest {
    private static final SpiralFilm FILM = new SpiralFilm();
    private static final int WIDTH = 200;
    private static final int HEIGHT = 112;

    /** Colour difference that is just seen: 2.3 in CIELAB (Mahy et al. 1994, from memory). */
    private static final double JUST_SEEN = 2.3;

    private static final PictureSettings LIGHT =
            PictureSettings.standard("Invented face").sized(800, 450);
    private static final PictureSettings DARK = LIGHT.on(PictureSettings.Background.DARK);

    /** The pictures. */
    enum Picture {
        PLAN(() -> Plan.draw(FILM, FILM.fed(30, 8), FILM.paths(Frame.ROTATING).subList(0, 3), LIGHT)),
        PLAN_SECTOR(() -> Plan.draw(
                FILM,
                PlanData.of(List.of(), FILM.paths(Frame.ROTATING).subList(0, 3)),
                new PlanSettings(DARK, Quantity.THICKNESS, Part.SECTOR, Optional.empty()))),
        RELIEF(() -> Relief.draw(FILM, FILM.paths(Frame.ROTATING), ReliefSettings.ring(LIGHT))),
        RELIEF_SECTOR(() -> Relief.draw(FILM, FILM.paths(Frame.ROTATING), ReliefSettings.sector(DARK))),
        GAP(() -> Gap.draw(FILM, FILM.paths(Frame.ROTATING), new GapSettings(LIGHT, 1000))),
        MERIDIAN(() ->
                Meridian.draw(FilmFlow.of(FILM.film()), List.of(), MeridianSettings.averaged(DARK.speeds(0, 100))));

        private final Supplier<BufferedImage> draw;

        Picture(Supplier<BufferedImage> draw) {
            this.draw = draw;
        }

        String file() {
            return name().toLowerCase(java.util.Locale.ROOT) + ".png";
        }
    }

    /** A picture made small, each pixel the mean of those it stands for, and with few colours. */
    private static BufferedImage small(BufferedImage image) {
        BufferedImage half = image;
        while (half.getWidth() > WIDTH) {
            int w = Math.max(WIDTH, half.getWidth() / 2);
            int h = Math.max(HEIGHT, half.getHeight() / 2);
            BufferedImage next = new BufferedImage(w, h, BufferedImage.TYPE_INT_RGB);
            Graphics2D pen = next.createGraphics();
            pen.setRenderingHint(RenderingHints.KEY_INTERPOLATION, RenderingHints.VALUE_INTERPOLATION_BILINEAR);
            pen.drawImage(half, 0, 0, w, h, null);
            pen.dispose();
            half = next;
        }
        for (int y = 0; y < half.getHeight(); y++) {
            for (int x = 0; x < half.getWidth(); x++) {
                half.setRGB(x, y, half.getRGB(x, y) & 0xfcfcfc);
            }
        }
        return half;
    }

    @ParameterizedTest
    @EnumSource(Picture.class)
    void picture_looksAsItDid(Picture picture) throws IOException {
        BufferedImage stored;
        try (InputStream in = GoldenTest.class.getResourceAsStream("golden/" + picture.file())) {
            assertNotNull(in, picture.file() + " is stored");
            stored = ImageIO.read(in);
        }
        BufferedImage now = small(picture.draw.get());
        assertEquals(stored.getWidth(), now.getWidth());
        assertEquals(stored.getHeight(), now.getHeight());
        double[] differences = new double[WIDTH * stored.getHeight()];
        double sum = 0;
        for (int y = 0; y < stored.getHeight(); y++) {
            for (int x = 0; x < WIDTH; x++) {
                double d = ColourTest.difference(stored.getRGB(x, y), now.getRGB(x, y), ColourTest.NORMAL);
                differences[y * WIDTH + x] = d;
                sum += d;
            }
        }
        Arrays.sort(differences);
        double most = differences[(int) (0.97 * differences.length)];
        assertTrue(sum / differences.length < 0.5 * JUST_SEEN, "mean difference " + sum / differences.length);
        // Another font moves words by a little; what lies elsewhere must not change.
        assertTrue(most < 4 * JUST_SEEN, "difference of the 97th of a hundred pixels " + most);
    }

    public static void main(String[] arguments) throws IOException {
        for (Picture picture : Picture.values()) {
            ImageIO.write(small(picture.draw.get()), "png", new File(arguments[0], picture.file()));
        }
    }
}
