package org.whither.io.hdf5;

import io.jhdf.GroupSymbolTableNode;
import io.jhdf.HdfFile;
import io.jhdf.LocalHeap;
import io.jhdf.ObjectHeader;
import io.jhdf.SymbolTableEntry;
import io.jhdf.api.Dataset;
import io.jhdf.api.Group;
import io.jhdf.api.Node;
import io.jhdf.api.dataset.ChunkedDataset;
import io.jhdf.btree.BTreeV1;
import io.jhdf.exceptions.HdfException;
import io.jhdf.links.ExternalLink;
import io.jhdf.links.SoftLink;
import io.jhdf.object.message.LinkMessage;
import io.jhdf.object.message.SymbolTableMessage;
import io.jhdf.storage.HdfBackingStorage;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.charset.StandardCharsets;
import java.nio.file.AccessDeniedException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.function.LongSupplier;
import java.util.function.Supplier;
import org.whither.io.file.RefusedInput;

/**
 * An HDF5 file that is being read. What the library makes of a damaged file, whatever it throws, leaves this class as
 * {@link RefusedInput}. Links are followed within the file only.
 */
final class HdfSource implements AutoCloseable {
    private static final byte[] SIGNATURE = {(byte) 0x89, 'H', 'D', 'F', '\r', '\n', 0x1a, '\n'};
    /** Files up to this size are read into memory whole; larger ones are mapped (bytes). */
    private static final long READ_WHOLE = 16L << 20;

    private static final int LINK_DEPTH = 32;
    /** Deflate makes data at most 1032 times smaller (zlib's technical notes, "Maximum Compression Factor"). */
    private static final long MOST_COMPRESSED = 1100;

    private final Path file;
    private final long size;
    private final LongSupplier freeHeap;
    private final long mappedFrom;
    private final HdfFile hdf;

    private HdfSource(Path file, long size, LongSupplier freeHeap, long mappedFrom, HdfFile hdf) {
        this.file = file;
        this.size = size;
        this.freeHeap = freeHeap;
        this.mappedFrom = mappedFrom;
        this.hdf = hdf;
    }

    /**
     * Opens a file.
     *
     * @param file the file
     * @param freeHeap memory that arrays may take at the time (bytes)
     * @param mappedFrom size from which numbers of a dataset in one piece are left where they lie (bytes)
     * @throws RefusedInput where it is no HDF5 file that can be read
     */
    static HdfSource open(Path file, LongSupplier freeHeap, long mappedFrom) {
        if (!Files.exists(file)) {
            throw RefusedInput.of(file, "there is no such file", "an HDF5 file", "check the name");
        }
        if (Files.isDirectory(file)) {
            throw RefusedInput.of(file, "this is a folder", "an HDF5 file", "name a file in it");
        }
        try (FileChannel channel = FileChannel.open(file, StandardOpenOption.READ)) {
            long size = channel.size();
            if (!signed(channel, size)) {
                throw RefusedInput.of(
                        file,
                        "this is not an HDF5 file, or its beginning is lost (" + size + " bytes, no HDF5 signature)",
                        "an HDF5 file in the layout film-field",
                        "name another file, or bring the data into that layout first");
            }
            HdfFile hdf = guarded(file, "", () -> open(file, channel, size));
            HdfSource source = new HdfSource(file, size, freeHeap, mappedFrom, hdf);
            try {
                source.checkLength();
            } catch (RefusedInput e) {
                source.close();
                throw e;
            }
            return source;
        } catch (IOException e) {
            throw RefusedInput.of(
                    file,
                    "the file cannot be read (" + reason(e) + ")",
                    "a readable HDF5 file",
                    "check the permission to read it and the disk it is on",
                    e);
        }
    }

    private static HdfFile open(Path file, FileChannel channel, long size) {
        try {
            if (size > Integer.MAX_VALUE) {
                return new HdfFile(file);
            }
            if (size > READ_WHOLE) {
                return HdfFile.fromByteBuffer(channel.map(FileChannel.MapMode.READ_ONLY, 0, size));
            }
            ByteBuffer bytes = ByteBuffer.allocate((int) size);
            int read = 0;
            while (read >= 0 && bytes.hasRemaining()) {
                read = channel.read(bytes, bytes.position());
            }
            bytes.flip();
            return HdfFile.fromByteBuffer(bytes);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Whether the signature stands where the HDF5 format specification (section II.A) lets it: 0, 512, 1024, 2048 … */
    private static boolean signed(FileChannel channel, long size) throws IOException {
        ByteBuffer bytes = ByteBuffer.allocate(SIGNATURE.length);
        for (long at = 0; at + SIGNATURE.length <= size; at = at == 0 ? 512 : 2 * at) {
            bytes.clear();
            channel.read(bytes, at);
            if (Arrays.equals(bytes.array(), SIGNATURE)) {
                return true;
            }
        }
        return false;
    }

    private void checkLength() {
        long end = guarded("", () -> hdf.getHdfBackingStorage().getSuperblock().getEndOfFileAddress());
        if (size < end) {
            throw refuse(
                    "the file is cut short: it has " + size + " bytes",
                    end + " bytes, as its own header says",
                    "copy it again from where it was computed, or compute it again");
        }
    }

    @Override
    public void close() {
        hdf.close();
    }

    /** The root of the file. */
    Section root() {
        return new Section(this, hdf, "/");
    }

    /** Memory that arrays may take now (bytes); where that is less than wanted, garbage is cleared first. */
    long freeHeap(long wanted) {
        if (freeHeap.getAsLong() < wanted) {
            System.gc();
        }
        return freeHeap.getAsLong();
    }

    /** Size from which numbers of a dataset in one piece are left where they lie (bytes). */
    long mappedFrom() {
        return mappedFrom;
    }

    /** A refusal of this file. */
    RefusedInput refuse(String found, String expected, String mend) {
        return RefusedInput.of(file, found, expected, mend);
    }

    /**
     * The object that a name in a group stands for.
     *
     * @param group the group
     * @param path path of the group, ending in a stroke
     * @param name one name or, from a soft link, a path
     * @return the group or dataset, or null where the name is not there
     */
    Node find(Group group, String path, String name) {
        return find(group, path, name, path + name, 0);
    }

    private Node find(Group start, String startPath, String name, String asked, int depth) {
        if (depth > LINK_DEPTH) {
            throw refuse(
                    asked + " is a soft link that leads back to itself",
                    "a link to a dataset or group of this file",
                    "write the data in its place instead of the link");
        }
        Node node = start;
        String path = startPath;
        for (String part : name.split("/")) {
            if (part.isEmpty() || part.equals(".")) {
                continue;
            }
            if (!(node instanceof Group)) {
                return null;
            }
            Group group = (Group) node;
            node = children(group, path).get(part);
            if (node instanceof ExternalLink) {
                throw refuse(
                        path + part + " is an external link that leaves the file, to "
                                + ((ExternalLink) node).getTargetPath(),
                        "all data inside the file",
                        "copy that data into the file in place of the link");
            }
            if (node instanceof SoftLink) {
                String target = ((SoftLink) node).getTargetPath();
                boolean absolute = target.startsWith("/");
                Node found = find(absolute ? hdf : group, absolute ? "/" : path, target, asked, depth + 1);
                if (found == null) {
                    throw refuse(
                            path + part + " is a soft link to " + target + ", which is not in the file",
                            "a link to a dataset or group of this file",
                            "write the data in its place instead of the link");
                }
                node = found;
            }
            path = path + part + "/";
        }
        return node;
    }

    private Map<String, Node> children(Group group, String path) {
        try {
            return group.getChildren();
        } catch (RuntimeException | StackOverflowError e) {
            String storage = outside(e);
            if (storage != null) {
                String name = guarded(path, () -> offender(group));
                throw RefusedInput.of(
                        file,
                        (name == null ? "a dataset of " + path : path + name) + " is kept outside the file (" + storage
                                + ")",
                        "all data inside the file",
                        "write the numbers into the dataset itself",
                        e);
            }
            throw damaged(file, path, e);
        }
    }

    private static String outside(Throwable failure) {
        for (Throwable e = failure; e != null; e = e.getCause()) {
            String message = String.valueOf(e.getMessage());
            if (message.contains("External Data Files")) {
                return "external raw storage";
            }
            if (message.contains("Virtual storage")) {
                return "virtual dataset";
            }
        }
        return null;
    }

    /** Name of the first object in a group that is kept outside the file, or null where the names are not at hand. */
    private String offender(Group group) {
        HdfBackingStorage storage = hdf.getHdfBackingStorage();
        for (Map.Entry<String, Long> link : hardLinks(storage, group).entrySet()) {
            try {
                ObjectHeader.readObjectHeader(storage, link.getValue());
            } catch (RuntimeException e) {
                if (outside(e) != null) {
                    return link.getKey();
                }
            }
        }
        return null;
    }

    private static Map<String, Long> hardLinks(HdfBackingStorage storage, Group group) {
        Map<String, Long> links = new LinkedHashMap<>();
        ObjectHeader header = ObjectHeader.readObjectHeader(storage, group.getAddress());
        for (SymbolTableMessage table : header.getMessagesOfType(SymbolTableMessage.class)) {
            ByteBuffer names = new LocalHeap(storage, table.getLocalHeapAddress()).getDataBuffer();
            for (long address :
                    BTreeV1.createGroupBTree(storage, table.getBTreeAddress()).getChildAddresses()) {
                for (SymbolTableEntry entry : new GroupSymbolTableNode(storage, address).getSymbolTableEntries()) {
                    links.put(name(names, entry.getLinkNameOffset()), entry.getObjectHeaderAddress());
                }
            }
        }
        for (LinkMessage link : header.getMessagesOfType(LinkMessage.class)) {
            if (link.getLinkType() == LinkMessage.LinkType.HARD) {
                links.put(link.getLinkName(), link.getHardLinkAddress());
            }
        }
        return links;
    }

    private static String name(ByteBuffer names, int start) {
        int end = start;
        while (names.get(end) != 0) {
            end++;
        }
        byte[] bytes = new byte[end - start];
        for (int n = 0; n < bytes.length; n++) {
            bytes[n] = names.get(start + n);
        }
        return new String(bytes, StandardCharsets.UTF_8);
    }

    /** Whether so many bytes of a dataset can be in this file, compressed or not. */
    boolean canHold(Dataset dataset, long bytes) {
        long ratio = dataset instanceof ChunkedDataset ? MOST_COMPRESSED : 1;
        return bytes / ratio <= size;
    }

    /** Runs a piece of the library's work on this file; any failure of it is told as damage at a place in the file. */
    <T> T guarded(String where, Supplier<T> work) {
        return guarded(file, where, work);
    }

    private static <T> T guarded(Path file, String where, Supplier<T> work) {
        try {
            return work.get();
        } catch (RefusedInput e) {
            throw e;
        } catch (RuntimeException | StackOverflowError | InternalError e) {
            // A mapped page that cannot be read is an InternalError; links in a ring overflow the stack.
            throw damaged(file, where, e);
        } catch (OutOfMemoryError e) {
            // Sizes of arrays are compared with the heap beforehand, so this is most likely a size that damage made up.
            throw RefusedInput.of(
                    file,
                    (where.isEmpty() ? "the file" : where) + " does not fit the program's heap",
                    "a file that is undamaged and fits",
                    "copy the file again, or set WHITHER_JAVA_OPTS=-Xmx to more than the "
                            + (Runtime.getRuntime().maxMemory() >> 20) + " MiB it has",
                    e);
        }
    }

    private static RefusedInput damaged(Path file, String where, Throwable failure) {
        Throwable cause = failure;
        while (cause.getCause() != null) {
            cause = cause.getCause();
        }
        // Only the library's own words mean anything to a user; others tell of sums and buffers inside it.
        String reason = cause instanceof HdfException ? reason(cause) : "its bytes contradict each other";
        return RefusedInput.of(
                file,
                (where.isEmpty() ? "the file" : where) + " cannot be read (" + reason + ")",
                "an undamaged HDF5 file whose data use no filters but deflate (gzip), shuffle and Fletcher-32",
                "copy the file again, or write it again with those filters only",
                failure);
    }

    private static String reason(Throwable failure) {
        if (failure instanceof AccessDeniedException) {
            return "access denied";
        }
        String message = failure.getMessage();
        String text = message == null || message.isBlank() ? failure.getClass().getSimpleName() : message;
        return text.replaceAll("[\\s;]+", " ").trim();
    }
}
