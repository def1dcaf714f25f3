package org.meltbook.fit;

import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;

/** A model made of two functions, with unbounded parameters b1, b2, … or the given ones. */
record TestModel(List<Parameter> parameters, Value value, Slope slope, Set<String> linearIn) implements Model {
    interface Value {
        double at(double x, double[] b);
    }

    interface Slope {
        void at(double x, double[] b, double[] into);
    }

    TestModel(List<Parameter> parameters, Value value, Slope slope) {
        this(parameters, value, slope, Set.of());
    }

    TestModel(int count, Value value, Slope slope) {
        this(
                IntStream.rangeClosed(1, count)
                        .mapToObj(i -> Parameter.unbounded("b" + i, "1"))
                        .toList(),
                value,
                slope);
    }

    @Override
    public String name() {
        return "test model";
    }

    @Override
    public double at(double x, double[] b) {
        return value.at(x, b);
    }

    @Override
    public void gradient(double x, double[] b, double[] into) {
        slope.at(x, b, into);
    }
}
