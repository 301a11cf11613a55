package org.whither.trace;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.CancellationException;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.concurrent.atomic.AtomicLong;
import java.util.function.IntConsumer;
import java.util.function.IntSupplier;
import org.whither.film.FilmFlow;
import org.whither.film.PackedFlow;

/** Follows many tracers on several threads. The result is in the order of the releases, whatever the number of threads. */
public final class ParallelTracing {
    private static final int LARGEST_CLAIM = 32;
    private static final int CLAIMS_EACH = 16;
    private static final int FEWEST_EACH = 8;

    /** Threads that wait for work; they do not keep the program from ending. */
    private static final ExecutorService CREW = Executors.newCachedThreadPool(work -> {
        Thread thread = new Thread(work, "tracing");
        thread.setDaemon(true);
        return thread;
    });

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
        return run(flow, settings, releases, threads, progress, measures, flow.packed());
    }

    /** With the batch tracer where the flow is packed, else with the single-path one. */
    static Outcome run(
            FilmFlow flow,
            TraceSettings settings,
            List<Release> releases,
            int threads,
            IntConsumer progress,
            PathMeasure[] measures,
            Optional<PackedFlow> packed) {
        PathEnd[] ends = new PathEnd[releases.size()];
        int workers = Math.max(1, Math.min(threads, ends.length / FEWEST_EACH));
        AtomicInteger next = new AtomicInteger();
        AtomicInteger done = new AtomicInteger();
        AtomicLong steps = new AtomicLong();
        AtomicLong rejected = new AtomicLong();
        IntConsumer ended = more -> progress.accept(done.addAndGet(more));
        Runnable work = () -> {
            Claims claims = new Claims(next, ends.length, workers);
            if (packed.isPresent()) {
                BatchTracer tracer = new BatchTracer(flow, packed.get(), settings, BatchSteps.shared());
                tracer.follow(releases, claims, ends, measures, ended);
                steps.addAndGet(tracer.steps());
                rejected.addAndGet(tracer.rejectedSteps());
            } else {
                oneByOne(flow, settings, releases, claims, ends, measures, ended, steps, rejected);
            }
        };
        List<Future<?>> shifts = new ArrayList<>();
        try {
            for (int n = 1; n < workers; n++) {
                shifts.add(CREW.submit(work));
            }
            work.run();
            for (Future<?> shift : shifts) {
                shift.get();
            }
            if (Thread.interrupted()) {
                throw new InterruptedException();
            }
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new CancellationException("interrupted while following tracers");
        } catch (ExecutionException e) {
            throw new IllegalStateException(e.getCause());
        } finally {
            for (Future<?> shift : shifts) {
                shift.cancel(true);
            }
        }
        return new Outcome(List.of(ends), steps.get(), rejected.get());
    }

    private static void oneByOne(
            FilmFlow flow,
            TraceSettings settings,
            List<Release> releases,
            Claims claims,
            PathEnd[] ends,
            PathMeasure[] measures,
            IntConsumer ended,
            AtomicLong steps,
            AtomicLong rejected) {
        Tracer tracer = new Tracer(flow, settings);
        PathMeter meter = new PathMeter(flow.film(), settings.direction());
        int n;
        while ((n = claims.getAsInt()) >= 0 && !Thread.currentThread().isInterrupted()) {
            if (measures == null) {
                ends[n] = tracer.follow(releases.get(n));
            } else {
                meter.begin();
                ends[n] = tracer.follow(releases.get(n), meter);
                measures[n] = meter.measure();
            }
            ended.accept(1);
        }
        steps.addAndGet(tracer.steps());
        rejected.addAndGet(tracer.rejectedSteps());
    }

    /** The releases that one thread claims, several at a time. */
    private static final class Claims implements IntSupplier {
        private final AtomicInteger next;
        private final int all;
        private final int each;
        private int at;
        private int until;

        Claims(AtomicInteger next, int all, int workers) {
            this.next = next;
            this.all = all;
            this.each = Math.max(1, Math.min(LARGEST_CLAIM, all / (workers * CLAIMS_EACH)));
        }

        /** The next release, −1 where there is none. */
        @Override
        public int getAsInt() {
            if (at >= until) {
                at = next.getAndAdd(each);
                until = Math.min(all, at + each);
            }
            return at < until ? at++ : -1;
        }
    }
}
