package org.meltbook.viscosity;

import org.apache.commons.math3.stat.regression.SimpleRegression;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * The exponent with which the shear rate grows with the shear stress, d ln γ̇ / d ln σ: one for a Newtonian fluid. It
 * is the slope of the straight line of ln γ̇ over ln σ, as creep laws are quoted; a power law fitted to viscosities
 * gives 1/n, which differs in the third digit where the curve bends, because it divides the misfit otherwise.
 */
public final class StressExponent {
    private StressExponent() {}

    /**
     * The exponent over all usable points of a flow curve, with its 95 % interval from the scatter about the line.
     *
     * @throws RangeException if fewer than three points are usable, one has no stress or rate above zero, or all have one stress
     */
    public static Prediction of(FlowCurve curve) {
        Curve usable = curve.stress().usable();
        SimpleRegression line = new SimpleRegression();
        for (int i = 0; i < usable.size(); i++) {
            double rate = usable.x().at(i);
            double stress = usable.y().at(i);
            if (!(rate > 0 && stress > 0)) {
                throw new RangeException("point " + (i + 1) + " has shear rate " + rate + " 1/s and shear stress "
                        + stress + " Pa: a stress exponent needs both above zero");
            }
            line.addData(Math.log(stress), Math.log(rate));
        }
        if (usable.size() < 3) {
            throw new RangeException("a stress exponent needs three points at least, found " + usable.size());
        }
        if (usable.y().values().smallest() == usable.y().values().largest()) {
            throw new RangeException("a stress exponent needs stresses that differ, found only "
                    + NumberText.of(usable.y().at(0)) + " Pa");
        }
        double half = line.getSlopeConfidenceInterval();
        return Prediction.of(
                        "stress exponent",
                        Quantity.RATIO,
                        line.getSlope(),
                        line.getSlope() - half,
                        line.getSlope() + half)
                .minding("slope through " + usable.size() + " points from "
                        + NumberText.of(usable.x().values().smallest()) + " to "
                        + NumberText.of(usable.x().values().largest())
                        + " 1/s; a curve that bends has another one in another range");
    }
}
