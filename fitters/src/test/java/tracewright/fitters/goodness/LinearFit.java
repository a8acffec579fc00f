package tracewright.fitters.goodness;

import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.linalg.Householder;
import tracewright.fitters.linalg.Triangular;
import tracewright.fitters.sampled.SampledVector;

/** Least squares of a linear model, by reflections of the whitened design: parameters, minimum and quality. */
record LinearFit(Vector parameters, double chiSquared, FitQuality quality) {

    record Vector(double a, double b) {
    }

    static Weighting weighting(SampledVector data, CovarianceRule rule) {
        return assertInstanceOf(WeightingOutcome.Usable.class, Weighting.of(data, rule)).weighting();
    }

    /** @param design [point][parameter], one or two columns */
    static LinearFit of(SampledVector data, CovarianceRule rule, double[] design, long seed) {
        Weighting w = weighting(data, rule);
        int p = data.length();
        int q = design.length / p;
        double[] a = design.clone();
        double[] z = data.centralRow();
        Triangular.multiply(w.linv(), p, a, q);
        Triangular.multiply(w.linv(), p, z);
        double[] b = new double[q];
        assertTrue(Householder.solve(a.clone(), z.clone(), b, p, q));
        double minimum = 0;
        for (int i = 0; i < p; i++) {
            double r = z[i];
            for (int j = 0; j < q; j++) {
                r -= a[i * q + j] * b[j];
            }
            minimum += r * r;
        }
        return new LinearFit(new Vector(b[0], q > 1 ? b[1] : 0), minimum, FitQuality.of(w, design, q, minimum, seed));
    }

    /** Columns 1 and i/10. */
    static double[] line(int points) {
        double[] design = new double[2 * points];
        for (int i = 0; i < points; i++) {
            design[2 * i] = 1;
            design[2 * i + 1] = i / 10.0;
        }
        return design;
    }
}
