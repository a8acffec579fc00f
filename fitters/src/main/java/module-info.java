/** Statistics and fits for correlated Monte Carlo data: arrays in, numbers out. Opens no file, reads no clock, prints nothing. */
module tracewright.fitters {
    requires commons.math3;

    exports tracewright.fitters.sampled;
}
