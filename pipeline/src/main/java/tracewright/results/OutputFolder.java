package tracewright.results;

import java.io.BufferedOutputStream;
import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.LinkOption;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.TreeSet;
import tracewright.study.InputException;
import tracewright.study.Problem;

/**
 * An output folder that appears whole or not at all, and belongs to one run at a time. All that a run needs beside the folder has
 * a hidden name, so that the folder itself never looks half written:
 * <pre>
 *  parent/.NAME.lock  .NAME.holder   see {@link FolderLock}
 *  parent/.NAME.staging/             the new files, until {@link #commit}
 *  parent/NAME/                      the folder; with {@code .tracewright-manifest}, the list of files this program wrote
 * </pre>
 * A folder that is not there appears by one rename. In a folder that is there, files are replaced one by one, each atomically,
 * {@code results.json} last; then files of the former run that this one did not write are deleted, and empty folders of theirs.
 * While that goes on, the manifest says so ({@link #isBeingReplaced}). Files the program did not write are never touched: if one is
 * in the way the run is refused. A killed run leaves its staging folder, which the next one deletes.
 * <pre>
 *  try (OutputFolder out = OutputFolder.open(folder)) {
 *      out.write("results.json", stream -&gt; ResultsJson.write(results, stream));
 *      out.writeFile("samples.h5", file -&gt; SamplesHdf5.write(results, file));
 *      out.commit();
 *  }                                 // without commit: as if nothing had happened
 * </pre>
 * One thread at a time.
 */
public final class OutputFolder implements AutoCloseable {

    /** The file that says that a run has finished, put in place last. */
    private static final String LAST = "results.json";

    /** Files that every run writes; one of them in a folder without a manifest is somebody else's. */
    private static final List<String> ALWAYS = List.of(LAST, "budget.csv", "samples.h5", "report.html", "run.log", "provenance.json");

    private final Path target;
    private final Path staging;
    private final FolderLock lock;
    private final TreeSet<String> names = new TreeSet<>();
    private boolean open = true;

    private OutputFolder(Path target, Path staging, FolderLock lock) {
        this.target = target;
        this.staging = staging;
        this.lock = lock;
    }

    /** Writes the content of one file. */
    @FunctionalInterface
    public interface Writing {
        void to(OutputStream out) throws IOException;
    }

    /** Writes one file that does not exist yet. */
    @FunctionalInterface
    public interface FileWriting {
        void to(Path file) throws IOException;
    }

    /**
     * Takes the folder for this run; folders above it are made if they are missing.
     *
     * @throws InputException if another run has it, if it cannot be written, or if files are in the way that the program did not write
     */
    public static OutputFolder open(Path folder) throws IOException {
        Path target = resolve(folder);
        FolderLock lock = lock(target);
        try {
            Path staging = FolderLock.beside(target, "staging");
            FileTree.delete(staging);
            requireFree(target, ALWAYS);
            Files.createDirectory(staging);
            return new OutputFolder(target, staging, lock);
        } catch (IOException | RuntimeException e) {
            lock.close();
            throw e;
        }
    }

    /** Whether a run was stopped while it replaced the files of another one, so that the folder mixes the two. */
    public static boolean isBeingReplaced(Path folder) throws IOException {
        return !Manifest.of(folder).whole();
    }

    /** The folder itself, where files appear at {@link #commit}. */
    public Path target() {
        return target;
    }

    /**
     * @param name path inside the folder with '/', for instance {@code plots/ratio.svg}
     * @throws IOException naming the file, for instance when the disk is full
     */
    public void write(String name, Writing body) throws IOException {
        writeFile(name, file -> {
            try (OutputStream out = new BufferedOutputStream(Files.newOutputStream(file, StandardOpenOption.CREATE_NEW), 1 << 16)) {
                body.to(out);
            }
        });
    }

    /** As {@link #write}, for writers that want a path; the path is a place in the staging folder. */
    public void writeFile(String name, FileWriting body) throws IOException {
        requireOpen();
        if (!Manifest.isInside(name) || !names.add(name)) {
            throw new IllegalArgumentException("'" + name + "' is no new path inside the output folder");
        }
        Path file = staging.resolve(name);
        try {
            Files.createDirectories(file.getParent());
            body.to(file);
        } catch (IOException e) {
            throw new IOException("cannot write " + target.resolve(name) + ": " + FileTree.reason(e), e);
        }
    }

    /** Puts all files in place. */
    public void commit() throws IOException {
        requireOpen();
        open = false;
        try {
            Manifest manifest = new Manifest(true, names);
            writeManifest(manifest);
            for (Path p : FileTree.list(staging)) {
                FileTree.force(p);
            }
            if (Files.exists(target)) {
                replace(manifest);
            } else {
                FileTree.move(staging, target);
            }
            FileTree.force(target.getParent());
        } catch (IOException e) {
            throw new IOException("cannot put the results into " + target + ": " + FileTree.reason(e), e);
        }
    }

    /** Gives the folder back; what was not committed is forgotten. */
    @Override
    public void close() throws IOException {
        open = false;
        try {
            FileTree.delete(staging);
        } finally {
            lock.close();
        }
    }

    private void replace(Manifest manifest) throws IOException {
        requireFree(target, List.copyOf(names));
        Manifest former = Manifest.of(target);
        Path staged = staging.resolve(Manifest.NAME);
        writeManifest(manifest.replacing(former));
        FileTree.force(staged);
        FileTree.move(staged, target.resolve(Manifest.NAME));
        FileTree.force(target);
        for (String name : names.stream().sorted(Comparator.comparing(LAST::equals)).toList()) {
            Path to = target.resolve(name);
            Files.createDirectories(to.getParent());
            FileTree.move(staging.resolve(name), to);
            FileTree.force(to.getParent());
        }
        deleteStale(former);
        writeManifest(manifest);
        FileTree.force(staged);
        FileTree.move(staged, target.resolve(Manifest.NAME));
        FileTree.force(target);
    }

    /** Deletes what the former run wrote and this one did not, then the folders that are empty because of it. */
    private void deleteStale(Manifest former) throws IOException {
        for (String name : former.files()) {
            Path file = target.resolve(name);
            if (!names.contains(name) && isOurs(name) && Files.deleteIfExists(file)) {
                deleteIfEmpty(file.getParent());
            }
        }
    }

    private void deleteIfEmpty(Path folder) throws IOException {
        if (!folder.equals(target) && FileTree.list(folder).size() == 1) {
            Files.delete(folder);
            deleteIfEmpty(folder.getParent());
        }
    }

    /** A file of the manifest that is still a plain file, below plain folders. */
    private boolean isOurs(String name) {
        return Files.isRegularFile(target.resolve(name), LinkOption.NOFOLLOW_LINKS) && obstacle(target, name).isEmpty();
    }

    private void writeManifest(Manifest manifest) throws IOException {
        Files.writeString(staging.resolve(Manifest.NAME), manifest.text(), StandardCharsets.UTF_8);
    }

    private void requireOpen() {
        if (!open) {
            throw new IllegalStateException("the output folder " + target + " is committed or closed");
        }
    }

    /** The folder's real place, so that what stands beside it is on the same file system. */
    private static Path resolve(Path folder) throws IOException {
        Path absolute = folder.toAbsolutePath().normalize();
        if (!Files.exists(absolute, LinkOption.NOFOLLOW_LINKS)) {
            return inExistingParent(absolute);
        }
        if (!Files.isDirectory(absolute)) {
            throw refused("the output folder is not a folder", absolute, "name another one with --out");
        }
        Path real = absolute.toRealPath();
        if (real.getParent() == null || !Files.getFileStore(real).equals(Files.getFileStore(real.getParent()))) {
            throw refused("the output folder is the top of a file system, so that nothing can be prepared beside it", real,
                "name a folder inside it, for instance --out " + real.resolve("results"));
        }
        if (!Files.isWritable(real)) {
            throw refused("no permission to write into the output folder", real, "name another one with --out");
        }
        return real;
    }

    private static Path inExistingParent(Path absolute) {
        Path parent = absolute.getParent();
        try {
            Files.createDirectories(parent);
            return parent.toRealPath().resolve(absolute.getFileName());
        } catch (IOException e) {
            throw refused("the folder above the output folder cannot be made: " + FileTree.reason(e), parent, "name another folder with --out");
        }
    }

    private static FolderLock lock(Path target) {
        try {
            return FolderLock.take(target);
        } catch (IOException e) {
            throw refused("nothing can be written beside the output folder, where its files are prepared: " + FileTree.reason(e),
                target.getParent(), "name a folder inside one that you may write into, for instance --out " + target.resolve("results"));
        }
    }

    /** Refuses names that in the target are something else than a file this program wrote. */
    private static void requireFree(Path target, List<String> names) throws IOException {
        Manifest former = Manifest.of(target);
        List<Problem> problems = new ArrayList<>();
        for (String name : names) {
            List<Path> obstacles = new ArrayList<>(obstacle(target, name));
            Path file = target.resolve(name);
            boolean foreign = Files.exists(file, LinkOption.NOFOLLOW_LINKS)
                && (!former.files().contains(name) || Files.isDirectory(file, LinkOption.NOFOLLOW_LINKS));
            if (foreign) {
                obstacles.add(file);
            }
            obstacles.forEach(p -> problems.add(new Problem("an output would replace something that this program did not write",
                p.toString(), "move it away, or name another folder with --out")));
        }
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
    }

    /** What stands in the target where a folder above the file belongs; at most one. */
    private static List<Path> obstacle(Path target, String name) {
        Path above = target.relativize(target.resolve(name)).getParent();
        for (Path p = above; p != null; p = p.getParent()) {
            Path there = target.resolve(p);
            if (Files.exists(there, LinkOption.NOFOLLOW_LINKS) && !Files.isDirectory(there, LinkOption.NOFOLLOW_LINKS)) {
                return List.of(there);
            }
        }
        return List.of();
    }

    private static InputException refused(String what, Path where, String remedy) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, where.toString(), remedy)));
    }
}
