package tracewright.cuts;

import java.util.ArrayList;
import java.util.Collections;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.stream.Collectors;
import tracewright.fitters.resampling.Blocking;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Observable;
import tracewright.study.Problem;
import tracewright.study.Study;

/**
 * The configurations on disk or expected there (of any observable, in Monte Carlo order) and which of them the cuts keep. One list holds for
 * all observables of the ensemble.
 */
public final class Selection {

    private final List<ConfigurationId> onDisk;
    private final boolean[] kept;                 // [index in onDisk]
    private final Map<String, Integer> removed;   // by cut, in the order of application
    private final List<String> warnings;

    private Selection(List<ConfigurationId> onDisk, boolean[] kept, Map<String, Integer> removed, List<String> warnings) {
        this.onDisk = List.copyOf(onDisk);
        this.kept = kept;
        this.removed = Collections.unmodifiableMap(removed);
        this.warnings = List.copyOf(warnings);
    }

    /**
     * Applies the cuts of a study to the labels of an ensemble.
     *
     * @param needed observables that the analysis uses; a configuration that one of them lacks is missing
     * @throws InputException with cause USAGE if a cut names an unknown stream, with cause DATA if configurations are missing
     *                        and the cuts say that this is an error, or if nothing is left
     */
    public static Selection of(EnsembleSource source, List<Observable> needed, Study.Ensemble settings) {
        Study.Cuts cuts = settings.cuts();
        TreeSet<ConfigurationId> union = new TreeSet<>(expected(settings));
        Map<Observable, Set<ConfigurationId>> byObservable = new LinkedHashMap<>();
        for (Observable o : needed) {
            Set<ConfigurationId> there = new HashSet<>(source.configurations(o));
            byObservable.put(o, there);
            union.addAll(there);
        }
        List<ConfigurationId> onDisk = new ArrayList<>(union);
        checkStreams(source.name(), onDisk, cuts);
        boolean[] kept = new boolean[onDisk.size()];
        Map<String, Integer> removed = emptyCounts();
        Map<ConfigurationId, String> missing = new TreeMap<>();
        for (int i = 0; i < kept.length; i++) {
            ConfigurationId c = onDisk.get(i);
            String cut = cutThatRemoves(c, cuts);
            if (cut.isEmpty()) {
                String lacking = byObservable.entrySet().stream().filter(e -> !e.getValue().contains(c)).map(e -> e.getKey().id())
                    .collect(Collectors.joining(", "));
                if (!lacking.isEmpty()) {
                    missing.put(c, lacking);
                    cut = "missing";
                }
            }
            kept[i] = cut.isEmpty();
            if (!kept[i]) {
                removed.merge(cut, 1, Integer::sum);
            }
        }
        refuseMissing(source.name(), missing, cuts);
        List<String> warnings = new ArrayList<>();
        if (!missing.isEmpty()) {
            warnings.add(source.name() + ": " + missing.size() + " configurations dropped because an observable lacks them (first: "
                + missing.keySet().iterator().next() + " lacks " + missing.values().iterator().next() + ")");
        }
        unmatchedExclusions(source.name(), onDisk, cuts, warnings);
        Selection selection = new Selection(onDisk, kept, removed, warnings);
        if (selection.count() == 0) {
            throw new InputException(InputException.Cause.USAGE, List.of(new Problem(
                "the cuts of ensemble " + source.name() + " leave none of its " + onDisk.size() + " configurations; removed by cut: " + removed,
                "cuts of ensemble " + source.name(), "relax the cut that removed most")));
        }
        return selection;
    }

    /** Configurations that the study says have to be there. */
    private static List<ConfigurationId> expected(Study.Ensemble settings) {
        List<ConfigurationId> ids = new ArrayList<>();
        for (Study.Expected e : settings.expect()) {
            for (long n = e.first(); n <= e.last(); n += e.step()) {
                ids.add(new ConfigurationId(e.stream(), n));
            }
        }
        return ids;
    }

    private static Map<String, Integer> emptyCounts() {
        Map<String, Integer> counts = new LinkedHashMap<>();
        for (String cut : List.of("streams", "ranges", "thermalization", "stride", "exclude", "missing")) {
            counts.put(cut, 0);
        }
        return counts;
    }

    /** Name of the first cut that removes a configuration, empty if none does. */
    private static String cutThatRemoves(ConfigurationId c, Study.Cuts cuts) {
        long n = c.trajectory();
        if (cuts.streams().isPresent() && !cuts.streams().get().contains(c.stream())) {
            return "streams";
        }
        if (!cuts.ranges().isEmpty() && cuts.ranges().stream().noneMatch(r -> r.first() <= n && n <= r.last())) {
            return "ranges";
        }
        if (n < cuts.thermalization()) {
            return "thermalization";
        }
        if (n % cuts.stride() != 0) {
            return "stride";
        }
        return cuts.exclude().stream().anyMatch(e -> matches(e, c)) ? "exclude" : "";
    }

    private static boolean matches(Study.Exclusion e, ConfigurationId c) {
        return e.stream().equals(c.stream()) && e.first() <= c.trajectory() && c.trajectory() <= e.last();
    }

    private static void checkStreams(String ensemble, List<ConfigurationId> onDisk, Study.Cuts cuts) {
        Set<String> known = onDisk.stream().map(ConfigurationId::stream).collect(Collectors.toCollection(TreeSet::new));
        Set<String> asked = new TreeSet<>(cuts.streams().orElse(List.of()));
        cuts.exclude().forEach(e -> asked.add(e.stream()));
        asked.removeAll(known);
        if (!asked.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, List.of(new Problem(
                "the cuts of ensemble " + ensemble + " name the streams " + asked + ", which are not on disk; there are " + known,
                "cuts of ensemble " + ensemble, "write one of " + known)));
        }
    }

    private static void refuseMissing(String ensemble, Map<ConfigurationId, String> missing, Study.Cuts cuts) {
        if (missing.isEmpty() || cuts.missing() == Study.Cuts.Missing.DROP) {
            return;
        }
        List<Problem> problems = new ArrayList<>();
        missing.forEach((c, lacking) -> problems.add(new Problem(
            "configuration " + c + " of ensemble " + ensemble + " is missing for " + lacking,
            "ensemble " + ensemble + ", stream " + c.stream() + ", trajectory " + c.trajectory(),
            "restore its file or rows, exclude it with cuts.exclude: [" + c + "], or drop all such with cuts.missing: drop")));
        throw new InputException(InputException.Cause.DATA, problems);
    }

    private static void unmatchedExclusions(String ensemble, List<ConfigurationId> onDisk, Study.Cuts cuts, List<String> warnings) {
        for (Study.Exclusion e : cuts.exclude()) {
            if (onDisk.stream().noneMatch(c -> matches(e, c))) {
                warnings.add(ensemble + ": the exclusion " + e.stream() + ":" + e.first() + ".." + e.last() + " matches no configuration on disk");
            }
        }
    }

    /** All configurations of any needed observable, in Monte Carlo order. */
    public List<ConfigurationId> onDisk() {
        return onDisk;
    }

    /** Whether configuration {@code index} of {@link #onDisk()} takes part. */
    public boolean kept(int index) {
        return kept[index];
    }

    /** Number of configurations kept. */
    public int count() {
        int n = 0;
        for (boolean k : kept) {
            n += k ? 1 : 0;
        }
        return n;
    }

    /** Configurations removed, by cut, in the order in which the cuts are applied. */
    public Map<String, Integer> removed() {
        return removed;
    }

    /** Configurations kept, by stream. */
    public Map<String, Integer> streams() {
        Map<String, Integer> counts = new TreeMap<>();
        for (int i = 0; i < kept.length; i++) {
            if (kept[i]) {
                counts.merge(onDisk.get(i).stream(), 1, Integer::sum);
            }
        }
        return counts;
    }

    public List<String> warnings() {
        return warnings;
    }

    /** Blocks of the given length in trajectories, on the grid anchored at trajectory zero of each stream. */
    public Blocking blocks(int length) {
        List<String> streams = onDisk.stream().map(ConfigurationId::stream).toList();
        long[] trajectories = onDisk.stream().mapToLong(ConfigurationId::trajectory).toArray();
        return Blocking.anchored(streams, trajectories, kept, length);
    }

    /** Distance of neighbouring survivors in trajectories: the smallest one found in any stream; 1 where no stream keeps two. */
    public long spacing() {
        long smallest = Long.MAX_VALUE;
        int last = -1;
        for (int i = 0; i < kept.length; i++) {
            if (kept[i]) {
                if (last >= 0 && onDisk.get(i).stream().equals(onDisk.get(last).stream())) {
                    smallest = Math.min(smallest, onDisk.get(i).trajectory() - onDisk.get(last).trajectory());
                }
                last = i;
            }
        }
        return smallest == Long.MAX_VALUE ? 1 : smallest;
    }
}
