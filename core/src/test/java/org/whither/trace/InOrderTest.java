package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;

class InOrderTest {
    @Test
    void results_areTakenInOrder_andFewAreAhead() {
        AtomicInteger made = new AtomicInteger();
        List<Integer> taken = new ArrayList<>();
        InOrder.<Integer, RuntimeException>run(
                500,
                3,
                piece -> {
                    made.incrementAndGet();
                    return piece;
                },
                result -> {
                    assertTrue(made.get() - taken.size() <= 12, made + " made, " + taken.size() + " taken");
                    taken.add(result);
                });
        assertEquals(IntStream.range(0, 500).boxed().toList(), taken);
    }

    @Test
    void failure_endsTheWork() {
        AtomicInteger made = new AtomicInteger();
        assertThrows(
                IOException.class,
                () -> InOrder.<Integer, IOException>run(100_000, 2, piece -> made.incrementAndGet(), result -> {
                    throw new IOException("the disk is full");
                }));
        assertTrue(made.get() <= 8, made + " made");
        assertThrows(
                IllegalStateException.class,
                () -> InOrder.<Integer, RuntimeException>run(
                        10,
                        2,
                        piece -> {
                            throw new ArithmeticException();
                        },
                        result -> {}));
    }
}
