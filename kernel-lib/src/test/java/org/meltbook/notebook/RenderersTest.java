package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.charset.StandardCharsets;
import java.util.Base64;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.dflib.jjava.jupyter.kernel.display.DisplayData;
import org.dflib.jjava.jupyter.kernel.display.mime.MIMEType;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;
import tech.tablesaw.api.DoubleColumn;
import tech.tablesaw.api.IntColumn;
import tech.tablesaw.api.StringColumn;
import tech.tablesaw.api.Table;

class RenderersTest {
    private static final String EVIL = "<script>alert(1)</script>";

    @Test
    void an_exhibit_shows_headline_tables_figures_and_cautions_in_that_order() {
        DisplayData shown = Renderers.all().render(exhibit(EVIL));
        String html = text(shown, MIMEType.TEXT_HTML);
        int headline = html.indexOf("&lt;script&gt;");
        int table = html.indexOf("<table");
        int figure = html.indexOf("<img src=\"data:image/png;base64,");
        int caution = html.indexOf("Caution");
        assertTrue(0 < headline && headline < table && table < figure && figure < caution, html);
        assertTrue(html.contains("alt=\"Figure: Flow curve"));
        assertFalse(html.contains("<script"));
        String plain = text(shown, MIMEType.TEXT_PLAIN);
        assertTrue(plain.startsWith(EVIL + "\n\n") && plain.endsWith("Caution: " + EVIL), plain);
    }

    @Test
    void exhibits_in_a_list_show_themselves_one_after_another_and_other_lists_are_text() {
        String html = text(Renderers.all().render(List.of(exhibit("one"), exhibit("two"))), MIMEType.TEXT_HTML);
        assertTrue(html.indexOf("one") < html.indexOf("two"));
        DisplayData numbers = Renderers.all().render(List.of(1, 2));
        assertFalse(numbers.hasDataForType(MIMEType.TEXT_HTML));
        assertEquals("[1, 2]", text(numbers, MIMEType.TEXT_PLAIN));
    }

    @Test
    void a_figure_that_was_not_built_yet_is_drawn_too() {
        Figure.Builder unbuilt =
                Figure.titled("Flow curve").x(Quantity.SHEAR_RATE).y(Quantity.VISCOSITY);
        assertEquals(
                text(Renderers.all().render(unbuilt.build()), MIMEType.IMAGE_PNG),
                text(Renderers.all().render(unbuilt), MIMEType.IMAGE_PNG));
    }

    @Test
    void a_figure_is_a_picture_with_words_and_its_numbers_beside_it() {
        DisplayData shown = Renderers.all().render(figure(1));
        byte[] png = Base64.getDecoder().decode(text(shown, MIMEType.IMAGE_PNG));
        assertEquals("PNG", new String(png, 1, 3, StandardCharsets.US_ASCII));
        assertTrue(text(shown, MIMEType.TEXT_PLAIN).startsWith("Figure: Flow curve"));
    }

    @Test
    void a_chart_is_a_picture() {
        DisplayData shown = Renderers.all().render(Cells.chart(figure(1)));
        assertTrue(shown.hasDataForType(MIMEType.IMAGE_PNG));
        assertEquals("Chart: Flow curve", text(shown, MIMEType.TEXT_PLAIN));
    }

    @Test
    void a_tablesaw_table_is_html_with_its_whole_numbers_whole() {
        Table table = Table.create(
                EVIL,
                StringColumn.create("lot", EVIL),
                IntColumn.create("count", new int[] {1234567}),
                DoubleColumn.create("eta", new double[] {51063.7}));
        String html = text(Renderers.all().render(table), MIMEType.TEXT_HTML);
        assertTrue(html.contains(">1234567<") && html.contains(">51060<"), html);
        assertFalse(html.contains("<script"));
    }

    @Test
    void a_prediction_shows_its_standing_and_what_to_mind() {
        Prediction prediction =
                Prediction.atLeast("zero-shear viscosity", Quantity.VISCOSITY, 2e5, "no plateau <seen>");
        DisplayData shown = Renderers.all().render(prediction);
        String html = text(shown, MIMEType.TEXT_HTML);
        assertTrue(html.contains("at least 200000 Pa·s</strong>"), html);
        assertTrue(html.contains("<li>no plateau &lt;seen&gt;</li>"), html);
        assertEquals(prediction.toString(), text(shown, MIMEType.TEXT_PLAIN));
    }

    @Test
    void figures_are_the_same_if_their_numbers_are_and_the_place_of_a_difference_is_named() {
        List<Object> stored = FigureData.of(List.of(figure(1)), List.of(""));
        assertEquals(
                Optional.empty(),
                FigureData.difference("figure", stored, FigureData.of(List.of(figure(1)), List.of(""))));
        // One unit in the last place of a double is what processors and Java versions may differ by.
        List<Object> close = FigureData.of(List.of(figure(Math.nextUp(1))), List.of(""));
        assertEquals(Optional.empty(), FigureData.difference("figure", stored, close));
        List<Object> moved = FigureData.of(List.of(figure(1.01)), List.of(""));
        assertEquals(
                Optional.of(new FigureData.Difference("figure[1].layers[1].y, place 1", "50000", "50500")),
                FigureData.difference("figure", stored, moved));
    }

    @Test
    void a_series_of_very_many_points_is_thinned_out_in_the_data_of_its_figure() {
        Doubles many = Doubles.logSpaced(1, 10, 2001);
        Figure figure = Figure.titled("Many")
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.VISCOSITY)
                .marks("measured", many, many)
                .build();
        String data = FigureData.of(List.of(figure), List.of("")).toString();
        assertTrue(data.contains("x=one in 2 of 2001: 1 1.0023 "), data);
    }

    @Test
    void a_figure_with_one_more_layer_is_another_figure() {
        Map<String, Object> one = Map.of("layers", List.of("a"));
        Map<String, Object> two = Map.of("layers", List.of("a", "b"));
        assertTrue(FigureData.difference("figure", one, two).isPresent());
    }

    private static String text(DisplayData data, MIMEType type) {
        return data.getData(type).toString();
    }

    private static Figure figure(double factor) {
        Doubles rate = Doubles.of(0.1, 1, 10);
        return Figure.titled("Flow curve")
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.VISCOSITY)
                .caption("As measured.")
                .marks("measured", rate, Doubles.of(50000 * factor, 20000 * factor, 3000 * factor))
                .build();
    }

    private static Exhibit exhibit(String headline) {
        return new Exhibit() {
            @Override
            public String headline() {
                return headline;
            }

            @Override
            public List<Rows> rows() {
                return List.of(
                        Rows.titled("Numbers").numbers("eta", "Pa·s", 1, 2).build());
            }

            @Override
            public List<Figure> figures() {
                return List.of(figure(1));
            }

            @Override
            public List<String> cautions() {
                return List.of(EVIL);
            }
        };
    }
}
