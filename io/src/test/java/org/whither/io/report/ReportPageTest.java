package org.whither.io.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.awt.image.BufferedImage;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.time.ZoneOffset;
import java.time.ZonedDateTime;
import java.util.ArrayList;
import java.util.Base64;
import java.util.HashSet;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.Set;
import javax.imageio.ImageIO;
import org.jsoup.Jsoup;
import org.jsoup.nodes.Document;
import org.jsoup.nodes.Element;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.fate.Split;
import org.whither.fate.SplitSettings;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.film.Gas;
import org.whither.io.result.SplitResult;
import org.whither.samples.GridSize;
import org.whither.samples.SampleSeals;
import org.whither.trace.Direction;
import org.whither.trace.TraceSettings;

/** The page: its figures are those of the JSON, no text of a field is taken for markup, and it stands alone. */
class ReportPageTest {
    private static final SplitSettings SETTINGS = new SplitSettings(Frame.ROTATING, 1e-5, 0.05, 3, 2, 20_000);
    private static final String HOSTILE = "</title><script>alert('1')</script>\"'><img src=x onerror=alert(2)> ${7*7}"
            + " <#assign x=1> &amp; ]]> \u0001 \u202e";
    private static final byte[] PNG = Base64.getDecoder()
            .decode("iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==");

    private static Film film;
    private static ObjectNode numbers;
    private static ObjectNode lowSupply;

    @BeforeAll
    static void trace() {
        film = SampleSeals.compute("spiral", null, new GridSize(24, 32), x -> {})
                .film();
        numbers = numbers(film, true);
        lowSupply = numbers(
                SampleSeals.compute("spiral", "low-supply", new GridSize(24, 32), x -> {})
                        .film(),
                false);
    }

    private static ObjectNode numbers(Film film, boolean withAge) {
        FilmFlow flow = FilmFlow.of(film);
        Split split = Split.of(flow, SETTINGS, x -> {});
        Optional<AgeMap> age = withAge
                ? Optional.of(AgeMap.of(
                        flow, new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-5, 0.1), 4, 6, 4, 2, x -> {}))
                : Optional.empty();
        return ReportNumbers.of(
                new SplitResult(flow, SETTINGS, split, "field.h5", "0".repeat(64), 1),
                "1.2.3",
                age,
                withAge
                        ? Optional.of(Eddies.of(
                                flow,
                                new EddySettings(Frame.ROTATING, 1e-5, EddySettings.PATIENCE, 1024, 1, 2),
                                x -> {}))
                        : Optional.empty());
    }

    private static Film hostile() {
        Conditions c = film.conditions();
        return new Film(
                new Film.Heading(HOSTILE, HOSTILE, HOSTILE),
                new Conditions(
                        c.rotationRate(),
                        c.pressureInner(),
                        c.pressureOuter(),
                        c.pressureSupply(),
                        c.temperature(),
                        "air <b onclick=x>&",
                        HOSTILE),
                new Gas("N<sub>2</sub>", 0.028, film.gas().viscosity(), 1),
                film.grid(),
                film.faces(),
                film.velocityFrame(),
                film.steadyIn(),
                film.field(),
                film.supply());
    }

    private static String page(ObjectNode of, boolean plain) {
        List<ReportPicture> pictures = List.of(
                new ReportPicture("plan", "The face", PNG, 1280, 720, HOSTILE, "look at " + HOSTILE),
                new ReportPicture("gap", "The film", PNG, 1280, 720, "the film", "look"));
        return ReportPage.of(
                of,
                pictures,
                new ReportPage.Settings(
                        plain,
                        ZonedDateTime.of(2026, 12, 1, 16, 40, 0, 0, ZoneOffset.UTC),
                        "whither report 'fi<e>ld.h5'",
                        Optional.empty(),
                        Optional.empty()));
    }

    /** The page of the numbers of this test with four pictures of the usual size and captions of the usual length. */
    static String fullPage() throws IOException {
        if (numbers == null) {
            trace();
        }
        ByteArrayOutputStream png = new ByteArrayOutputStream();
        ImageIO.write(new BufferedImage(1280, 720, BufferedImage.TYPE_INT_RGB), "png", png);
        List<ReportPicture> pictures = new ArrayList<>();
        for (String name : List.of("plan", "relief", "gap", "meridian")) {
            pictures.add(new ReportPicture(
                    name, name, png.toByteArray(), 1280, 720, name, "Look at what lies where. ".repeat(8)));
        }
        return ReportPage.of(
                numbers,
                pictures,
                new ReportPage.Settings(
                        false,
                        ZonedDateTime.of(2026, 12, 1, 16, 40, 0, 0, ZoneOffset.UTC),
                        "whither report field.h5 --interpolation conserving --frame rotating --tolerance 1e-6",
                        Optional.empty(),
                        Optional.empty()));
    }

    private static double parse(String text) {
        return Double.parseDouble(text.replace("\u202f", "").replace('\u2212', '-'));
    }

    /** Half a unit of the last digit shown. */
    private static double shown(String text) {
        String plain = text.replace("\u202f", "").replace("\u2212", "-");
        int e = plain.indexOf('e');
        String digits = e < 0 ? plain : plain.substring(0, e);
        int point = digits.indexOf('.');
        double unit = Math.pow(10, point < 0 ? 0 : point + 1 - digits.length());
        return 0.5 * unit * (e < 0 ? 1 : Math.pow(10, Integer.parseInt(plain.substring(e + 1))));
    }

    private static int checkFigures(String html, JsonNode json) {
        int checked = 0;
        for (Element figure : Jsoup.parse(html).select("data")) {
            String at = figure.attr("data-at");
            JsonNode value = json.at(at);
            assertTrue(value.isNumber(), at);
            double times = figure.hasAttr("data-times") ? Double.parseDouble(figure.attr("data-times")) : 1;
            double expected = value.asDouble() * times;
            assertEquals(value.asDouble(), Double.parseDouble(figure.attr("value")), 0, at);
            // The form with three digits and no idle zeros shows fewer than it is right to.
            double slack = Math.max(shown(figure.text()), at.startsWith("/validity") ? 0.005 * Math.abs(expected) : 0);
            assertEquals(expected, parse(figure.text()), slack * (1 + 1e-9), at + ": " + figure.text());
            checked++;
        }
        return checked;
    }

    @Test
    void figures_page_areThoseOfTheJson() {
        assertTrue(checkFigures(page(numbers, false), numbers) > 60);
        assertTrue(checkFigures(page(lowSupply, false), lowSupply) > 60);
        ObjectNode both = numbers.deepCopy();
        Comparison.add(both, lowSupply.deepCopy());
        assertTrue(checkFigures(page(both, false), both) > 60);
    }

    /** No figure of the tables stands on the page outside an element that tells where it comes from. */
    @Test
    void figures_tables_allTellTheirSource() {
        Document page = Jsoup.parse(page(numbers, false));
        for (Element cell : page.select("td.n")) {
            Element rest = cell.clone();
            rest.select("data").remove();
            assertFalse(rest.text().matches(".*\\d.*"), cell.text());
        }
    }

    /** The units of the trade from kg/s by the gas law at their standard states, written out afresh. */
    @Test
    void flows_unitsOfTheTrade() {
        JsonNode supply = numbers.at("/flows/0");
        double massFlow = numbers.at("/split/balance/supply_in").asDouble();
        double molarMass = film.gas().molarMass();
        assertEquals("supply", supply.get("name").asText());
        assertEquals(massFlow * 3600 * 1000, supply.get("g_h").asDouble(), 1e-9 * massFlow * 3.6e6);
        double normal = massFlow / molarMass * 8.31446261815324 * 273.15 / 101325 * 1000 * 60;
        assertEquals(normal, supply.get("nl_min").asDouble(), 1e-9 * normal);
        // 1 SCFM (60 °F, 14.696 psia) is 26.79 Nl/min (0 °C, 101.325 kPa).
        assertEquals(26.79, supply.get("nl_min").asDouble() / supply.get("scfm").asDouble(), 0.005);
        assertEquals(
                film.conditions().rotationRate() * 60 / (2 * Math.PI),
                numbers.at("/conditions/speed_rpm").asDouble(),
                1e-9 * 12000);
        assertEquals(
                film.conditions().pressureOuter() * 1e-5,
                numbers.at("/conditions/pressure_outer_bar").asDouble(),
                1e-9);
        assertEquals(3.5, numbers.at("/conditions/film_thickness_low_um").asDouble(), 1e-9);
        assertEquals(9.0, numbers.at("/conditions/film_thickness_high_um").asDouble(), 1e-9);
    }

    @Test
    void residenceDistribution_areas_areTheShares() {
        JsonNode found = numbers.get("residence_distribution");
        for (JsonNode each : found.get("to")) {
            double sum = each.get("beyond").asDouble();
            for (JsonNode share : each.get("share")) {
                sum += share.asDouble();
            }
            double share = 0;
            for (JsonNode row : numbers.at("/split/table")) {
                share += row.get("to").equals(each.get("to")) ? row.get("share").asDouble() : 0;
            }
            // Of some thousand tracers of equal flow, one in each of as many equal parts.
            assertEquals(share, sum, 0.02, each.get("to").asText());
        }
        assertTrue(found.get("to").size() == 2);
    }

    @Test
    void round_isNotLessAndNotMuchMore() {
        for (double value = 1e-4; value < 10; value *= 1.07) {
            double rounded = ResidenceDistribution.round(value);
            assertTrue(rounded >= value * (1 - 1e-9) && rounded <= 1.4 * value, value + " → " + rounded);
        }
    }

    @Test
    void title_hostile_staysText() {
        ObjectNode hostile = numbers(hostile(), false);
        ObjectNode compared = hostile.deepCopy();
        Comparison.add(compared, hostile.deepCopy());
        for (ObjectNode each : List.of(hostile, compared)) {
            for (boolean plain : new boolean[] {false, true}) {
                Document page = Jsoup.parse(page(each, plain));
                assertTrue(page.select("script, iframe, object, embed, link, base, form")
                        .isEmpty());
                assertEquals(2, page.select("img").size());
                for (Element element : page.getAllElements()) {
                    element.attributes()
                            .forEach(attribute -> assertFalse(
                                    attribute.getKey().toLowerCase(Locale.ROOT).startsWith("on"), element.outerHtml()));
                }
                assertTrue(page.select("h1").text().contains("<script>alert('1')</script>\"'><img src=x"));
                assertTrue(page.select("h1").text().contains("${7*7} <#assign x=1> &amp; ]]>"));
                assertTrue(page.title().startsWith("</title><script>"));
                assertTrue(page.select("img").get(0).attr("alt").contains("onerror=alert(2)>"));
                assertTrue(page.text().contains("N<sub>2</sub>"));
                assertTrue(page.text().contains("air <b onclick=x>&"));
                assertTrue(page.text().contains("whither report 'fi<e>ld.h5'"));
                for (Element svg : page.select("svg[role=img]")) {
                    assertTrue(
                            svg.select("desc").text().contains("<b onclick=x>&"),
                            svg.select("desc").text());
                }
            }
        }
    }

    /** Nothing is fetched, nothing runs, and the browser is told to hold the page to that. */
    @Test
    void page_standsAlone() throws IOException {
        Document page = Jsoup.parse(page(numbers, false));
        for (Element element : page.select("[src], [href], [xlink:href], [action], [srcset]")) {
            for (String attribute : List.of("src", "href", "xlink:href", "action", "srcset")) {
                assertTrue(
                        !element.hasAttr(attribute) || element.attr(attribute).startsWith("data:"),
                        element.outerHtml());
            }
        }
        String style = page.select("style").html();
        assertFalse(style.contains("url(") || style.contains("@import"), "a style that fetches");
        assertTrue(page.select("meta[http-equiv=Content-Security-Policy]")
                .attr("content")
                .startsWith("default-src 'none'"));
        String data = page.select("a[download=report.json]").attr("href");
        JsonNode inside =
                new ObjectMapper().readTree(Base64.getDecoder().decode(data.substring(data.indexOf(',') + 1)));
        assertEquals(new ObjectMapper().readTree(numbers.toString()), inside);
    }

    @Test
    void page_canBeReadWithoutSeeingIt() {
        ObjectNode both = numbers.deepCopy();
        Comparison.add(both, lowSupply.deepCopy());
        for (String html : List.of(page(numbers, false), page(numbers, true), page(both, false))) {
            Document page = Jsoup.parse(html);
            assertEquals("en", page.select("html").attr("lang"));
            assertEquals(1, page.select("h1").size());
            assertEquals(1, page.select("main").size());
            int level = 0;
            for (Element heading : page.select("h1, h2, h3, h4")) {
                int now = heading.tagName().charAt(1) - '0';
                assertTrue(now <= level + 1, "after h" + level + " comes " + heading.outerHtml());
                level = now;
            }
            page.select("img").forEach(img -> assertFalse(img.attr("alt").isBlank()));
            Set<String> ids = new HashSet<>();
            page.select("[id]").forEach(element -> assertTrue(ids.add(element.id()), element.id() + " twice"));
            for (Element element : page.select("[aria-labelledby]")) {
                for (String id : element.attr("aria-labelledby").split(" ")) {
                    assertTrue(ids.contains(id), id);
                }
            }
            assertTrue(page.select("svg[role=img]").size() >= 2);
            for (Element svg : page.select("svg")) {
                assertTrue(svg.attr("aria-hidden").equals("true")
                        || svg.select("desc").text().matches("(?s)[A-Z].{40,}\\."));
            }
            page.select("table")
                    .forEach(table -> assertFalse(table.select("caption").text().isBlank()));
            page.select("thead th").forEach(th -> assertEquals("col", th.attr("scope")));
        }
    }

    @Test
    void charts_colours_areThePages() {
        String svg = Jsoup.parse(page(numbers, false)).select("svg[role=img]").outerHtml();
        assertTrue(svg.contains("var(--outer)") && svg.contains("var(--inner)"), "the two ways");
        assertFalse(svg.contains("rgb(1,2,"), "a colour that is not named");
        assertTrue(svg.contains("stroke-dasharray=\"5,2.5\""), "lines differ without colour too");
    }

    @Test
    void plain_leavesTheTablesForSpecialistsOut() {
        Document full = Jsoup.parse(page(numbers, false));
        Document plain = Jsoup.parse(page(numbers, true));
        assertFalse(full.select("#pairs, #recirculation").isEmpty());
        assertTrue(plain.select("#pairs, #recirculation").isEmpty());
        for (String id : List.of("answer", "amount", "seen", "sure", "cautions", "made")) {
            assertEquals(1, full.select("h2#" + id).size(), id);
            assertEquals(1, plain.select("h2#" + id).size(), id);
        }
        assertEquals(full.select(".answer").text(), plain.select(".answer").text());
        assertTrue(full.text().contains("licensed practice come first"));
        assertTrue(plain.text().contains("nitrogen asphyxiates"));
    }

    @Test
    void numbers_holdNoTime() {
        String text = numbers.toString();
        assertFalse(text.contains("wall_") || text.contains("thread") || text.contains("2026-12"), text);
        assertTrue(page(numbers, false).contains("<time datetime=\"2026-12-01T16:40:00Z\">1 December 2026, 16:40"));
    }

    @Test
    void comparison_oneFieldWithItself_findsNothing() {
        ObjectNode both = numbers.deepCopy();
        Comparison.add(both, numbers.deepCopy());
        assertEquals(
                "A and B are the same field.", both.at("/comparison/setting/0").asText());
        assertTrue(both.at("/comparison/differences").size() >= 7);
        for (JsonNode difference : both.at("/comparison/differences")) {
            assertFalse(difference.path("sure").asBoolean(), difference.toString());
            assertEquals(difference.get("a"), difference.get("b"));
            assertTrue(
                    difference.get("words").asText().matches(".*(the same|no difference was found).*"),
                    difference.get("words").asText());
        }
    }

    @Test
    void comparison_lowerSupply_isToldInWords() {
        ObjectNode both = numbers.deepCopy();
        Comparison.add(both, lowSupply.deepCopy());
        assertTrue(both.at("/comparison/setting")
                .toString()
                .contains("Supply pressure: 10.000 bar(a) in A, 7.200 bar(a)"));
        JsonNode supply = both.at("/comparison/differences/0");
        double a = numbers.at("/flows/0/g_h").asDouble();
        double b = lowSupply.at("/flows/0/g_h").asDouble();
        assertNotEquals(a, b);
        assertTrue(supply.get("sure").asBoolean());
        assertEquals(100 * (b - a) / a, supply.get("change_percent").asDouble(), 1e-9);
        assertTrue(
                supply.get("words")
                        .asText()
                        .startsWith(String.format(
                                Locale.ROOT, "Supply consumption: %.0f %% less in B: ", 100 * (a - b) / a)),
                supply.get("words").asText());
        assertTrue(
                both.at("/comparison/differences")
                        .toString()
                        .contains("Gas from the process enters the film in B only: of every"),
                both.at("/comparison/differences").toString());
        assertTrue(page(both, false).contains("What differs from A to B"));
    }

    @Test
    void figures_forms() {
        assertEquals("11\u202f937", Figures.text(11936.6, "f0"));
        assertEquals("\u22120.25", Figures.text(-0.25, "f2"));
        assertEquals("0.00", Figures.text(-0.001, "f2"));
        assertEquals("+3.1", Figures.text(3.14, "+f1"));
        assertEquals("1e\u22127", Figures.text(1e-7, "e"));
        assertEquals("0.0699", Figures.text(0.06993, "g"));
        assertEquals("1", Figures.text(1, "g"));
        assertEquals("53\u202f150", Figures.text(53150, "i"));
    }
}
