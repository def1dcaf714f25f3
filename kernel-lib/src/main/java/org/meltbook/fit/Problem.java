package org.meltbook.fit;

import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.figure.Axis;

/** Data, a model, an error model and a start: all that a fit needs, checked. Wrong input throws here, not later. */
public final class Problem {
    private final Model model;
    private final Axis xAxis;
    private final Axis yAxis;
    private final Doubles x;
    private final Doubles y;
    private final Doubles deviations;
    private final Weighting weighting;
    private final Doubles start;

    private Problem(Builder builder, Doubles start) {
        this.model = builder.model;
        this.xAxis = builder.xAxis;
        this.yAxis = builder.yAxis;
        this.x = builder.x;
        this.y = builder.y;
        this.deviations = builder.deviations;
        this.weighting = builder.weighting;
        this.start = start;
    }

    /** A problem for the model, to be given its data. */
    public static Builder of(Model model) {
        return new Builder(model);
    }

    /** Solves the problem by {@link LevenbergMarquardt}. */
    public Fit solve() {
        return solve(Progress.QUIET);
    }

    /** Solves the problem by {@link LevenbergMarquardt}, showing progress and stopping on interrupt. */
    public Fit solve(Progress progress) {
        return LevenbergMarquardt.solve(this, progress);
    }

    /** The model. */
    public Model model() {
        return model;
    }

    /** What x is. */
    public Axis xAxis() {
        return xAxis;
    }

    /** What y is. */
    public Axis yAxis() {
        return yAxis;
    }

    /** Where the points lie. */
    public Doubles x() {
        return x;
    }

    /** What was measured there. */
    public Doubles y() {
        return y;
    }

    /** The error model. */
    public Weighting weighting() {
        return weighting;
    }

    /** The start, one value a parameter, held ones at their value. */
    public Doubles start() {
        return start;
    }

    /** By what the misfit of a point is divided. */
    double deviation(int point) {
        return switch (weighting) {
            case EQUAL -> 1;
            case RELATIVE -> Math.abs(y.at(point));
            case DEVIATIONS -> deviations.at(point);
        };
    }

    /** Places of the free parameters. */
    int[] free() {
        return IntStream.range(0, model.parameters().size())
                .filter(i -> model.parameters().get(i).isFree())
                .toArray();
    }

    /** Collects data, error model and axes. */
    public static final class Builder {
        private final Model model;
        private Axis xAxis = new Axis("x", "1", Axis.Scale.LINEAR);
        private Axis yAxis = new Axis("y", "1", Axis.Scale.LINEAR);
        private Doubles x = Doubles.of();
        private Doubles y = Doubles.of();
        private Doubles deviations = Doubles.of();
        private Weighting weighting = Weighting.EQUAL;

        private Builder(Model model) {
            this.model = model;
        }

        /** Sets the points. */
        public Builder data(Doubles xs, Doubles ys) {
            this.x = xs;
            this.y = ys;
            return this;
        }

        /** Says what x and y are, for tables and figures. */
        public Builder axes(Axis horizontal, Axis vertical) {
            this.xAxis = horizontal;
            this.yAxis = vertical;
            return this;
        }

        /** Divides each misfit by the measured value. */
        public Builder relative() {
            this.weighting = Weighting.RELATIVE;
            return this;
        }

        /** Divides each misfit by the standard deviation of its point, in the unit of y. */
        public Builder deviations(Doubles each) {
            this.weighting = Weighting.DEVIATIONS;
            this.deviations = each;
            return this;
        }

        /**
         * The finished problem.
         *
         * @param values where to start, one value a parameter; a held parameter keeps its own value
         * @throws RangeException if points are missing, too few or not finite, a weight is not above zero, a start lies
         *     outside its bounds, no parameter is free, or a name is used twice
         */
        public Problem from(double... values) {
            List<Parameter> parameters = model.parameters();
            checkParameters(parameters, values);
            checkData();
            double[] start = new double[values.length];
            for (int i = 0; i < start.length; i++) {
                Parameter parameter = parameters.get(i);
                start[i] = parameter.isFree()
                        ? parameter.check(values[i])
                        : parameter.fixed().getAsDouble();
            }
            Problem problem = new Problem(this, Doubles.of(start));
            long distinct = x.stream().distinct().count();
            int free = problem.free().length;
            if (free == 0 || x.size() < free || distinct < free) {
                throw new RangeException(model.name() + " has " + free + " free parameters; that needs at least one, "
                        + "and as many points at different " + xAxis.label() + ", found " + x.size() + " points at "
                        + distinct + " different places");
            }
            return problem;
        }

        private void checkParameters(List<Parameter> parameters, double[] values) {
            if (values.length != parameters.size()) {
                throw new RangeException(
                        model.name() + " has " + parameters.size() + " parameters, the start gives " + values.length);
            }
            Set<String> names = new HashSet<>();
            for (Parameter parameter : parameters) {
                if (!names.add(parameter.name())) {
                    throw new RangeException(model.name() + " uses the parameter name " + parameter.name() + " twice");
                }
            }
        }

        private void checkData() {
            if (x.size() != y.size()) {
                throw new RangeException("a fit needs as many x as y, found " + x.size() + " and " + y.size());
            }
            for (int i = 0; i < x.size(); i++) {
                if (!Double.isFinite(x.at(i)) || !Double.isFinite(y.at(i))) {
                    throw new RangeException("point " + (i + 1) + " of the fit is (" + x.at(i) + ", " + y.at(i)
                            + "): expected finite numbers");
                }
                if (weighting == Weighting.RELATIVE && y.at(i) == 0) {
                    throw new RangeException("point " + (i + 1) + " of the fit is zero: relative errors need values "
                            + "other than zero");
                }
            }
            if (weighting == Weighting.DEVIATIONS
                    && (deviations.size() != y.size()
                            || !deviations.stream().allMatch(d -> d > 0 && d < Double.MAX_VALUE))) {
                throw new RangeException("a fit needs one standard deviation above zero for each of its " + y.size()
                        + " points, found " + deviations);
            }
        }
    }
}
