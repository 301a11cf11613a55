/**
 * Files of moving pictures: animated GIF, MP4 by way of the program {@code ffmpeg}, and single frames as PNG.
 *
 * <p>{@link org.whither.io.motion.FrameWriters} writes several of them at once, each on a thread of its own beside the
 * drawing. Colours carry numbers here, so they are kept: a GIF's palette is made for the whole animation and holds the
 * colours that matter exactly, its dithering stands still where the picture does, and an MP4 says by which standard
 * (ITU-R BT.709) its colours are coded.
 *
 * <p><b>Words.</b> A <em>frame</em> is one picture of an animation; the <em>rate</em> is in frames a second.
 */
package org.whither.io.motion;
