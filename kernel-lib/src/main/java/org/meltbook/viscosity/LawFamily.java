package org.meltbook.viscosity;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.function.Function;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.fit.Model;
import org.meltbook.fit.Parameter;

/** A kind of viscosity law: its name, formula, source and parameters, and how to make one and where to start a fit. */
public final class LawFamily {
    private final String name;
    private final String formula;
    private final String source;
    private final List<Parameter> parameters;
    private final Function<Doubles, ViscosityLaw> maker;
    private final Function<CurveShape, Doubles> guess;
    private final Curve curve;

    /**
     * Viscosities and their derivatives at many rates together, where that costs less than rate by rate. Constants are
     * checked before.
     */
    @FunctionalInterface
    interface Curve {
        /**
         * Fills in the viscosities and, unless {@code derivatives} is empty, the derivative to constant k at rate i, at
         * {@code k * rates.length + i}.
         */
        void fill(double[] rates, double[] constants, double[] viscosities, double[] derivatives);
    }

    private LawFamily(LawFamily pattern, List<Parameter> parameters) {
        this.name = pattern.name;
        this.formula = pattern.formula;
        this.source = pattern.source;
        this.parameters = List.copyOf(parameters);
        this.maker = pattern.maker;
        this.guess = pattern.guess;
        this.curve = pattern.curve;
    }

    private LawFamily(Builder builder) {
        this.name = builder.name;
        this.formula = builder.formula;
        this.source = builder.source;
        this.parameters = List.copyOf(builder.parameters);
        this.maker = builder.maker;
        this.guess = builder.guess;
        this.curve = builder.curve.orElse(this::oneByOne);
    }

    /** A family to be described. */
    public static Builder named(String name) {
        return new Builder(name);
    }

    /** What it is called. */
    public String name() {
        return name;
    }

    /** Its equation. */
    public String formula() {
        return formula;
    }

    /** Where it was published. */
    public String source() {
        return source;
    }

    /** Its parameters, in the order of the constants of a law. */
    public List<Parameter> parameters() {
        return parameters;
    }

    /**
     * The law with the given constants.
     *
     * @throws RangeException if their number does not fit or one lies outside its bounds
     */
    public ViscosityLaw of(Doubles values) {
        if (values.size() != parameters.size()) {
            throw new RangeException(
                    name + " has " + parameters.size() + " parameters, found " + values.size() + " values");
        }
        return maker.apply(values);
    }

    /** Where a fit of this family may start: rates in 1/s and viscosities in Pa·s, all above zero. */
    public Doubles guess(Doubles rates, Doubles viscosities) {
        return guess.apply(CurveShape.of(rates, viscosities));
    }

    /**
     * The same family with one parameter held at a value in fits.
     *
     * @throws RangeException if it has no such parameter, or the bounds forbid the value
     */
    public LawFamily holding(String parameter, double value) {
        return changed(parameter, p -> p.heldAt(value));
    }

    /**
     * The same family with one parameter, held so far, free in fits.
     *
     * @throws RangeException if it has no such parameter
     */
    public LawFamily freeing(String parameter) {
        return changed(parameter, Parameter::freed);
    }

    private LawFamily changed(String parameter, Function<Parameter, Parameter> change) {
        if (parameters.stream().noneMatch(p -> p.name().equals(parameter))) {
            throw new RangeException(name + " has no parameter " + parameter + "; it has "
                    + parameters.stream().map(Parameter::name).toList());
        }
        return new LawFamily(
                this,
                parameters.stream()
                        .map(p -> p.name().equals(parameter) ? change.apply(p) : p)
                        .toList());
    }

    /** The family as a fit sees it: viscosity in Pa·s over shear rate in 1/s. */
    public Model model() {
        return new LawModel(this);
    }

    private void oneByOne(double[] rates, double[] constants, double[] viscosities, double[] derivatives) {
        ViscosityLaw law = of(Doubles.of(constants));
        double[] gradient = new double[constants.length];
        for (int i = 0; i < rates.length; i++) {
            viscosities[i] = law.at(rates[i]);
            if (derivatives.length > 0) {
                law.gradient(rates[i], gradient);
                for (int k = 0; k < gradient.length; k++) {
                    derivatives[k * rates.length + i] = gradient[k];
                }
            }
        }
    }

    @Override
    public String toString() {
        return name + ": " + formula;
    }

    private record LawModel(LawFamily family) implements Model {
        private static final double[] NONE = {};

        @Override
        public String name() {
            return family.name;
        }

        @Override
        public List<Parameter> parameters() {
            return family.parameters;
        }

        @Override
        public double at(double x, double[] values) {
            return usable(values) ? family.of(Doubles.of(values)).at(x) : Double.NaN;
        }

        @Override
        public void gradient(double x, double[] values, double[] into) {
            if (usable(values)) {
                family.of(Doubles.of(values)).gradient(x, into);
            } else {
                Arrays.fill(into, Double.NaN);
            }
        }

        @Override
        public void values(double[] x, double[] values, double[] into) {
            curve(x, values, into, NONE);
        }

        @Override
        public void curve(double[] x, double[] values, double[] into, double[] derivatives) {
            if (usable(values)) {
                family.curve.fill(x, values, into, derivatives);
            } else {
                Arrays.fill(into, Double.NaN);
                Arrays.fill(derivatives, Double.NaN);
            }
        }

        /** A logarithmic step may run over the range of doubles, to zero or infinity: the law has no value there. */
        private boolean usable(double[] values) {
            for (int i = 0; i < values.length; i++) {
                boolean vanished = values[i] == 0 && family.parameters.get(i).scale() == Parameter.Scale.LOG;
                if (vanished || !Double.isFinite(values[i])) {
                    return false;
                }
            }
            return true;
        }
    }

    /** Collects the description of a family. */
    public static final class Builder {
        private final String name;
        private String formula = "";
        private String source = "";
        private final List<Parameter> parameters = new ArrayList<>();
        private Function<Doubles, ViscosityLaw> maker = values -> {
            throw new RangeException("this family cannot make a law");
        };
        private Function<CurveShape, Doubles> guess = shape -> Doubles.of();
        private Optional<Curve> curve = Optional.empty();

        private Builder(String name) {
            this.name = name;
        }

        /** Sets the equation as text. */
        public Builder formula(String text) {
            this.formula = text;
            return this;
        }

        /** Sets where it was published: author, journal, year; says so if from memory. */
        public Builder source(String text) {
            this.source = text;
            return this;
        }

        /** Adds the next parameter. */
        public Builder parameter(Parameter parameter) {
            parameters.add(parameter);
            return this;
        }

        /** Sets how a law is made from its constants, which come in the order of the parameters. */
        public Builder made(Function<Doubles, ViscosityLaw> by) {
            this.maker = by;
            return this;
        }

        /** Sets how many rates are worked out together; one by one if it is not set. */
        Builder curve(Curve together) {
            this.curve = Optional.of(together);
            return this;
        }

        /** Sets where a fit starts, from the shape of a flow curve. */
        public Builder startingFrom(Function<CurveShape, Doubles> start) {
            this.guess = start;
            return this;
        }

        /** The finished family. */
        public LawFamily build() {
            return new LawFamily(this);
        }
    }
}
