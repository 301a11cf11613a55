package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.List;
import java.util.Set;
import java.util.function.DoubleConsumer;
import org.whither.io.motion.FrameFile;
import org.whither.io.motion.FrameFolder;
import org.whither.io.motion.FrameWriters;
import org.whither.io.motion.GifFile;
import org.whither.io.motion.VideoFile;
import org.whither.render.Animation;

/** Draws animations and writes their files, the files beside the drawing. */
final class MotionFiles {
    /** The kinds of files. */
    enum As {
        /** Animated GIF. */
        GIF,
        /** H.264 video. */
        MP4,
        /** Single PNG files. */
        FRAMES
    }

    /**
     * What came of it.
     *
     * @param files names of the files and folders that were written, relative to the folder
     * @param missing a sentence for each file that was asked for and could not be written
     */
    record Written(List<String> files, List<String> missing) {}

    /** Most pixels of all the frames from which the colours of a GIF are chosen, and most such frames. */
    private static final double SAMPLED_PIXELS = 40e6;

    private static final int SAMPLES = 10;

    private MotionFiles() {}

    /**
     * Draws an animation and writes it.
     *
     * @param animation the animation
     * @param into an existing folder
     * @param name name of the files without ending
     * @param title title inside the files
     * @param as which files
     * @param progress is told the share done
     */
    static Written write(Animation animation, Path into, String name, String title, Set<As> as, DoubleConsumer progress)
            throws IOException {
        List<String> names = new ArrayList<>();
        List<String> missing = new ArrayList<>();
        List<FrameFile> files = new ArrayList<>();
        Set<As> possible = EnumSet.copyOf(as);
        if (as.contains(As.MP4) && !VideoFile.possible()) {
            missing.add(VideoFile.MISSING);
            possible.remove(As.MP4);
        }
        FrameFile video = null;
        Path mp4 = into.resolve(name + ".mp4");
        try {
            for (As kind : possible) {
                switch (kind) {
                    case GIF -> {
                        files.add(new GifFile(
                                into.resolve(name + ".gif"),
                                animation.width(),
                                animation.height(),
                                animation.rate(),
                                title + ": " + animation.words(),
                                animation.keyColours(),
                                samples(animation)));
                        names.add(name + ".gif");
                    }
                    case MP4 -> {
                        video = new VideoFile(
                                mp4, animation.width(), animation.height(), animation.rate(), title, animation.words());
                        files.add(video);
                        names.add(name + ".mp4");
                    }
                    case FRAMES -> {
                        files.add(new FrameFolder(into.resolve(name + "-frames")));
                        names.add(name + "-frames");
                    }
                    default -> throw new IllegalStateException("no such file: " + kind);
                }
            }
        } catch (IOException | RuntimeException e) {
            files.forEach(FrameFile::abandon);
            throw e;
        }
        try (FrameWriters writers = new FrameWriters(files)) {
            for (int n = 0; n < animation.frames(); n++) {
                writers.add(animation.draw(n));
                progress.accept((double) (n + 1) / animation.frames());
            }
            for (FrameWriters.GivenUp given : writers.finish()) {
                missing.add(given.sentence());
                if (given.file() == video) {
                    names.remove(name + ".mp4");
                    Files.deleteIfExists(mp4);
                }
            }
        }
        return new Written(names, missing);
    }

    private static List<BufferedImage> samples(Animation animation) {
        double pixels = (double) animation.width() * animation.height();
        int count = (int) Math.max(1, Math.min(Math.min(SAMPLES, animation.frames()), SAMPLED_PIXELS / pixels));
        List<BufferedImage> samples = new ArrayList<>();
        for (int n = 0; n < count; n++) {
            samples.add(animation.draw((int) ((n + 0.5) * animation.frames() / count)));
        }
        return samples;
    }
}
