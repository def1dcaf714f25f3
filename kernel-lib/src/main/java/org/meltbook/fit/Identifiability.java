package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.SingularValueDecomposition;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Whether the data can determine the parameters at all: singular values of the Jacobian with columns of length one, and
 * the combinations of parameters that the data do not fix, in words. A local statement, made at the optimum.
 *
 * <p>Condition indices above 30 count as linked: D. A. Belsley, E. Kuh, R. E. Welsch, Regression Diagnostics (1980)
 * chapter 3 (memory).
 */
public final class Identifiability implements Exhibit {
    private static final double SINGULAR = 1e-8;
    private static final double LINKED = 30;
    private static final double WEAK_FACTOR = 10;
    /** A parameter belongs to a combination from this share of the largest part on. */
    private static final double PART = 0.1;
    /** The same where the combination is exact: what is smaller is rounding. */
    private static final double EXACT_PART = 1e-3;
    /** How many times better products must stay the same than sums, or the other way round, to be named against the scale. */
    private static final double CLEARLY = 100;

    private static final double STEP = 0.1;

    private final Fit fit;
    private final List<Parameter> used = new ArrayList<>();
    private final List<Integer> columns = new ArrayList<>();
    private final List<String> atBound = new ArrayList<>();
    private final List<Combination> combinations = new ArrayList<>();
    private final Doubles singularValues;

    private Identifiability(Fit fit) {
        this.fit = fit;
        RealMatrix jacobian = fit.scaledJacobian();
        int[] free = fit.problem().free();
        for (int j = 0; j < free.length; j++) {
            Parameter parameter = fit.problem().parameters().get(free[j]);
            if (fit.estimates().get(free[j]).status() == Estimate.Status.AT_BOUND) {
                atBound.add(parameter.name());
            } else if (jacobian.getColumnVector(j).getNorm() == 0) {
                combinations.add(new Combination(
                        Combination.Grade.NOT_FIXED, List.of(parameter.name()), List.of(), Double.POSITIVE_INFINITY));
            } else {
                used.add(parameter);
                columns.add(j);
            }
        }
        this.singularValues = used.isEmpty() ? Doubles.of() : decompose(jacobian);
    }

    /** What the data of the fit can tell of its parameters. */
    public static Identifiability of(Fit fit) {
        return new Identifiability(fit);
    }

    private Doubles decompose(RealMatrix jacobian) {
        int n = used.size();
        int rows = jacobian.getRowDimension();
        double[] lengths = new double[n];
        double[][] scaled = new double[Math.max(rows, n)][n];
        for (int c = 0; c < n; c++) {
            lengths[c] = jacobian.getColumnVector(columns.get(c)).getNorm();
            for (int i = 0; i < rows; i++) {
                scaled[i][c] = jacobian.getEntry(i, columns.get(c)) / lengths[c];
            }
        }
        SingularValueDecomposition svd = new SingularValueDecomposition(new Array2DRowRealMatrix(scaled, false));
        double[] singular = svd.getSingularValues();
        List<double[]> open = new ArrayList<>();
        List<Combination> limited = new ArrayList<>();
        for (int k = n - 1; k >= 0; k--) {
            double[] weights = svd.getV().getColumn(k);
            if (singular[k] <= SINGULAR * singular[0]) {
                open.add(weights);
            } else {
                limited(weights, lengths, singular[k], singular[0] / singular[k], limited);
            }
        }
        for (double[] weights : Combination.sparse(open)) {
            combinations.add(combination(Combination.Grade.NOT_FIXED, weights, lengths, Double.POSITIVE_INFINITY));
        }
        combinations.addAll(limited);
        return Doubles.of(singular);
    }

    private void limited(double[] weights, double[] lengths, double singular, double index, List<Combination> into) {
        double reach = quantile() * Math.sqrt(fit.variance()) / singular;
        int loosest = IntStream.range(0, weights.length)
                .reduce((a, b) -> moved(b, weights, lengths) > moved(a, weights, lengths) ? b : a)
                .orElseThrow();
        double factor = Math.exp(reach * moved(loosest, weights, lengths));
        // a parameter that may pass through zero is not weak for being small
        if (factor > WEAK_FACTOR && used.get(loosest).scale() == Parameter.Scale.LOG) {
            into.add(combination(Combination.Grade.WEAK, weights, lengths, factor));
        } else if (index > LINKED) {
            into.add(combination(Combination.Grade.LINKED, weights, lengths, factor));
        }
    }

    private double moved(int c, double[] weights, double[] lengths) {
        return Math.abs(logarithmic(c, weights[c] / lengths[c]));
    }

    private double quantile() {
        if (fit.problem().errors() == ErrorModel.ABSOLUTE) {
            return new NormalDistribution().inverseCumulativeProbability(0.975);
        }
        return fit.degreesOfFreedom() > 0
                ? new TDistribution(fit.degreesOfFreedom()).inverseCumulativeProbability(0.975)
                : Double.NaN;
    }

    private double value(int c) {
        return fit.values().at(fit.problem().place(used.get(c).name()));
    }

    /** Change of ln |value| for a change of the coordinate. */
    private double logarithmic(int c, double change) {
        return used.get(c).scale() == Parameter.Scale.LOG ? change : change / value(c);
    }

    private Combination combination(Combination.Grade grade, double[] weights, double[] lengths, double factor) {
        int[] members = members(grade, weights, lengths);
        List<String> names =
                Arrays.stream(members).mapToObj(c -> used.get(c).name()).toList();
        double[] changes = Arrays.stream(members)
                .mapToDouble(c -> weights[c] / lengths[c] * used.get(c).stretch(value(c)))
                .toArray();
        double[] logarithms = Arrays.stream(members)
                .mapToDouble(c -> logarithmic(c, weights[c] / lengths[c]))
                .toArray();
        boolean zero = Arrays.stream(members).anyMatch(c -> value(c) == 0);
        boolean product = !zero && multiplies(members, logarithms, changes);
        List<String> fixed = product ? Combination.products(names, logarithms) : Combination.sums(names, changes);
        return new Combination(grade, names, fixed, factor);
    }

    /** Which parameters have part: by their effect on the data, or by how far they move where one moves very far. */
    private int[] members(Combination.Grade grade, double[] weights, double[] lengths) {
        double[] parts = weights.clone();
        if (grade == Combination.Grade.WEAK) {
            Arrays.setAll(parts, c -> logarithmic(c, weights[c] / lengths[c]));
        }
        double largest = Arrays.stream(parts).map(Math::abs).max().orElseThrow();
        double share = grade == Combination.Grade.NOT_FIXED ? EXACT_PART : PART;
        return IntStream.range(0, parts.length)
                .filter(c -> Math.abs(parts[c]) > share * largest)
                .toArray();
    }

    /**
     * Whether products stay the same rather than sums: as the scale of the parameters has it, unless a step along the
     * other changes the residuals clearly less.
     */
    private boolean multiplies(int[] members, double[] logarithms, double[] changes) {
        double size = STEP / Arrays.stream(logarithms).map(Math::abs).max().orElseThrow();
        double[] products = fit.values().toArray();
        double[] sums = fit.values().toArray();
        for (int m = 0; m < members.length; m++) {
            int place = fit.problem().place(used.get(members[m]).name());
            products[place] *= Math.exp(size * logarithms[m]);
            sums[place] += size * changes[m];
        }
        boolean ratios = Arrays.stream(members).anyMatch(c -> used.get(c).scale() == Parameter.Scale.LOG);
        return ratios ? !(change(products) > CLEARLY * change(sums)) : change(sums) > CLEARLY * change(products);
    }

    private double change(double[] values) {
        Workspace workspace = Workspace.of(fit.problem());
        double[] coordinates = new double[workspace.coordinates()];
        double[] residuals = new double[workspace.points()];
        workspace.inward(values, coordinates);
        return workspace.residuals(coordinates, residuals)
                ? IntStream.range(0, residuals.length)
                        .mapToDouble(i -> residuals[i] - fit.residuals().at(i))
                        .map(d -> d * d)
                        .sum()
                : Double.POSITIVE_INFINITY;
    }

    /** The fit that was looked at. */
    public Fit fit() {
        return fit;
    }

    /**
     * Singular values of the Jacobian with columns of length one, the largest first; without the parameters that rest
     * on a bound or have no effect at all.
     */
    public Doubles singularValues() {
        return singularValues;
    }

    /** Largest over smallest singular value, 1 or more; infinite if a combination is not fixed. */
    public double conditionNumber() {
        boolean open = combinations.stream().anyMatch(c -> c.grade() == Combination.Grade.NOT_FIXED);
        return open ? Double.POSITIVE_INFINITY : singularValues.largest() / singularValues.smallest();
    }

    /** What is not fixed, or only loosely, the loosest first; empty if the data fix all parameters. */
    public List<Combination> combinations() {
        return List.copyOf(combinations);
    }

    /** Names of the parameters that rest on a bound. */
    public List<String> atBound() {
        return List.copyOf(atBound);
    }

    @Override
    public String headline() {
        List<String> findings =
                new ArrayList<>(combinations.stream().map(Combination::words).toList());
        if (!atBound.isEmpty()) {
            findings.add("at a bound: " + String.join(", ", atBound));
        }
        return fit.problem().name() + ": "
                + (findings.isEmpty()
                        ? "the data determine all fitted parameters, condition number "
                                + NumberText.of(conditionNumber(), 2)
                        : String.join("; ", findings))
                + ".";
    }

    @Override
    public List<Rows> rows() {
        List<Rows> all = new ArrayList<>();
        double first = singularValues.largest();
        all.add(Rows.titled("Singular values of the scaled Jacobian")
                .numbers("singular value", "1", singularValues)
                .numbers(
                        "condition index",
                        "1",
                        singularValues.map(s -> s > SINGULAR * first ? first / s : Double.POSITIVE_INFINITY))
                .note("Columns: "
                        + String.join(", ", used.stream().map(Parameter::name).toList())
                        + ", each of length one, on the scale on which it was fitted.")
                .note("An index above 30 means parameters that are hard to tell apart (common practice).")
                .build());
        if (!combinations.isEmpty()) {
            all.add(Rows.titled("What the data do not tell apart")
                    .text(
                            "parameters",
                            combinations.stream()
                                    .map(c -> String.join(", ", c.parameters()))
                                    .toList())
                    .text(
                            "finding",
                            combinations.stream().map(Combination::words).toList())
                    .numbers(
                            "factor within 95 %",
                            "1",
                            Doubles.of(combinations.stream()
                                    .mapToDouble(Combination::factor)
                                    .toArray()))
                    .note("A statement about small changes around the fitted values.")
                    .build());
        }
        return List.copyOf(all);
    }

    @Override
    public List<Figure> figures() {
        return List.of();
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
