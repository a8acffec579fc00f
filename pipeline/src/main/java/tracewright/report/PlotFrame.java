package tracewright.report;

/**
 * The rectangle in which data are drawn, and the map from data to paper; paper's y runs downwards.
 *
 * @param left   in drawing units, 1 unit = 1 point at the width of one column
 * @param x      range across
 * @param y      range upright
 */
record PlotFrame(double left, double top, double right, double bottom, PlotRange x, PlotRange y) {

    double px(double value) {
        return left + (value - x.low()) / (x.high() - x.low()) * (right - left);
    }

    double py(double value) {
        return bottom - (value - y.low()) / (y.high() - y.low()) * (bottom - top);
    }
}
