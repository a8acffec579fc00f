package tracewright.results;

import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.util.List;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVPrinter;
import org.apache.commons.csv.QuoteMode;

/**
 * Comma-separated tables after RFC 4180 in UTF-8, with a header line, quotes only where needed and '.' as decimal sign.
 * Lines end with '\n' and not with the "\r\n" of the RFC: every spreadsheet reads both, but line tools take '\r' for a part of
 * the last column.
 */
final class CsvOut {

    private static final CSVFormat FORMAT = CSVFormat.RFC4180.builder().setRecordSeparator('\n').setQuoteMode(QuoteMode.MINIMAL).get();

    private CsvOut() {
    }

    /** Writes nothing if a row is not as long as the header. */
    static void write(List<String> header, List<List<String>> rows, OutputStream out) throws IOException {
        StringBuilder text = new StringBuilder();
        CSVPrinter printer = new CSVPrinter(text, FORMAT);
        printer.printRecord(header);
        for (List<String> row : rows) {
            if (row.size() != header.size()) {
                throw new IllegalArgumentException("row " + row + " has " + row.size() + " fields; the header has " + header.size());
            }
            printer.printRecord(row);
        }
        out.write(text.toString().getBytes(StandardCharsets.UTF_8));
    }
}
