package org.whither.io.paths;

import java.io.Closeable;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.List;
import java.util.Set;
import java.util.function.DoubleConsumer;
import org.whither.film.FilmFlow;
import org.whither.trace.InOrder;
import org.whither.trace.PathSampler;
import org.whither.trace.SampledPath;

/**
 * Follows tracers and writes their paths, without holding more than a few of them. The files are the same whatever the
 * number of threads.
 *
 * @param flow the motion of the gas
 * @param settings how paths are followed and sampled
 * @param releases where they start
 * @param wantedTime time after which paths are to be stopped; infinite for none (s)
 * @param account what is told of the run in every file
 */
public record PathExport(
        FilmFlow flow, PathSampler.Settings settings, Releases releases, double wantedTime, PathAccount account) {
    /** The kinds of files. */
    public enum Kind {
        /** One table of points as text. */
        CSV("paths.csv"),
        /** Tables of points and of tracers. */
        HDF5("paths.h5"),
        /** A scene. */
        GLTF("paths.glb");

        private final String file;

        Kind(String file) {
            this.file = file;
        }

        /** Name of the file. */
        public String file() {
            return file;
        }
    }

    /** Most paths in a scene. */
    public static final int MOST_PATHS_IN_SCENE = GltfOutput.MOST_PATHS;

    /** Paths followed by one thread at a time; few enough to be held, enough to be followed side by side. */
    private static final int PIECE = 128;

    /**
     * Follows the tracers and writes their paths into a folder: {@code paths.json} and the files asked for.
     *
     * @param kinds which files
     * @param folder where to
     * @param threads how many threads
     * @param exaggeration factor on lengths across the film in the scene
     * @param progress told the share done
     * @return what became of them
     * @throws IOException where writing fails
     */
    public PathTotals write(Set<Kind> kinds, Path folder, int threads, double exaggeration, DoubleConsumer progress)
            throws IOException {
        try (Outputs outputs = new Outputs()) {
            outputs.add(JsonOutput.toFile(folder.resolve("paths.json"), account));
            for (Kind kind : kinds.isEmpty() ? EnumSet.of(Kind.CSV) : EnumSet.copyOf(kinds)) {
                Path file = folder.resolve(kind.file());
                switch (kind) {
                    case CSV -> outputs.add(new CsvOutput(file));
                    case HDF5 -> outputs.add(new Hdf5Output(file, account, settings));
                    case GLTF -> outputs.add(new GltfOutput(file, this, exaggeration));
                }
            }
            return run(outputs, threads, progress);
        }
    }

    /**
     * Follows the tracers and writes only what {@code paths.json} would hold.
     *
     * @param out where to; flushed, not closed
     */
    public PathTotals print(Appendable out, int threads, DoubleConsumer progress) throws IOException {
        try (Outputs outputs = new Outputs()) {
            outputs.add(new JsonOutput(out, () -> {}, account));
            return run(outputs, threads, progress);
        }
    }

    /** How many of so many paths a scene shows. */
    public static int pathsInScene(int count) {
        int stride = GltfOutput.stride(count);
        return (count + stride - 1) / stride;
    }

    private PathTotals run(Outputs outputs, int threads, DoubleConsumer progress) throws IOException {
        PathTotals totals = new PathTotals();
        int count = releases.count();
        int pieces = (count + PIECE - 1) / PIECE;
        InOrder.<Piece, IOException>run(pieces, threads, n -> follow(n, outputs), piece -> {
            for (EndedPath path : piece.paths()) {
                totals.add(path);
            }
            totals.addSteps(piece.steps());
            outputs.write(piece.prepared());
            progress.accept(0.98 * totals.tracers() / count);
        });
        outputs.finish(totals);
        progress.accept(1);
        return totals;
    }

    private record Piece(List<EndedPath> paths, long steps, List<Object> prepared) {}

    private Piece follow(int piece, Outputs outputs) {
        int from = piece * PIECE;
        PathSampler sampler = new PathSampler(flow, settings);
        List<EndedPath> paths = new ArrayList<>(PIECE);
        for (SampledPath path : sampler.follow(releases.slice(from, Math.min(releases.count(), from + PIECE)))) {
            paths.add(new EndedPath(
                    from + paths.size(),
                    path,
                    path.before().map(this::fate).orElse(null),
                    path.after().map(this::fate).orElse(null)));
        }
        return new Piece(paths, sampler.steps(), outputs.prepare(paths));
    }

    private Fate fate(org.whither.trace.PathEnd end) {
        return Fate.of(end, wantedTime, settings.timeLimit());
    }

    /** Several outputs, written together. */
    private static final class Outputs implements Closeable {
        private final List<PathOutput<Object>> all = new ArrayList<>();

        /** Adds an output, which is handed back only what it prepared itself. */
        @SuppressWarnings("unchecked") // so what it takes is what it made
        void add(PathOutput<?> output) {
            all.add((PathOutput<Object>) output);
        }

        List<Object> prepare(List<EndedPath> paths) {
            List<Object> prepared = new ArrayList<>(all.size());
            for (PathOutput<Object> output : all) {
                prepared.add(output.prepare(paths));
            }
            return prepared;
        }

        void write(List<Object> prepared) throws IOException {
            for (int n = 0; n < prepared.size(); n++) {
                all.get(n).write(prepared.get(n));
            }
        }

        void finish(PathTotals totals) throws IOException {
            for (PathOutput<Object> output : all) {
                output.finish(totals);
            }
        }

        @Override
        public void close() throws IOException {
            IOException first = null;
            for (PathOutput<Object> output : all) {
                try {
                    output.close();
                } catch (IOException e) {
                    if (first == null) {
                        first = e;
                    }
                }
            }
            if (first != null) {
                throw first;
            }
        }
    }
}
