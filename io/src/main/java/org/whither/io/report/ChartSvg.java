package org.whither.io.report;

import java.awt.Color;
import java.io.IOException;
import java.io.StringWriter;
import java.io.UncheckedIOException;
import java.util.Locale;
import java.util.Map;
import java.util.function.Consumer;
import javax.xml.parsers.DocumentBuilderFactory;
import javax.xml.parsers.ParserConfigurationException;
import org.apache.batik.svggen.SVGGeneratorContext;
import org.apache.batik.svggen.SVGGraphics2D;
import org.w3c.dom.Document;
import org.w3c.dom.Element;
import org.w3c.dom.NodeList;

/**
 * Turns what is drawn by Java2D into SVG that lives in a page: its colours are the page's own (CSS custom properties), so
 * that the page's style governs them; its letters are the page's; it has a title and a description.
 */
final class ChartSvg {
    /** Colours to draw with; each stands for a property of the page's style, {@code --ink} and so on. */
    static final Color INK = new Color(1, 2, 11);

    static final Color FAINT = new Color(1, 2, 12);
    static final Color RULE = new Color(1, 2, 13);
    static final Color OUTER = new Color(1, 2, 14);
    static final Color INNER = new Color(1, 2, 15);
    static final Color OTHER = new Color(1, 2, 16);

    private static final Map<Color, String> NAMES =
            Map.of(INK, "ink", FAINT, "faint", RULE, "rule", OUTER, "outer", INNER, "inner", OTHER, "other");

    private ChartSvg() {}

    static String of(
            Consumer<SVGGraphics2D> drawing, int width, int height, String id, String title, String description) {
        Document document = document();
        SVGGraphics2D graphics = new SVGGraphics2D(SVGGeneratorContext.createDefault(document), false);
        drawing.accept(graphics);
        Element root = graphics.getRoot();
        mend(root, 0, id);
        root.setAttribute("id", id);
        root.setAttribute("viewBox", "0 0 " + width + " " + height);
        root.setAttribute("role", "img");
        root.setAttribute("aria-labelledby", id + "-title " + id + "-words");
        Element words = text(document, "desc", id + "-words", description);
        root.insertBefore(words, root.getFirstChild());
        root.insertBefore(text(document, "title", id + "-title", title), words);
        StringWriter out = new StringWriter();
        try {
            graphics.stream(root, out, false, false);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        } finally {
            graphics.dispose();
        }
        String svg = out.toString();
        return svg.substring(svg.indexOf("<svg")).strip();
    }

    private static Document document() {
        try {
            return DocumentBuilderFactory.newInstance()
                    .newDocumentBuilder()
                    .getDOMImplementation()
                    .createDocument("http://www.w3.org/2000/svg", "svg", null);
        } catch (ParserConfigurationException e) {
            throw new IllegalStateException(e);
        }
    }

    private static Element text(Document document, String name, String id, String words) {
        Element element = document.createElementNS("http://www.w3.org/2000/svg", name);
        element.setAttribute("id", id);
        element.setTextContent(words);
        return element;
    }

    /**
     * Names the colours, and lays each text about its middle: the page's letters are not as wide as those it was laid out
     * with.
     */
    private static void mend(Element element, double inherited, String id) {
        for (String attribute : new String[] {"fill", "stroke"}) {
            for (Map.Entry<Color, String> name : NAMES.entrySet()) {
                Color c = name.getKey();
                if (element.getAttribute(attribute)
                        .equals("rgb(" + c.getRed() + "," + c.getGreen() + "," + c.getBlue() + ")")) {
                    element.setAttribute(attribute, "var(--" + name.getValue() + ")");
                }
            }
        }
        for (String attribute : new String[] {"id", "clip-path"}) {
            String name = element.getAttribute(attribute);
            if (!name.isEmpty()) { // several charts stand on one page
                element.setAttribute(
                        attribute,
                        attribute.equals("id") ? id + "-" + name : name.replace("url(#", "url(#" + id + "-"));
            }
        }
        String size = element.getAttribute("font-size");
        double height = size.isEmpty() ? inherited : Double.parseDouble(size.replaceAll("[^0-9.]", ""));
        if (element.getNodeName().equals("text")) {
            double x = Double.parseDouble(element.getAttribute("x"));
            double width = NoCharts.width(element.getTextContent(), height);
            element.setAttribute("x", String.format(Locale.ROOT, "%.1f", x + width / 2));
            element.setAttribute("text-anchor", "middle");
        }
        element.removeAttribute("font-family");
        NodeList children = element.getChildNodes();
        for (int n = 0; n < children.getLength(); n++) {
            if (children.item(n) instanceof Element child) {
                mend(child, height, id);
            }
        }
    }
}
