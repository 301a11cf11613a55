package org.whither.render;

import java.awt.image.BufferedImage;
import java.io.File;
import java.io.IOException;
import java.util.List;
import java.util.Optional;
import javax.imageio.ImageIO;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;

/** Writes every kind of picture of the invented film into a folder, to be looked at. */
final class Gallery {
    private Gallery() {}

    public static void main(String[] arguments) throws IOException {
        long start = System.nanoTime();
        File folder = new File(arguments[0]);
        int finer = arguments.length > 2 ? Integer.parseInt(arguments[2]) : 1;
        SpiralFilm film = new SpiralFilm(12, 12000 * Math.PI / 30, true, Face.STATOR, finer);
        if (arguments.length > 1 && arguments[1].contains("others")) {
            others(folder);
            return;
        }
        int[][] sizes = {{1280, 720}, {640, 360}, {7680, 4320}};
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
                for (Part part : Part.values()) {
                    if (arguments.length < 2 || arguments[1].contains("thickness")) {
                        PlanSettings how = new PlanSettings(settings, Quantity.THICKNESS, part, Optional.empty());
                        BufferedImage plan = Plan.draw(film, PlanData.of(List.of(), List.of()), how);
                        say("thickness" + end, start);
                        start = write(plan, new File(folder, "thickness-" + part + end));
                    }
                }
                if (arguments.length < 2 || arguments[1].contains("relief")) {
                    BufferedImage ring = Relief.draw(film, film.paths(Frame.ROTATING), ReliefSettings.ring(settings));
                    say("relief" + end, start);
                    start = write(ring, new File(folder, "relief" + end));
                    BufferedImage sector =
                            Relief.draw(film, film.paths(Frame.ROTATING), ReliefSettings.sector(settings));
                    start = write(sector, new File(folder, "relief-sector" + end));
                }
                if (arguments.length < 2 || arguments[1].contains("meridian")) {
                    BufferedImage section =
                            Meridian.draw(FilmFlow.of(film.film()), List.of(), MeridianSettings.averaged(settings));
                    say("meridian" + end, start);
                    start = write(section, new File(folder, "meridian" + end));
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

    /** Films of other kinds, seen from the other side, with other exaggerations. */
    private static void others(File folder) throws IOException {
        PictureSettings settings = PictureSettings.standard("Another invented face, to test the pictures");
        SpiralFilm usual = new SpiralFilm();
        for (double factor : new double[] {1, 150, 4000}) {
            write(
                    Gap.draw(
                            usual,
                            usual.paths(Frame.STATIONARY),
                            new GapSettings(settings.speedsIn(Frame.STATIONARY), factor)),
                    new File(folder, "gap-times-" + Math.round(factor) + ".png"));
        }
        write(
                Plan.draw(
                        usual,
                        usual.fed(90, 30),
                        usual.paths(Frame.ROTATING),
                        settings.from(ViewingSide.ROTOR).pressures(2e5, 9e5)),
                new File(folder, "plan-from-rotor.png"));
        SpiralFilm named = SpiralFilm.withLongNames();
        write(
                Plan.draw(named, named.fed(30, 8), named.paths(Frame.ROTATING), settings),
                new File(folder, "plan-names.png"));
        write(
                Gap.draw(named, named.paths(Frame.ROTATING), new GapSettings(settings, 1000)),
                new File(folder, "gap-names.png"));
        SpiralFilm smooth = new SpiralFilm(12, -1000, false, Face.ROTOR);
        write(
                Gap.draw(smooth, smooth.paths(Frame.ROTATING), new GapSettings(settings, 1000)),
                new File(folder, "gap-smooth.png"));
        write(
                Plan.draw(smooth, smooth.fed(30, 8), smooth.paths(Frame.ROTATING), settings),
                new File(folder, "plan-smooth.png"));
        SpiralFilm whole = new SpiralFilm(1, 0, true, Face.STATOR);
        write(
                Gap.draw(whole, whole.paths(Frame.ROTATING), new GapSettings(settings, 1000)),
                new File(folder, "gap-whole.png"));
        write(Plan.draw(whole, java.util.List.of(), java.util.List.of(), settings), new File(folder, "plan-whole.png"));
    }

    private static void say(String what, long start) {
        System.out.printf("%-28s %d ms%n", what, (System.nanoTime() - start) / 1_000_000);
    }

    private static long write(BufferedImage image, File file) throws IOException {
        ImageIO.write(image, "png", file);
        return System.nanoTime();
    }
}
