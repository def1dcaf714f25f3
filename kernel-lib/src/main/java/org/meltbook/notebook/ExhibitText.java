package org.meltbook.notebook;

import java.util.Base64;
import java.util.List;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.meltbook.chart.Drawing;
import org.meltbook.figure.Exhibit;
import org.meltbook.report.Html;
import org.meltbook.report.HtmlTable;
import org.meltbook.units.Prediction;

/** Exhibits and predictions as HTML and as plain text: headline, tables, figures, cautions. */
final class ExhibitText {
    private ExhibitText() {}

    static String html(Exhibit exhibit, List<Drawing> drawings) {
        StringBuilder html = new StringBuilder("<div class=\"exhibit\">\n<p class=\"headline\"><strong>")
                .append(Html.escape(exhibit.headline()))
                .append("</strong></p>\n");
        exhibit.rows().forEach(rows -> html.append(HtmlTable.of(rows)));
        drawings.forEach(drawing -> html.append(figure(drawing)));
        return html.append(cautions(exhibit.cautions())).append("</div>").toString();
    }

    static String plain(Exhibit exhibit, List<Drawing> drawings) {
        return Stream.of(
                        Stream.of(exhibit.headline()),
                        exhibit.rows().stream().map(HtmlTable::plain),
                        drawings.stream().map(ExhibitText::plain),
                        exhibit.cautions().stream().map(caution -> "Caution: " + caution))
                .flatMap(part -> part)
                .collect(Collectors.joining("\n\n"));
    }

    static String html(Prediction prediction) {
        String tail = ": " + String.join("; ", prediction.cautions());
        String line = prediction.toString();
        String number = line.endsWith(tail) ? line.substring(0, line.length() - tail.length()) : line;
        return "<p class=\"prediction\"><strong>" + Html.escape(number) + "</strong></p>\n"
                + cautions(prediction.cautions());
    }

    static String plain(Drawing drawing) {
        String caption = drawing.caption();
        return drawing.altText() + (caption.isBlank() ? "" : "\n" + caption);
    }

    private static String figure(Drawing drawing) {
        String caption = drawing.caption();
        return "<figure style=\"margin:.8em 0\"><img src=\"data:image/png;base64,"
                + Base64.getEncoder().encodeToString(drawing.png()) + "\" alt=\"" + Html.escape(drawing.altText())
                + "\" width=\"" + drawing.width() + "\">"
                + (caption.isBlank() ? "" : "<figcaption>" + Html.escape(caption) + "</figcaption>") + "</figure>\n";
    }

    private static String cautions(List<String> cautions) {
        if (cautions.isEmpty()) {
            return "";
        }
        String items = cautions.stream()
                .map(caution -> "<li>" + Html.escape(caution) + "</li>")
                .collect(Collectors.joining("\n"));
        return "<div class=\"cautions\" role=\"note\"><strong>Caution</strong>\n<ul>\n" + items + "\n</ul></div>\n";
    }
}
