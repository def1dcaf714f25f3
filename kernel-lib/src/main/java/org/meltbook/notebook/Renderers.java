package org.meltbook.notebook;

import java.util.Base64;
import java.util.Collection;
import java.util.List;
import java.util.Map;
import org.dflib.jjava.jupyter.kernel.display.DisplayData;
import org.dflib.jjava.jupyter.kernel.display.Renderer;
import org.dflib.jjava.jupyter.kernel.display.mime.MIMEType;
import org.knowm.xchart.internal.chartpart.Chart;
import org.meltbook.base.Rows;
import org.meltbook.chart.Drawing;
import org.meltbook.chart.Png;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.report.HtmlTable;
import org.meltbook.units.Prediction;
import tech.tablesaw.table.Relation;

/**
 * How values show themselves in a notebook: exhibits, tables and predictions as HTML, figures and charts as pictures,
 * each with plain text beside it.
 */
public final class Renderers {
    private static final String PNG = "image/png";

    private Renderers() {}

    /** A renderer that knows them all. */
    public static Renderer all() {
        Renderer renderer = new Renderer();
        install(renderer);
        return renderer;
    }

    /** Teaches them to a renderer, such as that of another Java kernel. */
    public static void install(Renderer renderer) {
        rich(renderer, Exhibit.class, Renderers::show);
        rich(renderer, Rows.class, Renderers::show);
        rich(renderer, Relation.class, (table, data) -> show(TableRows.of(table), data));
        rich(renderer, Prediction.class, Renderers::show);
        rich(renderer, Collection.class, Renderers::showEach);
        picture(renderer, Figure.class, Renderers::show);
        picture(renderer, Figure.Builder.class, (figure, data) -> show(figure.build(), data));
        picture(renderer, Chart.class, Renderers::show);
    }

    private static <T> void rich(Renderer renderer, Class<T> type, Show<T> show) {
        renderer.createRegistration(type)
                .preferring(MIMEType.TEXT_HTML, MIMEType.TEXT_PLAIN)
                .register((value, context) -> show.into(value, context.getOutputContainer()));
    }

    private static <T> void picture(Renderer renderer, Class<T> type, Show<T> show) {
        renderer.createRegistration(type)
                .preferring(MIMEType.IMAGE_PNG, MIMEType.TEXT_PLAIN)
                .register((value, context) -> show.into(value, context.getOutputContainer()));
    }

    private static void show(Exhibit exhibit, DisplayData data) {
        List<Drawing> drawings = exhibit.figures().stream().map(Drawing::of).toList();
        data.putHTML(ExhibitText.html(exhibit, drawings));
        data.putText(ExhibitText.plain(exhibit, drawings));
        putFigures(exhibit.figures(), drawings, data);
    }

    private static void show(Rows rows, DisplayData data) {
        data.putHTML(HtmlTable.of(rows));
        data.putText(HtmlTable.plain(rows));
    }

    private static void show(Prediction prediction, DisplayData data) {
        data.putHTML(ExhibitText.html(prediction));
        data.putText(prediction.toString());
    }

    private static void show(Figure figure, DisplayData data) {
        Drawing drawing = Drawing.of(figure);
        putPicture(drawing.png(), drawing.width(), data);
        data.putText(ExhibitText.plain(drawing));
        putFigures(List.of(figure), List.of(drawing), data);
    }

    private static void show(Chart<?, ?> chart, DisplayData data) {
        putPicture(Png.of(chart), chart.getWidth(), data);
        data.putText("Chart: " + (chart.getTitle().isBlank() ? "without title" : chart.getTitle()));
    }

    /** A list of things that can be shown shows them one after another; any other list is text. */
    private static void showEach(Collection<?> values, DisplayData data) {
        boolean all = !values.isEmpty()
                && values.stream().allMatch(v -> v instanceof Exhibit || v instanceof Rows || v instanceof Prediction);
        if (!all) {
            data.putText(values.toString());
            return;
        }
        StringBuilder html = new StringBuilder();
        StringBuilder text = new StringBuilder();
        List<Figure> figures = values.stream()
                .filter(Exhibit.class::isInstance)
                .flatMap(v -> ((Exhibit) v).figures().stream())
                .toList();
        for (Object value : values) {
            DisplayData one = new DisplayData();
            if (value instanceof Exhibit exhibit) {
                show(exhibit, one);
            } else if (value instanceof Rows rows) {
                show(rows, one);
            } else {
                show((Prediction) value, one);
            }
            html.append(one.getData(MIMEType.TEXT_HTML)).append('\n');
            text.append(one.getData(MIMEType.TEXT_PLAIN)).append("\n\n");
        }
        data.putHTML(html.toString());
        data.putText(text.toString().stripTrailing());
        putFigures(figures, figures.stream().map(Drawing::of).toList(), data);
    }

    private static void putPicture(byte[] png, int width, DisplayData data) {
        data.putData(PNG, Base64.getEncoder().encodeToString(png));
        data.putMetaData(PNG, Map.of("width", width));
    }

    private static void putFigures(List<Figure> figures, List<Drawing> drawings, DisplayData data) {
        if (!figures.isEmpty()) {
            data.putData(
                    FigureData.MIME,
                    FigureData.of(
                            figures, drawings.stream().map(Drawing::caption).toList()));
        }
    }

    /** Puts the forms of a value where they belong. */
    @FunctionalInterface
    private interface Show<T> {
        void into(T value, DisplayData data);
    }
}
