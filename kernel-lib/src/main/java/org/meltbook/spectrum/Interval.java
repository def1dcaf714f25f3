package org.meltbook.spectrum;

import java.util.stream.DoubleStream;

/** A 95 % interval of a positive number from refits. Both ends are NaN if it is not known. */
record Interval(double low, double high) {
    /**
     * The interval about a number, reflected in logarithms: where refits lie above the number, the number is taken to
     * lie above the truth by as much. Not known if more than one refit in twenty gives no number.
     */
    static Interval about(double value, DoubleStream refits) {
        Interval spread = of(refits);
        return new Interval(value * (value / spread.high), value * (value / spread.low));
    }

    /** The middle 95 % of the refits as they lie. Not known if more than one in twenty gives no number. */
    static Interval of(DoubleStream refits) {
        double[] all = refits.toArray();
        double[] there = DoubleStream.of(all).filter(v -> v > 0).sorted().toArray();
        if (there.length < 0.95 * all.length || there.length == 0) {
            return new Interval(Double.NaN, Double.NaN);
        }
        return new Interval(quantile(there, 0.025), quantile(there, 0.975));
    }

    /** The interval that holds both. */
    Interval and(Interval other) {
        return new Interval(Math.min(low, other.low), Math.max(high, other.high));
    }

    /** Whether the two have a number in common; false if one is not known. */
    boolean meets(Interval other) {
        return low <= other.high && other.low <= high;
    }

    private static double quantile(double[] sorted, double share) {
        double place = share * (sorted.length - 1);
        int below = (int) Math.floor(place);
        int above = Math.min(sorted.length - 1, below + 1);
        return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
    }
}
