/**
 * Linear viscoelasticity: discrete relaxation spectra and what follows from them.
 *
 * <p>May use: {@code measure}, {@code fit}, {@code numeric}.
 */
package org.meltbook.spectrum;
