package org.meltbook.fit;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.UnaryOperator;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.figure.Axis;

/**
 * Data, models, an error model and a start: all that a fit needs, checked. Wrong input throws here, not later. Data sets
 * share the parameters that their models call by the same name. Immutable, so one problem serves many threads.
 */
public final class Problem {
    private final List<DataSet> dataSets;
    private final List<Parameter> parameters;
    private final List<Tie> ties;
    private final Loss loss;
    private final ErrorModel errors;
    private final Doubles start;

    private Problem(Builder builder, List<Parameter> parameters, Doubles start) {
        this.dataSets = List.copyOf(builder.dataSets);
        this.parameters = List.copyOf(parameters);
        this.ties = List.copyOf(builder.ties);
        this.loss = builder.loss;
        this.errors = builder.errors;
        this.start = start;
    }

    /** A problem for one model, to be given its data by {@link Builder#data}. */
    public static Builder of(Model model) {
        return new Builder(Optional.of(model), List.of());
    }

    /** A problem for one data set, or for several that share parameters by name. */
    public static Builder of(DataSet... dataSets) {
        return new Builder(Optional.empty(), List.of(dataSets));
    }

    /** Solves the problem from its start. */
    public Fit solve() {
        return solve(Progress.QUIET);
    }

    /** Solves the problem from its start, showing progress and stopping on interrupt. */
    public Fit solve(Progress progress) {
        Solver solver = Solver.of(this);
        return solver.fit(solver.solve(progress));
    }

    /**
     * Solves the problem from many starts and gives the best fit; {@link MultiStart} tells more.
     *
     * @param starts how many, the problem's own included
     * @param seed   where the other starts are drawn from
     */
    public Fit solveFromMany(int starts, long seed) {
        return MultiStart.of(this, starts, seed, Progress.QUIET).best();
    }

    /** The data sets, whose points stand one behind the other in residuals and Jacobian. */
    public List<DataSet> dataSets() {
        return dataSets;
    }

    /**
     * The data set of a problem that has one only.
     *
     * @throws RangeException if it has several
     */
    public DataSet only() {
        if (dataSets.size() != 1) {
            throw new RangeException("this problem has " + dataSets.size() + " data sets: "
                    + dataSets.stream().map(DataSet::name).toList() + "; say which one");
        }
        return dataSets.get(0);
    }

    /** What is fitted: the models' names, each once. */
    public String name() {
        return dataSets.stream().map(set -> set.model().name()).distinct().collect(Collectors.joining(" and "));
    }

    /** All parameters of all models, each name once, in the order in which the models give them. */
    public List<Parameter> parameters() {
        return parameters;
    }

    /** The parameters that follow from others. */
    public List<Tie> ties() {
        return ties;
    }

    /** How much a misfit counts. */
    public Loss loss() {
        return loss;
    }

    /** Where the size of the errors is taken from. */
    public ErrorModel errors() {
        return errors;
    }

    /** Weighting of each data set, loss and error model in one sentence, as every report shows it. */
    public String errorWords() {
        List<String> kinds =
                dataSets.stream().map(set -> set.weighting().words()).distinct().toList();
        String weighting = kinds.size() == 1
                ? kinds.get(0)
                : dataSets.stream()
                        .map(set -> set.name() + ": " + set.weighting().words())
                        .collect(Collectors.joining(", "));
        boolean given = errors == ErrorModel.SCALED && dataSets.stream().anyMatch(DataSet::sizeKnown);
        return weighting + (given ? ", taken as known up to a common factor" : "") + "; " + errors.words()
                + (loss.plain() ? "" : "; " + loss.words());
    }

    /** The start, one value a parameter, held and tied ones at their value. */
    public Doubles start() {
        return start;
    }

    /** How many points all data sets have together: the length of the residuals. */
    public int points() {
        return dataSets.stream().mapToInt(DataSet::size).sum();
    }

    /** Where the points of a data set begin in residuals and Jacobian. */
    public int offset(int dataSet) {
        return dataSets.subList(0, dataSet).stream().mapToInt(DataSet::size).sum();
    }

    /** Places, among the parameters, of those that are fitted: the coordinates of {@link Workspace}, in this order. */
    public int[] free() {
        return IntStream.range(0, parameters.size()).filter(this::fitted).toArray();
    }

    private boolean fitted(int place) {
        return parameters.get(place).isFree() && tie(place).isEmpty();
    }

    /** The rule by which a parameter follows from others, if it does. */
    Optional<Tie> tie(int place) {
        String name = parameters.get(place).name();
        return ties.stream().filter(tie -> tie.name().equals(name)).findFirst();
    }

    /**
     * Place of a parameter among all.
     *
     * @throws RangeException if there is none of that name; the message lists them
     */
    public int place(String parameter) {
        List<String> names = parameters.stream().map(Parameter::name).toList();
        if (!names.contains(parameter)) {
            throw new RangeException(name() + " has no parameter " + parameter + "; it has " + names);
        }
        return names.indexOf(parameter);
    }

    /**
     * The same problem with a parameter held at a value.
     *
     * @throws RangeException if there is no such parameter, it is tied, the bounds forbid the value, or no parameter
     *     is left to fit
     */
    public Problem holding(String parameter, double value) {
        return changed(parameter, p -> p.heldAt(value)).from(start.toArray());
    }

    /** The same problem with a parameter fitted that was held, started where it was held. */
    public Problem freeing(String parameter) {
        return changed(parameter, Parameter::freed).from(start.toArray());
    }

    /**
     * The same problem started elsewhere.
     *
     * @param values one value a parameter; held and tied ones keep their own value
     */
    public Problem startingFrom(Doubles values) {
        return new Builder(this).from(values.toArray());
    }

    /**
     * The same problem with other measured values at the same places; {@link Workspace#measured} does it without
     * making a new problem.
     *
     * @param values measured values of all data sets, one behind the other
     */
    public Problem measured(Doubles values) {
        if (values.size() != points()) {
            throw new RangeException("this problem has " + points() + " points, found " + values.size() + " values");
        }
        Builder builder = new Builder(this);
        for (int d = 0; d < dataSets.size(); d++) {
            int first = offset(d);
            int[] places =
                    IntStream.range(first, first + dataSets.get(d).size()).toArray();
            builder.dataSets.set(d, dataSets.get(d).measured(values.pick(places)));
        }
        return builder.from(start.toArray());
    }

    private Builder changed(String parameter, UnaryOperator<Parameter> change) {
        int place = place(parameter);
        if (tie(place).isPresent()) {
            throw new RangeException("parameter " + parameter + " follows from others ("
                    + tie(place).get().words() + "): it cannot be held or freed");
        }
        Builder builder = new Builder(this);
        builder.changes.put(parameter, change.apply(parameters.get(place)));
        return builder;
    }

    /** Collects data, error model, ties and loss. */
    public static final class Builder {
        private final Optional<Model> model;
        private final List<DataSet> dataSets;
        private final Map<String, Parameter> changes = new HashMap<>();
        private final List<Tie> ties = new ArrayList<>();
        private Loss loss = Loss.SQUARES;
        private ErrorModel errors = ErrorModel.SCALED;

        private Builder(Optional<Model> model, List<DataSet> dataSets) {
            this.model = model;
            this.dataSets = new ArrayList<>(dataSets);
        }

        private Builder(Problem pattern) {
            this(Optional.empty(), pattern.dataSets);
            this.ties.addAll(pattern.ties);
            this.loss = pattern.loss;
            this.errors = pattern.errors;
            pattern.parameters.forEach(parameter -> changes.put(parameter.name(), parameter));
        }

        /** Sets the points of a problem for one model. */
        public Builder data(Doubles xs, Doubles ys) {
            Model only = model.orElseThrow(
                    () -> new RangeException("the data sets of this problem bring their points with them"));
            dataSets.clear();
            dataSets.add(DataSet.of(only.name(), only, xs, ys));
            return this;
        }

        /** Says what x and y are, for tables and figures. */
        public Builder axes(Axis horizontal, Axis vertical) {
            return each(set -> set.axes(horizontal, vertical));
        }

        /** Divides each misfit by the measured value. */
        public Builder relative() {
            return each(DataSet::relative);
        }

        /** Takes ln(model / measured) as the misfit. */
        public Builder logarithmic() {
            return each(DataSet::logarithmic);
        }

        /** Divides each misfit by the standard deviation of its point, in the unit of y. */
        public Builder deviations(Doubles each) {
            return each(set -> set.deviations(each));
        }

        private Builder each(UnaryOperator<DataSet> change) {
            if (dataSets.isEmpty()) {
                throw new RangeException("a problem needs its data before its axes and weighting");
            }
            dataSets.replaceAll(change);
            return this;
        }

        /** Says whether the deviations given are taken as absolute; without it they are known up to a factor. */
        public Builder errors(ErrorModel taken) {
            this.errors = taken;
            return this;
        }

        /** Sets how much a misfit counts; least squares if it is not set. */
        public Builder loss(Loss counting) {
            this.loss = counting;
            return this;
        }

        /** Makes a parameter follow from others. */
        public Builder tie(Tie rule) {
            ties.add(rule);
            return this;
        }

        /** Replaces a parameter, found by its name: other bounds, another scale, held or free. */
        public Builder parameter(Parameter other) {
            changes.put(other.name(), other);
            return this;
        }

        /**
         * The finished problem, started by name.
         *
         * @throws RangeException if a free parameter has no start or a name is not known, and as {@link #from(double...)}
         */
        public Problem from(Map<String, Double> values) {
            List<Parameter> parameters = ProblemCheck.parameters(dataSets, changes);
            return from(ProblemCheck.start(parameters, ties, values));
        }

        /**
         * The finished problem.
         *
         * @param values where to start, one value a parameter; a held or tied parameter keeps its own value
         * @throws RangeException if points are missing, too few or not finite, a weight is not above zero, a start lies
         *     outside its bounds, no parameter is free, a name is used twice, or a tie or a change names a parameter
         *     that is not there
         */
        public Problem from(double... values) {
            List<Parameter> parameters = ProblemCheck.parameters(dataSets, changes);
            ProblemCheck.ties(parameters, ties);
            Problem problem = new Problem(this, parameters, ProblemCheck.start(parameters, ties, values));
            ProblemCheck.points(problem);
            return problem;
        }
    }
}
