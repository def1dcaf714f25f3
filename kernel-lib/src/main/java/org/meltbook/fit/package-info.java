/**
 * Estimation and its uncertainty; knows no rheology.
 *
 * <p>May use: {@code numeric}, {@code units}, {@code figure}.
 */
package org.meltbook.fit;
