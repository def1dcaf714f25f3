package org.meltbook.chart;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.DoubleStream;
import org.meltbook.base.Doubles;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.figure.Layer;

/**
 * What of a figure can be drawn, and where the axes begin and end. The chart library fails on a number at or below zero
 * on a logarithmic axis and on infinity; here such numbers are moved to the edge, or left out, and counted in
 * {@link #remarks()}.
 */
final class Placement {
    /**
     * One layer with only such numbers as its axes can show; NaN breaks lines and bands.
     *
     * @param layer the layer as it came
     * @param index its place among the layers
     * @param x     places along x
     * @param low   places along y; lower side of a band
     * @param high  the same as {@code low}; upper side of a band
     */
    record Track(Layer layer, int index, Doubles x, Doubles low, Doubles high) {}

    private final Figure figure;
    private final Tally tally = new Tally();
    private final List<Track> tracks = new ArrayList<>();
    private final List<ErrorBar> bars = new ArrayList<>();
    private final List<EdgeMark> edgeMarks = new ArrayList<>();
    private final Scale x;
    private final Scale y;

    private Placement(Figure figure) {
        this.figure = figure;
        boolean logX = figure.x().scale() == Axis.Scale.LOG;
        boolean logY = figure.y().scale() == Axis.Scale.LOG;
        this.x = Scale.around(xs(logX), logX, hasMarksBelow(true));
        this.y = Scale.around(ys(logY), logY, hasMarksBelow(false));
    }

    /** The placement of everything in the figure. */
    static Placement of(Figure figure) {
        Placement placement = new Placement(figure);
        for (int i = 0; i < figure.layers().size(); i++) {
            placement.place(figure.layers().get(i), i);
        }
        return placement;
    }

    /** The horizontal axis. */
    Scale x() {
        return x;
    }

    /** The vertical axis. */
    Scale y() {
        return y;
    }

    /** The layers of which something is drawn, from back to front. */
    List<Track> tracks() {
        return tracks;
    }

    /** The error bars of all layers. */
    List<ErrorBar> bars() {
        return bars;
    }

    /** The signs for points below the start of an axis. */
    List<EdgeMark> edgeMarks() {
        return edgeMarks;
    }

    /** One sentence for each kind of number that is not where it belongs, with the count. */
    List<String> remarks() {
        return tally.sentences(tracks.isEmpty() && edgeMarks.isEmpty());
    }

    // ---- the axes -------------------------------------------------------------------------------------------------

    private double[] xs(boolean log) {
        return figure.layers().stream()
                .flatMapToDouble(layer -> layer.x().stream())
                .filter(v -> Scale.holds(v, log))
                .toArray();
    }

    private double[] ys(boolean log) {
        return figure.layers().stream()
                .flatMapToDouble(layer -> yLists(layer).stream().flatMapToDouble(Doubles::stream))
                .filter(v -> Scale.holds(v, log))
                .toArray();
    }

    private static List<Doubles> yLists(Layer layer) {
        if (layer instanceof Layer.Marks marks) {
            return List.of(marks.y(), marks.low(), marks.high());
        } else if (layer instanceof Layer.Band band) {
            return List.of(band.low(), band.high());
        }
        return List.of(((Layer.Line) layer).y());
    }

    private boolean hasMarksBelow(boolean alongX) {
        boolean log = (alongX ? figure.x() : figure.y()).scale() == Axis.Scale.LOG;
        return log
                && figure.layers().stream()
                        .filter(Layer.Marks.class::isInstance)
                        .flatMapToDouble(layer -> alongX
                                ? layer.x().stream()
                                : ((Layer.Marks) layer).y().stream())
                        .anyMatch(v -> v <= 0 && v >= -Double.MAX_VALUE);
    }

    // ---- the layers -----------------------------------------------------------------------------------------------

    private void place(Layer layer, int index) {
        int before = edgeMarks.size();
        Track track;
        if (layer instanceof Layer.Marks marks) {
            track = marks(marks, index);
        } else if (layer instanceof Layer.Line line) {
            track = line(line, index);
        } else {
            track = band((Layer.Band) layer, index);
        }
        boolean isPath = !(layer instanceof Layer.Marks);
        if (isPath ? hasStretch(track.low()) : !track.x().isEmpty()) {
            tracks.add(track);
        } else if (edgeMarks.size() == before) {
            tally.emptyLayers.add(layer.name());
        }
    }

    private static boolean hasStretch(Doubles values) {
        for (int i = 1; i < values.size(); i++) {
            if (!Double.isNaN(values.at(i)) && !Double.isNaN(values.at(i - 1))) {
                return true;
            }
        }
        return false;
    }

    private Track marks(Layer.Marks marks, int index) {
        DoubleStream.Builder xs = DoubleStream.builder();
        DoubleStream.Builder ys = DoubleStream.builder();
        for (int i = 0; i < marks.x().size(); i++) {
            double px = marks.x().at(i);
            double py = marks.y().at(i);
            if (Double.isNaN(px) || Double.isNaN(py)) {
                continue;
            }
            boolean left = below(px, x);
            boolean below = below(py, y);
            if (!(left || shown(px, x)) || !(below || shown(py, y))) {
                tally.pointsOutOfRange++;
            } else if (left || below) {
                tally.pointsAtEdge++;
                edgeMarks.add(new EdgeMark(left ? x.min() : px, below ? y.min() : py, left, below, colour(index)));
            } else {
                xs.add(px);
                ys.add(py);
            }
            if (shown(px, x) && (below || shown(py, y))) {
                bar(marks, i, index);
            }
        }
        Doubles placed = Doubles.of(ys.build().toArray());
        return new Track(marks, index, Doubles.of(xs.build().toArray()), placed, placed);
    }

    private void bar(Layer.Marks marks, int i, int index) {
        double low = marks.low().at(i);
        double high = marks.high().at(i);
        if (Double.isNaN(low) && Double.isNaN(high)) {
            return;
        }
        double middle = within(marks.y().at(i));
        double lowEnd = Double.isNaN(low) ? middle : within(low);
        double highEnd = Double.isNaN(high) ? middle : within(high);
        boolean lowCut = !Double.isNaN(low) && lowEnd != low;
        boolean highCut = !Double.isNaN(high) && highEnd != high;
        if (lowCut || highCut) {
            tally.barsCut++;
        }
        bars.add(new ErrorBar(
                marks.x().at(i),
                lowEnd,
                highEnd,
                !Double.isNaN(low) && !lowCut,
                !Double.isNaN(high) && !highCut,
                colour(index)));
    }

    private Track line(Layer.Line line, int index) {
        double[] ys = line.y().toArray();
        for (int i = 0; i < ys.length; i++) {
            double px = line.x().at(i);
            if (!Double.isNaN(px) && !Double.isNaN(ys[i]) && !(shown(px, x) && shown(ys[i], y))) {
                tally.lineValuesLeftOut++;
            }
            if (!(shown(px, x) && shown(ys[i], y))) {
                ys[i] = Double.NaN;
            }
        }
        Doubles placed = Doubles.of(ys);
        return new Track(line, index, line.x(), placed, placed);
    }

    private Track band(Layer.Band band, int index) {
        double[] low = band.low().toArray();
        double[] high = band.high().toArray();
        for (int i = 0; i < low.length; i++) {
            double px = band.x().at(i);
            boolean gap = Double.isNaN(px) || Double.isNaN(low[i]) || Double.isNaN(high[i]);
            boolean cut = !gap && (!shown(px, x) || within(low[i]) != low[i] || within(high[i]) != high[i]);
            if (cut) {
                tally.bandValuesCut++;
            }
            boolean seen = !gap && shown(px, x) && (shown(low[i], y) || shown(high[i], y));
            low[i] = seen ? within(low[i]) : Double.NaN;
            high[i] = seen ? within(high[i]) : Double.NaN;
        }
        return new Track(band, index, band.x(), Doubles.of(low), Doubles.of(high));
    }

    private java.awt.Color colour(int index) {
        return Palette.of(figure.family(index));
    }

    private double within(double value) {
        return shown(value, y) ? value : value > y.min() ? y.max() : y.min();
    }

    private static boolean shown(double value, Scale scale) {
        return Scale.holds(value, scale.logarithmic());
    }

    private static boolean below(double value, Scale scale) {
        return scale.logarithmic() && value <= 0 && value >= -Double.MAX_VALUE;
    }
}
