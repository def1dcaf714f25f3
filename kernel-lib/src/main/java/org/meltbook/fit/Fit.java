package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import org.apache.commons.math3.distribution.TDistribution;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * What came of a fit: estimates with standard errors and 95 % intervals, covariance, residuals, and how it ended.
 *
 * <p>Standard errors come from the Jacobian at the optimum, scaled by the residual variance: the scatter of the points
 * around the model tells their error, so a model that does not fit widens its own errors. Intervals use Student's t;
 * for a parameter on a logarithmic scale they are symmetric in its logarithm, so that it stays above zero.
 */
public final class Fit implements Exhibit {
    /** How a fit ended. */
    public enum Status {
        /** No step lowers the sum of squares any more. */
        CONVERGED,
        /** The limit of model evaluations came first: the values are the best so far, not the optimum. */
        EVALUATIONS_SPENT
    }

    private static final int LINE_POINTS = 121;

    private final Problem problem;
    private final Doubles values;
    private final Status status;
    private final int evaluations;
    private final Doubles residuals;
    private final double sumOfSquares;
    private final int degreesOfFreedom;
    private final Covariance covariance;
    private final List<Estimate> estimates;

    private Fit(Problem problem, double[] values, Status status, int evaluations) {
        this.problem = problem;
        this.values = Doubles.of(values);
        this.status = status;
        this.evaluations = evaluations;
        this.residuals = Doubles.of(Residuals.of(problem, values));
        this.sumOfSquares = residuals.stream().map(r -> r * r).sum();
        this.covariance = Covariance.of(problem, values);
        this.degreesOfFreedom = residuals.size() - covariance.estimated();
        this.estimates = estimates(values);
    }

    static Fit of(Problem problem, double[] values, Status status, int evaluations) {
        return new Fit(problem, values, status, evaluations);
    }

    private List<Estimate> estimates(double[] at) {
        List<Estimate> all = new ArrayList<>();
        double t = degreesOfFreedom > 0
                ? new TDistribution(degreesOfFreedom).inverseCumulativeProbability(0.975)
                : Double.NaN;
        for (int i = 0; i < at.length; i++) {
            Parameter parameter = problem.model().parameters().get(i);
            double inner = Math.sqrt(covariance.at(i, i) * reducedChiSquare());
            double centre = parameter.inward(at[i]);
            double low = parameter.outward(centre - t * inner);
            double high = parameter.outward(centre + t * inner);
            all.add(new Estimate(parameter, at[i], inner * parameter.stretch(at[i]), low, high, status(i, t * inner)));
        }
        return List.copyOf(all);
    }

    private Estimate.Status status(int i, double halfWidth) {
        Parameter parameter = problem.model().parameters().get(i);
        if (!parameter.isFree()) {
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

    /** The parameters' values in the order of the model. */
    public Doubles values() {
        return values;
    }

    /** What the fit says of each parameter, in the order of the model. */
    public List<Estimate> estimates() {
        return estimates;
    }

    /**
     * What the fit says of one parameter.
     *
     * @throws RangeException if the model has none of that name; the message lists them
     */
    public Estimate estimate(String name) {
        return estimates.get(place(name));
    }

    /** Standard error of a parameter, in its unit; NaN if the data give none. */
    public double standardError(String name) {
        return estimate(name).error();
    }

    /** Covariance of two parameters, in the product of their units; NaN if the data give none. */
    public double covariance(String first, String second) {
        int a = place(first);
        int b = place(second);
        List<Parameter> parameters = problem.model().parameters();
        return covariance.at(a, b)
                * reducedChiSquare()
                * parameters.get(a).stretch(values.at(a))
                * parameters.get(b).stretch(values.at(b));
    }

    /** Correlation of two parameters on the scales on which they were stepped, −1 to 1; NaN if the data give none. */
    public double correlation(String first, String second) {
        int a = place(first);
        int b = place(second);
        return covariance.at(a, b) / Math.sqrt(covariance.at(a, a) * covariance.at(b, b));
    }

    private int place(String name) {
        List<String> names =
                problem.model().parameters().stream().map(Parameter::name).toList();
        if (!names.contains(name)) {
            throw new RangeException(problem.model().name() + " has no parameter " + name + "; it has " + names);
        }
        return names.indexOf(name);
    }

    /** The fitted model at {@code x}. */
    public double at(double x) {
        return problem.model().at(x, values.toArray());
    }

    /** (model − measured) / deviation of each point; a share of the measured value for relative errors. */
    public Doubles residuals() {
        return residuals;
    }

    /** Sum of the squared residuals. */
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

    /** Root mean square of the residuals. */
    public double rootMeanSquare() {
        return Math.sqrt(sumOfSquares / residuals.size());
    }

    /** How the fit ended. */
    public Status status() {
        return status;
    }

    /** How often the model was tried. */
    public int evaluations() {
        return evaluations;
    }

    @Override
    public String headline() {
        return problem.model().name() + " fitted to " + residuals.size() + " points: " + spread() + ", "
                + (status == Status.CONVERGED ? "converged" : "NOT converged") + " after " + evaluations + " trials.";
    }

    /** How far the points lie from the model, in words. */
    public String spread() {
        return problem.weighting() == Weighting.RELATIVE
                ? "points lie " + NumberText.of(100 * rootMeanSquare(), 2) + " % (root mean square) from the model"
                : "root mean square residual " + NumberText.of(rootMeanSquare(), 3);
    }

    @Override
    public List<Rows> rows() {
        return List.of(parameterRows(), residualRows());
    }

    private Rows parameterRows() {
        return Rows.titled("Parameters of " + problem.model().name())
                .text(
                        "parameter",
                        estimates.stream().map(e -> e.parameter().label()).toList())
                .text(
                        "value ± standard error",
                        estimates.stream().map(Fit::number).toList())
                .text("95 % interval", estimates.stream().map(Fit::interval).toList())
                .text("unit", estimates.stream().map(e -> e.parameter().unit()).toList())
                .text("status", estimates.stream().map(e -> e.status().words()).toList())
                .note("Error model: " + problem.weighting().words() + ".")
                .note("Intervals: Student's t with " + degreesOfFreedom + " degrees of freedom; residual variance "
                        + NumberText.of(reducedChiSquare()) + ".")
                .build();
    }

    private static String number(Estimate estimate) {
        return estimate.status() == Estimate.Status.HELD
                ? NumberText.of(estimate.value())
                : NumberText.of(estimate.value(), estimate.error(), "");
    }

    private static String interval(Estimate estimate) {
        return Double.isNaN(estimate.error())
                ? "none"
                : NumberText.of(estimate.low()) + " to " + NumberText.of(estimate.high());
    }

    private Rows residualRows() {
        boolean relative = problem.weighting() == Weighting.RELATIVE;
        return Rows.titled("Residuals of " + problem.model().name())
                .numbers(problem.xAxis().label(), problem.xAxis().unit(), problem.x())
                .numbers("measured", problem.yAxis().unit(), problem.y())
                .numbers("model", problem.yAxis().unit(), problem.x().map(this::at))
                .numbers(
                        relative ? "model / measured − 1" : "residual / deviation",
                        relative ? "%" : "1",
                        shownResiduals())
                .build();
    }

    private Doubles shownResiduals() {
        return problem.weighting() == Weighting.RELATIVE ? residuals.map(r -> 100 * r) : residuals;
    }

    @Override
    public List<Figure> figures() {
        return List.of(modelFigure(), residualFigure());
    }

    private Figure modelFigure() {
        Doubles line = line();
        return Figure.titled(problem.model().name() + " and the points it was fitted to")
                .x(problem.xAxis())
                .y(problem.yAxis())
                .line(problem.model().name(), line, line.map(this::at))
                .marks("measured", problem.x(), problem.y())
                .caption("The line ends where the measured points end.")
                .build();
    }

    private Figure residualFigure() {
        boolean relative = problem.weighting() == Weighting.RELATIVE;
        Axis residual = relative
                ? new Axis("model / measured − 1", "%", Axis.Scale.LINEAR)
                : new Axis("residual / deviation", "1", Axis.Scale.LINEAR);
        Doubles ends = Doubles.of(problem.x().smallest(), problem.x().largest());
        return Figure.titled("Residuals of " + problem.model().name())
                .x(problem.xAxis())
                .y(residual)
                .line("no misfit", ends, Doubles.of(0, 0))
                .marks("residual", problem.x(), shownResiduals())
                .build();
    }

    private Doubles line() {
        double first = problem.x().smallest();
        double last = problem.x().largest();
        if (first == last) {
            return Doubles.of(first);
        }
        if (problem.xAxis().scale() == Axis.Scale.LOG && first > 0) {
            return Doubles.logSpaced(first, last, LINE_POINTS);
        }
        double[] line = new double[LINE_POINTS];
        for (int i = 0; i < line.length; i++) {
            line[i] = first + (last - first) * i / (line.length - 1);
        }
        return Doubles.of(line);
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        if (status != Status.CONVERGED) {
            all.add("the fit stopped after " + evaluations
                    + " trials without converging: its values are the best so far");
        }
        all.addAll(covariance.problems());
        estimates.stream()
                .filter(e -> e.status() == Estimate.Status.WEAK)
                .forEach(e -> all.add(e.parameter().label()
                        + " is weakly determined: its 95 % interval spans more than " + "a factor of 100"));
        if (degreesOfFreedom <= 0) {
            all.add("as many parameters as points: nothing is left to judge the errors by");
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
