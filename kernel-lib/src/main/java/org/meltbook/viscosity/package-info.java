/**
 * Scalar laws of shear viscosity, listed in {@link org.meltbook.viscosity.ViscosityLaws}, and their fit to flow curves.
 * A new law is a record that implements {@link org.meltbook.viscosity.ViscosityLaw}, a line in the catalogue, and
 * reference values for the contract test.
 *
 * <p>May use: {@code measure}, {@code fit}, {@code numeric}. Example:
 * {@code ViscosityFit.of(flowCurve, Cross.FAMILY).zeroShearViscosity()}.
 */
package org.meltbook.viscosity;
