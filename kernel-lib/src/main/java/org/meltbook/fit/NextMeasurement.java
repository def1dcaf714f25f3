package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleFunction;
import java.util.stream.IntStream;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.RealVector;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Where one more point would help most: candidates ranked by how much it would shrink the standard error of one
 * parameter (c-optimality), or the volume of the confidence region of all (D-optimality).
 *
 * <p>With g the derivatives of the new residual and C = (JᵀJ)⁻¹, the volume shrinks by √(1 + gᵀCg) and the variance of
 * cᵀθ by (cᵀCg)² / (1 + gᵀCg): V. V. Fedorov, Theory of Optimal Experiments (1972) chapter 2 (memory). Linearised at
 * the optimum; the scatter is taken to stay as it is.
 */
public final class NextMeasurement implements Exhibit {
    private final Fit fit;
    private final int dataSet;
    private final Optional<String> parameter;
    private final int[] used;
    private final RealMatrix inverse;
    private final List<Candidate> ranked;

    /**
     * One place where one might measure.
     *
     * @param x      where, in the unit of x
     * @param shrink by what share the uncertainty would shrink, 0 to 1
     * @param inside whether it lies within the range already measured
     */
    public record Candidate(double x, double shrink, boolean inside) {}

    private NextMeasurement(Fit fit, int dataSet, Doubles candidates, Optional<String> parameter) {
        this.fit = fit;
        this.dataSet = dataSet;
        this.parameter = parameter;
        int[] free = fit.problem().free();
        this.used = IntStream.range(0, free.length)
                .filter(j -> fit.estimates().get(free[j]).status() != Estimate.Status.AT_BOUND)
                .toArray();
        check(candidates);
        // any positive multiple of C gives the same shares; the variance is taken out all the same
        this.inverse = fit.covariance().getSubMatrix(used, used).scalarMultiply(1 / fit.variance());
        Doubles x = fit.problem().dataSets().get(dataSet).x();
        this.ranked = candidates.stream()
                .mapToObj(c -> new Candidate(c, shrink(c), c >= x.smallest() && c <= x.largest()))
                .sorted(Comparator.comparingDouble(Candidate::shrink).reversed())
                .toList();
    }

    /**
     * Candidates for all parameters together, for a fit with one data set.
     *
     * @param candidates where one might measure, in the unit of x
     * @throws RangeException as {@link #of(Fit, int, Doubles, Optional)}
     */
    public static NextMeasurement of(Fit fit, Doubles candidates) {
        fit.problem().only();
        return of(fit, 0, candidates, Optional.empty());
    }

    /**
     * Candidates for one parameter, free or tied, for a fit with one data set.
     *
     * @param candidates where one might measure, in the unit of x
     * @throws RangeException as {@link #of(Fit, int, Doubles, Optional)}
     */
    public static NextMeasurement of(Fit fit, Doubles candidates, String parameter) {
        fit.problem().only();
        return of(fit, 0, candidates, Optional.of(parameter));
    }

    /**
     * Candidates for a further point of one data set.
     *
     * @param dataSet    counted from zero
     * @param candidates where one might measure, in the unit of x of that data set
     * @param parameter  the parameter to be known better; all together if empty
     * @throws RangeException if there is no candidate, the model has no finite value or derivative at one, the data
     *     leave a parameter open or give no variance, or the parameter is unknown, held or at its bound
     */
    public static NextMeasurement of(Fit fit, int dataSet, Doubles candidates, Optional<String> parameter) {
        return new NextMeasurement(fit, dataSet, candidates, parameter);
    }

    private void check(Doubles candidates) {
        if (candidates.isEmpty()) {
            throw new RangeException("what to measure next needs one candidate at least, found none");
        }
        List<Combination> open = Identifiability.of(fit).combinations().stream()
                .filter(c -> c.grade() == Combination.Grade.NOT_FIXED)
                .toList();
        if (!open.isEmpty() || used.length == 0) {
            throw new RangeException("errors that are not finite cannot be ranked by how much they shrink: "
                    + (open.isEmpty()
                            ? "all parameters rest on a bound"
                            : open.get(0).words()));
        }
        if (!(fit.variance() > 0)) {
            throw new RangeException("the fit leaves no misfit or no degree of freedom to judge its errors by");
        }
        parameter.ifPresent(name -> {
            Estimate.Status status = fit.estimate(name).status();
            if (status == Estimate.Status.HELD || status == Estimate.Status.AT_BOUND) {
                throw new RangeException(name + " is " + status.words() + ": it has no error to shrink");
            }
        });
    }

    private double shrink(double x) {
        RealVector g = slope(x);
        RealVector moved = inverse.operate(g);
        double gain = g.dotProduct(moved);
        if (parameter.isEmpty()) {
            return 1 - 1 / Math.sqrt(1 + gain);
        }
        RealVector wanted = wanted(parameter.get());
        double before = wanted.dotProduct(inverse.operate(wanted));
        double pull = wanted.dotProduct(moved);
        return 1 - Math.sqrt(Math.max(0, 1 - pull * pull / (1 + gain) / before));
    }

    private RealVector wanted(String name) {
        return picked(fit.tangent().getRow(fit.problem().place(name)));
    }

    private RealVector picked(double[] coordinates) {
        return new ArrayRealVector(Doubles.of(coordinates).pick(used).toArray());
    }

    /** Derivatives of a residual at x to the coordinates used. */
    private RealVector slope(double x) {
        Problem problem = fit.problem();
        Model model = problem.dataSets().get(dataSet).model();
        double[] own = fit.ownValues(dataSet);
        double[] gradient = new double[own.length];
        model.gradient(x, own, gradient);
        double[][] tangent = fit.tangent().getData();
        double[] slope = new double[problem.free().length];
        double deviation = deviation(model.at(x, own));
        for (int k = 0; k < own.length; k++) {
            int place = problem.place(model.parameters().get(k).name());
            for (int j = 0; j < slope.length; j++) {
                slope[j] += gradient[k] * tangent[place][j] / deviation;
            }
        }
        RealVector all = picked(slope);
        if (all.isNaN() || all.isInfinite()) {
            throw new RangeException(model.name() + " has no finite value or derivative at the candidate x = " + x);
        }
        return all;
    }

    /** Deviation of a new point in the unit of y; the median of those given where each point has its own. */
    private double deviation(double expected) {
        DataSet set = fit.problem().dataSets().get(dataSet);
        return switch (set.weighting()) {
            case EQUAL, RELATIVE -> set.deviation(0, expected);
            case LOGARITHMIC -> set.deviation(0, expected) * expected;
            case DEVIATIONS -> {
                double[] sorted = IntStream.range(0, set.size())
                        .mapToDouble(i -> set.deviation(i, set.y().at(i)))
                        .sorted()
                        .toArray();
                yield (sorted[(sorted.length - 1) / 2] + sorted[sorted.length / 2]) / 2;
            }
        };
    }

    /** The candidates, the most useful first. */
    public List<Candidate> ranked() {
        return ranked;
    }

    /** The most useful candidate. */
    public Candidate best() {
        return ranked.get(0);
    }

    private String goal() {
        return parameter
                .map(name -> "the standard error of " + name)
                .orElse("the volume of the confidence region of all parameters");
    }

    @Override
    public String headline() {
        Axis axis = fit.problem().dataSets().get(dataSet).xAxis();
        String unit = axis.unit().isBlank() || axis.unit().equals("1") ? "" : " " + axis.unit();
        return "One more point at " + axis.label() + " = " + NumberText.of(best().x()) + unit + " would shrink "
                + goal()
                + " most, by " + NumberText.of(100 * best().shrink(), 2) + " %"
                + (best().inside() ? "." : "; it lies outside the range measured, where the model is not tested.");
    }

    @Override
    public List<Rows> rows() {
        DataSet set = fit.problem().dataSets().get(dataSet);
        Rows.Builder rows = Rows.titled("What one more point would shrink: " + goal())
                .numbers(set.xAxis().label(), set.xAxis().unit(), numbers(Candidate::x))
                .numbers("shrinks by", "%", numbers(c -> 100 * c.shrink()))
                .text(
                        "range",
                        ranked.stream()
                                .map(c -> c.inside() ? "measured" : "outside the measured range")
                                .toList())
                .note("Error model: " + fit.problem().errorWords() + ". The scatter is taken to stay as it is.");
        if (set.weighting() == Weighting.DEVIATIONS) {
            rows.note("A new point is taken to have the median of the given standard deviations.");
        }
        return List.of(rows.build());
    }

    private Doubles numbers(ToDoubleFunction<Candidate> number) {
        return Doubles.of(ranked.stream().mapToDouble(number).toArray());
    }

    @Override
    public List<Figure> figures() {
        DataSet set = fit.problem().dataSets().get(dataSet);
        List<Candidate> along = new ArrayList<>(ranked);
        along.sort(Comparator.comparingDouble(Candidate::x));
        return List.of(Figure.titled("What one more point would help")
                .x(set.xAxis())
                .y(new Axis("shrink of uncertainty", "%", Axis.Scale.LINEAR))
                .marks(
                        "candidate",
                        Doubles.of(along.stream().mapToDouble(Candidate::x).toArray()),
                        Doubles.of(along.stream()
                                .mapToDouble(c -> 100 * c.shrink())
                                .toArray()))
                .caption("By how much one more point at x would shrink " + goal() + ".")
                .build());
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>(fit.identification());
        if (fit.status() != Fit.Status.CONVERGED) {
            all.add("the fit did not converge, so this is said of where it stopped, not of the optimum");
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
