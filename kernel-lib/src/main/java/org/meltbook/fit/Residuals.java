package org.meltbook.fit;

import java.util.List;

/** Misfits of a problem, divided by the deviation of their point, and their derivatives. */
final class Residuals {
    private Residuals() {}

    /** (model − measured) / deviation of each point. */
    static double[] of(Problem problem, double[] values) {
        double[] residuals = new double[problem.x().size()];
        for (int i = 0; i < residuals.length; i++) {
            double model = problem.model().at(problem.x().at(i), values);
            residuals[i] = (model - problem.y().at(i)) / problem.deviation(i);
        }
        return residuals;
    }

    /** Derivatives of the misfits, one row a point, one column a free parameter on its own (linear or log) scale. */
    static double[][] jacobian(Problem problem, double[] values) {
        int[] free = problem.free();
        List<Parameter> parameters = problem.model().parameters();
        double[][] jacobian = new double[problem.x().size()][free.length];
        double[] gradient = new double[parameters.size()];
        for (int i = 0; i < jacobian.length; i++) {
            problem.model().gradient(problem.x().at(i), values, gradient);
            for (int j = 0; j < free.length; j++) {
                double stretch = parameters.get(free[j]).stretch(values[free[j]]);
                jacobian[i][j] = gradient[free[j]] * stretch / problem.deviation(i);
            }
        }
        return jacobian;
    }
}
