package org.whither.io.report;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.fate.Split;
import org.whither.io.result.EngineerUnits;

/**
 * Two fields side by side: the first, A, and another, B, with what differs in words. Whether a difference is more than
 * the two are uncertain by is judged by the intervals of shares, and for flows by how the borders of both fields close.
 */
public final class Comparison {
    /** Values that differ by less than this, relatively, are called the same. */
    private static final double SAME = 5e-4;

    /** Conditions nearer to each other than this, relatively, are equal. */
    private static final double EQUAL = 1e-6;

    /** Differences of shares below this are not worth words: a hundredth of a kilogram in 100. */
    private static final double SMALLEST_SHARE = 1e-4;

    private static final String[][] CONDITIONS = {
        {"speed_rpm", "Speed", "rpm", "f0"},
        {"pressure_supply_bar", "Supply pressure", "bar(a)", "f3"},
        {"pressure_outer_bar", "Pressure at the outer diameter", "bar(a)", "f3"},
        {"pressure_inner_bar", "Pressure at the inner diameter", "bar(a)", "f3"},
        {"temperature_c", "Temperature", "°C", "f1"},
        {"molar_mass_g_mol", "Molar mass of the gas", "g/mol", "f3"},
        {"film_thickness_low_um", "Smallest film thickness", "µm", "f2"},
        {"film_thickness_high_um", "Largest film thickness", "µm", "f2"},
        {"inner_diameter_mm", "Inner diameter", "mm", "f2"},
        {"outer_diameter_mm", "Outer diameter", "mm", "f2"},
    };

    private final JsonNode a;
    private final JsonNode b;
    private final ArrayNode differences = JsonNodeFactory.instance.arrayNode();
    private final ArrayNode setting = JsonNodeFactory.instance.arrayNode();

    private Comparison(JsonNode a, JsonNode b) {
        this.a = a;
        this.b = b;
    }

    /**
     * Adds to the numbers of a report those of another field and the differences.
     *
     * @param numbers those of the first field; completed
     * @param other those of the other
     */
    public static void add(ObjectNode numbers, ObjectNode other) {
        Comparison comparison = new Comparison(numbers, other);
        comparison.conditions();
        comparison.flow("supply", "Supply consumption");
        for (String side : List.of("outer", "inner")) {
            comparison.flow("leaves_" + side, "Leakage to " + comparison.side(side));
        }
        for (String side : List.of("outer", "inner")) {
            comparison.share("supply", side);
        }
        comparison.share("supply", "held");
        comparison.share("outer", "inner");
        comparison.share("inner", "outer");
        for (String side : List.of("outer", "inner")) {
            comparison.time(side);
        }
        ObjectNode node = numbers.putObject("comparison");
        node.set("setting", comparison.setting);
        node.set("differences", comparison.differences);
        node.set("other", other);
    }

    // ---- what was set differently
    // ------------------------------------------------------------------------------------

    private void conditions() {
        for (String[] condition : CONDITIONS) {
            JsonNode first = a.at("/conditions/" + condition[0]);
            JsonNode second = b.at("/conditions/" + condition[0]);
            if (first.isNumber() != second.isNumber()) {
                setting.add(condition[1] + ": given in " + (first.isNumber() ? "A" : "B") + " only.");
            } else if (first.isNumber() && !near(first.asDouble(), second.asDouble(), EQUAL)) {
                setting.add(String.format(
                        Locale.ROOT,
                        "%s: %s %s in A, %s %s in B.",
                        condition[1],
                        Figures.text(first.asDouble(), condition[3]),
                        condition[2],
                        Figures.text(second.asDouble(), condition[3]),
                        condition[2]));
            }
        }
        if (!a.at("/conditions/gas").equals(b.at("/conditions/gas"))) {
            setting.add("Gas: " + a.at("/conditions/gas").asText() + " in A, "
                    + b.at("/conditions/gas").asText() + " in B.");
        }
        String first = grid(a);
        String second = grid(b);
        if (!first.equals(second)) {
            setting.add("Grid: " + first + " in A, " + second
                    + " in B. A part of every difference may come from the grids alone.");
        }
        if (setting.isEmpty()) {
            setting.add(
                    a.at("/field/sha256").equals(b.at("/field/sha256"))
                            ? "A and B are the same field."
                            : "A and B have the same operating point, gas, film thickness and grid.");
        }
    }

    private static String grid(JsonNode numbers) {
        JsonNode conditions = numbers.get("conditions");
        return conditions.get("cells_theta").asInt() + " × "
                + conditions.get("cells_radial").asInt() + " cells of 1/"
                + conditions.get("sectors").asInt() + " of the ring, "
                + (conditions.get("kind").asText().equals("full") ? "full field" : "film field");
    }

    private static boolean near(double x, double y, double share) {
        return Math.abs(x - y) <= share * Math.max(Math.abs(x), Math.abs(y));
    }

    // ---- what came out differently
    // -----------------------------------------------------------------------------------

    private void flow(String name, String words) {
        double first = flow(a, name);
        double second = flow(b, name);
        if (first == 0 && second == 0) {
            return;
        }
        double doubt = doubt(a) + doubt(b);
        boolean sure = Math.abs(second - first) > doubt;
        ObjectNode node = difference(words + ", g/h", first, second, "s4", sure);
        String values = EngineerUnits.digits(first) + " g/h in A, " + EngineerUnits.digits(second) + " in B";
        if (first == 0 || second == 0) {
            node.put("words", words + ": " + values + ".");
        } else if (near(first, second, SAME)) {
            node.put("words", words + ": the same, " + values + ".");
        } else {
            node.put("change_percent", 100 * (second / first - 1));
            node.put(
                    "words",
                    String.format(
                            Locale.ROOT,
                            "%s: %s %% %s in B: %s%s.",
                            words,
                            percent(second / first - 1),
                            second > first ? "more" : "less",
                            values,
                            sure ? "" : "; that is less than the fields' borders fail to close by"));
        }
    }

    private static double flow(JsonNode numbers, String name) {
        for (JsonNode flow : numbers.get("flows")) {
            if (flow.get("name").asText().equals(name)) {
                return flow.get("g_h").asDouble();
            }
        }
        return 0;
    }

    /** What a field's borders fail to close by (g/h). */
    private static double doubt(JsonNode numbers) {
        JsonNode balance = numbers.at("/split/balance");
        double inflow = balance.get("supply_in").asDouble()
                + balance.get("inner_in").asDouble()
                + balance.get("outer_in").asDouble();
        return EngineerUnits.gramsPerHour(
                inflow * Math.abs(numbers.at("/certainty/closure_percent").asDouble()) / 100);
    }

    private void share(String from, String to) {
        Optional<JsonNode> first = row(a, from, to);
        Optional<JsonNode> second = row(b, from, to);
        double x = first.map(row -> row.get("share").asDouble()).orElse(0.0);
        double y = second.map(row -> row.get("share").asDouble()).orElse(0.0);
        if (x < SMALLEST_SHARE && y < SMALLEST_SHARE) {
            return;
        }
        boolean inA = enters(a, from);
        boolean inB = enters(b, from);
        boolean sure = low(first) > high(second, b, from) || low(second) > high(first, a, from);
        String gas = from.equals("supply") ? "supply gas" : "gas from " + side(from);
        String goes = to.equals("held") ? "is held in the film" : "goes to " + side(to);
        ObjectNode node = difference(
                capital(gas) + ", " + goes.replaceFirst("^(goes|is) ", "") + ", kg in 100",
                100 * x,
                100 * y,
                "f2",
                sure);
        String values = String.format(Locale.ROOT, "%.1f kg of 100 in A, %.1f in B", 100 * x, 100 * y);
        if (inA != inB) {
            node.put(
                    "words",
                    String.format(
                            Locale.ROOT,
                            "%s enters the film in %s only: of every 100 kg of it there, %.1f kg %s.",
                            capital(gas),
                            inA ? "A" : "B",
                            100 * (inA ? x : y),
                            goes.replace("is ", "are ").replace("goes ", "go ")));
            return;
        }
        if (!sure) {
            node.put(
                    "words",
                    String.format(
                            Locale.ROOT,
                            "What of the %s %s: no difference was found (%s; the intervals overlap).",
                            gas,
                            goes,
                            values));
            return;
        }
        node.put("change_kg", 100 * (y - x));
        node.put(
                "words",
                String.format(
                        Locale.ROOT,
                        "Of every 100 kg of %s, %.1f kg %s %s in B: %s; more than both intervals together.",
                        gas,
                        100 * Math.abs(y - x),
                        y > x ? "more" : "less",
                        goes.replace("is ", "are ").replace("goes ", "go "),
                        values));
    }

    private static boolean enters(JsonNode numbers, String from) {
        JsonNode balance = numbers.at("/split/balance");
        double all = balance.get("supply_in").asDouble()
                + balance.get("inner_in").asDouble()
                + balance.get("outer_in").asDouble();
        return balance.get(from + "_in").asDouble() > Split.NEGLIGIBLE * all;
    }

    private static double low(Optional<JsonNode> row) {
        return row.map(found -> found.get("share_low").asDouble()).orElse(0.0);
    }

    /** Upper end of a share: of a pair without a row, 0 where there is no such gas, else what the sampling may miss. */
    private static double high(Optional<JsonNode> row, JsonNode numbers, String from) {
        double none = enters(numbers, from)
                ? numbers.at("/certainty/sampling_percent").asDouble() / 100
                : 0;
        return row.map(found -> found.get("share_high").asDouble()).orElse(none);
    }

    private void time(String side) {
        Optional<JsonNode> first =
                row(a, "supply", side).filter(row -> row.path("residence_time").isObject());
        Optional<JsonNode> second =
                row(b, "supply", side).filter(row -> row.path("residence_time").isObject());
        if (first.isEmpty() || second.isEmpty()) {
            return;
        }
        double x = 1e3 * first.get().at("/residence_time/p50").asDouble();
        double y = 1e3 * second.get().at("/residence_time/p50").asDouble();
        String words = "Time in the film of supply gas on its way to " + side(side) + ", median";
        ObjectNode node = difference("Supply gas, time on its way to " + side(side) + ", median, ms", x, y, "s4", null);
        String values = EngineerUnits.digits(x) + " ms in A, " + EngineerUnits.digits(y) + " in B";
        if (near(x, y, 0.01)) {
            node.put("words", words + ": the same within 1 %, " + values + ".");
            return;
        }
        node.put("change_percent", 100 * (y / x - 1));
        node.put(
                "words",
                String.format(
                        Locale.ROOT,
                        "%s: %s %% %s in B: %s.",
                        words,
                        percent(y / x - 1),
                        y > x ? "longer" : "shorter",
                        values));
    }

    private static String percent(double change) {
        double size = 100 * Math.abs(change);
        return String.format(Locale.ROOT, size >= 10 ? "%.0f" : size >= 1 ? "%.1f" : "%.2f", size);
    }

    private ObjectNode difference(String name, double first, double second, String form, Boolean sure) {
        ObjectNode node = differences.addObject();
        node.put("name", name);
        node.put("a", first);
        node.put("b", second);
        node.put("form", form);
        if (sure != null) {
            node.put("sure", sure);
        }
        return node;
    }

    private static String capital(String words) {
        return words.substring(0, 1).toUpperCase(Locale.ROOT) + words.substring(1);
    }

    private static Optional<JsonNode> row(JsonNode numbers, String from, String to) {
        for (JsonNode row : numbers.at("/split/table")) {
            if (row.get("from").asText().equals(from) && row.get("to").asText().equals(to)) {
                return Optional.of(row);
            }
        }
        return Optional.empty();
    }

    /** A side by its name in A, and in B where that is another; by its diameter where it has none. */
    private String side(String border) {
        String first = a.at("/conditions/" + border + "_side").asText();
        String second = b.at("/conditions/" + border + "_side").asText();
        if (first.isBlank() || second.isBlank()) {
            return "the " + border + " diameter";
        }
        return first.equals(second) ? "the " + first : "the " + first + " (in B the " + second + ")";
    }
}
