/**
 * Draws a {@link org.meltbook.figure.Figure}: the one room that knows XChart.
 *
 * <p>May use: {@code figure}.
 */
package org.meltbook.chart;
