package tracewright.report;

import java.util.Locale;

/** Pieces of sentences. */
final class Phrase {

    private Phrase() {
    }

    static String count(long n, String thing) {
        return n + " " + thing + (n == 1 ? "" : "s");
    }

    /** With a capital at the beginning; Greek symbols stay as they are, since a capital sigma is another thing. */
    static String capital(String text) {
        boolean latin = !text.isEmpty() && text.charAt(0) < 0x80;
        return latin ? text.substring(0, 1).toUpperCase(Locale.ROOT) + text.substring(1) : text;
    }
}
