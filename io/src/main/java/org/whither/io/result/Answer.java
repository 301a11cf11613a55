package org.whither.io.result;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.fate.Destination;
import org.whither.fate.Interval;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.film.Conditions;
import org.whither.trace.PathEnd;

/** The answer of a split in a sentence or two: where the supply gas goes, and whether gas crosses the film. */
final class Answer {
    private final SplitResult result;
    private final Split split;
    private final Conditions conditions;

    private Answer(SplitResult result) {
        this.result = result;
        this.split = result.split();
        this.conditions = result.flow().film().conditions();
    }

    static String of(SplitResult result) {
        if (!result.isResult()) {
            return String.format(
                    Locale.ROOT,
                    "No answer can be given: of the gas that enters the film of this field, %.1f %% is missing or too much"
                            + " where it leaves, above the %.0f %% that a result may have.",
                    100 * Math.abs(result.closure()),
                    100 * ClosureVerdict.NO_RESULT_ABOVE);
        }
        Answer answer = new Answer(result);
        return answer.supply() + " " + answer.crossings();
    }

    // ---- supply gas ------------------------------------------------------------------------------------------------

    private String supply() {
        if (result.flow().film().supply().isEmpty()) {
            return "The field names no feed: there is no supply gas to account for.";
        }
        if (!result.feedLetsGasIn()) {
            double back = split.balance().supplyOut();
            return back > Split.NEGLIGIBLE * split.balance().inflow()
                    ? String.format(
                            Locale.ROOT,
                            "No supply gas enters the film: %s g/h of its gas leave through the feed.",
                            EngineerUnits.digits(EngineerUnits.gramsPerHour(back)))
                    : "No supply gas enters the film.";
        }
        double half = half();
        int decimals = decimals(half);
        StringBuilder s = new StringBuilder(String.format(
                Locale.ROOT,
                "Of every 100 kg of supply gas, %s leave to %s and %s to %s",
                kilograms(Destination.OUTER, decimals),
                place(PathEnd.Border.OUTER),
                kilograms(Destination.INNER, decimals),
                place(PathEnd.Border.INNER)));
        double step = Math.pow(10, -decimals);
        String within = String.format(Locale.ROOT, "±%." + decimals + "f", shown(half, step));
        s.append(" (").append(within);
        if (!split.widthReached()) {
            double wanted = 50 * result.settings().width();
            s.append(String.format(Locale.ROOT, "; the wanted ±%." + decimals(wanted) + "f was not reached", wanted));
        }
        s.append(")");
        rest(s, Destination.SUPPLY, decimals, "%s go back into the feed");
        rest(
                s,
                Destination.HELD,
                decimals,
                "%s were still in the film after " + EngineerUnits.digits(1e3 * split.timeLimit()) + " ms");
        return s.append('.').toString();
    }

    private void rest(StringBuilder s, Destination destination, int decimals, String words) {
        if (kilograms(destination) >= 0.5 * Math.pow(10, -decimals)) {
            s.append("; ").append(String.format(Locale.ROOT, words, kilograms(destination, decimals)));
        }
    }

    /** The farthest that any bound of a share of the supply gas lies from it, in kg of 100. */
    private double half() {
        double half = 0;
        for (Destination destination : List.of(Destination.INNER, Destination.OUTER)) {
            Optional<SplitRow> row = split.row(PathEnd.Border.SUPPLY, destination);
            if (row.isPresent()) {
                Interval share = row.get().share();
                half = Math.max(half, 100 * Math.max(share.share() - share.low(), share.high() - share.share()));
            }
        }
        return half;
    }

    /** Decimals of a value of kg in 100, so that its bound has one digit; one at least, three at most. */
    private static int decimals(double half) {
        return half >= 0.095 ? 1 : half >= 0.0095 ? 2 : 3;
    }

    /** A bound rounded up to a step, but for what is lost in the rounding of its last digits. */
    private static double shown(double half, double step) {
        return Math.max(step, Math.ceil(half / step - 0.05) * step);
    }

    private double kilograms(Destination destination) {
        return 100
                * split.row(PathEnd.Border.SUPPLY, destination)
                        .map(row -> row.share().share())
                        .orElse(0.0);
    }

    private String kilograms(Destination destination, int decimals) {
        return String.format(Locale.ROOT, "%." + decimals + "f", kilograms(destination));
    }

    // ---- gas of the diameters --------------------------------------------------------------------------------------

    private String crossings() {
        List<String> said = new ArrayList<>();
        for (PathEnd.Border from : List.of(PathEnd.Border.OUTER, PathEnd.Border.INNER)) {
            if (result.inflow(from) > Split.NEGLIGIBLE * split.balance().inflow()) {
                said.add(crossing(from, from == PathEnd.Border.OUTER ? PathEnd.Border.INNER : PathEnd.Border.OUTER));
            } else if (!isAtmosphere(from)) {
                said.add(capital("no " + gas(from)) + " enters the film.");
            }
        }
        return said.isEmpty() ? "No gas enters the film over either diameter." : String.join(" ", said);
    }

    private String crossing(PathEnd.Border from, PathEnd.Border to) {
        Optional<SplitRow> row = split.row(from, Destination.valueOf(to.name()));
        double leakage = result.leaving(to);
        double share = row.map(r -> r.share().share()).orElse(0.0);
        double most = row.map(r -> r.share().high()).orElse(1.0) * result.inflow(from);
        String enters = EngineerUnits.digits(EngineerUnits.gramsPerHour(result.inflow(from))) + " g/h enter the film";
        if (share == 0) {
            return String.format(
                    Locale.ROOT,
                    "%s was found to reach %s: %s (%s).",
                    capital("no " + gas(from)),
                    place(to),
                    leakage > 0
                            ? "less than " + percentUp(Math.min(1, most / leakage)) + " of the leakage to it"
                            : "no gas leaves there",
                    enters);
        }
        double reaching = share * result.inflow(from);
        return String.format(
                Locale.ROOT,
                "%s REACHES %s: %s g/h, %s of the leakage to it (%s).",
                capital(gas(from)),
                place(to),
                EngineerUnits.digits(EngineerUnits.gramsPerHour(reaching)),
                leakage > 0 ? percent(Math.min(1, reaching / leakage)) : "all",
                enters);
    }

    /** A share in per cent, to a tenth, or where it is less than one per cent to a hundredth. */
    private static String percent(double share) {
        return String.format(Locale.ROOT, share < 0.01 ? "%.2f %%" : "%.1f %%", 100 * share);
    }

    /** The same for an upper bound, rounded up. */
    private static String percentUp(double share) {
        double step = share < 0.01 ? 1e-4 : 1e-3;
        return percent(Math.min(1, Math.max(step, Math.ceil(share / step - 1e-9) * step)));
    }

    private String side(PathEnd.Border border) {
        return border == PathEnd.Border.INNER ? conditions.innerSide() : conditions.outerSide();
    }

    /** A side by its name, and by its diameter where the names do not tell the two apart. */
    private String place(PathEnd.Border border) {
        String diameter = border == PathEnd.Border.INNER ? "inner diameter" : "outer diameter";
        if (side(border).isBlank()) {
            return "the " + diameter;
        }
        return "the " + side(border)
                + (conditions.innerSide().equals(conditions.outerSide()) ? " at the " + diameter : "");
    }

    private String gas(PathEnd.Border border) {
        return isAtmosphere(border)
                        || side(border).isBlank()
                        || side(border).contains(" ")
                        || conditions.innerSide().equals(conditions.outerSide())
                ? "gas from " + place(border)
                : side(border) + " gas";
    }

    private boolean isAtmosphere(PathEnd.Border border) {
        return side(border).toLowerCase(Locale.ROOT).contains("atmosphere");
    }

    private static String capital(String words) {
        int first = words.isEmpty() ? 0 : words.offsetByCodePoints(0, 1);
        return words.substring(0, first).toUpperCase(Locale.ROOT) + words.substring(first);
    }
}
