package org.meltbook.units;

import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;

/** Checks of arguments that NaN cannot pass. Each gives the value back, so that it can stand in an assignment. */
public final class Require {
    private Require() {}

    /**
     * The value, if it is above zero and finite.
     *
     * @throws RangeException if {@code value <= 0}, infinite or NaN
     */
    public static double positive(String name, double value, String unit) {
        if (value > 0 && value < Double.POSITIVE_INFINITY) {
            return value;
        }
        throw refused(name, value, unit, "a number above zero");
    }

    /**
     * The value, if it is zero or more and finite.
     *
     * @throws RangeException if {@code value < 0}, infinite or NaN
     */
    public static double notNegative(String name, double value, String unit) {
        if (value >= 0 && value < Double.POSITIVE_INFINITY) {
            return value;
        }
        throw refused(name, value, unit, "zero or a number above it");
    }

    /**
     * The value, if it is finite.
     *
     * @throws RangeException if {@code value} is infinite or NaN
     */
    public static double finite(String name, double value, String unit) {
        if (value > Double.NEGATIVE_INFINITY && value < Double.POSITIVE_INFINITY) {
            return value;
        }
        throw refused(name, value, unit, "a finite number");
    }

    /**
     * The value, if {@code low <= value <= high}.
     *
     * @throws RangeException if {@code value} lies outside or is NaN
     */
    public static double within(String name, double value, double low, double high, String unit) {
        if (value >= low && value <= high) {
            return value;
        }
        throw refused(name, value, unit, NumberText.of(low) + " to " + NumberText.of(high));
    }

    private static RangeException refused(String name, double value, String unit, String expected) {
        String shown = Double.isNaN(value) ? "NaN" : Double.toString(value);
        String tail = unit.isBlank() || unit.equals("1") ? "" : " " + unit;
        return new RangeException(name + " = " + shown + tail + ": expected " + expected + tail);
    }
}
