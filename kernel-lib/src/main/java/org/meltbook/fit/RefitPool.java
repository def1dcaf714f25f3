package org.meltbook.fit;

import java.util.Random;
import org.apache.commons.math3.linear.RealMatrix;

/** Errors around a fit, from which measured values are drawn. Immutable, so one serves many threads. */
final class RefitPool {
    private final Problem problem;
    private final double[] model;
    private final double[] errors; // modified residuals, the data sets one behind the other
    private final double width; // standard deviation of a normal error, in deviations
    private final boolean normal;

    private RefitPool(Fit fit, BootstrapSettings.Kind kind) {
        this.problem = fit.problem();
        this.normal = kind == BootstrapSettings.Kind.PARAMETRIC;
        this.width = Math.sqrt(problem.errors() == ErrorModel.ABSOLUTE ? 1 : fit.reducedChiSquare());
        this.model = new double[problem.points()];
        for (int d = 0; d < problem.dataSets().size(); d++) {
            double[] line = fit.predictions(d).toArray();
            System.arraycopy(line, 0, model, problem.offset(d), line.length);
        }
        this.errors = modified(fit);
    }

    static RefitPool of(Fit fit, BootstrapSettings.Kind kind) {
        return new RefitPool(fit, kind);
    }

    private static double[] modified(Fit fit) {
        double[] leverages = leverages(fit);
        double[] errors = fit.residuals().toArray();
        for (int i = 0; i < errors.length; i++) {
            // a point that the model meets whatever is measured there has no residual to speak of
            errors[i] = leverages[i] < 1 - 1e-8 ? errors[i] / Math.sqrt(1 - leverages[i]) : 0;
        }
        for (int d = 0; d < fit.problem().dataSets().size(); d++) {
            int from = fit.problem().offset(d);
            int to = from + fit.problem().dataSets().get(d).size();
            double mean = java.util.Arrays.stream(errors, from, to).average().orElse(0);
            for (int i = from; i < to; i++) {
                errors[i] -= mean;
            }
        }
        return errors;
    }

    /** Diagonal of J (JᵀJ)⁻¹ Jᵀ, over the coordinates that have a covariance. */
    private static double[] leverages(Fit fit) {
        RealMatrix jacobian = fit.scaledJacobian();
        RealMatrix covariance = fit.covariance();
        double[] leverages = new double[jacobian.getRowDimension()];
        for (int i = 0; i < leverages.length; i++) {
            for (int a = 0; a < covariance.getRowDimension(); a++) {
                for (int b = 0; b < covariance.getRowDimension(); b++) {
                    double entry = covariance.getEntry(a, b) / fit.variance();
                    leverages[i] += Double.isNaN(entry) ? 0 : jacobian.getEntry(i, a) * entry * jacobian.getEntry(i, b);
                }
            }
        }
        return leverages;
    }

    /**
     * Draws measured values.
     *
     * @param into filled, one a point
     * @return false if the weighting allows no such value: the relative errors drawn left nothing of one
     */
    boolean draw(Random random, double[] into) {
        boolean allowed = true;
        for (int d = 0; d < problem.dataSets().size(); d++) {
            DataSet set = problem.dataSets().get(d);
            int from = problem.offset(d);
            for (int i = 0; i < set.size(); i++) {
                double error = normal ? -width * random.nextGaussian() : errors[from + random.nextInt(set.size())];
                into[from + i] = measured(set, i, model[from + i], error);
                allowed &= Double.isFinite(into[from + i]);
            }
        }
        return allowed;
    }

    /** The measured value whose residual at the fitted model is {@code error}; NaN if there is none. */
    private double measured(DataSet set, int point, double value, double error) {
        return switch (set.weighting()) {
            case EQUAL, DEVIATIONS -> value - error * set.deviation(point, value);
            case LOGARITHMIC -> value * Math.exp(-error * set.deviation(point, value));
            case RELATIVE -> {
                double share = set.deviation(point, 1) * error * Math.signum(value);
                // a normal error is a share of the true value, a residual one of the measured value
                double factor = normal ? 1 - share : 1 / (1 + share);
                yield factor > 0 && factor < Double.POSITIVE_INFINITY ? value * factor : Double.NaN;
            }
        };
    }
}
