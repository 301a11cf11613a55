package org.whither.bench;

import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.concurrent.TimeUnit;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Param;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.TearDown;
import org.openjdk.jmh.annotations.Warmup;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.PackedFlow;
import org.whither.io.hdf5.FieldReader;

/** Time of opening a field of 400 × 200 × 33 nodes that the system has in its file cache. */
@State(Scope.Benchmark)
@BenchmarkMode(Mode.SingleShotTime)
@OutputTimeUnit(TimeUnit.SECONDS)
@Fork(1)
@Warmup(iterations = 0)
@Measurement(iterations = 1)
public class OpeningBench {
    /** Bits of a number. */
    @Param({"32", "64"})
    private int bits;

    private Path file;

    /** Writes the file. */
    @Setup
    public void write() throws IOException {
        file = Files.createTempFile("whither-bench", ".h5");
        FieldFiles.write(FullFilms.full(134, 101, 33), 3, 2, bits == 32, file);
    }

    /** Removes the file. */
    @TearDown
    public void remove() throws IOException {
        Files.delete(file);
    }

    /** All bytes once. */
    @Benchmark
    public long bytes() throws IOException {
        ByteBuffer buffer = ByteBuffer.allocateDirect(1 << 20);
        long sum = 0;
        try (FileChannel channel = FileChannel.open(file)) {
            while (channel.read(buffer) >= 0) {
                for (buffer.flip(); buffer.remaining() >= Long.BYTES; ) {
                    sum += buffer.getLong();
                }
                buffer.clear();
            }
        }
        return sum;
    }

    /** The field read and checked. */
    @Benchmark
    public Film open() {
        return FieldReader.read(file);
    }

    /** The same, and its motion formed and packed. */
    @Benchmark
    public PackedFlow openAndPack() {
        return FilmFlow.of(FieldReader.read(file)).packed().orElseThrow();
    }
}
