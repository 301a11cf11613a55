package org.whither.io.report;

import java.util.Base64;

/**
 * A picture of a report.
 *
 * @param name its name as a file, without an ending
 * @param title what it is called on the page
 * @param png the picture as PNG
 * @param width its width (pixels)
 * @param height its height (pixels)
 * @param alternative what it shows, for those who cannot see it
 * @param caption what to look at
 */
public record ReportPicture(
        String name, String title, byte[] png, int width, int height, String alternative, String caption) {
    /** The picture within a page. */
    public String data() {
        return "data:image/png;base64," + Base64.getEncoder().encodeToString(png);
    }
}
