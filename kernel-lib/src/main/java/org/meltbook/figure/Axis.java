package org.meltbook.figure;

import org.meltbook.units.Quantity;

/**
 * One axis of a figure.
 *
 * @param label what is drawn along it, without the unit: {@code angular frequency ω}
 * @param unit  the unit of the numbers, {@code 1} if they have none
 * @param scale linear or logarithmic
 */
public record Axis(String label, String unit, Scale scale) {
    /** How numbers become places on the axis. */
    public enum Scale {
        /** Equal steps are equal differences. */
        LINEAR,
        /** Equal steps are equal ratios. */
        LOG
    }

    /** A logarithmic axis of the quantity in SI. */
    public static Axis log(Quantity quantity) {
        return new Axis(quantity.label() + " " + quantity.symbol(), quantity.siUnit(), Scale.LOG);
    }

    /** A linear axis of the quantity in SI. */
    public static Axis linear(Quantity quantity) {
        return new Axis(quantity.label() + " " + quantity.symbol(), quantity.siUnit(), Scale.LINEAR);
    }

    /** Label with the unit in brackets, where there is one. */
    public String title() {
        return unit.isBlank() || unit.equals("1") ? label : label + " [" + unit + "]";
    }
}
