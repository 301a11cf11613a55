package org.whither.io.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import org.jsoup.Jsoup;
import org.jsoup.nodes.Document;
import org.jsoup.nodes.Element;
import org.jsoup.parser.Parser;
import org.junit.jupiter.api.Test;

class ChartTest {
    private static Document chart() throws NoCharts {
        String svg = new Chart("time, ms", "share, %", 0)
                .steps(new Chart.Line(Chart.Look.OUTER, false, new double[] {0, 1, 2, 3}, new double[] {0, 8, 4}))
                .steps(new Chart.Line(Chart.Look.INNER, true, new double[] {0, 1, 2, 3}, new double[] {2, 1, 0}))
                .svg("one", "A <title>", "Words & more.");
        return Jsoup.parse(svg, Parser.xmlParser());
    }

    @Test
    void svg_isNamedAndSelfContained() throws NoCharts {
        Element svg = chart().selectFirst("svg");
        assertEquals("A <title>", svg.selectFirst("title").text());
        assertEquals("Words & more.", svg.selectFirst("desc").text());
        assertEquals("one-title one-words", svg.attr("aria-labelledby"));
        assertEquals(svg.child(0), svg.selectFirst("title"), "the title comes first");
        for (Element element : svg.select("[id]")) {
            assertTrue(element.id().equals("one") || element.id().startsWith("one-"), element.id());
        }
        for (Element element : svg.select("[clip-path]")) {
            String id = element.attr("clip-path").replaceAll("url\\(#(.*)\\)", "$1");
            assertFalse(svg.select("#" + id).isEmpty(), id);
        }
        assertTrue(svg.select("text").eachText().containsAll(List.of("time, ms", "share, %")));
        assertTrue(svg.select("image").isEmpty());
    }

    /** A value of 8 stands twice as high as one of 4: the line is where the axis says. */
    @Test
    void svg_steps_standWhereTheAxisSays() throws NoCharts {
        Element svg = chart().selectFirst("svg");
        List<Double> levels = new ArrayList<>();
        for (Element line : svg.select("line, path, polyline")) {
            if (stroke(line).equals("var(--outer)")
                    && line.hasAttr("y1")
                    && line.attr("y1").equals(line.attr("y2"))
                    && !line.attr("x1").equals(line.attr("x2"))) {
                levels.add(Double.parseDouble(line.attr("y1")));
            }
        }
        assertEquals(3, levels.size(), svg.outerHtml());
        double zero = levels.get(0);
        assertEquals(2, (zero - levels.get(1)) / (zero - levels.get(2)), 0.01);
    }

    private static String stroke(Element element) {
        for (Element at = element; at != null; at = at.parent()) {
            if (at.hasAttr("stroke")) {
                return at.attr("stroke");
            }
        }
        return "";
    }
}
