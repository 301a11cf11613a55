package org.whither.io.paths;

import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.whither.io.hdf5.PathTables;
import org.whither.io.result.Cautions;
import org.whither.trace.Course;
import org.whither.trace.PathSampler;
import org.whither.trace.Release;
import org.whither.trace.SampledPath;

/** The table of points and the table of tracers. */
final class Hdf5Output implements PathOutput<Hdf5Output.Rows> {
    /**
     * Rows made ready.
     *
     * @param points for each column of the points its numbers
     * @param tracers for each column of the tracers its numbers
     */
    record Rows(double[][] points, double[][] tracers) {}

    private final PathTables tables;
    private final Course course;
    private final PathAccount account;
    private long written;

    Hdf5Output(Path file, PathAccount account, PathSampler.Settings settings) throws IOException {
        this.account = account;
        this.course = settings.course();
        List<PathTables.Column> points = List.of(
                PathTables.Column.of("time", "s"),
                PathTables.Column.of("theta", "rad"),
                PathTables.Column.of("radius", "m"),
                PathTables.Column.of("z", "m"),
                PathTables.Column.of("sigma", "1"),
                PathTables.Column.of("speed", "m/s"),
                PathTables.Column.of("pressure", "Pa"));
        List<PathTables.Column> tracers = new ArrayList<>(List.of(
                PathTables.Column.whole("point_offset"),
                PathTables.Column.of("release_theta", "rad"),
                PathTables.Column.of("release_radius", "m"),
                PathTables.Column.of("release_sigma", "1"),
                PathTables.Column.of("mass_flow", "kg/s"),
                PathTables.Column.of("residence_time", "s"),
                PathTables.Column.of("revolutions", "1")));
        String meaning = Stream.of(Fate.values())
                .map(fate -> fate.ordinal() + " " + fate.word())
                .collect(Collectors.joining(", "));
        if (course != Course.FORWARD) {
            tracers.add(PathTables.Column.code("from", meaning));
        }
        if (course != Course.BACKWARD) {
            tracers.add(PathTables.Column.code("fate", meaning));
        }
        this.tables = new PathTables(file, points, tracers);
    }

    @Override
    public Rows prepare(List<EndedPath> paths) {
        int count = 0;
        for (EndedPath each : paths) {
            count += each.path().size();
        }
        double[][] points = new double[SampledPath.COLUMNS][count];
        double[][] tracers = new double[course == Course.BOTH ? 9 : 8][paths.size()];
        int row = 0;
        for (int n = 0; n < paths.size(); n++) {
            SampledPath path = paths.get(n).path();
            Release release = path.release();
            tracers[0][n] = row;
            tracers[1][n] = release.theta();
            tracers[2][n] = release.radius();
            tracers[3][n] = release.sigma();
            tracers[4][n] = release.massFlow();
            tracers[5][n] = path.duration();
            tracers[6][n] = path.revolutions();
            int next = 7;
            if (paths.get(n).from() != null) {
                tracers[next++][n] = paths.get(n).from().ordinal();
            }
            if (paths.get(n).fate() != null) {
                tracers[next][n] = paths.get(n).fate().ordinal();
            }
            for (int p = 0; p < path.size(); p++, row++) {
                for (int column = 0; column < SampledPath.COLUMNS; column++) {
                    points[column][row] = path.value(p, column);
                }
            }
        }
        return new Rows(points, tracers);
    }

    @Override
    public void write(Rows rows) throws IOException {
        for (int n = 0; n < rows.tracers()[0].length; n++) {
            rows.tracers()[0][n] += written;
        }
        tables.add(rows.points(), rows.tracers());
        written += rows.points()[0].length;
    }

    @Override
    public void finish(PathTotals totals) throws IOException {
        Map<String, String> said = new LinkedHashMap<>();
        said.put("result", "paths");
        said.put("field_file", account.file());
        said.put("field_title", account.title());
        said.put("field_sha256", account.sha256());
        said.put("frame", account.frame().name().toLowerCase(Locale.ROOT));
        said.put("direction", account.course().name().toLowerCase(Locale.ROOT));
        said.put("until", account.until());
        said.put("points", account.points());
        said.put("interpolation", account.interpolation());
        said.put("releases", String.join(" ", account.releases()));
        said.put(
                "about",
                "The points of tracer n are the rows tracers/point_offset[n] to tracers/point_offset[n + 1] - 1 of the"
                        + " datasets in points, in order of time; theta is unwrapped, in the frame told.");
        said.put("caution", Cautions.TEXT);
        tables.finish(said, account.tolerance(), account.seed(), written);
    }

    @Override
    public void close() throws IOException {
        tables.close();
    }
}
