package tracewright.synth;

import java.util.LinkedHashMap;
import java.util.Map;
import java.util.TreeMap;

/** Running mean and variance of named numbers over many independent repetitions. */
final class Replicas {

    /** count, mean and sum of squared deviations (Welford, Technometrics 4 (1962) 419). */
    private final Map<String, double[]> sums = new LinkedHashMap<>();

    void add(String name, double value) {
        double[] s = sums.computeIfAbsent(name, n -> new double[3]);
        s[0]++;
        double from = value - s[1];
        s[1] += from / s[0];
        s[2] += from * (value - s[1]);
    }

    double mean(String name) {
        return sums.get(name)[1];
    }

    double variance(String name) {
        return sums.get(name)[2] / (sums.get(name)[0] - 1);
    }

    /** Distance of the mean from an expected value in units of its own standard error. */
    double pull(String name, double expected) {
        return (mean(name) - expected) / Math.sqrt(variance(name) / sums.get(name)[0]);
    }

    /** Pulls of all names against their expected values. */
    Map<String, Double> pulls(Map<String, Double> expected) {
        Map<String, Double> pulls = new TreeMap<>();
        expected.forEach((name, value) -> pulls.put(name, pull(name, value)));
        return pulls;
    }
}
