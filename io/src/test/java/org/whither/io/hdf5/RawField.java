package org.whither.io.hdf5;

import io.jhdf.HdfFile;
import io.jhdf.WritableGroupImpl;
import io.jhdf.api.Attribute;
import io.jhdf.api.Dataset;
import io.jhdf.api.Group;
import io.jhdf.api.Node;
import io.jhdf.api.WritableGroup;
import java.io.IOException;
import java.lang.reflect.Array;
import java.nio.file.Path;
import java.util.LinkedHashMap;
import java.util.Map;

/** The groups, attributes and datasets of a fixture, to be changed at will and written as they then are. */
final class RawField {
    private static final class Data {
        private final int[] shape;
        private final double[] values;

        Data(int[] shape, double[] values) {
            this.shape = shape;
            this.values = values;
        }
    }

    private final Map<String, Map<String, Object>> attributes = new LinkedHashMap<>();
    private final Map<String, Data> datasets = new LinkedHashMap<>();

    private RawField() {}

    static RawField of(String fixture) {
        RawField raw = new RawField();
        try (HdfFile file = new HdfFile(FieldFixture.FOLDER.resolve(fixture))) {
            raw.take(file, "");
        }
        return raw;
    }

    private void take(Group group, String path) {
        keep(group, path);
        for (Node child : group) {
            String childPath = path.isEmpty() ? child.getName() : path + "/" + child.getName();
            if (child instanceof Group inner) {
                take(inner, childPath);
            } else {
                keep(child, childPath);
                Dataset dataset = (Dataset) child;
                datasets.put(childPath, new Data(dataset.getDimensions(), doubles(dataset)));
            }
        }
    }

    private void keep(Node node, String path) {
        Map<String, Object> kept = new LinkedHashMap<>();
        for (Attribute attribute : node.getAttributes().values()) {
            Object value = attribute.getData();
            while (value.getClass().isArray()) {
                value = Array.get(value, 0);
            }
            kept.put(attribute.getName(), value);
        }
        attributes.put(path, kept);
    }

    private static double[] doubles(Dataset dataset) {
        Object flat = dataset.getDataFlat();
        double[] values = new double[Array.getLength(flat)];
        for (int n = 0; n < values.length; n++) {
            Object value = Array.get(flat, n);
            values[n] = value instanceof Number number ? number.doubleValue() : value.equals("TRUE") ? 1 : 0;
        }
        return values;
    }

    /** Sets an attribute of a group or dataset, or removes it where the value is null. */
    RawField attribute(String path, String name, Object value) {
        if (value == null) {
            attributes.get(path).remove(name);
        } else {
            attributes.get(path).put(name, value);
        }
        return this;
    }

    /** Removes a dataset, or a group with all that is in it. */
    RawField remove(String path) {
        attributes.keySet().removeIf(name -> name.equals(path) || name.startsWith(path + "/"));
        datasets.keySet().removeIf(name -> name.equals(path) || name.startsWith(path + "/"));
        return this;
    }

    /** Sets one number of a dataset. */
    RawField set(String path, double value, int... index) {
        Data data = datasets.get(path);
        int flat = 0;
        for (int d = 0; d < index.length; d++) {
            flat = flat * data.shape[d] + index[d];
        }
        data.values[flat] = value;
        return this;
    }

    /** Gives a dataset other lengths, filled with one number; makes it where there is none. */
    RawField shape(String path, double value, int... shape) {
        int count = 1;
        for (int length : shape) {
            count *= length;
        }
        double[] values = new double[count];
        java.util.Arrays.fill(values, value);
        datasets.put(path, new Data(shape, values));
        attributes.computeIfAbsent(path, name -> new LinkedHashMap<>());
        return this;
    }

    /** Copies a dataset. */
    RawField copy(String path, String as) {
        datasets.put(as, datasets.get(path));
        attributes.put(as, new LinkedHashMap<>(attributes.get(path)));
        return this;
    }

    Path write(Path file) throws IOException {
        WritableGroup root = new WritableGroupImpl(null, "/");
        Map<String, WritableGroup> groups = new LinkedHashMap<>();
        groups.put("", root);
        attributes.forEach((path, named) -> {
            if (!path.isEmpty() && !datasets.containsKey(path)) {
                groups.put(path, root.putGroup(path));
            }
        });
        groups.forEach((path, group) -> attributes.get(path).forEach(group::putAttribute));
        datasets.forEach((path, data) -> {
            WritableGroup group = groups.get(path.substring(0, path.indexOf('/')));
            String name = path.substring(path.indexOf('/') + 1);
            FlatDataset dataset = new FlatDataset(group, name, false, n -> data.values[n], data.shape);
            attributes.get(path).forEach(dataset::putAttribute);
            group.putDataset(name, dataset);
        });
        FieldWriter.write(root, new TextHeap(64), file);
        return file;
    }
}
