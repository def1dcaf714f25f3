package org.meltbook.units;

import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;

/**
 * A number as it leaves the house: with its unit, its interval, whether the measurements reach that far, and what to
 * mind. A number that the data do not give is not one: then {@link #value} refuses and says why.
 */
public final class Prediction {
    /** How far the measurements carry the number. */
    public enum Standing {
        /** Inside the tested window. */
        WITHIN_WINDOW,
        /** Computed, but outside the tested window. */
        EXTRAPOLATED,
        /** The data only say that the number is at least this. */
        AT_LEAST,
        /** The data only say that the number is at most this. */
        AT_MOST,
        /** The data do not give the number. */
        UNDETERMINED
    }

    private final String name;
    private final Quantity quantity;
    private final double value;
    private final double low;
    private final double high;
    private final Standing standing;
    private final List<String> cautions;

    private Prediction(
            String name, Quantity quantity, double[] valueLowHigh, Standing standing, List<String> cautions) {
        this.name = Objects.requireNonNull(name, "name");
        this.quantity = Objects.requireNonNull(quantity, "quantity");
        this.value = valueLowHigh[0];
        this.low = valueLowHigh[1];
        this.high = valueLowHigh[2];
        this.standing = standing;
        this.cautions = List.copyOf(cautions);
    }

    /**
     * A number inside the tested window.
     *
     * @param value the number in SI, finite
     * @param low   lower end of its 95 % interval in SI, NaN if not known
     * @param high  upper end of its 95 % interval in SI, NaN if not known
     * @throws RangeException if {@code value} is infinite or NaN
     */
    public static Prediction of(String name, Quantity quantity, double value, double low, double high) {
        Require.finite(name, value, quantity.siUnit());
        return new Prediction(name, quantity, new double[] {value, low, high}, Standing.WITHIN_WINDOW, List.of());
    }

    /** A number of which the data only give a lower bound in SI; {@code why} says what was not reached. */
    public static Prediction atLeast(String name, Quantity quantity, double bound, String why) {
        return new Prediction(
                name,
                quantity,
                new double[] {Double.NaN, bound, Double.POSITIVE_INFINITY},
                Standing.AT_LEAST,
                List.of(why));
    }

    /** A number of which the data only give an upper bound in SI; {@code why} says what was not reached. */
    public static Prediction atMost(String name, Quantity quantity, double bound, String why) {
        return new Prediction(
                name,
                quantity,
                new double[] {Double.NaN, Double.NEGATIVE_INFINITY, bound},
                Standing.AT_MOST,
                List.of(why));
    }

    /** A number that the data do not give; {@code why} says what is missing. */
    public static Prediction undetermined(String name, Quantity quantity, String why) {
        return new Prediction(
                name, quantity, new double[] {Double.NaN, Double.NaN, Double.NaN}, Standing.UNDETERMINED, List.of(why));
    }

    /**
     * The same number as one computed outside the tested window; {@code why} says which end was left, and by how much.
     *
     * @throws RangeException if there is no number, only a bound or nothing
     */
    public Prediction extrapolated(String why) {
        List<String> more = new ArrayList<>(cautions);
        more.add(why);
        return new Prediction(name, quantity, new double[] {value(), low, high}, Standing.EXTRAPOLATED, more);
    }

    /** The same number with one more thing to mind. */
    public Prediction minding(String caution) {
        List<String> more = new ArrayList<>(cautions);
        more.add(caution);
        return new Prediction(name, quantity, new double[] {value, low, high}, standing, more);
    }

    /** What the number is called. */
    public String name() {
        return name;
    }

    /** What the number measures. */
    public Quantity quantity() {
        return quantity;
    }

    /** How far the measurements carry it. */
    public Standing standing() {
        return standing;
    }

    /** Whether there is a number to be had from {@link #value}. */
    public boolean hasValue() {
        return standing == Standing.WITHIN_WINDOW || standing == Standing.EXTRAPOLATED;
    }

    /**
     * The number in SI.
     *
     * @throws RangeException if the data give only a bound, or nothing: the message says why
     */
    public double value() {
        if (hasValue()) {
            return value;
        }
        throw new RangeException("no plain value: " + this);
    }

    /** Lower end of the 95 % interval, or the lower bound, in SI; NaN if not known. */
    public double low() {
        return low;
    }

    /** Upper end of the 95 % interval, or the upper bound, in SI; NaN if not known. */
    public double high() {
        return high;
    }

    /** What to mind, in the order in which it came up. */
    public List<String> cautions() {
        return cautions;
    }

    /** One line: name, value, unit, interval, standing, cautions. */
    @Override
    public String toString() {
        String unit = quantity.siUnit().equals("1") ? "" : " " + quantity.siUnit();
        String symbol = quantity.symbol().equals("–") ? "" : " " + quantity.symbol();
        String number =
                switch (standing) {
                    case AT_LEAST -> " at least " + NumberText.of(low) + unit;
                    case AT_MOST -> " at most " + NumberText.of(high) + unit;
                    case UNDETERMINED -> " not determined";
                    default -> symbol + " = " + NumberText.of(value) + unit + interval();
                };
        String mark = standing == Standing.EXTRAPOLATED ? " (extrapolated)" : "";
        String minding = cautions.isEmpty() ? "" : ": " + String.join("; ", cautions);
        return name + number + mark + minding;
    }

    private String interval() {
        if (Double.isNaN(low) || Double.isNaN(high)) {
            return " (interval not known)";
        }
        return " (95 %: " + NumberText.of(low) + " to " + NumberText.of(high) + ")";
    }
}
