package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * How well a model predicts points that were left out: the fit is repeated without them, from the optimum of all, and
 * asked for them.
 *
 * @param errors      (model − measured) / deviation of each point by the fit that did not see it
 * @param refits      how many fits were made
 * @param unconverged how many of them did not converge
 */
public record CrossValidation(Doubles errors, int refits, int unconverged) {
    /** Each point left out once, alone. */
    public static CrossValidation leavingOneOut(Fit fit, Progress progress) {
        return of(
                fit,
                fit.problem().points(),
                IntStream.range(0, fit.problem().points()).toArray(),
                progress);
    }

    /**
     * The points shared out at random into so many folds of nearly equal size, each left out once.
     *
     * @throws RangeException if there are fewer than two folds, more folds than points, or a fold leaves fewer points
     *     than parameters
     */
    public static CrossValidation folds(Fit fit, int folds, long seed, Progress progress) {
        List<Integer> dealt = new ArrayList<>();
        for (int i = 0; i < fit.problem().points(); i++) {
            dealt.add(i % Math.max(1, folds));
        }
        Collections.shuffle(dealt, new Random(seed));
        return of(fit, folds, dealt.stream().mapToInt(Integer::intValue).toArray(), progress);
    }

    private static CrossValidation of(Fit fit, int folds, int[] fold, Progress progress) {
        Problem problem = fit.problem();
        int n = fold.length;
        int most = folds < 1 ? n : (n + folds - 1) / folds;
        if (folds < 2 || folds > n || n - most < problem.free().length) {
            throw new RangeException("cross-validation of " + problem.free().length + " parameters on " + n
                    + " points cannot be done in " + folds + " folds: expected 2 to " + n
                    + " folds that leave as many points as parameters");
        }
        Solver solver = Solver.of(problem);
        Workspace all = Workspace.of(problem);
        double[] counts = new double[n];
        double[] reached = new double[all.coordinates()];
        double[] misfits = new double[n];
        double[] errors = new double[n];
        int unconverged = 0;
        for (int f = 0; f < folds; f++) {
            progress.at(f, folds, "cross-validation");
            for (int i = 0; i < n; i++) {
                counts[i] = fold[i] == f ? 0 : 1;
            }
            solver.workspace().counting(counts);
            solver.start(fit.coordinates().toArray());
            unconverged += solver.solve(Progress.QUIET) == Fit.Status.CONVERGED ? 0 : 1;
            solver.coordinates(reached);
            if (!all.residuals(reached, misfits)) {
                Arrays.fill(misfits, Double.NaN); // the model has no value at a point that was left out
            }
            for (int i = 0; i < n; i++) {
                errors[i] = fold[i] == f ? misfits[i] : errors[i];
            }
        }
        return new CrossValidation(Doubles.of(errors), folds, unconverged);
    }

    /** Root mean square of the errors; NaN if the model had no value at a point left out. */
    public double rootMeanSquare() {
        return Math.sqrt(errors.stream().map(e -> e * e).sum() / errors.size());
    }
}
