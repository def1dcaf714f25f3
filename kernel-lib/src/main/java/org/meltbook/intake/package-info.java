/**
 * Any export becomes measurements with an intake log: the one room that knows file dialects. What is not said in code
 * is found out and shown; what cannot be read is one {@link org.meltbook.intake.IntakeException} with file, line and
 * column.
 *
 * <p>May use: {@code measure}. Example: {@code Exports.read("data/sweep.csv").frequencySweep()}.
 */
package org.meltbook.intake;
