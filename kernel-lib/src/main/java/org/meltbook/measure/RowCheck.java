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
        String why = Double.isNaN(value)
                ? " is not a number"
                : value == 0 ? " is zero" : value < 0 ? " is negative" : " is infinite";
        String number = Double.isNaN(value) || value == 0 ? "" : " " + NumberText.of(value) + " " + quantity.siUnit();
        return Verdict.unusable(quantity.label() + number + why);
    }

    /** A normal stress difference may have either sign; a melt in shear shows a positive first one. */
    static Verdict normalStress(Quantity quantity, double value) {
        Verdict strict = aboveZero(quantity, value);
        return Double.isFinite(value) && !strict.usable() ? Verdict.doubtful(strict.reason()) : strict;
    }

    /**
     * How far stress is off viscosity times rate, relative to the larger; 0 if the digits given explain it.
     *
     * @param allowed relative rounding of the three numbers together, no unit
     */
    static double offProduct(double rate, double stress, double viscosity, double allowed) {
        double product = viscosity * rate;
        double off = Math.abs(stress - product) / Math.max(Math.abs(stress), Math.abs(product));
        return off > Math.max(allowed, ARITHMETIC) ? off : 0;
    }

    /** What to say of a row whose stress is off by this, where the digits allow that; both relative. */
    static Verdict offProduct(double off, double allowed) {
        return Verdict.doubtful("shear stress is " + NumberText.of(100 * off, 2)
                + " % off viscosity × shear rate, where the digits given allow " + NumberText.of(100 * allowed, 2)
                + " %");
    }

    /** The number with two significant digits, so that rows which say the same share one verdict. */
    static double twoDigits(double value) {
        double step = Math.pow(10, Math.floor(Math.log10(value)) - 1);
        return Math.rint(value / step) * step;
    }
}
