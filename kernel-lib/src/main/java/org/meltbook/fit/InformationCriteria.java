package org.meltbook.fit;

/**
 * Akaike's and Schwarz's criteria of a fit under normal errors: less is better, and only differences between fits to
 * the same rows with the same weighting mean anything.
 *
 * <p>With {@link ErrorModel#ABSOLUTE} deviations σᵢ, −2 ln L = Σ r² + n ln 2π + 2 Σ ln σᵢ and k counts the fitted
 * parameters. With {@link ErrorModel#SCALED} the variance is estimated as Σ r² / n, −2 ln L = n ln(2π Σ r² / n) + n +
 * 2 Σ ln σᵢ, and k counts the variance as one parameter more. A fitted parameter that rests on its bound is counted,
 * which is on the careful side. AICc: C. M. Hurvich, C.-L. Tsai, Biometrika 76 (1989) 297; K. P. Burnham, D. R.
 * Anderson, Model Selection and Multimodel Inference (2002) sections 2.2 and 2.4 (memory).
 *
 * @param points     n, the points
 * @param parameters k, the parameters counted
 * @param deviance   −2 ln L; NaN for a robust loss, which is not the likelihood of normal errors, and for no misfit at
 *     all with an estimated variance
 */
public record InformationCriteria(int points, int parameters, double deviance) {
    /** The criteria of a fit. */
    public static InformationCriteria of(Fit fit) {
        return of(fit.problem(), fit.sumOfSquares());
    }

    /** The criteria of a problem whose fit left a sum of squares. */
    static InformationCriteria of(Problem problem, double squares) {
        int n = problem.points();
        boolean absolute = problem.errors() == ErrorModel.ABSOLUTE;
        double core = absolute ? squares + n * Math.log(2 * Math.PI) : n * (Math.log(2 * Math.PI * squares / n) + 1);
        double deviance = problem.loss().plain() && (absolute || squares > 0) ? core + spread(problem) : Double.NaN;
        return new InformationCriteria(n, problem.free().length + (absolute ? 0 : 1), deviance);
    }

    /** 2 Σ ln σᵢ, the deviation in the unit of the measured value also where the logarithm has equal errors. */
    private static double spread(Problem problem) {
        double sum = 0;
        for (DataSet set : problem.dataSets()) {
            boolean logarithm = set.weighting() == Weighting.LOGARITHMIC;
            for (int i = 0; i < set.size(); i++) {
                double y = set.y().at(i);
                sum += 2 * Math.log(set.deviation(i, y) * (logarithm ? y : 1));
            }
        }
        return sum;
    }

    /** Akaike's criterion, −2 ln L + 2 k. */
    public double aic() {
        return deviance + 2 * parameters;
    }

    /** Akaike's criterion corrected for few points, AIC + 2 k (k + 1) / (n − k − 1); NaN unless n &gt; k + 1. */
    public double aicc() {
        int left = points - parameters - 1;
        return left > 0 ? aic() + 2.0 * parameters * (parameters + 1) / left : Double.NaN;
    }

    /** Schwarz's criterion, −2 ln L + k ln n. */
    public double bic() {
        return deviance + parameters * Math.log(points);
    }

    /** How n and k were counted, in words. */
    String words(ErrorModel errors) {
        return "n = " + points + " points, k = " + parameters + " parameters "
                + (errors == ErrorModel.ABSOLUTE
                        ? "(the deviations are given, so the variance is not one of them)"
                        : "(the variance is estimated and is one of them)");
    }
}
