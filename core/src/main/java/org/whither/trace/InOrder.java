package org.whither.trace;

import java.util.ArrayDeque;
import java.util.Deque;
import java.util.concurrent.CancellationException;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.function.IntFunction;

/**
 * Work on many pieces by several threads whose results are taken one after another in the order of the pieces, so that
 * only a few of them are ever held.
 */
public final class InOrder {
    /** Pieces a thread that may be under way or waiting to be taken. */
    private static final int AHEAD = 4;

    /**
     * Takes results.
     *
     * @param <T> what they are
     * @param <E> how taking one may fail
     */
    @FunctionalInterface
    public interface Taker<T, E extends Exception> {
        /**
         * Takes the next result, in the thread that called {@link InOrder#run}.
         *
         * @param result the result
         * @throws E where that fails; no further piece is begun
         */
        void take(T result) throws E;
    }

    private InOrder() {}

    /**
     * Does the work.
     *
     * @param pieces how many pieces
     * @param threads how many threads, at least 1
     * @param work makes the result of a piece, from any thread
     * @param taker takes the results in order
     * @throws E where the taker fails
     * @throws CancellationException where the calling thread is interrupted
     */
    public static <T, E extends Exception> void run(
            int pieces, int threads, IntFunction<T> work, Taker<? super T, E> taker) throws E {
        ExecutorService crew = Executors.newFixedThreadPool(threads);
        try {
            Deque<Future<T>> ahead = new ArrayDeque<>();
            int begun = 0;
            for (int taken = 0; taken < pieces; taken++) {
                while (begun < pieces && ahead.size() < AHEAD * threads) {
                    int piece = begun++;
                    ahead.add(crew.submit(() -> work.apply(piece)));
                }
                taker.take(ahead.remove().get());
            }
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new CancellationException("interrupted while following tracers");
        } catch (ExecutionException e) {
            throw new IllegalStateException(e.getCause());
        } finally {
            crew.shutdownNow();
        }
    }
}
