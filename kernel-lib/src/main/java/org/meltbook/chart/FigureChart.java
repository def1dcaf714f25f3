package org.meltbook.chart;

import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.RenderingHints;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.List;
import java.util.Locale;
import org.knowm.xchart.XYChart;
import org.knowm.xchart.style.Styler.LegendPosition;
import org.knowm.xchart.style.XYStyler;
import org.meltbook.chart.Lettering.Align;

/**
 * A chart of the chart library in our theme. The library keeps the series and their styles, knows where each number
 * lies, and draws markers, lines and bands. What it cannot do is drawn here: exact ticks with decade labels, minor
 * ticks, a grid at labelled ticks only, error bars with two lengths, dashes along a curve, signs at the edge, and a
 * legend of several columns below the picture.
 */
final class FigureChart extends XYChart {
    static final int WIDTH = 720;
    static final int HEIGHT = 480;

    private static final double TITLE_SIZE = 15;
    private static final double SMALLEST_TITLE = 11;
    private static final double AXIS_TITLE_SIZE = 13.5;
    private static final double LABEL_SIZE = 12;
    private static final int PADDING = 14;

    private final List<EdgeMark> edgeMarks;
    private final List<String> remarks;
    private final AxisPainter axes = new AxisPainter(this);
    private final FigureLegend underPlot = new FigureLegend(this);

    FigureChart(Placement placement) {
        super(WIDTH, HEIGHT);
        this.edgeMarks = List.copyOf(placement.edgeMarks());
        this.remarks = placement.tracks().isEmpty() ? placement.remarks() : List.of();
        this.plot = new FigurePlot(this, axes, placement.bars());
        this.legend = underPlot;
        style(placement);
    }

    @Override
    public void paint(Graphics2D g, int width, int height) {
        setWidth(width);
        setHeight(height);
        g.setRenderingHint(RenderingHints.KEY_STROKE_CONTROL, RenderingHints.VALUE_STROKE_PURE);
        axes.makeRoom(underPlot.getBounds().getHeight());
        super.paint(g, width, height);
    }

    /** Draws what stands on top of the series: axes, signs at the edge, and the remark in an empty frame. */
    void paintFront(Graphics2D g, Rectangle2D bounds) {
        axes.paintFrame(g, bounds);
        for (EdgeMark mark : edgeMarks) {
            double x = mark.left() ? bounds.getMinX() : getScreenXFromChart(mark.x());
            double y = mark.below() ? bounds.getMaxY() : getScreenYFromChart(mark.y());
            mark.paint(g, x, y);
        }
        g.setColor(Palette.INK);
        double line = bounds.getCenterY();
        for (String remark : remarks) {
            Point2D place = new Point2D.Double(bounds.getCenterX(), line);
            Lettering.draw(g, remark, ChartFont.of(LABEL_SIZE), Align.MIDDLE, place);
            line += 1.6 * LABEL_SIZE;
        }
    }

    /** The frame in pixels, once painted. */
    Rectangle2D plotBounds() {
        return plot.getBounds();
    }

    private void style(Placement placement) {
        XYStyler styler = getStyler();
        styler.setLocale(Locale.ROOT);
        fonts(styler);
        styler.setChartBackgroundColor(Palette.PAPER);
        styler.setPlotBackgroundColor(Palette.PAPER);
        styler.setChartFontColor(Palette.INK);
        styler.setChartTitleFontColor(Palette.INK);
        styler.setChartTitleBoxVisible(false);
        styler.setChartTitlePadding(8);
        styler.setChartPadding(PADDING);
        styler.setPlotBorderVisible(false);
        styler.setPlotGridLinesVisible(false);
        styler.setPlotTicksMarksVisible(false);
        styler.setPlotContentSize(1);
        styler.setMarkerSize(8);
        styler.setLegendPosition(LegendPosition.OutsideS);
        axes(styler, placement);
    }

    private static void axes(XYStyler styler, Placement placement) {
        styler.setXAxisLogarithmic(placement.x().logarithmic());
        styler.setXAxisMin(placement.x().min());
        styler.setXAxisMax(placement.x().max());
        styler.setYAxisLogarithmic(placement.y().logarithmic());
        styler.setYAxisMin(placement.y().min());
        styler.setYAxisMax(placement.y().max());
        // AxisPainter draws ticks, labels and titles. The library still computes its own ticks; with one text for all
        // numbers it stops at once instead of searching steps, which it does not find below 1e-10.
        styler.setAxisTicksVisible(false);
        styler.setAxisTitlesVisible(false);
        styler.setXAxisTickLabelsFormattingFunction(value -> "");
        styler.setYAxisTickLabelsFormattingFunction(value -> "");
    }

    private static void fonts(XYStyler styler) {
        Font label = ChartFont.of(LABEL_SIZE);
        styler.setBaseFont(label);
        styler.setChartTitleFont(ChartFont.of(TITLE_SIZE));
        styler.setAxisTitleFont(ChartFont.of(AXIS_TITLE_SIZE));
        styler.setAxisTickLabelsFont(label);
        styler.setLegendFont(label);
        styler.setAnnotationTextFont(label);
        styler.setAnnotationTextPanelFont(label);
        styler.setToolTipFont(label);
        styler.setCursorFont(label);
    }

    /** Sets the title, smaller if it is long, and with an ellipsis if it still does not fit. */
    void fitTitle(String title) {
        double most = WIDTH - 5 * PADDING;
        double size = TITLE_SIZE;
        while (size > SMALLEST_TITLE && Lettering.width(title, ChartFont.of(size)) > most) {
            size -= 0.5;
        }
        getStyler().setChartTitleFont(ChartFont.of(size));
        setTitle(Lettering.within(title, ChartFont.of(size), most));
    }
}
