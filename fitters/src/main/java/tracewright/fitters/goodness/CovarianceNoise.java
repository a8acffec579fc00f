package tracewright.fitters.goodness;

import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.linalg.Cholesky;

/**
 * What the noise of an estimated covariance does to a fit with any weight, by simulation with the estimate S taken as the truth and
 * the Jacobian frozen:
 * <pre>
 *  A = mean of H* S H*^T     (variance that the parameters really have)
 *  D = mean of H* S* H*^T    (variance that would have been reported)
 *  F = tr(A D^-1)/q,         E[Q*] = mean of tr(P*^T W* P* S)
 * </pre>
 * No simulated mean is needed. A pure function of its seed.
 *
 * @param factor   F, which multiplies the reported variance
 * @param expected E[Q*], what the minimum is on average when the covariance is estimated
 */
record CovarianceNoise(double factor, double expected) {

    /** Gives F to about 1.5 percent. */
    static final int SIMULATIONS = 200;

    /**
     * @param jacobian [point][parameter] at the minimum
     * @throws ArithmeticException if a simulated weight is refused or a parameter is not determined
     */
    static CovarianceNoise simulate(Weighting w, double[] jacobian, int q, int simulations, long seed) {
        int p = w.points();
        double[] s = w.covariance();
        SimulatedCovariances draws = new SimulatedCovariances(s, p, w.blocks(), seed);
        double[] a = new double[q * q];
        double[] d = new double[q * q];
        double expected = 0;
        for (int j = 0; j < simulations; j++) {
            double[] star = w.rule().readsBlocks() ? draws.nextWithBlocks() : draws.next();
            double[] blocks = w.rule().readsBlocks() ? draws.blocks() : new double[0];
            LinearMap map = LinearMap.of(weight(star, p, w.rule(), w.blocks(), blocks).linv(), jacobian, p, q);
            add(map.sandwich(s), a);
            add(map.sandwich(star), d);
            expected += map.expected(s);
        }
        return new CovarianceNoise(traceOfRatio(a, d, q) / q, expected / simulations);
    }

    private static void add(double[] x, double[] sum) {
        for (int i = 0; i < sum.length; i++) {
            sum[i] += x[i];
        }
    }

    private static Weighting weight(double[] star, int p, CovarianceRule rule, int g, double[] blocks) {
        if (Weighting.of(star, p, rule, g, blocks) instanceof WeightingOutcome.Usable usable) {
            return usable.weighting();
        }
        throw new ArithmeticException("simulated covariance " + p + "x" + p + " (" + rule.word() + ") from " + g + " blocks has no inverse");
    }

    /** tr(A D^-1), which does not depend on the scales of the parameters. */
    private static double traceOfRatio(double[] a, double[] d, int q) {
        double[] inverse = Cholesky.of(d, q).map(Cholesky::inverse)
            .orElseThrow(() -> new ArithmeticException("simulated covariance of " + q + " parameters is singular"));
        double trace = 0;
        for (int i = 0; i < q * q; i++) {
            trace += a[i] * inverse[i];
        }
        return trace;
    }
}
