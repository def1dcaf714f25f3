package org.meltbook.chart;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.knowm.xchart.XYChart;
import org.knowm.xchart.XYSeries;
import org.knowm.xchart.XYSeries.XYSeriesRenderStyle;
import org.knowm.xchart.style.lines.SeriesLines;
import org.knowm.xchart.style.markers.SeriesMarkers;
import org.meltbook.base.NumberText;
import org.meltbook.chart.Placement.Track;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.figure.Layer;

/**
 * A figure drawn: as picture, as chart of the chart library, and in words. The same figure gives the same bytes in
 * every locale, with or without fonts on the machine.
 *
 * <p>Measured points are markers, models are lines, intervals are bands. Layers of one {@linkplain Figure#family
 * family} share a colour; a layer with a blank name joins the legend entry of its family. No number makes a drawing
 * fail: what an axis cannot show is moved to its edge or left out, and counted in {@link #caption()}.
 */
public final class Drawing {
    private final Figure figure;
    private final Placement placement;

    private Drawing(Figure figure) {
        this.figure = figure;
        this.placement = Placement.of(figure);
    }

    /** The drawing of a figure. */
    public static Drawing of(Figure figure) {
        return new Drawing(figure);
    }

    /** Width on the page in CSS pixels; the picture has {@value Png#SCALE} times as many. */
    public int width() {
        return FigureChart.WIDTH;
    }

    /** Height on the page in CSS pixels; the picture has {@value Png#SCALE} times as many. */
    public int height() {
        return FigureChart.HEIGHT;
    }

    /** A PNG picture, opaque, without metadata. */
    public byte[] png() {
        return Png.of(chart());
    }

    /**
     * A new chart of the chart library, to go on with: one series a layer under the name of the layer (with {@code
     * (2)} and so on behind it if names repeat, {@code layer 3} if it is blank), on axes whose ends are set.
     */
    public XYChart chart() {
        FigureChart chart = new FigureChart(placement);
        chart.fitTitle(figure.title());
        chart.setXAxisTitle(figure.x().title());
        chart.setYAxisTitle(figure.y().title());
        Map<Integer, Integer> marksOfFamily = new HashMap<>();
        for (Track track : placement.tracks()) {
            int family = figure.family(track.index());
            XYSeries series = series(chart, track);
            series.setLabel(track.layer().name());
            series.setShowInLegend(!track.layer().name().isBlank());
            series.setLineColor(Palette.of(family));
            series.setMarkerColor(Palette.of(family));
            series.setFillColor(Palette.faint(Palette.of(family)));
            series.setMarker(SeriesMarkers.NONE);
            series.setLineStyle(SeriesLines.NONE);
            if (track.layer() instanceof Layer.Marks) {
                series.setXYSeriesRenderStyle(XYSeriesRenderStyle.Scatter);
                series.setMarker(Mark.of(family, marksOfFamily.merge(family, 1, Integer::sum) - 1));
            } else if (track.layer() instanceof Layer.Line line) {
                series.setXYSeriesRenderStyle(XYSeriesRenderStyle.Line);
                series.setLineStyle(Palette.stroke(line.style(), family));
            } else {
                series.setXYSeriesRenderStyle(XYSeriesRenderStyle.PolygonArea);
            }
        }
        return chart;
    }

    private static XYSeries series(XYChart chart, Track track) {
        String name = track.layer().name().isBlank()
                ? "layer " + (track.index() + 1)
                : track.layer().name();
        String unique = name;
        for (int i = 2; chart.getSeries(unique) != null; i++) {
            unique = name + " (" + i + ")";
        }
        if (track.layer() instanceof Layer.Band) {
            List<double[]> outline = outline(track);
            return chart.addSeries(
                    unique,
                    outline.stream().mapToDouble(p -> p[0]).toArray(),
                    outline.stream().mapToDouble(p -> p[1]).toArray());
        }
        return chart.addSeries(unique, track.x().toArray(), track.low().toArray());
    }

    /** The closed outline of each stretch of a band, upper side first, with NaN between stretches. */
    private static List<double[]> outline(Track track) {
        List<double[]> outline = new ArrayList<>();
        int start = 0;
        for (int i = 0; i <= track.x().size(); i++) {
            if (i == track.x().size() || Double.isNaN(track.low().at(i))) {
                for (int k = start; k < i; k++) {
                    outline.add(new double[] {track.x().at(k), track.high().at(k)});
                }
                for (int k = i - 1; k >= start; k--) {
                    outline.add(new double[] {track.x().at(k), track.low().at(k)});
                }
                outline.add(new double[] {track.x().at(Math.min(i, track.x().size() - 1)), Double.NaN});
                start = i + 1;
            }
        }
        return outline;
    }

    /** The caption of the figure, followed by a sentence for each kind of number that is not where it belongs. */
    public String caption() {
        return Stream.of(Stream.of(figure.caption()), placement.remarks().stream(), Stream.of(ChartFont.remark()))
                .flatMap(s -> s)
                .filter(text -> !text.isBlank())
                .collect(Collectors.joining(" "));
    }

    /** The figure in words, for those who do not see it: title, axes with their ranges, layers, remarks. */
    public String altText() {
        String layers = figure.layers().stream().map(Drawing::inWords).collect(Collectors.joining("; "));
        String remarks = String.join(" ", placement.remarks());
        return "Figure: " + figure.title() + ". Along x " + inWords(figure.x(), placement.x()) + "; along y "
                + inWords(figure.y(), placement.y()) + ". Shown: " + (layers.isEmpty() ? "nothing" : layers) + "."
                + (remarks.isEmpty() ? "" : " " + remarks);
    }

    private static String inWords(Axis axis, Scale scale) {
        return axis.title() + ", " + (scale.logarithmic() ? "logarithmic" : "linear") + " from "
                + NumberText.of(scale.min(), 2) + " to " + NumberText.of(scale.max(), 2);
    }

    private static String inWords(Layer layer) {
        if (layer instanceof Layer.Marks marks) {
            int points = marks.x().size();
            return name(layer) + " (" + points + (points == 1 ? " measured point)" : " measured points)");
        }
        return name(layer) + (layer instanceof Layer.Band ? " (band)" : " (line)");
    }

    private static String name(Layer layer) {
        return layer.name().isBlank() ? "unnamed" : layer.name();
    }
}
