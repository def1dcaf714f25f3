package org.meltbook.fit;

import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import org.apache.commons.math3.distribution.FDistribution;

/**
 * Whether a model misses the means of replicates by more than the replicates scatter: the F test of N. R. Draper, H.
 * Smith, Applied Regression Analysis, section on pure error and lack of fit (memory). Exact for models linear in their
 * parameters, close to it for others.
 *
 * @param misfitSquares  sum of squares of the fit beyond the scatter of replicates
 * @param misfitFreedom  places less parameters estimated
 * @param scatterSquares sum of squares of replicates around their weighted means, in squared deviations
 * @param scatterFreedom points less places
 */
public record LackOfFit(double misfitSquares, int misfitFreedom, double scatterSquares, int scatterFreedom) {
    /** The test, if any data set has points at the same x and there are more places than parameters. */
    public static Optional<LackOfFit> of(Fit fit) {
        double scatter = 0;
        int places = 0;
        for (DataSet set : fit.problem().dataSets()) {
            Map<Double, Place> replicates = new TreeMap<>();
            for (int i = 0; i < set.size(); i++) {
                // + 0.0: minus zero is the same place as zero
                replicates
                        .computeIfAbsent(set.x().at(i) + 0.0, x -> new Place())
                        .add(set, i);
            }
            places += replicates.size();
            scatter += replicates.values().stream().mapToDouble(Place::scatter).sum();
        }
        int points = fit.problem().points();
        int misfitFreedom = fit.degreesOfFreedom() - (points - places);
        return places < points && misfitFreedom > 0 && fit.problem().loss().plain()
                ? Optional.of(new LackOfFit(
                        Math.max(0, fit.sumOfSquares() - scatter), misfitFreedom, scatter, points - places))
                : Optional.empty();
    }

    /** Mean square of the misfit over that of the scatter; infinite if the replicates agree exactly. */
    public double ratio() {
        return misfitSquares / misfitFreedom / (scatterSquares / scatterFreedom);
    }

    /** Probability of such a ratio or a larger one if the model is right; NaN if neither misfit nor scatter is there. */
    public double probability() {
        double ratio = ratio();
        return Double.isInfinite(ratio)
                ? 0
                : 1 - new FDistribution(misfitFreedom, scatterFreedom).cumulativeProbability(ratio);
    }

    /** The points at one x: weighted sums around the first of them, so that nothing is lost by subtraction. */
    private static final class Place {
        private double origin = Double.NaN;
        private double weights;
        private double sum;
        private double squares;

        private void add(DataSet set, int i) {
            double y = set.y().at(i);
            double seen = set.weighting() == Weighting.LOGARITHMIC ? Math.log(y) : y;
            origin = Double.isNaN(origin) ? seen : origin;
            double weight = 1 / (set.deviation(i, y) * set.deviation(i, y));
            weights += weight;
            sum += weight * (seen - origin);
            squares += weight * (seen - origin) * (seen - origin);
        }

        private double scatter() {
            return squares - sum * sum / weights;
        }
    }
}
