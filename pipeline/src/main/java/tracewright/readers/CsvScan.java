package tracewright.readers;

import ch.randelshofer.fastdoubleparser.JavaDoubleParser;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/** Table without quotes, scanned as bytes: no text is made but for labels that change. */
final class CsvScan implements CsvRows {

    private static final int BLOCK = 1 << 18;
    private static final int LONGEST_LINE = 1 << 24;

    private final InputStream in;
    private byte[] block = new byte[BLOCK];
    private int filled;
    private int at;
    private boolean ended;
    private long line;

    private final List<String> header;
    private int fields;
    private int[] starts = new int[16];
    private int[] ends = new int[16];
    private final byte[][] lastBytes;
    private final String[] lastTexts;

    CsvScan(InputStream in) {
        this.in = in;
        this.header = next() ? readHeader() : List.of();
        this.lastBytes = new byte[header.size()][];
        this.lastTexts = new String[header.size()];
    }

    private List<String> readHeader() {
        List<String> names = new ArrayList<>();
        for (int c = 0; c < fields; c++) {
            names.add(new String(block, starts[c], ends[c] - starts[c], StandardCharsets.UTF_8));
        }
        if (names.get(0).startsWith("\uFEFF")) {
            names.set(0, names.get(0).substring(1).strip());
        }
        return List.copyOf(names);
    }

    @Override
    public List<String> header() {
        return header;
    }

    @Override
    public boolean next() {
        while (true) {
            int end = lineEnd();
            if (end < 0) {
                return false;
            }
            line++;
            int from = at;
            at = Math.min(end + 1, filled);
            if (split(from, end)) {
                return true;
            }
        }
    }

    /** Index of the line feed that ends the line at {@code at}, or of the end of the file; -1 if nothing is left. */
    private int lineEnd() {
        int scanned = at;
        while (true) {
            for (int k = scanned; k < filled; k++) {
                if (block[k] == '\n') {
                    return k;
                }
            }
            scanned = filled - at;
            if (ended) {
                return at < filled ? filled : -1;
            }
            refill();
        }
    }

    /** Moves the unread part to the front and reads more behind it. */
    private void refill() {
        System.arraycopy(block, at, block, 0, filled - at);
        filled -= at;
        at = 0;
        if (filled == block.length) {
            if (filled >= LONGEST_LINE) {
                throw new UncheckedIOException(new IOException("line " + (line + 1) + " is longer than " + LONGEST_LINE + " bytes"));
            }
            block = Arrays.copyOf(block, 2 * block.length);
        }
        try {
            int read = in.read(block, filled, block.length - filled);
            ended = read < 0;
            filled += Math.max(0, read);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Finds the fields of a line; false if it is blank. */
    private boolean split(int from, int end) {
        fields = 0;
        int start = from;
        for (int k = from; k < end; k++) {
            byte b = block[k];
            if (b == ',') {
                field(start, k);
                start = k + 1;
            } else if (b == '"') {
                throw new QuoteMet();
            }
        }
        field(start, end);
        return fields > 1 || ends[0] > starts[0];
    }

    private void field(int start, int end) {
        int s = start;
        int e = end;
        while (s < e && block[s] <= ' ' && block[s] >= 0) {
            s++;
        }
        while (e > s && block[e - 1] <= ' ' && block[e - 1] >= 0) {
            e--;
        }
        if (fields == starts.length) {
            starts = Arrays.copyOf(starts, 2 * fields);
            ends = Arrays.copyOf(ends, 2 * fields);
        }
        starts[fields] = s;
        ends[fields++] = e;
    }

    @Override
    public long line() {
        return line;
    }

    @Override
    public int fields() {
        return fields;
    }

    @Override
    public String text(int column) {
        byte[] last = lastBytes[column];
        if (last != null && Arrays.equals(block, starts[column], ends[column], last, 0, last.length)) {
            return lastTexts[column];
        }
        lastBytes[column] = Arrays.copyOfRange(block, starts[column], ends[column]);
        lastTexts[column] = new String(lastBytes[column], StandardCharsets.UTF_8);
        return lastTexts[column];
    }

    @Override
    public int whole(int column) {
        int value = 0;
        int length = ends[column] - starts[column];
        boolean digits = length > 0 && length < 10;
        for (int k = starts[column]; digits && k < ends[column]; k++) {
            digits = block[k] >= '0' && block[k] <= '9';
            value = 10 * value + block[k] - '0';
        }
        return digits ? value : Integer.parseInt(text(column));
    }

    @Override
    public double number(int column) {
        return JavaDoubleParser.parseDouble(block, starts[column], ends[column] - starts[column]);
    }

    @Override
    public void close() throws IOException {
        in.close();
    }
}
