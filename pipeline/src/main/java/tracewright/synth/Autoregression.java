package tracewright.synth;

/**
 * A first-order autoregressive Gaussian series of unit variance, x_{i+1} = rho x_i + sqrt(1 - rho^2) xi, and what is known
 * exactly about it. Its autocorrelation is rho^k, its integrated autocorrelation time 1/2 + sum_k rho^k = (1 + rho)/(2 (1 - rho)).
 */
public record Autoregression(double rho) {

    public Autoregression {
        Checks.correlation("rho", rho);
    }

    /** The series with an integrated autocorrelation time of one half (none) or more: rho = (2 tau - 1)/(2 tau + 1). */
    public static Autoregression withTauInt(double tauInt) {
        return new Autoregression((2 * tauInt - 1) / (2 * tauInt + 1));
    }

    public double tauInt() {
        return 0.5 * (1 + rho) / (1 - rho);
    }

    /** Integrated autocorrelation time of the product of two independent such series, and of the square of one: rho becomes rho^2. */
    public double tauIntOfProduct() {
        return new Autoregression(rho * rho).tauInt();
    }

    /** Correlation of two members that many steps apart, rho^steps. */
    public double over(long steps) {
        double power = 1;
        for (long k = 0; k < steps && power != 0; k++) {
            power *= rho;
        }
        return power;
    }

    /** Exact variance of the mean of n successive members, (1/n) [1 + 2 sum_{k<n} (1 - k/n) rho^k]. */
    public double varianceOfMean(int n) {
        double sum = 0;
        double power = 1;
        for (int k = 1; k < n; k++) {
            power *= rho;
            sum += (1 - (double) k / n) * power;
        }
        return (1 + 2 * sum) / n;
    }
}
