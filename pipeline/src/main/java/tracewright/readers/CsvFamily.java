package tracewright.readers;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import java.util.function.Predicate;
import tracewright.study.ConfigurationId;
import tracewright.study.Layout;

/** CSV tables of one path template. Opening passes once over the labels of every row; reading passes again, with the numbers. */
final class CsvFamily implements Family {

    private final Ensemble ensemble;
    private final Layout.Files.Csv declared;
    private final Scanned scanned;
    private final Set<Path> quoted = new HashSet<>();
    private final Map<Layout.Dataset, List<ConfigurationId>> configurations = new HashMap<>();

    private CsvFamily(Ensemble ensemble, Layout.Files.Csv declared, Scanned scanned) {
        this.ensemble = ensemble;
        this.declared = declared;
        this.scanned = scanned;
    }

    /** Finds the tables and passes over their labels: columns, configurations, and each row's place exactly once. */
    static CsvFamily open(Ensemble ensemble, Layout.Files.Csv declared, List<Layout.Dataset> datasets, Complaints complaints) {
        Scanned scanned = Scanned.of(ensemble, declared.path(), Scanned.digitPlaceholders(declared), complaints);
        CsvFamily family = new CsvFamily(ensemble, declared, scanned);
        datasets.forEach(d -> family.configurations.put(d, new ArrayList<>()));
        Map<ConfigurationId, String> seen = new HashMap<>();
        boolean whole = !scanned.matches().isEmpty();
        for (PathTemplate.Match match : scanned.matches()) {
            whole &= complaints.attempt(() -> family.labels(match, datasets, seen, complaints));
        }
        if (whole) {
            datasets.forEach(d -> family.checkAny(d, complaints));
        }
        return family;
    }

    private void checkAny(Layout.Dataset d, Complaints complaints) {
        if (configurations.get(d).isEmpty()) {
            Map<String, String> filter = new TreeMap<>(d.stored().where());
            complaints.add("no row of " + d.observable().id() + (filter.isEmpty() ? "" : ": none holds " + filter),
                Where.file(ensemble.name(), scanned.matches().get(0).file()), "correct where in the layout, or take the dataset out of it");
        }
    }

    private void labels(PathTemplate.Match match, List<Layout.Dataset> datasets, Map<ConfigurationId, String> seen, Complaints complaints) {
        CsvPass pass = labelPass(match, datasets);
        pass.complaints().forEach(complaints::add);
        pass.found().forEach((d, ids) -> configurations.get(d).addAll(ids));
        pass.lines().forEach((id, line) -> {
            String here = Where.line(match.file().toString(), line);
            String before = seen.putIfAbsent(id, here);
            if (before != null) {
                complaints.add("configuration " + id + " occurs twice", "ensemble " + ensemble.name() + ", " + before + "; and " + here,
                    "correct the labels, or take one of the two away: a repeated configuration makes errors too small");
            }
        });
    }

    /** A quote met on the way sends the table through the slower reader, from the start, with nothing kept of the first try. */
    private CsvPass labelPass(PathTemplate.Match match, List<Layout.Dataset> datasets) {
        try {
            return pass(match, datasets, false).run(id -> true, null);
        } catch (CsvRows.QuoteMet e) {
            quoted.add(match.file());
            return pass(match, datasets, true).run(id -> true, null);
        }
    }

    private CsvPass pass(PathTemplate.Match match, List<Layout.Dataset> datasets, boolean quotes) {
        return new CsvPass(ensemble, declared, match, datasets, quotes);
    }

    @Override
    public List<Path> files() {
        return scanned.matches().stream().map(PathTemplate.Match::file).toList();
    }

    @Override
    public int ignored() {
        return scanned.ignored();
    }

    @Override
    public List<ConfigurationId> configurations(Layout.Dataset dataset) {
        return List.copyOf(configurations.get(dataset));
    }

    @Override
    public String inWords(Layout.Dataset dataset) {
        Map<String, String> filter = new TreeMap<>(dataset.stored().where());
        return "column " + dataset.stored().value().orElseThrow() + (filter.isEmpty() ? "" : " of rows with " + filter)
            + (declared.columns().containsKey(Layout.Column.HIT) ? ", averaged over hits" : "");
    }

    @Override
    public void read(List<Layout.Dataset> wanted, Predicate<ConfigurationId> chosen, Delivery delivery) {
        for (PathTemplate.Match match : scanned.matches()) {
            delivery.complaints().attempt(() -> {
                CsvPass pass = pass(match, wanted, quoted.contains(match.file())).run(chosen, delivery);
                pass.complaints().forEach(delivery.complaints()::add);
            });
        }
    }
}
