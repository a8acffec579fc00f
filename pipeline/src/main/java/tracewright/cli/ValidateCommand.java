package tracewright.cli;

import java.io.PrintWriter;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Spec;
import tracewright.analysis.DataCheck;
import tracewright.readers.EnsembleFiles;
import tracewright.study.InputException;
import tracewright.study.Problem;
import tracewright.study.Study;

/** Reads everything that a run would read, computes nothing, and lists all problems at once. */
@Command(name = "validate", description = "Read everything, compute nothing, list all problems at once.", mixinStandardHelpOptions = true,
    footer = {"", "example: tracewright validate configs/sample.yaml"})
final class ValidateCommand implements Callable<Integer> {

    @Mixin
    private StudyOptions options;

    @Spec
    private CommandSpec spec;

    @Override
    public Integer call() {
        Study study = options.study();
        List<EnsembleFiles> files = StudyOptions.open(study);
        PrintWriter terminal = spec.commandLine().getOut();
        List<Problem> problems = new ArrayList<>();
        InputException.Cause cause = InputException.Cause.DATA;
        for (int i = 0; i < files.size(); i++) {
            EnsembleFiles source = files.get(i);
            terminal.println("ensemble " + source.name() + ": " + source.timeExtent() + " time slices, " + source.spatialExtent() + " sites in space, "
                + source.inputFiles().size() + " files");
            source.inWords().forEach(line -> terminal.println("  " + line));
            try {
                terminal.println("  " + DataCheck.read(study, study.ensembles().get(i), source));
            } catch (InputException e) {
                problems.addAll(e.problems());
                cause = e.reason();
            }
        }
        terminal.flush();
        if (!problems.isEmpty()) {
            throw new InputException(cause, problems);
        }
        terminal.println("no problems");
        return ExitStatus.DONE;
    }
}
