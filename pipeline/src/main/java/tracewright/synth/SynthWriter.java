package tracewright.synth;

import java.util.LinkedHashMap;
import java.util.Map;
import tracewright.study.Layout;

/** Turns a synthetic ensemble into files as a layout describes them; nothing touches the disk here. */
public final class SynthWriter {

    private SynthWriter() {
    }

    /**
     * Files by path relative to the ensemble's folder, in the order of the layout's families.
     *
     * @param seed of the imaginary parts, which are noise without meaning
     */
    public static Map<String, byte[]> files(SyntheticEnsemble ensemble, Layout layout, Truth.Width width, long seed) {
        Records records = new Records(ensemble, layout);
        Map<String, byte[]> files = new LinkedHashMap<>();
        layout.files().forEach((name, family) -> {
            if (family instanceof Layout.Files.Csv csv) {
                files.put(csv.path(), new CsvFamily(records, layout, name, width).bytes());
            } else {
                files.putAll(new Hdf5Family(records, layout, name, width, seed).files());
            }
        });
        return files;
    }
}
