package org.meltbook.spectrum;

import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Curve;

/**
 * The usable points of a sweep: storage and loss modulus in Pa, each over its own angular frequencies in rad/s, and the
 * grids of relaxation times that belong to their window.
 */
record Moduli(Curve storage, Curve loss) {
    /** By this factor the grid goes beyond the window on the fast side. */
    static final double FAST_SIDE = 10;

    /** By this factor, half a decade, the slower grid goes beyond the window. */
    private static final double SLOW_SIDE = Math.sqrt(10);

    /** Refuses points that are no moduli at a frequency, and a window of no width. */
    Moduli {
        check(storage);
        check(loss);
        if (!(highest(storage, loss) > lowest(storage, loss))) {
            throw new RangeException("a spectrum needs more than one frequency, found only "
                    + NumberText.of(lowest(storage, loss)) + " rad/s");
        }
    }

    private static void check(Curve curve) {
        String what = curve.y().quantity().label();
        if (curve.size() < 3) {
            throw new RangeException(
                    "a spectrum needs three usable points of the " + what + " at least, found " + curve.size());
        }
        for (int i = 0; i < curve.size(); i++) {
            if (!(curve.x().at(i) > 0 && curve.y().at(i) > 0)) {
                throw new RangeException("usable point " + (i + 1) + " of the " + what + " is "
                        + NumberText.of(curve.y().at(i)) + " Pa at "
                        + NumberText.of(curve.x().at(i))
                        + " rad/s: a spectrum needs both above zero; mark the row unusable to set it aside");
            }
        }
    }

    private static double lowest(Curve storage, Curve loss) {
        return Math.min(storage.x().values().smallest(), loss.x().values().smallest());
    }

    private static double highest(Curve storage, Curve loss) {
        return Math.max(storage.x().values().largest(), loss.x().values().largest());
    }

    /** The lowest frequency of either modulus. */
    double lowest() {
        return lowest(storage, loss);
    }

    /** The highest frequency of either modulus. */
    double highest() {
        return highest(storage, loss);
    }

    /** The lowest frequency of the window where both moduli were measured. */
    double lowestOfBoth() {
        return Math.max(storage.x().values().smallest(), loss.x().values().smallest());
    }

    /** The highest frequency of the window where both moduli were measured. */
    double highestOfBoth() {
        return Math.min(storage.x().values().largest(), loss.x().values().largest());
    }

    /** Relaxation times in s from a decade beyond the fast end of the window to its slow end. */
    Doubles grid(double modesPerDecade) {
        return grid(1 / lowest(), modesPerDecade);
    }

    /** Relaxation times in s that go half a decade beyond the slow end of the window too. */
    Doubles slowerGrid(double modesPerDecade) {
        return grid(SLOW_SIDE / lowest(), modesPerDecade);
    }

    private Doubles grid(double slowest, double modesPerDecade) {
        double fastest = 1 / (FAST_SIDE * highest());
        return Doubles.logSpaced(fastest, slowest, 1 + (int) Math.ceil(modesPerDecade * Math.log10(slowest / fastest)));
    }
}
