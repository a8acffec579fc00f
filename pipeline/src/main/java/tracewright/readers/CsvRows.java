package tracewright.readers;

import java.io.Closeable;
import java.util.List;

/** Rows of a table, one at a time. Fields are given without the white space around them. */
interface CsvRows extends Closeable {

    /** Names of the columns, from the first line that is not empty. */
    List<String> header();

    /** Moves to the next row that is not empty; false after the last. */
    boolean next();

    /** Line of the file on which the present row ends, counted from 1. */
    long line();

    /** Number of fields of the present row. */
    int fields();

    String text(int column);

    /** @throws NumberFormatException if the field is no whole number */
    int whole(int column);

    /** @throws NumberFormatException if the field is no number */
    double number(int column);

    /** Says that a plain scan met a quote, so that the table has to be read by the rules of quoting. */
    final class QuoteMet extends RuntimeException {
        QuoteMet() {
            super("quote in a table read without quoting", null, false, false);
        }
    }
}
