package tracewright.fitters.covariance;

import java.util.Optional;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledVector;

/**
 * Deviations of an ensemble's blocks, scaled so that blocks of independent configurations all have the same variance, whatever
 * their size: with the pseudo-values P_k = theta + (N/m_k - 1)(theta - theta_(k)) of block k, which for a mean is the block's own mean,
 * <pre>
 *   x_k = sqrt(m_k/(g (N - m_k))) (P_k - theta_J),    sum_k x_ki x_kj = S_ij    the jackknife covariance itself
 * </pre>
 * Equal weights 1/g then suit blocks of any size, and a block counts in S with m_k/N up to order m_k/N.
 */
final class BlockDeviations {

    private BlockDeviations() {
    }

    /** x [k][i]; empty for a bootstrap whose draws do not determine what each block contributes. */
    static Optional<double[]> of(SampledVector data) {
        return data.group().kind() == SampleGroup.Kind.JACKKNIFE ? Optional.of(ofJackknife(data)) : ofBootstrap(data);
    }

    /** sqrt(w_k) (theta_(k) - centre), equal to x up to its sign. */
    private static double[] ofJackknife(SampledVector data) {
        double[] x = data.deviations();
        int points = data.length();
        for (int i = 0; i < x.length; i++) {
            x[i] *= Math.sqrt(data.group().weight(i / points));
        }
        return x;
    }

    private static Optional<double[]> ofBootstrap(SampledVector data) {
        SampleGroup group = data.group();
        int points = data.length();
        int g = group.labels().size();
        double[] x = new double[g * points];
        for (int i = 0; i < points; i++) {
            Optional<double[]> influence = data.number(i).influence(group.key());
            if (influence.isEmpty()) {
                return Optional.empty();
            }
            for (int k = 0; k < g; k++) {
                double m = group.blockSize(k);
                x[k * points + i] = Math.sqrt(m / (g * (group.configurations() - m))) * influence.get()[k];
            }
        }
        return Optional.of(x);
    }
}
