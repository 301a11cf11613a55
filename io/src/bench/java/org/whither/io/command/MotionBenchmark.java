package org.whither.io.command;

import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Comparator;
import java.util.EnumSet;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.whither.fate.ReleasePlan;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.render.Animation;
import org.whither.render.LetGo;
import org.whither.render.MotionSettings;
import org.whither.render.PictureSettings;
import org.whither.render.Ride;
import org.whither.render.Turn;
import org.whither.samples.SampleSeals;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/**
 * How long animations of the demo seal take at 1280 × 720: drawing alone, and drawing with the files written beside it.
 * Arguments: number of frames (240), kinds with commas between (ride-gap,ride-relief,turn-gap,release-gap).
 */
final class MotionBenchmark {
    private MotionBenchmark() {}

    public static void main(String[] arguments) throws Exception {
        int frames = arguments.length > 0 ? Integer.parseInt(arguments[0]) : 240;
        String kinds = arguments.length > 1 ? arguments[1] : "ride-gap,ride-relief,turn-gap,release-gap";
        FilmFlow flow = FilmFlow.of(
                SampleSeals.compute("spiral", null, null, share -> {}).film());
        TraceSettings how = Pictures.settings(flow, Frame.ROTATING, 1e-6);
        Tracer tracer = new Tracer(flow, how);
        List<org.whither.trace.Path> paths =
                ReleasePlan.entering(flow, PathEnd.Border.SUPPLY).releases(1, 0, 300).stream()
                        .map((Release release) -> tracer.record(release))
                        .toList();
        org.whither.trace.Path followed =
                PathChoice.choose(paths.subList(0, 64), 1).get(0);
        MotionSettings settings = MotionSettings.standard(PictureSettings.standard("Invented seal"))
                .lasting(frames / 25.0, 25);
        for (String kind : kinds.split(",")) {
            MotionSettings over =
                    settings.over(kind.endsWith("relief") ? MotionSettings.Ground.RELIEF : MotionSettings.Ground.GAP);
            Path folder = Files.createTempDirectory("motion");
            try {
                long start = System.nanoTime();
                Animation animation = kind.startsWith("ride")
                        ? Ride.of(flow, followed, "since the start", paths, over)
                        : kind.startsWith("turn")
                                ? Turn.of(flow, paths.subList(0, 12), over)
                                : LetGo.of(flow, paths, "since the start", over);
                long built = System.nanoTime();
                try (animation) {
                    int some = Math.min(20, frames);
                    for (int n = 0; n < some; n++) {
                        animation.draw(n * frames / some);
                    }
                    long drawn = System.nanoTime();
                    MotionFiles.Written written = MotionFiles.write(
                            animation,
                            folder,
                            "motion",
                            "motion",
                            EnumSet.of(MotionFiles.As.GIF, MotionFiles.As.MP4),
                            share -> {});
                    long done = System.nanoTime();
                    System.out.printf(
                            Locale.ROOT,
                            "%s: built %.1f s; drawing alone %.0f ms a frame; %d frames with files %.1f s, %.0f ms a frame;"
                                    + " gif %.1f MB, mp4 %.1f MB%n",
                            kind,
                            1e-9 * (built - start),
                            1e-6 * (drawn - built) / some,
                            animation.frames(),
                            1e-9 * (done - drawn),
                            1e-6 * (done - drawn) / animation.frames(),
                            1e-6 * Files.size(folder.resolve("motion.gif")),
                            written.files().contains("motion.mp4")
                                    ? 1e-6 * Files.size(folder.resolve("motion.mp4"))
                                    : 0);
                }
            } finally {
                try (Stream<Path> all = Files.walk(folder)) {
                    for (Path path : all.sorted(Comparator.reverseOrder()).toList()) {
                        Files.delete(path);
                    }
                }
            }
        }
    }
}
