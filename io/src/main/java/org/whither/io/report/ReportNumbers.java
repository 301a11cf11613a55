package org.whither.io.report;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Eddies;
import org.whither.eddy.Zone;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.Validity;
import org.whither.io.result.Cautions;
import org.whither.io.result.EngineerUnits;
import org.whither.io.result.FieldSummary;
import org.whither.io.result.SplitResult;
import org.whither.trace.PathEnd;

/** The numbers of a report as one JSON document: in the engineer's units where the name of a value tells one, else SI. */
public final class ReportNumbers {
    private static final List<PathEnd.Border> DIAMETERS = List.of(PathEnd.Border.OUTER, PathEnd.Border.INNER);

    private final SplitResult result;
    private final Film film;
    private final BorderBalance balance;

    private ReportNumbers(SplitResult result) {
        this.result = result;
        this.film = result.flow().film();
        this.balance = result.split().balance();
    }

    /**
     * The numbers of one field.
     *
     * @param result its split
     * @param version version of the program
     * @param age how old its gas is, or empty where it was not looked for
     * @param eddies its recirculation, or empty where it was not looked for
     */
    public static ObjectNode of(SplitResult result, String version, Optional<AgeMap> age, Optional<Eddies> eddies) {
        return new ReportNumbers(result).root(version, age, eddies);
    }

    private ObjectNode root(String version, Optional<AgeMap> age, Optional<Eddies> eddies) {
        ObjectNode split = result.json();
        JsonNode summary = new FieldSummary(result.flow()).json(result.file(), result.sha256());
        ObjectNode root = JsonNodeFactory.instance.objectNode();
        root.put("result", "report");
        root.put("version", 1);
        root.put("program", version);
        root.set("field", split.remove("field"));
        settings(root.putObject("settings"));
        root.put("answer", result.answer());
        root.put("is_result", result.isResult());
        root.put("closes", result.closes());
        root.put("complete", result.complete());
        root.set("warnings", split.remove("warnings"));
        conditions(root.putObject("conditions"), summary);
        flows(root.putArray("flows"));
        checks(root.putArray("three_ways"));
        certainty(root.putObject("certainty"), summary);
        validity(root.putArray("validity"));
        ResidenceDistribution.of(result.split()).ifPresent(d -> root.set("residence_distribution", d.json()));
        age.ifPresent(map -> age(root.putObject("age"), map));
        // Times of the clock differ from run to run; the cautions stand below.
        split.remove(List.of("wall_seconds", "caution", "result", "version", "validity"));
        root.set("split", split);
        eddies.ifPresent(found -> recirculation(root.putObject("recirculation"), found));
        root.put("caution", Cautions.TEXT);
        return root;
    }

    private void settings(ObjectNode node) {
        node.put("frame", name(result.settings().frame()));
        node.put("interpolation", result.flow().interpolation());
        node.put("tolerance", result.settings().tolerance());
        node.put("width", result.settings().width());
        node.put("seed", result.settings().seed());
        node.put("most_tracers", result.settings().mostTracers());
        node.put("most_steps", result.settings().mostSteps());
    }

    private void conditions(ObjectNode node, JsonNode summary) {
        Conditions conditions = film.conditions();
        node.put("speed_rpm", EngineerUnits.revolutionsPerMinute(conditions.rotationRate()));
        conditions.pressureSupply().ifPresent(pressure -> node.put("pressure_supply_bar", EngineerUnits.bar(pressure)));
        node.put("pressure_inner_bar", EngineerUnits.bar(conditions.pressureInner()));
        node.put("pressure_outer_bar", EngineerUnits.bar(conditions.pressureOuter()));
        node.put(
                "film_pressure_low_bar",
                EngineerUnits.bar(summary.at("/pressure/0").asDouble()));
        node.put(
                "film_pressure_high_bar",
                EngineerUnits.bar(summary.at("/pressure/1").asDouble()));
        node.put("film_thickness_low_um", 1e6 * summary.at("/film_thickness/0").asDouble());
        node.put("film_thickness_high_um", 1e6 * summary.at("/film_thickness/1").asDouble());
        node.put("inner_diameter_mm", 2e3 * film.grid().innerRadius());
        node.put("outer_diameter_mm", 2e3 * film.grid().outerRadius());
        node.put("temperature_c", conditions.temperature() - 273.15);
        node.put("gas", film.gas().name());
        node.put("molar_mass_g_mol", 1e3 * film.gas().molarMass());
        node.put("viscosity_upa_s", 1e6 * film.gas().viscosity());
        node.put("inner_side", conditions.innerSide());
        node.put("outer_side", conditions.outerSide());
        node.put("sectors", film.grid().sectors());
        node.put("cells_theta", film.grid().cellsTheta());
        node.put("cells_radial", film.grid().cellsRadial());
        node.put("kind", summary.get("kind").asText());
        node.put("film_mass_mg", 1e6 * result.split().filmMass());
    }

    // ---- flows -----------------------------------------------------------------------------------------------------

    private void flows(ArrayNode flows) {
        double negligible = Split.NEGLIGIBLE * balance.inflow();
        flow(flows, "supply", "Supply consumption", balance.supplyIn(), false);
        if (balance.supplyOut() > negligible) {
            flow(flows, "back_into_feed", "Back into the feed", balance.supplyOut(), false);
        }
        for (PathEnd.Border side : DIAMETERS) {
            flow(flows, "leaves_" + name(side), "Leakage to " + place(side), leaving(side), false);
            List<SplitRow> parts = result.split().table().stream()
                    .filter(row -> row.to().name().equals(side.name()) && row.massFlow() > 0)
                    .toList();
            if (parts.size() > 1) {
                for (SplitRow part : parts) {
                    PathEnd.Border from = part.from().orElseThrow();
                    flow(
                            flows,
                            "leaves_" + name(side) + "_from_" + name(from),
                            "of which " + origin(from),
                            part.massFlow(),
                            true);
                }
            }
        }
        for (PathEnd.Border side : DIAMETERS) {
            double entering = side == PathEnd.Border.INNER ? balance.innerIn() : balance.outerIn();
            if (entering > negligible) {
                flow(flows, "enters_" + name(side), "Drawn in from " + place(side), entering, false);
            }
        }
    }

    private void flow(ArrayNode flows, String key, String words, double found, boolean part) {
        // What rounding leaves is no flow.
        double massFlow = found > Split.NEGLIGIBLE * balance.inflow() ? found : 0;
        ObjectNode node = flows.addObject();
        node.put("name", key);
        node.put("words", words);
        node.put("part", part);
        node.put("mass_flow", massFlow);
        node.put("g_h", EngineerUnits.gramsPerHour(massFlow));
        node.put("nl_min", EngineerUnits.normalLitresPerMinute(massFlow, film.gas()));
        node.put("scfm", EngineerUnits.standardCubicFeetPerMinute(massFlow, film.gas()));
    }

    private double leaving(PathEnd.Border side) {
        return side == PathEnd.Border.INNER ? balance.innerOut() : balance.outerOut();
    }

    /** What leaves over each diameter, told in three ways that do not depend on each other. */
    private void checks(ArrayNode checks) {
        for (PathEnd.Border side : DIAMETERS) {
            if (leaving(side) <= 0) {
                continue;
            }
            ObjectNode node = checks.addObject();
            node.put("to", name(side));
            node.put("words", "Leaves to " + place(side));
            node.put(
                    "forward_g_h", EngineerUnits.gramsPerHour(sum(result.split().table(), side)));
            List<SplitRow> back = result.split().backwardTable().stream()
                    .filter(row -> row.from().isPresent())
                    .toList();
            node.put("backward_g_h", EngineerUnits.gramsPerHour(sum(back, side)));
            node.put("integral_g_h", EngineerUnits.gramsPerHour(leaving(side)));
        }
    }

    private static double sum(List<SplitRow> rows, PathEnd.Border side) {
        return rows.stream()
                .filter(row -> row.to() == Destination.valueOf(side.name()))
                .mapToDouble(SplitRow::massFlow)
                .sum();
    }

    /** How old the gas is along the radius (m, s); null where it is older than the limit or not known. */
    private static void age(ObjectNode node, AgeMap map) {
        node.put("points", map.phases() * map.radii() * map.heights());
        number(node, "p50", map.film(0.5));
        ArrayNode radius = node.putArray("radius");
        for (int q = 0; q < map.radii(); q++) {
            radius.add(map.radius(q));
        }
        for (int share : new int[] {10, 50, 75}) {
            ArrayNode ages = node.putArray("ring_p" + share);
            for (int q = 0; q < map.radii(); q++) {
                double found = map.ring(q, 0.01 * share);
                if (Double.isFinite(found)) {
                    ages.add(found);
                } else {
                    ages.addNull();
                }
            }
        }
    }

    private static void recirculation(ObjectNode node, Eddies eddies) {
        node.put("held_mass_share", eddies.heldMassShare());
        node.put("held_low", eddies.heldLow());
        node.put("held_high", eddies.heldHigh());
        node.put("held_after", eddies.heldAfter());
        node.put("patience", eddies.settings().patience());
        node.put("median_residence", eddies.medianResidence());
        node.put("creeping_mass_share", eddies.creepingMassShare());
        node.put("smallest_seen", eddies.smallestSeen());
        node.put("reversed_volume_share", eddies.reversed().volumeShare());
        node.put("uphill_volume_share", eddies.reversed().uphillShare());
        node.put("settled", eddies.settled());
        node.put("tracers", eddies.tracers());
        ArrayNode zones = node.putArray("zones");
        for (Zone zone : eddies.zones()) {
            ObjectNode each = zones.addObject();
            each.put("count", zone.count());
            each.put("diameter_mm", 2e3 * zone.centre().radius());
            each.put("sigma", zone.centre().sigma());
            each.put("diameter_from_mm", 2e3 * zone.radius().low());
            each.put("diameter_to_mm", 2e3 * zone.radius().high());
            each.put("mass_share", zone.massShare());
            each.put("volume", zone.volume());
            each.put("mass", zone.mass());
            each.put("sense", zone.sense().words());
            zone.turnoverTime().ifPresent(time -> each.put("turnover_time", time));
        }
        eddies.notes().forEach(node.putArray("notes")::add);
    }

    private static void number(ObjectNode node, String name, double value) {
        if (Double.isFinite(value)) {
            node.put(name, value);
        } else {
            node.putNull(name);
        }
    }

    // ---- how sure --------------------------------------------------------------------------------------------------

    private void certainty(ObjectNode node, JsonNode summary) {
        node.put("sampling_percent", 100 * result.split().uncertainty().sampling());
        node.put("wanted_percent", 100 * result.settings().width());
        node.put("tracers", result.split().tracers());
        node.put(
                "checks",
                result.split().maps().stream().mapToLong(map -> map.checks()).sum());
        node.put(
                "wrong_checks",
                result.split().maps().stream()
                        .mapToLong(map -> map.wrongChecks())
                        .sum());
        node.put("unsettled_percent", 100 * result.split().unsettledShare());
        node.put("held_percent", 100 * result.split().heldShare());
        node.put("lost_percent", 100 * result.split().lostShare());
        var integration = result.split().uncertainty().integration();
        node.put("followed_again", integration.tracers());
        if (integration.tracers() > 0) {
            node.put("other_tolerance", integration.tolerance());
            node.put("ends_changed_percent", 100 * integration.changedEnds());
            if (!Double.isNaN(integration.residenceChange())) {
                node.put("times_changed_percent", 100 * integration.residenceChange());
            }
        }
        node.put("closure_percent", 100 * summary.get("field_closure").asDouble());
        if (summary.has("flow_correction")) {
            node.put("balanced_percent", 100 * summary.get("flow_correction").asDouble());
        }
        node.put("shares", shares());
        node.put("flows", flowsCertainty());
    }

    private String shares() {
        if (!result.isResult()) {
            return "none";
        }
        return result.closes()
                        && result.split().lostShare() == 0
                        && result.split().widthReached()
                ? "sure"
                : "fair";
    }

    private String flowsCertainty() {
        return !result.isResult() ? "none" : result.closes() ? "sure" : "fair";
    }

    private void validity(ArrayNode bounds) {
        Validity validity = Validity.of(result.flow());
        bound(
                bounds,
                "reduced_reynolds",
                "Reduced Reynolds number",
                validity.reducedReynolds(),
                Validity.REYNOLDS_BOUND,
                "inertia beside viscosity in a thin film");
        bound(
                bounds,
                "knudsen",
                "Knudsen number",
                validity.knudsen(),
                Validity.KNUDSEN_BOUND,
                "flight of a molecule in film thicknesses; beyond the bound the gas slips along the faces");
        bound(
                bounds,
                "exit_mach",
                "Exit Mach number",
                validity.exitMach(),
                Validity.MACH_BOUND,
                "speed of the leaving gas over that of sound; beyond the bound the exit may choke");
        bound(
                bounds,
                "film_slope",
                "Film slope",
                validity.slope(),
                Validity.SLOPE_BOUND,
                "steepest change of the film thickness along the face, groove walls left out");
    }

    private static void bound(ArrayNode bounds, String key, String words, double value, double bound, String meaning) {
        ObjectNode node = bounds.addObject();
        node.put("name", key);
        node.put("words", words);
        node.put("value", value);
        node.put("bound", bound);
        node.put("within", value <= bound);
        node.put("meaning", meaning);
    }

    // ---- names -----------------------------------------------------------------------------------------------------

    private String place(PathEnd.Border side) {
        return place(film.conditions(), side);
    }

    static String place(Conditions conditions, PathEnd.Border side) {
        String diameter = side == PathEnd.Border.INNER ? "inner diameter" : "outer diameter";
        String name = side == PathEnd.Border.INNER ? conditions.innerSide() : conditions.outerSide();
        return name.isBlank() ? "the " + diameter : "the " + name + " (" + diameter + ")";
    }

    private String origin(PathEnd.Border from) {
        return from == PathEnd.Border.SUPPLY ? "supply gas" : "gas from " + place(from);
    }

    private static String name(Enum<?> value) {
        return value.name().toLowerCase(Locale.ROOT);
    }
}
