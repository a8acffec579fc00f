package tracewright.readers;

import java.io.EOFException;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;

/**
 * Raw bytes of an HDF5 file by position: from the whole file in memory, or read into a window that is used again, so that a file
 * that shrinks meanwhile is an exception, not a signal.
 */
interface Hdf5Bytes {

    /** A buffer that holds bytes position..position+length-1 of the file from index 0 on; valid until the next call. */
    ByteBuffer at(long position, int length);

    /** Whole file in one buffer. */
    record Whole(ByteBuffer file) implements Hdf5Bytes {
        @Override
        public ByteBuffer at(long position, int length) {
            return file.slice(Math.toIntExact(position), length);
        }
    }

    /** Reads each window anew into one direct buffer. */
    final class Windowed implements Hdf5Bytes, AutoCloseable {

        private final FileChannel channel;
        private ByteBuffer window = ByteBuffer.allocateDirect(0);

        Windowed(Path file) throws IOException {
            channel = FileChannel.open(file, StandardOpenOption.READ);
        }

        @Override
        public ByteBuffer at(long position, int length) {
            if (window.capacity() < length) {
                window = ByteBuffer.allocateDirect(length);
            }
            window.clear().limit(length);
            try {
                while (window.hasRemaining()) {
                    if (channel.read(window, position + window.position()) < 0) {
                        throw new EOFException("file ends before byte " + (position + length));
                    }
                }
            } catch (IOException e) {
                throw new UncheckedIOException(e);
            }
            return window.flip();
        }

        @Override
        public void close() throws IOException {
            channel.close();
        }
    }
}
