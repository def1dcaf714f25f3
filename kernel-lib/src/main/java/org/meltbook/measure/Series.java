package org.meltbook.measure;

import org.meltbook.base.Doubles;
import org.meltbook.units.Quantity;

/**
 * One column of a measurement: numbers in SI, what they measure, and the unit in which they came.
 *
 * @param quantity     what the numbers measure
 * @param values       the numbers in the SI unit of the quantity; NaN where the source had none
 * @param originalUnit the unit text of the source, kept for display and export
 */
public record Series(Quantity quantity, Doubles values, String originalUnit) {
    /** Numbers that are in SI already. */
    public static Series of(Quantity quantity, double... values) {
        return new Series(quantity, Doubles.of(values), quantity.siUnit());
    }

    /** How many numbers there are. */
    public int size() {
        return values.size();
    }

    /** The number of one row, in SI. */
    public double at(int row) {
        return values.at(row);
    }

    /** A new array with the numbers, in SI. */
    public double[] toArray() {
        return values.toArray();
    }

    /** The numbers of the given rows, in that order. */
    public Series pick(int... rows) {
        return new Series(quantity, values.pick(rows), originalUnit);
    }
}
