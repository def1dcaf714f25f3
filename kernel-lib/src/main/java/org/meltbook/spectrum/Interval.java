package org.meltbook.spectrum;

import java.util.stream.DoubleStream;

/** The middle 95 % of many values; both ends NaN, not known, if more than one in twenty of them is missing. */
record Interval(double low, double high) {
    static Interval of(DoubleStream values) {
        double[] all = values.toArray();
        double[] there = DoubleStream.of(all).filter(v -> !Double.isNaN(v)).sorted().toArray();
        if (there.length < 0.95 * all.length || there.length == 0) {
            return new Interval(Double.NaN, Double.NaN);
        }
        return new Interval(quantile(there, 0.025), quantile(there, 0.975));
    }

    private static double quantile(double[] sorted, double share) {
        double place = share * (sorted.length - 1);
        int below = (int) Math.floor(place);
        int above = Math.min(sorted.length - 1, below + 1);
        return sorted[below] + (place - below) * (sorted[above] - sorted[below]);
    }
}
