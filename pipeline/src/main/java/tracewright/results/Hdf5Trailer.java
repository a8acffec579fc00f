package tracewright.results;

import io.jhdf.checksum.ChecksumUtils;
import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.nio.channels.FileChannel;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.Arrays;

/**
 * Cuts off what the HDF5 library writes behind the last object: its version and the machine's system and architecture, which would
 * make the bytes of a file depend on where it was written. The end of the file stands in the superblock (version 2 of the format:
 * address at byte 28, checksum of bytes 0 to 43 at byte 44), so it is moved there too. The library's own root attribute says the
 * same; it is removed with the others.
 */
final class Hdf5Trailer {

    private static final int END_ADDRESS = 28;
    private static final int CHECKSUM = 44;
    private static final int VERSION = 8;

    /** Longest trailer looked for, in bytes. */
    private static final int SEARCHED = 256;

    private static final String START = "jHDF - ";

    private Hdf5Trailer() {
    }

    /** @throws IOException if the superblock is not as described above, for then the file could not be shortened */
    static void remove(Path file) throws IOException {
        try (FileChannel channel = FileChannel.open(file, StandardOpenOption.READ, StandardOpenOption.WRITE)) {
            long size = channel.size();
            long start = Math.max(0, size - SEARCHED);
            String tail = new String(read(channel, start, (int) (size - start)).array(), StandardCharsets.ISO_8859_1);
            ByteBuffer head = read(channel, 0, CHECKSUM + Integer.BYTES);
            int at = tail.lastIndexOf(START);
            if (head.get(VERSION) != 2 || head.getLong(END_ADDRESS) != size) {
                throw new IOException(file + " was not written as this version of the HDF5 library should write it");
            }
            if (at < 0) {
                return;     // a file without datasets gets no trailer
            }
            head.putLong(END_ADDRESS, start + at);
            head.putInt(CHECKSUM, ChecksumUtils.checksum(Arrays.copyOf(head.array(), CHECKSUM)));
            channel.write(head.rewind(), 0);
            channel.truncate(start + at);
        }
    }

    private static ByteBuffer read(FileChannel channel, long position, int length) throws IOException {
        ByteBuffer buffer = ByteBuffer.allocate(length).order(ByteOrder.LITTLE_ENDIAN);
        while (buffer.hasRemaining()) {
            if (channel.read(buffer, position + buffer.position()) < 0) {
                throw new IOException("the file ends at byte " + (position + buffer.position()) + ", inside its superblock");
            }
        }
        return buffer.flip();
    }
}
