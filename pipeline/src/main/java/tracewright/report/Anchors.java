package tracewright.report;

import java.util.HashSet;
import java.util.Locale;
import java.util.Set;

/** Hands out ids for one page: readable, of safe characters, none twice. */
final class Anchors {

    private final Set<String> taken = new HashSet<>();

    /** An id made from a name; the first to ask gets the plain form. */
    String of(String name) {
        String base = name.toLowerCase(Locale.ROOT).replaceAll("[^a-z0-9]+", "-").replaceAll("^-|-$", "");
        String plain = base.isEmpty() || Character.isDigit(base.charAt(0)) ? "x" + base : base;
        String id = plain;
        for (int i = 2; !taken.add(id); i++) {
            id = plain + "-" + i;
        }
        return id;
    }
}
