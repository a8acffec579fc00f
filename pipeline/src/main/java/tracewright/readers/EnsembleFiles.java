package tracewright.readers;

import static java.util.Objects.requireNonNull;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.function.Predicate;
import java.util.stream.Collectors;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.Observable;

/**
 * An ensemble on disk, as its layout describes it. Opening finds the files, reads labels and source times and checks the shape of
 * every dataset; numbers are read by {@link #read} alone, a slab of configurations at a time. Immutable; holds no file open.
 */
public final class EnsembleFiles implements EnsembleSource {

    private final Ensemble ensemble;
    private final Map<String, Family> families;
    private final Map<Observable, List<ConfigurationId>> configurations = new LinkedHashMap<>();

    private EnsembleFiles(Ensemble ensemble, Map<String, Family> families) {
        this.ensemble = ensemble;
        this.families = families;
        for (Layout.Dataset d : ensemble.layout().datasets()) {
            configurations.put(d.observable(), families.get(d.stored().files()).configurations(d).stream().sorted().toList());
        }
    }

    /**
     * @param layoutFile file that the layout was read from, for messages
     * @param dataFolder folder from which the layout's path templates start
     * @throws InputException with every problem found: cause USAGE if the layout contradicts itself, else DATA
     */
    public static EnsembleFiles open(String ensemble, Layout layout, Path layoutFile, Path dataFolder) {
        return open(ensemble, layout, layoutFile, dataFolder, Hdf5File.ONE_MAPPING);
    }

    /** @param oneMapping longest HDF5 file that is mapped as a whole, in bytes */
    static EnsembleFiles open(String name, Layout layout, Path layoutFile, Path dataFolder, long oneMapping) {
        Ensemble ensemble = new Ensemble(requireNonNull(name, "ensemble"), requireNonNull(layout, "layout"),
            requireNonNull(layoutFile, "layoutFile"), requireNonNull(dataFolder, "dataFolder"));
        Complaints ofLayout = new Complaints();
        new LayoutCheck(ensemble, ofLayout).run();
        ofLayout.throwIfAny(InputException.Cause.USAGE);

        Complaints ofData = new Complaints();
        Map<String, Family> families = new LinkedHashMap<>();
        layout.files().forEach((family, files) -> {
            List<Layout.Dataset> datasets = layout.datasets().stream().filter(d -> d.stored().files().equals(family)).toList();
            if (!datasets.isEmpty()) {
                families.put(family, open(ensemble, files, datasets, oneMapping, ofData));
            }
        });
        ofData.throwIfAny(InputException.Cause.DATA);
        return new EnsembleFiles(ensemble, families);
    }

    private static Family open(Ensemble ensemble, Layout.Files files, List<Layout.Dataset> datasets, long oneMapping, Complaints complaints) {
        return files instanceof Layout.Files.Hdf5 h ? Hdf5Family.open(ensemble, h, datasets, oneMapping, complaints)
            : CsvFamily.open(ensemble, (Layout.Files.Csv) files, datasets, complaints);
    }

    @Override
    public String name() {
        return ensemble.name();
    }

    @Override
    public int timeExtent() {
        return ensemble.layout().timeExtent();
    }

    @Override
    public int spatialExtent() {
        return ensemble.layout().spatialExtent();
    }

    @Override
    public List<Observable> observables() {
        return List.copyOf(configurations.keySet());
    }

    @Override
    public List<ConfigurationId> configurations(Observable observable) {
        List<ConfigurationId> known = configurations.get(requireNonNull(observable, "observable"));
        if (known == null) {
            throw new IllegalArgumentException("layout of ensemble " + name() + " has no " + observable.id());
        }
        return known;
    }

    @Override
    public void read(Predicate<Observable> wanted, Predicate<ConfigurationId> chosen, Sink sink) {
        Complaints complaints = new Complaints();
        Delivery delivery = new Delivery(sink, complaints);
        families.forEach((name, family) -> {
            List<Layout.Dataset> datasets = datasetsOf(name).stream().filter(d -> wanted.test(d.observable())).toList();
            if (!datasets.isEmpty()) {
                family.read(datasets, chosen, delivery);
            }
        });
        complaints.throwIfAny(InputException.Cause.DATA);
    }

    private List<Layout.Dataset> datasetsOf(String family) {
        return ensemble.layout().datasets().stream().filter(d -> d.stored().files().equals(family)).toList();
    }

    /** Every file that numbers or labels come from, sorted. */
    public List<Path> inputFiles() {
        return families.values().stream().flatMap(f -> f.files().stream()).distinct().sorted().toList();
    }

    /** How each family and each dataset is read: what it is, where it stands, its shape, and what is done to its numbers. */
    public List<String> inWords() {
        List<String> lines = new ArrayList<>();
        families.forEach((name, family) -> {
            lines.add(familyInWords(name, family));
            for (Layout.Dataset d : datasetsOf(name)) {
                lines.add(d.observable().id() + ": " + Meaning.of(d) + "; " + family.inWords(d) + "; "
                    + Conversion.of(ensemble.layout(), d).inWords().orElse("numbers taken as they are") + "; " + labels(d.observable()));
            }
        });
        return List.copyOf(lines);
    }

    private String familyInWords(String name, Family family) {
        int count = family.files().size();
        String ignored = family.ignored() == 0 ? "" : "; " + family.ignored() + " other entries beside them ignored, their names do not match";
        return "files '" + name + "': " + ensemble.layout().files().get(name).path() + " in the data folder " + ensemble.folder().getFileName() + ", " + count
            + (count == 1 ? " file" : " files") + ignored;
    }

    private String labels(Observable observable) {
        Map<String, List<ConfigurationId>> streams = configurations(observable).stream()
            .collect(Collectors.groupingBy(ConfigurationId::stream, LinkedHashMap::new, Collectors.toList()));
        return streams.entrySet().stream()
            .map(e -> e.getValue().size() + " configurations of stream " + e.getKey() + ", trajectories " + e.getValue().get(0).trajectory() + " to "
                + e.getValue().get(e.getValue().size() - 1).trajectory())
            .collect(Collectors.joining("; "));
    }
}
