package tracewright.study;

import java.util.Collection;
import java.util.Comparator;
import java.util.Locale;
import java.util.Optional;

/** The candidate that a misspelt word most probably meant. */
public final class Nearest {

    private static final int SHORTEST_BEGINNING = 3;

    private Nearest() {
    }

    /** Nearest by edit distance, case aside; empty if more than half of the letters differ. */
    public static Optional<String> to(String word, Collection<String> candidates) {
        String best = null;
        int least = Integer.MAX_VALUE;
        for (String c : candidates) {
            int d = unlikeness(word.toLowerCase(Locale.ROOT), c.toLowerCase(Locale.ROOT));
            if (d < least) {
                least = d;
                best = c;
            }
        }
        return best != null && 2 * least <= Math.max(word.length(), best.length()) ? Optional.of(best) : Optional.empty();
    }

    /** Half a sentence for a message: {@code nearest is 'x'} whatever its distance, or {@code there is none}. */
    public static String hint(String word, Collection<String> candidates) {
        return candidates.stream()
            .min(Comparator.<String>comparingInt(c -> distance(word.toLowerCase(Locale.ROOT), c.toLowerCase(Locale.ROOT))).thenComparing(Comparator.naturalOrder()))
            .map(c -> "nearest is '" + c + "'").orElse("there is none");
    }

    /** Advice for a word that is none of the candidates. */
    public static String advice(String word, Collection<String> candidates) {
        if (candidates.isEmpty()) {
            return "nothing is defined that could stand here";
        }
        return to(word, candidates).map(c -> "did you mean '" + c + "'? ").orElse("") + "valid: " + String.join(", ", candidates);
    }

    /** Edit distance; a beginning of three letters or more, as in scale for scale_gev, counts as a single slip. */
    private static int unlikeness(String word, String candidate) {
        boolean beginning = word.length() >= SHORTEST_BEGINNING && candidate.startsWith(word) && !candidate.equals(word);
        return beginning ? 1 : distance(word, candidate);
    }

    /** Insertions, deletions and replacements that turn one word into the other (Levenshtein). */
    static int distance(String a, String b) {
        int[] row = new int[b.length() + 1];
        for (int j = 0; j <= b.length(); j++) {
            row[j] = j;
        }
        for (int i = 1; i <= a.length(); i++) {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= b.length(); j++) {
                int replaced = diagonal + (a.charAt(i - 1) == b.charAt(j - 1) ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.min(replaced, 1 + Math.min(row[j], row[j - 1]));
            }
        }
        return row[b.length()];
    }
}
