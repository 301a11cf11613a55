package org.whither.render;

import java.awt.image.BufferedImage;
import java.util.List;

/**
 * A moving picture of a film: frames that are drawn one by one, in any order, from one scene whose meshes are built and
 * sent to OpenGL once. Used by one thread; releases what it holds when closed.
 */
public interface Animation extends AutoCloseable {
    /** Width of the frames (pixels). */
    int width();

    /** Height of the frames (pixels). */
    int height();

    /** How many frames there are. */
    int frames();

    /** Frames a second. */
    double rate();

    /**
     * Draws a frame.
     *
     * @param number its number, from 0
     * @return the frame, opaque, of type {@link BufferedImage#TYPE_INT_RGB}
     */
    BufferedImage draw(int number);

    /** Colours that carry numbers or meanings, which a file should keep as they are; sRGB 0xRRGGBB. */
    List<Integer> keyColours();

    /** What is shown and how much slower than the gas, in a few words for the inside of a file. */
    String words();

    @Override
    void close();
}
