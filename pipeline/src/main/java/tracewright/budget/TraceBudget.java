package tracewright.budget;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.Flavor;

/** The two-term trace sum rule of one hadron in its invariant and its scheme-dependent form. */
public final class TraceBudget {

    private TraceBudget() {
    }

    /**
     * Anomaly = (beta/2g) F^2 + gamma_m sum sigma_f, in MeV.
     *
     * @param gluon  (beta/2g) F^2 in the scheme and at the scale of gamma_m
     * @param sigmas every active flavour that was measured
     */
    public static SampledNumber anomaly(SampledNumber gluon, Map<Flavor, SampledNumber> sigmas, SampledNumber gammaM) {
        List<SampledNumber> arguments = new ArrayList<>(sigmas.values());
        arguments.add(gluon);
        arguments.add(gammaM);
        int flavors = sigmas.size();
        return SampledNumber.evaluate(v -> {
            double sum = 0;
            for (int i = 0; i < flavors; i++) {
                sum += v[i];
            }
            return v[flavors] + v[flavors + 1] * sum;
        }, arguments.toArray(SampledNumber[]::new));
    }

    /** M = anomaly + sum sigma_f. */
    public static Decomposition invariant(SampledNumber mass, SampledNumber anomaly, Map<Flavor, SampledNumber> sigmas) {
        List<Decomposition.Term> terms = new ArrayList<>();
        terms.add(new Decomposition.Term("anomaly", anomaly));
        sigmas.forEach((flavor, sigma) -> terms.add(new Decomposition.Term("sigma." + flavor.word(), sigma)));
        return new Decomposition("trace", Optional.empty(), Optional.empty(), terms, mass);
    }

    /** M = (beta/2g) F^2 + sum (1 + gamma_m) sigma_f. */
    public static Decomposition schemeDependent(
            SampledNumber mass, SampledNumber gluon, Map<Flavor, SampledNumber> sigmas, SampledNumber gammaM, String scheme, double scaleGev) {
        List<Decomposition.Term> terms = new ArrayList<>();
        terms.add(new Decomposition.Term("gluon", gluon));
        sigmas.forEach((flavor, sigma) -> terms.add(new Decomposition.Term("quark." + flavor.word(),
            SampledNumber.evaluate(v -> (1 + v[0]) * v[1], gammaM, sigma))));
        return new Decomposition("trace-scheme", Optional.of(scheme), Optional.of(scaleGev), terms, mass);
    }
}
