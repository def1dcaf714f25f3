package org.meltbook.fit;

import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;
import org.apache.commons.math3.analysis.differentiation.DerivativeStructure;
import org.meltbook.base.Doubles;

/**
 * The models of the 27 nonlinear regression sets, as their files state them. Each is written once; exact derivatives
 * come from the automatic differentiation of Commons Math, a general-purpose library.
 */
enum CertifiedModel {
    Misra1a((x, b) -> b[1].multiply(-x).expm1().multiply(b[0]).negate()),
    Misra1b((x, b) -> one(b).subtract(b[1].multiply(x / 2).add(1).pow(-2)).multiply(b[0])),
    Misra1c((x, b) -> one(b).subtract(b[1].multiply(2 * x).add(1).pow(-0.5)).multiply(b[0])),
    Misra1d((x, b) -> b[0].multiply(b[1]).multiply(x).divide(b[1].multiply(x).add(1))),
    Chwirut1((x, b) -> decay(b[0], x).divide(b[2].multiply(x).add(b[1]))),
    Chwirut2(Chwirut1.formula),
    Lanczos1((x, b) ->
            b[0].multiply(decay(b[1], x)).add(b[2].multiply(decay(b[3], x))).add(b[4].multiply(decay(b[5], x)))),
    Lanczos2(Lanczos1.formula),
    Lanczos3(Lanczos1.formula),
    Gauss1((x, b) -> b[0].multiply(decay(b[1], x)).add(peak(x, b, 2)).add(peak(x, b, 5))),
    Gauss2(Gauss1.formula),
    Gauss3(Gauss1.formula),
    DanWood((x, b) -> b[1].multiply(Math.log(x)).exp().multiply(b[0])),
    Kirby2((x, b) -> ratio(x, b, 3)),
    Hahn1((x, b) -> ratio(x, b, 4)),
    Thurber((x, b) -> ratio(x, b, 4)),
    /** Two variables: x is the number of the row, and the response is the logarithm of y. */
    Nelson((x, b) -> b[0]),
    MGH09((x, b) -> b[1].multiply(x)
            .add(x * x)
            .multiply(b[0])
            .divide(b[2].multiply(x).add(x * x).add(b[3]))),
    MGH10((x, b) -> b[1].divide(b[2].add(x)).exp().multiply(b[0])),
    MGH17((x, b) -> b[0].add(b[1].multiply(decay(b[3], x))).add(b[2].multiply(decay(b[4], x)))),
    Roszman1((x, b) -> b[0].subtract(b[1].multiply(x))
            .subtract(b[2].divide(b[3].negate().add(x)).atan().divide(Math.PI))),
    ENSO((x, b) -> b[0].add(b[1].multiply(Math.cos(Math.PI * x / 6)))
            .add(b[2].multiply(Math.sin(Math.PI * x / 6)))
            .add(wave(x, b, 3))
            .add(wave(x, b, 6))),
    BoxBOD(Misra1a.formula),
    Rat42((x, b) -> b[0].divide(b[1].subtract(b[2].multiply(x)).exp().add(1))),
    Rat43((x, b) -> b[0].divide(
            b[1].subtract(b[2].multiply(x)).exp().add(1).log().divide(b[3]).exp())),
    Eckerle4((x, b) ->
            b[2].negate().add(x).divide(b[1]).pow(2).multiply(-0.5).exp().multiply(b[0].divide(b[1]))),
    Bennett5((x, b) -> b[1].add(x).log().divide(b[2]).negate().exp().multiply(b[0]));

    /** How the derivatives are found and which parameters are searched for. */
    enum Way {
        /** Exact derivatives, all parameters searched for alike. */
        EXACT,
        /** Derivatives worked out from the values. */
        DIFFERENCES,
        /** Exact derivatives; the parameters that enter linearly are projected out. */
        PROJECTED
    }

    interface Formula {
        DerivativeStructure at(double x, DerivativeStructure[] b);
    }

    private final Formula formula;

    CertifiedModel(Formula formula) {
        this.formula = formula;
    }

    private static DerivativeStructure one(DerivativeStructure[] b) {
        return b[0].createConstant(1);
    }

    private static DerivativeStructure decay(DerivativeStructure rate, double x) {
        return rate.multiply(-x).exp();
    }

    private static DerivativeStructure peak(double x, DerivativeStructure[] b, int from) {
        return b[from + 1]
                .negate()
                .add(x)
                .divide(b[from + 2])
                .pow(2)
                .negate()
                .exp()
                .multiply(b[from]);
    }

    private static DerivativeStructure wave(double x, DerivativeStructure[] b, int from) {
        DerivativeStructure phase = b[from].reciprocal().multiply(2 * Math.PI * x);
        return phase.cos().multiply(b[from + 1]).add(phase.sin().multiply(b[from + 2]));
    }

    /** (b1 + b2 x + …) / (1 + x (…)) with {@code above} terms above. */
    private static DerivativeStructure ratio(double x, DerivativeStructure[] b, int above) {
        DerivativeStructure top = b[0].createConstant(0);
        for (int i = above - 1; i >= 0; i--) {
            top = top.multiply(x).add(b[i]);
        }
        DerivativeStructure bottom = b[0].createConstant(0);
        for (int i = b.length - 1; i >= above; i--) {
            bottom = bottom.add(b[i]).multiply(x);
        }
        return top.divide(bottom.add(1));
    }

    /** The problem of a set with exact derivatives, or with those that a fit works out from the values. */
    Problem problem(StatisticalReference reference, int start, Way way) {
        Formula used = this == Nelson ? nelson(reference) : formula;
        int count = reference.values().size();
        List<Parameter> parameters = IntStream.rangeClosed(1, count)
                .mapToObj(i -> Parameter.unbounded("b" + i, "1"))
                .toList();
        Model model = way != Way.DIFFERENCES
                ? new TestModel(
                        parameters,
                        (x, b) -> value(used, x, b),
                        (x, b, into) -> gradient(used, x, b, into),
                        way == Way.PROJECTED ? linear() : Set.of())
                : Model.of(name(), parameters, (x, b) -> value(used, x, b));
        Doubles rows = Doubles.of(
                IntStream.range(0, reference.y().size()).asDoubleStream().toArray());
        return Problem.of(model)
                .data(
                        this == Nelson ? rows : reference.x(),
                        this == Nelson ? reference.y().map(Math::log) : reference.y())
                .from(reference.starts().get(start).toArray());
    }

    /** The parameters that enter linearly, as the formula shows. */
    private Set<String> linear() {
        return switch (this) {
            case Misra1a,
                    Misra1b,
                    Misra1c,
                    Misra1d,
                    BoxBOD,
                    MGH10,
                    MGH09,
                    DanWood,
                    Rat42,
                    Rat43,
                    Eckerle4,
                    Bennett5 -> Set.of("b1");
            case Chwirut1, Chwirut2 -> Set.of();
            case Lanczos1, Lanczos2, Lanczos3 -> Set.of("b1", "b3", "b5");
            case Gauss1, Gauss2, Gauss3 -> Set.of("b1", "b3", "b6");
            case Kirby2 -> Set.of("b1", "b2", "b3");
            case Hahn1, Thurber -> Set.of("b1", "b2", "b3", "b4");
            case Nelson, Roszman1 -> Set.of("b1", "b2");
            case MGH17 -> Set.of("b1", "b2", "b3");
            case ENSO -> Set.of("b1", "b2", "b3", "b5", "b6", "b8", "b9");
        };
    }

    /** Places of the parameters with the terms of a sum of exponentials by rising rate: a sum has no order of its own. */
    int[] byRate(Doubles values) {
        int[] order = IntStream.range(0, values.size()).toArray();
        if (this == MGH17 && values.at(3) > values.at(4)) {
            return new int[] {0, 2, 1, 4, 3};
        } else if (name().startsWith("Lanczos")) {
            int[] terms = IntStream.range(0, 3)
                    .boxed()
                    .sorted(Comparator.comparingDouble(k -> values.at(2 * k + 1)))
                    .mapToInt(Integer::intValue)
                    .toArray();
            Arrays.setAll(order, i -> 2 * terms[i / 2] + i % 2);
        }
        return order;
    }

    private static Formula nelson(StatisticalReference reference) {
        return (row, b) -> {
            double first = reference.x().at((int) row);
            double second = reference.secondX().at((int) row);
            return b[0].subtract(b[1].multiply(first).multiply(decay(b[2], second)));
        };
    }

    private static DerivativeStructure[] variables(int order, double[] b) {
        return IntStream.range(0, b.length)
                .mapToObj(i -> new DerivativeStructure(b.length, order, i, b[i]))
                .toArray(DerivativeStructure[]::new);
    }

    private static double value(Formula formula, double x, double[] b) {
        return formula.at(x, variables(0, b)).getValue();
    }

    private static void gradient(Formula formula, double x, double[] b, double[] into) {
        double[] all = formula.at(x, variables(1, b)).getAllDerivatives();
        System.arraycopy(all, 1, into, 0, b.length);
    }
}
