package tracewright.results;

import java.io.IOException;
import java.net.InetAddress;
import java.net.UnknownHostException;
import java.nio.channels.FileChannel;
import java.nio.channels.OverlappingFileLockException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.time.DateTimeException;
import java.time.Duration;
import java.time.Instant;
import java.util.List;
import java.util.Optional;
import tracewright.study.InputException;
import tracewright.study.Problem;

/**
 * The right to write one output folder. Two files beside the folder:
 * <pre>
 *  .NAME.lock     empty, locked by the operating system for as long as the process lives, never read, stays behind
 *  .NAME.holder   host, process and its start, for the message to the second run; gone when the lock is given back
 * </pre>
 * The lock decides between processes of one machine and of machines whose file system knows locks. Where it does not, the
 * holder, which only one process can create, decides. The lock file must not be opened by a process that holds it, not even
 * to look: closing it again would end the lock (POSIX). Therefore a holder that is this process is found by its holder file.
 */
final class FolderLock implements AutoCloseable {

    /** Two readings of one process's start may differ by a second when the clock is adjusted; process ids return later than that. */
    private static final Duration SAME_START = Duration.ofSeconds(2);

    private final FileChannel channel;
    private final Path holderFile;

    private FolderLock(FileChannel channel, Path holderFile) {
        this.channel = channel;
        this.holderFile = holderFile;
    }

    /** A process that holds a folder; its start is its name together with the process id, which alone comes back. */
    record Holder(String host, long pid, Optional<Instant> since) {

        static Holder thisProcess() {
            ProcessHandle me = ProcessHandle.current();
            return new Holder(hostName(), me.pid(), me.info().startInstant());
        }

        /** Empty if the file is not there or was not finished. */
        static Optional<Holder> read(Path file) {
            try {
                List<String> lines = Files.readAllLines(file, StandardCharsets.UTF_8);
                Optional<Instant> since = lines.get(2).equals("unknown") ? Optional.empty() : Optional.of(Instant.parse(lines.get(2)));
                return Optional.of(new Holder(lines.get(0), Long.parseLong(lines.get(1)), since));
            } catch (IOException | IndexOutOfBoundsException | NumberFormatException | DateTimeException e) {
                return Optional.empty();
            }
        }

        String text() {
            return host + "\n" + pid + "\n" + sinceText() + "\n";
        }

        String sinceText() {
            return since.map(Instant::toString).orElse("unknown");
        }

        boolean isHere() {
            return host.equals(hostName());
        }

        /** Whether this process runs on this host. */
        boolean runsHere() {
            return isHere() && ProcessHandle.of(pid).filter(ProcessHandle::isAlive).map(this::startedThen).orElse(false);
        }

        private boolean startedThen(ProcessHandle process) {
            Optional<Instant> start = process.info().startInstant();
            return start.isEmpty() || since.isEmpty() || Duration.between(since.get(), start.get()).abs().compareTo(SAME_START) < 0;
        }

        String words() {
            return "process " + pid + " on host " + host + ", which runs since " + sinceText();
        }

        private static String hostName() {
            try {
                return InetAddress.getLocalHost().getHostName();
            } catch (UnknownHostException e) {
                return "localhost";
            }
        }
    }

    /**
     * Takes the lock of a folder, also from a holder on this host that has died.
     *
     * @throws InputException naming the holder, if another run has it
     * @throws IOException    if the files cannot be made
     */
    static FolderLock take(Path folder) throws IOException {
        Path holderFile = beside(folder, "holder");
        Optional<Holder> holder = Holder.read(holderFile);
        if (holder.filter(Holder::runsHere).isPresent()) {
            throw inUse(folder, holder);
        }
        FileChannel channel = FileChannel.open(beside(folder, "lock"), StandardOpenOption.CREATE, StandardOpenOption.WRITE);
        try {
            if (isLockedByAnother(channel)) {
                throw inUse(folder, Holder.read(holderFile));
            }
            becomeHolder(folder, holderFile);
            return new FolderLock(channel, holderFile);
        } catch (IOException | RuntimeException e) {
            channel.close();
            throw e;
        }
    }

    /** Hidden name beside the folder: {@code .NAME.ending}. */
    static Path beside(Path folder, String ending) {
        return folder.resolveSibling("." + folder.getFileName() + "." + ending);
    }

    private static boolean isLockedByAnother(FileChannel channel) {
        try {
            return channel.tryLock() == null;
        } catch (OverlappingFileLockException e) {
            return true;
        } catch (IOException e) {
            return false;   // a file system without locks: the holder file decides
        }
    }

    private static void becomeHolder(Path folder, Path holderFile) throws IOException {
        Optional<Holder> former = Holder.read(holderFile);
        if (former.isPresent() && (!former.get().isHere() || former.get().runsHere())) {
            throw inUse(folder, former);
        }
        Files.deleteIfExists(holderFile);
        Files.writeString(holderFile, Holder.thisProcess().text(), StandardCharsets.UTF_8, StandardOpenOption.CREATE_NEW, StandardOpenOption.WRITE);
    }

    private static InputException inUse(Path folder, Optional<Holder> holder) {
        String who = holder.map(Holder::words).orElse("another process");
        String remedy = "wait until it has finished, or name another folder with --out";
        if (holder.isPresent() && !holder.get().isHere()) {
            remedy += "; if you know that it is dead, delete " + beside(folder, "holder");
        }
        return new InputException(InputException.Cause.USAGE,
            List.of(new Problem("output folder is in use by " + who, folder.toString(), remedy)));
    }

    /** Gives the lock back; the empty lock file stays, because a file that others may have opened already cannot be deleted safely. */
    @Override
    public void close() throws IOException {
        Files.deleteIfExists(holderFile);
        channel.close();
    }
}
