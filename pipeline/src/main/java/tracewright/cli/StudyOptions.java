package tracewright.cli;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import tracewright.readers.EnsembleFiles;
import tracewright.readers.EnsembleSource;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.LayoutFile;
import tracewright.study.Problem;
import tracewright.study.Study;
import tracewright.study.StudyFile;

/** Options that every command on a study has, and how the study and its data are opened. */
final class StudyOptions {

    @Parameters(index = "0", paramLabel = "STUDY", description = "study file (YAML)")
    Path studyFile;

    @Option(names = "--set", paramLabel = "KEY=VALUE", description = "replace one key of the study, for instance ensembles.alder.cuts.thermalization=100; may be repeated")
    Map<String, String> overrides = new LinkedHashMap<>();

    Study study() {
        return StudyFile.read(studyFile, overrides);
    }

    /** Opens the files of every ensemble; reports the problems of all. */
    static List<EnsembleFiles> open(Study study) {
        List<EnsembleFiles> files = new ArrayList<>();
        List<Problem> problems = new ArrayList<>();
        InputException.Cause cause = InputException.Cause.DATA;
        for (Study.Ensemble e : study.ensembles()) {
            try {
                Layout layout = LayoutFile.read(e.layout());
                files.add(EnsembleFiles.open(e.name(), layout, e.layout(), e.data()));
            } catch (InputException x) {
                problems.addAll(x.problems());
                cause = x.reason() == InputException.Cause.USAGE ? x.reason() : cause;
            }
        }
        if (!problems.isEmpty()) {
            throw new InputException(cause, problems);
        }
        return files;
    }

    static List<EnsembleSource> sources(List<EnsembleFiles> files) {
        return List.copyOf(files);
    }
}
