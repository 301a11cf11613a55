package org.whither.io.motion;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertSame;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.concurrent.CountDownLatch;
import java.util.concurrent.TimeUnit;
import java.util.concurrent.atomic.AtomicInteger;
import org.junit.jupiter.api.Test;

class FrameWritersTest {
    /** A file that remembers what became of it, waits for a latch, and fails at a frame. */
    private static final class Remembered implements FrameFile {
        final List<BufferedImage> frames = Collections.synchronizedList(new ArrayList<>());
        final boolean needed;
        final int failAt;
        final CountDownLatch latch;
        volatile Thread thread;
        volatile boolean finished;
        volatile boolean abandoned;

        Remembered(boolean needed, int failAt, CountDownLatch latch) {
            this.needed = needed;
            this.failAt = failAt;
            this.latch = latch;
        }

        @Override
        public void add(BufferedImage frame) throws IOException {
            thread = Thread.currentThread();
            try {
                assertTrue(latch.await(20, TimeUnit.SECONDS));
            } catch (InterruptedException e) {
                throw new IOException("interrupted", e);
            }
            if (frames.size() == failAt) {
                throw new IOException("file.x was not written: the pen broke");
            }
            frames.add(frame);
        }

        @Override
        public void finish() {
            finished = true;
        }

        @Override
        public void abandon() {
            abandoned = true;
        }

        @Override
        public boolean needed() {
            return needed;
        }
    }

    private static final CountDownLatch OPEN = new CountDownLatch(0);

    private static BufferedImage frame() {
        return new BufferedImage(1, 1, BufferedImage.TYPE_INT_RGB);
    }

    @Test
    void frames_goToEveryFileInOrder_besideTheDrawing() throws IOException {
        Remembered a = new Remembered(true, -1, OPEN);
        Remembered b = new Remembered(true, -1, OPEN);
        List<BufferedImage> frames = new ArrayList<>();
        try (FrameWriters writers = new FrameWriters(List.of(a, b))) {
            for (int n = 0; n < 30; n++) {
                frames.add(frame());
                writers.add(frames.get(n));
            }
            assertEquals(List.of(), writers.finish());
        }
        for (Remembered file : List.of(a, b)) {
            assertEquals(30, file.frames.size());
            for (int n = 0; n < 30; n++) {
                assertSame(frames.get(n), file.frames.get(n));
            }
            assertTrue(file.finished && file.thread != Thread.currentThread());
        }
        assertTrue(a.thread != b.thread);
    }

    @Test
    void theDrawing_waitsForAFileThatFallsBehind() throws Exception {
        CountDownLatch latch = new CountDownLatch(1);
        Remembered slow = new Remembered(true, -1, latch);
        AtomicInteger handed = new AtomicInteger();
        try (FrameWriters writers = new FrameWriters(List.of(slow))) {
            Thread drawing = new Thread(() -> {
                try {
                    for (int n = 0; n < 50; n++) {
                        writers.add(frame());
                        handed.incrementAndGet();
                    }
                } catch (IOException e) {
                    handed.set(-1);
                }
            });
            drawing.start();
            drawing.join(300);
            assertTrue(handed.get() <= 6, handed.get() + " frames wait in memory");
            latch.countDown();
            drawing.join(20_000);
            writers.finish();
            assertEquals(50, handed.get());
            assertEquals(50, slow.frames.size());
        }
    }

    @Test
    void aNeededFileThatFails_endsTheWhole() {
        Remembered good = new Remembered(true, -1, OPEN);
        Remembered bad = new Remembered(true, 3, OPEN);
        IOException failure = assertThrows(IOException.class, () -> {
            try (FrameWriters writers = new FrameWriters(List.of(good, bad))) {
                for (int n = 0; n < 500; n++) {
                    writers.add(frame());
                }
                writers.finish();
            }
        });
        assertEquals("file.x was not written: the pen broke", failure.getMessage());
        assertTrue(bad.abandoned && good.abandoned && !good.finished);
    }

    @Test
    void anotherFileThatFails_isGivenUpAndTold() throws IOException {
        Remembered good = new Remembered(true, -1, OPEN);
        Remembered bad = new Remembered(false, 3, OPEN);
        try (FrameWriters writers = new FrameWriters(List.of(good, bad))) {
            for (int n = 0; n < 50; n++) {
                writers.add(frame());
            }
            List<FrameWriters.GivenUp> given = writers.finish();
            assertEquals(1, given.size());
            assertSame(bad, given.get(0).file());
            assertEquals("file.x was not written: the pen broke", given.get(0).sentence());
        }
        assertEquals(50, good.frames.size());
        assertTrue(good.finished && bad.abandoned && !bad.finished);
    }
}
