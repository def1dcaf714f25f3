package org.meltbook.chart;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.image.BufferedImage;
import java.io.ByteArrayInputStream;
import java.io.DataInputStream;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Locale;
import java.util.Set;
import javax.imageio.ImageIO;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.knowm.xchart.XYChart;
import org.knowm.xchart.XYSeries.XYSeriesRenderStyle;
import org.meltbook.base.Doubles;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.units.Quantity;

class DrawingTest {
    private final Locale locale = Locale.getDefault();

    @AfterEach
    void restoreLocale() {
        Locale.setDefault(locale);
    }

    @Test
    void a_million_points_draw_the_picture_of_those_that_can_be_told_apart() {
        double[] x = new double[1_000_000];
        double[] y = new double[x.length];
        for (int i = 0; i < x.length; i++) {
            x[i] = Math.exp(i * 1e-5);
            y[i] = 2 * x[i];
        }
        Drawing all = Drawing.of(Figure.titled("Many points")
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.SHEAR_STRESS)
                .marks("measured", Doubles.of(x), Doubles.of(y))
                .build());
        double[] drawn = all.chart().getSeries("measured").getXData();
        assertEquals(x[0], drawn[0]);
        // one marker at most for each pixel that the rising curve crosses, along and up
        assertTrue(drawn.length <= 1440 + 960, drawn.length + " markers");
        assertTrue(drawn[drawn.length - 1] > 0.99 * x[x.length - 1], "the last pixel is reached");
    }

    @Test
    void two_runs_give_the_same_bytes() {
        assertArrayEquals(Samples.moduli().png(), Samples.moduli().png());
    }

    @ParameterizedTest
    @ValueSource(strings = {"de-DE", "ar-EG-u-nu-arab", "hi-IN-u-nu-deva"})
    void every_locale_gives_the_same_bytes_and_words(String tag) {
        Locale.setDefault(Locale.ENGLISH);
        byte[] english = Samples.moduli().png();
        String words = Samples.moduli().altText();
        Locale.setDefault(Locale.forLanguageTag(tag));
        assertArrayEquals(english, Samples.moduli().png());
        assertEquals(words, Samples.moduli().altText());
    }

    @Test
    void the_picture_is_opaque_of_fixed_size_modest_and_without_metadata() throws IOException {
        byte[] png = Samples.moduli().png();
        BufferedImage image = ImageIO.read(new ByteArrayInputStream(png));
        assertEquals(1440, image.getWidth());
        assertEquals(960, image.getHeight());
        assertFalse(image.getColorModel().hasAlpha());
        assertEquals(0xFFFFFFFF, image.getRGB(0, 0));
        assertTrue(png.length < 80_000, png.length + " bytes");
        assertEquals(Set.of("IHDR", "PLTE", "IDAT", "IEND"), chunks(png));
    }

    @Test
    void points_and_lines_are_the_series_of_the_chart() {
        XYChart chart = Samples.moduli().chart();
        assertEquals("angular frequency ω [rad/s]", chart.getXAxisTitle());
        assertEquals(17, chart.getSeries("G′").getXData().length);
        assertEquals(
                XYSeriesRenderStyle.Scatter,
                chart.getSeries("G′").getXYSeriesRenderStyle().orElseThrow());
        assertEquals(
                XYSeriesRenderStyle.Line,
                chart.getSeries("G″, fit").getXYSeriesRenderStyle().orElseThrow());
        assertEquals(
                chart.getSeries("G″").getMarkerColor(),
                chart.getSeries("G″, fit").getLineColor());
    }

    @Test
    void layers_of_one_name_are_all_drawn_and_a_blank_name_is_no_entry_of_its_own() {
        Doubles x = Doubles.of(1, 10);
        XYChart chart = Drawing.of(Samples.loglog()
                        .marks("lot", x, x)
                        .line("lot", x, x)
                        .line("", x, x)
                        .build())
                .chart();
        assertEquals(3, chart.getSeriesCollection().size());
        assertEquals("lot", chart.getSeries("lot (2)").getLabel());
        assertFalse(chart.getSeries("layer 3").isShowInLegend());
    }

    @Test
    void a_marker_is_where_its_point_is() {
        Canvas canvas = Canvas.of(Samples.loglog()
                .marks("one", Doubles.of(1, 10), Doubles.of(5, 50))
                .build());
        assertEquals(Palette.of(0).getRGB(), canvas.at(10, 50));
        assertFalse(canvas.colourNear(canvas.x(10), canvas.y(5), Palette.of(0).getRGB()));
    }

    @Test
    void a_value_at_or_below_zero_is_marked_at_the_edge_and_counted() {
        Figure figure = Samples.loglog()
                .marks("one", Doubles.of(1, 2, 4, 8), Doubles.of(5, 0, -3, 50))
                .caption("Invented.")
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals(
                "Invented. 2 points at or below zero are marked at the edge.",
                Drawing.of(figure).caption());
        assertTrue(canvas.colourNear(
                canvas.x(2), canvas.bottom() - 6, Palette.of(0).getRGB()));
        assertTrue(canvas.colourNear(
                canvas.x(4), canvas.bottom() - 6, Palette.of(0).getRGB()));
        assertFalse(canvas.colourNear(
                canvas.x(1), canvas.bottom() - 6, Palette.of(0).getRGB()));
        assertEquals(0xFFFFFFFF, canvas.pixel(canvas.x(2), canvas.bottom() - 5), "the sign is open");
    }

    @Test
    void a_point_left_of_a_logarithmic_axis_is_marked_at_the_left() {
        Figure figure = Samples.loglog()
                .marks("one", Doubles.of(0, 1, 10), Doubles.of(7, 5, 50))
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals(
                "1 point at or below zero is marked at the edge.",
                Drawing.of(figure).caption());
        assertTrue(
                canvas.colourNear(canvas.left() + 6, canvas.y(7), Palette.of(0).getRGB()));
    }

    @Test
    void error_bars_may_be_longer_on_one_side() {
        Canvas canvas = Canvas.of(Samples.loglog()
                .marks("one", Doubles.of(1, 2, 4), Doubles.of(10, 10, 10), Doubles.of(9, 8, 9), Doubles.of(11, 60, 11))
                .line("", Doubles.of(1, 4), Doubles.of(1, 100))
                .build());
        int bar = Palette.of(0).getRGB();
        assertTrue(canvas.colourNear(canvas.x(2), canvas.y(50), bar), "up to 60");
        assertFalse(canvas.colourNear(canvas.x(2), canvas.y(70), bar), "not beyond");
        assertFalse(canvas.colourNear(canvas.x(2), canvas.y(2), bar), "not as far down as up");
        assertTrue(canvas.colourNear(canvas.x(2) + 3, canvas.y(60), bar), "a cap at its end");
    }

    @Test
    void an_error_bar_that_reaches_zero_is_cut_at_the_edge_and_counted() {
        Figure figure = Samples.loglog()
                .marks("one", Doubles.of(1, 2, 4), Doubles.of(10, 10, 10), Doubles.of(9, 0, -5), Doubles.of(11, 12, 13))
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals(
                "2 error bars reach beyond the axis and are cut at the edge.",
                Drawing.of(figure).caption());
        assertTrue(canvas.colourNear(
                canvas.x(2), canvas.bottom() - 10, Palette.of(0).getRGB()));
        assertFalse(canvas.colourNear(
                canvas.x(1), canvas.bottom() - 10, Palette.of(0).getRGB()));
    }

    @Test
    void a_missing_value_leaves_a_gap_and_is_not_counted() {
        Figure figure = Samples.loglog()
                .line("model", Doubles.of(1, 2, 4, 8, 16), Doubles.of(10, 10, Double.NaN, 10, 10))
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals("", Drawing.of(figure).caption());
        assertTrue(canvas.colourNear(canvas.x(1.5), canvas.y(10), Palette.of(0).getRGB()));
        assertFalse(canvas.colourNear(canvas.x(4), canvas.y(10), Palette.of(0).getRGB()));
    }

    @Test
    void a_line_through_zero_leaves_a_gap_and_is_counted() {
        Figure figure = Samples.loglog()
                .line("model", Doubles.of(1, 2, 4, 8, 16), Doubles.of(10, 10, -1, 10, 10))
                .build();
        assertEquals(
                "1 value of a line cannot be shown on the axes and leaves a gap.",
                Drawing.of(figure).caption());
    }

    @Test
    void a_band_that_reaches_zero_is_filled_down_to_the_edge_and_counted() {
        Figure figure = Samples.loglog()
                .band("interval", Doubles.of(1, 2, 4), Doubles.of(1, 0, 1), Doubles.of(10, 10, 10))
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals(
                "1 place of a band reaches beyond the axes and is cut there.",
                Drawing.of(figure).caption());
        assertFalse(canvas.pixel(canvas.x(2) + 2, canvas.bottom() - 8) == 0xFFFFFFFF);
    }

    @Test
    void a_band_without_any_bound_fills_the_height() {
        double inf = Double.POSITIVE_INFINITY;
        Figure figure = Samples.loglog()
                .band("interval", Doubles.of(1, 2, 4), Doubles.of(0, 0, 0), Doubles.of(inf, inf, inf))
                .build();
        Canvas canvas = Canvas.of(figure);
        assertEquals(
                "3 places of bands reach beyond the axes and are cut there.",
                Drawing.of(figure).caption());
        assertFalse(canvas.pixel(canvas.x(2.2), canvas.bottom() - 8) == 0xFFFFFFFF);
        assertFalse(canvas.pixel(canvas.x(2.2), canvas.top() + 8) == 0xFFFFFFFF);
    }

    @Test
    void dashes_run_on_along_a_line_of_many_points() {
        Doubles x = Doubles.logSpaced(1, 100, 400);
        Canvas canvas = Canvas.of(Samples.loglog()
                .dashed("model", x, x.map(v -> 10))
                .line("frame", Doubles.of(1, 100), Doubles.of(1, 100))
                .build());
        int changes = 0;
        boolean on = false;
        for (double px = canvas.x(1); px < canvas.x(8); px += 0.5) {
            boolean now = canvas.pixel(px, canvas.y(10)) == Palette.of(0).getRGB();
            changes += now == on ? 0 : 1;
            on = now;
        }
        double period = 7 + 4.5;
        assertEquals(2 * (canvas.x(8) - canvas.x(1)) / period, changes, 4, "dash and gap in each 11.5 pixels");
    }

    @Test
    void infinite_points_are_left_out_and_counted() {
        Figure figure = Samples.loglog()
                .marks("one", Doubles.of(1, 2, 4), Doubles.of(5, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY))
                .build();
        assertEquals(
                "2 points are infinite or too large to be drawn.",
                Drawing.of(figure).caption());
        assertEquals(1, Drawing.of(figure).chart().getSeries("one").getXData().length);
    }

    @Test
    void a_figure_without_any_point_is_an_empty_frame_that_says_so() {
        Figure figure =
                Samples.loglog().marks("one", Doubles.of(), Doubles.of()).build();
        assertEquals("There is no point that can be drawn.", Drawing.of(figure).caption());
        assertTrue(Drawing.of(figure).png().length > 1000);
        assertTrue(Drawing.of(Samples.loglog().build()).png().length > 1000);
    }

    @Test
    void a_layer_of_which_nothing_is_seen_is_named() {
        Figure figure = Samples.loglog()
                .marks("one", Doubles.of(1, 2), Doubles.of(1, 2))
                .line("lost", Doubles.of(1, 2), Doubles.of(Double.NaN, 2))
                .build();
        assertEquals("Nothing of 'lost' can be drawn.", Drawing.of(figure).caption());
    }

    @Test
    void awkward_numbers_do_not_make_a_drawing_fail() {
        double inf = Double.POSITIVE_INFINITY;
        List<Doubles> awkward = List.of(
                Doubles.of(3, 3, 3),
                Doubles.of(0, 0, 0),
                Doubles.of(-1, -2, -3),
                Doubles.of(1e-300, 1, 1e300),
                Doubles.of(Double.MIN_VALUE, 1, Double.MAX_VALUE),
                Doubles.of(-inf, 0, inf),
                Doubles.of(1, Math.nextUp(1), 1),
                Doubles.of(1e-9, 1, 1e6),
                Doubles.of(Double.NaN, 1, Double.NaN),
                Doubles.of(1e15, 1e15 + 1, 1e15 + 2),
                Doubles.of(1e-12, 2e-12, 3e-12),
                Doubles.of(-0.0, 0.0, 1));
        for (Axis.Scale scale : Axis.Scale.values()) {
            for (Doubles x : awkward) {
                for (Doubles y : awkward) {
                    Axis axis = new Axis("quantity", "1", scale);
                    Figure figure = Figure.titled("")
                            .x(axis)
                            .y(axis)
                            .marks("points", x, y, x, y)
                            .line("line", x, y)
                            .band("band", x, y, x)
                            .build();
                    Png.image(Drawing.of(figure).chart());
                }
            }
        }
    }

    @Test
    void the_words_name_axes_ranges_layers_and_counts() {
        Figure figure = Samples.loglog()
                .marks("A-00", Doubles.of(1, 10, 20), Doubles.of(5, 50, 0))
                .likeBefore()
                .line("Cross", Doubles.of(1, 10), Doubles.of(5, 50))
                .build();
        String words = Drawing.of(figure).altText();
        assertTrue(words.startsWith("Figure: Flow curve. Along x shear rate γ̇ [1/s], logarithmic from "), words);
        assertTrue(words.contains("A-00 (3 measured points); Cross (line)."), words);
        assertTrue(words.endsWith(" 1 point at or below zero is marked at the edge."), words);
    }

    @Test
    void twelve_layers_with_long_names_leave_room_for_the_plot_and_stay_in_the_picture() {
        Figure.Builder builder = Samples.loglog();
        for (int i = 0; i < 12; i++) {
            Doubles x = Doubles.of(1, 10, 100);
            double factor = i + 1;
            builder.marks("an invented lot with quite a long name, number " + i, x, x.map(v -> factor * v));
        }
        Canvas canvas = Canvas.of(builder.build());
        assertTrue(canvas.bottom() - canvas.top() > 200, "plot height");
        for (int row = 0; row < 960; row++) {
            assertEquals(0xFFFFFFFF, canvas.image.getRGB(3, row), "left margin");
            assertEquals(0xFFFFFFFF, canvas.image.getRGB(1436, row), "right margin");
        }
        for (int column = 0; column < 1440; column++) {
            assertEquals(0xFFFFFFFF, canvas.image.getRGB(column, 956), "bottom margin");
        }
    }

    @Test
    void a_chart_made_by_hand_becomes_a_picture_too() throws IOException {
        XYChart chart = new XYChart(300, 200);
        chart.addSeries("by hand", new double[] {1, 2}, new double[] {3, 4});
        BufferedImage image = ImageIO.read(new ByteArrayInputStream(Png.of(chart)));
        assertEquals(600, image.getWidth());
        assertEquals(400, image.getHeight());
    }

    private static Set<String> chunks(byte[] png) throws IOException {
        Set<String> names = new LinkedHashSet<>();
        DataInputStream in = new DataInputStream(new ByteArrayInputStream(png));
        in.skipBytes(8);
        while (in.available() > 0) {
            int length = in.readInt();
            byte[] name = in.readNBytes(4);
            names.add(new String(name, StandardCharsets.US_ASCII));
            in.skipBytes(length + 4);
        }
        return names;
    }

    /** A drawn figure that can be asked for the colour at a point of its axes. */
    private record Canvas(FigureChart chart, BufferedImage image) {
        static Canvas of(Figure figure) {
            FigureChart chart = (FigureChart) Drawing.of(figure).chart();
            return new Canvas(chart, Png.image(chart));
        }

        double x(double value) {
            return chart.getScreenXFromChart(value);
        }

        double y(double value) {
            return chart.getScreenYFromChart(value);
        }

        double left() {
            return chart.plotBounds().getMinX();
        }

        double top() {
            return chart.plotBounds().getMinY();
        }

        double bottom() {
            return chart.plotBounds().getMaxY();
        }

        int at(double x, double y) {
            return pixel(x(x), y(y));
        }

        int pixel(double x, double y) {
            return image.getRGB((int) (Png.SCALE * x), (int) (Png.SCALE * y));
        }

        /** Whether a pixel within three CSS pixels of the place has the colour. */
        boolean colourNear(double x, double y, int colour) {
            for (double dx = -3; dx <= 3; dx += 0.5) {
                for (double dy = -3; dy <= 3; dy += 0.5) {
                    if (pixel(x + dx, y + dy) == colour) {
                        return true;
                    }
                }
            }
            return false;
        }
    }
}
