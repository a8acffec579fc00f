package tracewright.fitters.sampled;

import java.util.List;
import java.util.Optional;

/**
 * A number's samples of one ensemble, seen block by block, whatever the kind of the group:
 * <pre>
 *   influence   a_k = P_k - theta_J          from a bootstrap by regression, see BlockInfluence
 *   deviation   d_k = sqrt(w_k) (theta_(k) - c),   theta_(k) = theta - a_k m_k/(N - m_k),   w_k = (N - m_k)/(g m_k)
 * </pre>
 */
final class EnsemblePart {

    private final SampleGroup group;
    private final double central;
    private final double[] samples;   // [sample]

    EnsemblePart(SampleGroup group, double central, double[] samples) {
        if (!group.isEnsemble()) {
            throw new IllegalArgumentException(group + " has no blocks");
        }
        this.group = group;
        this.central = central;
        this.samples = samples;
    }

    private boolean isJackknife() {
        return group.kind() == SampleGroup.Kind.JACKKNIFE;
    }

    /** Influences [block]; empty for a bootstrap whose draws do not determine them. */
    Optional<double[]> influence() {
        double[] a = isJackknife() ? BlockInfluence.ofJackknife(group, central, samples) : BlockInfluence.ofBootstrap(group, central, samples);
        return a.length == 0 ? Optional.empty() : Optional.of(a);
    }

    /** Pseudo-values [block]. */
    Optional<double[]> pseudoValues() {
        double total = group.configurations();
        return isJackknife() ? Optional.of(mapped(samples, (k, x) -> central - (total / group.blockSize(k) - 1) * (x - central)))
            : influence().map(a -> mapped(a, (k, x) -> central + x));
    }

    /** Weighted deviations d_k [block]. */
    Optional<double[]> deviations() {
        double total = group.configurations();
        double c = group.centre(central, samples, 0, 1);
        int g = group.labels().size();
        return isJackknife() ? Optional.of(mapped(samples, (k, x) -> Math.sqrt(group.weight(k)) * (x - c)))
            : influence().map(a -> mapped(a, (k, x) -> -x * Math.sqrt(group.blockSize(k) / (g * (total - group.blockSize(k))))));
    }

    Optional<NeighbourTerm> neighbourTerm() {
        List<BlockLabel> labels = group.labels();
        return deviations().filter(d -> NeighbourTerm.pairs(labels) > 0).map(d -> NeighbourTerm.of(labels, d));
    }

    /** sum_k d_k e_k + sum over adjacent pairs of (d_k e_(k+1) + d_(k+1) e_k) of two numbers on equal groups. */
    Optional<Double> laggedCovariance(EnsemblePart other) {
        return deviations().flatMap(d -> other.deviations().map(e -> {
            double sum = NeighbourTerm.lagged(group.labels(), d, e) + NeighbourTerm.lagged(group.labels(), e, d);
            for (int k = 0; k < d.length; k++) {
                sum += d[k] * e[k];
            }
            return sum;
        }));
    }

    @FunctionalInterface
    private interface EntryFunction {
        double apply(int k, double x);
    }

    private static double[] mapped(double[] in, EntryFunction f) {
        double[] out = new double[in.length];
        for (int k = 0; k < out.length; k++) {
            out[k] = f.apply(k, in[k]);
        }
        return out;
    }
}
