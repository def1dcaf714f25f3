/**
 * Scalar laws of shear viscosity and their fit to flow curves.
 *
 * <p>May use: {@code measure}, {@code fit}, {@code numeric}.
 */
package org.meltbook.viscosity;
