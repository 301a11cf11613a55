package org.whither.render;

import java.awt.image.BufferedImage;
import java.io.File;
import java.io.IOException;
import javax.imageio.ImageIO;
import org.whither.film.Frame;

/** Writes every kind of picture of the invented film into a folder, to be looked at. */
final class Gallery {
    private Gallery() {}

    public static void main(String[] arguments) throws IOException {
        long start = System.nanoTime();
        File folder = new File(arguments[0]);
        SpiralFilm film = new SpiralFilm();
        int[][] sizes = {{1280, 720}, {1920, 1080}, {800, 450}};
        for (int[] size : sizes) {
            for (PictureSettings.Background background : PictureSettings.Background.values()) {
                PictureSettings settings = PictureSettings.standard("Invented spiral-groove face")
                        .sized(size[0], size[1])
                        .on(background);
                String end = "-" + size[0] + "-" + background.name().toLowerCase(java.util.Locale.ROOT) + ".png";
                if (arguments.length < 2 || arguments[1].contains("plan")) {
                    BufferedImage plan = Plan.draw(
                            film, film.fed(44, 12), film.paths(Frame.ROTATING).subList(0, 4), settings);
                    say("plan" + end, start);
                    start = write(plan, new File(folder, "plan" + end));
                }
                if (arguments.length < 2 || arguments[1].contains("gap")) {
                    BufferedImage gap =
                            Gap.draw(film, film.paths(Frame.ROTATING), new GapSettings(settings, GapSettings.USUAL));
                    say("gap" + end, start);
                    start = write(gap, new File(folder, "gap" + end));
                }
            }
        }
    }

    private static void say(String what, long start) {
        System.out.printf("%-28s %d ms%n", what, (System.nanoTime() - start) / 1_000_000);
    }

    private static long write(BufferedImage image, File file) throws IOException {
        ImageIO.write(image, "png", file);
        return System.nanoTime();
    }
}
