package org.meltbook.fit;

import java.util.List;
import java.util.Objects;
import java.util.function.ToDoubleFunction;

/**
 * A parameter that follows from others: it is not fitted itself.
 *
 * @param name    the parameter that follows
 * @param sources the parameters it follows from, none of them tied itself
 * @param rule    its value from those of the sources, in their order; smooth; must not change the array
 * @param words   the rule as a reader sees it: {@code a = 1 − n}
 */
public record Tie(String name, List<String> sources, ToDoubleFunction<double[]> rule, String words) {
    /** Copies the sources. */
    public Tie {
        Objects.requireNonNull(name, "name");
        Objects.requireNonNull(rule, "rule");
        sources = List.copyOf(sources);
    }

    double value(double[] values) {
        return rule.applyAsDouble(values);
    }
}
