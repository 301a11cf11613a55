package org.whither.io.picture;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Path;
import java.util.LinkedHashMap;
import java.util.Map;
import javax.imageio.IIOImage;
import javax.imageio.ImageIO;
import javax.imageio.ImageTypeSpecifier;
import javax.imageio.ImageWriter;
import javax.imageio.metadata.IIOMetadata;
import javax.imageio.metadata.IIOMetadataNode;
import javax.imageio.stream.ImageOutputStream;

/**
 * Pictures as PNG files that carry their facts as international text (iTXt chunks of the PNG standard, ISO/IEC 15948):
 * Title, Description (the JSON from which the picture can be made again), Source, Disclaimer, Software.
 */
public final class PngFile {
    private static final String FORMAT = "javax_imageio_png_1.0";

    private PngFile() {}

    /**
     * Writes a picture with its description and facts.
     *
     * @param image the picture
     * @param picture what it shows
     * @param facts where it came from
     * @param file where to write it
     * @throws IOException where it cannot be written
     */
    public static void write(BufferedImage image, PictureDescription picture, PictureFacts facts, Path file)
            throws IOException {
        Map<String, String> words = new LinkedHashMap<>();
        words.put("Title", facts.title());
        words.put("Description", PictureJson.text(picture, facts));
        words.put("Source", facts.field().toString());
        words.put("Disclaimer", facts.caution());
        words.put("Software", "whither");
        write(image, words, file);
    }

    /** Writes a picture with texts under the keywords of the PNG standard. */
    public static void write(BufferedImage image, Map<String, String> words, Path file) throws IOException {
        ImageWriter writer = ImageIO.getImageWritersByFormatName("png").next();
        try (ImageOutputStream out = ImageIO.createImageOutputStream(file.toFile())) {
            if (out == null) {
                throw new IOException(file + " cannot be written; free what is in the way or name another place");
            }
            IIOMetadata metadata =
                    writer.getDefaultImageMetadata(ImageTypeSpecifier.createFromRenderedImage(image), null);
            IIOMetadataNode texts = new IIOMetadataNode("iTXt");
            words.forEach((keyword, text) -> {
                IIOMetadataNode entry = new IIOMetadataNode("iTXtEntry");
                entry.setAttribute("keyword", keyword);
                entry.setAttribute("compressionFlag", "FALSE");
                entry.setAttribute("compressionMethod", "0");
                entry.setAttribute("languageTag", "en");
                entry.setAttribute("translatedKeyword", keyword);
                entry.setAttribute("text", text);
                texts.appendChild(entry);
            });
            IIOMetadataNode root = new IIOMetadataNode(FORMAT);
            root.appendChild(texts);
            metadata.mergeTree(FORMAT, root);
            writer.setOutput(out);
            writer.write(null, new IIOImage(image, null, metadata), null);
        } finally {
            writer.dispose();
        }
    }
}
