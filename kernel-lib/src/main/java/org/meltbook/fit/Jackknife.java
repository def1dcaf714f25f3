package org.meltbook.fit;

import java.util.Arrays;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/** Fits with one point left out, and the acceleration that they give. */
final class Jackknife implements Parallel.Work {
    private final double[][] values;
    private final double[] optimum;
    private final Solver solver;
    private final double[] counts;
    private final double[] coordinates;

    private Jackknife(Fit fit, double[][] values) {
        this.values = values;
        this.optimum = fit.coordinates().toArray();
        this.solver = Solver.of(fit.problem());
        this.counts = new double[values.length];
        this.coordinates = new double[optimum.length];
        Arrays.fill(counts, 1);
    }

    /**
     * Acceleration of each parameter, Σ d³ / (6 (Σ d²)^1.5) with d the mean of the fits with one point left out less
     * each of them: B. Efron, J. Am. Stat. Assoc. 82 (1987) 171 (memory). NaN if such a fit fails or none differs.
     */
    static Doubles accelerations(Fit fit, int threads, Progress progress) {
        double[][] values = new double[fit.problem().points()][];
        Parallel.each(values.length, threads, () -> new Jackknife(fit, values), progress, "fits less one point");
        double[] accelerations = new double[fit.values().size()];
        for (int p = 0; p < accelerations.length; p++) {
            int place = p;
            double[] each = Arrays.stream(values).mapToDouble(all -> all[place]).toArray();
            double mean = Arrays.stream(each).average().orElse(Double.NaN);
            double square =
                    Arrays.stream(each).map(v -> (mean - v) * (mean - v)).sum();
            double cube = Arrays.stream(each).map(v -> Math.pow(mean - v, 3)).sum();
            accelerations[p] = cube / (6 * Math.pow(square, 1.5));
        }
        return Doubles.of(accelerations);
    }

    @Override
    public void piece(int number, Progress pause) {
        double[] all = new double[solver.workspace().problem().parameters().size()];
        Arrays.fill(all, Double.NaN);
        values[number] = all;
        counts[number] = 0;
        solver.workspace().counting(counts);
        counts[number] = 1;
        solver.start(optimum);
        try {
            if (solver.solve(pause) == Fit.Status.CONVERGED) {
                solver.coordinates(coordinates);
                solver.workspace().outward(coordinates, all);
            }
        } catch (RangeException noValue) {
            Arrays.fill(all, Double.NaN);
        }
    }
}
