package org.meltbook.chart;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Graphics2D;
import java.awt.geom.Path2D;

/**
 * The sign for a point that lies below the start of a logarithmic axis: an open triangle that points at the edge.
 *
 * @param x      place along x, which is the start of the axis if the point lies left of it
 * @param y      place along y, which is the start of the axis if the point lies below it
 * @param left   whether the point lies left of the axis
 * @param below  whether the point lies below the axis
 * @param colour colour of its layer
 */
record EdgeMark(double x, double y, boolean left, boolean below, Color colour) {
    private static final double LENGTH = 8;
    private static final double HALF_WIDTH = 4.5;
    private static final BasicStroke OUTLINE = new BasicStroke(1.4f, BasicStroke.CAP_ROUND, BasicStroke.JOIN_MITER);

    /**
     * Draws the triangle with its tip at the edge.
     *
     * @param tipX pixel of {@code x}
     * @param tipY pixel of {@code y}
     */
    void paint(Graphics2D g, double tipX, double tipY) {
        double angle = left && below ? -Math.PI / 4 : left ? 0 : -Math.PI / 2;
        double cos = Math.cos(angle);
        double sin = Math.sin(angle);
        Path2D path = new Path2D.Double();
        path.moveTo(tipX, tipY);
        path.lineTo(tipX + LENGTH * cos - HALF_WIDTH * sin, tipY + LENGTH * sin + HALF_WIDTH * cos);
        path.lineTo(tipX + LENGTH * cos + HALF_WIDTH * sin, tipY + LENGTH * sin - HALF_WIDTH * cos);
        path.closePath();
        g.setColor(Palette.PAPER);
        g.fill(path);
        g.setColor(colour);
        g.setStroke(OUTLINE);
        g.draw(path);
    }
}
