package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.io.IOException;

/** A file, or a folder of files, that takes the frames of an animation one after another. Used by one thread. */
public interface FrameFile {
    /**
     * Takes the next frame.
     *
     * @param frame the frame, of type {@link BufferedImage#TYPE_INT_RGB}; not modified
     * @throws IOException where it cannot be written
     */
    void add(BufferedImage frame) throws IOException;

    /**
     * Ends the file after the last frame.
     *
     * @throws IOException where it cannot be written whole
     */
    void finish() throws IOException;

    /** Gives up an unfinished file, and lets go of what it holds; nothing after {@link #finish}. */
    void abandon();

    /** Whether the animation is in vain without this file; else the others are finished without it. */
    boolean needed();
}
