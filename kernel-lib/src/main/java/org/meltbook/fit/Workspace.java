package org.meltbook.fit;

import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;

/**
 * Residuals of a problem and their derivatives, worked out without allocation, for data that may be exchanged.
 *
 * <p>Coordinates: one for each free parameter, in the order of {@link Problem#free()}, the value itself or its natural
 * logarithm as the parameter's scale says. Residuals: (model − measured) / deviation, the data sets one behind the
 * other. The Jacobian holds the derivative of residual i to coordinate j at {@code j * points + i}. The loss is not part
 * of either: it enters {@link #cost}.
 *
 * <p>One thread at a time; a thread of its own takes its own workspace from the same problem.
 */
public final class Workspace {
    private static final double TIE_STEP = 1e-3;

    private final Problem problem;
    private final int points;
    private final int[] free;
    private final int[] coordinate; // of each parameter; −1 if it is not free
    private final Parameter[] parameters;
    private final double[] values;
    private final Part[] parts;
    private final Knot[] knots;
    private Loss loss;
    private final double[] measured;
    private final double[] counts;
    private final double[] weights; // root of count over deviation

    private Workspace(Problem problem) {
        this.problem = problem;
        this.points = problem.points();
        this.loss = problem.loss();
        this.free = problem.free();
        this.parameters = problem.parameters().toArray(new Parameter[0]);
        this.values = problem.start().toArray();
        this.coordinate = new int[parameters.length];
        Arrays.fill(coordinate, -1);
        for (int j = 0; j < free.length; j++) {
            coordinate[free[j]] = j;
        }
        this.parts = new Part[problem.dataSets().size()];
        this.measured = new double[points];
        for (int d = 0; d < parts.length; d++) {
            parts[d] = new Part(problem, d);
            System.arraycopy(parts[d].set.y().toArray(), 0, measured, parts[d].offset, parts[d].x.length);
        }
        this.knots = new Knot[parameters.length];
        for (int p = 0; p < knots.length; p++) {
            Optional<Tie> tie = problem.tie(p);
            knots[p] = tie.isPresent() ? new Knot(problem, tie.get()) : Knot.NONE;
        }
        this.counts = new double[points];
        this.weights = new double[points];
        Arrays.fill(counts, 1);
        weigh();
    }

    /** A workspace for the problem, with its data. */
    public static Workspace of(Problem problem) {
        return new Workspace(problem);
    }

    /** The problem it was made for. */
    public Problem problem() {
        return problem;
    }

    /** How many residuals there are. */
    public int points() {
        return points;
    }

    /** How many coordinates there are. */
    public int coordinates() {
        return free.length;
    }

    /** Least value of a coordinate. */
    public double lowest(int j) {
        return parameters[free[j]].inward(parameters[free[j]].low());
    }

    /** Largest value of a coordinate. */
    public double highest(int j) {
        return parameters[free[j]].inward(parameters[free[j]].high());
    }

    /**
     * Exchanges the measured values, copied; relative deviations follow them.
     *
     * @param all one value a point, of all data sets, one behind the other; not checked
     */
    public void measured(double[] all) {
        System.arraycopy(all, 0, measured, 0, points);
        weigh();
    }

    /**
     * Sets how often each point counts: its residual is multiplied by the root. Zero leaves a point out, as
     * cross-validation needs; whole numbers draw points again, as resampling of cases needs.
     *
     * @param each one number a point, zero or more, copied; not checked
     */
    public void counting(double[] each) {
        System.arraycopy(each, 0, counts, 0, points);
        weigh();
    }

    private void weigh() {
        for (Part part : parts) {
            for (int i = 0; i < part.x.length; i++) {
                int point = part.offset + i;
                weights[point] = Math.sqrt(counts[point]) / part.set.deviation(i, measured[point]);
            }
        }
    }

    /** Coordinates of the values of all parameters. */
    public void inward(double[] all, double[] coordinates) {
        for (int j = 0; j < free.length; j++) {
            coordinates[j] = parameters[free[j]].inward(all[free[j]]);
        }
    }

    /** Values of all parameters, held and tied ones included, at the coordinates; bounds of free ones hold exactly. */
    public void outward(double[] coordinates, double[] all) {
        for (int p = 0; p < parameters.length; p++) {
            Parameter parameter = parameters[p];
            if (coordinate[p] >= 0) {
                double outer = parameter.outward(coordinates[coordinate[p]]);
                // exp(log(bound)) may miss the bound by a rounding
                all[p] = Math.min(parameter.high(), Math.max(parameter.low(), outer));
            } else if (knots[p] == Knot.NONE) {
                all[p] = values[p];
            }
        }
        for (int p = 0; p < parameters.length; p++) {
            if (knots[p] != Knot.NONE) {
                all[p] = knots[p].value(all);
            }
        }
    }

    /**
     * Fills in the residuals.
     *
     * @param coordinates one a free parameter
     * @param residuals   filled, one a point
     * @return false if one is not finite, or a tied parameter left its bounds: there is no value here
     */
    public boolean residuals(double[] coordinates, double[] residuals) {
        outward(coordinates, values);
        if (!tiesWithinBounds()) {
            return false;
        }
        for (Part part : parts) {
            part.take(values);
            part.set.model().values(part.x, part.own, part.value);
            misfits(part, residuals);
        }
        return Sums.finite(residuals, points);
    }

    /**
     * Fills in the residuals and their derivatives.
     *
     * @param coordinates one a free parameter
     * @param residuals   filled, one a point
     * @param jacobian    filled, derivative of residual i to coordinate j at {@code j * points + i}
     * @return false if one is not finite, or a tied parameter left its bounds
     */
    public boolean linearise(double[] coordinates, double[] residuals, double[] jacobian) {
        outward(coordinates, values);
        if (!tiesWithinBounds()) {
            return false;
        }
        Arrays.fill(jacobian, 0, points * free.length, 0);
        for (Part part : parts) {
            part.take(values);
            part.set.model().curve(part.x, part.own, part.value, part.derivative);
            misfits(part, residuals);
            part.slopes(weights);
            for (int k = 0; k < part.place.length; k++) {
                chain(part, k, jacobian);
            }
        }
        return Sums.finite(residuals, points) && Sums.finite(jacobian, points * free.length);
    }

    private void misfits(Part part, double[] residuals) {
        boolean logarithm = part.set.weighting() == Weighting.LOGARITHMIC;
        for (int i = 0; i < part.x.length; i++) {
            int point = part.offset + i;
            double misfit = logarithm ? Math.log(part.value[i] / measured[point]) : part.value[i] - measured[point];
            residuals[point] = misfit * weights[point];
        }
    }

    /** Adds what the derivative to the model's parameter k gives to the coordinates behind it. */
    private void chain(Part part, int k, double[] jacobian) {
        int p = part.place[k];
        if (coordinate[p] >= 0) {
            add(part, k, parameters[p].stretch(values[p]), jacobian, coordinate[p]);
        } else if (knots[p] != Knot.NONE) {
            for (int s = 0; s < knots[p].places.length; s++) {
                int source = knots[p].places[s];
                if (coordinate[source] >= 0) {
                    double slope = knots[p].slope(values, s) * parameters[source].stretch(values[source]);
                    add(part, k, slope, jacobian, coordinate[source]);
                }
            }
        }
    }

    private void add(Part part, int k, double stretch, double[] jacobian, int j) {
        int n = part.x.length;
        int from = j * points + part.offset;
        for (int i = 0; i < n; i++) {
            jacobian[from + i] += part.derivative[k * n + i] * (part.slope[i] * stretch);
        }
    }

    /**
     * Derivatives of the values of all parameters to the coordinates, at the coordinates.
     *
     * @return one row a parameter, one column a coordinate; rows of held parameters are zero
     */
    public double[][] tangent(double[] coordinates) {
        outward(coordinates, values);
        double[][] tangent = new double[parameters.length][free.length];
        for (int p = 0; p < parameters.length; p++) {
            if (coordinate[p] >= 0) {
                tangent[p][coordinate[p]] = parameters[p].stretch(values[p]);
            } else if (knots[p] != Knot.NONE) {
                for (int s = 0; s < knots[p].places.length; s++) {
                    int source = knots[p].places[s];
                    if (coordinate[source] >= 0) {
                        tangent[p][coordinate[source]] +=
                                knots[p].slope(values, s) * parameters[source].stretch(values[source]);
                    }
                }
            }
        }
        return tangent;
    }

    /**
     * Coordinates of the parameters in which all residuals are linear; none with a robust loss, since what is minimised
     * is no sum of squares then.
     */
    int[] linear() {
        if (!problem.loss().plain()) {
            return new int[0];
        }
        return IntStream.range(0, free.length).filter(this::linear).toArray();
    }

    private boolean linear(int j) {
        String name = parameters[free[j]].name();
        for (Part part : parts) {
            boolean there = part.set.model().parameters().stream()
                    .anyMatch(p -> p.name().equals(name));
            boolean linear =
                    part.set.model().linearIn().contains(name) && part.set.weighting() != Weighting.LOGARITHMIC;
            if (there && !linear) {
                return false;
            }
        }
        return problem.ties().stream().noneMatch(tie -> tie.sources().contains(name));
    }

    /** The coordinate after its value changed by {@code step} to first order; NaN if it has none then. */
    double movedBy(int j, double coordinate, double step) {
        Parameter parameter = parameters[free[j]];
        return parameter.scale() == Parameter.Scale.LOG ? coordinate + Math.log1p(step) : coordinate + step;
    }

    /** Root of the summed squares of (measured / deviation): what residuals are small against. */
    double size() {
        double sum = 0;
        for (Part part : parts) {
            boolean logarithm = part.set.weighting() == Weighting.LOGARITHMIC;
            for (int i = part.offset; i < part.offset + part.x.length; i++) {
                double share = (logarithm ? 1 : measured[i]) * weights[i];
                sum += share * share;
            }
        }
        return Math.sqrt(sum);
    }

    /** How much a misfit counts now. */
    Loss loss() {
        return loss;
    }

    /** Lets misfits count in another way than the problem says, on the way to its optimum. */
    void loss(Loss other) {
        this.loss = other;
    }

    /** What is minimised: the sum of the squared residuals, or of what the loss makes of them. */
    public double cost(double[] residuals) {
        if (loss.plain()) {
            return Sums.products(residuals, 0, residuals, 0, points);
        }
        double sum = 0;
        for (int i = 0; i < points; i++) {
            sum += loss.cost(residuals[i]);
        }
        return sum;
    }

    private boolean tiesWithinBounds() {
        for (int p = 0; p < parameters.length; p++) {
            if (knots[p] != Knot.NONE && !(values[p] >= parameters[p].low() && values[p] <= parameters[p].high())) {
                return false;
            }
        }
        return true;
    }

    /** One data set with room for its model's numbers. */
    private static final class Part {
        private final DataSet set;
        private final int offset;
        private final double[] x;
        private final int[] place; // of each parameter of the model among all
        private final double[] own;
        private final double[] value;
        private final double[] derivative;
        private final double[] slope; // of each residual to the model's value

        private Part(Problem problem, int d) {
            this.set = problem.dataSets().get(d);
            this.offset = problem.offset(d);
            this.x = set.x().toArray();
            List<Parameter> parameters = set.model().parameters();
            this.place = parameters.stream()
                    .mapToInt(parameter -> problem.place(parameter.name()))
                    .toArray();
            this.own = new double[place.length];
            this.value = new double[x.length];
            this.slope = new double[x.length];
            this.derivative = new double[x.length * place.length];
        }

        private void slopes(double[] weights) {
            boolean logarithm = set.weighting() == Weighting.LOGARITHMIC;
            for (int i = 0; i < x.length; i++) {
                slope[i] = logarithm ? weights[offset + i] / value[i] : weights[offset + i];
            }
        }

        private void take(double[] all) {
            for (int k = 0; k < place.length; k++) {
                own[k] = all[place[k]];
            }
        }
    }

    /** A tie with room for its sources. */
    private static final class Knot {
        private static final Knot NONE = new Knot();
        private final Optional<Tie> tie;
        private final int[] places;
        private final double[] sources;

        private Knot() {
            this.tie = Optional.empty();
            this.places = new int[0];
            this.sources = new double[0];
        }

        private Knot(Problem problem, Tie tie) {
            this.tie = Optional.of(tie);
            this.places = tie.sources().stream().mapToInt(problem::place).toArray();
            this.sources = new double[places.length];
        }

        private double value(double[] all) {
            for (int s = 0; s < places.length; s++) {
                sources[s] = all[places[s]];
            }
            return tie.orElseThrow().value(sources);
        }

        /** Central difference to one source, extrapolated once to step zero. */
        private double slope(double[] all, int s) {
            value(all);
            Tie rule = tie.orElseThrow();
            double kept = sources[s];
            double step = TIE_STEP * Math.max(Math.abs(kept), TIE_STEP);
            double wide = change(rule, s, kept, step);
            double close = change(rule, s, kept, step / 2);
            return (8 * close - wide) / (6 * step);
        }

        private double change(Tie rule, int s, double kept, double step) {
            sources[s] = kept + step;
            double above = rule.value(sources);
            sources[s] = kept - step;
            double change = above - rule.value(sources);
            sources[s] = kept;
            return change;
        }
    }
}
