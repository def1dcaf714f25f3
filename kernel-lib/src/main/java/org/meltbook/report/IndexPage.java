package org.meltbook.report;

import java.util.List;

/** The page that leads to the others. */
public final class IndexPage {
    private IndexPage() {}

    /**
     * One line of the index.
     *
     * @param title    the title of the page
     * @param href     where it is, relative to the index
     * @param sentence what it is about
     * @param status   how its run ended
     * @param good     whether that is as it should be
     */
    public record Entry(String title, String href, String sentence, String status, boolean good) {}

    /** The index of the given pages, in their order. */
    public static String of(String title, List<Entry> entries) {
        StringBuilder body =
                new StringBuilder("<main>\n<h1>").append(Html.escape(title)).append("</h1>\n");
        body.append("<ol class=\"index\">\n");
        for (Entry entry : entries) {
            body.append("<li><a href=\"")
                    .append(Html.escape(entry.href()))
                    .append("\">")
                    .append(Html.escape(entry.title()))
                    .append("</a>\n<p>")
                    .append(Html.escape(entry.sentence()))
                    .append("</p>\n<p class=\"status ")
                    .append(entry.good() ? "good" : "bad")
                    .append("\">")
                    .append(Html.escape(entry.status()))
                    .append("</p></li>\n");
        }
        body.append("</ol>\n</main>\n");
        return Page.document(title, body.toString());
    }
}
