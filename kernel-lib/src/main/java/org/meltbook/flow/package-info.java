/**
 * Homogeneous deformation histories and the stress components that their symmetry allows.
 *
 * <p>May use: {@code numeric}, {@code units}.
 */
package org.meltbook.flow;
