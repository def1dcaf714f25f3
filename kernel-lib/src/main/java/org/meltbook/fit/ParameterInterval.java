package org.meltbook.fit;

import org.meltbook.base.NumberText;

/**
 * An interval of a parameter and how it was made.
 *
 * @param method how it was made: {@code percentile}, {@code studentised}, {@code BCa}
 * @param low    lower end in the unit of the parameter; NaN if there is none
 * @param high   upper end in the unit of the parameter; NaN if there is none
 */
public record ParameterInterval(String method, double low, double high) {
    /** Whether the value lies within, ends included. */
    public boolean holds(double value) {
        return low <= value && value <= high;
    }

    /** Whether both ends are known. */
    public boolean exists() {
        return !Double.isNaN(low) && !Double.isNaN(high);
    }

    /** The ends as text, or that there is none. */
    @Override
    public String toString() {
        return exists() ? NumberText.of(low) + " to " + NumberText.of(high) : "none";
    }
}
