package org.meltbook.flow;

import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;

/** A homogeneous velocity gradient L, L_ij = ∂v_i/∂x_j in 1/s, of an incompressible flow. */
public final class VelocityGradient {
    /** No flow at all. */
    public static final VelocityGradient REST = new VelocityGradient(Doubles.of(new double[9]));

    private final Doubles entries;

    private VelocityGradient(Doubles entries) {
        this.entries = entries;
    }

    /** Simple shear, v_x = rate · y, with the rate in 1/s. */
    public static VelocityGradient simpleShear(double rate) {
        return of(0, rate, 0, 0, 0, 0, 0, 0, 0);
    }

    /**
     * The gradient with the nine entries in 1/s, row by row.
     *
     * @throws RangeException if there are not nine, one is not finite, or the volume is not kept (the sum of the
     *     diagonal is not zero to rounding)
     */
    public static VelocityGradient of(double... entries) {
        double largest = 0;
        for (double entry : entries) {
            largest = Math.max(largest, Math.abs(entry));
        }
        boolean sound = entries.length == 9 && largest < Double.POSITIVE_INFINITY;
        if (!sound || !(Math.abs(entries[0] + entries[4] + entries[8]) <= 1e-12 * largest)) {
            throw new RangeException(
                    "a velocity gradient needs nine finite entries whose diagonal adds up to zero, found "
                            + Doubles.of(entries));
        }
        return new VelocityGradient(Doubles.of(entries));
    }

    /** The entry ∂v_row/∂x_column in 1/s, counted from zero. */
    public double at(int row, int column) {
        return entries.at(3 * row + column);
    }

    /** Entry of the rate of deformation D = (L + Lᵀ)/2 in 1/s. */
    public double deformation(int row, int column) {
        return (at(row, column) + at(column, row)) / 2;
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof VelocityGradient that && entries.equals(that.entries);
    }

    @Override
    public int hashCode() {
        return entries.hashCode();
    }

    @Override
    public String toString() {
        return "L = " + entries + " 1/s";
    }
}
