package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.RealMatrix;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * What came of a fit: estimates with standard errors and 95 % intervals, covariance, residuals, and how it ended.
 *
 * <p>Standard errors come from the Jacobian at the optimum. With {@link ErrorModel#SCALED} they are scaled by the
 * residual variance: the scatter of the points around the model tells their error, so a model that does not fit widens
 * its own errors; intervals use Student's t. With {@link ErrorModel#ABSOLUTE} the deviations given are taken as they
 * are, and intervals use the normal distribution. For a parameter on a logarithmic scale intervals are symmetric in its
 * logarithm, so that it stays above zero.
 */
public final class Fit implements Exhibit {
    /** How a fit ended. */
    public enum Status {
        /** No step lowers the sum of squares any more. */
        CONVERGED,
        /** The limit of model evaluations came first: the values are the best so far, not the optimum. */
        EVALUATIONS_SPENT,
        /** No step could be found that lowers the sum of squares, though its slope is not zero. */
        STALLED
    }

    private final Problem problem;
    private final Doubles coordinates;
    private final Doubles values;
    private final Status status;
    private final int evaluations;
    private final Doubles residuals;
    private final double[][] jacobian;
    private final double[][] tangent;
    private final double cost;
    private final double sumOfSquares;
    private final int degreesOfFreedom;
    private final Covariance covariance;
    private final List<Estimate> estimates;

    private Fit(Problem problem, double[] coordinates, Status status, int evaluations) {
        this.problem = problem;
        this.coordinates = Doubles.of(coordinates);
        this.status = status;
        this.evaluations = evaluations;
        Workspace workspace = Workspace.of(problem);
        int points = workspace.points();
        double[] misfits = new double[points];
        double[] slopes = new double[points * coordinates.length];
        double[] all = new double[problem.parameters().size()];
        workspace.linearise(coordinates, misfits, slopes);
        workspace.outward(coordinates, all);
        this.values = Doubles.of(all);
        this.residuals = Doubles.of(misfits);
        this.jacobian = rowByRow(slopes, points, coordinates.length);
        this.tangent = workspace.tangent(coordinates);
        this.cost = workspace.cost(misfits);
        this.sumOfSquares = residuals.stream().map(r -> r * r).sum();
        this.covariance = Covariance.of(problem, all, jacobian, tangent);
        this.degreesOfFreedom = points - covariance.estimated();
        this.estimates = estimates(all);
    }

    private static double[][] rowByRow(double[] columns, int rows, int count) {
        double[][] matrix = new double[rows][count];
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < count; j++) {
                matrix[i][j] = columns[j * rows + i];
            }
        }
        return matrix;
    }

    /** What a fit of the problem is that ended at the coordinates. */
    static Fit at(Problem problem, double[] coordinates, Status status, int evaluations) {
        return new Fit(problem, coordinates, status, evaluations);
    }

    private List<Estimate> estimates(double[] at) {
        List<Estimate> all = new ArrayList<>();
        double t = quantile();
        double variance = variance();
        for (int i = 0; i < at.length; i++) {
            Parameter parameter = problem.parameters().get(i);
            double inner = Math.sqrt(covariance.at(i, i) * variance);
            double centre = parameter.inward(at[i]);
            double low = parameter.outward(centre - t * inner);
            double high = parameter.outward(centre + t * inner);
            all.add(new Estimate(parameter, at[i], inner * parameter.stretch(at[i]), low, high, status(i, t * inner)));
        }
        return List.copyOf(all);
    }

    private double quantile() {
        if (problem.errors() == ErrorModel.ABSOLUTE) {
            return new NormalDistribution().inverseCumulativeProbability(0.975);
        }
        return degreesOfFreedom > 0
                ? new TDistribution(degreesOfFreedom).inverseCumulativeProbability(0.975)
                : Double.NaN;
    }

    private Estimate.Status status(int i, double halfWidth) {
        Parameter parameter = problem.parameters().get(i);
        if (problem.tie(i).isPresent()) {
            return covariance.notIdentified(i) ? Estimate.Status.NOT_IDENTIFIED : Estimate.Status.TIED;
        } else if (!parameter.isFree()) {
            return Estimate.Status.HELD;
        } else if (covariance.atBound(i)) {
            return Estimate.Status.AT_BOUND;
        } else if (covariance.notIdentified(i)) {
            return Estimate.Status.NOT_IDENTIFIED;
        }
        boolean wide = parameter.scale() == Parameter.Scale.LOG && !(halfWidth < Math.log(10));
        return wide ? Estimate.Status.WEAK : Estimate.Status.ESTIMATED;
    }

    /** What was asked. */
    public Problem problem() {
        return problem;
    }

    /** The parameters' values in the order of {@link Problem#parameters()}. */
    public Doubles values() {
        return values;
    }

    /** The fitted coordinates of {@link Workspace}: the free parameters, each on its own scale. */
    public Doubles coordinates() {
        return coordinates;
    }

    /** What the fit says of each parameter, in the order of {@link Problem#parameters()}. */
    public List<Estimate> estimates() {
        return estimates;
    }

    /**
     * What the fit says of one parameter.
     *
     * @throws RangeException if there is none of that name; the message lists them
     */
    public Estimate estimate(String name) {
        return estimates.get(problem.place(name));
    }

    /** Standard error of a parameter, in its unit; NaN if the data give none. */
    public double standardError(String name) {
        return estimate(name).error();
    }

    /** Covariance of two parameters, in the product of their units; NaN if the data give none. */
    public double covariance(String first, String second) {
        int a = problem.place(first);
        int b = problem.place(second);
        List<Parameter> parameters = problem.parameters();
        return covariance.at(a, b)
                * variance()
                * parameters.get(a).stretch(values.at(a))
                * parameters.get(b).stretch(values.at(b));
    }

    /**
     * Covariance of the coordinates, one row and column a free parameter in the order of {@link Problem#free()}; NaN in
     * the rows of those that the data do not give or that rest on a bound.
     */
    public RealMatrix covariance() {
        int[] free = problem.free();
        double[][] matrix = new double[free.length][free.length];
        for (int a = 0; a < free.length; a++) {
            for (int b = 0; b < free.length; b++) {
                matrix[a][b] = covariance.at(free[a], free[b]) * variance();
            }
        }
        return new Array2DRowRealMatrix(matrix, false);
    }

    /** Correlation of two parameters on the scales on which they were stepped, −1 to 1; NaN if the data give none. */
    public double correlation(String first, String second) {
        int a = problem.place(first);
        int b = problem.place(second);
        return covariance.at(a, b) / Math.sqrt(covariance.at(a, a) * covariance.at(b, b));
    }

    /** Derivatives of the residuals to the coordinates, one row a point, one column a free parameter on its scale. */
    public RealMatrix scaledJacobian() {
        return new Array2DRowRealMatrix(jacobian, true);
    }

    /** Derivatives of the residuals to the values of the free parameters, one row a point, in 1 over their units. */
    public RealMatrix jacobian() {
        int[] free = problem.free();
        RealMatrix plain = scaledJacobian();
        for (int j = 0; j < free.length; j++) {
            double stretch = problem.parameters().get(free[j]).stretch(values.at(free[j]));
            plain.setColumnVector(j, plain.getColumnVector(j).mapDivide(stretch));
        }
        return plain;
    }

    /**
     * Derivatives of the values of all parameters to the coordinates, one row a parameter, one column a free parameter;
     * rows of held parameters are zero.
     */
    public RealMatrix tangent() {
        return new Array2DRowRealMatrix(tangent, true);
    }

    /** The fitted model of the only data set at {@code x}. */
    public double at(double x) {
        problem.only();
        return at(0, x);
    }

    /** The fitted model of a data set, counted from zero, at {@code x}. */
    public double at(int dataSet, double x) {
        return problem.dataSets().get(dataSet).model().at(x, ownValues(dataSet));
    }

    /** The fitted values of the parameters of one data set's model, in the model's order. */
    public double[] ownValues(int dataSet) {
        return problem.dataSets().get(dataSet).model().parameters().stream()
                .mapToDouble(parameter -> values.at(problem.place(parameter.name())))
                .toArray();
    }

    /** The fitted model at the points of a data set, counted from zero. */
    public Doubles predictions(int dataSet) {
        double[] own = ownValues(dataSet);
        DataSet set = problem.dataSets().get(dataSet);
        double[] into = new double[set.size()];
        set.model().values(set.x().toArray(), own, into);
        return Doubles.of(into);
    }

    /**
     * (model − measured) / deviation of each point, the data sets one behind the other; a share of the measured value
     * for relative errors of unknown size, ln(model / measured) for errors of the logarithm.
     */
    public Doubles residuals() {
        return residuals;
    }

    /** The residuals of one data set, counted from zero. */
    public Doubles residuals(int dataSet) {
        int from = problem.offset(dataSet);
        double[] all = residuals.toArray();
        return Doubles.of(Arrays.copyOfRange(
                all, from, from + problem.dataSets().get(dataSet).size()));
    }

    /** What was minimised: the sum of the squared residuals, or of what the loss makes of them. */
    public double cost() {
        return cost;
    }

    /** Sum of the squared residuals; chi-square if the deviations are taken as absolute. */
    public double sumOfSquares() {
        return sumOfSquares;
    }

    /** Points less parameters estimated. */
    public int degreesOfFreedom() {
        return degreesOfFreedom;
    }

    /** Residual variance: sum of squares over degrees of freedom; NaN without any left. */
    public double reducedChiSquare() {
        return degreesOfFreedom > 0 ? sumOfSquares / degreesOfFreedom : Double.NaN;
    }

    /**
     * By what the inverse of JᵀJ is multiplied to give the covariance: 1 for absolute deviations, the residual variance
     * for scaled ones; with a robust loss, what P. J. Huber, Robust Statistics (1981), eq. 7.6.5 puts in its place (memory).
     */
    public double variance() {
        if (problem.errors() == ErrorModel.ABSOLUTE) {
            return 1;
        }
        Loss loss = problem.loss();
        if (loss.plain() || degreesOfFreedom <= 0) {
            return reducedChiSquare();
        }
        int n = residuals.size();
        double pull =
                residuals.stream().map(r -> r * loss.weight(r)).map(p -> p * p).sum();
        double mean = residuals.stream().map(loss::curvature).sum() / n;
        double square = residuals.stream().map(loss::curvature).map(c -> c * c).sum() / n;
        double correction = 1 + covariance.estimated() * (square / (mean * mean) - 1) / n;
        return correction * correction * pull / degreesOfFreedom / (mean * mean);
    }

    /** Root mean square of the residuals. */
    public double rootMeanSquare() {
        return Math.sqrt(sumOfSquares / residuals.size());
    }

    /** How the fit ended. */
    public Status status() {
        return status;
    }

    /** How often the models were tried. */
    public int evaluations() {
        return evaluations;
    }

    /** What the data do not fix, and which bounds were hit, in words. */
    List<String> identification() {
        return covariance.problems();
    }

    /** How far the points lie from the model, in words. */
    public String spread() {
        return new FitExhibit(this).spread();
    }

    @Override
    public String headline() {
        return new FitExhibit(this).headline();
    }

    @Override
    public List<Rows> rows() {
        return new FitExhibit(this).rows();
    }

    @Override
    public List<Figure> figures() {
        return new FitExhibit(this).figures();
    }

    @Override
    public List<String> cautions() {
        return new FitExhibit(this).cautions();
    }

    @Override
    public String toString() {
        return headline();
    }
}
