package tracewright.readers;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.LinkedHashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import java.util.stream.Stream;

/**
 * A path with placeholders in braces, relative to a data folder: {@code run_{stream}/hadrons_{trajectory}.h5}. A placeholder
 * that stands for digits matches digits only; any other matches at least one character of one path segment.
 */
final class PathTemplate {

    private static final Pattern PLACEHOLDER = Pattern.compile("\\{([^{}/]*)\\}");

    /** One file and what its path says. */
    record Match(Path file, Map<String, String> labels) {
        Match {
            labels = Map.copyOf(labels);
        }
    }

    /** Files that match, in the order of their labels (digits by value), and how many other entries were seen beside them. */
    record Scan(List<Match> matches, int ignored) {
    }

    private final String text;
    private final Set<String> digits;
    private final List<String> placeholders;
    private int ignored;

    private PathTemplate(String text, Set<String> digits) {
        this.text = text;
        this.digits = Set.copyOf(digits);
        this.placeholders = placeholdersOf(text);
    }

    static PathTemplate of(String text, Set<String> digits) {
        return new PathTemplate(text, digits);
    }

    /** Names between braces, in order, each once. */
    static List<String> placeholdersOf(String text) {
        Set<String> names = new LinkedHashSet<>();
        Matcher m = PLACEHOLDER.matcher(text);
        while (m.find()) {
            names.add(m.group(1));
        }
        return List.copyOf(names);
    }

    Scan scan(Path folder) throws IOException {
        ignored = 0;
        List<Match> found = new ArrayList<>();
        descend(folder, text.split("/"), 0, new LinkedHashMap<>(), found);
        found.sort(order());
        return new Scan(List.copyOf(found), ignored);
    }

    private void descend(Path at, String[] segments, int depth, Map<String, String> labels, List<Match> found) throws IOException {
        if (depth == segments.length) {
            if (Files.isRegularFile(at)) {
                found.add(new Match(at, labels));
            }
            return;
        }
        if (!PLACEHOLDER.matcher(segments[depth]).find()) {
            descend(at.resolve(segments[depth]), segments, depth + 1, labels, found);
            return;
        }
        if (!Files.isDirectory(at)) {
            return;
        }
        for (Path entry : entries(at)) {
            Map<String, String> read = new LinkedHashMap<>(labels);
            if (matches(segments[depth], entry.getFileName().toString(), read)) {
                descend(entry, segments, depth + 1, read, found);
            } else {
                ignored++;
            }
        }
    }

    private static List<Path> entries(Path folder) throws IOException {
        try (Stream<Path> list = Files.list(folder)) {
            return list.sorted(Comparator.comparing(p -> p.getFileName().toString())).toList();
        }
    }

    /** Whether a name fits a segment and repeats what the placeholders already stand for; adds the new ones to {@code labels}. */
    private boolean matches(String segment, String name, Map<String, String> labels) {
        List<String> names = new ArrayList<>();
        Matcher whole = expression(segment, names).matcher(name);
        if (!whole.matches()) {
            return false;
        }
        for (int i = 0; i < names.size(); i++) {
            String before = labels.putIfAbsent(names.get(i), whole.group(i + 1));
            if (before != null && !before.equals(whole.group(i + 1))) {
                return false;
            }
        }
        return true;
    }

    private Pattern expression(String segment, List<String> names) {
        StringBuilder regex = new StringBuilder();
        Matcher m = PLACEHOLDER.matcher(segment);
        int from = 0;
        while (m.find()) {
            regex.append(Pattern.quote(segment.substring(from, m.start())));
            regex.append(digits.contains(m.group(1)) ? "([0-9]+)" : "(.+?)");
            names.add(m.group(1));
            from = m.end();
        }
        return Pattern.compile(regex.append(Pattern.quote(segment.substring(from))).toString(), Pattern.DOTALL);
    }

    private Comparator<Match> order() {
        Comparator<Match> byLabels = (a, b) -> 0;
        for (String p : placeholders) {
            Comparator<String> one = digits.contains(p) ? PathTemplate::byValue : Comparator.naturalOrder();
            byLabels = byLabels.thenComparing(m -> m.labels().getOrDefault(p, ""), one);
        }
        return byLabels.thenComparing(m -> m.file().toString());
    }

    private static int byValue(String a, String b) {
        String x = a.replaceFirst("^0+", "");
        String y = b.replaceFirst("^0+", "");
        return x.length() != y.length() ? Integer.compare(x.length(), y.length()) : x.compareTo(y);
    }
}
