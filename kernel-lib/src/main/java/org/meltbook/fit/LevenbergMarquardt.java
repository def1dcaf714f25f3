package org.meltbook.fit;

import java.util.List;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.QRDecomposition;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/**
 * Nonlinear least squares by damped Gauss–Newton steps. Bounds hold at every trial: a step that would leave them ends
 * on them, and a parameter that rests on a bound stays there while the sum of squares would only fall outside.
 * Parameters on a logarithmic scale are stepped in their logarithm. Where the model has no value the step is shortened.
 *
 * <p>Each step is the QR solution of the Jacobian with the damping appended (no normal equations); columns are scaled
 * by their largest length so far. Damping follows H. B. Nielsen, report IMM-REP-1999-05, Technical University of
 * Denmark (from memory). Commons Math's optimiser knows neither bounds nor interrupts, hence this one; a test holds
 * both together.
 */
final class LevenbergMarquardt {
    private static final int MOST_EVALUATIONS = 2000;
    private static final double SMALL = 1e-14;
    private static final double LEAST_DAMPING = 1e-16;

    private final Problem problem;
    private final Progress progress;
    private final int[] free;
    private final double[] lowest;
    private final double[] highest;
    private final double[] scales;
    private double damping = 1e-3;
    private double growth = 2;
    private int evaluations;

    private LevenbergMarquardt(Problem problem, Progress progress) {
        this.problem = problem;
        this.progress = progress;
        this.free = problem.free();
        this.lowest = new double[free.length];
        this.highest = new double[free.length];
        this.scales = new double[free.length];
        List<Parameter> parameters = problem.model().parameters();
        for (int j = 0; j < free.length; j++) {
            Parameter parameter = parameters.get(free[j]);
            lowest[j] = parameter.inward(parameter.low());
            highest[j] = parameter.inward(parameter.high());
        }
    }

    /**
     * The fit where the steps end.
     *
     * @throws RangeException if the model has no value at the start
     */
    static Fit solve(Problem problem, Progress progress) {
        return new LevenbergMarquardt(problem, progress).run();
    }

    private Fit run() {
        double[] inner = inner(problem.start().toArray());
        Linear here = linear(inner);
        if (!Double.isFinite(here.cost())) {
            throw new RangeException(problem.model().name() + " has no finite value or derivative at the start "
                    + problem.start() + " of the fit");
        }
        while (evaluations < MOST_EVALUATIONS) {
            progress.at(evaluations, 0, "fit of " + problem.model().name());
            if (here.cost() == 0) {
                return fit(inner, Fit.Status.CONVERGED);
            }
            boolean[] pinned = pinned(inner, here);
            double[] step = step(inner, here, pinned);
            if (negligible(inner, step)) {
                return fit(inner, Fit.Status.CONVERGED);
            }
            double[] trial = moved(inner, step);
            double cost = cost(trial);
            double predicted = here.cost() - here.costAfter(step);
            double gained = here.cost() - cost;
            if (!(gained > 0 || gained == 0 && predicted > 0)) {
                if (Math.abs(predicted) <= SMALL * here.cost() && Math.abs(gained) <= SMALL * here.cost()) {
                    return fit(inner, Fit.Status.CONVERGED); // what is left to gain is below rounding
                }
                damping *= growth;
                growth *= 2;
                continue;
            }
            double quality = 2 * gained / predicted - 1;
            damping = Math.max(LEAST_DAMPING, damping * Math.max(1.0 / 3, 1 - quality * quality * quality));
            growth = 2;
            Linear there = linear(trial);
            if (!Double.isFinite(there.cost())) {
                damping *= 10;
                continue;
            }
            inner = trial;
            here = there;
        }
        return fit(inner, Fit.Status.EVALUATIONS_SPENT);
    }

    /** Residuals and Jacobian at one place, per free parameter and on the inner scale. */
    private record Linear(double[][] jacobian, double[] residuals, double cost) {
        double costAfter(double[] step) {
            double sum = 0;
            for (int i = 0; i < residuals.length; i++) {
                double value = residuals[i];
                for (int j = 0; j < step.length; j++) {
                    value += jacobian[i][j] * step[j];
                }
                sum += value * value;
            }
            return sum;
        }

        double slope(int j) {
            double sum = 0;
            for (int i = 0; i < residuals.length; i++) {
                sum += jacobian[i][j] * residuals[i];
            }
            return sum;
        }
    }

    private Linear linear(double[] inner) {
        double[] values = outer(inner);
        double[][] jacobian = Residuals.jacobian(problem, values);
        double[] residuals = Residuals.of(problem, values);
        double sum = 0;
        for (int i = 0; i < residuals.length; i++) {
            sum += residuals[i] * residuals[i];
            for (int j = 0; j < free.length; j++) {
                sum += 0 * jacobian[i][j]; // a derivative that is not finite makes the place unusable
            }
        }
        for (int j = 0; j < free.length; j++) {
            double square = 0;
            for (double[] row : jacobian) {
                square += row[j] * row[j];
            }
            if (Double.isFinite(square)) {
                scales[j] = Math.max(scales[j], Math.sqrt(square));
            }
        }
        return new Linear(jacobian, residuals, sum);
    }

    private double cost(double[] inner) {
        evaluations++;
        double sum = 0;
        for (double residual : Residuals.of(problem, outer(inner))) {
            sum += residual * residual;
        }
        return sum;
    }

    /** Parameters that rest on a bound and would only lower the sum of squares beyond it. */
    private boolean[] pinned(double[] inner, Linear here) {
        boolean[] pinned = new boolean[free.length];
        for (int j = 0; j < free.length; j++) {
            double slope = here.slope(j);
            pinned[j] = inner[j] <= lowest[j] && slope >= 0 || inner[j] >= highest[j] && slope <= 0;
        }
        return pinned;
    }

    /** The damped step, shortened to the bounds. */
    private double[] step(double[] inner, Linear here, boolean[] pinned) {
        int rows = here.residuals().length;
        double[][] stacked = new double[rows + free.length][free.length];
        double[] target = new double[rows + free.length];
        double root = Math.sqrt(damping);
        for (int j = 0; j < free.length; j++) {
            double scale = scales[j] > 0 ? scales[j] : 1;
            for (int i = 0; i < rows; i++) {
                stacked[i][j] = pinned[j] ? 0 : here.jacobian()[i][j] / scale;
            }
            stacked[rows + j][j] = pinned[j] ? 1 : root;
        }
        for (int i = 0; i < rows; i++) {
            target[i] = -here.residuals()[i];
        }
        double[] scaled = new QRDecomposition(new Array2DRowRealMatrix(stacked, false))
                .getSolver()
                .solve(new ArrayRealVector(target, false))
                .toArray();
        for (int j = 0; j < free.length; j++) {
            double wanted = inner[j] + scaled[j] / (scales[j] > 0 ? scales[j] : 1);
            scaled[j] = Math.min(highest[j], Math.max(lowest[j], wanted)) - inner[j];
        }
        return scaled;
    }

    private static double[] moved(double[] inner, double[] step) {
        double[] moved = new double[inner.length];
        for (int j = 0; j < inner.length; j++) {
            moved[j] = inner[j] + step[j];
        }
        return moved;
    }

    private static boolean negligible(double[] inner, double[] step) {
        for (int j = 0; j < inner.length; j++) {
            if (Math.abs(step[j]) > SMALL * (Math.abs(inner[j]) + SMALL)) {
                return false;
            }
        }
        return true;
    }

    private double[] inner(double[] values) {
        double[] inner = new double[free.length];
        for (int j = 0; j < free.length; j++) {
            inner[j] = problem.model().parameters().get(free[j]).inward(values[free[j]]);
        }
        return inner;
    }

    private double[] outer(double[] inner) {
        double[] values = problem.start().toArray();
        for (int j = 0; j < free.length; j++) {
            Parameter parameter = problem.model().parameters().get(free[j]);
            // exp(log(bound)) may miss the bound by a rounding
            values[free[j]] = Math.min(parameter.high(), Math.max(parameter.low(), parameter.outward(inner[j])));
        }
        return values;
    }

    private Fit fit(double[] inner, Fit.Status status) {
        return Fit.of(problem, outer(inner), status, evaluations);
    }
}
