package tracewright.readers;

import ch.randelshofer.fastdoubleparser.JavaDoubleParser;
import java.io.BufferedReader;
import java.io.IOException;
import java.io.InputStream;
import java.io.InputStreamReader;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.Iterator;
import java.util.List;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVParser;
import org.apache.commons.csv.CSVRecord;

/** Table with quoted fields, read by the rules of Commons CSV's default format: commas, doubled quotes, empty lines skipped. */
final class CsvQuoted implements CsvRows {

    private final CSVParser parser;
    private final Iterator<CSVRecord> records;
    private final List<String> header;
    private CSVRecord row;

    CsvQuoted(InputStream in) {
        try {
            parser = CSVParser.parse(new BufferedReader(new InputStreamReader(in, StandardCharsets.UTF_8), 1 << 16), CSVFormat.DEFAULT);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        records = parser.iterator();
        header = next() ? row.stream().map(CsvQuoted::name).toList() : List.of();
    }

    private static String name(String text) {
        return (text.startsWith("\uFEFF") ? text.substring(1) : text).strip();
    }

    @Override
    public List<String> header() {
        return header;
    }

    @Override
    public boolean next() {
        while (records.hasNext()) {
            row = records.next();
            if (row.size() > 1 || !row.get(0).isBlank()) {
                return true;
            }
        }
        return false;
    }

    @Override
    public long line() {
        return parser.getCurrentLineNumber();
    }

    @Override
    public int fields() {
        return row.size();
    }

    @Override
    public String text(int column) {
        return row.get(column).strip();
    }

    @Override
    public int whole(int column) {
        return Integer.parseInt(text(column));
    }

    @Override
    public double number(int column) {
        return JavaDoubleParser.parseDouble(text(column));
    }

    @Override
    public void close() throws IOException {
        parser.close();
    }
}
