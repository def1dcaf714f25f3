package org.meltbook.chart;

import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.geom.Line2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.knowm.xchart.XYSeries;
import org.knowm.xchart.XYSeries.XYSeriesRenderStyle;
import org.knowm.xchart.internal.chartpart.Legend_Marker;
import org.knowm.xchart.style.XYStyler;
import org.meltbook.chart.Lettering.Align;

/** A legend in columns below the axis title, where it covers nothing. */
final class FigureLegend extends Legend_Marker<XYStyler, XYSeries> {
    private static final double GLYPH = 26;
    private static final double GLYPH_GAP = 6;
    private static final double COLUMN_GAP = 22;
    private static final double LINE_HEIGHT = 1.5;
    private static final double TOP_GAP = 12;
    private static final double BAND_HEIGHT = 10;
    /** No label is wider than this part of the chart, */
    private static final double WIDEST = 0.8;
    /** and than this, which leaves room for two columns, if there are more than {@link #FEW} entries. */
    private static final double WIDEST_OF_MANY = 0.4;

    private static final int FEW = 4;

    private final FigureChart chart;

    FigureLegend(FigureChart chart) {
        super(chart);
        this.chart = chart;
    }

    /**
     * One entry: the series that gives the label, and those after it that are not in the legend by themselves and have
     * its colour, such as the fit of measured points.
     */
    private record Entry(String label, List<XYSeries> series) {}

    /** Its width and height; the place is found when it is painted. */
    @Override
    public Rectangle2D getBounds() {
        List<Entry> entries = entries();
        if (entries.isEmpty()) {
            return new Rectangle2D.Double();
        }
        double[] columns = columns(entries);
        int rows = (entries.size() + columns.length - 1) / columns.length;
        return new Rectangle2D.Double(0, 0, width(columns), TOP_GAP + rows * lineHeight());
    }

    @Override
    public void paint(Graphics2D g) {
        List<Entry> entries = entries();
        if (entries.isEmpty()) {
            return;
        }
        Rectangle2D size = getBounds();
        double[] columns = columns(entries);
        int padding = chart.getStyler().getChartPadding();
        double rightmost = chart.getWidth() - padding - size.getWidth();
        double left = Math.max(padding, Math.min(rightmost, chart.plotBounds().getCenterX() - size.getWidth() / 2));
        double top = chart.getHeight() - padding - size.getHeight() + TOP_GAP;
        double x = left;
        for (int i = 0; i < entries.size(); i++) {
            int column = i % columns.length;
            x = column == 0 ? left : x + columns[column - 1] + COLUMN_GAP;
            paint(g, entries.get(i), x, top + (i / columns.length + 0.5) * lineHeight());
        }
    }

    private void paint(Graphics2D g, Entry entry, double x, double y) {
        entry.series().forEach(series -> paintPath(g, series, x, y));
        entry.series().forEach(series -> paintMarker(g, series, x, y));
        g.setColor(Palette.INK);
        Point2D place = new Point2D.Double(x + GLYPH + GLYPH_GAP, y + 0.36 * font().getSize2D());
        Lettering.draw(g, entry.label(), font(), Align.LEFT, place);
    }

    private List<Entry> entries() {
        List<Entry> entries = new ArrayList<>();
        if (!chart.getStyler().isLegendVisible()) {
            return entries;
        }
        long count = chart.getSeriesCollection().stream()
                .filter(XYSeries::isShowInLegend)
                .count();
        double widest = (count > FEW ? WIDEST_OF_MANY : WIDEST) * chart.getWidth();
        for (XYSeries series : chart.getSeriesCollection()) {
            Entry last = entries.isEmpty() ? null : entries.get(entries.size() - 1);
            if (!series.isEnabled()) {
                continue;
            }
            if (series.isShowInLegend()) {
                String label = Lettering.within(series.getLabel(), font(), widest);
                entries.add(new Entry(label, new ArrayList<>(List.of(series))));
            } else if (last != null && last.series().get(0).getLineColor().equals(series.getLineColor())) {
                last.series().add(series);
            }
        }
        return entries;
    }

    /** The widths of as many columns as there is room for, such that the rows are filled evenly. */
    private double[] columns(List<Entry> entries) {
        double room = chart.getWidth() - 2.0 * chart.getStyler().getChartPadding();
        for (int rows = 1; rows < entries.size(); rows++) {
            double[] widths = widths(entries, (entries.size() + rows - 1) / rows);
            if (width(widths) <= room) {
                return widths;
            }
        }
        return widths(entries, 1);
    }

    private double[] widths(List<Entry> entries, int columns) {
        double[] widths = new double[columns];
        IntStream.range(0, entries.size())
                .forEach(i -> widths[i % columns] = Math.max(
                        widths[i % columns],
                        GLYPH + GLYPH_GAP + Lettering.width(entries.get(i).label(), font())));
        return widths;
    }

    private static double width(double[] columns) {
        return DoubleStream.of(columns).sum() + (columns.length - 1) * COLUMN_GAP;
    }

    private double lineHeight() {
        return LINE_HEIGHT * font().getSize2D();
    }

    private Font font() {
        return chart.getStyler().getLegendFont();
    }

    private void paintPath(Graphics2D g, XYSeries series, double x, double y) {
        XYSeriesRenderStyle style = series.getXYSeriesRenderStyle().orElseThrow();
        if (style == XYSeriesRenderStyle.PolygonArea) {
            g.setColor(series.getFillColor());
            g.fill(new Rectangle2D.Double(x, y - BAND_HEIGHT / 2, GLYPH, BAND_HEIGHT));
        } else if (style != XYSeriesRenderStyle.Scatter) {
            g.setColor(series.getLineColor());
            g.setStroke(series.getLineStyle());
            g.draw(new Line2D.Double(x, y, x + GLYPH, y));
        }
    }

    private void paintMarker(Graphics2D g, XYSeries series, double x, double y) {
        if (series.getMarker() != null) {
            g.setColor(series.getMarkerColor());
            series.getMarker().paint(g, x + GLYPH / 2, y, chart.getStyler().getMarkerSize());
        }
    }
}
