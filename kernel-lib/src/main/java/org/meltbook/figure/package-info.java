/**
 * A figure as data: axes with quantity and unit, measured points, model lines, bands. Nothing here draws.
 * {@link org.meltbook.figure.Exhibit} is what every measurement and result is to those who show it.
 *
 * <p>May use: {@code base}, {@code units}. Example:
 * {@code Figure.titled("Flow curve").x(Quantity.SHEAR_RATE).y(Quantity.VISCOSITY).marks("measured", rate, eta).build()}.
 */
package org.meltbook.figure;
