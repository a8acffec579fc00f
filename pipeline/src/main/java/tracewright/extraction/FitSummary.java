package tracewright.extraction;

/**
 * One fit of a scan over windows, for tables.
 *
 * @param label       window and model in words
 * @param expected    expected chi-squared E[Q] of a true model under the weighting that was used
 * @param weight      its share in the average
 * @param noiseFactor factor of the variance for the noise of the estimated covariance
 */
public record FitSummary(
    String label, double chiSquared, double expected, int degreesOfFreedom, double pValue, double weight, double noiseFactor, double value, double error) {
}
