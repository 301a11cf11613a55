package org.whither.io.hdf5;

import io.jhdf.HdfFile;
import io.jhdf.api.Attribute;
import io.jhdf.api.Dataset;
import io.jhdf.api.Group;
import io.jhdf.api.Node;
import java.nio.file.Path;
import java.util.Map;
import java.util.TreeMap;

/** The groups, datasets and attributes of an HDF5 file as indented text, in the order of their names. */
final class HdfTree {
    private HdfTree() {}

    static String of(Path path) {
        StringBuilder text = new StringBuilder();
        try (HdfFile file = new HdfFile(path)) {
            text.append("/\n");
            inside(file, "    ", text);
        }
        return text.toString();
    }

    private static void inside(Group group, String indent, StringBuilder text) {
        attributes(group, indent, text);
        Map<String, Node> children = new TreeMap<>(group.getChildren());
        children.forEach((name, node) -> {
            text.append(indent).append(name);
            if (node instanceof Dataset dataset) {
                text.append(" (");
                int[] shape = dataset.getDimensions();
                for (int d = 0; d < shape.length; d++) {
                    text.append(d == 0 ? "" : ", ").append(shape[d]);
                }
                text.append(") ").append(node.getAttribute("units").getData()).append('\n');
            } else {
                text.append("/\n");
                inside((Group) node, indent + "    ", text);
            }
        });
    }

    private static void attributes(Node node, String indent, StringBuilder text) {
        Map<String, Attribute> attributes = new TreeMap<>(node.getAttributes());
        attributes.forEach((name, attribute) -> text.append(indent)
                .append('@')
                .append(name)
                .append(" = ")
                .append(attribute.getData())
                .append('\n'));
    }
}
