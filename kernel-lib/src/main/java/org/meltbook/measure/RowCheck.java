package org.meltbook.measure;

import org.meltbook.base.NumberText;
import org.meltbook.units.Quantity;

/** What the numbers of a row say against the row, before anyone looks at the curve. */
final class RowCheck {
    /** Below this a difference is one of double arithmetic and unit conversion, whatever the digits. */
    private static final double ARITHMETIC = 1e-9;

    private RowCheck() {}

    /** A rate, frequency, viscosity or modulus must be above zero to be used. */
    static Verdict aboveZero(Quantity quantity, double value) {
        if (value > 0 && value < Double.POSITIVE_INFINITY) {
            return Verdict.SOUND;
        }
        String why = Double.isNaN(value) ? " is not a number" : value == 0 ? " is zero" : value < 0 ? " is negative" : " is infinite";
        String number = Double.isNaN(value) || value == 0 ? "" : " " + NumberText.of(value) + " " + quantity.siUnit();
        return Verdict.unusable(quantity.label() + number + why);
    }

    /** A normal stress difference may have either sign; a melt in shear shows a positive first one. */
    static Verdict normalStress(Quantity quantity, double value) {
        Verdict strict = aboveZero(quantity, value);
        return Double.isFinite(value) && !strict.usable() ? Verdict.doubtful(strict.reason()) : strict;
    }

    /**
     * Whether stress is viscosity times rate, as far as the digits given can tell.
     *
     * @param allowed relative rounding of the three numbers together, no unit
     */
    static Verdict product(double rate, double stress, double viscosity, double allowed) {
        double product = viscosity * rate;
        double off = Math.abs(stress - product) / Math.max(Math.abs(stress), Math.abs(product));
        if (!(off > Math.max(allowed, ARITHMETIC))) {
            return Verdict.SOUND;
        }
        return Verdict.doubtful("shear stress " + NumberText.of(stress) + " Pa is "
                + NumberText.of(100 * off, 2) + " % off viscosity × shear rate = " + NumberText.of(product)
                + " Pa, where the digits given allow " + NumberText.of(100 * allowed, 2) + " %");
    }
}
