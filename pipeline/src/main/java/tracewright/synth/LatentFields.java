package tracewright.synth;

import java.util.List;

/**
 * The fluctuations of one configuration: per time slice as many independent unit normals phi_a as there are operators, each an
 * autoregressive series along the stream. Operators are X_b = V_b + sum_a Lambda_ba phi_a with Lambda the lower Cholesky factor
 * of their equal-time covariance.
 */
final class LatentFields {

    private final double[] vacuum;      // [b], slice sums
    private final double[] factor;      // [b][a], Lambda, lower triangular
    private final double[] hitNoise;    // [b]
    private final int count;

    private LatentFields(double[] vacuum, double[] factor, double[] hitNoise) {
        this.vacuum = vacuum;
        this.factor = factor;
        this.hitNoise = hitNoise;
        this.count = vacuum.length;
    }

    /** Operators in the order light loop, strange loop, densities by flow time as listed. */
    static LatentFields of(Truth.Operators operators, double sites) {
        List<Truth.FlowedDensity> densities = operators.densities();
        int n = 2 + densities.size();
        double[] vacuum = new double[n];
        double[] spread = new double[n];
        double[] hits = new double[n];
        fill(0, operators.light(), sites, vacuum, spread, hits);
        fill(1, operators.strange(), sites, vacuum, spread, hits);
        for (int j = 0; j < densities.size(); j++) {
            vacuum[2 + j] = densities.get(j).vacuumPerSite() * sites;
            spread[2 + j] = densities.get(j).fluctuation();
        }
        return new LatentFields(vacuum, cholesky(covariance(operators, spread), n), hits);
    }

    private static void fill(int b, Truth.SliceOperator loop, double sites, double[] vacuum, double[] spread, double[] hits) {
        vacuum[b] = loop.vacuumPerSite() * sites;
        spread[b] = loop.fluctuation();
        hits[b] = loop.hitNoise();
    }

    private static double[] covariance(Truth.Operators operators, double[] spread) {
        int n = spread.length;
        double[] covariance = new double[n * n];
        for (int b = 0; b < n; b++) {
            for (int c = 0; c < n; c++) {
                covariance[b * n + c] = spread[b] * spread[c] * correlation(operators, b, c);
            }
        }
        return covariance;
    }

    private static double correlation(Truth.Operators operators, int b, int c) {
        if (b == c) {
            return 1;
        }
        boolean firstIsLoop = b < 2;
        boolean secondIsLoop = c < 2;
        if (firstIsLoop && secondIsLoop) {
            return operators.lightStrange();
        }
        return firstIsLoop || secondIsLoop ? operators.loopDensity() : operators.flowTimes();
    }

    private static double[] cholesky(double[] s, int n) {
        double[] l = new double[n * n];
        for (int i = 0; i < n; i++) {
            for (int j = 0; j <= i; j++) {
                double sum = s[i * n + j];
                for (int k = 0; k < j; k++) {
                    sum -= l[i * n + k] * l[j * n + k];
                }
                Checks.that(i != j || sum > 0, "the operators' correlations contradict each other: their matrix is not positive definite");
                l[i * n + j] = i == j ? Math.sqrt(sum) : sum / l[j * n + j];
            }
        }
        return l;
    }

    int count() {
        return count;
    }

    double vacuum(int b) {
        return vacuum[b];
    }

    double hitNoise(int b) {
        return hitNoise[b];
    }

    /** Sigma_bc, the equal-time covariance of two operators without hit noise. */
    double covariance(int b, int c) {
        double sum = 0;
        for (int a = 0; a < count; a++) {
            sum += factor[b * count + a] * factor[c * count + a];
        }
        return sum;
    }

    /** Lambda^-1 R by forward substitution: the weights that make a correlator move with the fields so that every ratio is R_b. */
    void weights(double[] ratio, double[] out, int outAt) {
        for (int a = 0; a < count; a++) {
            double sum = ratio[a];
            for (int c = 0; c < a; c++) {
                sum -= factor[a * count + c] * out[outAt + c];
            }
            out[outAt + a] = sum / factor[a * count + a];
        }
    }

    /**
     * Values of one operator on all slices of a configuration, without hit noise.
     *
     * @param phi [time][a]; read
     * @param out from outAt, [time]; overwritten
     */
    void operator(int b, double[] phi, double[] out, int outAt) {
        int times = phi.length / count;
        for (int x = 0; x < times; x++) {
            double sum = vacuum[b];
            for (int a = 0; a <= b; a++) {
                sum += factor[b * count + a] * phi[x * count + a];
            }
            out[outAt + x] = sum;
        }
    }
}
