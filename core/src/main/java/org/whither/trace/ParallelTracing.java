package org.whither.trace;

import java.util.List;
import java.util.concurrent.CancellationException;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.concurrent.atomic.AtomicLong;
import java.util.function.IntConsumer;
import java.util.stream.IntStream;
import org.whither.film.FilmFlow;

/** Follows many tracers on several threads. The result is in the order of the releases, whatever the number of threads. */
public final class ParallelTracing {
    private static final int CHUNK = 32;

    /**
     * What became of the tracers.
     *
     * @param ends one end for each release, in order
     * @param steps steps kept
     * @param rejectedSteps steps tried and thrown away
     */
    public record Outcome(List<PathEnd> ends, long steps, long rejectedSteps) {}

    /**
     * What became of the tracers, and what they met.
     *
     * @param outcome their ends
     * @param measures one for each release, in order
     */
    public record Measured(Outcome outcome, List<PathMeasure> measures) {}

    private ParallelTracing() {}

    /**
     * Follows tracers to their ends.
     *
     * @param flow the motion of the gas
     * @param settings how to follow them
     * @param releases where they start
     * @param threads how many threads, at least 1
     * @param progress told now and then how many have ended, from any thread
     * @return what became of them
     * @throws CancellationException where the calling thread is interrupted
     */
    public static Outcome follow(
            FilmFlow flow, TraceSettings settings, List<Release> releases, int threads, IntConsumer progress) {
        return run(flow, settings, releases, threads, progress, null);
    }

    /**
     * Follows tracers to their ends, and measures their paths on the way; arguments as in {@link #follow}.
     *
     * @return what became of them, and what they met
     * @throws CancellationException where the calling thread is interrupted
     */
    public static Measured measure(
            FilmFlow flow, TraceSettings settings, List<Release> releases, int threads, IntConsumer progress) {
        PathMeasure[] measures = new PathMeasure[releases.size()];
        Outcome outcome = run(flow, settings, releases, threads, progress, measures);
        return new Measured(outcome, List.of(measures));
    }

    private static Outcome run(
            FilmFlow flow,
            TraceSettings settings,
            List<Release> releases,
            int threads,
            IntConsumer progress,
            PathMeasure[] measures) {
        PathEnd[] ends = new PathEnd[releases.size()];
        AtomicInteger next = new AtomicInteger();
        AtomicInteger done = new AtomicInteger();
        AtomicLong steps = new AtomicLong();
        AtomicLong rejected = new AtomicLong();
        Runnable work = () -> {
            Tracer tracer = new Tracer(flow, settings);
            PathMeter meter = new PathMeter(flow.film(), settings.direction());
            int from;
            while ((from = next.getAndAdd(CHUNK)) < ends.length
                    && !Thread.currentThread().isInterrupted()) {
                int to = Math.min(ends.length, from + CHUNK);
                for (int n = from; n < to; n++) {
                    if (measures == null) {
                        ends[n] = tracer.follow(releases.get(n));
                    } else {
                        meter.begin();
                        ends[n] = tracer.follow(releases.get(n), meter);
                        measures[n] = meter.measure();
                    }
                }
                progress.accept(done.addAndGet(to - from));
            }
            steps.addAndGet(tracer.steps());
            rejected.addAndGet(tracer.rejectedSteps());
        };
        ExecutorService crew = Executors.newFixedThreadPool(threads);
        try {
            List<Future<?>> shifts = IntStream.range(0, threads)
                    .<Future<?>>mapToObj(n -> crew.submit(work))
                    .toList();
            for (Future<?> shift : shifts) {
                shift.get();
            }
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new CancellationException("interrupted while following tracers");
        } catch (ExecutionException e) {
            throw new IllegalStateException(e.getCause());
        } finally {
            crew.shutdownNow();
        }
        return new Outcome(List.of(ends), steps.get(), rejected.get());
    }
}
