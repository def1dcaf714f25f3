package org.meltbook.fit;

import org.apache.commons.math3.linear.RealMatrix;

/** Standard error of a function of the parameters from the covariance of a fit (delta method). */
final class BandTangent {
    /** Step in standard errors: small against any curvature, large against rounding. */
    private static final double STEP = 0.01;
    /** A derivative below this share of value over standard error is rounding. */
    private static final double NOTHING = 1e-9;

    private final Fit fit;
    private final Workspace workspace;
    private final RealMatrix covariance;
    private final double[] optimum;
    private final double[] shifted;
    private final double[] all;

    BandTangent(Fit fit) {
        this.fit = fit;
        this.workspace = Workspace.of(fit.problem());
        this.covariance = fit.covariance();
        this.optimum = fit.coordinates().toArray();
        this.shifted = optimum.clone();
        this.all = new double[fit.values().size()];
    }

    /**
     * The standard error, coordinates that rest on a bound taken as held.
     *
     * @param onLogarithm whether that of ln f is wanted
     * @return NaN if the function depends on a parameter that the data do not fix, or has no value nearby
     */
    double error(Model.Formula formula, double x, boolean onLogarithm) {
        int n = optimum.length;
        double[] slopes = new double[n];
        double here = at(formula, x, 0, 0, onLogarithm);
        for (int j = 0; j < n; j++) {
            boolean known = covariance.getEntry(j, j) >= 0;
            if (!known && restsOnBound(j)) {
                continue;
            }
            double step = known
                    ? Math.max(STEP * Math.sqrt(covariance.getEntry(j, j)), 1e-6 * Math.abs(optimum[j]))
                    : 1e-4 * Math.max(1, Math.abs(optimum[j]));
            step = Math.min(step, Math.min(optimum[j] - workspace.lowest(j), workspace.highest(j) - optimum[j]));
            slopes[j] = slope(formula, x, j, step, onLogarithm);
            if (!known && !(Math.abs(slopes[j] * step) <= NOTHING * Math.abs(here))) {
                return Double.NaN;
            } else if (!known) {
                slopes[j] = 0;
            }
        }
        double variance = 0;
        for (int a = 0; a < n; a++) {
            for (int b = 0; b < n; b++) {
                variance += slopes[a] == 0 || slopes[b] == 0 ? 0 : slopes[a] * covariance.getEntry(a, b) * slopes[b];
            }
        }
        return Math.sqrt(Math.max(0, variance));
    }

    private boolean restsOnBound(int j) {
        int place = fit.problem().free()[j];
        return fit.problem().parameters().get(place).atBound(fit.values().at(place));
    }

    /** Central difference, extrapolated once to step zero. */
    private double slope(Model.Formula formula, double x, int j, double step, boolean onLogarithm) {
        double wide = at(formula, x, j, step, onLogarithm) - at(formula, x, j, -step, onLogarithm);
        double close = at(formula, x, j, step / 2, onLogarithm) - at(formula, x, j, -step / 2, onLogarithm);
        return (8 * close - wide) / (6 * step);
    }

    private double at(Model.Formula formula, double x, int j, double shift, boolean onLogarithm) {
        shifted[j] = optimum[j] + shift;
        workspace.outward(shifted, all);
        shifted[j] = optimum[j];
        double value = formula.at(x, all);
        return onLogarithm ? Math.log(value) : value;
    }
}
