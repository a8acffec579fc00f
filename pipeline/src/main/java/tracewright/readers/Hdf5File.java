package tracewright.readers;

import io.jhdf.HdfFile;
import io.jhdf.api.Dataset;
import io.jhdf.api.Group;
import io.jhdf.api.Link;
import io.jhdf.api.Node;
import io.jhdf.api.dataset.ChunkedDataset;
import io.jhdf.api.dataset.ContiguousDataset;
import io.jhdf.dataset.CompactDataset;
import io.jhdf.exceptions.HdfFilterException;
import io.jhdf.exceptions.HdfTypeException;
import io.jhdf.exceptions.UnsupportedHdfException;
import io.jhdf.links.ExternalLink;
import io.jhdf.object.datatype.CompoundDataType;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.BitSet;
import java.util.HashSet;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.Set;
import java.util.function.Supplier;
import tracewright.study.Layout.ComplexForm;
import tracewright.study.Nearest;
import tracewright.study.Problem;

/**
 * An HDF5 file opened for reading. What the library would pass over in silence (a file cut short, one still open for writing,
 * links out of the file) is refused here, and whatever it throws becomes an {@link Unreadable} that says apart a broken file and
 * an unsupported one.
 */
final class Hdf5File implements AutoCloseable {

    /** Longest file that one buffer can hold. */
    static final long ONE_MAPPING = Integer.MAX_VALUE;

    /** Files up to this length are read at once: cheaper than a mapping. */
    private static final long READ_AT_ONCE = 1 << 22;
    private static final long SIGNATURE = 0x894844460d0a1a0aL;
    private static final int LINKS = 32;
    private static final int LISTED = 2000;
    /** Largest chunk that is decoded. */
    private static final long CHUNK_LIMIT = 1L << 28;

    private final String where;
    private final HdfFile file;
    private final Hdf5Bytes bytes;
    private final boolean mapped;

    private Hdf5File(String where, HdfFile file, Hdf5Bytes bytes, boolean mapped) {
        this.where = where;
        this.file = file;
        this.bytes = bytes;
        this.mapped = mapped;
    }

    static Hdf5File open(Path path, String ensemble) {
        return open(path, ensemble, ONE_MAPPING);
    }

    /** @param oneMapping longest file that is mapped as a whole; longer ones are read window by window */
    static Hdf5File open(Path path, String ensemble, long oneMapping) {
        String where = Where.file(ensemble, path);
        try {
            long length = Files.size(path);
            checkHeader(path, where, length);
            if (length > oneMapping) {
                HdfFile file = guard(where, () -> new HdfFile(path.toAbsolutePath()));
                return checked(new Hdf5File(where, file, new Hdf5Bytes.Windowed(path), false), length);
            }
            ByteBuffer whole = whole(path, length);
            HdfFile file = guard(where, () -> HdfFile.fromByteBuffer(whole.duplicate()));
            Hdf5Bytes bytes = length <= READ_AT_ONCE ? new Hdf5Bytes.Whole(whole) : new Hdf5Bytes.Windowed(path);
            return checked(new Hdf5File(where, file, bytes, true), length);
        } catch (NoSuchFileException e) {
            throw new Unreadable("missing file", where, "put the file there, or correct the path in the layout or the data folder in the study");
        } catch (IOException e) {
            throw new Unreadable("file cannot be read: " + e.getMessage(), where, "check the permissions and the disk");
        }
    }

    private static ByteBuffer whole(Path path, long length) throws IOException {
        if (length <= READ_AT_ONCE) {
            return ByteBuffer.wrap(Files.readAllBytes(path));
        }
        try (FileChannel channel = FileChannel.open(path, StandardOpenOption.READ)) {
            return channel.map(FileChannel.MapMode.READ_ONLY, 0, length);
        }
    }

    /** Signature at 0, 512, 1024, 2048, ...; from version 2 on the twelfth byte of the superblock says who has the file open. */
    private static void checkHeader(Path path, String where, long length) throws IOException {
        if (length == 0) {
            throw new Unreadable("broken file: it is empty", where, "write it again, or take the file away so that its configurations count as missing");
        }
        try (FileChannel channel = FileChannel.open(path, StandardOpenOption.READ)) {
            ByteBuffer head = ByteBuffer.allocate(12);
            for (long at = 0; at + 12 <= length; at = at == 0 ? 512 : at * 2) {
                head.clear();
                channel.read(head, at);
                if (head.position() == 12 && head.getLong(0) == SIGNATURE) {
                    checkClosed(head, where);
                    return;
                }
            }
        }
        throw new Unreadable("broken file: it has no HDF5 signature", where,
            "check that it is an HDF5 file and was copied whole, or declare the family's format as csv");
    }

    private static void checkClosed(ByteBuffer head, String where) {
        if (head.get(8) >= 2 && head.get(11) != 0) {
            throw new Unreadable("file was left open by its writer: its content may be stale", where,
                "wait until the program that writes it has closed it; after a crash clear the flag with the HDF5 tools and check the content");
        }
    }

    private static Hdf5File checked(Hdf5File opened, long length) {
        long end = guard(opened.where, () -> opened.file.getHdfBackingStorage().getSuperblock().getEndOfFileAddress());
        if (end > length) {
            opened.close();
            throw new Unreadable("broken file: it is truncated, " + length + " bytes of " + end, opened.where, "copy it again or write it again");
        }
        return opened;
    }

    /** Runs library code; its exceptions, and its stack overflows on corrupt bytes, become reasons. */
    private static <T> T guard(String where, Supplier<T> step) {
        try {
            return step.get();
        } catch (Unreadable e) {
            throw e;
        } catch (RuntimeException | StackOverflowError | InternalError e) {
            throw isUnsupported(e) ? unsupported(e, where)
                : new Unreadable(new Problem("broken file: " + reason(e), where, "copy it again or write it again"), e);
        }
    }

    private static Unreadable unsupported(Throwable e, String where) {
        return new Unreadable(new Problem("unsupported file: " + reason(e), where,
            "write the datasets again in one plain file: floating-point numbers, contiguous or in chunks, no filter but shuffle and deflate or lzf"), e);
    }

    /** The library wraps what it cannot do into general failures: the whole chain counts. */
    private static boolean isUnsupported(Throwable e) {
        for (Throwable t = e; t != null; t = t.getCause()) {
            if (t instanceof UnsupportedHdfException || t instanceof HdfFilterException || t instanceof HdfTypeException) {
                return true;
            }
        }
        return false;
    }

    private static String reason(Throwable e) {
        if (e instanceof StackOverflowError) {
            return "its structure never ends";
        }
        Throwable root = e;
        while (root.getCause() != null) {
            root = root.getCause();
        }
        return root == e || root.getMessage() == null ? String.valueOf(e.getMessage()) : e.getMessage() + " (" + root.getMessage() + ")";
    }

    /** Numbers of a dataset, or {@link Unreadable} if there are none of that complex form. */
    StoredArray array(String dataset, ComplexForm complex) {
        String at = Where.dataset(where, dataset);
        return guard(at, () -> array(find(dataset), complex, at));
    }

    /** Reads a slab; see {@link StoredArray#read}. */
    BitSet read(StoredArray array, String dataset, int axis, int first, int count, double[] out) {
        return guard(Where.dataset(where, dataset), () -> array.read(axis, first, count, out));
    }

    private StoredArray array(Dataset d, ComplexForm complex, String at) {
        if (d.isEmpty()) {
            throw new Unreadable("dataset was never written or has no elements", at, "write it, or take it out of the layout");
        }
        NumberForm form = NumberForm.of(d.getDataType(), complex).orElseThrow(() -> noNumbers(d, complex, at));
        long[] dims = d.getDimensionsAsLong();
        if (complex == ComplexForm.TRAILING) {
            if (dims.length == 0 || dims[dims.length - 1] != 2) {
                throw new Unreadable("dataset does not match its description: shape " + Shapes.text(dims)
                    + " has no last axis of length 2, layout says complex = trailing", at, "correct complex or axes of this dataset in the layout");
            }
            dims = Arrays.copyOf(dims, dims.length - 1);
        }
        return stored(d, dims, form, at);
    }

    private StoredArray stored(Dataset d, long[] dims, NumberForm form, String at) {
        if (d instanceof ChunkedDataset chunked) {
            long size = d.getDataType().getSize();
            for (int n : chunked.getChunkDimensions()) {
                size *= n;
            }
            if (size > CHUNK_LIMIT) {
                throw new Unreadable("unsupported file: one chunk holds " + size + " bytes, more than " + CHUNK_LIMIT, at, "write the dataset with smaller chunks");
            }
            return new ChunkedArray(chunked, dims, form, !mapped);
        }
        if (d instanceof ContiguousDataset contiguous) {
            long start = contiguous.getDataAddress() + file.getUserBlockSize();
            return new FlatArray(dims, form, bytes, start);
        }
        if (d instanceof CompactDataset compact) {
            return new FlatArray(dims, form, new Hdf5Bytes.Whole(compact.getDataBuffer()), 0);
        }
        throw new Unreadable("unsupported file: dataset is stored as " + d.getDataLayout(), at, "write it contiguous or in chunks");
    }

    private static Unreadable noNumbers(Dataset d, ComplexForm declared, String at) {
        String found;
        String remedy;
        if (d.getDataType() instanceof CompoundDataType c) {
            found = "a compound of " + c.getMembers().stream().map(m -> m.getName()).toList();
            remedy = NumberForm.of(c, ComplexForm.COMPOUND).isPresent() ? "set complex = compound for this dataset"
                : "write complex numbers as a compound of re and im (or r and i)";
        } else {
            found = d.getDataType().getClass().getSimpleName() + " of " + d.getDataType().getSize() + " bytes";
            remedy = NumberForm.of(d.getDataType(), ComplexForm.NONE).isPresent() ? "set complex = none, or trailing if the last axis holds the pair"
                : "write the dataset as float64 or float32";
        }
        return new Unreadable("dataset does not match its description: elements are " + found + ", layout says complex = "
            + declared.name().toLowerCase(Locale.ROOT), at, remedy);
    }

    /** Texts of a dataset of strings; empty if it holds no strings. */
    Optional<List<String>> strings(String dataset) {
        String at = Where.dataset(where, dataset);
        return guard(at, () -> {
            Dataset d = find(dataset);
            if (d.isEmpty() || d.getJavaType() != String.class || d.getSize() > Labels.LIMIT) {
                return Optional.<List<String>>empty();
            }
            Object flat = d.getDataFlat();
            return Optional.of(flat instanceof String[] s ? List.of(s) : List.of(String.valueOf(flat)));
        });
    }

    private Dataset find(String name) {
        Node node = walk(file, name, name, 0);
        if (node instanceof Dataset d) {
            return d;
        }
        throw new Unreadable("dataset expected, but " + name + " is a group", Where.dataset(where, name),
            "name a dataset inside it; " + Nearest.hint(name, below(name)));
    }

    /** Follows a path by hand, because the library would follow links anywhere, also out of the file and round in circles. */
    private Node walk(Group from, String path, String asked, int links) {
        Node node = path.startsWith("/") ? file : from;
        for (String part : path.split("/")) {
            if (part.isEmpty() || part.equals(".")) {
                continue;
            }
            if (!(node instanceof Group group)) {
                throw missing(asked);
            }
            node = step(group, part, asked, links);
        }
        return node;
    }

    private Node step(Group group, String part, String asked, int links) {
        Node child = group.getChildren().get(part);
        if (child == null) {
            throw missing(asked);
        }
        if (!child.isLink()) {
            return child;
        }
        if (child instanceof ExternalLink) {
            throw new Unreadable("unsupported file: " + part + " is a link into another file", Where.dataset(where, asked),
                "name the other file in the layout, or copy the dataset into this one");
        }
        if (links >= LINKS) {
            throw new Unreadable("broken file: links lead in a circle", Where.dataset(where, asked), "name the dataset itself in the layout");
        }
        return walk(group, ((Link) child).getTargetPath(), asked, links + 1);
    }

    private Unreadable missing(String dataset) {
        return new Unreadable("missing dataset " + dataset, Where.dataset(where, dataset),
            "correct the dataset's name in the layout; " + Nearest.hint(dataset, below("/")));
    }

    /** Paths of the datasets below a group, at most a few thousand. */
    private List<String> below(String prefix) {
        List<String> found = new ArrayList<>();
        list(file, "", found, new HashSet<>());
        List<String> inside = found.stream().filter(p -> p.startsWith(prefix)).toList();
        return inside.isEmpty() ? found : inside;
    }

    private static void list(Group group, String at, List<String> found, Set<Long> seen) {
        if (!seen.add(group.getAddress())) {
            return;
        }
        for (Node child : group.getChildren().values()) {
            if (found.size() >= LISTED) {
                return;
            }
            if (child.isLink()) {
                continue;
            }
            String name = at + "/" + child.getName();
            if (child instanceof Group g) {
                list(g, name, found, seen);
            } else {
                found.add(name);
            }
        }
    }

    /** The line of a problem about a dataset of this file. */
    String where(String dataset) {
        return Where.dataset(where, dataset);
    }

    @Override
    public void close() {
        file.close();
        if (bytes instanceof Hdf5Bytes.Windowed w) {
            try {
                w.close();
            } catch (IOException e) {
                throw new UncheckedIOException(e);
            }
        }
    }
}
