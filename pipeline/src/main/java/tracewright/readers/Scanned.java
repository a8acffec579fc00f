package tracewright.readers;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import tracewright.study.Layout;
import tracewright.study.Nearest;

/** Files found for one family; finding none is a problem. */
record Scanned(List<PathTemplate.Match> matches, int ignored) {

    static Scanned of(Ensemble ensemble, String template, Set<String> digits, Complaints complaints) {
        String where = "ensemble " + ensemble.name() + ", data folder " + ensemble.folder() + ", path template " + template;
        if (!Files.isDirectory(ensemble.folder())) {
            complaints.add("missing data folder", where, "correct the ensemble's data folder in the study");
            return new Scanned(List.of(), 0);
        }
        try {
            PathTemplate.Scan scan = PathTemplate.of(template, digits).scan(ensemble.folder());
            if (scan.matches().isEmpty()) {
                complaints.add(nothing(template, scan.ignored()), where, remedy(ensemble.folder(), template));
            }
            return new Scanned(scan.matches(), scan.ignored());
        } catch (IOException e) {
            complaints.add("folder cannot be listed: " + e, where, "check its permissions");
            return new Scanned(List.of(), 0);
        }
    }

    private static String nothing(String template, int ignored) {
        return PathTemplate.placeholdersOf(template).isEmpty() ? "missing file" : "no file matches the path template; " + ignored + " other entries were seen";
    }

    /** Names the nearest neighbour of a file that is not there. */
    private static String remedy(Path folder, String template) {
        Path parent = folder.resolve(template).getParent();
        String advice = "put the file there, or correct the path in the layout or the data folder in the study";
        if (!PathTemplate.placeholdersOf(template).isEmpty() || !Files.isDirectory(parent)) {
            return advice;
        }
        try (var entries = Files.list(parent)) {
            String name = folder.resolve(template).getFileName().toString();
            return advice + "; " + Nearest.hint(name, entries.map(p -> p.getFileName().toString()).sorted().toList());
        } catch (IOException e) {
            return advice;
        }
    }

    /** Placeholders that stand for digits: those that trajectory labels come from. */
    static Set<String> digitPlaceholders(Layout.Files files) {
        Set<String> names = new HashSet<>(Set.of("trajectory"));
        if (files instanceof Layout.Files.Hdf5 h && h.trajectory() instanceof Layout.Label.FromPath p) {
            names.add(p.placeholder());
        }
        return names;
    }
}
