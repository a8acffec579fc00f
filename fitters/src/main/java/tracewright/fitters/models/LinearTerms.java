package tracewright.fitters.models;

import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.LinearFit;

/** f_i = sum_j b_j X_ij for a given design X. Parameters b0, b1 ... Immutable. */
public final class LinearTerms implements FitModel {

    private final double[] design;   // [point][term]
    private final int points;
    private final int terms;

    private LinearTerms(double[] design, int points, int terms) {
        this.design = design;
        this.points = points;
        this.terms = terms;
    }

    /** @param design X [point][term], rows of equal length, no fewer points than terms */
    public static LinearTerms of(double[][] design) {
        int terms = design.length == 0 ? 0 : design[0].length;
        if (terms == 0 || design.length < terms || !Arrays.stream(design).allMatch(row -> row.length == terms)) {
            throw new IllegalArgumentException("a design of " + design.length + " points needs rows of equal length, one to " + design.length
                + " terms each; the first has " + terms);
        }
        return new LinearTerms(Arrays.stream(design).flatMapToDouble(Arrays::stream).toArray(), design.length, terms);
    }

    @Override
    public int points() {
        return points;
    }

    @Override
    public List<String> parameterNames() {
        return IntStream.range(0, terms).mapToObj(j -> "b" + j).toList();
    }

    @Override
    public void evaluate(double[] p, double[] values, double[] jacobian) {
        System.arraycopy(design, 0, jacobian, 0, design.length);
        for (int i = 0; i < points; i++) {
            double sum = 0;
            for (int j = 0; j < terms; j++) {
                sum += design[i * terms + j] * p[j];
            }
            values[i] = sum;
        }
    }

    /** The unweighted solution; zeros where the terms are dependent, from where a descent says so. */
    @Override
    public List<double[]> starts(double[] y, double[] errors) {
        return List.of(LinearFit.of(design, y, terms) instanceof LinearFit.Outcome.Solved solved ? solved.fit().parameters() : new double[terms]);
    }
}
