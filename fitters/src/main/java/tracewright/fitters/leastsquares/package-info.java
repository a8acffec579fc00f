/**
 * Least squares, linear and nonlinear, of vectors with samples.
 * <pre>
 *  SampledVector --Weighting--&gt; W frozen --+
 *  FitModel ------------------------------+--SampledFit--&gt; FitOutcome: parameters with samples, chi-squared, p-value
 *                                               |
 *                 LevenbergMarquardt (centre) --+-- frozen-metric steps (SampleRefits)
 *  SeparableModel --VariableProjection--&gt; minimum without start values for the linear parameters
 *  design, data, priors ---------LinearFit--&gt; exact minimum by QR
 *  SampledNumbers on both axes ---------TermsFit--&gt; coefficients
 * </pre>
 * Pure functions of arrays: same input, same bits. Start reading at {@code SampledFit}.
 */
package tracewright.fitters.leastsquares;
