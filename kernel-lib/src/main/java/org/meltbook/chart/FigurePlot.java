package org.meltbook.chart;

import java.awt.BasicStroke;
import java.awt.Color;
import java.awt.Graphics2D;
import java.awt.Shape;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.util.ArrayList;
import java.util.List;
import org.knowm.xchart.XYSeries;
import org.knowm.xchart.XYSeries.XYSeriesRenderStyle;
import org.knowm.xchart.internal.chartpart.Plot_XY;
import org.knowm.xchart.style.XYStyler;

/** The inside of the frame, from back to front: grid, error bars, series, and what stands on top. */
final class FigurePlot extends Plot_XY<XYStyler, XYSeries> {
    private static final BasicStroke BAR = new BasicStroke(1.2f, BasicStroke.CAP_BUTT, BasicStroke.JOIN_MITER);
    private static final double HALF_CAP = 3.5;

    private final FigureChart chart;
    private final AxisPainter axes;
    private final List<ErrorBar> bars;

    FigurePlot(FigureChart chart, AxisPainter axes, List<ErrorBar> bars) {
        super(chart);
        this.chart = chart;
        this.axes = axes;
        this.bars = List.copyOf(bars);
    }

    @Override
    public void paint(Graphics2D g) {
        List<XYSeries> enabled =
                chart.getSeriesCollection().stream().filter(XYSeries::isEnabled).toList();
        Color background = chart.getStyler().getPlotBackgroundColor();
        try {
            paintOnly(List.of(), enabled, g);
            chart.getStyler().setPlotBackgroundColor(Palette.CLEAR);
            axes.paintGrid(g, getBounds());
            Shape clip = g.getClip();
            g.clip(getBounds());
            bars.forEach(bar -> paintBar(g, bar));
            g.setClip(clip);
            paintInOrder(g, enabled);
        } finally {
            chart.getStyler().setPlotBackgroundColor(background);
            enabled.forEach(series -> series.setEnabled(true));
        }
        chart.paintFront(g, getBounds());
    }

    /** The library draws a line point by point, so that dashes begin anew at each point; they are drawn here. */
    private void paintInOrder(Graphics2D g, List<XYSeries> enabled) {
        List<XYSeries> run = new ArrayList<>();
        for (XYSeries series : enabled) {
            if (isDashed(series)) {
                paintOnly(run, enabled, g);
                run.clear();
                paintDashed(g, series);
            } else {
                run.add(series);
            }
        }
        paintOnly(run, enabled, g);
    }

    /** Lets the library paint with only the given series. */
    private void paintOnly(List<XYSeries> shown, List<XYSeries> all, Graphics2D g) {
        all.forEach(series -> series.setEnabled(shown.contains(series)));
        super.paint(g);
    }

    private static boolean isDashed(XYSeries series) {
        return series.getXYSeriesRenderStyle().orElseThrow() == XYSeriesRenderStyle.Line
                && series.getLineStyle() != null
                && series.getLineStyle().getDashArray() != null;
    }

    private void paintDashed(Graphics2D g, XYSeries series) {
        Path2D path = new Path2D.Double();
        boolean drawing = false;
        for (int i = 0; i < series.getXData().length; i++) {
            double y = series.getYData()[i];
            if (Double.isNaN(y)) {
                drawing = false;
                continue;
            }
            double screenX = chart.getScreenXFromChart(series.getXData()[i]);
            double screenY = chart.getScreenYFromChart(y);
            if (drawing) {
                path.lineTo(screenX, screenY);
            } else {
                path.moveTo(screenX, screenY);
            }
            drawing = true;
        }
        Shape clip = g.getClip();
        g.clip(getBounds());
        g.setColor(series.getLineColor());
        g.setStroke(series.getLineStyle());
        g.draw(path);
        g.setClip(clip);
    }

    private void paintBar(Graphics2D g, ErrorBar bar) {
        double x = chart.getScreenXFromChart(bar.x());
        double low = chart.getScreenYFromChart(bar.low());
        double high = chart.getScreenYFromChart(bar.high());
        g.setColor(bar.colour());
        g.setStroke(BAR);
        g.draw(new Line2D.Double(x, low, x, high));
        if (bar.lowCap()) {
            g.draw(new Line2D.Double(x - HALF_CAP, low, x + HALF_CAP, low));
        }
        if (bar.highCap()) {
            g.draw(new Line2D.Double(x - HALF_CAP, high, x + HALF_CAP, high));
        }
    }
}
