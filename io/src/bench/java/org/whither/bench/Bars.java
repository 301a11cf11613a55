package org.whither.bench;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collection;
import java.util.List;
import java.util.Locale;
import org.openjdk.jmh.results.RunResult;
import org.openjdk.jmh.runner.Runner;
import org.openjdk.jmh.runner.RunnerException;
import org.openjdk.jmh.runner.options.OptionsBuilder;
import org.openjdk.jmh.runner.options.VerboseMode;
import org.whither.film.FilmFlow;
import org.whither.trace.ParallelTracing;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/** Runs the benchmarks and prints how they stand to the bars. Its arguments name the groups to run; none means all. */
public final class Bars {
    private static final List<String> GROUPS = List.of("tracing");

    /** Tracers whose steps are counted. */
    private static final int COUNTED = 4000;

    private final List<String> table = new ArrayList<>();

    private Bars() {}

    /** Runs the groups that the arguments name, or all. */
    public static void main(String[] arguments) throws RunnerException {
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
        System.out.println();
        System.out.printf(
                Locale.ROOT,
                "Java %s, %d processors%n",
                Runtime.version(),
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

    private void row(String what, double reached, String asked) {
        table.add(String.format(Locale.ROOT, "%-44s %12.4g   %s", what, reached, asked));
    }
}
