/**
 * The few things that every room of the house needs: exceptions, {@link org.meltbook.base.Progress} with its interrupt,
 * {@link org.meltbook.base.Doubles}, {@link org.meltbook.base.NumberText} and {@link org.meltbook.base.Rows}.
 *
 * <p>May use: nothing of Meltbook. Example: {@code Rows.titled("Modes").numbers("g", "Pa", g).build()}.
 */
package org.meltbook.base;
