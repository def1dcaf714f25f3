package org.meltbook.fit;

import java.util.List;

/**
 * A function of one variable with parameters, as a fit sees it.
 *
 * <p>Contract: (1) {@code parameters} always gives the same list, names unique; (2) {@code at} and {@code gradient}
 * take the parameters in that order, held ones included; (3) both depend on their arguments alone, keep none of them
 * and change nothing but {@code into}; (4) where the function has no value they give NaN: the fit then steps back.
 */
public interface Model {
    /** What the model is called. */
    String name();

    /** Its parameters, in the order of the arrays below. */
    List<Parameter> parameters();

    /** The value at {@code x}. */
    double at(double x, double[] parameters);

    /**
     * The exact derivatives with respect to each parameter at {@code x}.
     *
     * @param into filled with one derivative a parameter
     */
    void gradient(double x, double[] parameters, double[] into);
}
