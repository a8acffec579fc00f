package tracewright.results;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import tracewright.fitters.sampled.BlockLabel;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;

/**
 * Covariance of published numbers,
 * <pre>
 *   cov(x, y) = sum over groups G of both  sqrt(F_G(x) F_G(y))  sum_k sqrt(w_k(x) w_k(y)) (x_k - c(x)) (y_k - c(y))
 * </pre>
 * with F_G the factor by which neighbouring blocks widen a number's variance, so that the diagonal holds the squares of the
 * published errors, the matrix has no negative eigenvalue, and the correlation inside a group is that of the samples.
 * Numbers whose ensemble kept different blocks meet label by label; a block that one of them lacks deviates by zero. The same as
 * {@link SampledNumber#publishedCovariance} pair by pair, but each number's deviations and factors are formed once, not once per pair.
 */
final class PublishedCovariance {

    private PublishedCovariance() {
    }

    /** Covariance, [i][j] flat, symmetric. */
    static double[] matrix(List<SampledNumber> numbers) {
        int n = numbers.size();
        Map<String, List<Integer>> members = new TreeMap<>();
        for (int i = 0; i < n; i++) {
            for (SampleGroup g : numbers.get(i).groups()) {
                members.computeIfAbsent(g.key(), k -> new ArrayList<>()).add(i);
            }
        }
        double[] covariance = new double[n * n];
        members.forEach((key, rows) -> add(covariance, n, rows, deviations(numbers, key, rows)));
        return covariance;
    }

    /** Correlation from a covariance, both [i][j] flat: 1 on the diagonal, 0 beside a number without error. */
    static double[] correlation(double[] covariance, int n) {
        double[] r = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j < n; j++) {
                double scale = Math.sqrt(covariance[i * n + i]) * Math.sqrt(covariance[j * n + j]);
                double value = scale > 0 ? covariance[i * n + j] / scale : 0;
                r[i * n + j] = i == j ? 1 : Math.max(-1, Math.min(1, value));
            }
        }
        return r;
    }

    /** Adds d d^T of the rows' deviations [row][column] to the covariance. */
    private static void add(double[] covariance, int n, List<Integer> rows, double[][] d) {
        for (int a = 0; a < d.length; a++) {
            for (int b = 0; b <= a; b++) {
                double sum = 0;
                for (int k = 0; k < d[a].length; k++) {
                    sum += d[a][k] * d[b][k];
                }
                int i = rows.get(a);
                int j = rows.get(b);
                covariance[i * n + j] += sum;
                covariance[j * n + i] = covariance[i * n + j];
            }
        }
    }

    /** sqrt(F w_k) (x_k - c), one row per number, one column per block label (jackknife) or sample (else). */
    private static double[][] deviations(List<SampledNumber> numbers, String key, List<Integer> rows) {
        Map<BlockLabel, Integer> columns = columns(numbers, key, rows);
        SampleGroup first = group(numbers.get(rows.get(0)), key);
        double[][] d = new double[rows.size()][columns.isEmpty() ? first.size() : columns.size()];
        for (int a = 0; a < d.length; a++) {
            SampledNumber x = numbers.get(rows.get(a));
            SampleGroup g = group(x, key);
            requireSameCause(first, g);
            fill(d[a], x, g, columns);
        }
        return d;
    }

    private static void fill(double[] row, SampledNumber x, SampleGroup g, Map<BlockLabel, Integer> columns) {
        double[] samples = x.samples(g.key());
        double centre = g.centre(x.central(), samples, 0, 1);
        double widening = Math.sqrt(Published.factor(x, g));
        for (int k = 0; k < samples.length; k++) {
            int column = columns.isEmpty() ? k : columns.get(g.labels().get(k));
            row[column] = widening * Math.sqrt(g.weight(k)) * (samples[k] - centre);
        }
    }

    /** Place of each block label that any of the numbers has; empty unless the group is a jackknife. */
    private static Map<BlockLabel, Integer> columns(List<SampledNumber> numbers, String key, List<Integer> rows) {
        Map<BlockLabel, Integer> columns = new TreeMap<>();
        for (int i : rows) {
            SampleGroup g = group(numbers.get(i), key);
            if (g.kind() == SampleGroup.Kind.JACKKNIFE) {
                g.labels().forEach(label -> columns.put(label, 0));
            }
        }
        int at = 0;
        for (Map.Entry<BlockLabel, Integer> e : columns.entrySet()) {
            e.setValue(at++);
        }
        return columns;
    }

    /** Jackknifes align by label and bootstraps of one ensemble draw by draw; all other groups must be equal. */
    private static void requireSameCause(SampleGroup a, SampleGroup b) {
        boolean aligned = a.kind() == b.kind() && a.isEnsemble() && (a.kind() == SampleGroup.Kind.JACKKNIFE || a.size() == b.size());
        if (!aligned && !a.equals(b)) {
            throw new IllegalArgumentException("numbers with different samples of " + a.key() + " meet: " + a + " and " + b);
        }
    }

    private static SampleGroup group(SampledNumber x, String key) {
        return x.groups().stream().filter(g -> g.key().equals(key)).findFirst().orElseThrow();
    }
}
