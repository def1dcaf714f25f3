package org.meltbook.base;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;

/** The one formatter of numbers: four significant digits, root locale, the same text on every machine. */
public final class NumberText {
    private static final int DIGITS = 4;
    private static final String RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹";

    private NumberText() {}

    /** The number with four significant digits: {@code 51060}, {@code 0.01395}, {@code 1.640×10⁻⁵}; NaN is {@code –}. */
    public static String of(double value) {
        return of(value, DIGITS);
    }

    /** The number with the given count of significant digits. */
    public static String of(double value, int digits) {
        if (Double.isNaN(value)) {
            return "–";
        }
        if (Double.isInfinite(value)) {
            return value > 0 ? "∞" : "−∞";
        }
        if (value == 0) {
            return "0";
        }
        BigDecimal rounded = new BigDecimal(value).round(new MathContext(digits, RoundingMode.HALF_EVEN));
        int exponent = rounded.precision() - rounded.scale() - 1;
        if (exponent >= -3 && exponent < 6) {
            return minus(rounded.setScale(Math.max(0, digits - 1 - exponent), RoundingMode.HALF_EVEN)
                    .toPlainString());
        }
        BigDecimal mantissa = rounded.movePointLeft(exponent).setScale(digits - 1, RoundingMode.HALF_EVEN);
        return minus(mantissa.toPlainString()) + "×10" + raised(exponent);
    }

    /**
     * Value and standard error with matching digits (two of the error) and the unit once: {@code 1.640(12)} is never
     * written; it reads {@code (1.640 ± 0.012)×10⁵ Pa·s}. A NaN error reads {@code ± unknown}.
     *
     * @param unit text of the unit, or blank for none
     */
    public static String of(double value, double error, String unit) {
        String tail = unit.isBlank() || unit.equals("1") ? "" : " " + unit;
        if (!Double.isFinite(value)) {
            return of(value) + tail;
        }
        if (!Double.isFinite(error)) {
            return of(value) + " ± unknown" + tail;
        }
        if (error == 0) {
            return of(value) + " ± 0" + tail;
        }
        int exponent = exponentOf(Math.max(Math.abs(value), Math.abs(error)));
        boolean plain = exponent >= -3 && exponent < 6;
        int shift = plain ? 0 : exponent;
        int decimals = Math.max(0, 1 - exponentOf(error) + shift);
        String both = fixed(value, shift, decimals) + " ± " + fixed(error, shift, decimals);
        return (plain ? both : "(" + both + ")×10" + raised(exponent)) + tail;
    }

    /** The number with a fixed count of digits behind the point: {@code −0.58}; NaN is {@code –}. */
    public static String withDecimals(double value, int decimals) {
        if (!Double.isFinite(value)) {
            return of(value);
        }
        BigDecimal rounded = new BigDecimal(value).setScale(decimals, RoundingMode.HALF_EVEN);
        return minus(rounded.toPlainString());
    }

    private static int exponentOf(double value) {
        BigDecimal rounded = new BigDecimal(value).round(new MathContext(2, RoundingMode.HALF_EVEN));
        return rounded.precision() - rounded.scale() - 1;
    }

    private static String fixed(double value, int shift, int decimals) {
        return minus(new BigDecimal(value)
                .movePointLeft(shift)
                .setScale(decimals, RoundingMode.HALF_EVEN)
                .toPlainString());
    }

    private static String minus(String plain) {
        return plain.replace('-', '−');
    }

    /** The whole number in raised digits, as it stands behind a ten: {@code ⁻⁵}. */
    public static String raised(int exponent) {
        StringBuilder text = new StringBuilder();
        for (char c : Integer.toString(exponent).toCharArray()) {
            text.append(c == '-' ? '⁻' : RAISED.charAt(c - '0'));
        }
        return text.toString();
    }
}
