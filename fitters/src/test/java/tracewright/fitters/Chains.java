package tracewright.fitters;

import java.util.Random;

/** Invented Markov chains with a known answer. */
public final class Chains {

    private Chains() {
    }

    /** Coefficient of the autoregressive chain whose integrated time is tau: (2 tau - 1)/(2 tau + 1). */
    public static double coefficient(double tau) {
        return (2 * tau - 1) / (2 * tau + 1);
    }

    /** Stationary chain x_(i+1) = rho x_i + noise with mean zero and unit variance. */
    public static double[] autoregressive(int n, double tau, Random random) {
        double rho = coefficient(tau);
        double[] x = new double[n];
        x[0] = random.nextGaussian();
        for (int i = 1; i < n; i++) {
            x[i] = rho * x[i - 1] + Math.sqrt(1 - rho * rho) * random.nextGaussian();
        }
        return x;
    }

    /** Exact variance of the mean of n values of that chain: (1/n) [(1 + rho)/(1 - rho) - 2 rho (1 - rho^n)/(n (1 - rho)^2)]. */
    public static double varianceOfMean(int n, double tau) {
        double rho = coefficient(tau);
        return ((1 + rho) / (1 - rho) - 2 * rho * (1 - StrictMath.pow(rho, n)) / (n * (1 - rho) * (1 - rho))) / n;
    }
}
