package tracewright.report;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;
import java.util.Locale;
import tracewright.study.PaperNumber;

/** How numbers are written for people: one place for the whole report. */
final class Numbers {

    private Numbers() {
    }

    /** Shown where a number does not exist. */
    static final String NONE = "\u2013";

    /** Paper style, {@code 0.827(12)}; a number without error is written plainly. */
    static String paper(double value, double error) {
        if (!Double.isFinite(value)) {
            return NONE;
        }
        return error > 0 && Double.isFinite(error) ? sign(PaperNumber.format(value, error)) : plain(value);
    }

    /** Floor of the decimal logarithm; 0 for zero. */
    private static int exponent(BigDecimal x) {
        return x.signum() == 0 ? 0 : x.precision() - x.scale() - 1;
    }

    /** At most five significant digits, without trailing zeros. */
    static String plain(double value) {
        if (!Double.isFinite(value)) {
            return NONE;
        }
        BigDecimal b = new BigDecimal(value).round(new MathContext(5, RoundingMode.HALF_EVEN));
        if (b.signum() == 0) {
            return "0";
        }
        int power = exponent(b);
        BigDecimal trimmed = b.stripTrailingZeros();
        return sign(power < -4 || power > 6 ? trimmed.movePointLeft(power).toPlainString() + "e" + power : trimmed.toPlainString());
    }

    /** With a fixed number of digits behind the point. */
    static String fixed(double value, int decimals) {
        if (!Double.isFinite(value)) {
            return NONE;
        }
        String text = String.format(Locale.ROOT, "%." + decimals + "f", value);
        return sign(text.matches("-[0.]+") ? text.substring(1) : text);
    }

    /** A share of one as a percentage. */
    static String percent(double share) {
        return Double.isFinite(share) ? fixed(100 * share, share < 0.0995 ? 1 : 0) + "\u202f%" : NONE;
    }

    /** A fraction with its error in percent, {@code 90.4(1.2) %}. */
    static String percent(double fraction, double error) {
        return paper(100 * fraction, 100 * error) + "\u202f%";
    }

    /** The key by which a table sorts; empty for a number that does not exist. */
    static String sortKey(double value) {
        return Double.isFinite(value) ? Double.toString(value) : "";
    }

    /** A true minus sign, which stands as wide as a digit. */
    private static String sign(String digits) {
        return digits.startsWith("-") ? "\u2212" + digits.substring(1) : digits;
    }

    /** A coordinate on paper, rounded to 0.01, without trailing zeros. */
    static String coordinate(double x) {
        long hundredths = Math.round(x * 100);
        String sign = hundredths < 0 ? "-" : "";
        long size = Math.abs(hundredths);
        long rest = size % 100;
        String decimals = rest == 0 ? "" : rest % 10 == 0 ? "." + rest / 10 : (rest < 10 ? ".0" : ".") + rest;
        return sign + size / 100 + decimals;
    }
}
