package tracewright.readers;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.net.URISyntaxException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import java.util.logging.Level;
import java.util.logging.Logger;
import tracewright.study.ConfigurationId;
import tracewright.study.InputException;
import tracewright.study.Layout;
import tracewright.study.Layout.Axis;
import tracewright.study.Layout.Boundary;
import tracewright.study.Layout.BoundarySign;
import tracewright.study.Layout.ComplexForm;
import tracewright.study.Layout.Label;
import tracewright.study.Layout.SourceTimes;
import tracewright.study.Layout.TimeOrigin;
import tracewright.study.Observable;

/**
 * The invented two-point function that all reader tests share: stream a, trajectories 10..60, sources at 0, 3, 6 on T = 8 slices of
 * 4^3 sites, C(c, s, t) = (1 + 7 c + 3 s) / (t + 1.5); the same formula as in make_fixtures.py, one rounded division, so equal bits.
 */
final class Toy {

    static final int T = 8;
    static final int CONFIGURATIONS = 6;
    static final int[] T0 = {0, 3, 6};
    static final Path LAYOUT_FILE = Path.of("layouts", "toy.yaml");
    static final Observable PROTON = new Observable.TwoPoint("proton");
    static final SourceTimes LIST = new SourceTimes.Fixed(List.of(0, 3, 6));

    /** Held, so that the level stays: the library has a remark on every file. */
    private static final Logger QUIET = Logger.getLogger("io.jhdf");

    static {
        QUIET.setLevel(Level.SEVERE);
    }

    private Toy() {
    }

    static double value(int c, int s, int t) {
        return (1 + 7 * c + 3 * s) / (t + 1.5);
    }

    /** What a reader must hand on for configuration c: [source][t]. */
    static double[] expected(int c) {
        double[] all = new double[T0.length * T];
        for (int s = 0; s < T0.length; s++) {
            for (int t = 0; t < T; t++) {
                all[s * T + t] = value(c, s, t);
            }
        }
        return all;
    }

    /** [config][source][time], on the lattice's time axis, antiperiodic sign included. */
    static double[][][] stored() {
        double[][][] all = new double[CONFIGURATIONS][T0.length][T];
        for (int c = 0; c < CONFIGURATIONS; c++) {
            for (int s = 0; s < T0.length; s++) {
                for (int t = 0; t < T; t++) {
                    all[c][s][(T0[s] + t) % T] = T0[s] + t >= T ? -value(c, s, t) : value(c, s, t);
                }
            }
        }
        return all;
    }

    static ConfigurationId id(int c) {
        return new ConfigurationId("a", 10L * (c + 1));
    }

    static Layout.Files hdf5(String path) {
        return new Layout.Files.Hdf5(path, new Label.FromDataset("/labels/trajectory"), new Label.Constant("a"));
    }

    static Layout.Stored array(String dataset, ComplexForm complex, Axis... axes) {
        return new Layout.Stored("main", Optional.of(dataset), Optional.of(List.of(axes)), Optional.of(complex), Optional.empty(), Map.of());
    }

    static Layout.Stored cst(String dataset) {
        return array(dataset, ComplexForm.NONE, Axis.CONFIGURATION, Axis.SOURCE, Axis.TIME);
    }

    static Layout.Stored column(String value, Map<String, String> where) {
        return new Layout.Stored("main", Optional.empty(), Optional.empty(), Optional.empty(), Optional.of(value), where);
    }

    static Layout.Dataset proton(Layout.Stored stored, SourceTimes sources) {
        return new Layout.Dataset.TwoPoint("proton", stored, sources, TimeOrigin.ABSOLUTE, Boundary.ANTIPERIODIC, BoundarySign.INCLUDED);
    }

    static Layout layout(Layout.Files files, Layout.Dataset... datasets) {
        return new Layout("tracewright-layout/1", "toy", T, 4, Map.of("main", files), List.of(datasets));
    }

    static EnsembleFiles open(Layout layout, Path folder) {
        return EnsembleFiles.open("E1", layout, LAYOUT_FILE, folder);
    }

    /** Files made by make_fixtures.py. */
    static Path fixtures() {
        try {
            return Path.of(Toy.class.getResource("/readers/forms.h5").toURI()).getParent();
        } catch (URISyntaxException e) {
            throw new IllegalStateException(e);
        }
    }

    /** Everything of one observable, by configuration; checks the order of delivery. */
    static TreeMap<ConfigurationId, double[]> readAll(EnsembleFiles files, Observable observable) {
        TreeMap<ConfigurationId, double[]> all = new TreeMap<>();
        List<ConfigurationId> order = new ArrayList<>();
        files.read(observable::equals, id -> true, (o, id, sources, values) -> {
            assertEquals(observable, o);
            order.add(id);
            assertEquals(null, all.put(id, values.clone()), "delivered twice: " + id);
        });
        assertEquals(files.configurations(observable), order);
        return all;
    }

    static void assertToy(EnsembleFiles files, boolean single) {
        TreeMap<ConfigurationId, double[]> all = readAll(files, PROTON);
        assertEquals(CONFIGURATIONS, all.size());
        for (int c = 0; c < CONFIGURATIONS; c++) {
            double[] expected = expected(c);
            for (int k = 0; single && k < expected.length; k++) {
                expected[k] = (float) expected[k];
            }
            assertArrayEquals(expected, all.get(id(c)), 0.0, "configuration " + c);
        }
    }

    /** Runs and expects an InputException whose text, all problems joined, holds every word. */
    static InputException refused(InputException.Cause cause, Runnable step, String... words) {
        InputException e = assertThrows(InputException.class, step::run);
        assertEquals(cause, e.reason());
        StringBuilder text = new StringBuilder();
        e.problems().forEach(p -> text.append(p.text()).append('\n'));
        for (String word : words) {
            assertTrue(text.toString().contains(word), "'" + word + "' missing in:\n" + text);
        }
        return e;
    }
}
