package tracewright.fitters.leastsquares;

import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Random;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.goodness.FitQuality;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;
import tracewright.fitters.models.TwoStateJoint;
import tracewright.fitters.sampled.SampledVector;

/** Microseconds per warm fit of a joint model with 60 points and 8 parameters, one thread; printed, asserted nowhere. */
final class FitBenchmark {

    private static final int SAMPLES = 200;
    private static final int ROUNDS = 40;

    private FitBenchmark() {
    }

    public static void main(String[] arguments) {
        FitModel model = new Shifted(joint());
        double[] truth = {0.5, StrictMath.log(0.35), 1, 0.45, 2.03, -0.4, 0.5, 0.1};
        double[] mean = model.values(truth);
        double[] scale = new double[mean.length];
        for (int i = 0; i < scale.length; i++) {
            scale[i] = 0.01 * mean[i];
        }
        double[][] blocks = GaussianBlocks.draw(SAMPLES, mean, scale, 0.9, new Random(17));
        int[] ones = IntStream.generate(() -> 1).limit(SAMPLES).toArray();
        SampledVector jackknife = GaussianBlocks.jackknife(blocks);
        SampledVector bootstrap = GaussianBlocks.bootstrap(blocks, ones, SAMPLES, new Random(19));
        Weighting w = ((WeightingOutcome.Usable) Weighting.of(jackknife, new CovarianceRule.Full())).weighting();
        System.out.println(model.points() + " points, " + model.parameters() + " parameters, " + SAMPLES + " samples");
        measure("jackknife, frozen metric", jackknife, model, w, truth);
        measure("bootstrap, descents", bootstrap, model, w, truth);
    }

    private static TwoStateJoint joint() {
        int[] separations = {8, 10, 12, 14};
        int[] sinks = IntStream.of(separations).flatMap(t -> IntStream.rangeClosed(1, t - 1).map(tau -> t)).toArray();
        int[] insertions = IntStream.of(separations).flatMap(t -> IntStream.rangeClosed(1, t - 1)).toArray();
        return new TwoStateJoint(IntStream.rangeClosed(1, 20).toArray(), sinks, insertions);
    }

    private static void measure(String label, SampledVector data, FitModel model, Weighting w, double[] start) {
        WhitenedModel whitened = new WhitenedModel(model, w.linv());
        whitened.data(data.centralRow());
        Descent.Converged centre = (Descent.Converged) whitened.machine().cold(start, 2000);
        double[] jacobian = new double[model.points() * model.parameters()];
        model.evaluate(centre.parameters(), new double[model.points()], jacobian);
        double[] covariance = FitQuality.of(w, jacobian, model.parameters(), centre.chiSquared(), 1).covariance();
        double[] times = new double[ROUNDS];
        for (int n = 0; n < ROUNDS; n++) {
            SampleRefits refits = new SampleRefits(data, model, whitened, centre, covariance, w.errors());
            long from = System.nanoTime();
            refits.run().ifPresent(failure -> {
                throw new IllegalStateException(failure);
            });
            times[n] = (System.nanoTime() - from) / 1e3 / SAMPLES;
        }
        Arrays.sort(times);
        System.out.printf(Locale.ROOT, "%-28s best %.1f, median %.1f microseconds per fit%n", label, times[0], times[ROUNDS / 2]);
    }

    /** A joint model whose three-point values stand on a constant of their own: the eighth parameter. */
    private record Shifted(TwoStateJoint joint) implements FitModel {

        private static final double UNIT = 1e-3;

        @Override
        public int points() {
            return joint.points();
        }

        @Override
        public List<String> parameterNames() {
            return Stream.concat(joint.parameterNames().stream(), Stream.of("constant")).toList();
        }

        @Override
        public int parameters() {
            return 8;
        }

        @Override
        public int scratch() {
            return joint.scratch();
        }

        @Override
        public void evaluate(double[] p, double[] values, double[] jacobian) {
            evaluate(p, values, jacobian, new double[scratch()]);
        }

        @Override
        public void evaluate(double[] p, double[] values, double[] jacobian, double[] scratch) {
            joint.evaluate(p, values, jacobian, scratch);
            for (int i = points() - 1; i >= 0; i--) {
                for (int j = 6; j >= 0; j--) {
                    jacobian[8 * i + j] = jacobian[7 * i + j];
                }
                double shift = i < 20 ? 0 : UNIT;
                jacobian[8 * i + 7] = shift;
                values[i] += p[7] * shift;
            }
        }

        @Override
        public List<double[]> starts(double[] y, double[] errors) {
            return joint.starts(y, errors).stream().map(s -> Arrays.copyOf(s, 8)).toList();
        }
    }
}
