package tracewright.cli;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.OutputStream;
import java.io.OutputStreamWriter;
import java.io.PrintWriter;
import java.io.Writer;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.time.Instant;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;
import tracewright.analysis.Analysis;
import tracewright.readers.EnsembleFiles;
import tracewright.report.HtmlReport;
import tracewright.report.SvgPlot;
import tracewright.results.BudgetCsv;
import tracewright.results.BudgetTable;
import tracewright.results.Figure;
import tracewright.results.FigureCsv;
import tracewright.results.OutputFolder;
import tracewright.results.Provenance;
import tracewright.results.Results;
import tracewright.results.ResultsJson;
import tracewright.results.SamplesHdf5;
import tracewright.study.InputException;
import tracewright.study.ResolvedText;
import tracewright.study.Study;

/** Analyses the ensembles of a study and writes an output folder. */
@Command(name = "run", description = "Analyse the ensembles of a study, write results and report.", mixinStandardHelpOptions = true,
    footer = {"", "example: tracewright run configs/sample.yaml --out sample-results --threads 2"})
final class RunCommand implements Callable<Integer> {

    @Mixin
    private StudyOptions options;

    @Option(names = "--out", paramLabel = "DIR", description = "output folder (default: <name of the study>-results in the current folder)")
    private Path out;

    @Option(names = "--threads", paramLabel = "N", description = "number of threads (default: number of processors); results do not depend on it")
    private int threads = Runtime.getRuntime().availableProcessors();

    @Option(names = "--quiet", description = "print nothing but errors")
    private boolean quiet;

    @Option(names = "--json", description = "print results.json on standard output instead of the tables")
    private boolean json;

    @Spec
    private CommandSpec spec;

    @Override
    public Integer call() throws IOException {
        if (threads < 1) {
            throw new ParameterException(spec.commandLine(), "--threads needs one or more; got " + threads);
        }
        Instant start = Instant.now();
        PrintWriter err = spec.commandLine().getErr();
        RunLog log = new RunLog(err, !quiet && Boolean.getBoolean("tracewright.tty"));
        Study study = options.study();
        Path folder = out != null ? out : Path.of(study.name() + "-results");
        try (OutputFolder output = OutputFolder.open(folder)) {
            List<EnsembleFiles> files = StudyOptions.open(study);
            Results results = Analysis.run(study, StudyOptions.sources(files), threads, log);
            byte[] resultsJson = bytes(stream -> ResultsJson.write(results, stream));
            write(study, files, results, resultsJson, output, log, start);
            output.commit();
            print(results, resultsJson, folder, err);
            return verdict(study, results);
        }
    }

    private void write(Study study, List<EnsembleFiles> files, Results results, byte[] resultsJson, OutputFolder output, RunLog log, Instant start) throws IOException {
        log.accept("writing " + results.quantities().size() + " quantities, " + results.budgets().size() + " budgets, " + results.figures().size() + " plots");
        output.write("budget.csv", stream -> BudgetCsv.write(results, stream));
        output.writeFile("samples.h5", file -> SamplesHdf5.write(results, file));
        for (Figure figure : results.figures()) {
            output.write("plots/" + figure.id() + ".csv", stream -> FigureCsv.write(figure, stream));
            output.write("plots/" + figure.id() + ".svg", stream -> stream.write(SvgPlot.standalone(figure).getBytes(StandardCharsets.UTF_8)));
        }
        output.write("report.html", stream -> {
            Writer writer = new OutputStreamWriter(stream, StandardCharsets.UTF_8);
            HtmlReport.write(results, writer);
            writer.flush();
        });
        Provenance provenance = new Provenance(ResolvedText.of(study), overrides(), inputs(study, files), Provenance.cutsOf(results), start, Instant.now());
        output.write("provenance.json", provenance::write);
        output.write("results.json", stream -> stream.write(resultsJson));
        log.accept("done");
        output.write("run.log", stream -> stream.write(log.bytes()));
    }

    private List<String> overrides() {
        return options.overrides.entrySet().stream().map(e -> e.getKey() + "=" + e.getValue()).toList();
    }

    /** Digests of the study, the layouts and every data file; paths relative to the study's folder. */
    private List<Provenance.InputFile> inputs(Study study, List<EnsembleFiles> files) throws IOException {
        Path base = options.studyFile.toAbsolutePath().normalize().getParent();
        List<Path> paths = new ArrayList<>();
        paths.add(options.studyFile.toAbsolutePath().normalize());
        study.ensembles().forEach(e -> paths.add(e.layout()));
        files.forEach(f -> paths.addAll(f.inputFiles()));
        List<Provenance.InputFile> inputs = new ArrayList<>();
        for (Path p : paths.stream().map(p -> p.toAbsolutePath().normalize()).distinct().toList()) {
            inputs.add(Provenance.InputFile.of(base.relativize(p).toString(), p));
        }
        return inputs;
    }

    private void print(Results results, byte[] resultsJson, Path folder, PrintWriter err) {
        PrintWriter terminal = spec.commandLine().getOut();
        if (json) {
            terminal.print(new String(resultsJson, StandardCharsets.UTF_8));
        } else if (!quiet) {
            terminal.println(BudgetTable.text(results, "trace"));
            terminal.println(BudgetTable.text(results, "trace-scheme"));
            terminal.println("written to " + folder + ": results.json, budget.csv, samples.h5, report.html, plots, run.log, provenance.json");
        }
        terminal.flush();
        if (!quiet) {
            results.warnings().forEach(w -> err.println("warning: " + w));
        }
    }

    /** Exit status after the study's own requirements, which are judged when everything is written. */
    private int verdict(Study study, Results results) {
        Verdict verdict = Verdict.of(study, results);
        if (!verdict.problems().isEmpty()) {
            throw new InputException(InputException.Cause.REQUIREMENT, verdict.problems());
        }
        return ExitStatus.DONE;
    }

    private interface Writing {
        void to(OutputStream out) throws IOException;
    }

    private static byte[] bytes(Writing body) throws IOException {
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        body.to(bytes);
        return bytes.toByteArray();
    }
}
