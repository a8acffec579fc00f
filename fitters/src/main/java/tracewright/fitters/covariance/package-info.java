/**
 * From samples to the weight of a fit.
 * <pre>
 *  SampledVector --S, errors s--&gt; Correlation R --CovarianceRule--&gt; Regularized R' --Cholesky--&gt; Weighting: W = (s R' s)^-1 = Linv^T Linv
 *        |                             ^                                                  |
 *        +-----BlockDeviations---------+ (shrunk only)                                    +--&gt; refused, with reason and advice
 * </pre>
 * Regularisation acts on the correlation matrix, never on the covariance, whose entries span many orders of magnitude; it is an
 * explicit choice and what it did is reported. {@code InverseNoise} says what few blocks cost. Start reading at {@code Weighting}.
 */
package tracewright.fitters.covariance;
