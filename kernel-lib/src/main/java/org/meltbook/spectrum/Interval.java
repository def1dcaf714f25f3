package org.meltbook.spectrum;

import java.util.stream.DoubleStream;

/**
 * A 95 % interval of a positive number from refits, reflected in logarithms about the number itself: where refits lie
 * above the number, the number is taken to lie above the truth by as much. Both ends are NaN, not known, if more than
 * one refit in twenty gives no number.
 */
record Interval(double low, double high) {
    static Interval about(double value, DoubleStream refits) {
        double[] all = refits.toArray();
        double[] there = DoubleStream.of(all).filter(v -> v > 0).sorted().toArray();
        if (there.length < 0.95 * all.length || there.length == 0) {
            return new Interval(Double.NaN, Double.NaN);
        }
        return new Interval(value * (value / quantile(there, 0.975)), value * (value / quantile(there, 0.025)));
    }

    private static double quantile(double[] sorted, double share) {
        double place = share * (sorted.length - 1);
        int below = (int) Math.floor(place);
        int above = Math.min(sorted.length - 1, below + 1);
        return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
    }
}
