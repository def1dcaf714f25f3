package org.meltbook.figure;

import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.units.Quantity;

/** A figure as data: title, caption, two axes and layers from back to front. */
public final class Figure {
    private final String title;
    private final String caption;
    private final Axis x;
    private final Axis y;
    private final List<Layer> layers;
    private final List<Integer> families;

    private Figure(Builder builder) {
        this.title = builder.title;
        this.caption = builder.caption;
        this.x = builder.x;
        this.y = builder.y;
        this.layers = List.copyOf(builder.layers);
        this.families = List.copyOf(builder.families);
    }

    /** A figure to be filled layer by layer; both axes are logarithmic unless said otherwise. */
    public static Builder titled(String title) {
        return new Builder(title);
    }

    /** What the figure shows. */
    public String title() {
        return title;
    }

    /** A sentence or two below the figure; may be empty. */
    public String caption() {
        return caption;
    }

    /** The horizontal axis. */
    public Axis x() {
        return x;
    }

    /** The vertical axis. */
    public Axis y() {
        return y;
    }

    /** What is drawn, from back to front. */
    public List<Layer> layers() {
        return layers;
    }

    /**
     * The family of a layer: layers of one family, such as measured points and their fit, share a colour. Families are
     * counted from zero in the order in which they begin.
     *
     * @param layer place of the layer in {@link #layers()}, counted from zero
     */
    public int family(int layer) {
        return families.get(layer);
    }

    /** Every number of the figure, one row a point: layer, x, y and the ends of bar or band. */
    public Rows rows() {
        List<String> names = new ArrayList<>();
        List<double[]> points = new ArrayList<>();
        for (Layer layer : layers) {
            for (int i = 0; i < layer.x().size(); i++) {
                names.add(layer.name());
                points.add(point(layer, i));
            }
        }
        return Rows.titled(title)
                .text("layer", names)
                .numbers(
                        x.label(),
                        x.unit(),
                        points.stream().mapToDouble(p -> p[0]).toArray())
                .numbers(
                        y.label(),
                        y.unit(),
                        points.stream().mapToDouble(p -> p[1]).toArray())
                .numbers("low", y.unit(), points.stream().mapToDouble(p -> p[2]).toArray())
                .numbers(
                        "high", y.unit(), points.stream().mapToDouble(p -> p[3]).toArray())
                .build();
    }

    private static double[] point(Layer layer, int i) {
        double x = layer.x().at(i);
        if (layer instanceof Layer.Marks marks) {
            return new double[] {
                x, marks.y().at(i), marks.low().at(i), marks.high().at(i)
            };
        } else if (layer instanceof Layer.Band band) {
            return new double[] {x, Double.NaN, band.low().at(i), band.high().at(i)};
        }
        return new double[] {x, ((Layer.Line) layer).y().at(i), Double.NaN, Double.NaN};
    }

    /** One line: title, axes and layers. */
    @Override
    public String toString() {
        return "Figure: " + title + " (" + y.title() + " against " + x.title() + "; "
                + String.join(", ", layers.stream().map(Layer::name).toList()) + ")";
    }

    /** Collects axes and layers. */
    public static final class Builder {
        private final String title;
        private String caption = "";
        private Axis x;
        private Axis y;
        private final List<Layer> layers = new ArrayList<>();
        private final List<Integer> families = new ArrayList<>();
        private boolean joining;

        private Builder(String title) {
            this.title = Objects.requireNonNull(title, "title");
        }

        /** Sets the horizontal axis. */
        public Builder x(Axis axis) {
            this.x = axis;
            return this;
        }

        /** Sets a logarithmic horizontal axis of the quantity. */
        public Builder x(Quantity quantity) {
            return x(Axis.log(quantity));
        }

        /** Sets the vertical axis. */
        public Builder y(Axis axis) {
            this.y = axis;
            return this;
        }

        /** Sets a logarithmic vertical axis of the quantity. */
        public Builder y(Quantity quantity) {
            return y(Axis.log(quantity));
        }

        /** Sets the sentence below the figure. */
        public Builder caption(String text) {
            this.caption = text;
            return this;
        }

        /** Adds measured points without error bars. */
        public Builder marks(String name, Doubles xs, Doubles ys) {
            Doubles none = ys.map(v -> Double.NaN);
            return layer(new Layer.Marks(name, xs, ys, none, none));
        }

        /** Adds measured points with error bars from {@code low} to {@code high}. */
        public Builder marks(String name, Doubles xs, Doubles ys, Doubles low, Doubles high) {
            return layer(new Layer.Marks(name, xs, ys, low, high));
        }

        /** Adds a solid model line. */
        public Builder line(String name, Doubles xs, Doubles ys) {
            return layer(new Layer.Line(name, xs, ys, Layer.Style.SOLID));
        }

        /** Adds a dashed model line. */
        public Builder dashed(String name, Doubles xs, Doubles ys) {
            return layer(new Layer.Line(name, xs, ys, Layer.Style.DASHED));
        }

        /** Adds a band between two curves. */
        public Builder band(String name, Doubles xs, Doubles low, Doubles high) {
            return layer(new Layer.Band(name, xs, low, high));
        }

        /** Adds a layer in front of the others. */
        public Builder layer(Layer layer) {
            int last = families.isEmpty() ? -1 : families.get(families.size() - 1);
            families.add(joining ? last : last + 1);
            layers.add(layer);
            joining = false;
            return this;
        }

        /**
         * Puts the next layer into the family of the layer before it, so that both have one colour:
         * {@code marks("A-00", ...).likeBefore().line("A-00, Cross", ...)}.
         *
         * @throws RangeException if there is no layer yet
         */
        public Builder likeBefore() {
            if (layers.isEmpty()) {
                throw new RangeException("figure '" + title + "' has no layer yet that the next one could be like");
            }
            joining = true;
            return this;
        }

        /**
         * The finished figure.
         *
         * @throws RangeException if an axis is missing
         */
        public Figure build() {
            if (x == null || y == null) {
                throw new RangeException("figure '" + title + "' needs both axes before it is built");
            }
            return new Figure(this);
        }
    }
}
