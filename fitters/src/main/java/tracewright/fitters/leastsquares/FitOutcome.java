package tracewright.fitters.leastsquares;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleFunction;
import tracewright.fitters.goodness.FitQuality;
import tracewright.fitters.linalg.Cholesky;
import tracewright.fitters.sampled.SampleGroup;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.fitters.sampled.SampledVector;

/** What came of a fit to a sampled vector. */
public sealed interface FitOutcome {

    /** Name of the fit, for groups and messages. */
    String name();

    /** No fit: the reason with its numbers, and what the reader can do. */
    record Failed(String name, String reason, String advice) implements FitOutcome {
    }

    /** A fit at its minimum, with the parameters of every sample. */
    final class Converged implements FitOutcome {

        private final String name;
        private final List<String> parameterNames;
        private final SampledVector parameters;
        private final double chiSquared;
        private final double[] fitted;
        private final FitQuality quality;

        Converged(String name, List<String> parameterNames, SampledVector parameters, double chiSquared, double[] fitted, FitQuality quality) {
            this.name = name;
            this.parameterNames = List.copyOf(parameterNames);
            this.parameters = parameters;
            this.chiSquared = chiSquared;
            this.fitted = fitted;
            this.quality = quality;
        }

        @Override
        public String name() {
            return name;
        }

        public List<String> parameterNames() {
            return parameterNames;
        }

        /** Parameters with the samples of the data's group; the noise of the covariance is not in them. */
        public SampledVector parameters() {
            return parameters;
        }

        public double chiSquared() {
            return chiSquared;
        }

        /** E[Q] of a true model. */
        public double expectedChiSquared() {
            return quality.expected();
        }

        public int degreesOfFreedom() {
            return quality.degreesOfFreedom();
        }

        public int points() {
            return fitted.length;
        }

        /** The model at the central parameters, copy [point]. */
        public double[] fitted() {
            return fitted.clone();
        }

        public double pValue() {
            return quality.pValue();
        }

        /** Factor F of the variance for the noise of the estimated covariance, at least one. */
        public double noiseFactor() {
            return quality.noiseFactor();
        }

        /** Covariance of the parameters, H S H^T without F, copy. */
        public double[] covariance() {
            return quality.covariance();
        }

        /**
         * Parameters as numbers: the data's group, and the group {@code fit:<name>} with one sample per column of a factor of
         * (F - 1) H S H^T.
         */
        public List<SampledNumber> numbers() {
            int q = parameters.length();
            double[] added = quality.covariance();
            for (int i = 0; i < added.length; i++) {
                added[i] *= quality.noiseFactor() - 1;
            }
            Optional<Cholesky> factor = quality.noiseFactor() > 1 ? Cholesky.of(added, q) : Optional.empty();
            SampleGroup noise = SampleGroup.fitNoise(name, q);
            List<SampledNumber> numbers = new ArrayList<>();
            for (int j = 0; j < q; j++) {
                SampledNumber x = parameters.number(j);
                if (factor.isPresent()) {
                    double[] column = new double[q];
                    for (int k = 0; k < q; k++) {
                        column[k] = x.central() + factor.get().lower()[j * q + k];
                    }
                    x = x.withGroup(noise, column);
                }
                numbers.add(x);
            }
            return numbers;
        }

        /** A function of the parameters, with the groups of {@link #numbers}. */
        public SampledNumber derived(ToDoubleFunction<double[]> f) {
            return SampledNumber.evaluate(f, numbers().toArray(SampledNumber[]::new));
        }
    }
}
