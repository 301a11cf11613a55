package org.whither.bench;

import java.util.List;
import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;
import org.whither.film.FilmFlow;
import org.whither.trace.ParallelTracing;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/** Time of following tracers through the demo seal as a full field of 241 × 161 × 25 nodes. */
@State(Scope.Benchmark)
@BenchmarkMode(Mode.SingleShotTime)
@OutputTimeUnit(TimeUnit.SECONDS)
@Fork(1)
@Warmup(iterations = 0)
@Measurement(iterations = 2)
public class TracingBench {
    /** Tracers that the slower libraries follow. */
    static final int FEWER = 100;

    private FilmFlow flow;
    private TraceSettings settings;
    private List<Release> releases;
    private List<Release> fewer;

    /** Makes the film and warms up. */
    @Setup
    public void prepare() {
        flow = FilmFlow.of(FullFilms.full(241, 161, 25));
        settings = Work.settings(flow.film(), Work.TOLERANCE);
        releases = Work.releases(flow, Work.TRACERS);
        fewer = releases.subList(0, FEWER);
        // Warms up, long enough for the program to change over to vectors.
        for (int n = 0; n < 8; n++) {
            ParallelTracing.follow(flow, settings, releases.subList(0, 2000), 1, done -> {});
            LibraryTracing.commonsMath(flow, settings, fewer);
            LibraryTracing.hipparchus(flow, settings, fewer);
        }
    }

    /** The program's tracer on one thread. */
    @Benchmark
    public ParallelTracing.Outcome oneThread() {
        return ParallelTracing.follow(flow, settings, releases, 1, done -> {});
    }

    /** The program's tracer on two threads. */
    @Benchmark
    public ParallelTracing.Outcome twoThreads() {
        return ParallelTracing.follow(flow, settings, releases, 2, done -> {});
    }

    /** Apache Commons Math on one thread, fewer tracers. */
    @Benchmark
    public double[] commonsMath() {
        return LibraryTracing.commonsMath(flow, settings, fewer);
    }

    /** Hipparchus on one thread, fewer tracers. */
    @Benchmark
    public double[] hipparchus() {
        return LibraryTracing.hipparchus(flow, settings, fewer);
    }
}
