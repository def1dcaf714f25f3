package org.meltbook.fit;

import java.util.Objects;
import java.util.OptionalDouble;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;

/**
 * One parameter of a model: what it is called, its unit, where it may lie, and how a fit steps in it.
 *
 * @param name  how code calls it: {@code eta0}; unique within a model
 * @param label how a reader sees it: {@code zero-shear viscosity η₀}
 * @param unit  its unit, {@code 1} if it has none
 * @param low   least value allowed; −∞ if there is none
 * @param high  largest value allowed; ∞ if there is none
 * @param scale whether a fit steps by differences or by ratios
 * @param fixed the value at which it is held, empty if it is free
 */
public record Parameter(
        String name, String label, String unit, double low, double high, Scale scale, OptionalDouble fixed) {
    /** How a fit steps in a parameter, and on which scale its interval is symmetric. */
    public enum Scale {
        /** By differences. */
        LINEAR,
        /** By ratios; the parameter stays above zero by construction. */
        LOG
    }

    /** Checks the bounds and, if it is held, the value. */
    public Parameter {
        Objects.requireNonNull(name, "name");
        Objects.requireNonNull(label, "label");
        if (!(low < high) || scale == Scale.LOG && !(low >= 0)) {
            throw new RangeException("parameter " + name + " has contradictory bounds: " + low + " to " + high
                    + (scale == Scale.LOG ? " on a logarithmic scale" : ""));
        }
        if (fixed.isPresent() && !(fixed.getAsDouble() >= low && fixed.getAsDouble() <= high)) {
            throw new RangeException("parameter " + name + " cannot be held at " + fixed.getAsDouble()
                    + ": its bounds are " + low + " to " + high);
        }
    }

    /** A free parameter above zero, stepped by ratios. */
    public static Parameter positive(String name, String label, String unit) {
        return new Parameter(name, label, unit, 0, Double.POSITIVE_INFINITY, Scale.LOG, OptionalDouble.empty());
    }

    /** A free parameter that may take any value, stepped by differences. */
    public static Parameter unbounded(String name, String unit) {
        return new Parameter(
                name,
                name,
                unit,
                Double.NEGATIVE_INFINITY,
                Double.POSITIVE_INFINITY,
                Scale.LINEAR,
                OptionalDouble.empty());
    }

    /** The same between other bounds. */
    public Parameter within(double least, double most) {
        return new Parameter(name, label, unit, least, most, scale, fixed);
    }

    /** The same, stepped by differences or by ratios. */
    public Parameter on(Scale other) {
        return new Parameter(name, label, unit, low, high, other, fixed);
    }

    /** The same, held at a value. */
    public Parameter heldAt(double value) {
        return new Parameter(name, label, unit, low, high, scale, OptionalDouble.of(value));
    }

    /** The same, free. */
    public Parameter freed() {
        return new Parameter(name, label, unit, low, high, scale, OptionalDouble.empty());
    }

    /** Whether a fit may change it. */
    public boolean isFree() {
        return fixed.isEmpty();
    }

    /**
     * The value, if the bounds allow it.
     *
     * @throws RangeException if it is NaN, infinite, outside the bounds, or zero on a logarithmic scale
     */
    public double check(double value) {
        boolean inside = value >= low && value <= high && Double.isFinite(value);
        if (inside && (scale == Scale.LINEAR || value > 0)) {
            return value;
        }
        throw new RangeException("parameter " + name + " = " + value + (unit.equals("1") ? "" : " " + unit)
                + " lies outside its bounds, " + NumberText.of(low) + " to " + NumberText.of(high)
                + (scale == Scale.LOG && low == 0 ? ", zero left out" : ""));
    }

    double inward(double value) {
        return scale == Scale.LOG ? Math.log(value) : value;
    }

    double outward(double inner) {
        return scale == Scale.LOG ? Math.exp(inner) : inner;
    }

    /** d value / d inner, for the change from one scale to the other. */
    double stretch(double value) {
        return scale == Scale.LOG ? value : 1;
    }

    boolean atBound(double value) {
        double slack = 1e-9 * Math.max(Math.abs(value), Double.MIN_NORMAL);
        return value - low <= slack || high - value <= slack;
    }
}
