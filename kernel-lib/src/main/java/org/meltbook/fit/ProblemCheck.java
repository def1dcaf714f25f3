package org.meltbook.fit;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;

/** What must hold before a problem can be solved; each check throws with what was found. */
final class ProblemCheck {
    private ProblemCheck() {}

    /** The parameters of all data sets, each name once, with the changes put in. */
    static List<Parameter> parameters(List<DataSet> dataSets, Map<String, Parameter> changes) {
        Map<String, Parameter> all = new LinkedHashMap<>();
        for (DataSet set : dataSets) {
            Set<String> own = new HashSet<>();
            for (Parameter parameter : set.model().parameters()) {
                if (!own.add(parameter.name())) {
                    throw new RangeException(
                            set.model().name() + " uses the parameter name " + parameter.name() + " twice");
                }
                Parameter shared = all.putIfAbsent(parameter.name(), parameter);
                if (shared != null && !shared.equals(parameter) && !changes.containsKey(parameter.name())) {
                    throw new RangeException("two models call different parameters " + parameter.name() + ": " + shared
                            + " and " + parameter + "; rename one, or say which holds by the builder's parameter()");
                }
            }
        }
        for (String name : changes.keySet()) {
            if (!all.containsKey(name)) {
                throw new RangeException("no model has a parameter " + name + "; there are " + all.keySet());
            }
        }
        all.replaceAll((name, parameter) -> changes.getOrDefault(name, parameter));
        return new ArrayList<>(all.values());
    }

    static void ties(List<Parameter> parameters, List<Tie> ties) {
        Set<String> names =
                new HashSet<>(parameters.stream().map(Parameter::name).toList());
        Set<String> tied = new HashSet<>();
        for (Tie tie : ties) {
            if (!names.contains(tie.name()) || !names.containsAll(tie.sources())) {
                throw new RangeException("the tie " + tie.words() + " of " + tie.name() + " to " + tie.sources()
                        + " names a parameter that is not there; there are " + names);
            }
            if (!tied.add(tie.name())) {
                throw new RangeException("parameter " + tie.name() + " is tied twice");
            }
        }
        for (Tie tie : ties) {
            if (tie.sources().stream().anyMatch(tied::contains)) {
                throw new RangeException("the tie " + tie.words() + " of " + tie.name()
                        + " follows from a parameter that is tied itself; write it in free parameters");
            }
        }
    }

    /** The start in the order of the parameters; NaN for a tied parameter without one. */
    static double[] start(List<Parameter> parameters, List<Tie> ties, Map<String, Double> values) {
        Map<String, Double> left = new HashMap<>(values);
        double[] start = new double[parameters.size()];
        for (int i = 0; i < start.length; i++) {
            Parameter parameter = parameters.get(i);
            Double given = left.remove(parameter.name());
            boolean needed = parameter.isFree() && tie(ties, parameter).isEmpty();
            if (given == null && needed) {
                throw new RangeException("parameter " + parameter.name() + " has no start");
            }
            start[i] = given == null ? Double.NaN : given;
        }
        if (!left.isEmpty()) {
            throw new RangeException("the start names " + left.keySet() + ", which no model has; there are "
                    + parameters.stream().map(Parameter::name).toList());
        }
        return start;
    }

    static Doubles start(List<Parameter> parameters, List<Tie> ties, double[] values) {
        if (values.length != parameters.size()) {
            throw new RangeException(
                    "there are " + parameters.size() + " parameters, the start gives " + values.length + " values");
        }
        double[] start = new double[values.length];
        for (int i = 0; i < start.length; i++) {
            Parameter parameter = parameters.get(i);
            if (tie(ties, parameter).isEmpty()) {
                start[i] = parameter.isFree()
                        ? parameter.check(values[i])
                        : parameter.fixed().getAsDouble();
            }
        }
        List<String> names = parameters.stream().map(Parameter::name).toList();
        for (Tie tie : ties) {
            double[] sources = tie.sources().stream()
                    .mapToDouble(s -> start[names.indexOf(s)])
                    .toArray();
            int place = names.indexOf(tie.name());
            start[place] = parameters.get(place).check(tie.value(sources));
        }
        return Doubles.of(start);
    }

    private static Optional<Tie> tie(List<Tie> ties, Parameter parameter) {
        return ties.stream().filter(t -> t.name().equals(parameter.name())).findFirst();
    }

    static void points(Problem problem) {
        Set<String> names = new HashSet<>();
        long distinct = 0;
        for (DataSet set : problem.dataSets()) {
            distinct += set.x().stream().distinct().count();
            if (!names.add(set.name())) {
                throw new RangeException("two data sets are called " + set.name());
            }
            if (problem.errors() == ErrorModel.ABSOLUTE && !set.sizeKnown()) {
                throw new RangeException("the errors of " + set.name() + " are to be taken as absolute, but their size "
                        + "was not given: " + set.weighting().words());
            }
        }
        if (problem.errors() == ErrorModel.ABSOLUTE && !problem.loss().plain()) {
            throw new RangeException("with a robust loss the standard errors come from the scatter: the deviations "
                    + "cannot be taken as absolute as well");
        }
        int free = problem.free().length;
        if (free == 0 || problem.points() < free || distinct < free) {
            throw new RangeException(problem.name() + " has " + free + " free parameters; that needs at least one, "
                    + "and as many points at different places, found " + problem.points() + " points at " + distinct
                    + " different places");
        }
    }
}
