/**
 * Draws a {@link org.meltbook.figure.Figure}: the one room that knows XChart. {@link org.meltbook.chart.Drawing} gives
 * a figure as picture, as chart and in words; {@link org.meltbook.chart.Png} makes a picture of any chart.
 *
 * <p>May use: {@code figure}. Example: {@code Drawing.of(figure).png()}.
 */
package org.meltbook.chart;
