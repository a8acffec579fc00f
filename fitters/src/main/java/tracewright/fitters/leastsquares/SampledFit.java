package tracewright.fitters.leastsquares;

import static java.util.Objects.requireNonNull;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.goodness.FitQuality;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;
import tracewright.fitters.sampled.SampledVector;

/**
 * Fit of a model to a sampled vector: weight from the data's own covariance, frozen; the centre by Levenberg-Marquardt from all
 * start values of the model, lowest minimum kept if two of them find it; every sample from the central minimum.
 */
public final class SampledFit {

    private static final int COLD_STEPS = 2000;
    private static final double SAME_MINIMUM = 1e-6;
    private static final String ADVICE = "fit fewer states or another window";

    private final String name;
    private final SampledVector data;
    private final FitModel model;
    private final Weighting weighting;

    private SampledFit(String name, SampledVector data, FitModel model, Weighting weighting) {
        this.name = name;
        this.data = data;
        this.model = model;
        this.weighting = weighting;
    }

    /**
     * @param name  of the fit, for the group of its covariance's noise and for messages
     * @param data  one entry per point of the model
     */
    public static FitOutcome fit(String name, SampledVector data, FitModel model, CovarianceRule rule) {
        requireNonNull(rule, "rule");
        if (data.length() != model.points()) {
            throw new IllegalArgumentException(name + ": " + data.length() + " data for a model of " + model.points() + " points");
        }
        if (data.length() < model.parameters()) {
            return new FitOutcome.Failed(name, data.length() + " points cannot determine " + model.parameters() + " parameters", "widen the window");
        }
        for (int i = 0; i < data.length(); i++) {
            if (!Double.isFinite(data.central(i))) {
                return new FitOutcome.Failed(name, "point " + i + " is not finite", "leave the point out");
            }
        }
        WeightingOutcome weight = Weighting.of(data, rule);
        if (weight instanceof WeightingOutcome.Refused refused) {
            return new FitOutcome.Failed(name, refused.reason(), refused.advice());
        }
        Weighting w = ((WeightingOutcome.Usable) weight).weighting();
        Optional<WeightingOutcome.Refused> few = w.tooFewBlocks(model.parameters());
        return few.<FitOutcome>map(r -> new FitOutcome.Failed(name, r.reason(), r.advice())).orElseGet(() -> new SampledFit(name, data, model, w).fit());
    }

    private FitOutcome fit() {
        WhitenedModel whitened = new WhitenedModel(model, weighting.linv());
        whitened.data(data.centralRow());
        List<double[]> starts = model.starts(data.centralRow(), weighting.errors());
        List<Descent.Converged> minima = new ArrayList<>();
        List<Descent.Failed> failures = new ArrayList<>();
        for (double[] start : starts) {
            Descent d = whitened.machine().cold(start, COLD_STEPS);
            if (d instanceof Descent.Converged c) {
                minima.add(c);
            } else if (d instanceof Descent.Failed f) {
                failures.add(f);
            }
        }
        minima.sort(Comparator.comparingDouble(Descent.Converged::chiSquared));
        Optional<String> doubt = runaway(minima, failures).or(() -> doubt(minima, failures, starts.size()));
        return doubt.<FitOutcome>map(d -> new FitOutcome.Failed(name, d, ADVICE)).orElseGet(() -> samples(minima.get(0), whitened));
    }

    /** A descent that ran out of what the model can mean, to a chi-squared below every minimum. */
    private Optional<String> runaway(List<Descent.Converged> minima, List<Descent.Failed> failures) {
        double lowest = minima.isEmpty() ? Double.POSITIVE_INFINITY : minima.get(0).chiSquared();
        return failures.stream().filter(f -> f.chiSquared() < lowest - SAME_MINIMUM * Math.max(1, lowest) || Double.isInfinite(lowest))
            .flatMap(f -> model.undetermined(f.last()).stream()).findFirst().map(u -> "undetermined: " + u);
    }

    /** Why the lowest minimum is not to be believed: none, a state too many, or no second start that finds it. */
    private Optional<String> doubt(List<Descent.Converged> minima, List<Descent.Failed> failures, int starts) {
        if (minima.isEmpty()) {
            return Optional.of(failures.isEmpty() ? "the model gives no start values" : failures.get(0).reason());
        }
        Optional<String> undetermined = model.undetermined(minima.get(0).parameters());
        if (undetermined.isPresent()) {
            return undetermined.map(u -> "undetermined: " + u);
        }
        double lowest = minima.get(0).chiSquared();
        long agreeing = minima.stream().filter(m -> m.chiSquared() - lowest <= SAME_MINIMUM * Math.max(1, lowest)).count();
        if (starts > 1 && agreeing < 2) {
            String rest = minima.size() > 1 ? String.format(Locale.ROOT, "the next is %.6g", minima.get(1).chiSquared()) : "no other start converges";
            return Optional.of(String.format(Locale.ROOT, "ambiguous: only one of %d starts finds the lowest chi-squared %.6g; %s", starts, lowest, rest));
        }
        return Optional.empty();
    }

    private FitOutcome samples(Descent.Converged centre, WhitenedModel whitened) {
        int q = model.parameters();
        double[] p0 = centre.parameters();
        double[] fitted = new double[model.points()];
        double[] jacobian = new double[model.points() * q];
        model.evaluate(p0, fitted, jacobian);
        FitQuality quality;
        try {
            quality = FitQuality.of(weighting, jacobian, q, centre.chiSquared(), seed(name));
        } catch (ArithmeticException e) {
            return new FitOutcome.Failed(name, e.getMessage(), "fit fewer parameters");
        }
        SampleRefits refits = new SampleRefits(data, model, whitened, centre, quality.covariance(), weighting.errors());
        Optional<String> failure = refits.run();
        if (failure.isPresent()) {
            return new FitOutcome.Failed(name, failure.get(), ADVICE);
        }
        SampledVector parameters = SampledVector.copyOf(data.group(), p0, refits.rows());
        return new FitOutcome.Converged(name, model.parameterNames(), parameters, centre.chiSquared(), fitted, quality);
    }

    /** Seed of the simulation that belongs to a fit: a function of its name alone (Fowler, Noll, Vo; 64 bit, offset and prime of FNV-1a). */
    private static long seed(String name) {
        long h = 0xcbf29ce484222325L;
        for (int i = 0; i < name.length(); i++) {
            h = (h ^ name.charAt(i)) * 0x100000001b3L;
        }
        return h;
    }
}
