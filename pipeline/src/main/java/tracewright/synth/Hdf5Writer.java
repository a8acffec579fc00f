package tracewright.synth;

import java.io.ByteArrayOutputStream;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.zip.Deflater;

/**
 * Writes an HDF5 file into memory: groups, and datasets of numbers, complex compounds and strings, contiguous or in chunks along
 * the first axis with shuffle and deflate. Same input, same bytes (up to the machine's deflate). It exists because the library
 * that reads HDF5 for us writes no compounds and signs its files with version and machine.
 * <pre>
 *  superblock (version 2) | data and chunk indexes | object headers (version 2), leaves first | root group
 * </pre>
 * HDF5 File Format Specification, version 3.0, sections II.A (superblock), III.A.1 (version 1 B-trees for chunks), IV.A (object headers).
 */
final class Hdf5Writer {

    private static final long UNDEFINED = -1L;
    private static final int SUPERBLOCK = 48;
    /** Half the number of children of a chunk index node that readers assume when a file says nothing else. */
    private static final int HALF_NODE = 32;
    /** Most chunks of one dataset: one leaf of the index. */
    static final int MOST_CHUNKS = 2 * HALF_NODE;
    private static final int DEFLATE_LEVEL = 9;

    private static final int LINK_INFO = 0x02;
    private static final int DATASPACE = 0x01;
    private static final int DATATYPE = 0x03;
    private static final int FILL_VALUE = 0x05;
    private static final int LINK = 0x06;
    private static final int LAYOUT = 0x08;
    private static final int GROUP_INFO = 0x0A;
    private static final int FILTERS = 0x0B;

    /** Machine type of the elements of a dataset; little-endian. */
    enum Type {
        FLOAT32(4), FLOAT64(8), INT32(4), INT64(8), COMPLEX_FLOAT32(8), COMPLEX_FLOAT64(16);

        private final int bytes;

        Type(int bytes) {
            this.bytes = bytes;
        }

        int bytes() {
            return bytes;
        }
    }

    private final ByteArrayOutputStream body = new ByteArrayOutputStream();
    private final Map<String, Long> datasets = new LinkedHashMap<>();     // absolute path without leading slash -> header address

    /** Adds a dataset stored in one piece. */
    void contiguous(String path, Type type, long[] dims, byte[] data) {
        long address = append(data);
        Buffer layout = new Buffer().u1(3).u1(1).u8(address).u8(data.length);
        dataset(path, datatype(type), dims, 0x0a, layout, null);
    }

    /** Adds a dataset in chunks of as many rows of the first axis, shuffled and deflated. */
    void chunked(String path, Type type, long[] dims, int rows, byte[] data) {
        int chunks = (int) ((dims[0] + rows - 1) / rows);
        Checks.that(chunks <= MOST_CHUNKS, path + ": " + chunks + " chunks; one index node holds " + MOST_CHUNKS);
        long tree = chunkIndex(type, dims, rows, data, chunks);
        Buffer layout = new Buffer().u1(3).u1(2).u1(dims.length + 1).u8(tree).u4(rows);
        for (int k = 1; k < dims.length; k++) {
            layout.u4((int) dims[k]);
        }
        layout.u4(type.bytes());
        Buffer filters = new Buffer().u1(2).u1(2).u2(2).u2(0).u2(1).u4(type.bytes()).u2(1).u2(0).u2(1).u4(DEFLATE_LEVEL);
        dataset(path, datatype(type), dims, 0x0b, layout, filters);
    }

    /** Adds a dataset of fixed-length strings, UTF-8, padded with zeros. */
    void strings(String path, List<String> texts) {
        int size = texts.stream().mapToInt(t -> t.getBytes(StandardCharsets.UTF_8).length).max().orElse(0) + 1;
        byte[] data = new byte[size * texts.size()];
        for (int i = 0; i < texts.size(); i++) {
            byte[] text = texts.get(i).getBytes(StandardCharsets.UTF_8);
            System.arraycopy(text, 0, data, i * size, text.length);
        }
        Buffer type = new Buffer().u1(0x13).u1(0x11).u1(0).u1(0).u4(size);
        dataset(path, type, new long[] {texts.size()}, 0x0a, new Buffer().u1(3).u1(1).u8(append(data)).u8(data.length), null);
    }

    private long append(byte[] data) {
        while (body.size() % 8 != 0) {
            body.write(0);
        }
        long address = SUPERBLOCK + (long) body.size();
        body.writeBytes(data);
        return address;
    }

    private long chunkIndex(Type type, long[] dims, int rows, byte[] data, int chunks) {
        int chunkBytes = Math.toIntExact(data.length / dims[0] * rows);
        Buffer node = new Buffer().text("TREE").u1(1).u1(0).u2(chunks).u8(UNDEFINED).u8(UNDEFINED);
        for (int c = 0; c < chunks; c++) {
            byte[] raw = Arrays.copyOfRange(data, c * chunkBytes, (c + 1) * chunkBytes);
            byte[] packed = deflate(shuffle(raw, type.bytes()));
            key(node, packed.length, (long) c * rows, dims.length);
            node.u8(append(packed));
        }
        key(node, 0, (long) chunks * rows, dims.length);
        int keyBytes = 8 + 8 * (dims.length + 1);
        return append(Arrays.copyOf(node.bytes(), 24 + MOST_CHUNKS * 8 + (MOST_CHUNKS + 1) * keyBytes));
    }

    private static void key(Buffer node, int bytes, long row, int rank) {
        node.u4(bytes).u4(0).u8(row);
        for (int k = 0; k < rank; k++) {
            node.u8(0);
        }
    }

    /** Byte k of all elements together, for k = 0, 1, ...: neighbouring numbers share exponents. */
    private static byte[] shuffle(byte[] raw, int size) {
        byte[] out = new byte[raw.length];
        int count = raw.length / size;
        for (int i = 0; i < count; i++) {
            for (int k = 0; k < size; k++) {
                out[k * count + i] = raw[i * size + k];
            }
        }
        return out;
    }

    private static byte[] deflate(byte[] raw) {
        Deflater deflater = new Deflater(DEFLATE_LEVEL);
        try {
            deflater.setInput(raw);
            deflater.finish();
            ByteArrayOutputStream out = new ByteArrayOutputStream(raw.length);
            byte[] buffer = new byte[1 << 16];
            while (!deflater.finished()) {
                out.write(buffer, 0, deflater.deflate(buffer));
            }
            return out.toByteArray();
        } finally {
            deflater.end();
        }
    }

    private void dataset(String path, Buffer type, long[] dims, int fill, Buffer layout, Buffer filters) {
        Buffer space = new Buffer().u1(2).u1(dims.length).u1(0).u1(1);
        for (long n : dims) {
            space.u8(n);
        }
        Buffer messages = new Buffer();
        message(messages, DATASPACE, space);
        message(messages, DATATYPE, type);
        message(messages, FILL_VALUE, new Buffer().u1(3).u1(fill));
        if (filters != null) {
            message(messages, FILTERS, filters);
        }
        message(messages, LAYOUT, layout);
        String name = path.startsWith("/") ? path.substring(1) : path;
        Checks.layout(datasets.put(name, header(messages)) == null, "two datasets are called " + path);
    }

    private static void message(Buffer to, int type, Buffer content) {
        byte[] bytes = content.bytes();
        to.u1(type).u2(bytes.length).u1(0).raw(bytes);
    }

    private long header(Buffer messages) {
        byte[] content = messages.bytes();
        Buffer header = new Buffer().text("OHDR").u1(2).u1(2).u4(content.length).raw(content);
        return append(header.u4(Lookup3.hash(header.bytes())).bytes());
    }

    private static Buffer datatype(Type type) {
        return switch (type) {
            case FLOAT32 -> floating(4);
            case FLOAT64 -> floating(8);
            case INT32 -> whole(4);
            case INT64 -> whole(8);
            case COMPLEX_FLOAT32 -> complex(4);
            case COMPLEX_FLOAT64 -> complex(8);
        };
    }

    private static Buffer floating(int size) {
        boolean wide = size == 8;
        int mantissa = wide ? 52 : 23;
        return new Buffer().u1(0x11).u1(0x20).u1(8 * size - 1).u1(0).u4(size).u2(0).u2(8 * size).u1(mantissa).u1(wide ? 11 : 8).u1(0).u1(mantissa)
            .u4(wide ? 1023 : 127);
    }

    private static Buffer whole(int size) {
        return new Buffer().u1(0x10).u1(0x08).u1(0).u1(0).u4(size).u2(0).u2(8 * size);
    }

    /** Members r and i, in the oldest form of a compound, which every reader knows. */
    private static Buffer complex(int size) {
        Buffer type = new Buffer().u1(0x16).u1(2).u1(0).u1(0).u4(2 * size);
        member(type, "r", 0, size);
        member(type, "i", size, size);
        return type;
    }

    /** Name padded to eight bytes, offset, no array dimensions, type. */
    private static void member(Buffer type, String letter, int offset, int size) {
        type.text(letter).raw(new byte[7]).u4(offset).raw(new byte[28]).raw(floating(size).bytes());
    }

    /** The whole file. */
    byte[] bytes() {
        long root = group("");
        while (body.size() % 8 != 0) {
            body.write(0);
        }
        long end = SUPERBLOCK + (long) body.size();
        Buffer head = new Buffer().raw(new byte[] {(byte) 0x89, 'H', 'D', 'F', '\r', '\n', 0x1a, '\n'})
            .u1(2).u1(8).u1(8).u1(0).u8(0).u8(UNDEFINED).u8(end).u8(root);
        head.u4(Lookup3.hash(head.bytes()));
        ByteArrayOutputStream file = new ByteArrayOutputStream(SUPERBLOCK + body.size());
        file.writeBytes(head.bytes());
        file.writeBytes(body.toByteArray());
        return file.toByteArray();
    }

    /** Writes the group whose members' paths start with that prefix, its groups first. */
    private long group(String prefix) {
        Map<String, Long> members = new LinkedHashMap<>();
        List<String> names = new ArrayList<>(datasets.keySet());
        for (String name : names) {
            if (name.startsWith(prefix)) {
                String rest = name.substring(prefix.length());
                int slash = rest.indexOf('/');
                if (slash < 0) {
                    members.put(rest, datasets.get(name));
                } else if (!members.containsKey(rest.substring(0, slash))) {
                    members.put(rest.substring(0, slash), group(prefix + rest.substring(0, slash + 1)));
                }
            }
        }
        Buffer messages = new Buffer();
        message(messages, LINK_INFO, new Buffer().u1(0).u1(0).u8(UNDEFINED).u8(UNDEFINED));
        message(messages, GROUP_INFO, new Buffer().u1(0).u1(0));
        members.forEach((name, address) -> {
            byte[] text = name.getBytes(StandardCharsets.UTF_8);
            message(messages, LINK, new Buffer().u1(1).u1(0).u1(text.length).raw(text).u8(address));
        });
        return header(messages);
    }

    /** Little-endian bytes, growing. */
    private static final class Buffer {

        private final ByteArrayOutputStream out = new ByteArrayOutputStream();

        Buffer u1(int v) {
            out.write(v);
            return this;
        }

        Buffer u2(int v) {
            return u1(v & 0xff).u1((v >>> 8) & 0xff);
        }

        Buffer u4(int v) {
            return u2(v & 0xffff).u2(v >>> 16);
        }

        Buffer u8(long v) {
            return raw(ByteBuffer.allocate(8).order(ByteOrder.LITTLE_ENDIAN).putLong(v).array());
        }

        Buffer raw(byte[] bytes) {
            out.writeBytes(bytes);
            return this;
        }

        Buffer text(String ascii) {
            return raw(ascii.getBytes(StandardCharsets.US_ASCII));
        }

        byte[] bytes() {
            return out.toByteArray();
        }
    }
}
