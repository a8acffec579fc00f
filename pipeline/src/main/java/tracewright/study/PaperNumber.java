package tracewright.study;

import java.math.BigDecimal;
import java.math.RoundingMode;

/** Numbers as papers write them: {@code 0.827(12)}, {@code 938(41)}, {@code 1.2(3.4)}; two significant digits of the error. */
public final class PaperNumber {

    private static final int LARGEST_PLAIN = 6;

    private PaperNumber() {
    }

    /** Value and error; without an error the shortest digits of the value. */
    public static String format(double value, double error) {
        if (!Double.isFinite(value) || !Double.isFinite(error)) {
            return "not a number";
        }
        BigDecimal v = error == 0 ? new BigDecimal(Double.toString(value)) : new BigDecimal(value);
        if (error == 0) {
            int shift = v.signum() == 0 || Math.abs(leading(v)) <= LARGEST_PLAIN ? 0 : leading(v);
            return v.scaleByPowerOfTen(-shift).stripTrailingZeros().toPlainString() + power(shift);
        }
        BigDecimal e = twoDigits(error);
        int shift = v.signum() == 0 ? leading(e) : Math.max(leading(e), leading(v));
        boolean scaled = Math.abs(leading(e)) > LARGEST_PLAIN && Math.abs(shift) > LARGEST_PLAIN;
        return scaled ? plain(v.scaleByPowerOfTen(-shift), e.scaleByPowerOfTen(-shift)) + power(shift) : plain(v, e);
    }

    /** Value and an error of two digits, without a power of ten. */
    private static String plain(BigDecimal value, BigDecimal error) {
        int exponent = leading(error);
        int decimals = Math.max(0, 1 - exponent);
        String brackets = exponent >= 0 ? error.setScale(decimals, RoundingMode.HALF_EVEN).toPlainString() : error.unscaledValue().toString();
        return value.setScale(decimals, RoundingMode.HALF_EVEN).toPlainString() + "(" + brackets + ")";
    }

    private static String power(int exponent) {
        return exponent == 0 ? "" : "e" + exponent;
    }

    private static BigDecimal twoDigits(double error) {
        BigDecimal e = new BigDecimal(error).round(new java.math.MathContext(2, RoundingMode.HALF_EVEN));
        return e.precision() < 2 ? e.setScale(e.scale() + 2 - e.precision()) : e;
    }

    /** Decimal exponent of the first digit. */
    private static int leading(BigDecimal x) {
        return x.precision() - x.scale() - 1;
    }
}
