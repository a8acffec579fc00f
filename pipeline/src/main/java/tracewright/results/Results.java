package tracewright.results;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.fitters.sampled.SampledNumber;

/**
 * Everything numeric that a run found out, in the order in which it is written. Published errors include the factor of
 * neighbouring blocks of each ensemble group (see {@link SampledNumber}).
 */
public record Results(
    StudySummary study,
    List<EnsembleSummary> ensembles,
    List<Quantity> quantities,
    List<Budget> budgets,
    List<Figure> figures,
    List<String> warnings) {

    /**
     * The study in short.
     *
     * @param choices choices made, in words, by key of the study file ("covariance of plateau fits": "full"), in a fixed order
     */
    public record StudySummary(String name, long seed, String resampling, Map<String, String> choices) {
    }

    /**
     * What was read of one ensemble and what the cuts left.
     *
     * @param removed           configurations removed, by cut, in the order of application
     * @param blockLength       in trajectories
     * @param blockReason       why that length, in words
     * @param datasets          the reading of each dataset in words
     * @param streams           kept configurations by stream
     */
    public record EnsembleSummary(
        String name,
        int timeExtent,
        int spatialExtent,
        SampledNumber spacingFm,
        int configurationsOnDisk,
        int configurations,
        Map<String, Integer> streams,
        Map<String, Integer> removed,
        int sourcesPerConfiguration,
        int blocks,
        int blockLength,
        String blockReason,
        List<Autocorrelation> autocorrelation,
        List<String> datasets) {
    }

    /** Integrated autocorrelation time of one observable, in trajectories; verdict is empty when the chain was long enough. */
    public record Autocorrelation(String observable, double time, double error, String verdict) {
    }

    /**
     * One published number.
     *
     * @param id        {@code <ensemble>.<hadron>.<quantity>[.<flavor>][.<method>]}
     * @param ensemble  name, or {@code physical}
     * @param unit      {@code MeV} or {@code lattice}, or {@code 1} for pure numbers
     * @param scheme    renormalisation scheme where the number depends on one
     * @param route     renormalisation route where there was one
     */
    public record Quantity(
        String id,
        String ensemble,
        String hadron,
        String quantity,
        Optional<String> flavor,
        Optional<Double> flowTime,
        SampledNumber number,
        String unit,
        Optional<String> scheme,
        Optional<Double> scaleGev,
        Optional<String> route,
        Optional<String> method,
        List<Fit> fits) {
    }

    /**
     * One fit that took part in a number.
     *
     * @param label     window and model in words, unique within the quantity
     * @param expected  expected chi-squared E[Q]; equals the degrees of freedom when the weight is the inverse covariance
     * @param weight    its weight in the average, 1 if it stands alone
     * @param noiseFactor F of an estimated covariance (variance is multiplied by it)
     */
    public record Fit(
        String label, double chiSquared, double expected, int degreesOfFreedom, double pValue, double weight, double noiseFactor, double value, double error) {
    }

    /**
     * A decomposition of one hadron's mass, in MeV.
     *
     * @param ensemble      name, or {@code physical}
     * @param decomposition {@code trace} or {@code trace-scheme}
     * @param scheme        filled for decompositions that depend on one
     */
    public record Budget(
        String hadron,
        String ensemble,
        String decomposition,
        Optional<String> scheme,
        Optional<Double> scaleGev,
        List<Term> terms,
        SampledNumber total,
        SampledNumber mass,
        SampledNumber closure) {
    }

    /** One contribution in MeV and as a fraction of the mass; id is {@code anomaly}, {@code sigma.light}, {@code gluon}, {@code quark.strange} ... */
    public record Term(String id, SampledNumber value, SampledNumber fraction) {
    }
}
