package org.meltbook.fit;

import org.meltbook.base.RangeException;

/**
 * How a bootstrap is run. The seed alone settles what is drawn: refit k draws the same numbers on any number of threads.
 *
 * @param seed    where the random numbers start
 * @param refits  how many data sets are drawn and fitted again, 20 or more; about 1000 for 95 % intervals
 * @param kind    what the errors are drawn from
 * @param threads how many threads work, 1 or more
 * @param level   level of the intervals, 0 to 1
 */
public record BootstrapSettings(long seed, int refits, Kind kind, int threads, double level) {
    private static final int REFITS = 999;
    private static final int THREADS = 2;

    /** What the errors are drawn from. */
    public enum Kind {
        /**
         * The residuals of the fit, with replacement within each data set, each divided by the root of 1 − leverage,
         * their mean taken off: A. C. Davison and D. V. Hinkley, Bootstrap Methods and their Application (1997),
         * eq. 6.9 (memory).
         */
        RESIDUAL("residuals drawn again"),
        /** The normal distribution, with the deviations that the error model says. */
        PARAMETRIC("normal errors drawn");

        private final String words;

        Kind(String words) {
            this.words = words;
        }

        /** The kind in words. */
        public String words() {
            return words;
        }
    }

    /** Checks the numbers. */
    public BootstrapSettings {
        Level.check(level);
        if (refits < 20 || threads < 1) {
            throw new RangeException("a bootstrap needs at least 20 refits and 1 thread, found " + refits
                    + " refits and " + threads + " threads");
        }
    }

    /** Residuals drawn again: 999 refits on two threads, 95 % intervals. */
    public static BootstrapSettings residual(long seed) {
        return new BootstrapSettings(seed, REFITS, Kind.RESIDUAL, THREADS, 0.95);
    }

    /** Normal errors drawn: 999 refits on two threads, 95 % intervals. */
    public static BootstrapSettings parametric(long seed) {
        return new BootstrapSettings(seed, REFITS, Kind.PARAMETRIC, THREADS, 0.95);
    }

    /** The same with another number of refits. */
    public BootstrapSettings refits(int count) {
        return new BootstrapSettings(seed, count, kind, threads, level);
    }

    /** The same on another number of threads. */
    public BootstrapSettings threads(int count) {
        return new BootstrapSettings(seed, refits, kind, count, level);
    }

    /** The same with intervals at another level. */
    public BootstrapSettings level(double other) {
        return new BootstrapSettings(seed, refits, kind, threads, other);
    }
}
