package org.meltbook.chart;

import java.util.stream.DoubleStream;

/**
 * The part of the number line that one axis shows, a little wider than what is drawn on it.
 *
 * @param min         left or lower end, above zero if logarithmic
 * @param max         right or upper end, above {@code min}
 * @param logarithmic whether equal steps are equal ratios
 */
record Scale(double min, double max, boolean logarithmic) {
    /** Numbers beyond this are not drawn: sums and differences of them overflow. */
    private static final double LARGEST = 1e300;

    /** Powers of ten beyond ± this are no longer numbers of full precision. */
    private static final double LARGEST_POWER = 306;

    private static final double MARGIN = 0.045;
    private static final double MARGIN_AT_EDGE_MARKS = 0.09;
    /** Below this relative span all values count as one: rounding alone spreads them so far. */
    private static final double ONE_VALUE = 1e-9;

    /** Whether a number has a place on an axis of this kind. */
    static boolean holds(double value, boolean logarithmic) {
        return Math.abs(value) <= LARGEST && (!logarithmic || value >= 1 / LARGEST);
    }

    /**
     * The axis for the given numbers, all of which it must {@linkplain #holds hold}; one decade around 1, or 0 to 1, if
     * there are none.
     *
     * @param edgeMarks whether points below the axis are to be marked at its lower end, which takes some room
     */
    static Scale around(double[] values, boolean logarithmic, boolean edgeMarks) {
        if (values.length == 0) {
            return logarithmic ? new Scale(0.3, 30, true) : new Scale(-0.05, 1.05, false);
        }
        double[] places = logarithmic ? DoubleStream.of(values).map(Math::log10).toArray() : values;
        double low = DoubleStream.of(places).min().orElseThrow();
        double high = DoubleStream.of(places).max().orElseThrow();
        if (high - low <= ONE_VALUE * Math.max(Math.abs(low), Math.abs(high))) {
            double half = logarithmic ? 0.5 : low == 0 ? 1 : Math.abs(low) / 4;
            low -= half;
            high += half;
        }
        double lower = low - (high - low) * (edgeMarks ? MARGIN_AT_EDGE_MARKS : MARGIN);
        double upper = high + (high - low) * MARGIN;
        return logarithmic
                ? new Scale(power(Math.max(lower, -LARGEST_POWER)), power(Math.min(upper, LARGEST_POWER)), true)
                : new Scale(lower, upper, false);
    }

    private static double power(double exponent) {
        return Math.pow(10, exponent);
    }

    /** Where a number lies, 0 at {@code min} and 1 at {@code max}. */
    double fraction(double value) {
        return logarithmic ? (Math.log10(value) - Math.log10(min)) / decades() : (value - min) / (max - min);
    }

    /** How many powers of ten a logarithmic axis shows. */
    double decades() {
        return Math.log10(max) - Math.log10(min);
    }
}
