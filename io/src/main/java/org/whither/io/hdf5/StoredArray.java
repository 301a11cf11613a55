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
import java.util.Arrays;
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

    /** Memory that its numbers take when read (bytes). */
    long heap() {
        return count() * Double.BYTES;
    }

    /** Memory that is needed besides while they are read (bytes). */
    long heapWhileRead() {
        return dataset instanceof ChunkedDataset ? count() * type.getSize() : 0;
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
        ByteBuffer stored = source.guarded("dataset " + path, () -> ((DatasetBase) dataset).getDataBuffer());
        if (stored.remaining() < bytes) {
            throw source.refuse(
                    "dataset " + path + " has " + stored.remaining() + " bytes",
                    bytes + " bytes for " + shapeText(),
                    "copy the file again, or write it again");
        }
        double[] values = source.guarded("dataset " + path, () -> decoded(stored, (int) count));
        for (int n = 0; n < values.length; n++) {
            double value = toSi.convert(values[n]);
            if (!Double.isFinite(value)) {
                throw source.refuse(
                        at(n) + " is " + values[n],
                        "a finite " + quantity.words(),
                        "find out why the solver gave no number there, and write the value");
            }
            values[n] = value;
        }
        return values;
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

    private double[] decoded(ByteBuffer stored, int count) {
        double[] values = new double[count];
        if (type instanceof FloatingPoint floating) {
            stored.order(floating.getByteOrder());
            decodeFloating(stored, values);
        } else {
            FixedPoint whole = (FixedPoint) type;
            stored.order(whole.getByteOrder());
            decodeWhole(stored, values, whole.isSigned());
        }
        return values;
    }

    private void decodeFloating(ByteBuffer stored, double[] values) {
        int start = stored.position();
        switch (type.getSize()) {
            case Double.BYTES -> stored.asDoubleBuffer().get(values);
            case Float.BYTES -> {
                for (int n = 0; n < values.length; n++) {
                    values[n] = stored.getFloat(start + n * Float.BYTES);
                }
            }
            default -> {
                for (int n = 0; n < values.length; n++) {
                    values[n] = FloatingPoint.toFloat(stored.getShort(start + n * Short.BYTES));
                }
            }
        }
    }

    private void decodeWhole(ByteBuffer stored, double[] values, boolean signed) {
        int start = stored.position();
        for (int n = 0; n < values.length; n++) {
            switch (type.getSize()) {
                case Byte.BYTES -> {
                    byte b = stored.get(start + n);
                    values[n] = signed ? b : Byte.toUnsignedInt(b);
                }
                case Short.BYTES -> {
                    short s = stored.getShort(start + n * Short.BYTES);
                    values[n] = signed ? s : Short.toUnsignedInt(s);
                }
                case Integer.BYTES -> {
                    int i = stored.getInt(start + n * Integer.BYTES);
                    values[n] = signed ? i : Integer.toUnsignedLong(i);
                }
                default -> {
                    long l = stored.getLong(start + n * Long.BYTES);
                    values[n] = signed || l >= 0 ? l : l + 0x1p64;
                }
            }
        }
    }
}
