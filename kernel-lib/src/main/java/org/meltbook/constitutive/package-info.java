/**
 * Stress equations in convected form, their solvers, and their responses by standard names. Extra stress, tension
 * positive.
 *
 * <p>May use: {@code flow}, {@code spectrum}, {@code viscosity}, {@code numeric}, {@code figure}. Example:
 * {@code new UpperConvectedMaxwell(spectrum).steadyShear(rates).firstNormalStressDifference()}.
 */
package org.meltbook.constitutive;
