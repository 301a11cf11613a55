package org.whither.io.result;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Collection;
import java.util.List;
import java.util.Locale;
import org.whither.eddy.CriticalPoint;
import org.whither.eddy.Eddies;
import org.whither.eddy.LongStayers;
import org.whither.eddy.Place;
import org.whither.eddy.Range;
import org.whither.eddy.Sense;
import org.whither.eddy.Separatrix;
import org.whither.eddy.SmallCluster;
import org.whither.eddy.Unflushed;
import org.whither.eddy.Zone;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * The recirculation of a film as it leaves the program.
 *
 * @param flow the motion of the gas it was found in
 * @param eddies what was found
 * @param file name of the field file
 * @param sha256 its checksum
 * @param seconds wall time it took (s)
 */
public record EddiesResult(FilmFlow flow, Eddies eddies, String file, String sha256, double seconds) {
    private static final int COLUMNS = 120;
    private static final int MOST_SMALL = 5;
    private static final int MOST_LINE_POINTS = 200;

    /** Whether all was found that was looked for: the mass of every zone, and an end for every tracer. */
    public boolean complete() {
        return eddies.settled() && eddies.notes().isEmpty();
    }

    /** What a user must know, a sentence each, the gravest first. */
    public List<String> warnings() {
        List<String> said = new ArrayList<>(new FieldSummary(flow).warnings());
        if (!eddies.settled()) {
            said.add(String.format(
                    Locale.ROOT,
                    "The budget of %d tracers ended before the mass of every zone was known to 5 %%; a greater --budget goes"
                            + " on.",
                    eddies.settings().budget()));
        }
        said.addAll(eddies.notes());
        return said;
    }

    // ---- JSON ------------------------------------------------------------------------------------------------------

    /** The recirculation as JSON; SI units. */
    public ObjectNode json() {
        ObjectNode root = JsonNodeFactory.instance.objectNode();
        root.put("result", "eddies");
        root.put("version", 1);
        root.set("field", ResultJson.field(flow.film(), file, sha256));
        root.put("frame", lower(eddies.settings().frame()));
        root.put("steady_in", lower(flow.film().steadyIn()));
        root.put("interpolation", flow.interpolation());
        root.put("tolerance", eddies.settings().tolerance());
        root.put("patience", eddies.settings().patience());
        root.put("budget", eddies.settings().budget());
        root.put("seed", eddies.settings().seed());
        root.put("found", !eddies.zones().isEmpty());
        root.put("held_mass_share", eddies.heldMassShare());
        root.put("held_mass_share_low", eddies.heldLow());
        root.put("held_mass_share_high", eddies.heldHigh());
        ObjectNode byResidence = root.putObject("held_by_residence");
        byResidence.put("share", eddies.heldByResidence().share());
        byResidence.put("low", eddies.heldByResidence().low());
        byResidence.put("high", eddies.heldByResidence().high());
        byResidence.put("older_than", eddies.heldByResidence().olderThan());
        byResidence.put("share_by_tracers_inside", eddies.olderMassShare());
        root.put("creeping_mass_share", eddies.creepingMassShare());
        root.put("smallest_seen", eddies.smallestSeen());
        root.put("reversed_volume_share", eddies.reversed().volumeShare());
        root.put("uphill_volume_share", eddies.reversed().uphillShare());
        numbers(root.putArray("reversed_across"), eddies.reversed().across());
        root.put("median_residence", eddies.medianResidence());
        root.put("held_after", eddies.heldAfter());
        root.put("film_mass", eddies.filmMass());
        ArrayNode zones = root.putArray("zones");
        eddies.zones().forEach(zone -> zone(zones.addObject(), zone));
        ArrayNode small = root.putArray("small_clusters");
        for (SmallCluster cluster : eddies.small()) {
            ObjectNode node = small.addObject();
            place(node.putObject("place"), cluster.place());
            node.put("tracers", cluster.tracers());
            node.put("mass", cluster.mass());
        }
        points(root.putArray("critical_points"));
        lines(root.putArray("separatrices"));
        longStayers(root.putObject("long_stayers"));
        root.put("settled", eddies.settled());
        root.put("tracers", eddies.tracers());
        root.put("steps", eddies.steps());
        root.put("wall_seconds", seconds);
        warnings().forEach(root.putArray("warnings")::add);
        root.put("caution", Cautions.TEXT);
        return root;
    }

    private static void zone(ObjectNode node, Zone zone) {
        place(node.putObject("centre"), zone.centre());
        ObjectNode extent = node.putObject("extent");
        range(extent.putArray("theta"), zone.theta());
        range(extent.putArray("radius"), zone.radius());
        range(extent.putArray("sigma"), zone.sigma());
        node.put("volume", zone.volume());
        node.put("mass", zone.mass());
        node.put("mass_low", zone.massLow());
        node.put("mass_high", zone.massHigh());
        node.put("mass_share", zone.massShare());
        if (zone.turnoverTime().isPresent()) {
            node.put("turnover_time", zone.turnoverTime().getAsDouble());
        } else {
            node.putNull("turnover_time");
        }
        node.put("count", zone.count());
        node.put("sense", zone.sense().words());
        node.put("mean_pressure", zone.meanPressure());
        zone.dam().ifPresent(dam -> {
            ObjectNode distance = node.putObject("dam");
            distance.put("inner_edge", dam.innerEdge());
            distance.put("outer_edge", dam.outerEdge());
            distance.put("from_inner_edge", dam.fromInnerEdge());
            distance.put("from_outer_edge", dam.fromOuterEdge());
        });
        ObjectNode exchange = node.putObject("exchange");
        exchange.put("time", zone.exchange().time());
        exchange.put("from_supply", zone.exchange().fromSupply());
        exchange.put("from_inner", zone.exchange().fromInner());
        exchange.put("from_outer", zone.exchange().fromOuter());
        exchange.put("mass_flow", zone.exchange().flow());
        exchange.put("tracers", zone.exchange().tracers());
        node.put("settled", zone.settled());
        node.put("tracers", zone.tracers());
    }

    private void points(ArrayNode array) {
        for (CriticalPoint point : eddies.points()) {
            ObjectNode node = array.addObject();
            node.put("flow", lower(point.flow()));
            node.put("kind", point.kind().words());
            place(node.putObject("place"), point.place());
            numbers(node.putArray("rates"), point.rates());
            numbers(node.putArray("turns"), point.turns());
        }
    }

    private void lines(ArrayNode array) {
        for (Separatrix line : eddies.separatrices()) {
            ObjectNode node = array.addObject();
            node.put("flow", lower(line.saddle().flow()));
            node.put("outwards", line.outwards());
            node.put("closes", line.closes());
            ArrayNode points = node.putArray("points");
            int every = Math.max(1, line.points().size() / MOST_LINE_POINTS);
            for (int n = 0; n < line.points().size(); n += every) {
                Place at = line.points().get(n);
                points.addArray().add(at.theta()).add(at.radius()).add(at.sigma());
            }
        }
    }

    private void longStayers(ObjectNode node) {
        LongStayers stayers = eddies.longStayers();
        node.put("share", stayers.share());
        node.put("longer_than", stayers.longerThan());
        node.put("median", stayers.median());
        node.put("from_supply", stayers.fromSupply());
        node.put("from_inner", stayers.fromInner());
        node.put("from_outer", stayers.fromOuter());
        place(node.putObject("most"), stayers.most());
        node.put("phases", stayers.phases());
        node.put("radii", stayers.radii());
        numbers(node.putArray("map"), stayers.map());
        numbers(node.putArray("across"), stayers.across());
        node.put("tracers", stayers.tracers());
    }

    private static void place(ObjectNode node, Place place) {
        node.put("theta", place.theta());
        node.put("radius", place.radius());
        node.put("sigma", place.sigma());
    }

    private static void range(ArrayNode node, Range range) {
        node.add(range.low()).add(range.high());
    }

    private static void numbers(ArrayNode array, Collection<Double> values) {
        values.forEach(value -> {
            if (Double.isInfinite(value) || Double.isNaN(value)) {
                array.addNull();
            } else {
                array.add(value);
            }
        });
    }

    private static String lower(Enum<?> value) {
        return value.name().toLowerCase(Locale.ROOT);
    }

    // ---- tables ----------------------------------------------------------------------------------------------------

    /** The zones as a table with commas; SI units. */
    public String zonesCsv() {
        StringBuilder s = new StringBuilder("zone,theta_rad,radius_m,sigma,theta_low_rad,theta_high_rad,radius_low_m,"
                + "radius_high_m,sigma_low,sigma_high,volume_m3,mass_kg,mass_low_kg,mass_high_kg,mass_share,"
                + "turnover_s,count,sense,mean_pressure_pa,from_dam_inner_edge_m,from_dam_outer_edge_m,"
                + "renewal_time_s,from_supply,from_inner,from_outer,exchange_kg_s\n");
        for (int n = 0; n < eddies.zones().size(); n++) {
            Zone zone = eddies.zones().get(n);
            List<Object> row = new ArrayList<>(List.of(
                    n + 1,
                    zone.centre().theta(),
                    zone.centre().radius(),
                    zone.centre().sigma(),
                    zone.theta().low(),
                    zone.theta().high(),
                    zone.radius().low(),
                    zone.radius().high(),
                    zone.sigma().low(),
                    zone.sigma().high(),
                    zone.volume(),
                    zone.mass(),
                    zone.massLow(),
                    zone.massHigh(),
                    zone.massShare(),
                    zone.turnoverTime().isPresent() ? zone.turnoverTime().getAsDouble() : "",
                    zone.count(),
                    zone.sense().words(),
                    zone.meanPressure()));
            row.add(zone.dam().<Object>map(dam -> dam.fromInnerEdge()).orElse(""));
            row.add(zone.dam().<Object>map(dam -> dam.fromOuterEdge()).orElse(""));
            row.addAll(List.of(
                    zone.exchange().time(),
                    zone.exchange().fromSupply(),
                    zone.exchange().fromInner(),
                    zone.exchange().fromOuter(),
                    zone.exchange().flow()));
            s.append(String.join(",", row.stream().map(Object::toString).toList()))
                    .append('\n');
        }
        return s.toString();
    }

    /** Places of held gas as a table with commas, zone by zone; SI units. */
    public String placesCsv() {
        StringBuilder s = new StringBuilder("zone,theta_rad,radius_m,sigma\n");
        for (int n = 0; n < eddies.zones().size(); n++) {
            for (Place at : eddies.zones().get(n).points()) {
                s.append(n + 1)
                        .append(',')
                        .append(at.theta())
                        .append(',')
                        .append(at.radius())
                        .append(',')
                        .append(at.sigma())
                        .append('\n');
            }
        }
        return s.toString();
    }

    /** The map of reversed flow over the cells of the face as a table with commas; SI units. */
    public String reversedCsv() {
        FilmGrid grid = flow.film().grid();
        StringBuilder s = new StringBuilder("theta_rad,radius_m,reversed_share_of_thickness,runs_up_the_pressure\n");
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                s.append(0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r)))
                        .append(',')
                        .append(r)
                        .append(',')
                        .append(eddies.reversed().face(grid.cell(i, j)))
                        .append(',')
                        .append(eddies.reversed().uphill().get(grid.cell(i, j)) ? 1 : 0)
                        .append('\n');
            }
        }
        return s.toString();
    }

    // ---- words -----------------------------------------------------------------------------------------------------

    /** The answer in a sentence or two. */
    public String answer() {
        if (eddies.zones().isEmpty()) {
            return String.format(
                    Locale.ROOT,
                    "No recirculation found: a zone, or a set of equal zones, that holds more than %s of the film's gas would"
                            + " have been seen with a chance of 95 %%.",
                    share(eddies.smallestSeen()));
        }
        Zone largest = eddies.zones().get(0);
        int all = eddies.zones().stream().mapToInt(Zone::count).sum();
        return String.format(
                Locale.ROOT,
                "%s of the film's gas (%s … %s) is held in %s. The largest lies at r = %.2f … %.2f mm%s, %s, and %s.",
                share(eddies.heldMassShare()),
                share(eddies.heldLow()),
                share(eddies.heldHigh()),
                all == 1 ? "one zone" : all + " zones",
                1e3 * largest.radius().low(),
                1e3 * largest.radius().high(),
                largest.count() == 1 && spansRing(largest) ? " all round the ring" : "",
                height(largest),
                turning(largest));
    }

    private static boolean spansRing(Zone zone) {
        return zone.theta().length() >= 2 * Math.PI * (1 - 1e-9);
    }

    private static String height(Zone zone) {
        double middle = zone.centre().sigma();
        String face = middle < 1.0 / 3 ? "near the rotor" : middle > 2.0 / 3 ? "near the stator" : "in mid-film";
        return String.format(
                Locale.ROOT,
                "%s (σ = %.2f … %.2f)",
                face,
                zone.sigma().low(),
                zone.sigma().high());
    }

    private static String turning(Zone zone) {
        if (zone.turnoverTime().isEmpty()) {
            return "was not seen to turn round once";
        }
        String way = zone.sense() == Sense.MERIDIONAL
                ? "between the faces, in and out"
                : zone.sense() == Sense.CIRCUMFERENTIAL
                        ? "between the faces, to and fro round the ring"
                        : zone.sense().words();
        return String.format(
                Locale.ROOT,
                "turns round once in %.3g ms (%s)",
                1e3 * zone.turnoverTime().getAsDouble(),
                way);
    }

    /** The recirculation in plain words and the engineer's units, in lines of at most 120 columns. */
    public String text() {
        StringBuilder s = new StringBuilder();
        for (String warning : warnings()) {
            wrap(s, "Warning: " + warning);
        }
        wrap(s, answer());
        line(s, "");
        if (!eddies.zones().isEmpty()) {
            table(s);
        }
        wrap(
                s,
                String.format(
                        Locale.ROOT,
                        "Held is gas that stays longer than %.4g times the median residence of %.3f ms, so %.1f ms, both before and"
                                + " after. %s of the gas stays as long only because it sticks to a face.",
                        eddies.settings().patience(),
                        1e3 * eddies.medianResidence(),
                        1e3 * eddies.heldAfter(),
                        share(eddies.creepingMassShare())));
        byResidence(s);
        small(s);
        wrap(
                s,
                String.format(
                        Locale.ROOT,
                        "Against the radial flow of its column runs %s of the film's volume; %s of it lies in columns that run up the"
                                + " pressure, seen from the %s.",
                        share(eddies.reversed().volumeShare()),
                        share(eddies.reversed().uphillShare()),
                        flow.film().steadyIn() == org.whither.film.Frame.ROTATING ? "rotor" : "stator"));
        still(s);
        stayers(s);
        line(s, "%d tracers, %d steps, %.1f s", eddies.tracers(), eddies.steps(), seconds);
        line(s, "");
        wrap(s, "Caution: " + Cautions.TEXT);
        return s.toString().stripTrailing();
    }

    private void table(StringBuilder s) {
        line(
                s,
                "%-5s %6s %15s %13s %22s %10s %9s %-15s %s",
                "zone",
                "count",
                "r, mm",
                "σ",
                "µg each (95 %)",
                "of film",
                "turn, ms",
                "sense",
                "bar(a)");
        for (int n = 0; n < eddies.zones().size(); n++) {
            Zone zone = eddies.zones().get(n);
            line(
                    s,
                    "%-5d %6d %15s %13s %22s %10s %9s %-15s %s",
                    n + 1,
                    zone.count(),
                    String.format(
                            Locale.ROOT,
                            "%.2f … %.2f",
                            1e3 * zone.radius().low(),
                            1e3 * zone.radius().high()),
                    String.format(
                            Locale.ROOT,
                            "%.2f … %.2f",
                            zone.sigma().low(),
                            zone.sigma().high()),
                    String.format(
                            Locale.ROOT,
                            "%s (%s … %s)",
                            three(1e9 * zone.mass()),
                            three(1e9 * zone.massLow()),
                            three(1e9 * zone.massHigh())),
                    share(zone.massShare()),
                    zone.turnoverTime().isPresent()
                            ? three(1e3 * zone.turnoverTime().getAsDouble())
                            : "—",
                    zone.sense().words(),
                    three(1e-5 * zone.meanPressure()));
        }
        for (int n = 0; n < eddies.zones().size(); n++) {
            wrap(s, "Zone " + (n + 1) + ": " + more(eddies.zones().get(n)));
        }
        line(s, "");
    }

    private String more(Zone zone) {
        Conditions conditions = flow.film().conditions();
        StringBuilder s = new StringBuilder(String.format(
                Locale.ROOT,
                "centre at r = %.3f mm, σ = %.3f",
                1e3 * zone.centre().radius(),
                zone.centre().sigma()));
        if (!spansRing(zone)) {
            s.append(String.format(
                    Locale.ROOT,
                    ", θ = %.3f° (reaching over %.2f°)",
                    Math.toDegrees(zone.centre().theta()),
                    Math.toDegrees(zone.theta().length())));
        }
        s.append(String.format(Locale.ROOT, "; volume %.3g mm³", 1e9 * zone.volume()));
        zone.dam()
                .ifPresent(dam -> s.append(String.format(
                        Locale.ROOT,
                        "; %.2f mm %s the dam's edge at %.2f mm",
                        1e3 * Math.min(Math.abs(dam.fromInnerEdge()), Math.abs(dam.fromOuterEdge())),
                        Math.abs(dam.fromOuterEdge()) <= Math.abs(dam.fromInnerEdge())
                                ? dam.fromOuterEdge() > 0 ? "outside" : "inside"
                                : dam.fromInnerEdge() > 0 ? "outside" : "inside",
                        1e3
                                * (Math.abs(dam.fromOuterEdge()) <= Math.abs(dam.fromInnerEdge())
                                        ? dam.outerEdge()
                                        : dam.innerEdge()))));
        s.append(String.format(
                Locale.ROOT,
                ". Within %.0f ms %.0f %% of its gas is renewed",
                1e3 * zone.exchange().time(),
                100 * zone.exchange().renewed()));
        if (zone.exchange().renewed() > 0) {
            List<String> parts = new ArrayList<>();
            part(parts, zone.exchange().fromSupply(), "the supply");
            part(parts, zone.exchange().fromOuter(), "the " + conditions.outerSide());
            part(parts, zone.exchange().fromInner(), "the " + conditions.innerSide());
            s.append(": ")
                    .append(String.join(", ", parts))
                    .append(String.format(
                            Locale.ROOT,
                            "; %.3g g/h go through it.",
                            EngineerUnits.gramsPerHour(zone.exchange().flow())));
        } else {
            s.append(": none was seen to come in.");
        }
        return s.toString();
    }

    private static void part(List<String> parts, double share, String from) {
        if (share > 0) {
            parts.add(String.format(Locale.ROOT, "%.0f %% from %s", 100 * share, from));
        }
    }

    private void byResidence(StringBuilder s) {
        Unflushed unflushed = eddies.heldByResidence();
        wrap(
                s,
                String.format(
                        Locale.ROOT,
                        "Check: by mass flow × residence of what enters, %s … %s of the film's gas came in more than %.1f ms ago or"
                                + " never; by the tracers inside, %s.",
                        share(Math.max(0, unflushed.low())),
                        share(Math.max(0, unflushed.high())),
                        1e3 * unflushed.olderThan(),
                        share(eddies.olderMassShare())));
    }

    private void small(StringBuilder s) {
        if (eddies.small().isEmpty()) {
            return;
        }
        StringBuilder places = new StringBuilder();
        for (SmallCluster cluster :
                eddies.small().subList(0, Math.min(MOST_SMALL, eddies.small().size()))) {
            places.append(places.length() == 0 ? "" : "; ")
                    .append(String.format(
                            Locale.ROOT,
                            "r = %.3f mm, σ = %.3f",
                            1e3 * cluster.place().radius(),
                            cluster.place().sigma()));
        }
        wrap(
                s,
                String.format(
                        Locale.ROOT,
                        "%d smaller %s of held gas, too small to be measured, about %s of the gas in all: %s%s.",
                        eddies.small().size(),
                        eddies.small().size() == 1 ? "group" : "groups",
                        share(eddies.small().stream()
                                        .mapToDouble(SmallCluster::mass)
                                        .sum()
                                * flow.film().grid().sectors()
                                / eddies.filmMass()),
                        places,
                        eddies.small().size() > MOST_SMALL ? " and others" : ""));
    }

    private void still(StringBuilder s) {
        for (CriticalPoint.Flow which : CriticalPoint.Flow.values()) {
            List<CriticalPoint> points =
                    eddies.points().stream().filter(p -> p.flow() == which).toList();
            String of = switch (which) {
                case GAS -> "The gas stands still";
                case COLUMNS -> "The mean flow of the columns stands still";
                case MERIDIAN -> "The mean flow over the ring stands still";
            };
            if (points.isEmpty()) {
                wrap(s, of + " nowhere off the faces.");
                continue;
            }
            StringBuilder list = new StringBuilder();
            for (CriticalPoint point : points.subList(0, Math.min(MOST_SMALL, points.size()))) {
                list.append(list.length() == 0 ? "" : "; ").append(point.kind().words());
                list.append(String.format(
                        Locale.ROOT, " at r = %.3f mm", 1e3 * point.place().radius()));
                if (which != CriticalPoint.Flow.MERIDIAN) {
                    list.append(String.format(
                            Locale.ROOT,
                            ", θ = %.3f°",
                            Math.toDegrees(point.place().theta())));
                }
                if (which != CriticalPoint.Flow.COLUMNS) {
                    list.append(String.format(
                            Locale.ROOT, ", σ = %.3f", point.place().sigma()));
                }
            }
            wrap(
                    s,
                    String.format(
                            Locale.ROOT,
                            "%s at %d %s%s: %s%s.",
                            of,
                            points.size(),
                            points.size() == 1 ? "point" : "points",
                            which == CriticalPoint.Flow.MERIDIAN ? "" : " of a sector",
                            list,
                            points.size() > MOST_SMALL ? " and others" : ""));
        }
    }

    private void stayers(StringBuilder s) {
        LongStayers stayers = eddies.longStayers();
        Conditions conditions = flow.film().conditions();
        List<String> parts = new ArrayList<>();
        part(parts, stayers.fromSupply(), "the supply");
        part(parts, stayers.fromOuter(), "the " + conditions.outerSide());
        part(parts, stayers.fromInner(), "the " + conditions.innerSide());
        double low = 0;
        double high = 0;
        for (int n = 0; n < stayers.across().size(); n++) {
            double sigma = (n + 0.5) / stayers.across().size();
            low += sigma < 0.1 ? stayers.across().get(n) : 0;
            high += sigma > 0.9 ? stayers.across().get(n) : 0;
        }
        wrap(
                s,
                String.format(
                        Locale.ROOT,
                        "The %.0f %% of the through-going gas that stays longest stays more than %.2f ms (%s). It spends %.0f %% of that"
                                + " in the tenth of the film next to the rotor, %.0f %% in that next to the stator, and most at r = %.2f mm.",
                        100 * stayers.share(),
                        1e3 * stayers.longerThan(),
                        String.join(", ", parts),
                        100 * low,
                        100 * high,
                        1e3 * stayers.most().radius()));
    }

    private static String share(double value) {
        return value == 0 ? "0 %" : three(100 * value) + " %";
    }

    /** A number of three digits without an exponent where that is readable. */
    private static String three(double value) {
        double size = Math.abs(value);
        if (size == 0) {
            return "0";
        }
        if (size < 1e-4 || size >= 1e6) {
            return String.format(Locale.ROOT, "%.2e", value);
        }
        int decimals = Math.max(0, 2 - (int) Math.floor(Math.log10(size)));
        return String.format(Locale.ROOT, "%." + decimals + "f", value);
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
                line(s, "%s", rest);
                rest.setLength(0);
                rest.append("   ");
            }
            rest.append(rest.length() == 0 ? "" : " ").append(word);
        }
        line(s, "%s", rest);
    }
}
