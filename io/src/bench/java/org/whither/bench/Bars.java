package org.whither.bench;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collection;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.openjdk.jmh.results.RunResult;
import org.openjdk.jmh.runner.Runner;
import org.openjdk.jmh.runner.RunnerException;
import org.openjdk.jmh.runner.options.OptionsBuilder;
import org.openjdk.jmh.runner.options.VerboseMode;
import org.whither.film.FilmFlow;
import org.whither.io.hdf5.FieldWriter;
import org.whither.samples.SampleSeals;
import org.whither.trace.ParallelTracing;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/** Runs the benchmarks and prints how they stand to the bars. Its arguments name the groups to run; none means all. */
public final class Bars {
    private static final List<String> GROUPS = List.of("tracing", "precision", "opening", "split", "large");

    /** Tracers whose steps are counted. */
    private static final int COUNTED = 4000;

    private final List<String> table = new ArrayList<>();

    private Bars() {}

    /** Runs the groups that the arguments name, or all. */
    public static void main(String[] arguments) throws RunnerException, IOException, InterruptedException {
        List<String> wanted = Arrays.stream(arguments)
                .flatMap(argument -> Arrays.stream(argument.split("[ ,]+")))
                .filter(name -> !name.isEmpty())
                .toList();
        if (!GROUPS.containsAll(wanted)) {
            System.err.println("there is no such group among " + wanted + "; there are " + GROUPS);
            System.exit(2);
        }
        Bars bars = new Bars();
        if (wanted.isEmpty() || wanted.contains("tracing")) {
            bars.tracing();
        }
        if (wanted.isEmpty() || wanted.contains("precision")) {
            bars.table.addAll(Precision.table());
        }
        if (wanted.isEmpty() || wanted.contains("opening")) {
            bars.opening();
        }
        if (wanted.isEmpty() || wanted.contains("split")) {
            bars.split();
        }
        if (wanted.isEmpty() || wanted.contains("large")) {
            bars.large();
        }
        System.out.println();
        System.out.printf(
                Locale.ROOT,
                "Java %s, %s Vector API, %d processors%n",
                Runtime.version(),
                ModuleLayer.boot().findModule("jdk.incubator.vector").isPresent() ? "with" : "without",
                Runtime.getRuntime().availableProcessors());
        bars.table.forEach(System.out::println);
    }

    private void tracing() throws RunnerException {
        FilmFlow flow = FilmFlow.of(FullFilms.full(241, 161, 25));
        TraceSettings settings = Work.settings(flow.film(), Work.TOLERANCE);
        List<Release> releases = Work.releases(flow, Work.TRACERS);
        ParallelTracing.Outcome outcome =
                ParallelTracing.follow(flow, settings, releases.subList(0, COUNTED), 2, done -> {});
        double rejected = 100.0 * outcome.rejectedSteps() / (outcome.steps() + outcome.rejectedSteps());

        Collection<RunResult> results = run(TracingBench.class);
        double one = Work.TRACERS / score(results, "oneThread");
        double two = Work.TRACERS / score(results, "twoThreads");
        double commons = TracingBench.FEWER / score(results, "commonsMath");
        double hipparchus = TracingBench.FEWER / score(results, "hipparchus");
        int asked = Runtime.version().feature() >= 25 ? 8 : 7;
        row("tracers/s, one thread", one, "");
        row("tracers/s, Commons Math", commons, "");
        row("tracers/s, Hipparchus", hipparchus, "");
        row("one thread over Commons Math", one / commons, "at least " + asked);
        row("one thread over Hipparchus", one / hipparchus, "");
        row("rejected steps, %", rejected, "at most 12");
        row("steps kept per tracer", (double) outcome.steps() / COUNTED, "");
        row("two threads over one", two / one, "at least 1.9");
    }

    private void opening() throws RunnerException {
        Collection<RunResult> results = run(OpeningBench.class);
        for (String bits : List.of("32", "64")) {
            double bytes = score(results, "bytes", bits);
            String words = "400 × 200 × 33, " + bits + " bits, s: ";
            row(words + "its bytes once", bytes, "");
            row(words + "opened", score(results, "open", bits), asked(1.4 * bytes + 0.5));
            row(words + "opened and packed", score(results, "openAndPack", bits), "");
        }
    }

    private void split() throws IOException, InterruptedException {
        Path folder = Files.createTempDirectory("whither-bench");
        try {
            Path file = folder.resolve("demo.h5");
            FieldWriter.write(
                    SampleSeals.compute(SampleSeals.names().get(0), null, null, x -> {})
                            .film(),
                    file);
            row("--help, s", program(List.of(), "--help"), asked(0.4));
            row("check of the demo seal, s", program(List.of(), "check", file.toString()), "");
            String[] split = {
                "split",
                file.toString(),
                "--width",
                "0.002",
                "--quiet",
                "--out",
                folder.resolve("out").toString()
            };
            row("split of the demo seal to ±0.1 %, s", program(List.of(), split), asked(5));
        } finally {
            remove(folder);
        }
    }

    private void large() throws IOException, InterruptedException {
        Path folder = Files.createTempDirectory("whither-bench");
        try {
            Path file = folder.resolve("large.h5");
            long bytes = FieldFiles.write(FullFilms.full(251, 126, 25), 16, 4, true, file);
            for (double times : new double[] {1.5, 2, 2.5, 3, 4}) {
                List<String> heap = List.of("-Xmx" + (long) (times * bytes / (1 << 20)) + "m");
                double seconds = program(
                        heap,
                        "split",
                        file.toString(),
                        "--width",
                        "0.004",
                        "--json",
                        "--quiet",
                        "--out",
                        folder.resolve("out").toString());
                row("4001 × 501 × 25, 32 bits: heap over its bytes", times, asked(1.5));
                row("    split to ±0.2 %, s; not a number: refused", seconds, asked(60));
                if (!Double.isNaN(seconds)) {
                    break;
                }
            }
        } finally {
            remove(folder);
        }
    }

    /** Wall time of the built program, the best of three where it is short (s); not a number where it fails. */
    private static double program(List<String> options, String... arguments) throws IOException, InterruptedException {
        List<String> line = new ArrayList<>();
        line.add(Path.of(System.getProperty("java.home"), "bin", "java").toString());
        Path archive = Path.of("target", "classes-of-java-" + Runtime.version().feature() + ".jsa");
        if (Files.exists(archive)) {
            line.add("-XX:SharedArchiveFile=" + archive);
        }
        line.addAll(options);
        line.addAll(List.of("-jar", Path.of("target", "whither.jar").toString()));
        line.addAll(List.of(arguments));
        double best = Double.NaN;
        for (int n = 0; n < 3 && !(best > 20); n++) {
            long begun = System.nanoTime();
            int status = new ProcessBuilder(line)
                    .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                    .redirectError(ProcessBuilder.Redirect.INHERIT)
                    .start()
                    .waitFor();
            double seconds = 1e-9 * (System.nanoTime() - begun);
            if (status != 0 && status != 4) {
                return Double.NaN;
            }
            best = best < seconds ? best : seconds;
        }
        return best;
    }

    private static void remove(Path folder) throws IOException {
        List<Path> all;
        try (Stream<Path> found = Files.walk(folder)) {
            all = found.sorted(Comparator.reverseOrder()).toList();
        }
        for (Path path : all) {
            Files.delete(path);
        }
    }

    private static String asked(double most) {
        return String.format(Locale.ROOT, "at most %.3g", most);
    }

    private static Collection<RunResult> run(Class<?> benchmarks) throws RunnerException {
        return new Runner(new OptionsBuilder()
                        .include("\\." + benchmarks.getSimpleName() + "\\.")
                        .verbosity(VerboseMode.NORMAL)
                        .shouldFailOnError(true)
                        .build())
                .run();
    }

    private static double score(Collection<RunResult> results, String benchmark) {
        return results.stream()
                .map(RunResult::getPrimaryResult)
                .filter(result -> result.getLabel().equals(benchmark))
                .findAny()
                .orElseThrow()
                .getScore();
    }

    private static double score(Collection<RunResult> results, String benchmark, String bits) {
        return score(
                results.stream()
                        .filter(result -> result.getParams().getParam("bits").equals(bits))
                        .toList(),
                benchmark);
    }

    private void row(String what, double reached, String asked) {
        table.add(String.format(Locale.ROOT, "%-50s %12.4g   %s", what, reached, asked));
    }
}
