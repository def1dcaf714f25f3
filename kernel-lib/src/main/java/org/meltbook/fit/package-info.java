/**
 * Estimation and its uncertainty: a {@link org.meltbook.fit.Model}, data and an error model make a
 * {@link org.meltbook.fit.Problem}, which gives a {@link org.meltbook.fit.Fit}. Whatever fits again and again takes a
 * {@link org.meltbook.fit.Solver} a thread. Knows no rheology.
 *
 * <p>May use: {@code numeric}, {@code units}, {@code figure}. Example:
 * {@code Problem.of(model).data(x, y).relative().from(1e4, 0.1).solve().estimate("eta0")}.
 */
package org.meltbook.fit;
