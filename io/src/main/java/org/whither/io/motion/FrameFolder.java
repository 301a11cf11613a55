package org.whither.io.motion;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Locale;
import javax.imageio.ImageIO;

/** Frames as single PNG files, {@code frame-0001.png} and on, in a folder of their own. */
public final class FrameFolder implements FrameFile {
    private final Path folder;
    private int frames;

    /**
     * Begins a folder.
     *
     * @param folder the folder; made where it is missing
     * @throws IOException where it cannot be made
     */
    public FrameFolder(Path folder) throws IOException {
        this.folder = Files.createDirectories(folder);
    }

    @Override
    public void add(BufferedImage frame) throws IOException {
        Path file = folder.resolve(String.format(Locale.ROOT, "frame-%04d.png", ++frames));
        try {
            if (!ImageIO.write(frame, "png", file.toFile())) {
                throw new IOException("this Java has no PNG writer");
            }
        } catch (IOException e) {
            throw GifFile.failure(file, e);
        }
    }

    @Override
    public void finish() {
        // Each file was whole when it was written.
    }

    @Override
    public void abandon() {
        // The folder is removed with the results around it.
    }

    @Override
    public boolean needed() {
        return true;
    }
}
