package org.whither.io.hdf5;

import io.jhdf.api.Dataset;
import io.jhdf.api.dataset.ChunkedDataset;
import io.jhdf.api.dataset.ContiguousDataset;
import io.jhdf.dataset.DatasetBase;
import io.jhdf.exceptions.HdfException;
import io.jhdf.object.datatype.DataType;
import io.jhdf.object.datatype.EnumDataType;
import io.jhdf.object.datatype.FixedPoint;
import io.jhdf.object.datatype.FloatingPoint;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import org.whither.film.Values;
import org.whither.io.file.RefusedInput;
import org.whither.io.units.Quantity;
import org.whither.io.units.ToSi;
import org.whither.io.units.UnitException;
import org.whither.io.units.UnitReader;

/**
 * A dataset of numbers in the file, whose unit is already known to be one of its quantity; its numbers are read, into SI,
 * when they are asked for. Floating numbers of 16, 32 and 64 bits and integers of 8 to 64 bits are read in either byte
 * order, straight from the stored bytes into a flat array.
 */
final class StoredArray {
    /** Numbers that one thread turns or looks through at a time. */
    private static final int BLOCK = 1 << 16;

    private final HdfSource source;
    private final Dataset dataset;
    private final String path;
    private final Quantity quantity;
    private final ToSi toSi;
    private final int[] shape;
    private final DataType type;

    private StoredArray(HdfSource source, Dataset dataset, String path, Quantity quantity, ToSi toSi) {
        this.source = source;
        this.dataset = dataset;
        this.path = path;
        this.quantity = quantity;
        this.toSi = toSi;
        this.shape = source.guarded(path, dataset::getDimensions);
        this.type = source.guarded(path, () -> storedType(dataset.getDataType()));
    }

    static StoredArray of(HdfSource source, Dataset dataset, String path, Quantity quantity) {
        String units = Section.readText(
                source,
                source.guarded("the attributes of " + path, dataset::getAttributes),
                path + "@" + Layout.UNITS,
                Layout.UNITS);
        if (units == null && quantity != Quantity.NUMBER) {
            throw source.refuse(
                    "dataset " + path + " has no attribute units",
                    "a unit of " + quantity.words() + ", such as " + quantity.siSpelling(),
                    "add the string attribute units with the unit its numbers are in");
        }
        try {
            ToSi toSi = UnitReader.read(units == null ? "" : units, quantity);
            StoredArray array = new StoredArray(source, dataset, path, quantity, toSi);
            array.checkType();
            return array;
        } catch (UnitException e) {
            throw source.refuse(
                    "the attribute units of dataset " + path + ": " + e.getMessage(),
                    "a unit of " + quantity.words() + ", such as " + quantity.siSpelling(),
                    quantity == Quantity.PRESSURE
                            ? "write the unit its numbers are in; pressures are absolute"
                            : "write the unit its numbers are in");
        }
    }

    /** Path in the file. */
    String path() {
        return path;
    }

    /** Number of dimensions. */
    int rank() {
        return shape.length;
    }

    /** Length along a dimension. */
    int length(int dimension) {
        return shape[dimension];
    }

    /** Whether the lengths are these. */
    boolean hasShape(int... wanted) {
        return Arrays.equals(shape, wanted);
    }

    /** The lengths, as in {@code 13 × 8}. */
    String shapeText() {
        return shapeText(shape);
    }

    static String shapeText(int... shape) {
        if (shape.length == 0) {
            return "a single number";
        }
        StringBuilder text = new StringBuilder();
        for (int length : shape) {
            text.append(text.length() == 0 ? "" : " × ").append(length);
        }
        return text.toString();
    }

    /**
     * Refuses lengths that do not fit.
     *
     * @param words what the lengths follow from
     * @param wanted the lengths
     * @return this
     */
    StoredArray withShape(String words, int... wanted) {
        if (!hasShape(wanted)) {
            throw source.refuse(
                    "dataset " + path + " is " + shapeText(),
                    shapeText(wanted) + ", " + words,
                    "write it with the index order circumferential, radial, across the film");
        }
        return this;
    }

    /** Memory that {@link #values} takes (bytes). */
    long heap() {
        return count() * Double.BYTES;
    }

    /** Memory that {@link #numbers} takes (bytes); none where the file itself is mapped. */
    long heapOfNumbers() {
        return staysInFile() ? 0 : count() * (inSingles() ? Float.BYTES : Double.BYTES);
    }

    /** Memory that is needed besides while they are read (bytes): the chunks at hand, stored and inflated. */
    long heapWhileRead() {
        if (!(dataset instanceof ChunkedDataset chunked)) {
            return 0;
        }
        long bytes = 4L * type.getSize() * Runtime.getRuntime().availableProcessors();
        for (int length : source.guarded("dataset " + path, chunked::getChunkDimensions)) {
            bytes = length < 0 || bytes > Long.MAX_VALUE / 64 / Math.max(1, length)
                    ? Long.MAX_VALUE / 64
                    : bytes * length;
        }
        return bytes;
    }

    private boolean inSingles() {
        return type instanceof FloatingPoint && type.getSize() <= Float.BYTES;
    }

    /** Whether its numbers are used where they lie in the file: large, in one piece, of 32 or 64 bits. */
    private boolean staysInFile() {
        return dataset instanceof ContiguousDataset
                && type instanceof FloatingPoint
                && type.getSize() >= Float.BYTES
                && count() * type.getSize() >= source.mappedFrom();
    }

    private long count() {
        long count = 1;
        for (int length : shape) {
            count = length < 0 || count > Long.MAX_VALUE / 64 / Math.max(1, length)
                    ? Long.MAX_VALUE / 64
                    : count * length;
        }
        return count;
    }

    /**
     * Its numbers, row-major, in SI.
     *
     * @throws RefusedInput where they cannot be read, or one is not finite
     */
    double[] values() {
        checkReadable();
        double[] values = new double[(int) count()];
        source.guarded("dataset " + path, () -> {
            read(values);
            return null;
        });
        int bad = first(values.length, (from, to) -> {
            for (int n = from; n < to; n++) {
                double value = toSi.convert(values[n]);
                if (!Double.isFinite(value)) {
                    return n;
                }
                values[n] = value;
            }
            return -1;
        });
        if (bad >= 0) {
            throw notFinite(bad, values[bad]);
        }
        return values;
    }

    /**
     * Its numbers, row-major, in SI, kept in as many bits as they are stored in, or left where they lie in the file.
     *
     * @throws RefusedInput where they cannot be read, or one is not finite
     */
    Values numbers() {
        if (!staysInFile() && !inSingles()) {
            return Values.of(values());
        }
        checkReadable();
        Values values = source.guarded("dataset " + path, () -> {
            if (staysInFile()) {
                return StoredNumbers.of(contiguous(), type.getSize() == Float.BYTES, toSi);
            }
            float[] stored = new float[(int) count()];
            read(stored);
            return StoredNumbers.of(stored, toSi);
        });
        int bad = source.guarded(
                "dataset " + path,
                () -> first(values.size(), (from, to) -> {
                    for (int n = from; n < to; n++) {
                        if (!Double.isFinite(values.at(n))) {
                            return n;
                        }
                    }
                    return -1;
                }));
        if (bad >= 0) {
            throw notFinite(bad, values.at(bad));
        }
        return values;
    }

    /** Refuses what cannot be in the file, or was never filled. */
    private void checkReadable() {
        long count = count();
        long bytes = count * type.getSize();
        if (bytes > Integer.MAX_VALUE) {
            throw source.refuse(
                    "dataset " + path + " is " + shapeText() + ", " + bytes + " bytes",
                    "at most 2 GiB in one dataset",
                    "write it in 32-bit numbers or on a coarser grid");
        }
        if (!source.canHold(dataset, bytes)) {
            throw source.refuse(
                    "dataset " + path + " is " + shapeText() + ", more than the file can hold",
                    "a file that is whole",
                    "copy the file again, or write it again");
        }
        checkWritten();
    }

    /** Works on the numbers of one block; gives the first index at which a number will not do, or −1. */
    @FunctionalInterface
    private interface Block {
        int work(int from, int to);
    }

    /** Works on all numbers, block by block on several threads; the first index that will not do, or −1. */
    private static int first(int count, Block block) {
        int blocks = (int) (((long) count + BLOCK - 1) / BLOCK);
        return IntStream.range(0, blocks)
                .parallel()
                .map(n -> block.work(n * BLOCK, (int) Math.min(count, (n + 1L) * BLOCK)))
                .filter(found -> found >= 0)
                .min()
                .orElse(-1);
    }

    /** The first index at which a number is not above 0, or −1. */
    static int firstNotPositive(Values values) {
        return first(values.size(), (from, to) -> {
            for (int n = from; n < to; n++) {
                if (!(values.at(n) > 0)) {
                    return n;
                }
            }
            return -1;
        });
    }

    private RefusedInput notFinite(int index, double stored) {
        return source.refuse(
                at(index) + " is " + stored,
                "a finite " + quantity.words(),
                "find out why the solver gave no number there, and write the value");
    }

    /** The place of a number, as in {@code /grid/rotor_z[3, 0]}. */
    String at(int index) {
        int[] indices = new int[shape.length];
        int rest = index;
        for (int d = shape.length - 1; d >= 0; d--) {
            indices[d] = rest % shape[d];
            rest /= shape[d];
        }
        return path + Arrays.toString(indices);
    }

    /** A refusal of one number, told with its place, value and SI unit. */
    RefusedInput refuse(int index, double value, String expected, String mend) {
        String unit = quantity == Quantity.NUMBER ? "" : " " + quantity.siSpelling();
        return source.refuse(at(index) + " is " + value + unit, expected, mend);
    }

    private static DataType storedType(DataType type) {
        return type instanceof EnumDataType names ? names.getBaseType() : type;
    }

    private void checkType() {
        int bits = 8 * type.getSize();
        if (type instanceof FloatingPoint floating) {
            int exponent = bits == 64 ? 11 : bits == 32 ? 8 : 5;
            if ((bits == 64 || bits == 32 || bits == 16)
                    && floating.getBitPrecision() == bits
                    && floating.getExponentSize() == exponent
                    && floating.getMantissaSize() == bits - exponent - 1) {
                return;
            }
        } else if (type instanceof FixedPoint whole) {
            if ((bits == 64 || bits == 32 || bits == 16 || bits == 8)
                    && whole.getBitPrecision() == bits
                    && whole.getBitOffset() == 0) {
                return;
            }
        }
        throw source.refuse(
                "dataset " + path + " holds " + bits + "-bit data of the kind "
                        + type.getClass().getSimpleName(),
                "IEEE 754 floating numbers of 16, 32 or 64 bits or integers of 8 to 64 bits",
                "write it as 64-bit floating numbers");
    }

    /** Refuses a dataset that was made but never filled, whole or in part: HDF5 would read the rest as zeros. */
    private void checkWritten() {
        if (dataset instanceof ContiguousDataset && source.guarded("dataset " + path, dataset::isEmpty)) {
            throw unwritten("");
        }
        if (dataset instanceof ChunkedDataset chunked) {
            source.guarded("dataset " + path, () -> {
                checkChunks(chunked);
                return null;
            });
        }
    }

    private void checkChunks(ChunkedDataset chunked) {
        int[] chunk = chunked.getChunkDimensions();
        if (chunk.length != shape.length) {
            throw new HdfException("chunks of " + chunk.length + " dimensions");
        }
        int[] offset = new int[shape.length];
        do {
            try {
                chunked.getRawChunkBuffer(offset);
            } catch (HdfException e) {
                if (String.valueOf(e.getMessage()).startsWith("No chunk with offset")) {
                    throw unwritten(" from index " + Arrays.toString(offset) + " on");
                }
                throw e;
            }
        } while (next(offset, chunk));
    }

    /** Moves on to the next chunk, the last index first; false after the last chunk. */
    private boolean next(int[] offset, int[] chunk) {
        for (int d = shape.length - 1; d >= 0; d--) {
            if (chunk[d] > 0 && offset[d] < shape[d] - chunk[d]) {
                offset[d] += chunk[d];
                return true;
            }
            offset[d] = 0;
        }
        return false;
    }

    private RefusedInput unwritten(String where) {
        return source.refuse(
                "dataset " + path + " was made but never filled" + where,
                "numbers in all of its " + shapeText(),
                "write them all, zeros too, and let the solver close the file");
    }

    /** The stored bytes of a dataset in one piece, from position 0, in their byte order. */
    private ByteBuffer contiguous() {
        ByteBuffer stored = ((DatasetBase) dataset).getDataBuffer();
        long bytes = count() * type.getSize();
        if (stored.remaining() < bytes) {
            throw source.refuse(
                    "dataset " + path + " has " + stored.remaining() + " bytes",
                    bytes + " bytes for " + shapeText(),
                    "copy the file again, or write it again");
        }
        return stored.slice(stored.position(), (int) bytes).order(order());
    }

    private ByteOrder order() {
        return type instanceof FloatingPoint floating ? floating.getByteOrder() : ((FixedPoint) type).getByteOrder();
    }

    /** Reads all numbers as they are stored, on several threads, into a double[] or a float[]. */
    private void read(Object into) {
        if (dataset instanceof ChunkedDataset chunked) {
            List<int[]> offsets = new ArrayList<>();
            int[] offset = new int[shape.length];
            int[] chunk = chunked.getChunkDimensions();
            do {
                offsets.add(offset.clone());
            } while (next(offset, chunk));
            offsets.parallelStream().forEach(at -> readChunk(chunked, at, chunk, into));
        } else {
            ByteBuffer stored = contiguous();
            first((int) count(), (from, to) -> {
                decode(stored, from, into, from, to - from);
                return -1;
            });
        }
    }

    /** Puts the part of a chunk that lies within the dataset into its place, row by row. */
    private void readChunk(ChunkedDataset chunked, int[] offset, int[] chunk, Object into) {
        byte[] bytes = chunked.getDecompressedChunk(offset);
        long wanted = type.getSize();
        for (int length : chunk) {
            wanted *= length;
        }
        if (bytes.length < wanted) {
            throw new HdfException("a chunk of " + bytes.length + " bytes instead of " + wanted);
        }
        ByteBuffer stored = ByteBuffer.wrap(bytes).order(order());
        int last = shape.length - 1;
        int length = Math.min(chunk[last], shape[last] - offset[last]);
        int[] row = new int[shape.length];
        int[] inside = new int[shape.length];
        for (int d = 0; d <= last; d++) {
            inside[d] = Math.min(chunk[d], shape[d] - offset[d]);
        }
        int d;
        do {
            int from = 0;
            int to = 0;
            for (int n = 0; n <= last; n++) {
                from = from * chunk[n] + row[n];
                to = to * shape[n] + offset[n] + row[n];
            }
            decode(stored, from, into, to, length);
            for (d = last - 1; d >= 0 && ++row[d] == inside[d]; d--) {
                row[d] = 0;
            }
        } while (d >= 0);
    }

    /** Turns stored numbers, from one index of a buffer on, into numbers from another index of an array on. */
    private void decode(ByteBuffer stored, int from, Object into, int to, int count) {
        if (into instanceof float[] singles) {
            decodeSingles(stored, from, singles, to, count);
        } else if (type instanceof FloatingPoint) {
            decodeFloating(stored, from, (double[]) into, to, count);
        } else {
            decodeWhole(stored, from, (double[]) into, to, count, ((FixedPoint) type).isSigned());
        }
    }

    private void decodeSingles(ByteBuffer stored, int from, float[] values, int to, int count) {
        if (type.getSize() == Float.BYTES) {
            part(stored, from, count).asFloatBuffer().get(values, to, count);
            return;
        }
        for (int n = 0; n < count; n++) {
            values[to + n] = FloatingPoint.toFloat(stored.getShort((from + n) * Short.BYTES));
        }
    }

    private void decodeFloating(ByteBuffer stored, int from, double[] values, int to, int count) {
        switch (type.getSize()) {
            case Double.BYTES -> part(stored, from, count).asDoubleBuffer().get(values, to, count);
            case Float.BYTES -> {
                for (int n = 0; n < count; n++) {
                    values[to + n] = stored.getFloat((from + n) * Float.BYTES);
                }
            }
            default -> {
                for (int n = 0; n < count; n++) {
                    values[to + n] = FloatingPoint.toFloat(stored.getShort((from + n) * Short.BYTES));
                }
            }
        }
    }

    private ByteBuffer part(ByteBuffer stored, int from, int count) {
        return stored.slice(from * type.getSize(), count * type.getSize()).order(stored.order());
    }

    private void decodeWhole(ByteBuffer stored, int from, double[] values, int to, int count, boolean signed) {
        for (int n = 0; n < count; n++) {
            switch (type.getSize()) {
                case Byte.BYTES -> {
                    byte b = stored.get(from + n);
                    values[to + n] = signed ? b : Byte.toUnsignedInt(b);
                }
                case Short.BYTES -> {
                    short s = stored.getShort((from + n) * Short.BYTES);
                    values[to + n] = signed ? s : Short.toUnsignedInt(s);
                }
                case Integer.BYTES -> {
                    int i = stored.getInt((from + n) * Integer.BYTES);
                    values[to + n] = signed ? i : Integer.toUnsignedLong(i);
                }
                default -> {
                    long l = stored.getLong((from + n) * Long.BYTES);
                    values[to + n] = signed || l >= 0 ? l : l + 0x1p64;
                }
            }
        }
    }
}
