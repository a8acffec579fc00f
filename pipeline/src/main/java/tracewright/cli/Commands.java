package tracewright.cli;

import java.io.IOException;
import java.io.PrintStream;
import java.io.PrintWriter;
import java.io.StringWriter;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import picocli.CommandLine;
import picocli.CommandLine.Command;
import tracewright.study.InputException;
import tracewright.study.Nearest;
import tracewright.study.Problem;

/** All commands and what becomes of their exceptions. */
@Command(name = "tracewright", description = "From lattice correlators on disk to a renormalised budget of a hadron's mass.",
    synopsisSubcommandLabel = "COMMAND", subcommands = {RunCommand.class, ValidateCommand.class, SynthCommand.class}, mixinStandardHelpOptions = true,
    versionProvider = Commands.VersionText.class)
final class Commands {

    /** File that takes the stack trace of a bug. */
    static final String TRACE_FILE = "tracewright-failure.log";

    private Commands() {
    }

    static final class VersionText implements CommandLine.IVersionProvider {
        @Override
        public String[] getVersion() {
            return new String[] {"tracewright " + Version.text()};
        }
    }

    static int execute(String[] args, PrintStream out, PrintStream err) {
        PrintWriter errors = new PrintWriter(err, true);
        CommandLine line = new CommandLine(new Commands()).setOut(new PrintWriter(out, true)).setErr(errors).setCaseInsensitiveEnumValuesAllowed(true);
        if (!args[0].startsWith("-") && !line.getSubcommands().containsKey(args[0])) {
            errors.println("tracewright: there is no command '" + args[0] + "'; " + Nearest.advice(args[0], line.getSubcommands().keySet()));
            return ExitStatus.USAGE;
        }
        line.setExecutionExceptionHandler((e, command, parsed) -> report(e, errors));
        return line.execute(args);
    }

    private static int report(Exception e, PrintWriter err) {
        if (e instanceof InputException input) {
            err.println("tracewright: " + input.getMessage());
            return ExitStatus.of(input.reason());
        }
        if (e instanceof IOException) {
            err.println("tracewright: " + new Problem("the output could not be written: " + e.getMessage(), "the output folder; nothing of it was changed",
                "free space or repair the file system, or name another folder with --out, and run again").text());
            return ExitStatus.FAILED;
        }
        StringWriter trace = new StringWriter();
        e.printStackTrace(new PrintWriter(trace));
        err.println("tracewright: a bug in the program: " + e + "; " + keep(trace.toString()));
        return ExitStatus.FAILED;
    }

    private static String keep(String trace) {
        Path file = Path.of(TRACE_FILE).toAbsolutePath();
        try {
            Files.write(file, List.of(trace));
            return "the stack trace is in " + file;
        } catch (IOException e) {
            return "its stack trace could not be written to " + file + ":\n" + trace;
        }
    }
}
