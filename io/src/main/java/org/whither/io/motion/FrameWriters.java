package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.ArrayBlockingQueue;
import java.util.concurrent.BlockingQueue;

/**
 * Writes the frames of an animation to several files at once, each on a thread of its own beside the drawing. Where a file
 * falls behind by a few frames, the drawing waits.
 *
 * <p>A file that fails and is needed ends the whole; one that is not needed is given up, and told by {@link #finish}.
 */
public final class FrameWriters implements AutoCloseable {
    /** Frames that may wait for a file. */
    private static final int WAITING = 4;

    private static final BufferedImage END = new BufferedImage(1, 1, BufferedImage.TYPE_INT_RGB);

    private final List<Writer> writers = new ArrayList<>();

    /** One file and its thread. */
    private static final class Writer {
        final FrameFile file;
        final BlockingQueue<BufferedImage> frames = new ArrayBlockingQueue<>(WAITING);
        final Thread thread;
        volatile Throwable failure;

        Writer(FrameFile file) {
            this.file = file;
            this.thread = new Thread(this::work, "writes " + file.getClass().getSimpleName());
            thread.setDaemon(true);
            thread.start();
        }

        private void work() {
            try {
                while (true) {
                    BufferedImage frame = frames.take();
                    boolean end = frame == END;
                    if (failure == null) {
                        write(frame, end);
                    }
                    if (end) {
                        return;
                    }
                }
            } catch (InterruptedException e) {
                file.abandon();
            }
        }

        private void write(BufferedImage frame, boolean end) {
            try {
                if (end) {
                    file.finish();
                } else {
                    file.add(frame);
                }
            } catch (IOException | RuntimeException | OutOfMemoryError e) {
                failure = e;
                file.abandon();
            }
        }
    }

    /**
     * Begins.
     *
     * @param files the files; taken charge of
     */
    public FrameWriters(List<FrameFile> files) {
        files.forEach(file -> writers.add(new Writer(file)));
    }

    /**
     * Takes the next frame, which must not be changed afterwards.
     *
     * @param frame the frame
     * @throws IOException where a needed file has failed
     */
    public void add(BufferedImage frame) throws IOException {
        for (Writer writer : writers) {
            check(writer);
            put(writer, frame);
        }
    }

    private static void put(Writer writer, BufferedImage frame) throws IOException {
        try {
            writer.frames.put(frame);
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new IOException("interrupted while the animation was written", e);
        }
    }

    private static void check(Writer writer) throws IOException {
        Throwable failure = writer.failure;
        if (failure == null || (!writer.file.needed() && failure instanceof IOException)) {
            return;
        }
        if (failure instanceof IOException e) {
            throw e;
        }
        if (failure instanceof OutOfMemoryError e) {
            throw e;
        }
        throw (RuntimeException) failure;
    }

    /**
     * Waits until all files are whole.
     *
     * @return the files that were given up, in the order given, each with the sentence that says why; usually empty
     * @throws IOException where a needed file has failed
     */
    public List<GivenUp> finish() throws IOException {
        for (Writer writer : writers) {
            put(writer, END);
        }
        List<GivenUp> given = new ArrayList<>();
        for (Writer writer : writers) {
            try {
                writer.thread.join();
            } catch (InterruptedException e) {
                Thread.currentThread().interrupt();
                throw new IOException("interrupted while the animation was written", e);
            }
            check(writer);
            if (writer.failure != null) {
                given.add(new GivenUp(writer.file, writer.failure.getMessage()));
            }
        }
        return given;
    }

    /**
     * A file that was not finished.
     *
     * @param file the file
     * @param sentence what is said to the user
     */
    public record GivenUp(FrameFile file, String sentence) {}

    /** Gives up what is not finished. */
    @Override
    public void close() {
        for (Writer writer : writers) {
            writer.thread.interrupt();
        }
        for (Writer writer : writers) {
            try {
                // A pipe to a program that does not read is not interrupted.
                writer.thread.join(200);
                writer.file.abandon();
                writer.thread.join(5000);
            } catch (InterruptedException e) {
                Thread.currentThread().interrupt();
            }
        }
    }
}
