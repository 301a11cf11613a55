package org.whither.io.hdf5;

import io.jhdf.Constants;
import io.jhdf.ObjectHeader;
import io.jhdf.WritableDatasetImpl;
import io.jhdf.api.Attribute;
import io.jhdf.api.Group;
import io.jhdf.object.message.AttributeInfoMessage;
import io.jhdf.object.message.AttributeMessage;
import io.jhdf.object.message.DataLayoutMessage.ContiguousDataLayoutMessage;
import io.jhdf.object.message.DataSpace;
import io.jhdf.object.message.DataSpaceMessage;
import io.jhdf.object.message.DataTypeMessage;
import io.jhdf.object.message.FillValueMessage;
import io.jhdf.object.message.Message;
import io.jhdf.storage.HdfFileChannel;
import java.lang.reflect.Array;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.function.IntToDoubleFunction;

/**
 * A dataset that is written value by value from wherever the values are kept. The library's own needs nested arrays, a
 * copy of all the data, and writes one row at a time.
 */
final class FlatDataset extends WritableDatasetImpl {
    private static final int BUFFER_BYTES = 1 << 20;

    private final boolean bytes;
    private final int[] shape;
    private final IntToDoubleFunction values;

    /**
     * A dataset.
     *
     * @param parent the group it is in
     * @param name its name
     * @param bytes whether the numbers are written as 8-bit integers rather than 64-bit floating numbers
     * @param values the number at each row-major index
     * @param shape its lengths
     */
    FlatDataset(Group parent, String name, boolean bytes, IntToDoubleFunction values, int... shape) {
        super(bytes ? new byte[1] : new double[1], name, parent); // tells the type only
        this.bytes = bytes;
        this.shape = shape.clone();
        this.values = values;
    }

    @Override
    public int[] getDimensions() {
        return shape.clone();
    }

    @Override
    public long getSize() {
        long count = 1;
        for (int length : shape) {
            count *= length;
        }
        return count;
    }

    @Override
    public long write(HdfFileChannel channel, long position) {
        long dataBytes = getSizeInBytes();
        // The header is as long with any address in it; its length says where the data begin.
        long dataAddress = position
                + header(this, shape, position, Constants.UNDEFINED_ADDRESS, dataBytes)
                        .limit();
        put(channel, header(this, shape, position, dataAddress, dataBytes), position);
        long at = dataAddress;
        long count = getSize();
        ByteBuffer buffer = ByteBuffer.allocate(BUFFER_BYTES).order(ByteOrder.nativeOrder());
        for (int n = 0; n < count; n++) {
            if (bytes) {
                buffer.put((byte) values.applyAsDouble(n));
            } else {
                buffer.putDouble(values.applyAsDouble(n));
            }
            if (!buffer.hasRemaining() || n == count - 1) {
                buffer.flip();
                at += put(channel, buffer, at);
                buffer.clear();
            }
        }
        return dataAddress + dataBytes;
    }

    /** The header of a contiguous dataset: as long whatever the address of the data. */
    static ByteBuffer header(
            WritableDatasetImpl dataset, int[] shape, long position, long dataAddress, long dataBytes) {
        List<Message> messages = new ArrayList<>();
        messages.add(DataTypeMessage.create(dataset.getDataType()));
        messages.add(DataSpaceMessage.create(space(shape)));
        messages.add(FillValueMessage.NO_FILL);
        messages.add(ContiguousDataLayoutMessage.create(dataAddress, dataBytes));
        if (!dataset.getAttributes().isEmpty()) {
            messages.add(AttributeInfoMessage.create());
            for (Map.Entry<String, Attribute> attribute :
                    dataset.getAttributes().entrySet()) {
                messages.add(AttributeMessage.create(attribute.getKey(), attribute.getValue()));
            }
        }
        return new ObjectHeader.ObjectHeaderV2(position, messages).toBuffer();
    }

    private static DataSpace space(int[] shape) {
        int[] ones = new int[shape.length];
        Arrays.fill(ones, 1);
        return DataSpace.modifyDimensions(DataSpace.fromObject(Array.newInstance(double.class, ones)), shape);
    }

    /** Writes all that a buffer holds; returns how many bytes that is. */
    static int put(HdfFileChannel channel, ByteBuffer buffer, long position) {
        int written = 0;
        while (buffer.hasRemaining()) {
            written += channel.write(buffer, position + written);
        }
        return written;
    }
}
