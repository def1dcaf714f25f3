package org.meltbook.fit;

import java.util.Random;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/** Draws data around a fit and fits them again: what one thread of a bootstrap does. */
final class RefitWorker implements Parallel.Work {
    private final Fit fit;
    private final BootstrapSettings settings;
    private final RefitPool pool;
    private final double[][] values; // of each refit; empty where it failed
    private final double[][] studentised; // of each refit, one a coordinate
    private final Solver solver;
    private final Workspace workspace;
    private final double[] optimum;
    private final double[] measured;
    private final double[] coordinates;
    private final double[] residuals;
    private final double[] jacobian;
    private final double[] errors;

    RefitWorker(Fit fit, BootstrapSettings settings, RefitPool pool, double[][] values, double[][] studentised) {
        this.fit = fit;
        this.settings = settings;
        this.pool = pool;
        this.values = values;
        this.studentised = studentised;
        this.solver = Solver.of(fit.problem());
        this.workspace = solver.workspace();
        this.optimum = fit.coordinates().toArray();
        this.measured = new double[workspace.points()];
        this.coordinates = new double[optimum.length];
        this.residuals = new double[workspace.points()];
        this.jacobian = new double[workspace.points() * optimum.length];
        this.errors = new double[optimum.length];
    }

    @Override
    public void piece(int number, Progress pause) {
        values[number] = new double[0];
        if (!pool.draw(random(number), measured)) {
            return;
        }
        workspace.measured(measured);
        solver.start(optimum);
        try {
            if (solver.solve(pause) != Fit.Status.CONVERGED) {
                return;
            }
        } catch (RangeException noValue) {
            return;
        }
        double[] all = new double[fit.values().size()];
        solver.coordinates(coordinates);
        workspace.outward(coordinates, all);
        values[number] = all;
        studentised[number] = studentised();
    }

    /** Numbers that depend on seed and number of the refit alone (mixing of Steele et al., OOPSLA 2014; memory). */
    private Random random(int number) {
        long mixed = settings.seed() + 0x9E3779B97F4A7C15L * (number + 1);
        mixed = (mixed ^ (mixed >>> 30)) * 0xBF58476D1CE4E5B9L;
        mixed = (mixed ^ (mixed >>> 27)) * 0x94D049BB133111EBL;
        return new Random(mixed ^ (mixed >>> 31));
    }

    /** (refit − fit) / standard error of the refit for each coordinate; NaN where there is none. */
    private double[] studentised() {
        int n = optimum.length;
        double[] ratios = new double[n];
        java.util.Arrays.fill(ratios, Double.NaN);
        if (!fit.problem().loss().plain() || onBound() || !workspace.linearise(coordinates, residuals, jacobian)) {
            return ratios;
        }
        double variance =
                fit.problem().errors() == ErrorModel.ABSOLUTE ? 1 : workspace.cost(residuals) / fit.degreesOfFreedom();
        inverseLengths(n);
        for (int j = 0; j < n; j++) {
            double error = errors[j] * Math.sqrt(variance);
            ratios[j] = error < Double.POSITIVE_INFINITY ? (coordinates[j] - optimum[j]) / error : Double.NaN;
        }
        return ratios;
    }

    private boolean onBound() {
        for (int j = 0; j < optimum.length; j++) {
            if (coordinates[j] <= workspace.lowest(j) || coordinates[j] >= workspace.highest(j)) {
                return true;
            }
        }
        return false;
    }

    /** Fills in the standard errors for unit variance: the lengths of the rows of the inverse of R, where QR = J. */
    private void inverseLengths(int n) {
        int rows = workspace.points();
        Reflections.reduce(jacobian, rows, n, residuals, new double[n]);
        for (int j = 0; j < n; j++) {
            double square = 0;
            double[] column = new double[n]; // solution of Rᵀ z = unit vector j
            for (int k = j; k < n; k++) {
                double sum = k == j ? 1 : 0;
                for (int i = j; i < k; i++) {
                    sum -= jacobian[k * rows + i] * column[i];
                }
                column[k] = sum / jacobian[k * rows + k];
                square += column[k] * column[k];
            }
            errors[j] = Math.sqrt(square);
        }
    }
}
