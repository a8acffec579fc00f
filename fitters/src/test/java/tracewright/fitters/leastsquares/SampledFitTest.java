package tracewright.fitters.leastsquares;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import tracewright.fitters.GaussianBlocks;
import tracewright.fitters.covariance.CovarianceRule;
import tracewright.fitters.covariance.Weighting;
import tracewright.fitters.covariance.WeightingOutcome;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Descent;
import tracewright.fitters.leastsquares.LevenbergMarquardt.Scaling;
import tracewright.fitters.models.Exponentials;
import tracewright.fitters.models.LinearTerms;
import tracewright.fitters.models.Plateau;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.fitters.sampled.SampledVector;

@DisplayNameGeneration(ReplaceUnderscores.class)
class SampledFitTest {

    private static final double[] CENTRES = IntStream.rangeClosed(1, 10).mapToDouble(i -> 0.3 * i).toArray();
    private static final LinearTerms LINE = LinearTerms.of(IntStream.range(0, 10).mapToObj(i -> new double[] {1, CENTRES[i]}).toArray(double[][]::new));
    private static final double[] LINE_TRUTH = {0.7, -0.2};

    /** Steps with the frozen metric against descents to full precision, in errors of the parameters. */
    @Test
    void given_jackknife_rows_when_fitted_with_the_frozen_metric_then_they_equal_descents_to_1e_6_of_an_error() {
        Exponentials model = new Exponentials(IntStream.rangeClosed(1, 12).toArray(), 2);
        SampledVector data = correlator(model, 100, 7);
        FitOutcome.Converged fit = converged(SampledFit.fit("two", data, model, new CovarianceRule.Full()));
        WhitenedModel whitened = new WhitenedModel(model, weighting(data).linv());
        double[] centre = fit.parameters().centralRow();
        double[] errors = fit.parameters().errors();
        double worst = 0;
        for (int k = 0; k < data.sampleCount(); k++) {
            whitened.data(data.sampleRow(k));
            Descent.Converged d = assertInstanceOf(Descent.Converged.class, whitened.machine().descend(centre, Scaling.FORGETTING, 200));
            for (int j = 0; j < 4; j++) {
                worst = Math.max(worst, Math.abs(d.parameters()[j] - fit.parameters().sample(k, j)) / errors[j]);
            }
        }
        assertTrue(worst < 1e-6, "largest difference " + worst + " errors");
    }

    /** A linear fit's samples are H times the data's, so that their covariance is H S H^T to rounding, for any weight. */
    @ParameterizedTest
    @ValueSource(strings = {"full", "diagonal", "shrunk", "floored"})
    void given_a_linear_model_when_fitted_then_the_spread_of_the_samples_is_the_sandwich(String word) {
        SampledVector data = line(60, 0.8, new Random(3));
        FitOutcome.Converged fit = converged(SampledFit.fit("line", data, LINE, rule(word)));
        double[] spread = fit.parameters().covariance();
        double[] sandwich = fit.covariance();
        for (int i = 0; i < 4; i++) {
            double scale = Math.sqrt(spread[3 * (i / 2)] * spread[3 * (i % 2)]);
            assertEquals(spread[i], sandwich[i], 1e-9 * scale, word + " entry " + i);
        }
    }

    /** Relative errors of a per cent make the second derivative matter at the same level. */
    @Test
    void given_a_nonlinear_model_when_fitted_then_the_spread_of_the_samples_is_the_sandwich_up_to_curvature() {
        Exponentials model = new Exponentials(IntStream.rangeClosed(3, 14).toArray(), 1);
        FitOutcome.Converged fit = converged(SampledFit.fit("one", correlator(model, 100, 11), model, new CovarianceRule.Diagonal()));
        double[] errors = fit.parameters().errors();
        for (int j = 0; j < 2; j++) {
            assertEquals(errors[j], Math.sqrt(fit.covariance()[3 * j]), 0.05 * errors[j], "parameter " + j);
        }
    }

    /** Bartlett's law of the covariance: (F - 1) V in a group of its own, so that the total is F V; F from g = 60, f = 8. */
    @Test
    void given_few_blocks_when_asked_for_numbers_then_the_noise_of_the_covariance_is_a_group_of_its_own() {
        FitOutcome.Converged fit = converged(SampledFit.fit("alder", line(60, 0.8, new Random(5)), LINE, new CovarianceRule.Full()));
        double f = 59.0 * 58 / (51.0 * 50);
        assertEquals(f, fit.noiseFactor(), 1e-12);
        double[] v = fit.covariance();
        List<SampledNumber> b = fit.numbers();
        for (int i = 0; i < 2; i++) {
            for (int j = 0; j < 2; j++) {
                double scale = Math.sqrt(v[3 * i] * v[3 * j]);
                assertEquals(f * v[2 * i + j], SampledNumber.covariance(b.get(i), b.get(j)), 1e-9 * scale);
                assertEquals((f - 1) * v[2 * i + j], SampledNumber.covarianceByGroup(b.get(i), b.get(j)).get("fit:alder"), 1e-9 * scale);
            }
        }
        SampledNumber value = fit.derived(p -> p[0] + 2 * p[1]);
        assertEquals(b.get(0).plus(b.get(1).times(2)).variance(), value.variance(), 1e-9 * value.variance());
        assertEquals(fit.parameters().central(0) + 2 * fit.parameters().central(1), value.central(), 1e-14);
    }

    @Test
    void given_a_fit_when_asked_for_its_curve_then_chi_squared_is_that_of_the_residuals() {
        SampledVector data = line(60, 0.8, new Random(5));
        FitOutcome.Converged fit = converged(SampledFit.fit("line", data, LINE, new CovarianceRule.Diagonal()));
        double q = 0;
        for (int i = 0; i < 10; i++) {
            double r = (data.central(i) - fit.fitted()[i]) / data.errors()[i];
            q += r * r;
        }
        assertEquals(q, fit.chiSquared(), 1e-12 * q);
        assertEquals(10, fit.points());
        assertEquals(8, fit.degreesOfFreedom());
    }

    /** The same blocks drawn 600 times: errors agree within three Monte Carlo errors, 3/sqrt(1200), and the jackknife's O(1/g). */
    @Test
    void given_bootstrap_samples_when_fitted_then_errors_agree_with_the_jackknife() {
        Exponentials model = new Exponentials(IntStream.rangeClosed(3, 14).toArray(), 1);
        double[][] blocks = blocks(model, 100, 11);
        int[] ones = IntStream.generate(() -> 1).limit(100).toArray();
        FitOutcome.Converged jackknife = converged(SampledFit.fit("one", GaussianBlocks.jackknife(blocks), model, new CovarianceRule.Diagonal()));
        SampledVector drawn = GaussianBlocks.bootstrap(blocks, ones, 600, new Random(2));
        FitOutcome.Converged bootstrap = converged(SampledFit.fit("one", drawn, model, new CovarianceRule.Diagonal()));
        for (int j = 0; j < 2; j++) {
            double e = jackknife.parameters().errors()[j];
            assertEquals(e, bootstrap.parameters().errors()[j], (3 / Math.sqrt(1200) + 0.03) * e, "parameter " + j);
        }
    }

    /**
     * Correlated straight lines, g = 40 blocks, 10 points, full covariance: one-sigma intervals cover 0.68 with F and 0.57 without
     * it (4,000 simulations each), 0.015 being the error of a coverage out of 1,000.
     */
    @Test
    void given_a_thousand_correlated_lines_when_fitted_then_intervals_cover_with_the_noise_factor_and_not_without() {
        Random random = new Random(20260402);
        int repetitions = 1000;
        int with = 0;
        int without = 0;
        double sum = 0;
        for (int n = 0; n < repetitions; n++) {
            FitOutcome.Converged fit = converged(SampledFit.fit("line", line(40, 0.8, random), LINE, new CovarianceRule.Full()));
            double z = (fit.parameters().central(1) - LINE_TRUTH[1]) / fit.parameters().errors()[1];
            with += Math.abs(z) < Math.sqrt(fit.noiseFactor()) ? 1 : 0;
            without += Math.abs(z) < 1 ? 1 : 0;
            sum += z / Math.sqrt(fit.noiseFactor());
        }
        assertEquals(0.68, with / (double) repetitions, 0.044);
        assertEquals(0.57, without / (double) repetitions, 0.047);
        assertEquals(0, sum / repetitions, 3 / Math.sqrt(repetitions));
    }

    @Test
    void given_too_few_blocks_for_a_full_covariance_when_fitted_then_it_is_refused_with_advice() {
        FitOutcome.Failed failed = failed(SampledFit.fit("line", line(20, 0.8, new Random(1)), LINE, new CovarianceRule.Full()));
        assertTrue(failed.reason().contains("20 blocks") && failed.advice().contains("fewer points"), failed.toString());
    }

    /** The two starts end in p near 1 and p near -1, of which one is lower: nothing confirms it. */
    @Test
    void given_starts_that_end_in_different_minima_when_fitted_then_the_outcome_is_ambiguous() {
        FitOutcome.Failed failed = failed(SampledFit.fit("wells", wells(), new Wells(1, -1), new CovarianceRule.Diagonal()));
        assertTrue(failed.reason().startsWith("ambiguous: only one of 2 starts"), failed.reason());
    }

    /** With the first block the last point is 0.02 and prefers p = 1; without it, -0.08 and p = -1, though p = 1 stays a minimum. */
    @Test
    void given_a_sample_that_belongs_to_another_minimum_when_fitted_then_it_is_found_and_named() {
        FitOutcome.Failed failed = failed(SampledFit.fit("wells", wells(), new Wells(1, -1, 0.9), new CovarianceRule.Diagonal()));
        assertTrue(failed.reason().contains("undetermined: in sample 0 of 40 the parameter p moves from 1") && failed.reason().contains(" to -1"),
            failed.reason());
    }

    /** 40 blocks, nine points near one; the last point is 3.92 in the first block and -0.08 in all others. */
    private static SampledVector wells() {
        Random random = new Random(8);
        double[][] blocks = new double[40][10];
        for (int k = 0; k < 40; k++) {
            for (int i = 0; i < 9; i++) {
                blocks[k][i] = 1 + 0.3 * random.nextGaussian();
            }
            blocks[k][9] = k == 0 ? 3.92 : -0.08;
        }
        return GaussianBlocks.jackknife(blocks);
    }

    /** p^2 at every point but the last, p there. */
    private static final class Wells implements FitModel {
        private final double[] starts;

        Wells(double... starts) {
            this.starts = starts;
        }

        @Override
        public int points() {
            return 10;
        }

        @Override
        public List<String> parameterNames() {
            return List.of("p");
        }

        @Override
        public void evaluate(double[] p, double[] values, double[] jacobian) {
            for (int i = 0; i < 10; i++) {
                values[i] = i == 9 ? p[0] : p[0] * p[0];
                jacobian[i] = i == 9 ? 1 : 2 * p[0];
            }
        }

        @Override
        public List<double[]> starts(double[] y, double[] errors) {
            return Arrays.stream(starts).mapToObj(s -> new double[] {s}).toList();
        }
    }

    /**
     * A contact term at time zero and a value at time one that is a per cent, five errors, below the single state: a second state
     * of positive amplitude can only make that worse, so its gap runs away.
     */
    @Test
    void given_one_state_in_the_data_when_two_are_fitted_then_the_outcome_names_the_gap() {
        Exponentials model = new Exponentials(IntStream.rangeClosed(0, 12).toArray(), 2);
        double[] truth = {0.5, StrictMath.log(30), 1, 0.5};
        double[] mean = model.values(truth);
        mean[1] *= 0.99;
        double[] scale = new double[mean.length];
        for (int i = 0; i < scale.length; i++) {
            scale[i] = 0.02 * mean[i];
        }
        SampledVector data = GaussianBlocks.jackknife(GaussianBlocks.draw(100, mean, scale, 0.5, new Random(4)));
        FitOutcome.Failed failed = failed(SampledFit.fit("two", data, model, new CovarianceRule.Full()));
        assertTrue(failed.reason().contains("undetermined: gap 1") && failed.reason().contains("do not resolve 2 states"), failed.reason());
        assertTrue(failed.advice().contains("fewer states"), failed.advice());
    }

    @Test
    void given_more_parameters_than_points_when_fitted_then_both_numbers_are_named() {
        Exponentials model = new Exponentials(new int[] {1, 2, 3}, 2);
        FitOutcome.Failed failed = failed(SampledFit.fit("two", correlator(model, 50, 1), model, new CovarianceRule.Full()));
        assertTrue(failed.reason().contains("3 points cannot determine 4 parameters"), failed.reason());
    }

    /** A plateau is the weighted mean: with W = S^-1, b = (1^T W y)/(1^T W 1); here two independent points, by hand. */
    @Test
    void given_two_points_when_a_plateau_is_fitted_diagonally_then_it_is_the_weighted_mean() {
        double[][] blocks = {{1, 4}, {3, 8}, {2, 4}, {2, 8}};
        SampledVector data = GaussianBlocks.jackknife(blocks);
        FitOutcome.Converged fit = converged(SampledFit.fit("mean", data, new Plateau(2), new CovarianceRule.Diagonal()));
        // Means 2 and 6, variances of the mean (2/3)/4 and (16/3)/4: weights 6 and 3/4.
        assertEquals((6 * 2 + 0.75 * 6) / 6.75, fit.parameters().central(0), 1e-14);
        assertEquals(16 / (1.0 / 6 + 4.0 / 3), fit.chiSquared(), 1e-12);
    }

    private static SampledVector line(int blocks, double rho, Random random) {
        double[] truth = new double[10];
        double[] scale = new double[10];
        for (int i = 0; i < 10; i++) {
            truth[i] = LINE_TRUTH[0] + LINE_TRUTH[1] * CENTRES[i];
            scale[i] = 1 + 0.1 * i;
        }
        return GaussianBlocks.jackknife(GaussianBlocks.draw(blocks, truth, scale, rho, random));
    }

    private static SampledVector correlator(Exponentials model, int blocks, long seed) {
        return GaussianBlocks.jackknife(blocks(model, blocks, seed));
    }

    /** Noise that grows from 3 per cent per block, neighbouring times correlated by 0.9. */
    private static double[][] blocks(Exponentials model, int blocks, long seed) {
        double[] truth = model.parameters() == 2 ? new double[] {0.5, 1} : new double[] {0.5, StrictMath.log(0.5), 1, 0.8};
        double[] mean = model.values(truth);
        double[] scale = new double[mean.length];
        for (int i = 0; i < scale.length; i++) {
            scale[i] = 0.03 * mean[i] * StrictMath.exp(0.1 * i);
        }
        return GaussianBlocks.draw(blocks, mean, scale, 0.9, new Random(seed));
    }

    private static Weighting weighting(SampledVector data) {
        return assertInstanceOf(WeightingOutcome.Usable.class,
            Weighting.of(data, new CovarianceRule.Full())).weighting();
    }

    private static CovarianceRule rule(String word) {
        return switch (word) {
            case "full" -> new CovarianceRule.Full();
            case "diagonal" -> new CovarianceRule.Diagonal();
            case "shrunk" -> new CovarianceRule.Shrunk();
            default -> new CovarianceRule.Floored(0.1);
        };
    }

    private static FitOutcome.Converged converged(FitOutcome outcome) {
        return assertInstanceOf(FitOutcome.Converged.class, outcome, outcome.toString());
    }

    private static FitOutcome.Failed failed(FitOutcome outcome) {
        return assertInstanceOf(FitOutcome.Failed.class, outcome);
    }
}
