package org.meltbook.fit;

import java.util.Arrays;

/** Quantiles of drawn numbers: the one of share p stands at place (R + 1) p, its neighbours joined by a line. */
final class Quantiles {
    private final double[] sorted;

    private Quantiles(double[] sorted) {
        this.sorted = sorted;
    }

    /** Quantiles of the numbers, copied; all are NaN if one of the numbers is. */
    static Quantiles of(double[] numbers) {
        double[] sorted = numbers.clone();
        Arrays.sort(sorted); // NaN last
        return new Quantiles(sorted);
    }

    /** The number below which the share lies; the first or last number where the share lies beyond all. */
    double at(double share) {
        int count = sorted.length;
        if (count == 0 || Double.isNaN(sorted[count - 1])) {
            return Double.NaN;
        }
        double place = Math.min(count, Math.max(1, (count + 1) * share));
        int below = (int) Math.floor(place);
        double rest = place - below;
        return rest == 0 ? sorted[below - 1] : sorted[below - 1] * (1 - rest) + sorted[below] * rest;
    }

    /** How many numbers an interval of the level needs, so that its ends are not the first and last ones. */
    static int needed(double level) {
        return (int) Math.ceil(2 / (1 - level) - 1 - 1e-9);
    }
}
