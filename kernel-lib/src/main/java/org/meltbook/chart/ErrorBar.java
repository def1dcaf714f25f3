package org.meltbook.chart;

import java.awt.Color;

/**
 * The error bar of one point, both ends within the axis.
 *
 * @param x       place along x
 * @param low     lower end
 * @param high    upper end
 * @param lowCap  whether the bar ends at {@code low}; it has no cap where the axis ends first
 * @param highCap whether the bar ends at {@code high}
 * @param colour  colour of its layer
 */
record ErrorBar(double x, double low, double high, boolean lowCap, boolean highCap, Color colour) {}
