package tracewright.synth;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.FileVisitResult;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.SimpleFileVisitor;
import java.nio.file.StandardCopyOption;
import java.nio.file.attribute.BasicFileAttributes;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.ArrayList;
import java.util.HexFormat;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import java.util.TreeSet;
import tracewright.study.InputException;
import tracewright.study.Problem;

/**
 * A folder of generated files with a list of their SHA-256 digests, in the form that checksum tools read. A folder that holds
 * anything else, or a listed file that has changed since, is left alone: nothing that was not written by a former run is ever
 * replaced or removed.
 */
final class OutputFolder {

    static final String LIST = "files.sha256";

    private final Path folder;

    OutputFolder(Path folder) {
        this.folder = folder;
    }

    /** Refuses the folder if it holds foreign files. */
    void check() {
        if (!Files.exists(folder)) {
            return;
        }
        Map<String, Set<String>> listed = readList();
        List<Problem> problems = new ArrayList<>();
        for (Path file : present()) {
            String name = name(file);
            if (!name.equals(LIST) && !listed.getOrDefault(name, Set.of()).contains(digest(read(file)))) {
                problems.add(new Problem((listed.containsKey(name) ? "file has changed since it was generated: " : "foreign file: ") + name,
                    "output folder " + folder, "choose another folder with --out, or move the file away"));
            }
        }
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
    }

    /** Writes the files and their list; files of a former run that are no longer made are removed. */
    void write(Map<String, byte[]> files) {
        files.keySet().forEach(this::checkInside);
        check();
        Map<String, Set<String>> former = readList();
        Map<String, Set<String>> digests = new TreeMap<>();
        files.forEach((name, bytes) -> digests.put(name, Set.of(digest(bytes))));
        try {
            Files.createDirectories(folder);
            writeList(union(former, digests));      // after an interruption old and new files are both known
            for (Map.Entry<String, byte[]> file : files.entrySet()) {
                writeWhole(folder.resolve(file.getKey()), file.getValue());
            }
            for (String name : former.keySet()) {
                if (!digests.containsKey(name)) {
                    Files.deleteIfExists(folder.resolve(name));
                }
            }
            writeList(digests);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static Map<String, Set<String>> union(Map<String, Set<String>> former, Map<String, Set<String>> digests) {
        Map<String, Set<String>> all = new TreeMap<>();
        former.forEach((name, known) -> all.computeIfAbsent(name, n -> new TreeSet<>()).addAll(known));
        digests.forEach((name, known) -> all.computeIfAbsent(name, n -> new TreeSet<>()).addAll(known));
        return all;
    }

    private void writeList(Map<String, Set<String>> digests) throws IOException {
        StringBuilder text = new StringBuilder();
        digests.forEach((name, known) -> known.forEach(digest -> text.append(digest).append("  ").append(name).append('\n')));
        writeWhole(folder.resolve(LIST), text.toString().getBytes(StandardCharsets.UTF_8));
    }

    private void checkInside(String name) {
        Path root = folder.toAbsolutePath().normalize();
        Checks.layout(root.resolve(name).normalize().startsWith(root) && !name.isEmpty(), "file " + name + " would lie outside " + folder);
    }

    private static void writeWhole(Path file, byte[] bytes) throws IOException {
        Files.createDirectories(file.getParent());
        Path beside = file.resolveSibling("." + file.getFileName() + ".part");
        Files.write(beside, bytes);
        Files.move(beside, file, StandardCopyOption.ATOMIC_MOVE, StandardCopyOption.REPLACE_EXISTING);
    }

    private Map<String, Set<String>> readList() {
        Map<String, Set<String>> listed = new TreeMap<>();
        Path list = folder.resolve(LIST);
        if (Files.isRegularFile(list)) {
            for (String line : new String(read(list), StandardCharsets.UTF_8).split("\n")) {
                int gap = line.indexOf("  ");
                if (gap > 0) {
                    checkInside(line.substring(gap + 2));
                    listed.computeIfAbsent(line.substring(gap + 2), n -> new TreeSet<>()).add(line.substring(0, gap));
                }
            }
        }
        return listed;
    }

    private List<Path> present() {
        List<Path> files = new ArrayList<>();
        try {
            Files.walkFileTree(folder, new SimpleFileVisitor<>() {
                @Override
                public FileVisitResult visitFile(Path file, BasicFileAttributes attributes) {
                    files.add(file);
                    return FileVisitResult.CONTINUE;
                }
            });
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        files.sort(null);
        return files;
    }

    private String name(Path file) {
        return folder.relativize(file).toString().replace('\\', '/');
    }

    private static byte[] read(Path file) {
        try {
            return Files.readAllBytes(file);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static String digest(byte[] bytes) {
        try {
            return HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(bytes));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java has SHA-256", e);
        }
    }
}
