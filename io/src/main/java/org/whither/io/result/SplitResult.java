package org.whither.io.result;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.fate.BorderBalance;
import org.whither.fate.BorderMap;
import org.whither.fate.Destination;
import org.whither.fate.Interval;
import org.whither.fate.Quantiles;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.fate.SplitSettings;
import org.whither.fate.Travel;
import org.whither.fate.Uncertainty;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Validity;
import org.whither.trace.Direction;
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

    private static final int COLUMNS = 120;

    /** How far the border flows close, as a share of the inflow, before the flows are balanced for tracing. */
    double closure() {
        return BorderBalance.closureOfField(flow, split.balance());
    }

    /** Whether the border flows close within the wanted width. */
    public boolean closes() {
        return Math.abs(closure()) <= Math.min(settings.width(), ClosureVerdict.NO_RESULT_ABOVE);
    }

    /** Whether the border flows close well enough for this to be called a result at all. */
    public boolean isResult() {
        return ClosureVerdict.of(closure()) != ClosureVerdict.NO_RESULT;
    }

    /** Whether the feed that the file names lets gas in; true where it names none. */
    boolean feedLetsGasIn() {
        return flow.film().supply().isEmpty()
                || split.balance().supplyIn()
                        > Split.NEGLIGIBLE * split.balance().inflow();
    }

    /** Whether nothing of the table is missing: the feed lets gas in and every tracer was followed to an end. */
    public boolean complete() {
        return feedLetsGasIn() && split.lostShare() == 0;
    }

    /** What a user must know, a sentence each, the gravest first. */
    public List<String> warnings() {
        List<String> said = new ArrayList<>();
        double closure = closure();
        if (!isResult()) {
            said.add(String.format(
                    Locale.ROOT,
                    "NO RESULT: %.2f %% of the inflow is missing or too much in the border flows of the field, above"
                            + " %.0f %%. The field is not converged, or a part of its border is not in the file; the numbers"
                            + " below only help to find out which.",
                    100 * closure,
                    100 * ClosureVerdict.NO_RESULT_ABOVE));
        } else if (Math.abs(closure) > Math.min(settings.width(), ClosureVerdict.DOUBTFUL_ABOVE)) {
            said.add(String.format(
                    Locale.ROOT,
                    "The border flows of the field do not close: %.3f %% of the inflow is missing or too much, above %s, and"
                            + " no share below is surer than that.",
                    100 * closure,
                    settings.width() < ClosureVerdict.DOUBTFUL_ABOVE
                            ? "the wanted width of " + settings.width()
                            : String.format(Locale.ROOT, "%.1f %%", 100 * ClosureVerdict.DOUBTFUL_ABOVE)));
        }
        if (!feedLetsGasIn()) {
            said.add(
                    "No gas enters through the feed (/supply): the table has no supply gas. Check the supply pressure, the"
                            + " feed's place and its mass_flux; what is below is of the other gas.");
        }
        if (!split.widthReached() && split.lostShare() > 0) {
            said.add(String.format(
                    Locale.ROOT,
                    "The wanted width of %s was not reached, since tracers of %.2f %% of the gas could not be followed to an"
                            + " end; the widest interval is %.4f, with what is not known of them.",
                    settings.width(),
                    100 * split.lostShare(),
                    split.uncertainty().sampling()));
        } else if (!split.widthReached()) {
            said.add(String.format(
                    Locale.ROOT,
                    "The wanted width of %s was not reached within %d tracers and %d million steps an origin; the widest"
                            + " interval is %.4f. A greater --width ends sooner.",
                    settings.width(),
                    settings.mostTracers(),
                    settings.mostSteps() / 1_000_000,
                    split.uncertainty().sampling()));
        }
        said.addAll(disagreements());
        for (BorderMap map : split.maps()) {
            if (map.direction() == Direction.BACKWARD && !map.reached()) {
                said.add(String.format(
                        Locale.ROOT,
                        "Followed back from %s, the gas is mapped to %.2f %% only; that confirms the table less sharply.",
                        place(map.border()),
                        100 * Math.min(1, map.unsettled() + map.missedBound())));
            }
        }
        double changed = split.uncertainty().integration().changedEnds();
        if (changed > settings.width()) {
            said.add(String.format(
                    Locale.ROOT,
                    "With a tolerance of %.0e instead of %.0e, %.2f %% of the gas ends elsewhere, more than the wanted"
                            + " width: give a smaller --tolerance.",
                    split.uncertainty().integration().tolerance(),
                    settings.tolerance(),
                    100 * changed));
        }
        said.addAll(split.notes());
        FieldSummary.correctionWarning(flow).ifPresent(said::add);
        said.addAll(Validity.of(flow).warnings());
        return said;
    }

    private String place(PathEnd.Border border) {
        return switch (border) {
            case SUPPLY -> "the feed";
            case INNER -> "the inner diameter";
            case OUTER -> "the outer diameter";
        };
    }

    /** Where forward and backward tracers and boundary integrals differ by more than their intervals and the width. */
    private List<String> disagreements() {
        List<String> said = new ArrayList<>();
        BorderBalance balance = split.balance();
        double slack = settings.width() * balance.inflow();
        for (SplitRow back : split.backwardTable()) {
            if (back.from().isEmpty()) {
                continue;
            }
            double origin = inflow(back.from().get());
            Interval forward = split.row(back.from().get(), back.to())
                    .map(SplitRow::share)
                    .orElse(new Interval(0, 0, split.uncertainty().sampling()));
            double apart = origin
                    * Math.max(forward.low() - back.share().high(), back.share().low() - forward.high());
            if (apart > slack) {
                said.add(String.format(
                        Locale.ROOT,
                        "Of the gas from %s, a share of %.4f … %.4f goes to %s followed forward, but %.4f … %.4f followed"
                                + " back: they are further apart than the wanted width.",
                        place(back.from().get()),
                        forward.low(),
                        forward.high(),
                        back.to() == Destination.SUPPLY ? "the feed" : "the " + name(back.to()) + " diameter",
                        back.share().low(),
                        back.share().high()));
            }
        }
        for (PathEnd.Border side : PathEnd.Border.values()) {
            double leaving = leaving(side);
            double low = 0;
            double high = 0;
            for (SplitRow row : split.table()) {
                if (row.to().name().equals(side.name())) {
                    low += row.share().low() * inflow(row.from().orElseThrow());
                    high += row.share().high() * inflow(row.from().orElseThrow());
                }
            }
            if (leaving < low - slack || leaving > high + slack) {
                said.add(String.format(
                        Locale.ROOT,
                        "By tracers %.4g … %.4g g/h leave over %s, by the boundary integral %.4g g/h: they are further apart"
                                + " than the wanted width.",
                        EngineerUnits.gramsPerHour(low),
                        EngineerUnits.gramsPerHour(high),
                        place(side),
                        EngineerUnits.gramsPerHour(leaving)));
            }
        }
        return said;
    }

    double inflow(PathEnd.Border border) {
        return switch (border) {
            case SUPPLY -> split.balance().supplyIn();
            case INNER -> split.balance().innerIn();
            case OUTER -> split.balance().outerIn();
        };
    }

    double leaving(PathEnd.Border border) {
        return switch (border) {
            case SUPPLY -> split.balance().supplyOut();
            case INNER -> split.balance().innerOut();
            case OUTER -> split.balance().outerOut();
        };
    }

    // ---- JSON ------------------------------------------------------------------------------------------------------

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
        root.put("unsettled_share", split.unsettledShare());
        root.put("lost_share", split.lostShare());
        root.put("width_reached", split.widthReached());
        root.put("is_result", isResult());
        rows(root.putArray("backward_table"), split.backwardTable());
        root.set("balance", ResultJson.balance(split.balance()));
        uncertainty(root.putObject("uncertainty"));
        maps(root.putArray("maps"));
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
            if (row.shortestTime().isPresent()) {
                node.put("shortest_time", row.shortestTime().getAsDouble());
            }
            row.travel().ifPresent(travel -> {
                quantiles(node, "path_length", Optional.of(travel.pathLength()));
                quantiles(node, "lowest_pressure", Optional.of(travel.lowestPressure()));
                quantiles(node, "highest_pressure", Optional.of(travel.highestPressure()));
                node.putArray("pressure_range").add(travel.pressureFrom()).add(travel.pressureTo());
                travel.exitPhase().forEach(node.putArray("exit_phase")::add);
                travel.exitHeight().forEach(node.putArray("exit_height")::add);
                node.put("tracers", travel.tracers());
            });
        }
    }

    private void uncertainty(ObjectNode node) {
        Uncertainty uncertainty = split.uncertainty();
        ObjectNode integration = node.putObject("integration");
        integration.put("tolerance", uncertainty.integration().tolerance());
        integration.put("tracers", uncertainty.integration().tracers());
        number(integration, "changed_ends", uncertainty.integration().changedEnds());
        number(integration, "residence_change", uncertainty.integration().residenceChange());
        node.put("sampling", uncertainty.sampling());
        ObjectNode field = node.putObject("field");
        number(field, "closure", uncertainty.closure());
        uncertainty.flowCorrection().ifPresent(correction -> field.put("flow_correction", correction));
    }

    private static void number(ObjectNode node, String name, double value) {
        if (Double.isNaN(value)) {
            node.putNull(name);
        } else {
            node.put(name, value);
        }
    }

    private void maps(ArrayNode array) {
        for (BorderMap map : split.maps()) {
            ObjectNode node = array.addObject();
            node.put("border", name(map.border()));
            node.put("direction", name(map.direction()));
            node.put("mass_flow", map.massFlow());
            node.put("patches", map.patches());
            node.put("map_tracers", map.mapTracers());
            node.put("mixed_share", map.mixed());
            node.put("samples", map.samples());
            node.put("checks", map.checks());
            node.put("wrong_checks", map.wrongChecks());
            node.put("unsettled_share", map.unsettled());
            node.put("missed_bound", map.missedBound());
            node.put("steps", map.steps());
            node.put("reached", map.reached());
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

    // ---- words -----------------------------------------------------------------------------------------------------

    /** The split in plain words and the engineer's units, in lines of at most 120 columns. */
    public String text() {
        Film film = flow.film();
        StringBuilder s = new StringBuilder();
        for (String warning : warnings()) {
            wrap(s, "Warning: " + warning);
        }
        wrap(s, answer());
        line(s, "");
        line(
                s,
                "%-27s %10s %10s  %-22s %-22s %-22s",
                "gas",
                "g/h",
                "Nl/min",
                "share (95 % interval)",
                "ms in film, 10/50/90 %",
                "turns*, 10/50/90 %");
        for (SplitRow row : split.table()) {
            rowText(s, row, false);
        }
        line(s, "followed back from where it leaves:");
        for (SplitRow row : split.backwardTable()) {
            rowText(s, row, true);
        }
        line(s, "by the boundary integrals:");
        BorderBalance balance = split.balance();
        integral(s, "from the feed", balance.supplyIn());
        if (balance.supplyOut() > 0) {
            integral(s, "back into the feed", balance.supplyOut());
        }
        integral(s, "to the " + film.conditions().innerSide() + " (inner)", balance.innerOut());
        integral(s, "to the " + film.conditions().outerSide() + " (outer)", balance.outerOut());
        if (balance.innerIn() > 0) {
            integral(s, "from the " + film.conditions().innerSide(), balance.innerIn());
        }
        if (balance.outerIn() > 0) {
            integral(s, "from the " + film.conditions().outerSide(), balance.outerIn());
        }
        line(s, "");
        line(
                s,
                "%-27s %11s  %-23s %-17s  %-8s %s",
                "on the way",
                "shortest ms",
                "path* mm, 10/50/90 %",
                "bar(a) met",
                "exit σ",
                "most leaves at");
        for (SplitRow row : split.table()) {
            travelText(s, row);
        }
        line(s, "* seen in the stationary frame; turns positive towards +θ");
        line(s, "");
        uncertaintyText(s);
        line(s, "");
        wrap(s, "Caution: " + Cautions.TEXT);
        return s.toString().stripTrailing();
    }

    private void uncertaintyText(StringBuilder s) {
        Uncertainty uncertainty = split.uncertainty();
        Uncertainty.Integration integration = uncertainty.integration();
        line(s, "Uncertain by");
        if (integration.tracers() > 0) {
            line(
                    s,
                    "  integration  %d tracers followed again with tolerance %.0e: %s of the gas ends elsewhere; times change"
                            + " by %.0e",
                    integration.tracers(),
                    integration.tolerance(),
                    EngineerUnits.percent(integration.changedEnds()),
                    integration.residenceChange());
        }
        line(s, "  sampling     widest interval %.5f; wanted %s", uncertainty.sampling(), settings.width());
        line(
                s,
                "  field        closure %.1e of the inflow%s; interpolation %s",
                closure(),
                uncertainty.flowCorrection().isPresent()
                        ? String.format(
                                Locale.ROOT,
                                "; flows of the cells balanced by %.1e",
                                uncertainty.flowCorrection().getAsDouble())
                        : "",
                flow.interpolation());
        line(
                s,
                "held %s; not settled %s; %d tracers, %d steps, %.1f s",
                EngineerUnits.percent(split.heldShare()),
                EngineerUnits.percent(split.unsettledShare()),
                split.tracers(),
                split.steps(),
                seconds);
        line(
                s,
                "%-34s %8s %8s %8s %13s %8s %7s %14s",
                "maps",
                "tracers",
                "patches",
                "samples",
                "not settled",
                "checks",
                "wrong",
                "missed below");
        for (BorderMap map : split.maps()) {
            line(
                    s,
                    "%-34s %8d %8d %8d %11.3f %% %8d %7d %12.3f %%",
                    "  " + name(map.direction()) + " from " + place(map.border()),
                    map.mapTracers(),
                    map.patches(),
                    map.samples(),
                    100 * map.unsettled(),
                    map.checks(),
                    map.wrongChecks(),
                    100 * map.missedBound());
        }
    }

    private static void line(StringBuilder s, String format, Object... values) {
        s.append((values.length == 0 ? format : String.format(Locale.ROOT, format, values)).stripTrailing())
                .append(System.lineSeparator());
    }

    /** Appends a sentence, broken at spaces into lines of at most 120 columns. */
    private static void wrap(StringBuilder s, String sentence) {
        StringBuilder rest = new StringBuilder();
        for (String word : sentence.split(" ")) {
            if (rest.length() > 0 && rest.length() + 1 + word.length() > COLUMNS) {
                line(s, rest.toString());
                rest.setLength(0);
                rest.append("   ");
            }
            rest.append(rest.length() == 0 ? "" : " ").append(word);
        }
        line(s, rest.toString());
    }

    /** The answer in a sentence or two, as {@link Answer} words it. */
    public String answer() {
        return Answer.of(this);
    }

    private void rowText(StringBuilder s, SplitRow row, boolean backward) {
        line(
                s,
                "%-27s %10s %10s  %-22s %-22s %-22s",
                short27((backward ? "  " : "") + pair(row)),
                EngineerUnits.digits(EngineerUnits.gramsPerHour(row.massFlow())),
                EngineerUnits.digits(EngineerUnits.normalLitresPerMinute(
                        row.massFlow(), flow.film().gas())),
                String.format(
                        Locale.ROOT,
                        "%.4f (%.4f–%.4f)",
                        row.share().share(),
                        row.share().low(),
                        row.share().high()),
                row.residenceTime().map(q -> three(q, 1e3)).orElse("—"),
                row.revolutions().map(q -> three(q, 1)).orElse("—"));
    }

    private void travelText(StringBuilder s, SplitRow row) {
        if (row.travel().isEmpty()) {
            return;
        }
        Travel travel = row.travel().get();
        line(
                s,
                "%-27s %11s  %-23s %-17s  %-8s %s",
                short27(pair(row)),
                five(1e3 * row.shortestTime().orElse(Double.NaN)),
                three(travel.pathLength(), 1e3),
                String.format(Locale.ROOT, "%.3f … %.3f", travel.pressureFrom() / 1e5, travel.pressureTo() / 1e5),
                middle(travel.exitHeight()),
                most(travel.exitPhase()));
    }

    /** The median of a histogram over 0 … 1. */
    private static String middle(List<Double> shares) {
        double below = 0;
        for (int n = 0; n < shares.size(); n++) {
            if (below + shares.get(n) >= 0.5) {
                return String.format(Locale.ROOT, "%.2f", (n + (0.5 - below) / shares.get(n)) / shares.size());
            }
            below += shares.get(n);
        }
        return "—";
    }

    /** The highest bar of a histogram round the sector, and how many times an even one it is. */
    private static String most(List<Double> shares) {
        int highest = 0;
        for (int n = 0; n < shares.size(); n++) {
            highest = shares.get(n) > shares.get(highest) ? n : highest;
        }
        return String.format(
                Locale.ROOT,
                "phase %.2f (%.1f × even)",
                (highest + 0.5) / shares.size(),
                shares.get(highest) * shares.size());
    }

    private String pair(SplitRow row) {
        Film film = flow.film();
        String from = row.from()
                .map(border -> switch (border) {
                    case SUPPLY -> "supply";
                    case INNER -> film.conditions().innerSide();
                    case OUTER -> film.conditions().outerSide();
                })
                .orElse("untraced");
        String to = switch (row.to()) {
            case INNER -> film.conditions().innerSide();
            case OUTER -> film.conditions().outerSide();
            case SUPPLY -> "feed";
            case HELD -> "held inside";
            case LOST -> "not known";
        };
        return from + " → " + to;
    }

    private static String short27(String name) {
        return name.length() <= 27 ? name : name.substring(0, 26) + "…";
    }

    private static String three(Quantiles q, double scale) {
        return five(scale * q.p10()) + " / " + five(scale * q.p50()) + " / " + five(scale * q.p90());
    }

    /** A number in about five characters. */
    private static String five(double value) {
        double size = Math.abs(value);
        return String.format(
                Locale.ROOT, size >= 1000 ? "%.0f" : size >= 100 ? "%.1f" : size >= 10 ? "%.2f" : "%.3f", value);
    }

    private void integral(StringBuilder s, String name, double massFlow) {
        double supply = split.balance().supplyIn();
        line(
                s,
                "%-27s %10s %10s  %s",
                short27("  " + name),
                EngineerUnits.digits(EngineerUnits.gramsPerHour(massFlow)),
                EngineerUnits.digits(EngineerUnits.normalLitresPerMinute(
                        massFlow, flow.film().gas())),
                supply > 0 ? String.format(Locale.ROOT, "%.4f of the supply", massFlow / supply) : "");
    }
}
