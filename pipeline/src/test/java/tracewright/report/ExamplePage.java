package tracewright.report;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.io.Writer;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Map;

/** Writes the example report and its plots into a folder, to be looked at in a browser after a change of its looks. */
final class ExamplePage {

    private ExamplePage() {
    }

    public static void main(String[] arguments) throws IOException {
        Path folder = Files.createDirectories(Path.of(arguments[0]));
        try (Writer out = Files.newBufferedWriter(folder.resolve("report.html"), StandardCharsets.UTF_8)) {
            HtmlReport.write(ExampleResults.results(), new Provenance("0.1.0", Map.of("study file", "sha-256 5f0c61\u2026")), out);
        }
        Files.createDirectories(folder.resolve("plots"));
        ExampleResults.results().figures().forEach(f -> write(folder.resolve("plots").resolve(f.id() + ".svg"), SvgPlot.standalone(f)));
    }

    private static void write(Path file, String text) {
        try {
            Files.writeString(file, text, StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
