package tracewright.readers;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.BitSet;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.function.Predicate;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** HDF5 files of one path template: one for everything, one for each stream or one for each configuration. */
final class Hdf5Family implements Family {

    /** One file and the configurations on its configuration axis. */
    private record DataFile(PathTemplate.Match match, List<ConfigurationId> ids) {
        Path path() {
            return match.file();
        }
    }

    private final Ensemble ensemble;
    private final Layout.Files.Hdf5 declared;
    private final long oneMapping;
    private final List<DataFile> files = new ArrayList<>();
    private final Map<Layout.Dataset, String> words = new HashMap<>();
    private int ignored;

    private Hdf5Family(Ensemble ensemble, Layout.Files.Hdf5 declared, long oneMapping) {
        this.ensemble = ensemble;
        this.declared = declared;
        this.oneMapping = oneMapping;
    }

    /** Finds the files, reads labels and source times and checks every shape; no number of a dataset is read. */
    static Hdf5Family open(Ensemble ensemble, Layout.Files.Hdf5 declared, List<Layout.Dataset> datasets, long oneMapping, Complaints complaints) {
        Hdf5Family family = new Hdf5Family(ensemble, declared, oneMapping);
        Map<ConfigurationId, String> seen = new HashMap<>();
        for (PathTemplate.Match match : family.scan(complaints)) {
            complaints.attempt(() -> family.checkFile(match, datasets, seen, complaints));
        }
        return family;
    }

    private List<PathTemplate.Match> scan(Complaints complaints) {
        Scanned scanned = Scanned.of(ensemble, declared.path(), Scanned.digitPlaceholders(declared), complaints);
        ignored = scanned.ignored();
        return scanned.matches();
    }

    private void checkFile(PathTemplate.Match match, List<Layout.Dataset> datasets, Map<ConfigurationId, String> seen, Complaints complaints) {
        String where = Where.file(ensemble.name(), match.file());
        try (Hdf5File file = Hdf5File.open(match.file(), ensemble.name(), oneMapping)) {
            List<ConfigurationId> ids = Labels.read(declared, match.labels(), file, where);
            files.add(new DataFile(match, ids));
            checkDuplicates(ids, where, seen, complaints);
            for (Layout.Dataset dataset : datasets) {
                complaints.attempt(() -> words.putIfAbsent(dataset, Hdf5Plan.of(ensemble.layout(), dataset, ids.size(), file).inWords()));
            }
        }
    }

    private static void checkDuplicates(List<ConfigurationId> ids, String where, Map<ConfigurationId, String> seen, Complaints complaints) {
        for (int k = 0; k < ids.size(); k++) {
            String here = where + ", entry " + k;
            String before = seen.putIfAbsent(ids.get(k), here);
            if (before != null) {
                complaints.add("configuration " + ids.get(k) + " occurs twice", before + "; and " + here,
                    "correct the labels, or take one of the two away: a repeated configuration makes errors too small");
            }
        }
    }

    @Override
    public List<Path> files() {
        return files.stream().map(DataFile::path).toList();
    }

    @Override
    public int ignored() {
        return ignored;
    }

    @Override
    public List<ConfigurationId> configurations(Layout.Dataset dataset) {
        return files.stream().flatMap(f -> f.ids().stream()).toList();
    }

    @Override
    public String inWords(Layout.Dataset dataset) {
        return words.getOrDefault(dataset, "dataset " + Hdf5Plan.path(dataset));
    }

    @Override
    public void read(List<Layout.Dataset> wanted, Predicate<ConfigurationId> configurations, Delivery delivery) {
        Buffers buffers = new Buffers();
        for (DataFile f : files) {
            if (f.ids().stream().anyMatch(configurations)) {
                delivery.complaints().attempt(() -> readFile(f, wanted, configurations, delivery, buffers));
            }
        }
    }

    private void readFile(DataFile f, List<Layout.Dataset> wanted, Predicate<ConfigurationId> configurations, Delivery delivery, Buffers buffers) {
        try (Hdf5File file = Hdf5File.open(f.path(), ensemble.name(), oneMapping)) {
            for (Layout.Dataset dataset : wanted) {
                delivery.complaints().attempt(() -> {
                    Hdf5Plan plan = Hdf5Plan.of(ensemble.layout(), dataset, f.ids().size(), file);
                    readDataset(file, plan, f.ids(), configurations, delivery, buffers);
                });
            }
        }
    }

    private static void readDataset(Hdf5File file, Hdf5Plan plan, List<ConfigurationId> ids, Predicate<ConfigurationId> configurations,
        Delivery delivery, Buffers buffers) {
        BitSet chosen = new BitSet();
        for (int i = 0; i < ids.size(); i++) {
            chosen.set(i, configurations.test(ids.get(i)));
        }
        int slab = plan.axis() < 0 ? 1 : plan.array().slab(plan.axis());
        for (int from = 0; from < ids.size(); from += slab) {
            BitSet part = chosen.get(from, Math.min(ids.size(), from + slab));
            if (!part.isEmpty()) {
                readSlab(file, plan, from, part, ids, delivery, buffers);
            }
        }
    }

    /** @param part chosen configurations, counted from {@code from} */
    private static void readSlab(Hdf5File file, Hdf5Plan plan, int from, BitSet part, List<ConfigurationId> ids, Delivery delivery, Buffers buffers) {
        String name = Hdf5Plan.path(plan.dataset());
        int first = part.nextSetBit(0);
        int count = part.length() - first;
        double[] in = buffers.in(count * plan.length());
        BitSet missing = file.read(plan.array(), name, plan.axis(), plan.axis() < 0 ? 0 : from + first, count, in);
        for (int i = first; i >= 0; i = part.nextSetBit(i + 1)) {
            ConfigurationId id = ids.get(from + i);
            if (missing.get(i - first)) {
                delivery.complaints().add("a part of this configuration was never written (missing chunk)", Where.configuration(file.where(name), id),
                    "measure the configuration again, or exclude it by the study's cuts");
                continue;
            }
            int[] sources = plan.sources().of(from + i);
            double[] out = buffers.out(sources.length * plan.conversion().kept());
            boolean finite = plan.conversion().apply(in, (i - first) * plan.length(), plan.steps(), sources, out);
            delivery.hand(plan.dataset(), plan.conversion(), id, sources, out, finite, file.where(name));
        }
    }
}
