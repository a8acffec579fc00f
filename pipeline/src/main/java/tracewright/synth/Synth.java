package tracewright.synth;

import java.nio.file.Path;
import java.util.LinkedHashMap;
import java.util.Map;
import tracewright.study.Layout;

/** Writes all ensembles of a truth into a folder, each in its own layout, with the exact values beside them. */
public final class Synth {

    private Synth() {
    }

    /**
     * Writes {@code <out>/<ensemble>/...}, a {@code truth.json} in each ensemble's folder and one for everything, a page for
     * people, and the list of all files with their digests. The same truth gives the same bytes.
     *
     * @param layouts by name of the ensemble
     * @throws tracewright.study.InputException if the folder holds anything but the files of a former run
     */
    public static void write(Truth truth, Map<String, Layout> layouts, Path out) {
        OutputFolder folder = new OutputFolder(out);
        folder.check();
        folder.write(files(truth, layouts));
    }

    /** The files that {@link #write} writes, by path relative to its folder. */
    public static Map<String, byte[]> files(Truth truth, Map<String, Layout> layouts) {
        Map<String, byte[]> files = new LinkedHashMap<>();
        files.put(TruthPage.FILE, TruthPage.of(truth));
        files.put(TruthJson.FILE, TruthJson.all(truth));
        for (Truth.Ensemble ensemble : truth.ensembles()) {
            Layout layout = layouts.get(ensemble.name());
            Checks.layout(layout != null, "no layout for ensemble " + ensemble.name());
            SyntheticEnsemble generated = SyntheticEnsemble.generate(truth, ensemble.name());
            SynthWriter.files(generated, layout, ensemble.width(), truth.seed())
                .forEach((name, bytes) -> files.put(ensemble.name() + "/" + name, bytes));
            files.put(ensemble.name() + "/" + TruthJson.FILE, TruthJson.of(truth, ensemble));
        }
        return files;
    }
}
