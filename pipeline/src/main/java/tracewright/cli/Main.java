package tracewright.cli;

import java.io.IOException;
import java.io.InputStream;
import java.io.PrintStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.Set;
import java.util.logging.Level;
import java.util.logging.Logger;

/** Entry point. The general help and the version are printed from a text file, without loading the command line library. */
public final class Main {

    /** Held so that its level is not forgotten: the HDF5 library tells about every group it opens. */
    private static final Logger HDF5_LOG = Logger.getLogger("io.jhdf");

    private static final Set<String> HELP = Set.of("--help", "-h", "help");

    private Main() {
    }

    public static void main(String[] args) {
        System.exit(run(args, System.out, System.err));
    }

    /** Runs one command and returns its exit status. */
    static int run(String[] args, PrintStream out, PrintStream err) {
        if (args.length == 0) {
            err.print(helpText());
            return ExitStatus.USAGE;
        }
        if (args.length == 1 && HELP.contains(args[0])) {
            out.print(helpText());
            return ExitStatus.DONE;
        }
        if (args.length == 1 && (args[0].equals("--version") || args[0].equals("-V"))) {
            out.println("tracewright " + Version.text());
            return ExitStatus.DONE;
        }
        HDF5_LOG.setLevel(Level.SEVERE);
        return Commands.execute(args, out, err);
    }

    /** General help, UTF-8 resource {@code help.txt}. */
    static String helpText() {
        try (InputStream in = Main.class.getResourceAsStream("help.txt")) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
