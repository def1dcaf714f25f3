package org.meltbook.fit;

import org.meltbook.base.Doubles;

/**
 * One place of a profile: the parameter held, all others fitted again.
 *
 * @param value  the parameter's value, in its unit
 * @param rise   rise of the cost above the fit over the residual variance, the square of {@code t} for a linear model
 * @param values all parameters there, in the order of {@link Problem#parameters()}
 */
public record ProfilePoint(double value, double rise, Doubles values) {}
