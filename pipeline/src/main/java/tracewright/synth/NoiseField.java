package tracewright.synth;

/**
 * Unit-variance noise e(source, t) of one correlator, correlated between neighbouring times (k per step), between sources (c_s)
 * and along the stream (autoregressive): e = sqrt(c_s) e_shared(t) + sqrt(1 - c_s) e_source(t).
 */
final class NoiseField {

    private final Gaussian gaussian;
    private final int sources;
    private final int times;
    private final double betweenTimes;
    private final double shared;
    private final double single;
    private final double[] rows;     // [1 + source][t]; row 0 is shared by all sources

    NoiseField(Gaussian gaussian, int sources, int times, Truth.Noise noise) {
        this.gaussian = gaussian;
        this.sources = sources;
        this.times = times;
        this.betweenTimes = noise.betweenTimes();
        this.shared = Math.sqrt(noise.betweenSources());
        this.single = Math.sqrt(1 - noise.betweenSources());
        this.rows = new double[(1 + sources) * times];
    }

    /** Moves to the next configuration, whose correlation with this one is {@code kept} (0: the first of a stream). */
    void advance(double kept) {
        double fresh = Math.sqrt(1 - kept * kept);
        double innovation = Math.sqrt(1 - betweenTimes * betweenTimes);
        for (int row = 0; row <= sources; row++) {
            double running = gaussian.next();
            for (int t = 0; t < times; t++) {
                if (t > 0) {
                    running = betweenTimes * running + innovation * gaussian.next();
                }
                rows[row * times + t] = kept * rows[row * times + t] + fresh * running;
            }
        }
    }

    double at(int source, int t) {
        return shared * rows[t] + single * rows[(1 + source) * times + t];
    }
}
