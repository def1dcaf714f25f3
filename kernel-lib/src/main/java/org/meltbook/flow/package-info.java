/**
 * Homogeneous deformation histories and the stress components that their symmetry allows; x is the flow direction, y
 * the gradient direction, z the neutral one.
 *
 * <p>May use: {@code numeric}, {@code units}. Example: {@code new StartUpShear(0.1).gradient(5).at(0, 1)} is 0.1 1/s.
 */
package org.meltbook.flow;
