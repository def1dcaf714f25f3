package org.meltbook.chart;

import java.awt.Color;
import java.util.ArrayList;
import java.util.List;
import java.util.function.Function;
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

    /** One place where nothing is: it brings a layer whose points are all at the edge into the legend. */
    private static final Doubles GAP = Doubles.of(Double.NaN);

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
        DoubleStream.Builder xs = DoubleStream.builder();
        DoubleStream.Builder ys = DoubleStream.builder();
        figure.layers().forEach(layer -> collect(layer, xs, ys));
        double[] allX = xs.build().toArray();
        double[] allY = ys.build().toArray();
        this.x = Scale.around(held(allX, logX), logX, logX && hasMarksBelow(Layer::x));
        this.y = Scale.around(held(allY, logY), logY, logY && hasMarksBelow(marks -> marks.y()));
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

    /** The layers of which something is seen, from back to front. */
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
        return tally.sentences(tracks.isEmpty());
    }

    // ---- the axes -------------------------------------------------------------------------------------------------

    /** Takes the numbers of all points that are not gaps. */
    private static void collect(Layer layer, DoubleStream.Builder xs, DoubleStream.Builder ys) {
        List<Doubles> lists = new ArrayList<>();
        int decisive = 1;
        if (layer instanceof Layer.Marks marks) {
            lists.addAll(List.of(marks.y(), marks.low(), marks.high()));
        } else if (layer instanceof Layer.Band band) {
            lists.addAll(List.of(band.low(), band.high()));
            decisive = 2;
        } else {
            lists.add(((Layer.Line) layer).y());
        }
        for (int i = 0; i < layer.x().size(); i++) {
            int row = i;
            boolean gap = Double.isNaN(layer.x().at(i))
                    || lists.stream().limit(decisive).anyMatch(list -> Double.isNaN(list.at(row)));
            if (!gap) {
                xs.add(layer.x().at(i));
                lists.forEach(list -> ys.add(list.at(row)));
            }
        }
    }

    private static double[] held(double[] values, boolean log) {
        return DoubleStream.of(values).filter(v -> Scale.holds(v, log)).toArray();
    }

    private boolean hasMarksBelow(Function<Layer.Marks, Doubles> list) {
        return figure.layers().stream()
                .filter(Layer.Marks.class::isInstance)
                .flatMapToDouble(layer -> list.apply((Layer.Marks) layer).stream())
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
        } else if (edgeMarks.size() > before) {
            tracks.add(new Track(layer, index, GAP, GAP, GAP));
        } else {
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
        Pixels taken = new Pixels();
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
            } else if (taken.firstAt(x.fraction(px), y.fraction(py))) {
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
            boolean outside = !shown(low[i], y) && !shown(high[i], y) && within(low[i]) == within(high[i]);
            boolean seen = !gap && shown(px, x) && !outside;
            low[i] = seen ? within(low[i]) : Double.NaN;
            high[i] = seen ? within(high[i]) : Double.NaN;
        }
        return new Track(band, index, band.x(), Doubles.of(low), Doubles.of(high));
    }

    private Color colour(int index) {
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
