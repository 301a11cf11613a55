package org.whither.io.paths;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.stream.IntStream;
import org.whither.film.Conditions;
import org.whither.film.FilmGrid;
import org.whither.io.result.Cautions;
import org.whither.render.SealModel;
import org.whither.trace.SampledPath;

/**
 * A scene in glTF 2.0 (Khronos Group, ISO/IEC 12113), binary form: the rotor, the stator, the feed, and paths as tubes with
 * their speed as vertex colour. Lengths in m, y along the shaft from the rotor to the stator, x as in the film and z = −y of
 * the film; lengths across the film are drawn too large, as the metadata say.
 */
final class GltfOutput implements PathOutput<List<EndedPath>> {
    /** Most paths in a scene: more hide one another, and make the file slow to open. */
    static final int MOST_PATHS = 100;

    /** Most points of a path in a scene; of a longer one the beginning is shown. */
    static final int MOST_POINTS = 3000;

    private final Path file;
    private final PathExport export;
    private final double exaggeration;
    private final int stride;
    private final List<EndedPath> shown = new ArrayList<>();

    GltfOutput(Path file, PathExport export, double exaggeration) {
        this.file = file;
        this.export = export;
        this.exaggeration = exaggeration;
        this.stride = stride(export.releases().count());
    }

    /** Every how many-th path is in the scene. */
    static int stride(int count) {
        return Math.max(1, (count + MOST_PATHS - 1) / MOST_PATHS);
    }

    @Override
    public List<EndedPath> prepare(List<EndedPath> paths) {
        return paths.stream().filter(path -> path.number() % stride == 0).toList();
    }

    @Override
    public void write(List<EndedPath> prepared) {
        shown.addAll(prepared);
    }

    @Override
    public void finish(PathTotals totals) throws IOException {
        SealModel model = new SealModel(export.flow(), exaggeration);
        FilmGrid grid = export.flow().film().grid();
        double[] range = speeds();
        GltfWriter scene = new GltfWriter();
        List<Integer> children = new ArrayList<>();
        for (SealModel.Part part : model.sector()) {
            int mesh = scene.mesh(part, false);
            List<Integer> sectors = new ArrayList<>();
            for (int n = 0; n < grid.sectors(); n++) {
                sectors.add(scene.node(part.name() + " sector " + (n + 1), mesh, n * grid.pitch(), List.of(), null));
            }
            children.add(scene.node(part.name(), -1, 0, sectors, null));
        }
        List<Integer> tubes = new ArrayList<>();
        for (EndedPath each : shown) {
            SealModel.Part part = model.path(name(each), line(each.path(), range));
            if (part != null) {
                ObjectNode extras = JsonNodeFactory.instance.objectNode();
                extras.put("tracer", each.number());
                extras.put("residence_time_s", each.path().duration());
                extras.put("revolutions", each.path().revolutions());
                if (each.path().size() > MOST_POINTS) {
                    extras.put(
                            "shown",
                            "its first " + MOST_POINTS + " of " + each.path().size() + " points");
                }
                tubes.add(scene.node(part.name(), scene.mesh(part, true), 0, List.of(), extras));
            }
        }
        if (!tubes.isEmpty()) {
            children.add(scene.node("paths", -1, 0, tubes, null));
        }
        int root = scene.node(title(), -1, 0, children, extras(model, range, tubes.size(), totals));
        scene.write(file, root);
    }

    private String title() {
        String title = export.account().title();
        return title == null || title.isBlank() ? export.account().file() : title;
    }

    private static String name(EndedPath each) {
        return "path " + each.number()
                + (each.from() == null ? "" : " from " + each.from().word())
                + (each.fate() == null ? "" : " to " + each.fate().word());
    }

    private static List<double[]> line(SampledPath path, double[] range) {
        List<double[]> points = new ArrayList<>();
        for (int n = 0; n < Math.min(path.size(), MOST_POINTS); n++) {
            double fraction = range[1] > range[0] ? (path.value(n, 5) - range[0]) / (range[1] - range[0]) : 0.5;
            points.add(new double[] {path.value(n, 1), path.value(n, 2), path.value(n, 3), fraction});
        }
        return points;
    }

    /** The speeds between which all but the slowest and the fastest fiftieth of the points shown lie (m/s). */
    private double[] speeds() {
        double[] speeds = shown.stream()
                .flatMapToDouble(each -> IntStream.range(0, Math.min(each.path().size(), MOST_POINTS))
                        .mapToDouble(n -> each.path().value(n, 5)))
                .sorted()
                .toArray();
        int rest = speeds.length / 50;
        return speeds.length == 0 ? new double[] {0, 0} : new double[] {speeds[rest], speeds[speeds.length - 1 - rest]};
    }

    private ObjectNode extras(SealModel model, double[] range, int tubes, PathTotals totals) {
        PathAccount account = export.account();
        Conditions conditions = export.flow().film().conditions();
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("exaggeration", exaggeration);
        node.put(
                "exaggeration_note",
                "Lengths along the shaft are drawn " + exaggeration
                        + " times too large; slopes and angles in the scene are" + " not those of the seal.");
        node.put("height_drawn_at_zero_m", model.datum());
        node.put(
                "axis",
                "y along the shaft, from the rotor face to the stator face; theta anticlockwise seen against y");
        node.put("rotation_rate_rad_s", conditions.rotationRate());
        node.put("inner_side", conditions.innerSide());
        node.put("outer_side", conditions.outerSide());
        node.put("frame", account.frame().name().toLowerCase(Locale.ROOT));
        node.put(
                "frame_note",
                "Paths are seen from the " + account.frame().name().toLowerCase(Locale.ROOT)
                        + " frame; the rings stand as at the time of the release.");
        ArrayNode speed = node.putArray("speed_scale_m_s");
        speed.add(range[0]);
        speed.add(range[1]);
        ArrayNode colours = node.putArray("speed_scale_srgb");
        for (int n = 0; n <= 8; n++) {
            colours.add(String.format(Locale.ROOT, "#%06x", SealModel.speedColour(n / 8.0)));
        }
        node.put(
                "speed_scale_note",
                "A fiftieth of the points is slower or faster than the scale and has its end colours.");
        node.put("speed_scale_source", SealModel.speedScaleSource());
        node.put("paths_shown", tubes);
        node.put("paths_followed", totals.tracers());
        node.put("field_file", account.file());
        node.put("field_sha256", account.sha256());
        node.put("caution", Cautions.TEXT);
        return node;
    }

    @Override
    public void close() {}
}
