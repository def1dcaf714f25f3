/**
 * Linear viscoelasticity: discrete relaxation spectra, how they are found from frequency sweeps, and what a sweep
 * allows to say from them.
 *
 * <p>May use: {@code measure}, {@code fit}, {@code numeric}. Example: {@code
 * SpectrumFit.of(sweep).zeroShearViscosity()}.
 */
package org.meltbook.spectrum;
