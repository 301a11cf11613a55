package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.awt.image.DataBufferByte;
import java.awt.image.IndexColorModel;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.Collection;
import java.util.List;
import javax.imageio.IIOImage;
import javax.imageio.ImageIO;
import javax.imageio.ImageTypeSpecifier;
import javax.imageio.ImageWriteParam;
import javax.imageio.ImageWriter;
import javax.imageio.metadata.IIOMetadata;
import javax.imageio.metadata.IIOMetadataNode;
import javax.imageio.stream.ImageOutputStream;

/**
 * An animated GIF (version 89a) that runs for ever, with one palette for all frames. Of each frame only the part that
 * changed is written. A GIF counts hundredths of a second: frames last so long that the whole keeps its length.
 */
public final class GifFile implements FrameFile {
    /** Highest rate: players show shorter frames more slowly. */
    public static final double MOST_RATE = 50;

    /** Unchanged pixels in a row that are worth leaving out; fewer only disturb the compression. */
    private static final int LEAST_RUN = 6;

    private final Path file;
    private final int width;
    private final int height;
    private final double rate;
    private final String comment;
    private final Palette palette;
    private final IndexColorModel model;
    private final ImageWriter writer;
    private final ImageOutputStream stream;
    private byte[] shown;
    private byte[] next;
    private int frames;
    private boolean open = true;

    /**
     * Begins a file.
     *
     * @param file where it is written; replaced where it exists
     * @param width width of the frames (pixels)
     * @param height height of the frames (pixels)
     * @param rate frames a second, above 0 and at most {@value #MOST_RATE}
     * @param comment what is said of the animation inside the file
     * @param exact colours that must be right to the last bit, sRGB 0xRRGGBB
     * @param samples frames from all over the animation, from which the other colours are chosen
     * @throws IOException where the file cannot be written
     */
    public GifFile(
            Path file,
            int width,
            int height,
            double rate,
            String comment,
            Collection<Integer> exact,
            List<BufferedImage> samples)
            throws IOException {
        if (!(rate > 0 && rate <= MOST_RATE)) {
            throw new IllegalArgumentException(
                    rate + " frames a second; a GIF takes more than 0, at most " + MOST_RATE);
        }
        this.file = file;
        this.width = width;
        this.height = height;
        this.rate = rate;
        this.comment = comment;
        this.palette = Palette.of(exact, samples);
        this.model = palette.model();
        this.next = new byte[width * height];
        this.writer = ImageIO.getImageWritersByFormatName("gif").next();
        ImageOutputStream opened = null;
        try {
            Files.newOutputStream(file).close(); // what was there goes, whatever its length
            opened = ImageIO.createImageOutputStream(file.toFile());
            if (opened == null) {
                throw new IOException("this Java cannot open it for writing");
            }
            writer.setOutput(opened);
            writer.prepareWriteSequence(heading());
        } catch (IOException e) {
            writer.dispose();
            if (opened != null) {
                closeQuietly(opened);
            }
            throw failure(file, e);
        }
        this.stream = opened;
    }

    /** One sentence with the innermost reason, which the operating system gave. */
    static IOException failure(Path file, IOException cause) {
        Throwable reason = cause;
        while (reason.getCause() instanceof IOException inner) {
            reason = inner;
        }
        return new IOException(
                file.getFileName() + " cannot be written: " + reason.getMessage()
                        + "; free space on the disk or name another folder",
                cause);
    }

    private IIOMetadata heading() throws IOException {
        ImageWriteParam how = writer.getDefaultWriteParam();
        IIOMetadata metadata = writer.getDefaultStreamMetadata(how);
        String format = metadata.getNativeMetadataFormatName();
        IIOMetadataNode root = (IIOMetadataNode) metadata.getAsTree(format);
        IIOMetadataNode screen = child(root, "LogicalScreenDescriptor");
        screen.setAttribute("logicalScreenWidth", Integer.toString(width));
        screen.setAttribute("logicalScreenHeight", Integer.toString(height));
        screen.setAttribute("colorResolution", "8");
        screen.setAttribute("pixelAspectRatio", "0");
        IIOMetadataNode table = child(root, "GlobalColorTable");
        table.setAttribute("sizeOfGlobalColorTable", "256");
        table.setAttribute("backgroundColorIndex", "0");
        table.setAttribute("sortFlag", "FALSE");
        while (table.getFirstChild() != null) {
            table.removeChild(table.getFirstChild());
        }
        for (int n = 0; n < 256; n++) {
            IIOMetadataNode entry = new IIOMetadataNode("ColorTableEntry");
            entry.setAttribute("index", Integer.toString(n));
            entry.setAttribute("red", Integer.toString(model.getRed(n)));
            entry.setAttribute("green", Integer.toString(model.getGreen(n)));
            entry.setAttribute("blue", Integer.toString(model.getBlue(n)));
            table.appendChild(entry);
        }
        metadata.setFromTree(format, root);
        return metadata;
    }

    private static IIOMetadataNode child(IIOMetadataNode parent, String name) {
        for (int n = 0; n < parent.getLength(); n++) {
            if (parent.item(n).getNodeName().equals(name)) {
                return (IIOMetadataNode) parent.item(n);
            }
        }
        IIOMetadataNode made = new IIOMetadataNode(name);
        parent.appendChild(made);
        return made;
    }

    @Override
    public void add(BufferedImage frame) throws IOException {
        palette.index(Palette.pixels(frame), width, next);
        int[] changed = changed();
        int x = changed[0];
        int y = changed[1];
        int w = changed[2];
        int h = changed[3];
        BufferedImage part = new BufferedImage(w, h, BufferedImage.TYPE_BYTE_INDEXED, model);
        byte[] target = ((DataBufferByte) part.getRaster().getDataBuffer()).getData();
        for (int row = 0; row < h; row++) {
            System.arraycopy(next, (y + row) * width + x, target, row * w, w);
            if (shown != null) {
                leaveOut(target, row * w, (y + row) * width + x, w);
            }
        }
        try {
            writer.writeToSequence(new IIOImage(part, null, placed(part, x, y)), null);
        } catch (IOException e) {
            throw failure(file, e);
        }
        byte[] before = shown == null ? new byte[width * height] : shown;
        shown = next;
        next = before;
        frames++;
    }

    /** The smallest rectangle that holds all pixels that changed: x, y, width, height; at least one pixel. */
    private int[] changed() {
        if (shown == null) {
            return new int[] {0, 0, width, height};
        }
        int left = width;
        int right = -1;
        int upper = height;
        int lower = -1;
        for (int y = 0; y < height; y++) {
            int first = Arrays.mismatch(next, y * width, (y + 1) * width, shown, y * width, (y + 1) * width);
            if (first < 0) {
                continue;
            }
            upper = Math.min(upper, y);
            lower = y;
            left = Math.min(left, first);
            int last = width - 1;
            while (last > right && next[y * width + last] == shown[y * width + last]) {
                last--;
            }
            right = Math.max(right, last);
        }
        return lower < 0 ? new int[] {0, 0, 1, 1} : new int[] {left, upper, right - left + 1, lower - upper + 1};
    }

    /** Leaves out of a row the longer runs of pixels that stay as they are. */
    private void leaveOut(byte[] target, int to, int from, int count) {
        int run = 0;
        for (int n = 0; n <= count; n++) {
            if (n < count && next[from + n] == shown[from + n]) {
                run++;
                continue;
            }
            if (run >= LEAST_RUN) {
                Arrays.fill(target, to + n - run, to + n, (byte) Palette.UNCHANGED);
            }
            run = 0;
        }
    }

    private IIOMetadata placed(BufferedImage part, int x, int y) throws IOException {
        IIOMetadata metadata = writer.getDefaultImageMetadata(new ImageTypeSpecifier(part), null);
        String format = metadata.getNativeMetadataFormatName();
        IIOMetadataNode root = (IIOMetadataNode) metadata.getAsTree(format);
        IIOMetadataNode place = child(root, "ImageDescriptor");
        place.setAttribute("imageLeftPosition", Integer.toString(x));
        place.setAttribute("imageTopPosition", Integer.toString(y));
        place.setAttribute("imageWidth", Integer.toString(part.getWidth()));
        place.setAttribute("imageHeight", Integer.toString(part.getHeight()));
        place.setAttribute("interlaceFlag", "FALSE");
        IIOMetadataNode control = child(root, "GraphicControlExtension");
        control.setAttribute("disposalMethod", "doNotDispose");
        control.setAttribute("userInputFlag", "FALSE");
        control.setAttribute("transparentColorFlag", frames == 0 ? "FALSE" : "TRUE");
        control.setAttribute("transparentColorIndex", frames == 0 ? "0" : Integer.toString(Palette.UNCHANGED));
        long until = Math.round(100 * (frames + 1) / rate);
        control.setAttribute("delayTime", Long.toString(until - Math.round(100 * frames / rate)));
        if (frames == 0) {
            IIOMetadataNode extensions = child(root, "ApplicationExtensions");
            IIOMetadataNode loop = new IIOMetadataNode("ApplicationExtension");
            loop.setAttribute("applicationID", "NETSCAPE");
            loop.setAttribute("authenticationCode", "2.0");
            loop.setUserObject(new byte[] {1, 0, 0}); // again and again without end
            extensions.appendChild(loop);
            IIOMetadataNode comments = child(root, "CommentExtensions");
            IIOMetadataNode words = new IIOMetadataNode("CommentExtension");
            // The writer takes one byte a letter; readers of today take them for UTF-8.
            words.setAttribute(
                    "value", new String(comment.getBytes(StandardCharsets.UTF_8), StandardCharsets.ISO_8859_1));
            comments.appendChild(words);
        }
        metadata.setFromTree(format, root);
        return metadata;
    }

    @Override
    public void finish() throws IOException {
        open = false;
        try {
            writer.endWriteSequence();
            stream.close();
        } catch (IOException e) {
            closeQuietly(stream);
            throw failure(file, e);
        } finally {
            writer.dispose();
        }
    }

    @Override
    public void abandon() {
        if (open) {
            open = false;
            writer.dispose();
            closeQuietly(stream);
        }
    }

    private static void closeQuietly(ImageOutputStream stream) {
        try {
            stream.close();
        } catch (IOException e) {
            return; // the failure that led here is the one to be told
        }
    }

    @Override
    public boolean needed() {
        return true;
    }
}
