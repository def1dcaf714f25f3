/**
 * Typed, immutable measurements: {@link org.meltbook.measure.Series} of numbers in SI under
 * {@link org.meltbook.measure.Conditions}, a {@link org.meltbook.measure.Verdict} a row, and a trail of
 * {@link org.meltbook.measure.Note}s of what was done. Rows are never dropped. {@link org.meltbook.measure.Readings}
 * makes them of columns that {@link org.meltbook.measure.Heading} and {@link org.meltbook.measure.Vocabulary} recognise,
 * from wherever the columns come.
 *
 * <p>May use: {@code base}, {@code units}, {@code figure}. Example: {@code sweep.storage().x().toArray()} gives the
 * frequencies of the storage modulus in rad/s.
 */
package org.meltbook.measure;
