package org.meltbook.chart;

import java.util.BitSet;

/**
 * The pixels of a picture on which a marker was set. A second marker of the same layer on the same pixel changes
 * nothing that can be seen, so a measurement of millions of points draws as fast as its picture has room.
 */
final class Pixels {
    private static final int ACROSS = FigureChart.WIDTH * Png.SCALE;
    private static final int UP = FigureChart.HEIGHT * Png.SCALE;

    private final BitSet set = new BitSet();

    /** Whether no marker was set there before; both places from 0 to 1 of the axes. */
    boolean firstAt(double across, double up) {
        int pixel = (int) (across * ACROSS) * UP + (int) (up * UP);
        boolean first = !set.get(pixel);
        set.set(pixel);
        return first;
    }
}
