package org.meltbook.fit;

import java.util.Arrays;
import java.util.Comparator;
import java.util.stream.IntStream;
import org.apache.commons.math3.util.CombinatoricsUtils;
import org.meltbook.base.Doubles;

/**
 * Whether residuals, followed along x, look like independent errors. Points at the same x keep the order in which they
 * were given.
 *
 * @param points             how many residuals
 * @param above              how many of them are above zero, the model above the point
 * @param runs               stretches of one sign; a residual of exactly zero counts as above
 * @param fewRuns            probability of so few runs or fewer for the same signs in random order, exact: A. Wald,
 *     J. Wolfowitz, Ann. Math. Stat. 11 (1940) 147 (memory); NaN if all have one sign
 * @param durbinWatson       Σ (eᵢ − eᵢ₋₁)² / Σ eᵢ², 0 to 4, about 2 for independent errors; NaN without any misfit
 * @param lowDurbinWatson    probability of one as low for independent normal errors; an approximation, NaN for the
 *     single sets of a joint fit and where too few points are left
 */
public record ResidualOrder(
        int points, int above, int runs, double fewRuns, double durbinWatson, double lowDurbinWatson) {
    /** The residuals of one data set, counted from zero, along its x. */
    public static ResidualOrder of(Fit fit, int dataSet) {
        return of(fit, dataSet, HatMatrix.of(fit));
    }

    static ResidualOrder of(Fit fit, int dataSet, HatMatrix hat) {
        Doubles x = fit.problem().dataSets().get(dataSet).x();
        int[] order = IntStream.range(0, x.size())
                .boxed()
                .sorted(Comparator.comparingDouble(x::at))
                .mapToInt(Integer::intValue)
                .toArray();
        double[] followed = fit.residuals(dataSet).pick(order).toArray();
        int above = (int) Arrays.stream(followed).filter(e -> e >= 0).count();
        int runs = 1;
        double steps = 0;
        for (int i = 1; i < followed.length; i++) {
            runs += followed[i] >= 0 != followed[i - 1] >= 0 ? 1 : 0;
            steps += (followed[i] - followed[i - 1]) * (followed[i] - followed[i - 1]);
        }
        double statistic = steps / Arrays.stream(followed).map(e -> e * e).sum();
        boolean alone = fit.problem().dataSets().size() == 1;
        double low = alone && statistic >= 0 ? hat.durbinWatsonBelow(statistic, order) : Double.NaN;
        return new ResidualOrder(
                followed.length, above, runs, runsAtMost(runs, above, followed.length - above), statistic, low);
    }

    /** Probability of at most so many runs when signs of two kinds stand in random order; NaN if one kind is missing. */
    static double runsAtMost(int runs, int first, int second) {
        if (first == 0 || second == 0) {
            return Double.NaN;
        }
        double sum = 0;
        double all = choices(first + second, first);
        for (int r = 2; r <= runs; r++) {
            int half = r / 2;
            sum += r % 2 == 0
                    ? 2 * Math.exp(choices(first - 1, half - 1) + choices(second - 1, half - 1) - all)
                    : Math.exp(choices(first - 1, half - 1) + choices(second - 1, half) - all)
                            + Math.exp(choices(first - 1, half) + choices(second - 1, half - 1) - all);
        }
        return Math.min(1, sum);
    }

    /** Logarithm of the number of ways to choose; −∞ if there is none. */
    private static double choices(int from, int count) {
        return count > from
                ? Double.NEGATIVE_INFINITY
                : CombinatoricsUtils.factorialLog(from)
                        - CombinatoricsUtils.factorialLog(count)
                        - CombinatoricsUtils.factorialLog(from - count);
    }
}
