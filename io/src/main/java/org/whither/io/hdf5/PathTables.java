package org.whither.io.hdf5;

import io.jhdf.Constants;
import io.jhdf.WritableDatasetImpl;
import io.jhdf.WritableGroupImpl;
import io.jhdf.api.Group;
import io.jhdf.api.WritableGroup;
import io.jhdf.exceptions.HdfWritingException;
import io.jhdf.storage.HdfFileChannel;
import java.io.Closeable;
import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.channels.FileChannel;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;

/**
 * Writes the HDF5 file of paths: the groups {@code points} and {@code tracers}, each a table of columns of equal length.
 *
 * <p>How many rows there will be is known only at the end, and the library writes datasets of known size. So each column
 * is first written to a file of its own, open but without a name where the system allows that, and copied into the HDF5
 * file at the end: no row is held in memory, and the columns lie in one piece, as readers like them best.
 */
public final class PathTables implements Closeable {
    private static final int BUFFER_BYTES = 1 << 16;
    private static final int COPY_BYTES = 1 << 20;

    /**
     * A column of a table.
     *
     * @param name its name
     * @param unit its SI unit, or null for whole numbers
     * @param meaning what its numbers stand for, or null
     * @param sample an array that tells its type
     */
    public record Column(String name, String unit, String meaning, Object sample) {
        /** A column of 64-bit floating numbers in an SI unit. */
        public static Column of(String name, String unit) {
            return new Column(name, unit, null, new double[1]);
        }

        /** A column of 64-bit whole numbers, with one more at the end: where the rows of each tracer begin. */
        public static Column whole(String name) {
            return new Column(name, null, null, new long[1]);
        }

        /** A column of 8-bit whole numbers that stand for something. */
        public static Column code(String name, String meaning) {
            return new Column(name, null, meaning, new byte[1]);
        }
    }

    private final Path file;
    private final List<Spool> points = new ArrayList<>();
    private final List<Spool> tracers = new ArrayList<>();

    /**
     * Opens the columns.
     *
     * @param file the file to be made; nothing bears its name, and its folder takes the columns meanwhile
     * @param points columns of the points
     * @param tracers columns of the tracers
     */
    public PathTables(Path file, List<Column> points, List<Column> tracers) throws IOException {
        this.file = file;
        try {
            for (Column column : points) {
                this.points.add(new Spool(column, file));
            }
            for (Column column : tracers) {
                this.tracers.add(new Spool(column, file));
            }
        } catch (IOException e) {
            close();
            throw e;
        }
    }

    /**
     * Adds rows.
     *
     * @param morePoints for each column of the points its numbers; not modified
     * @param moreTracers for each column of the tracers its numbers, exact as they are floating; not modified
     */
    public void add(double[][] morePoints, double[][] moreTracers) throws IOException {
        for (int n = 0; n < morePoints.length; n++) {
            points.get(n).add(morePoints[n]);
        }
        for (int n = 0; n < moreTracers.length; n++) {
            tracers.get(n).add(moreTracers[n]);
        }
    }

    /**
     * Writes the file.
     *
     * @param said text attributes of the file
     * @param tolerance error of an integration step
     * @param seed seed of the releases
     * @param rows number of points, which closes the column of whole numbers
     */
    public void finish(Map<String, String> said, double tolerance, long seed, long rows) throws IOException {
        if (rows > Integer.MAX_VALUE) {
            throw new IOException(file + " would hold " + rows + " points; expected at most " + Integer.MAX_VALUE
                    + ", the most that can be written to one file; write fewer tracers or fewer points of each");
        }
        TextHeap texts = new TextHeap(FieldWriter.HEAP_ADDRESS);
        WritableGroup root = new WritableGroupImpl(null, "/");
        said.forEach((name, text) -> texts.put(root, name, text == null ? "" : text));
        root.putAttribute("version", 1);
        root.putAttribute("tolerance", tolerance);
        root.putAttribute("seed", seed);
        put(root.putGroup("points"), points, texts);
        for (Spool spool : tracers) {
            if (spool.column.sample() instanceof long[]) {
                spool.add(new double[] {rows});
            }
        }
        put(root.putGroup("tracers"), tracers, texts);
        FieldWriter.write(root, texts, file);
        close();
    }

    private static void put(WritableGroup group, List<Spool> spools, TextHeap texts) throws IOException {
        for (Spool spool : spools) {
            spool.flush();
            SpooledDataset dataset = new SpooledDataset(group, spool);
            if (spool.column.unit() != null) {
                texts.put(dataset, Layout.UNITS, spool.column.unit());
            }
            if (spool.column.meaning() != null) {
                texts.put(dataset, "meaning", spool.column.meaning());
            }
            group.putDataset(spool.column.name(), dataset);
        }
    }

    @Override
    public void close() throws IOException {
        for (Spool spool : points) {
            spool.close();
        }
        for (Spool spool : tracers) {
            spool.close();
        }
    }

    /** A column on its way, in a file that is gone when it is closed. */
    private static final class Spool implements Closeable {
        final Column column;
        private final FileChannel channel;
        private final ByteBuffer buffer = ByteBuffer.allocate(BUFFER_BYTES).order(ByteOrder.nativeOrder());
        private long bytes;

        Spool(Column column, Path file) throws IOException {
            this.column = column;
            this.channel = FileChannel.open(
                    file.resolveSibling(file.getFileName() + "." + column.name()),
                    StandardOpenOption.READ,
                    StandardOpenOption.WRITE,
                    StandardOpenOption.CREATE_NEW,
                    StandardOpenOption.DELETE_ON_CLOSE);
        }

        void add(double[] values) throws IOException {
            for (double value : values) {
                if (buffer.remaining() < Double.BYTES) {
                    flush();
                }
                if (column.sample() instanceof double[]) {
                    buffer.putDouble(value);
                } else if (column.sample() instanceof long[]) {
                    buffer.putLong((long) value);
                } else {
                    buffer.put((byte) value);
                }
            }
        }

        void flush() throws IOException {
            buffer.flip();
            while (buffer.hasRemaining()) {
                bytes += channel.write(buffer, bytes);
            }
            buffer.clear();
        }

        @Override
        public void close() throws IOException {
            channel.close();
        }
    }

    /** A dataset whose numbers are copied from a spool. */
    private static final class SpooledDataset extends WritableDatasetImpl {
        private final Spool spool;

        SpooledDataset(Group parent, Spool spool) {
            super(spool.column.sample(), spool.column.name(), parent); // tells the type only
            this.spool = spool;
        }

        @Override
        public int[] getDimensions() {
            return new int[] {(int) getSize()};
        }

        @Override
        public long getSize() {
            return spool.bytes / getDataType().getSize();
        }

        @Override
        public long write(HdfFileChannel target, long position) {
            int[] shape = getDimensions();
            long address = position
                    + FlatDataset.header(this, shape, position, Constants.UNDEFINED_ADDRESS, spool.bytes)
                            .limit();
            FlatDataset.put(target, FlatDataset.header(this, shape, position, address, spool.bytes), position);
            ByteBuffer buffer = ByteBuffer.allocate(COPY_BYTES);
            long copied = 0;
            while (copied < spool.bytes) {
                buffer.clear();
                try {
                    if (spool.channel.read(buffer, copied) <= 0) {
                        throw new IOException("a column that was written is shorter than it was");
                    }
                } catch (IOException e) {
                    throw new HdfWritingException("cannot read back a column", e);
                }
                buffer.flip();
                copied += FlatDataset.put(target, buffer, address + copied);
            }
            return address + spool.bytes;
        }
    }
}
