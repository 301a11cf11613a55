package org.whither.trace;

import java.lang.reflect.Constructor;
import java.util.concurrent.atomic.AtomicBoolean;
import java.util.concurrent.atomic.AtomicLong;
import org.whither.film.PackedFlow;

/**
 * Chooses the step of a batch: lane by lane, or on vectors where the virtual machine has its Vector API. Both give the same
 * bits, so it may change at any time. Vectors are slow, and keep a processor busy for a second or two, until the virtual
 * machine has compiled them for good; so they are made ready beside the work, and only for work that has turned out to be
 * long.
 */
final class BatchSteps {
    private static final String MODULE = "jdk.incubator.vector";
    /** Steps after which work counts as long. */
    private static final long LONG_WORK = 12_000_000;

    private static final int FEWEST_ROUNDS = 6_000;
    private static final int MOST_ROUNDS = 100_000;
    private static final int MEASURED_ROUNDS = 200;

    private static final BatchSteps SHARED = new BatchSteps(new BatchStep(), LONG_WORK);

    private final AtomicLong done = new AtomicLong();
    private final AtomicBoolean begun = new AtomicBoolean();
    private final long longWork;
    private volatile BatchStep best;

    private BatchSteps(BatchStep first, long longWork) {
        this.best = first;
        this.longWork = longWork;
    }

    /** The choice of all work of this program. */
    static BatchSteps shared() {
        return SHARED;
    }

    /** No choice. */
    static BatchSteps only(BatchStep step) {
        return new BatchSteps(step, Long.MAX_VALUE);
    }

    /** The step on vectors, or null where the virtual machine was not started with the module. */
    static BatchStep onVectors() {
        if (ModuleLayer.boot().findModule(MODULE).isEmpty()) {
            return null;
        }
        try {
            Constructor<?> make = Class.forName("org.whither.trace.VectorStep").getDeclaredConstructor();
            return (BatchStep) make.newInstance();
        } catch (ReflectiveOperationException | LinkageError e) {
            return null;
        }
    }

    /** The fastest step that is ready. */
    BatchStep best() {
        return best;
    }

    /** Told how many more steps were tried. */
    void worked(long steps) {
        if (done.addAndGet(steps) > longWork && begun.compareAndSet(false, true)) {
            BatchStep vectors = onVectors();
            if (vectors != null) {
                Thread thread = new Thread(() -> makeReady(vectors), "vectors");
                thread.setDaemon(true);
                thread.start();
            }
        }
    }

    private void makeReady(BatchStep vectors) {
        Lanes lanes = new Lanes();
        for (int lane = 0; lane < Lanes.LANES; lane++) {
            example(lanes, lane);
        }
        BatchStep plain = best;
        for (int round = 0; round < MOST_ROUNDS; round += MEASURED_ROUNDS) {
            long start = System.nanoTime();
            repeat(vectors, lanes);
            long middle = System.nanoTime();
            if (round >= FEWEST_ROUNDS) {
                repeat(plain, lanes);
                if (middle - start < 0.8 * (System.nanoTime() - middle)) {
                    best = vectors;
                    return;
                }
            }
        }
    }

    private static void repeat(BatchStep step, Lanes lanes) {
        for (int n = 0; n < MEASURED_ROUNDS; n++) {
            step.attempt(lanes, Lanes.LANES, 1, 1e8, 1e6);
        }
    }

    /** Some motion and a place in it. */
    private static void example(Lanes lanes, int lane) {
        for (int n = 0; n < PackedFlow.NUMBERS; n++) {
            lanes.raw[n * Lanes.LANES + lane] = 1 + 0.01 * n + 0.001 * lane;
        }
        for (int n = 0; n < 3; n++) {
            lanes.state[(Lanes.START + n) * Lanes.LANES + lane] = 0.1 + 0.05 * n;
        }
        lanes.state[Lanes.WANTED * Lanes.LANES + lane] = Double.POSITIVE_INFINITY;
        lanes.state[Lanes.LEFT * Lanes.LANES + lane] = 1;
        lanes.state[Lanes.BOUND * Lanes.LANES + lane] = -BatchStep.EDGE;
        lanes.state[(Lanes.BOUND + 1) * Lanes.LANES + lane] = 1 + BatchStep.EDGE;
    }
}
