package org.meltbook.chart;

import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.geom.Line2D;
import java.awt.geom.Rectangle2D;
import java.util.List;
import org.knowm.xchart.XYSeries;
import org.knowm.xchart.XYSeries.XYSeriesRenderStyle;
import org.knowm.xchart.internal.chartpart.Legend_Marker;
import org.knowm.xchart.style.XYStyler;

/** A legend in columns below the axis title, where it covers nothing. */
final class FigureLegend extends Legend_Marker<XYStyler, XYSeries> {
    private static final double GLYPH = 26;
    private static final double GLYPH_GAP = 6;
    private static final double COLUMN_GAP = 22;
    private static final double LINE_HEIGHT = 1.5;
    private static final double TOP_GAP = 12;
    private static final int BAND_HEIGHT = 10;

    private final FigureChart chart;

    FigureLegend(FigureChart chart) {
        super(chart);
        this.chart = chart;
    }

    /** Its width and height; the place is found when it is painted. */
    @Override
    public Rectangle2D getBounds() {
        List<XYSeries> shown = shown();
        if (shown.isEmpty()) {
            return new Rectangle2D.Double();
        }
        double cell = cellWidth(shown);
        int columns = columns(shown.size(), cell);
        int rows = (shown.size() + columns - 1) / columns;
        return new Rectangle2D.Double(0, 0, columns * cell + (columns - 1) * COLUMN_GAP, TOP_GAP + rows * lineHeight());
    }

    @Override
    public void paint(Graphics2D g) {
        List<XYSeries> shown = shown();
        Rectangle2D size = getBounds();
        double cell = cellWidth(shown);
        int columns = columns(Math.max(1, shown.size()), cell);
        Rectangle2D plot = chart.plotBounds();
        double left = Math.max(
                chart.getStyler().getChartPadding(),
                Math.min(
                        plot.getCenterX() - size.getWidth() / 2,
                        chart.getWidth() - chart.getStyler().getChartPadding() - size.getWidth()));
        double top = chart.getHeight() - chart.getStyler().getChartPadding() - size.getHeight() + TOP_GAP;
        for (int i = 0; i < shown.size(); i++) {
            double x = left + i % columns * (cell + COLUMN_GAP);
            double y = top + (i / columns + 0.5) * lineHeight();
            paintGlyph(g, shown.get(i), x, y);
            g.setColor(Palette.INK);
            String label = Lettering.within(shown.get(i).getLabel(), font(), widest());
            Lettering.draw(g, label, font(), 0, x + GLYPH + GLYPH_GAP, y + 0.36 * font().getSize2D());
        }
    }

    private List<XYSeries> shown() {
        return !chart.getStyler().isLegendVisible()
                ? List.of()
                : chart.getSeriesCollection().stream()
                        .filter(series -> series.isEnabled() && series.isShowInLegend())
                        .toList();
    }

    private double cellWidth(List<XYSeries> shown) {
        double text = shown.stream()
                .mapToDouble(series -> Lettering.width(series.getLabel(), font()))
                .max()
                .orElse(0);
        return GLYPH + GLYPH_GAP + Math.min(text, widest());
    }

    /** As few rows as the width allows, filled evenly. */
    private int columns(int count, double cell) {
        double room = chart.getWidth() - 2.0 * chart.getStyler().getChartPadding();
        int most = (int) Math.max(1, Math.floor((room + COLUMN_GAP) / (cell + COLUMN_GAP)));
        int rows = (count + most - 1) / most;
        return (count + rows - 1) / rows;
    }

    private double widest() {
        return 0.4 * chart.getWidth();
    }

    private double lineHeight() {
        return LINE_HEIGHT * font().getSize2D();
    }

    private Font font() {
        return chart.getStyler().getLegendFont();
    }

    private void paintGlyph(Graphics2D g, XYSeries series, double x, double y) {
        XYSeriesRenderStyle style = series.getXYSeriesRenderStyle().orElseThrow();
        if (style == XYSeriesRenderStyle.PolygonArea) {
            g.setColor(series.getFillColor());
            g.fill(new Rectangle2D.Double(x, y - BAND_HEIGHT / 2.0, GLYPH, BAND_HEIGHT));
            return;
        }
        if (style != XYSeriesRenderStyle.Scatter) {
            g.setColor(series.getLineColor());
            g.setStroke(series.getLineStyle());
            g.draw(new Line2D.Double(x, y, x + GLYPH, y));
        }
        if (series.getMarker() != null) {
            g.setColor(series.getMarkerColor());
            series.getMarker().paint(g, x + GLYPH / 2, y, chart.getStyler().getMarkerSize());
        }
    }
}
