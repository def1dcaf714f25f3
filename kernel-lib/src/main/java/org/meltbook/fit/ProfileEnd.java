package org.meltbook.fit;

import org.meltbook.base.NumberText;

/**
 * One end of a profile-likelihood interval.
 *
 * @param kind    what ended the interval
 * @param value   the end in the unit of the parameter: where the profile meets the threshold, else the parameter's bound
 * @param reached how far the profile was followed, in the unit of the parameter
 * @param rise    the rise of the profile there, over the residual variance
 */
public record ProfileEnd(Kind kind, double value, double reached, double rise) {
    /** What ended the interval. */
    public enum Kind {
        /** The profile meets the threshold: the data end the interval. */
        DATA,
        /** The profile is still below the threshold at a bound: the bound ends the interval, not the data. */
        BOUND,
        /** The profile stays below the threshold as far as it was followed: the data do not end the interval. */
        OPEN,
        /** The model has no value further on, or a tied parameter would leave its bounds, with the profile still below the threshold. */
        LOST
    }

    /** The end in words. */
    String words() {
        return switch (kind) {
            case DATA -> "set by the data";
            case BOUND -> "set by the bound, not by the data";
            case OPEN -> "open: profile below the threshold as far as " + NumberText.of(reached);
            case LOST -> "not known: no value of the model, or a tied parameter at its bound, beyond "
                    + NumberText.of(reached);
        };
    }
}
