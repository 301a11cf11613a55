package org.whither.io.command;

import java.io.IOException;
import java.nio.file.Path;
import java.util.EnumSet;
import java.util.List;
import java.util.regex.Matcher;
import org.whither.io.motion.VideoFile;
import org.whither.render.Animation;
import org.whither.render.MotionSettings;
import org.whither.render.NoOpenGL;
import org.whither.render.PictureSettings;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** An animation beside a page: the ride behind gas from where most enters. */
final class RideOption {
    private static final String NAME = "ride";
    private static final double RATE = 25;

    @Spec(Spec.Target.MIXEE)
    private CommandSpec spec;

    @Option(
            names = "--ride",
            description =
                    "Make an animation beside the page, as command ride does: behind one piece of gas, as ride.gif"
                            + " and, where ffmpeg is there, ride.mp4. With --compare it follows gas of FIELD.")
    private boolean asked;

    @Option(
            names = "--ride-size",
            paramLabel = "WxH",
            defaultValue = "1280x720",
            description = "Size of the animation in pixels (default: ${DEFAULT-VALUE}).")
    private String size;

    @Option(
            names = "--ride-length",
            paramLabel = "S",
            defaultValue = "10",
            description = "Length of the animation in seconds (default: ${DEFAULT-VALUE}).")
    private double length;

    boolean asked() {
        return asked;
    }

    /**
     * How the animation is to be, checked before anything is computed.
     *
     * @throws ParameterException where size or length are of no use
     */
    MotionSettings settings(TracingOptions tracing) {
        Matcher matcher = RideCommand.SIZE.matcher(size);
        if (!matcher.matches()) {
            throw new ParameterException(
                    spec.commandLine(), "--ride-size is \"" + size + "\"; expected two whole numbers such as 1280x720");
        }
        try {
            PictureSettings picture = PictureSettings.standard("")
                    .sized(Integer.parseInt(matcher.group(1)), Integer.parseInt(matcher.group(2)))
                    .speedsIn(tracing.frame());
            return MotionSettings.standard(picture).lasting(length, RATE);
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--ride: " + e.getMessage());
        }
    }

    /** The part of the command line that asks for the same, with a space before it; empty where nothing is asked for. */
    String words() {
        return asked ? " --ride --ride-size " + size + " --ride-length " + length : "";
    }

    /**
     * Draws the animation and writes its files.
     *
     * @param title title of the animation
     * @param into an existing folder
     * @return the files, the one to look at first in front, and a sentence for each that could not be made
     */
    static MotionFiles.Written write(
            FieldInput input, String title, TracingOptions tracing, MotionSettings settings, Talk talk, Path into)
            throws IOException {
        MotionSettings titled = settings.in(RideCommand.titled(settings.picture(), title));
        try (Animation animation = RideCommand.ride(input.flow(), tracing, RideCommand.RIDE_TRACERS, titled);
                Talk.Stretch stretch = talk.begin("Drawing " + animation.frames() + " frames")) {
            MotionFiles.Written written = MotionFiles.write(
                    animation, into, NAME, title, EnumSet.of(MotionFiles.As.GIF, MotionFiles.As.MP4), stretch);
            // A video can be stopped and is smaller.
            return new MotionFiles.Written(
                    written.files().stream()
                            .sorted((a, b) -> Boolean.compare(b.endsWith(".mp4"), a.endsWith(".mp4")))
                            .toList(),
                    written.missing());
        } catch (NoOpenGL e) {
            return new MotionFiles.Written(List.of(), List.of(e.getMessage()));
        } catch (IllegalArgumentException e) {
            return new MotionFiles.Written(List.of(), List.of("There is no animation: " + e.getMessage()));
        }
    }

    /** Whether what is missing was asked for: a video is made where it can be. */
    static boolean fallsShort(List<String> missing) {
        return !missing.stream().allMatch(VideoFile.MISSING::equals);
    }
}
