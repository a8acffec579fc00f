package tracewright.results;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Collections;
import java.util.List;
import java.util.Optional;
import java.util.SortedSet;
import java.util.TreeSet;

/**
 * The files of an output folder that this program wrote, and so the only ones it may replace or delete. Stored in the folder as
 * {@value #NAME}: a line naming the format, a line {@code whole} or {@code replacing}, then one path per line with '/'.
 *
 * @param whole whether all files are of one run; false while one run's files replace another's
 * @param files relative paths
 */
record Manifest(boolean whole, SortedSet<String> files) {

    static final String NAME = ".tracewright-manifest";

    private static final String FORMAT = "tracewright-manifest/1";

    Manifest {
        files = Collections.unmodifiableSortedSet(new TreeSet<>(files));
    }

    /** Manifest of a folder; no files if there is none or it is not one of ours. Entries that leave the folder are dropped. */
    static Manifest of(Path folder) throws IOException {
        return read(folder.resolve(NAME)).orElseGet(() -> new Manifest(true, new TreeSet<>()));
    }

    private static Optional<Manifest> read(Path file) throws IOException {
        if (!Files.isRegularFile(file)) {
            return Optional.empty();
        }
        List<String> lines = new String(Files.readAllBytes(file), StandardCharsets.UTF_8).lines().toList();
        if (lines.size() < 2 || !lines.get(0).equals(FORMAT)) {
            return Optional.empty();
        }
        TreeSet<String> files = new TreeSet<>();
        lines.stream().skip(2).filter(Manifest::isInside).forEach(files::add);
        return Optional.of(new Manifest(lines.get(1).equals("whole"), files));
    }

    /** Whether a name is a plain relative path below the folder and not the manifest itself. */
    static boolean isInside(String name) {
        Path path = Path.of(name);
        return !name.isBlank() && name.chars().noneMatch(c -> c < ' ') && !path.isAbsolute() && path.normalize().equals(path)
            && !path.startsWith("..") && !name.equals(NAME);
    }

    /** All files of both, marked as not whole. */
    Manifest replacing(Manifest former) {
        TreeSet<String> union = new TreeSet<>(files);
        union.addAll(former.files);
        return new Manifest(false, union);
    }

    String text() {
        return FORMAT + "\n" + (whole ? "whole" : "replacing") + "\n" + String.join("\n", files) + "\n";
    }
}
