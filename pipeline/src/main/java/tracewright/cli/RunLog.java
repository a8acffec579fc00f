package tracewright.cli;

import java.io.PrintWriter;
import java.nio.charset.StandardCharsets;
import java.util.Locale;
import java.util.function.Consumer;

/** Lines about the progress of a run, with the seconds since its start; safe for several threads. */
final class RunLog implements Consumer<String> {

    private final StringBuffer lines = new StringBuffer();
    private final long start = System.nanoTime();
    private final PrintWriter terminal;
    private final boolean show;

    /** @param show whether lines also go to the terminal as they come */
    RunLog(PrintWriter terminal, boolean show) {
        this.terminal = terminal;
        this.show = show;
    }

    @Override
    public void accept(String line) {
        lines.append(String.format(Locale.ROOT, "%8.2f s  %s%n", (System.nanoTime() - start) * 1e-9, line));
        if (show) {
            terminal.println("tracewright: " + line);
        }
    }

    byte[] bytes() {
        return lines.toString().getBytes(StandardCharsets.UTF_8);
    }
}
