package org.whither.io.result;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.Quantiles;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.fate.SplitSettings;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Validity;
import org.whither.trace.PathEnd;

/**
 * A split as it leaves the program.
 *
 * @param flow the motion of the gas it was found in
 * @param settings how it was found
 * @param split the split
 * @param file name of the field file
 * @param sha256 its checksum
 * @param seconds wall time it took (s)
 */
public record SplitResult(
        FilmFlow flow, SplitSettings settings, Split split, String file, String sha256, double seconds) {

    /** Whether the border flows close within the wanted width. */
    public boolean closes() {
        return Math.abs(split.balance().closure()) <= settings.width();
    }

    /** What a user must know, a sentence each, the gravest first. */
    public List<String> warnings() {
        List<String> said = new ArrayList<>();
        if (!closes()) {
            said.add(String.format(
                    Locale.ROOT,
                    "The border flows of the field do not close within the wanted width: %.3f %% of the inflow is missing"
                            + " or too much, and no share below is surer than that.",
                    100 * split.balance().closure()));
        }
        if (!split.widthReached()) {
            said.add(String.format(
                    Locale.ROOT,
                    "The wanted width of %s was not reached; the intervals below are what was.",
                    settings.width()));
        }
        disagreement().ifPresent(said::add);
        said.addAll(split.notes());
        said.addAll(Validity.of(flow).warnings());
        return said;
    }

    /** Where a share by tracers and by boundary integrals differ by more than the wanted width. */
    private Optional<String> disagreement() {
        BorderBalance balance = split.balance();
        for (Destination side : List.of(Destination.INNER, Destination.OUTER)) {
            double leaving = side == Destination.INNER ? balance.innerOut() : balance.outerOut();
            double traced = split.table().stream()
                    .filter(row -> row.to() == side)
                    .mapToDouble(SplitRow::massFlow)
                    .sum();
            double off = Math.abs(traced - leaving) / balance.inflow();
            if (off > Math.max(settings.width(), 2 * split.heldShare())) {
                return Optional.of(String.format(
                        Locale.ROOT,
                        "By tracers %.4g g/h leave at the %s diameter, by the boundary integral %.4g g/h; they differ by"
                                + " %.2f %% of the inflow, more than the wanted width.",
                        EngineerUnits.gramsPerHour(traced),
                        name(side),
                        EngineerUnits.gramsPerHour(leaving),
                        100 * off));
            }
        }
        return Optional.empty();
    }

    // ---- JSON
    // --------------------------------------------------------------------------------------------------------

    /** The split as JSON; SI units. */
    public ObjectNode json() {
        ObjectNode root = JsonNodeFactory.instance.objectNode();
        root.put("result", "split");
        root.put("version", 1);
        root.set("field", ResultJson.field(flow.film(), file, sha256));
        root.put("frame", settings.frame().name().toLowerCase(Locale.ROOT));
        root.put("interpolation", flow.interpolation());
        root.put("tolerance", settings.tolerance());
        root.put("width", settings.width());
        root.put("seed", settings.seed());
        rows(root.putArray("table"), split.table());
        root.put("held_share", split.heldShare());
        root.put("unsettled_share", split.lostShare());
        rows(root.putArray("backward_table"), split.backwardTable());
        root.set("balance", ResultJson.balance(split.balance()));
        root.put("film_mass", split.filmMass());
        root.put("time_limit", split.timeLimit());
        root.put("tracers", split.tracers());
        root.put("steps", split.steps());
        root.put("wall_seconds", seconds);
        root.set("validity", ResultJson.validity(Validity.of(flow)));
        warnings().forEach(root.putArray("warnings")::add);
        root.put("caution", Cautions.TEXT);
        return root;
    }

    private static void rows(ArrayNode array, List<SplitRow> rows) {
        for (SplitRow row : rows) {
            ObjectNode node = array.addObject();
            node.put("from", row.from().map(SplitResult::name).orElse("held"));
            node.put("to", name(row.to()));
            node.put("mass_flow", row.massFlow());
            node.put("share", row.share().share());
            node.put("share_low", row.share().low());
            node.put("share_high", row.share().high());
            quantiles(node, "residence_time", row.residenceTime());
            quantiles(node, "revolutions", row.revolutions());
        }
    }

    private static void quantiles(ObjectNode node, String name, Optional<Quantiles> quantiles) {
        if (quantiles.isEmpty()) {
            node.putNull(name);
            return;
        }
        ObjectNode values = node.putObject(name);
        values.put("p10", quantiles.get().p10());
        values.put("p50", quantiles.get().p50());
        values.put("p90", quantiles.get().p90());
        values.put("mean", quantiles.get().mean());
    }

    private static String name(Enum<?> value) {
        return value.name().toLowerCase(Locale.ROOT);
    }

    // ---- words
    // -------------------------------------------------------------------------------------------------------

    /** The split in plain words and the engineer's units. */
    public String text() {
        Film film = flow.film();
        StringBuilder s = new StringBuilder();
        for (String warning : warnings()) {
            s.append("Warning: ").append(warning).append(System.lineSeparator());
        }
        s.append(answer()).append(System.lineSeparator()).append(System.lineSeparator());
        s.append(String.format(
                Locale.ROOT,
                "%-28s %11s %11s  %-22s %-30s %s%n",
                "gas",
                "g/h",
                "Nl/min",
                "share (95 % interval)",
                "time in the film, ms (10/50/90 %)",
                "turns, stationary frame (10/50/90 %)"));
        for (SplitRow row : split.table()) {
            s.append(rowText(row, false));
        }
        s.append("followed back from where it leaves:").append(System.lineSeparator());
        for (SplitRow row : split.backwardTable()) {
            s.append(rowText(row, true));
        }
        s.append("by the boundary integrals:").append(System.lineSeparator());
        BorderBalance balance = split.balance();
        integral(s, "into the film by the feed", balance.supplyIn(), balance.supplyIn());
        integral(s, "to the " + film.conditions().innerSide() + " (inner)", balance.innerOut(), balance.supplyIn());
        integral(s, "to the " + film.conditions().outerSide() + " (outer)", balance.outerOut(), balance.supplyIn());
        if (balance.innerIn() > 0) {
            integral(s, "from the " + film.conditions().innerSide(), balance.innerIn(), balance.supplyIn());
        }
        if (balance.outerIn() > 0) {
            integral(s, "from the " + film.conditions().outerSide(), balance.outerIn(), balance.supplyIn());
        }
        s.append(String.format(
                Locale.ROOT,
                "closure %.2e of the inflow; held %s; not settled %s; %d tracers, %d steps, %.1f s, %s interpolation%n",
                balance.closure(),
                EngineerUnits.percent(split.heldShare()),
                EngineerUnits.percent(split.lostShare()),
                split.tracers(),
                split.steps(),
                seconds,
                flow.interpolation()));
        s.append(System.lineSeparator()).append("Caution: ").append(Cautions.TEXT);
        return s.toString();
    }

    /** The answer in one or two sentences. */
    public String answer() {
        Film film = flow.film();
        StringBuilder s = new StringBuilder();
        Optional<SplitRow> inner = split.row(PathEnd.Border.SUPPLY, Destination.INNER);
        Optional<SplitRow> outer = split.row(PathEnd.Border.SUPPLY, Destination.OUTER);
        if (inner.isPresent() || outer.isPresent()) {
            double half = Math.max(
                    inner.map(row -> row.share().width()).orElse(0.0) / 2,
                    outer.map(row -> row.share().width()).orElse(0.0) / 2);
            s.append(String.format(
                    Locale.ROOT,
                    "Of every 100 kg of supply gas, %.1f leave to the %s (outer diameter) and %.1f to the %s (inner"
                            + " diameter), ±%.1f.",
                    100 * outer.map(row -> row.share().share()).orElse(0.0),
                    film.conditions().outerSide(),
                    100 * inner.map(row -> row.share().share()).orElse(0.0),
                    film.conditions().innerSide(),
                    Math.max(0.1, Math.ceil(1000 * half) / 10)));
            split.row(PathEnd.Border.SUPPLY, Destination.SUPPLY)
                    .ifPresent(row -> s.append(String.format(
                            Locale.ROOT,
                            " %.1f of them go back into the feed.",
                            100 * row.share().share())));
        } else {
            s.append("No supply gas enters the film.");
        }
        s.append(' ').append(crossing());
        return s.toString();
    }

    private String crossing() {
        Film film = flow.film();
        BorderBalance balance = split.balance();
        if (balance.outerIn() <= 1e-9 * balance.inflow()) {
            return String.format(
                    Locale.ROOT,
                    "No gas enters the film from the %s.",
                    film.conditions().outerSide());
        }
        Optional<SplitRow> row = split.row(PathEnd.Border.OUTER, Destination.INNER);
        String enters = String.format(
                Locale.ROOT,
                "%.4g g/h of gas enter the film from the %s;",
                EngineerUnits.gramsPerHour(balance.outerIn()),
                film.conditions().outerSide());
        if (row.isEmpty() || row.get().share().share() == 0) {
            return enters
                    + String.format(
                            Locale.ROOT,
                            " none was found to reach the %s: less than %.2f %% of it.",
                            film.conditions().innerSide(),
                            100 * row.map(r -> r.share().high()).orElse(1.0));
        }
        return enters
                + String.format(
                        Locale.ROOT,
                        " %.1f %% of it (%.4g g/h) REACHES THE %s.",
                        100 * row.get().share().share(),
                        EngineerUnits.gramsPerHour(row.get().massFlow()),
                        film.conditions().innerSide().toUpperCase(Locale.ROOT));
    }

    private String rowText(SplitRow row, boolean backward) {
        Film film = flow.film();
        String from = row.from()
                .map(border -> switch (border) {
                    case SUPPLY -> "supply";
                    case INNER -> film.conditions().innerSide();
                    case OUTER -> film.conditions().outerSide();
                })
                .orElse("not traced back");
        String to = switch (row.to()) {
            case INNER -> film.conditions().innerSide();
            case OUTER -> film.conditions().outerSide();
            case SUPPLY -> "feed";
            case HELD -> "held inside";
            case LOST -> "not known";
        };
        return String.format(
                Locale.ROOT,
                "%-28s %11s %11s  %-22s %-30s %s%n",
                (backward ? "  " : "") + from + " → " + to,
                EngineerUnits.digits(EngineerUnits.gramsPerHour(row.massFlow())),
                EngineerUnits.digits(EngineerUnits.normalLitresPerMinute(row.massFlow(), film.gas())),
                String.format(
                        Locale.ROOT,
                        "%.4f (%.4f–%.4f)",
                        row.share().share(),
                        row.share().low(),
                        row.share().high()),
                row.residenceTime().map(q -> three(q, 1e3)).orElse("—"),
                row.revolutions().map(q -> three(q, 1)).orElse("—"));
    }

    private static String three(Quantiles q, double scale) {
        return String.format(Locale.ROOT, "%.3f / %.3f / %.3f", scale * q.p10(), scale * q.p50(), scale * q.p90());
    }

    private void integral(StringBuilder s, String name, double massFlow, double supply) {
        s.append(String.format(
                Locale.ROOT,
                "  %-26s %11s %11s  %s%n",
                name,
                EngineerUnits.digits(EngineerUnits.gramsPerHour(massFlow)),
                EngineerUnits.digits(EngineerUnits.normalLitresPerMinute(
                        massFlow, flow.film().gas())),
                supply > 0 ? String.format(Locale.ROOT, "%.4f of the supply", massFlow / supply) : ""));
    }
}
