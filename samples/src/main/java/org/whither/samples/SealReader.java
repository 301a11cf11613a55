package org.whither.samples;

import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.core.StreamReadFeature;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.json.JsonMapper;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.Iterator;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.Set;
import org.whither.film.Gas;
import org.whither.samples.SealDescription.Feed;
import org.whither.samples.SealDescription.GivenFlow;
import org.whither.samples.SealDescription.OperatingPoint;
import org.whither.samples.SealDescription.Orifices;
import org.whither.samples.SealDescription.Pocket;
import org.whither.samples.SealDescription.Pockets;
import org.whither.samples.SealDescription.PorousLayer;
import org.whither.samples.SealDescription.Pumping;
import org.whither.samples.SealDescription.Recesses;
import org.whither.samples.SealDescription.Restriction;
import org.whither.samples.SealDescription.SpiralGrooves;

/**
 * Reads a seal's description from JSON. Keys carry their unit; every number is checked, and an unknown key is refused, so
 * that a slip of the pen does not go unseen.
 */
final class SealReader {
    private static final ObjectMapper JSON = JsonMapper.builder()
            .enable(StreamReadFeature.STRICT_DUPLICATE_DETECTION)
            .build();

    private static final int MOST_SECTORS = 1000;

    private SealReader() {}

    /**
     * Reads a description.
     *
     * @param text JSON
     * @param source what it is read from, for messages
     * @return the seal
     * @throws IllegalArgumentException in one sentence, where something is missing, unknown or out of bounds
     */
    static SealDescription read(String text, String source) {
        JsonNode root;
        try {
            root = JSON.readTree(text);
        } catch (JsonProcessingException e) {
            throw new IllegalArgumentException(
                    source + " is not readable as JSON at line "
                            + (e.getLocation() == null ? "?" : e.getLocation().getLineNr()) + ": "
                            + e.getOriginalMessage(),
                    e);
        }
        Section all = new Section(root, source, "");
        Section rings = all.section("rings");
        Section film = all.section("film");
        Section gas = all.section("gas");
        double inner = rings.number("inner_radius_mm", 1, 1000) * 1e-3;
        double outer = rings.number("outer_radius_mm", 1, 1000) * 1e-3;
        if (outer <= inner) {
            throw rings.fault("outer_radius_mm", "is not above inner_radius_mm");
        }
        double clearance = film.number("clearance_um", 0.1, 100) * 1e-6;
        double coning = film.number("coning_um", -100, 100) * 1e-6;
        if (clearance + coning < 0.1e-6) {
            throw film.fault("coning_um", "closes the film at the outer diameter");
        }
        int sectors = all.whole("sectors", 1, MOST_SECTORS);
        Optional<Recesses> recesses = recesses(all, inner, outer, sectors);
        Feed feed = feed(all.section("feed"), inner, outer);
        SealDescription seal = new SealDescription(
                all.text("name"),
                all.text("title"),
                all.text("description"),
                all.text("plant"),
                new Gas(
                        gas.text("name"),
                        gas.number("molar_mass_kg_mol", 1e-3, 1),
                        gas.number("viscosity_pa_s", 1e-7, 1e-3),
                        gas.number("compressibility_factor", 0.1, 3)),
                gas.number("isentropic_exponent", 1.001, 2),
                gas.number("temperature_k", 50, 2000),
                inner,
                outer,
                rings.text("inner_side"),
                rings.text("outer_side"),
                clearance,
                coning,
                sectors,
                recesses,
                feed,
                points(all.list("operating_points"), feed.restriction()),
                gridSize(all.section("grid")));
        rings.done();
        film.done();
        gas.done();
        all.done();
        return seal;
    }

    private static GridSize gridSize(Section grid) {
        GridSize size = new GridSize(
                grid.whole("cells_theta", GridSize.LEAST, GridSize.MOST),
                grid.whole("cells_radial", GridSize.LEAST, GridSize.MOST));
        grid.done();
        return size;
    }

    private static Optional<Recesses> recesses(Section all, double inner, double outer, int sectors) {
        if (!all.has("recesses")) {
            return Optional.empty();
        }
        Section section = all.section("recesses");
        String kind = section.text("kind");
        Recesses recesses = switch (kind) {
            case "spiral" -> spiral(section, inner, outer);
            case "pockets" -> pockets(section, inner, outer, sectors);
            default -> throw section.fault("kind", "is \"" + kind + "\"; expected \"spiral\" or \"pockets\"");
        };
        section.done();
        return Optional.of(recesses);
    }

    private static SpiralGrooves spiral(Section section, double inner, double outer) {
        double[] between = radii(section, inner, outer);
        String pumps = section.text("pumps_when_turning_towards_plus_theta");
        if (!pumps.equals("inward") && !pumps.equals("outward")) {
            throw section.fault(
                    "pumps_when_turning_towards_plus_theta",
                    "is \"" + pumps + "\"; expected \"inward\" or \"outward\"");
        }
        return new SpiralGrooves(
                Math.toRadians(section.number("angle_from_circumference_deg", 3, 87)),
                section.number("groove_to_land", 0.05, 20),
                section.number("depth_um", 0.01, 1000) * 1e-6,
                between[0],
                between[1],
                pumps.equals("inward") ? Pumping.INWARD : Pumping.OUTWARD);
    }

    private static Pockets pockets(Section section, double inner, double outer, int sectors) {
        double half = 180.0 / sectors;
        List<Pocket> pockets = new ArrayList<>();
        for (Section pocket : section.list("pockets")) {
            double[] between = radii(pocket, inner, outer);
            double from = pocket.number("angle_from_deg", 0, half);
            double to = pocket.number("angle_to_deg", 0, half);
            if (to <= from || to >= half) {
                throw pocket.fault(
                        "angle_to_deg",
                        "must lie above angle_from_deg and below half a sector, which is " + half + " degrees");
            }
            double depth = pocket.number("depth_um", 0.01, 1000) * 1e-6;
            pockets.add(new Pocket(between[0], between[1], Math.toRadians(from), Math.toRadians(to), depth));
            pocket.done();
        }
        return new Pockets(List.copyOf(pockets));
    }

    private static double[] radii(Section section, double inner, double outer) {
        double from = section.number("from_mm", inner * 1e3 * (1 - 1e-12), outer * 1e3) * 1e-3;
        double to = section.number("to_mm", inner * 1e3, outer * 1e3 * (1 + 1e-12)) * 1e-3;
        if (to <= from) {
            throw section.fault("to_mm", "is not above from_mm");
        }
        return new double[] {from, to};
    }

    private static Feed feed(Section section, double inner, double outer) {
        double[] between = radii(section, inner, outer);
        Section law = section.section("restriction");
        String kind = law.text("kind");
        Restriction restriction = switch (kind) {
            case "porous" -> new PorousLayer(law.number("permeance_kg_m2_s_pa2", 1e-20, 1));
            case "orifices" ->
                new Orifices(law.number("discharge_coefficient", 0.01, 1), law.number("open_share", 1e-9, 1));
            case "given_flow" -> new GivenFlow();
            default ->
                throw law.fault("kind", "is \"" + kind + "\"; expected \"porous\", \"orifices\" or \"given_flow\"");
        };
        law.done();
        section.done();
        return new Feed(between[0], between[1], restriction);
    }

    private static List<OperatingPoint> points(List<Section> sections, Restriction restriction) {
        List<OperatingPoint> points = new ArrayList<>();
        Set<String> names = new HashSet<>();
        for (Section point : sections) {
            boolean given = restriction instanceof GivenFlow;
            OperatingPoint read = new OperatingPoint(
                    point.text("name"),
                    point.text("note"),
                    point.number("rotation_rate_rad_s", -20000, 20000),
                    point.number("pressure_inner_pa", 1, 1e9),
                    point.number("pressure_outer_pa", 1, 1e9),
                    given ? OptionalDouble.empty() : OptionalDouble.of(point.number("pressure_supply_pa", 1, 1e9)),
                    given ? OptionalDouble.of(point.number("supply_flow_kg_s", 0, 100)) : OptionalDouble.empty());
            if (!names.add(read.name())) {
                throw point.fault("name", "is \"" + read.name() + "\", which another operating point has too");
            }
            points.add(read);
            point.done();
        }
        if (points.isEmpty()) {
            throw new IllegalArgumentException("a seal without operating points; expected at least one");
        }
        return List.copyOf(points);
    }

    /** One JSON object, whose keys are ticked off as they are read. */
    private static final class Section {
        private final JsonNode node;
        private final String source;
        private final String path;
        private final Set<String> seen = new HashSet<>();

        Section(JsonNode node, String source, String path) {
            if (node == null || !node.isObject()) {
                throw new IllegalArgumentException(
                        source + ": " + (path.isEmpty() ? "the whole" : path) + " must be a JSON object");
            }
            this.node = node;
            this.source = source;
            this.path = path;
        }

        IllegalArgumentException fault(String key, String what) {
            return new IllegalArgumentException(source + ": " + path + "/" + key + " " + what);
        }

        boolean has(String key) {
            return node.has(key);
        }

        private JsonNode take(String key, String expected) {
            seen.add(key);
            JsonNode value = node.get(key);
            if (value == null) {
                throw fault(key, "is missing; expected " + expected);
            }
            return value;
        }

        Section section(String key) {
            return new Section(take(key, "an object"), source, path + "/" + key);
        }

        List<Section> list(String key) {
            JsonNode value = take(key, "a list of objects");
            if (!value.isArray()) {
                throw fault(key, "must be a list of objects");
            }
            List<Section> sections = new ArrayList<>();
            for (int n = 0; n < value.size(); n++) {
                sections.add(new Section(value.get(n), source, path + "/" + key + "/" + n));
            }
            return sections;
        }

        String text(String key) {
            JsonNode value = take(key, "a text");
            if (!value.isTextual() || value.textValue().isBlank()) {
                throw fault(key, "must be a text that is not blank");
            }
            return value.textValue();
        }

        double number(String key, double least, double most) {
            JsonNode value = take(key, "a number from " + least + " to " + most);
            if (!value.isNumber() || !(value.doubleValue() >= least && value.doubleValue() <= most)) {
                throw fault(key, "is " + value + "; expected a number from " + least + " to " + most);
            }
            return value.doubleValue();
        }

        int whole(String key, int least, int most) {
            JsonNode value = take(key, "a whole number from " + least + " to " + most);
            if (!value.isInt() || value.intValue() < least || value.intValue() > most) {
                throw fault(key, "is " + value + "; expected a whole number from " + least + " to " + most);
            }
            return value.intValue();
        }

        void done() {
            for (Iterator<String> keys = node.fieldNames(); keys.hasNext(); ) {
                String key = keys.next();
                if (!seen.contains(key)) {
                    throw fault(key, "is not known here; remove it or mend its spelling");
                }
            }
        }
    }
}
