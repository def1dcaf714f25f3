package org.meltbook.fit;

import java.util.List;
import java.util.Set;

/**
 * A function of one variable with parameters, as a fit sees it.
 *
 * <p>Contract: (1) {@code parameters} always gives the same list, names unique; (2) the other methods take the
 * parameters in that order, held ones included; (3) they depend on their arguments alone, keep none of them and change
 * nothing but what is there to be filled, so that one model serves many threads; (4) where the function has no value
 * they give NaN: the fit then steps back; (5) {@code values} and {@code curve} agree with {@code at} and
 * {@code gradient}, and are there to be overridden where many places together cost less than one by one.
 */
public interface Model {
    /** What the model is called. */
    String name();

    /** Its parameters, in the order of the arrays below. */
    List<Parameter> parameters();

    /** The value at {@code x}. */
    double at(double x, double[] parameters);

    /**
     * The derivatives with respect to each parameter at {@code x}.
     *
     * @param into filled with one derivative a parameter
     */
    void gradient(double x, double[] parameters, double[] into);

    /**
     * The values at many places.
     *
     * @param into filled with one value a place
     */
    default void values(double[] x, double[] parameters, double[] into) {
        for (int i = 0; i < x.length; i++) {
            into[i] = at(x[i], parameters);
        }
    }

    /**
     * Values and derivatives at many places.
     *
     * @param values      filled with one value a place
     * @param derivatives filled with the derivative to parameter k at place i, at {@code k * x.length + i}
     */
    default void curve(double[] x, double[] parameters, double[] values, double[] derivatives) {
        values(x, parameters, values);
        double[] gradient = new double[parameters.length];
        for (int i = 0; i < x.length; i++) {
            gradient(x[i], parameters, gradient);
            for (int k = 0; k < gradient.length; k++) {
                derivatives[k * x.length + i] = gradient[k];
            }
        }
    }

    /** Names of the parameters in which the model is linear, with the others kept: a solver may use it. */
    default Set<String> linearIn() {
        return Set.of();
    }

    /** A model whose derivatives are worked out from differences of its values. */
    static Model of(String name, List<Parameter> parameters, Formula formula) {
        return new DifferencedModel(name, parameters, formula);
    }

    /** The value of a model at {@code x} for given parameters. */
    @FunctionalInterface
    interface Formula {
        /** The value, NaN where there is none. */
        double at(double x, double[] parameters);
    }
}
