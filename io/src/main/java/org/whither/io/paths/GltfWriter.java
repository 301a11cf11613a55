package org.whither.io.paths;

import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.OutputStream;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.whither.render.SealModel;

/**
 * Puts meshes and nodes into a binary glTF 2.0 file (Khronos Group, glTF 2.0 Specification, sections 3 and 4). Coordinates
 * are turned from z along the shaft to y upwards, as glTF has it.
 */
final class GltfWriter {
    private static final int MAGIC = 0x46546C67;
    private static final int JSON_CHUNK = 0x4E4F534A;
    private static final int BINARY_CHUNK = 0x004E4942;
    private static final int FLOAT = 5126;
    private static final int UNSIGNED_SHORT = 5123;
    private static final int UNSIGNED_INT = 5125;
    private static final int VERTICES = 34962;
    private static final int INDICES = 34963;

    private final ObjectNode json = JsonNodeFactory.instance.objectNode();
    private final ArrayNode nodes = JsonNodeFactory.instance.arrayNode();
    private final ArrayNode meshes = JsonNodeFactory.instance.arrayNode();
    private final ArrayNode materials = JsonNodeFactory.instance.arrayNode();
    private final ArrayNode accessors = JsonNodeFactory.instance.arrayNode();
    private final ArrayNode views = JsonNodeFactory.instance.arrayNode();
    private final Map<String, Integer> materialNumbers = new HashMap<>();
    private final ByteArrayOutputStream binary = new ByteArrayOutputStream();

    /**
     * Adds a mesh.
     *
     * @param part its shape
     * @param coloured whether its vertices are coloured by their place on the speed scale
     * @return its number
     */
    int mesh(SealModel.Part part, boolean coloured) {
        ObjectNode mesh = meshes.addObject();
        mesh.put("name", part.name());
        ObjectNode primitive = mesh.putArray("primitives").addObject();
        ObjectNode attributes = primitive.putObject("attributes");
        attributes.put("POSITION", vectors(part.positions(), true));
        attributes.put("NORMAL", vectors(part.normals(), false));
        if (coloured) {
            attributes.put("COLOR_0", colours(part.values()));
        }
        primitive.put("indices", indices(part.triangles(), part.values().length));
        primitive.put("material", material(part, coloured));
        return meshes.size() - 1;
    }

    /**
     * Adds a node.
     *
     * @param name its name
     * @param mesh number of its mesh, or −1
     * @param turn angle by which it is turned about the shaft (rad)
     * @param children numbers of its children
     * @param extras what is told of it, or null
     * @return its number
     */
    int node(String name, int mesh, double turn, List<Integer> children, ObjectNode extras) {
        ObjectNode node = nodes.addObject();
        node.put("name", name);
        if (mesh >= 0) {
            node.put("mesh", mesh);
        }
        if (turn != 0) {
            node.putArray("rotation")
                    .add(0)
                    .add((float) Math.sin(turn / 2))
                    .add(0)
                    .add((float) Math.cos(turn / 2));
        }
        if (!children.isEmpty()) {
            ArrayNode list = node.putArray("children");
            children.forEach(list::add);
        }
        if (extras != null) {
            node.set("extras", extras);
        }
        return nodes.size() - 1;
    }

    private int material(SealModel.Part part, boolean coloured) {
        String name = coloured ? "speed" : part.name();
        return materialNumbers.computeIfAbsent(name, key -> {
            ObjectNode material = materials.addObject();
            material.put("name", key);
            ObjectNode surface = material.putObject("pbrMetallicRoughness");
            ArrayNode factor = surface.putArray("baseColorFactor");
            for (int shift = 16; shift >= 0; shift -= 8) {
                factor.add(coloured ? 1f : (float) linear(part.colour() >> shift & 0xff));
            }
            factor.add((float) part.opacity());
            surface.put("metallicFactor", 0);
            surface.put("roughnessFactor", coloured ? 0.6 : 0.8);
            if (part.opacity() < 1) {
                material.put("alphaMode", "BLEND");
            }
            material.put("doubleSided", !coloured);
            return materials.size() - 1;
        });
    }

    /** An sRGB component 0 … 255 as a linear one 0 … 1 (IEC 61966-2-1), which glTF colours are. */
    static double linear(int component) {
        double c = component / 255.0;
        return c <= 0.04045 ? c / 12.92 : Math.pow((c + 0.055) / 1.055, 2.4);
    }

    private int vectors(float[] values, boolean bounds) {
        ByteBuffer bytes = ByteBuffer.allocate(4 * values.length).order(ByteOrder.LITTLE_ENDIAN);
        float[] low = {Float.POSITIVE_INFINITY, Float.POSITIVE_INFINITY, Float.POSITIVE_INFINITY};
        float[] high = {Float.NEGATIVE_INFINITY, Float.NEGATIVE_INFINITY, Float.NEGATIVE_INFINITY};
        for (int n = 0; n < values.length; n += 3) {
            float[] turned = {values[n], values[n + 2], 0 - values[n + 1]};
            if (!bounds) {
                unit(turned);
            }
            for (int c = 0; c < 3; c++) {
                bytes.putFloat(turned[c]);
                low[c] = Math.min(low[c], turned[c]);
                high[c] = Math.max(high[c], turned[c]);
            }
        }
        int accessor = accessor(bytes, VERTICES, FLOAT, values.length / 3, "VEC3");
        if (bounds) {
            ObjectNode node = (ObjectNode) accessors.get(accessor);
            ArrayNode least = node.putArray("min");
            ArrayNode most = node.putArray("max");
            for (int c = 0; c < 3; c++) {
                least.add(low[c]);
                most.add(high[c]);
            }
        }
        return accessor;
    }

    private static void unit(float[] v) {
        double length = Math.sqrt((double) v[0] * v[0] + (double) v[1] * v[1] + (double) v[2] * v[2]);
        for (int c = 0; c < 3; c++) {
            v[c] = (float) (v[c] / length);
        }
    }

    private int colours(float[] values) {
        ByteBuffer bytes = ByteBuffer.allocate(8 * values.length).order(ByteOrder.LITTLE_ENDIAN);
        for (float value : values) {
            int colour = SealModel.speedColour(value);
            for (int shift = 16; shift >= 0; shift -= 8) {
                bytes.putShort((short) Math.round(65535 * linear(colour >> shift & 0xff)));
            }
            bytes.putShort((short) 0xffff);
        }
        int accessor = accessor(bytes, VERTICES, UNSIGNED_SHORT, values.length, "VEC4");
        ((ObjectNode) accessors.get(accessor)).put("normalized", true);
        return accessor;
    }

    private int indices(int[] triangles, int vertices) {
        boolean small = vertices < 0xffff; // the largest number means something else
        ByteBuffer bytes =
                ByteBuffer.allocate((small ? 2 : 4) * triangles.length).order(ByteOrder.LITTLE_ENDIAN);
        for (int corner : triangles) {
            if (small) {
                bytes.putShort((short) corner);
            } else {
                bytes.putInt(corner);
            }
        }
        return accessor(bytes, INDICES, small ? UNSIGNED_SHORT : UNSIGNED_INT, triangles.length, "SCALAR");
    }

    private int accessor(ByteBuffer bytes, int target, int type, int count, String kind) {
        while (binary.size() % 4 != 0) {
            binary.write(0);
        }
        ObjectNode view = views.addObject();
        view.put("buffer", 0);
        view.put("byteOffset", binary.size());
        view.put("byteLength", bytes.capacity());
        view.put("target", target);
        binary.writeBytes(bytes.array());
        ObjectNode accessor = accessors.addObject();
        accessor.put("bufferView", views.size() - 1);
        accessor.put("componentType", type);
        accessor.put("count", count);
        accessor.put("type", kind);
        return accessors.size() - 1;
    }

    /** Writes the file, with one scene of one root. */
    void write(Path file, int root) throws IOException {
        while (binary.size() % 4 != 0) {
            binary.write(0);
        }
        ObjectNode asset = json.putObject("asset");
        asset.put("version", "2.0");
        asset.put("generator", "whither");
        json.put("scene", 0);
        json.putArray("scenes").addObject().putArray("nodes").add(root);
        json.set("nodes", nodes);
        json.set("meshes", meshes);
        json.set("materials", materials);
        json.set("accessors", accessors);
        json.set("bufferViews", views);
        json.putArray("buffers").addObject().put("byteLength", binary.size());
        String text = new ObjectMapper().writeValueAsString(json);
        byte[] bytes = text.getBytes(StandardCharsets.UTF_8);
        int padding = (4 - bytes.length % 4) % 4;
        ByteBuffer head = ByteBuffer.allocate(20).order(ByteOrder.LITTLE_ENDIAN);
        head.putInt(MAGIC).putInt(2).putInt(20 + bytes.length + padding + 8 + binary.size());
        head.putInt(bytes.length + padding).putInt(JSON_CHUNK);
        try (OutputStream out = Files.newOutputStream(file)) {
            out.write(head.array());
            out.write(bytes);
            out.write("   ".substring(0, padding).getBytes(StandardCharsets.US_ASCII));
            out.write(ByteBuffer.allocate(8)
                    .order(ByteOrder.LITTLE_ENDIAN)
                    .putInt(binary.size())
                    .putInt(BINARY_CHUNK)
                    .array());
            binary.writeTo(out);
        }
    }
}
