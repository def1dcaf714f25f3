/**
 * {@link org.meltbook.base.Rows} and measurements as Tablesaw tables, and back: the one room that knows Tablesaw.
 *
 * <p>May use: {@code base}, {@code measure}.
 */
package org.meltbook.table;
