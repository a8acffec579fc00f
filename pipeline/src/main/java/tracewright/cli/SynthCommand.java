package tracewright.cli;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import picocli.CommandLine.Spec;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.LayoutFile;
import tracewright.study.Problem;
import tracewright.study.RecordFile;
import tracewright.synth.Synth;
import tracewright.synth.Truth;

/** Writes synthetic ensembles whose exact budget is known. */
@Command(name = "synth", description = "Write synthetic ensembles whose exact budget is known.", mixinStandardHelpOptions = true,
    footer = {"", "example: tracewright synth configs/sample-truth.yaml --out my-sample"})
final class SynthCommand implements Callable<Integer> {

    @Parameters(index = "0", paramLabel = "STUDY-OF-TRUTH", description = "the invented theory and its ensembles (YAML)")
    private Path truthFile;

    @Option(names = "--out", paramLabel = "DIR", description = "folder for the ensembles (default: ${DEFAULT-VALUE})", defaultValue = "sample-data")
    private Path out;

    @Spec
    private CommandSpec spec;

    @Override
    public Integer call() {
        Truth truth = RecordFile.read(truthFile, Truth.class);
        Map<String, Layout> layouts = new LinkedHashMap<>();
        List<Problem> problems = new ArrayList<>();
        for (Truth.Ensemble e : truth.ensembles()) {
            try {
                layouts.put(e.name(), LayoutFile.read(e.layout()));
            } catch (InputException x) {
                problems.addAll(x.problems());
            }
        }
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
        Synth.write(truth, layouts, out);
        spec.commandLine().getOut().println("written to " + out + ": " + String.join(", ", layouts.keySet()) + ", each with truth.json beside its data");
        return ExitStatus.DONE;
    }
}
