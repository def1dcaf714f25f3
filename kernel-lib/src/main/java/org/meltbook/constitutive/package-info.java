/**
 * Stress equations in convected form, their solvers, and their responses by standard names.
 *
 * <p>May use: {@code flow}, {@code spectrum}, {@code viscosity}, {@code numeric}, {@code figure}.
 */
package org.meltbook.constitutive;
