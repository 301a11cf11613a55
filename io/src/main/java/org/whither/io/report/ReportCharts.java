package org.whither.io.report;

import com.fasterxml.jackson.databind.JsonNode;
import freemarker.core.HTMLOutputFormat;
import freemarker.core.TemplateHTMLOutputModel;
import freemarker.template.TemplateModelException;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;

/** The charts of a report, drawn from its numbers; of two fields that are compared, both in one chart. */
final class ReportCharts {
    /** Below this share of its origin, gas has no line of its own in the chart of exits. */
    private static final double LEAST_SHARE = 0.005;

    private static final int MOST_LINES = 3;

    /** How many times the highest median age the chart of ages is high: the oldest gas would dwarf all else. */
    private static final double AGE_ROOM = 2.5;

    private final List<JsonNode> fields;
    private final List<Map<String, Object>> drawn = new ArrayList<>();

    private ReportCharts(JsonNode numbers) {
        JsonNode other = numbers.at("/comparison/other");
        this.fields = other.isObject() ? List.of(numbers, other) : List.of(numbers);
    }

    /** The charts as a template takes them; none where this machine cannot draw them. */
    static List<Map<String, Object>> of(JsonNode numbers) {
        ReportCharts charts = new ReportCharts(numbers);
        try {
            charts.residence();
            charts.exits();
            charts.age();
        } catch (NoCharts e) {
            return List.of();
        }
        return charts.drawn;
    }

    // ---- how long it stays
    // -------------------------------------------------------------------------------------------

    private void residence() throws NoCharts {
        Sheet sheet = new Sheet("time in the film, ms", "% of the supply gas in each ms", 0);
        List<String> beyond = new ArrayList<>();
        for (int f = 0; f < fields.size(); f++) {
            JsonNode found = fields.get(f).get("residence_distribution");
            if (found == null) {
                continue;
            }
            double step = 1e3 * found.get("step").asDouble();
            double rest = 0;
            for (JsonNode each : found.get("to")) {
                double[] y = values(each.get("share"), 100 / step);
                rest += each.get("beyond").asDouble();
                String goes = destination(f, each.get("to").asText());
                sheet.line(f, look(each.get("to").asText()), goes, steps(y.length, step), y);
                int peak = highest(y);
                sheet.say(
                        f,
                        String.format(
                                Locale.ROOT,
                                "of what goes %s most stays %s to %s ms",
                                goes,
                                digits(step * peak),
                                digits(step * (peak + 1))));
            }
            beyond.add(String.format(
                    Locale.ROOT, "%.1f %%%s", 100 * rest, fields.size() > 1 ? (f == 0 ? " of A" : " of B") : ""));
        }
        sheet.draw(
                "residence",
                "How long supply gas stays in the film",
                "Equal areas are equal amounts of gas. Where a line begins, no gas is faster; its tail is gas that strays"
                        + " close to a face or is held up: " + String.join(", ", beyond)
                        + " stays longer than shown.");
    }

    // ---- where it leaves
    // ---------------------------------------------------------------------------------------------

    private void exits() throws NoCharts {
        Sheet sheet = new Sheet("place within one sector, 0 … 1", "1 = as much as on average", 1);
        for (int f = 0; f < fields.size(); f++) {
            int lines = 0;
            for (JsonNode row : fields.get(f).at("/split/table")) {
                if (row.get("exit_phase") == null
                        || row.get("to").asText().equals("supply")
                        || row.get("share").asDouble() < LEAST_SHARE
                        || lines++ == MOST_LINES) {
                    continue;
                }
                int bins = row.get("exit_phase").size();
                double[] y = values(row.get("exit_phase"), bins);
                boolean supply = row.get("from").asText().equals("supply");
                String words = (supply
                                ? "supply gas "
                                : "gas from " + side(f, row.get("from").asText()) + " ")
                        + destination(f, row.get("to").asText());
                sheet.line(
                        f,
                        supply
                                ? look(row.get("to").asText())
                                : row.get("from").equals(row.get("to")) ? Chart.Look.RETURNING : Chart.Look.OTHER,
                        words,
                        steps(bins, 1.0 / bins),
                        y);
                int high = highest(y);
                sheet.say(
                        f,
                        String.format(
                                Locale.ROOT,
                                "%s leaves most, %.1f times the average, near %.2f",
                                words,
                                y[high],
                                (high + 0.5) / bins));
            }
        }
        sheet.draw(
                "exits",
                "Where round the rim gas leaves",
                "Counted along the rim from the first line of the grid, in the frame in which the field is steady. Look for"
                        + " peaks: there the most gas washes the rim. A flat line: grooves do not show at the rim.");
    }

    // ---- how old it is
    // -----------------------------------------------------------------------------------------------

    private void age() throws NoCharts {
        Sheet sheet = new Sheet("radius, mm", "age of the gas, ms", 0);
        double top = 0;
        for (int f = 0; f < fields.size(); f++) {
            JsonNode found = fields.get(f).get("age");
            if (found == null) {
                continue;
            }
            double[] radius = values(found.get("radius"), 1e3);
            String[][] lines = {
                {"ring_p10", "a tenth is younger", "OTHER"},
                {"ring_p50", "half is younger", "ALL"},
                {"ring_p75", "three quarters are younger", "RETURNING"}
            };
            for (String[] line : lines) {
                JsonNode ages = found.get(line[0]);
                List<Double> x = new ArrayList<>();
                List<Double> y = new ArrayList<>();
                for (int n = 0; n < ages.size(); n++) {
                    if (ages.get(n).isNumber()) {
                        x.add(radius[n]);
                        y.add(1e3 * ages.get(n).asDouble());
                    }
                }
                if (x.size() < 2) {
                    continue;
                }
                double[] values = y.stream().mapToDouble(v -> v).toArray();
                sheet.curve(
                        f,
                        Chart.Look.valueOf(line[2]),
                        line[1],
                        x.stream().mapToDouble(v -> v).toArray(),
                        values);
                if (line[0].equals("ring_p50")) {
                    int oldest = highest(values);
                    top = Math.max(top, values[oldest]);
                    sheet.say(
                            f,
                            String.format(
                                    Locale.ROOT,
                                    "the median age is greatest, %s ms, at a radius of %.1f mm",
                                    digits(values[oldest]),
                                    x.get(oldest)));
                }
            }
        }
        sheet.chart.fromData();
        if (top > 0) {
            sheet.chart.upTo(AGE_ROOM * top);
        }
        sheet.draw(
                "age",
                "How old the gas is",
                "Time since it entered, by radius, over the whole ring and film thickness. Gas is youngest at the feed; where"
                        + " the lines climb, gas lingers; where one leaves the chart, some is far older.");
    }

    // ---- a chart in the making
    // ---------------------------------------------------------------------------------------

    /** A chart with its legend and what is said of it. */
    private final class Sheet {
        private final Chart chart;
        private final List<Map<String, Object>> keys = new ArrayList<>();
        private final List<String> said = new ArrayList<>();

        Sheet(String x, String y, double xHigh) {
            chart = new Chart(x, y, xHigh);
        }

        void line(int field, Chart.Look look, String words, double[] x, double[] y) {
            chart.steps(new Chart.Line(look, field > 0, x, y));
            key(field, look, words);
        }

        void curve(int field, Chart.Look look, String words, double[] x, double[] y) {
            chart.curve(new Chart.Line(look, field > 0, x, y));
            key(field, look, words);
        }

        private void key(int field, Chart.Look look, String words) {
            keys.add(Map.of(
                    "look", look.name().toLowerCase(Locale.ROOT), "words", prefix(field) + words, "second", field > 0));
        }

        void say(int field, String words) {
            said.add(prefix(field) + words);
        }

        private String prefix(int field) {
            return fields.size() == 1 ? "" : field == 0 ? "A: " : "B: ";
        }

        void draw(String id, String title, String caption) throws NoCharts {
            if (keys.isEmpty()) {
                return;
            }
            String words = String.join("; ", said);
            String svg = chart.svg(
                    "chart-" + id, title, words.substring(0, 1).toUpperCase(Locale.ROOT) + words.substring(1) + ".");
            try {
                TemplateHTMLOutputModel markup = HTMLOutputFormat.INSTANCE.fromMarkup(svg);
                drawn.add(Map.of("title", title, "svg", markup, "keys", keys, "caption", caption));
            } catch (TemplateModelException e) {
                throw new IllegalStateException(e);
            }
        }
    }

    private static double[] values(JsonNode array, double factor) {
        double[] values = new double[array.size()];
        for (int n = 0; n < values.length; n++) {
            values[n] = factor * array.get(n).asDouble();
        }
        return values;
    }

    private static double[] steps(int count, double step) {
        double[] x = new double[count + 1];
        for (int n = 0; n <= count; n++) {
            x[n] = step * n;
        }
        return x;
    }

    private static int highest(double[] values) {
        int highest = 0;
        for (int n = 0; n < values.length; n++) {
            highest = values[n] > values[highest] ? n : highest;
        }
        return highest;
    }

    private static Chart.Look look(String to) {
        return switch (to) {
            case "outer" -> Chart.Look.OUTER;
            case "inner" -> Chart.Look.INNER;
            default -> Chart.Look.OTHER;
        };
    }

    private String destination(int field, String to) {
        return switch (to) {
            case "outer", "inner" -> "to " + side(field, to);
            case "supply" -> "back into the feed";
            default -> to;
        };
    }

    private String side(int field, String border) {
        String name = fields.get(field).at("/conditions/" + border + "_side").asText();
        return name.isBlank() ? "the " + border + " diameter" : "the " + name;
    }

    private static String digits(double milliseconds) {
        return String.format(
                Locale.ROOT, milliseconds >= 10 ? "%.0f" : milliseconds >= 1 ? "%.1f" : "%.2f", milliseconds);
    }
}
