/**
 * {@link org.meltbook.base.Rows} and measurements as Tablesaw tables, and back: the one room that knows Tablesaw.
 *
 * <p>May use: {@code base}, {@code measure}. Example: {@code Tables.of(sweep).where(…)} and
 * {@code Tables.frequencySweep(table, conditions)}.
 */
package org.meltbook.table;
