package org.whither.io.picture;

import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Locale;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.film.Frame;
import org.whither.io.file.RefusedInput;
import org.whither.io.result.ResultJson;
import org.whither.render.Part;
import org.whither.render.PictureSettings;
import org.whither.render.Quantity;
import org.whither.render.ViewingSide;
import org.whither.render.Viewpoint;

/** A picture's description as JSON. Angles are in degrees and ranges in the units that the picture shows. */
public final class PictureJson {
    private static final ObjectMapper MAPPER = new ObjectMapper();

    /** A description is short; a longer file is something else. */
    private static final long MOST_BYTES = 1 << 20;

    private PictureJson() {}

    /** A description as JSON. */
    public static ObjectNode of(PictureDescription picture) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("picture", picture.view().word());
        node.put("version", 1);
        if (picture.view() == View.PLAN) {
            node.put("show", word(picture.show()));
            node.put("seen_from", word(picture.seenFrom()));
        }
        if (picture.view() == View.PLAN || picture.view() == View.RELIEF) {
            node.put("part", word(picture.part()));
        }
        node.putArray("size").add(picture.width()).add(picture.height());
        node.put("background", word(picture.background()));
        node.put("frame", word(picture.frame()));
        picture.exaggeration().ifPresent(x -> node.put("exaggeration", x));
        picture.barPerMillimetre().ifPresent(x -> node.put("bar_per_mm", x));
        picture.angle().ifPresent(x -> node.put("angle_deg", Math.toDegrees(x)));
        picture.camera()
                .ifPresent(camera -> node.putObject("camera")
                        .put("azimuth_deg", Math.toDegrees(camera.azimuth()))
                        .put("elevation_deg", Math.toDegrees(camera.elevation()))
                        .put("field_of_view_deg", Math.toDegrees(camera.fieldOfView())));
        ObjectNode ranges = node.putObject("ranges");
        picture.ranges().forEach((quantity, range) -> {
            ArrayNode ends = ranges.putArray(word(quantity) + "_" + unit(quantity));
            ends.add(range.low() * quantity.unit()).add(range.high() * quantity.unit());
        });
        return node;
    }

    private static String word(Enum<?> value) {
        return value.name().toLowerCase(Locale.ROOT);
    }

    private static String unit(Quantity quantity) {
        return switch (quantity) {
            case PRESSURE -> "bar";
            case THICKNESS -> "um";
            case SPEED -> "m_s";
            case AGE -> "ms";
            case DESTINATION -> "";
        };
    }

    /**
     * Reads a description.
     *
     * @throws RefusedInput where the file is not one
     * @throws IOException where it cannot be read
     */
    public static PictureDescription read(Path file) throws IOException {
        if (Files.size(file) > MOST_BYTES) {
            throw refused(
                    file, "it has " + Files.size(file) + " bytes", "a description of a picture, as draw writes it");
        }
        JsonNode node;
        try {
            node = MAPPER.readTree(Files.readString(file));
        } catch (JsonProcessingException | java.nio.charset.CharacterCodingException e) {
            throw refused(file, "it is not JSON", "a description of a picture, as draw writes it");
        }
        if (node == null || !node.isObject()) {
            throw refused(file, "it is not a JSON object", "a description of a picture, as draw writes it");
        }
        if (node.path("version").asInt(0) != 1) {
            throw refused(file, "\"version\" is " + node.path("version"), "1");
        }
        View view = choice(file, node, "picture", View.class, null);
        PictureDescription usual = PictureDescription.of(view);
        JsonNode size = node.path("size");
        int width = size.isMissingNode() ? usual.width() : (int) number(file, size.path(0), "size[0]");
        int height = size.isMissingNode() ? usual.height() : (int) number(file, size.path(1), "size[1]");
        PictureDescription picture = usual.showing(choice(file, node, "show", Quantity.class, usual.show()))
                .ofPart(choice(file, node, "part", Part.class, usual.part()))
                .sized(width, height)
                .seen(
                        choice(file, node, "background", PictureSettings.Background.class, usual.background()),
                        choice(file, node, "seen_from", ViewingSide.class, usual.seenFrom()),
                        choice(file, node, "frame", Frame.class, usual.frame()))
                .drawn(
                        optional(file, node, "exaggeration", 1),
                        optional(file, node, "bar_per_mm", 1),
                        optional(file, node, "angle_deg", Math.PI / 180),
                        camera(file, node.path("camera")));
        for (Quantity quantity : Quantity.values()) {
            String name = word(quantity) + "_" + unit(quantity);
            JsonNode ends = node.path("ranges").path(name);
            if (!ends.isMissingNode()) {
                double low = number(file, ends.path(0), "ranges." + name + "[0]");
                double high = number(file, ends.path(1), "ranges." + name + "[1]");
                if (!(low < high)) {
                    throw refused(
                            file,
                            "\"ranges." + name + "\" is from " + low + " to " + high,
                            "a low end below the high end");
                }
                picture = picture.ranged(
                        quantity, new PictureSettings.Range(low / quantity.unit(), high / quantity.unit()));
            }
        }
        return picture;
    }

    private static Optional<Viewpoint> camera(Path file, JsonNode node) {
        if (node.isMissingNode()) {
            return Optional.empty();
        }
        try {
            return Optional.of(new Viewpoint(
                    Math.toRadians(number(file, node.path("azimuth_deg"), "camera.azimuth_deg")),
                    Math.toRadians(number(file, node.path("elevation_deg"), "camera.elevation_deg")),
                    Math.toRadians(number(file, node.path("field_of_view_deg"), "camera.field_of_view_deg"))));
        } catch (IllegalArgumentException e) {
            throw refused(file, "\"camera\": " + e.getMessage(), "a camera as draw writes it");
        }
    }

    private static OptionalDouble optional(Path file, JsonNode node, String name, double unit) {
        return node.path(name).isMissingNode()
                ? OptionalDouble.empty()
                : OptionalDouble.of(unit * number(file, node.path(name), name));
    }

    private static double number(Path file, JsonNode node, String name) {
        if (!node.isNumber() || !Double.isFinite(node.asDouble())) {
            throw refused(
                    file, "\"" + name + "\" is " + (node.isMissingNode() ? "missing" : node.toString()), "a number");
        }
        return node.asDouble();
    }

    private static <T extends Enum<T>> T choice(Path file, JsonNode node, String name, Class<T> type, T usual) {
        JsonNode found = node.path(name);
        if (found.isMissingNode() && usual != null) {
            return usual;
        }
        for (T value : type.getEnumConstants()) {
            if (found.isTextual() && word(value).equals(found.asText())) {
                return value;
            }
        }
        StringBuilder words = new StringBuilder();
        for (T value : type.getEnumConstants()) {
            words.append(words.length() > 0 ? ", " : "one of ").append(word(value));
        }
        throw refused(
                file,
                "\"" + name + "\" is " + (found.isMissingNode() ? "missing" : found.toString()),
                words.toString());
    }

    private static RefusedInput refused(Path file, String found, String expected) {
        return RefusedInput.of(file, found, expected, "name the JSON file that draw wrote beside a picture");
    }

    /** A description with where its picture came from, as text. */
    public static String text(PictureDescription picture, PictureFacts facts) {
        ObjectNode node = of(picture);
        node.put("title", facts.title());
        node.set("field", facts.field());
        node.put("caution", facts.caution());
        return ResultJson.text(node);
    }
}
