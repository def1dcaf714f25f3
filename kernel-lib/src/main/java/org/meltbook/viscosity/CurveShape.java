package org.meltbook.viscosity;

import java.util.Comparator;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.numeric.LogLogLine;

/**
 * What the eye sees in a curve of viscosity over shear rate: how high it starts, how steeply it ends, where it bends.
 *
 * @param rates       shear rates in 1/s, rising
 * @param viscosities viscosities in Pa·s
 */
public record CurveShape(Doubles rates, Doubles viscosities) {
    /**
     * The shape of the given points, sorted by rate.
     *
     * @throws RangeException if there are fewer than two different rates, or a number is not above zero
     */
    public static CurveShape of(Doubles rates, Doubles viscosities) {
        if (rates.size() != viscosities.size() || rates.stream().distinct().count() < 2) {
            throw new RangeException("a viscosity law needs points at two different shear rates at least, found "
                    + rates.size() + " rates and " + viscosities.size() + " viscosities");
        }
        for (int i = 0; i < rates.size(); i++) {
            if (!(rates.at(i) > 0 && viscosities.at(i) > 0)) {
                throw new RangeException("point " + (i + 1) + " has shear rate " + NumberText.of(rates.at(i))
                        + " 1/s and viscosity " + NumberText.of(viscosities.at(i))
                        + " Pa·s: a viscosity law needs both above zero; mark the row unusable to set it aside");
            }
        }
        int[] order = IntStream.range(0, rates.size())
                .boxed()
                .sorted(Comparator.comparingDouble(rates::at))
                .mapToInt(Integer::intValue)
                .toArray();
        return new CurveShape(rates.pick(order), viscosities.pick(order));
    }

    /** The points within half a decade of the lowest rate, three at least where there are three. */
    public CurveShape lowEnd() {
        int[] low = LogLogLine.lowEndOf(rates);
        return new CurveShape(rates.pick(low), viscosities.pick(low));
    }

    /** Slope d ln η / d ln γ̇ of the straight line through all points in logarithms; NaN if all have one rate. */
    public double slope() {
        return LogLogLine.through(rates, viscosities).slope();
    }

    /** Geometric mean of the viscosities in Pa·s. */
    public double mean() {
        return LogLogLine.through(rates, viscosities).mean();
    }

    /** Slope d ln η / d ln γ̇ at the high end, kept between −0.95 and −0.05 so that a fit can start from it. */
    double thinning() {
        int n = rates.size();
        double slope = new CurveShape(rates, viscosities).last(Math.min(n, 4)).slope();
        return Double.isNaN(slope) ? -0.5 : Math.min(-0.05, Math.max(-0.95, slope));
    }

    private CurveShape last(int count) {
        int[] places = IntStream.range(rates.size() - count, rates.size()).toArray();
        return new CurveShape(rates.pick(places), viscosities.pick(places));
    }

    /** Time in s at whose inverse the level of the low end meets the thinning branch, kept near the measured rates. */
    double bendTime() {
        int end = rates.size() - 1;
        double fall = Math.min(1, viscosities.at(end) / lowEnd().mean());
        double time = Math.pow(fall, 1 / thinning()) / rates.at(end);
        return Math.min(1e3 / rates.at(0), Math.max(1e-3 / rates.at(end), time));
    }
}
