package tracewright.results;

import java.io.IOException;
import java.nio.channels.FileChannel;
import java.nio.file.AccessDeniedException;
import java.nio.file.FileSystemException;
import java.nio.file.Files;
import java.nio.file.LinkOption;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.nio.file.StandardOpenOption;
import java.util.Comparator;
import java.util.List;
import java.util.stream.Stream;

/** Operations on files that survive a crash of the machine, and words for what the system says when they fail. */
final class FileTree {

    private FileTree() {
    }

    /** The path itself and all below, parents first; symbolic links are listed, not followed. */
    static List<Path> list(Path root) throws IOException {
        try (Stream<Path> walk = Files.walk(root)) {
            return walk.sorted().toList();
        }
    }

    /** Deletes the path and all below; nothing happens if it is not there. */
    static void delete(Path root) throws IOException {
        if (Files.exists(root, LinkOption.NOFOLLOW_LINKS)) {
            for (Path p : list(root).stream().sorted(Comparator.reverseOrder()).toList()) {
                Files.deleteIfExists(p);
            }
        }
    }

    /** Hands the content of a file, or the list of a folder's entries, from memory to the disk. */
    static void force(Path path) throws IOException {
        StandardOpenOption mode = Files.isDirectory(path) ? StandardOpenOption.READ : StandardOpenOption.WRITE;
        try (FileChannel channel = FileChannel.open(path, mode)) {
            channel.force(true);
        }
    }

    /** Renames in one step; a file of the new name is replaced. */
    static void move(Path from, Path to) throws IOException {
        Files.move(from, to, StandardCopyOption.ATOMIC_MOVE);
    }

    /** The system's reason, in words and without the path. */
    static String reason(IOException e) {
        if (e instanceof AccessDeniedException) {
            return "permission denied";
        }
        if (e instanceof NoSuchFileException) {
            return "no such file or folder";
        }
        String reason = e instanceof FileSystemException f ? f.getReason() : e.getMessage();
        return reason == null ? e.getClass().getSimpleName() : reason;
    }
}
