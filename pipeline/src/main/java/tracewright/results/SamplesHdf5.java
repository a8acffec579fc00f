package tracewright.results;

import io.jhdf.HdfFile;
import io.jhdf.WritableHdfFile;
import io.jhdf.api.WritableGroup;
import io.jhdf.exceptions.HdfWritingException;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Results.Budget;
import tracewright.results.Results.Quantity;

/**
 * {@code samples.h5}: every sampled number of a run with its groups, and the covariance of all of them. HDF5, little-endian,
 * contiguous, strings of fixed length in UTF-8; few datasets, so that a reader takes all samples of a group at once.
 * <pre>
 *  dataset                    shape    type    content
 *  / (attributes)                      string  schema = tracewright-samples/1, program, version
 *  /quantities/id             [n]      string  ids of results.json; see below for the other numbers
 *  /quantities/unit           [n]      string  MeV, lattice, fm or 1
 *  /quantities/central        [n]      f8      central values
 *  /quantities/error          [n]      f8      published errors
 *  /groups/0000 (attributes)           string  key (name in variance_by_group), kind: jackknife, bootstrap, input, choice, fit-noise
 *  /groups/0000/quantity      [q]      i4      places in /quantities of the numbers that depend on this group
 *  /groups/0000/samples       [q][K]   f8      their samples
 *  /groups/0000/factor        [q]      f8      F, what the variance is multiplied by in published errors; 1 but for ensembles
 *  /groups/0000/weight        [K]      f8      w_k
 *  /groups/0000/centre        [K]      f8      a_k; jackknife and bootstrap only
 *  /groups/0000/block_stream  [g]      string  stream of each block, in Monte Carlo order; jackknife and bootstrap only
 *  /groups/0000/block_index   [g]      i8      its place on the grid of trajectory numbers
 *  /groups/0000/block_size    [g]      i4      configurations in it
 *  /groups/0000/share         [K][g]   f8      share of each block in each draw's mean; bootstrap only
 *  /covariance/id             [n]      string  as /quantities/id: names of rows and columns
 *  /covariance/covariance     [n][n]   f8      in the product of the two units; its diagonal is error^2
 *  /covariance/correlation    [n][n]   f8      1 on the diagonal, 0 beside numbers without error
 * </pre>
 * With c(x) = x + sum_k a_k (x_k - x), or c(x) = x where there is no {@code centre},
 * <pre>
 *  cov(x, y) = sum over groups  sqrt(F(x) F(y)) sum_k w_k (x_k - c(x)) (y_k - c(y))
 * </pre>
 * where F &gt; 1 stands for the correlation of neighbouring blocks (autocorrelation in results.json). For jackknife samples k counts blocks.
 * Two groups may share a key when numbers of one ensemble kept different blocks: match blocks by stream and index.
 * Beside the quantities of results.json stand {@code <ensemble>.spacing} (fm) and for each budget
 * {@code <ensemble>.<hadron>.budget.<decomposition>.<term>} (MeV) and the same with {@code .fraction} behind it (1);
 * {@code total}, {@code mass} and {@code closure} are terms there.
 * Results without any number have the groups and none of the datasets. Same results, same bytes on every machine.
 */
public final class SamplesHdf5 {

    /** Name of the file's contract. */
    public static final String SCHEMA = "tracewright-samples/1";

    private SamplesHdf5() {
    }

    private record Entry(String id, String unit, SampledNumber number) {
    }

    /**
     * @param file must not exist; on failure it may be half written, so it belongs into the staging of an {@link OutputFolder}
     * @throws IllegalArgumentException naming the id, if a number or sample is NaN or infinite or an id occurs twice
     * @throws IOException              if the file cannot be written, for instance because the disk is full
     */
    public static void write(Results results, Path file) throws IOException {
        List<Entry> entries = entries(results);
        requireSound(entries);
        Map<SampleGroup, List<Integer>> groups = groups(entries);
        try (WritableHdfFile hdf = HdfFile.write(file)) {
            hdf.removeAttribute("_jHDF");
            hdf.putAttribute("schema", SCHEMA);
            hdf.putAttribute("program", Program.NAME);
            hdf.putAttribute("version", Program.version());
            quantities(hdf.putGroup("quantities"), entries);
            WritableGroup parent = hdf.putGroup("groups");
            int at = 0;
            for (Map.Entry<SampleGroup, List<Integer>> g : groups.entrySet()) {
                group(parent.putGroup(String.format(Locale.ROOT, "%04d", at++)), g.getKey(), g.getValue(), entries);
            }
            covariance(hdf.putGroup("covariance"), entries);
        } catch (HdfWritingException e) {
            throw e.getCause() instanceof IOException reason ? reason : new IOException(e.getMessage(), e);
        }
        Hdf5Trailer.remove(file);
    }

    private static List<Entry> entries(Results results) {
        List<Entry> entries = new ArrayList<>();
        for (Quantity q : results.quantities()) {
            entries.add(new Entry(q.id(), q.unit(), q.number()));
        }
        results.ensembles().forEach(e -> entries.add(new Entry(e.name() + ".spacing", "fm", e.spacingFm())));
        results.budgets().forEach(b -> budget(b, entries));
        return entries;
    }

    private static void budget(Budget b, List<Entry> entries) {
        String prefix = b.ensemble() + "." + b.hadron() + ".budget." + b.decomposition() + ".";
        for (Results.Term t : b.terms()) {
            entries.add(new Entry(prefix + t.id(), "MeV", t.value()));
            entries.add(new Entry(prefix + t.id() + ".fraction", "1", t.fraction()));
        }
        entries.add(new Entry(prefix + "total", "MeV", b.total()));
        entries.add(new Entry(prefix + "mass", "MeV", b.mass()));
        entries.add(new Entry(prefix + "closure", "MeV", b.closure()));
    }

    private static void requireSound(List<Entry> entries) {
        Set<String> seen = new HashSet<>();
        for (Entry e : entries) {
            if (!seen.add(e.id())) {
                throw new IllegalArgumentException("two numbers have the id " + e.id() + "; an id names one number");
            }
            Program.finite(e.number().central(), e.id() + ": central value");
            for (SampleGroup g : e.number().groups()) {
                for (double sample : e.number().samples(g.key())) {
                    Program.finite(sample, e.id() + ": a sample of " + g.key());
                }
            }
        }
    }

    /** Places of the numbers that depend on each group; groups by key, those of one key in the order of their first number. */
    private static Map<SampleGroup, List<Integer>> groups(List<Entry> entries) {
        Map<SampleGroup, List<Integer>> found = new LinkedHashMap<>();
        for (int i = 0; i < entries.size(); i++) {
            for (SampleGroup g : entries.get(i).number().groups()) {
                found.computeIfAbsent(g, k -> new ArrayList<>()).add(i);
            }
        }
        Map<SampleGroup, List<Integer>> sorted = new LinkedHashMap<>();
        found.keySet().stream().sorted(Comparator.comparing(SampleGroup::key)).forEach(g -> sorted.put(g, found.get(g)));
        return sorted;
    }

    private static void quantities(WritableGroup out, List<Entry> entries) {
        if (!entries.isEmpty()) {
            out.putDataset("id", entries.stream().map(Entry::id).toArray(String[]::new));
            out.putDataset("unit", entries.stream().map(Entry::unit).toArray(String[]::new));
            out.putDataset("central", entries.stream().mapToDouble(e -> e.number().central()).toArray());
            out.putDataset("error", entries.stream().mapToDouble(e -> Published.error(e.number())).toArray());
        }
    }

    private static void group(WritableGroup out, SampleGroup g, List<Integer> members, List<Entry> entries) {
        out.putAttribute("key", g.key());
        out.putAttribute("kind", g.kind().name().toLowerCase(Locale.ROOT).replace('_', '-'));
        out.putDataset("quantity", members.stream().mapToInt(Integer::intValue).toArray());
        out.putDataset("samples", members.stream().map(i -> entries.get(i).number().samples(g.key())).toArray(double[][]::new));
        out.putDataset("factor", members.stream().mapToDouble(i -> Published.factor(entries.get(i).number(), g)).toArray());
        double[] weight = new double[g.size()];
        for (int k = 0; k < weight.length; k++) {
            weight[k] = g.weight(k);
        }
        out.putDataset("weight", weight);
        if (g.isEnsemble()) {
            out.putDataset("centre", centre(g));
            blocks(out, g);
        }
        if (g.kind() == SampleGroup.Kind.BOOTSTRAP) {
            out.putDataset("share", shares(g));
        }
    }

    /** Coefficients a_k: the centre of samples that are 1 at k and 0 elsewhere, around 0. */
    private static double[] centre(SampleGroup g) {
        double[] coefficients = new double[g.size()];
        double[] unit = new double[g.size()];
        for (int k = 0; k < unit.length; k++) {
            unit[k] = 1;
            coefficients[k] = g.centre(0, unit, 0, 1);
            unit[k] = 0;
        }
        return coefficients;
    }

    private static void blocks(WritableGroup out, SampleGroup g) {
        List<BlockLabel> labels = g.labels();
        int[] sizes = new int[labels.size()];
        for (int b = 0; b < sizes.length; b++) {
            sizes[b] = g.blockSize(b);
        }
        out.putDataset("block_stream", labels.stream().map(BlockLabel::stream).toArray(String[]::new));
        out.putDataset("block_index", labels.stream().mapToLong(BlockLabel::index).toArray());
        out.putDataset("block_size", sizes);
    }

    private static double[][] shares(SampleGroup g) {
        double[][] shares = new double[g.size()][g.labels().size()];
        for (int k = 0; k < shares.length; k++) {
            for (int b = 0; b < shares[k].length; b++) {
                shares[k][b] = g.share(k, b);
            }
        }
        return shares;
    }

    private static void covariance(WritableGroup out, List<Entry> entries) {
        int n = entries.size();
        if (n == 0) {
            return;
        }
        double[] covariance = PublishedCovariance.matrix(entries.stream().map(Entry::number).toList());
        out.putDataset("id", entries.stream().map(Entry::id).toArray(String[]::new));
        out.putDataset("covariance", rows(covariance, n));
        out.putDataset("correlation", rows(PublishedCovariance.correlation(covariance, n), n));
    }

    private static double[][] rows(double[] flat, int n) {
        double[][] rows = new double[n][];
        for (int i = 0; i < n; i++) {
            rows[i] = Arrays.copyOfRange(flat, i * n, (i + 1) * n);
        }
        return rows;
    }
}
