/** Statistics and fits for correlated Monte Carlo data: arrays in, numbers out. Opens no file, reads no clock, prints nothing. */
module tracewright.fitters {
    requires commons.math3;

    exports tracewright.fitters.autocorrelation;
    exports tracewright.fitters.averaging;
    exports tracewright.fitters.covariance;
    exports tracewright.fitters.goodness;
    exports tracewright.fitters.leastsquares;
    exports tracewright.fitters.linalg;
    exports tracewright.fitters.models;
    exports tracewright.fitters.resampling;
    exports tracewright.fitters.sampled;
}
