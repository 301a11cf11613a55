package org.whither.io.hdf5;

import java.nio.ByteBuffer;
import org.whither.film.Values;
import org.whither.io.units.ToSi;

/** Numbers as they are stored, turned into SI where they are asked for. */
final class StoredNumbers {
    private StoredNumbers() {}

    /** Numbers of 32 bits in an array. */
    static Values of(float[] stored, ToSi toSi) {
        return isSi(toSi) ? Values.of(stored) : new Converted(Values.of(stored), toSi);
    }

    /**
     * Floating numbers of 32 or 64 bits in a part of the file that is mapped into memory.
     *
     * @param stored the bytes, in their byte order, from position 0
     * @param singles whether they are of 32 bits
     */
    static Values of(ByteBuffer stored, boolean singles, ToSi toSi) {
        Values raw = singles ? new MappedSingles(stored) : new MappedDoubles(stored);
        return isSi(toSi) ? raw : new Converted(raw, toSi);
    }

    /** Whether numbers of the unit are in SI as they are; conversions are linear. */
    private static boolean isSi(ToSi toSi) {
        return toSi.convert(0) == 0 && toSi.convert(1) == 1 && toSi.convert(-12345.678) == -12345.678;
    }

    private record Converted(Values raw, ToSi toSi) implements Values {
        @Override
        public int size() {
            return raw.size();
        }

        @Override
        public double at(int index) {
            return toSi.convert(raw.at(index));
        }
    }

    private record MappedSingles(ByteBuffer stored) implements Values {
        @Override
        public int size() {
            return stored.limit() / Float.BYTES;
        }

        @Override
        public double at(int index) {
            return stored.getFloat(index * Float.BYTES);
        }
    }

    private record MappedDoubles(ByteBuffer stored) implements Values {
        @Override
        public int size() {
            return stored.limit() / Double.BYTES;
        }

        @Override
        public double at(int index) {
            return stored.getDouble(index * Double.BYTES);
        }
    }
}
