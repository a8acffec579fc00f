package tracewright.tests;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.TimeUnit;

/** Runs the packaged program in a process of its own, as a user would. */
final class Program {

    /** Root of the checkout; tests run in the folder of their module. */
    static final Path ROOT = Path.of("..").toAbsolutePath().normalize();

    private static final Path JAR = ROOT.resolve("pipeline/target/tracewright.jar");
    private static final long MINUTES = 5;

    private Program() {
    }

    /** Exit status and what was printed. */
    record Ended(int status, String out, String err) {
    }

    static Ended run(Path folder, String... arguments) throws IOException, InterruptedException {
        if (!Files.exists(JAR)) {
            throw new IllegalStateException(JAR + " is missing; these tests run after packaging: mvn verify");
        }
        List<String> command = new ArrayList<>(List.of(Path.of(System.getProperty("java.home"), "bin", "java").toString(), "-Xmx448m", "-XX:+UseSerialGC", "-jar",
            JAR.toString()));
        command.addAll(List.of(arguments));
        Path out = Files.createTempFile("out", ".txt");
        Path err = Files.createTempFile("err", ".txt");
        try {
            Process process = new ProcessBuilder(command).directory(folder.toFile()).redirectOutput(out.toFile()).redirectError(err.toFile()).start();
            if (!process.waitFor(MINUTES, TimeUnit.MINUTES)) {
                process.destroyForcibly();
                throw new IllegalStateException("no end after " + MINUTES + " minutes: " + command);
            }
            return new Ended(process.exitValue(), Files.readString(out, StandardCharsets.UTF_8), Files.readString(err, StandardCharsets.UTF_8));
        } finally {
            Files.delete(out);
            Files.delete(err);
        }
    }
}
