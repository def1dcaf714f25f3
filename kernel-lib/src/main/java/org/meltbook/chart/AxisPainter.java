package org.meltbook.chart;

import java.awt.BasicStroke;
import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.geom.Line2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.util.List;
import org.knowm.xchart.internal.chartpart.TexRenderer;
import org.knowm.xchart.style.XYStyler;
import org.meltbook.chart.Lettering.Align;

/** Draws grid, frame, ticks, labels and titles of both axes of a chart, and keeps the room that they need. */
final class AxisPainter {
    private static final BasicStroke HAIR = new BasicStroke(1f, BasicStroke.CAP_BUTT, BasicStroke.JOIN_MITER);
    private static final double MAJOR = 6;
    private static final double MINOR = 3.5;
    private static final double GAP = 6;
    private static final double TITLE_GAP = 10;
    /** Digits have no descenders: this part of the font size is their height. */
    private static final double DIGIT_HEIGHT = 0.73;

    private final FigureChart chart;

    AxisPainter(FigureChart chart) {
        this.chart = chart;
    }

    /**
     * Tells the chart how much room labels and titles take, for its present size and titles.
     *
     * @param legendHeight height of the legend in pixels
     */
    void makeRoom(double legendHeight) {
        XYStyler styler = chart.getStyler();
        double title = styler.getAxisTitleFont().getSize2D();
        double below = GAP + labelFont().getSize2D() + (chart.getXAxisTitle().isBlank() ? 0 : TITLE_GAP + title);
        styler.setPlotMargin((int) Math.ceil(below));
        double above = chart.getTitle().isBlank()
                ? 0
                : TexRenderer.getBounds(chart.getTitle(), styler.getChartTitleFont())
                                .getHeight()
                        + 2 * styler.getChartTitlePadding();
        double plotHeight =
                chart.getHeight() - 2 * styler.getChartPadding() - above - styler.getPlotMargin() - legendHeight;
        double labels = yTicks(plotHeight).stream()
                .mapToDouble(tick -> Lettering.width(tick.label(), labelFont()))
                .max()
                .orElse(0);
        double left = GAP + labels + (chart.getYAxisTitle().isBlank() ? 0 : TITLE_GAP + title);
        styler.setYAxisLeftWidthHint((int) Math.ceil(styler.getChartPadding() + left));
    }

    /** The ticks along x if the axis is that many pixels long. */
    List<Tick> xTicks(double length) {
        XYStyler styler = chart.getStyler();
        Scale scale = new Scale(styler.getXAxisMin(), styler.getXAxisMax(), styler.isXAxisLogarithmic());
        return new Ticks(scale, length, label -> Lettering.width(label, labelFont()) + 6).choose();
    }

    /** The ticks along y if the axis is that many pixels long. */
    List<Tick> yTicks(double length) {
        XYStyler styler = chart.getStyler();
        Scale scale = new Scale(styler.getYAxisMin(), styler.getYAxisMax(), styler.isYAxisLogarithmic());
        return new Ticks(scale, length, label -> 1.15 * labelFont().getSize2D()).choose();
    }

    /** Draws the grid: light lines at labelled ticks. */
    void paintGrid(Graphics2D g, Rectangle2D bounds) {
        g.setColor(Palette.GRID);
        g.setStroke(HAIR);
        for (Tick tick : xTicks(bounds.getWidth())) {
            if (tick.labelled()) {
                double x = crisp(chart.getScreenXFromChart(tick.value()));
                g.draw(new Line2D.Double(x, bounds.getMinY(), x, bounds.getMaxY()));
            }
        }
        for (Tick tick : yTicks(bounds.getHeight())) {
            if (tick.labelled()) {
                double y = crisp(chart.getScreenYFromChart(tick.value()));
                g.draw(new Line2D.Double(bounds.getMinX(), y, bounds.getMaxX(), y));
            }
        }
    }

    /** Draws the frame, the ticks inside it, and labels and titles outside it. */
    void paintFrame(Graphics2D g, Rectangle2D bounds) {
        Rectangle2D frame = new Rectangle2D.Double();
        frame.setFrameFromDiagonal(
                crisp(bounds.getMinX()), crisp(bounds.getMinY()), crisp(bounds.getMaxX()), crisp(bounds.getMaxY()));
        g.setColor(Palette.INK);
        g.setStroke(HAIR);
        g.draw(frame);
        paintX(g, frame, xTicks(bounds.getWidth()));
        paintY(g, frame, yTicks(bounds.getHeight()));
    }

    private void paintX(Graphics2D g, Rectangle2D frame, List<Tick> ticks) {
        double baseline = frame.getMaxY() + GAP + labelFont().getSize2D() * 0.9;
        for (Tick tick : ticks) {
            double exact = chart.getScreenXFromChart(tick.value());
            double x = crisp(exact);
            double length = tick.labelled() ? MAJOR : MINOR;
            g.draw(new Line2D.Double(x, frame.getMaxY(), x, frame.getMaxY() - length));
            g.draw(new Line2D.Double(x, frame.getMinY(), x, frame.getMinY() + length));
            double half = Lettering.width(tick.label(), labelFont()) / 2;
            Point2D place = new Point2D.Double(Math.min(exact, chart.getWidth() - 3 - half), baseline);
            Lettering.draw(g, tick.label(), labelFont(), Align.MIDDLE, place);
        }
        Font font = chart.getStyler().getAxisTitleFont();
        double titleLine = baseline + TITLE_GAP + font.getSize2D();
        String title = Lettering.within(chart.getXAxisTitle(), font, frame.getWidth());
        Lettering.draw(g, title, font, Align.MIDDLE, new Point2D.Double(frame.getCenterX(), titleLine));
    }

    private void paintY(Graphics2D g, Rectangle2D frame, List<Tick> ticks) {
        for (Tick tick : ticks) {
            double exact = chart.getScreenYFromChart(tick.value());
            double y = crisp(exact);
            double length = tick.labelled() ? MAJOR : MINOR;
            g.draw(new Line2D.Double(frame.getMinX(), y, frame.getMinX() + length, y));
            g.draw(new Line2D.Double(frame.getMaxX(), y, frame.getMaxX() - length, y));
            double baseline = exact + DIGIT_HEIGHT / 2 * labelFont().getSize2D();
            Lettering.draw(
                    g, tick.label(), labelFont(), Align.RIGHT, new Point2D.Double(frame.getMinX() - GAP, baseline));
        }
        Font font = chart.getStyler().getAxisTitleFont();
        double titleLine = chart.getStyler().getChartPadding() + font.getSize2D() * 0.8;
        String title = Lettering.within(chart.getYAxisTitle(), font, 0.96 * chart.getHeight());
        double half = Lettering.width(title, font) / 2;
        Lettering.drawUpwards(g, title, font, titleLine, Math.max(frame.getCenterY(), half + 3));
    }

    private Font labelFont() {
        return chart.getStyler().getAxisTickLabelsFont();
    }

    /** The nearest place at which a line of one pixel is sharp, drawn at twice the size. */
    private static double crisp(double pixel) {
        return Math.round(pixel);
    }
}
