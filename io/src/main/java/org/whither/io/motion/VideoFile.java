package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.concurrent.TimeUnit;

/**
 * An MP4 file with H.264 video (ITU-T H.264), written by the program {@code ffmpeg}, which is handed the frames as raw
 * pixels. Colours are coded by ITU-R BT.709 with the limited range, chroma at half the resolution (what players
 * everywhere show), and the file says so. Sizes are made even. The index stands first, so that it plays while it loads.
 */
public final class VideoFile implements FrameFile {
    /** What is said where the program is missing. */
    public static final String MISSING =
            "MP4 needs the program ffmpeg, which is not on this machine: on Debian or Ubuntu install the package ffmpeg.";

    /** Quality, as libx264 counts it: lower is better; 18 is taken for visually lossless (common practice). */
    private static final String QUALITY = "17";

    private static final int MOST_WORDS = 4000;

    private final Path file;
    private final int width;
    private final int height;
    private final Process process;
    private final OutputStream pixels;
    private final ByteBuffer buffer;
    private final Thread listener;
    private final StringBuilder words = new StringBuilder();
    private boolean open = true;

    /** Whether the program is there and starts. */
    public static boolean possible() {
        return possible("ffmpeg");
    }

    static boolean possible(String program) {
        try {
            Process process = new ProcessBuilder(program, "-version")
                    .redirectErrorStream(true)
                    .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                    .start();
            process.getOutputStream().close();
            boolean ended = process.waitFor(20, TimeUnit.SECONDS);
            if (!ended) {
                process.destroyForcibly();
            }
            return ended && process.exitValue() == 0;
        } catch (IOException e) {
            return false;
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            return false;
        }
    }

    /**
     * Begins a file.
     *
     * @param file where it is written; replaced where it exists
     * @param width width of the frames (pixels)
     * @param height height of the frames (pixels)
     * @param rate frames a second
     * @param title title inside the file
     * @param comment what is said of the animation inside the file
     * @throws IOException where the program cannot be started
     */
    public VideoFile(Path file, int width, int height, double rate, String title, String comment) throws IOException {
        this("ffmpeg", file, width, height, rate, title, comment);
    }

    VideoFile(String program, Path file, int width, int height, double rate, String title, String comment)
            throws IOException {
        this.file = file;
        this.width = width;
        this.height = height;
        this.buffer = ByteBuffer.allocate(4 * width * height).order(ByteOrder.LITTLE_ENDIAN);
        try {
            this.process = new ProcessBuilder(command(program, title, comment, rate))
                    .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                    .start();
        } catch (IOException e) {
            throw new IOException(MISSING, e);
        }
        this.pixels = process.getOutputStream();
        this.listener = new Thread(this::listen, "what ffmpeg says");
        listener.setDaemon(true);
        listener.start();
    }

    private List<String> command(String program, String title, String comment, double rate) {
        List<String> command =
                new ArrayList<>(List.of(program, "-hide_banner", "-loglevel", "error", "-nostdin", "-y"));
        command.addAll(List.of("-f", "rawvideo", "-pixel_format", "bgr0"));
        command.addAll(List.of("-video_size", width + "x" + height));
        command.addAll(List.of("-framerate", String.format(Locale.ROOT, "%.6f", rate), "-i", "pipe:0"));
        String even = "pad=ceil(iw/2)*2:ceil(ih/2)*2:0:0:white,";
        command.addAll(List.of(
                "-vf",
                (width % 2 + height % 2 > 0 ? even : "")
                        + "scale=out_color_matrix=bt709:out_range=tv:flags=bicubic+accurate_rnd+full_chroma_int"
                        + ",format=yuv420p"));
        command.addAll(List.of("-c:v", "libx264", "-preset", "faster", "-crf", QUALITY, "-pix_fmt", "yuv420p"));
        command.addAll(List.of("-color_primaries", "bt709", "-color_trc", "bt709", "-colorspace", "bt709"));
        command.addAll(List.of("-color_range", "tv", "-movflags", "+faststart"));
        command.addAll(List.of("-metadata", "title=" + title, "-metadata", "comment=" + comment));
        command.addAll(List.of("-f", "mp4", file.toAbsolutePath().toString()));
        return command;
    }

    private void listen() {
        try (InputStream in = process.getErrorStream()) {
            byte[] some = new byte[1024];
            for (int n = in.read(some); n >= 0; n = in.read(some)) {
                synchronized (words) {
                    if (words.length() < MOST_WORDS) {
                        words.append(new String(some, 0, n, StandardCharsets.UTF_8));
                    }
                }
            }
        } catch (IOException e) {
            return; // it has ended; its exit status tells how
        }
    }

    @Override
    public void add(BufferedImage frame) throws IOException {
        buffer.clear();
        buffer.asIntBuffer().put(Palette.pixels(frame));
        try {
            pixels.write(buffer.array());
        } catch (IOException e) {
            abandon();
            throw failed(e);
        }
    }

    @Override
    public void finish() throws IOException {
        IOException broken = null;
        try {
            pixels.close();
        } catch (IOException e) {
            broken = e;
        }
        int status;
        try {
            status = process.waitFor();
            listener.join(2000);
        } catch (InterruptedException e) {
            abandon();
            Thread.currentThread().interrupt();
            throw failed(new IOException("interrupted", e));
        }
        open = false;
        if (status != 0 || broken != null) {
            throw failed(broken);
        }
    }

    /** One sentence with the first thing that the program said. */
    private IOException failed(IOException cause) {
        try {
            listener.join(2000);
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
        }
        String said;
        synchronized (words) {
            said = words.toString().strip();
        }
        int line = said.indexOf('\n');
        String first = (line < 0 ? said : said.substring(0, line)).strip();
        String reason;
        if (said.contains("Unknown encoder")) {
            reason =
                    "this machine's ffmpeg has no H.264 encoder libx264; on Debian or Ubuntu install the package ffmpeg";
        } else if (said.contains("No space left")) {
            reason = "no space is left on the disk; free some or name another folder";
        } else {
            reason = "ffmpeg ended before its time" + (first.isEmpty() ? "" : " (" + first + ")") + "; try again";
        }
        return new IOException(file.getFileName() + " was not written: " + reason, cause);
    }

    @Override
    public void abandon() {
        if (!open) {
            return;
        }
        open = false;
        process.destroyForcibly();
        try {
            pixels.close();
        } catch (IOException e) {
            // what was still to be written is in vain
        }
        try {
            process.waitFor(2, TimeUnit.SECONDS); // it writes no more when its file is taken away
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
        }
    }

    /** The process, for tests that end it. */
    ProcessHandle process() {
        return process.toHandle();
    }

    @Override
    public boolean needed() {
        return false;
    }
}
