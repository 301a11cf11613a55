package org.whither.io.hdf5;

import io.jhdf.api.WritableAttributeImpl;
import io.jhdf.api.WritableNode;
import io.jhdf.object.datatype.DataType;
import io.jhdf.storage.HdfBackingStorage;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;

/**
 * The texts of a file that is being written. The library writes texts of fixed length only, which h5py hands to its user
 * as bytes rather than as text; texts of variable length, which it hands over as they are, lie in a global heap (HDF5
 * file format specification 3.0, sections III.E "Global Heap" and IV.A.2.d "Datatype Message", class 9).
 */
final class TextHeap {
    /** The HDF5 library makes no smaller heap, and expects none (bytes). */
    private static final int LEAST_BYTES = 4096;

    private static final int HEADER_BYTES = 16;
    private static final int MOST_OBJECTS = 0xffff;

    private final long address;
    private final List<byte[]> texts = new ArrayList<>();

    /**
     * An empty heap.
     *
     * @param address where in the file it will be written; a multiple of 8
     */
    TextHeap(long address) {
        this.address = address;
    }

    /** Gives a group or dataset a text attribute. */
    void put(WritableNode node, String name, String text) {
        if (texts.size() == MOST_OBJECTS) {
            throw new IllegalStateException("more than " + MOST_OBJECTS + " texts in one file");
        }
        texts.add(text.getBytes(StandardCharsets.UTF_8));
        node.getAttributes().put(name, new TextAttribute(name, node, text, new TextType(address, texts.size())));
    }

    /** Number of bytes of the heap; a multiple of 8. */
    int size() {
        int used = HEADER_BYTES;
        for (byte[] text : texts) {
            used += HEADER_BYTES + padded(text.length);
        }
        return Math.max(LEAST_BYTES, used + HEADER_BYTES); // there is always room for the object that is free space
    }

    /** The heap as it stands in the file. */
    ByteBuffer toBuffer() {
        int size = size();
        ByteBuffer buffer = ByteBuffer.allocate(size).order(ByteOrder.LITTLE_ENDIAN);
        buffer.put("GCOL".getBytes(StandardCharsets.US_ASCII)).put((byte) 1).put(new byte[3]);
        buffer.putLong(size);
        int index = 1;
        for (byte[] text : texts) {
            object(buffer, index, text.length);
            buffer.put(text).put(new byte[padded(text.length) - text.length]);
            index++;
        }
        object(buffer, 0, buffer.remaining()); // the free space, its own header counted
        return buffer.rewind();
    }

    private static void object(ByteBuffer buffer, int index, long length) {
        buffer.putShort((short) index).putShort((short) 0).putInt(0).putLong(length);
    }

    private static int padded(int length) {
        return (length + 7) / 8 * 8;
    }

    /** A text attribute whose data is a place in the heap. */
    private static final class TextAttribute extends WritableAttributeImpl {
        private final DataType type;

        TextAttribute(String name, WritableNode node, String text, DataType type) {
            super(name, node, text);
            this.type = type;
        }

        @Override
        public DataType getDataType() {
            return type;
        }
    }

    /** The type of one UTF-8 text of variable length, which knows where that text lies. */
    private static final class TextType extends DataType {
        private static final int VARIABLE_LENGTH = 9;
        private static final int REFERENCE_BYTES = 16;
        /** An unsigned 8-bit integer: class 0 in version 1, no flags, 1 byte, from bit 0, 8 bits. */
        private static final byte[] CHARACTER = {0x10, 0, 0, 0, 1, 0, 0, 0, 0, 0, 8, 0};

        private final long heap;
        private final int index;

        TextType(long heap, int index) {
            super(VARIABLE_LENGTH, REFERENCE_BYTES);
            this.heap = heap;
            this.index = index;
            classBits.set(0); // a text rather than a sequence
            classBits.set(8); // in UTF-8
        }

        @Override
        public Class<?> getJavaType() {
            return String.class;
        }

        @Override
        public Object fillData(ByteBuffer buffer, int[] dimensions, HdfBackingStorage storage) {
            throw new UnsupportedOperationException("only written");
        }

        @Override
        public ByteBuffer encodeData(Object text) {
            int length = ((String) text).getBytes(StandardCharsets.UTF_8).length;
            return ByteBuffer.allocate(REFERENCE_BYTES)
                    .order(ByteOrder.LITTLE_ENDIAN)
                    .putInt(length)
                    .putLong(heap)
                    .putInt(index)
                    .rewind();
        }

        @Override
        public ByteBuffer toBuffer() {
            return toBufferBuilder().writeBytes(CHARACTER).build();
        }
    }
}
