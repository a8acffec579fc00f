/**
 * How good a fit is and what the noise of its estimated covariance costs.
 * <pre>
 *  Weighting, Jacobian at the minimum, Q --FitQuality--&gt; covariance of the parameters, E[Q], p-value, noise factor F
 *                                            |
 *        LinearMap (H, P) -------------------+--- CovarianceNoise &lt;--- SimulatedCovariances
 *        WeightedChiSquares, Tails (p) ------+
 * </pre>
 * Notation: p points, q parameters, f = p - q, g blocks, S covariance of the mean, W weight, J Jacobian,
 * H = (J^T W J)^-1 J^T W, P = 1 - J H. Start reading at {@code FitQuality}.
 */
package tracewright.fitters.goodness;
