package tracewright.study;

/** A number with its standard error (zero: exact), written {@code 0.0904(21)}, {@code 938(4)}, {@code 1.25e-3(10)} or {@code 0.25}. */
public record UncertainValue(double value, double error) {

    public UncertainValue {
        if (!Double.isFinite(value) || !(error >= 0) || Double.isInfinite(error)) {
            throw new IllegalArgumentException(value + " with error " + error + " is not a finite number with a finite error of zero or more");
        }
    }
}
