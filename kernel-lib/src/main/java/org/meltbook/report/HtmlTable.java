package org.meltbook.report;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import org.meltbook.base.Rows;

/**
 * Shows a table as HTML that needs no style sheet: caption, column heads, numbers to the right. The few inline styles
 * help in Jupyter; where a viewer strips them the table still reads well.
 */
public final class HtmlTable {
    /** Tables of more rows are shortened to their beginning and end, which a line below says. */
    public static final int LONGEST = 20;

    private static final int FIRST = 8;
    private static final int LAST = 4;

    /** Plain text, which stands beside the HTML and is what a check compares, goes on for this many rows. */
    public static final int LONGEST_PLAIN = 200;

    private static final String RULE = "border-bottom:1px solid #8886;";
    private static final String CELL = "padding:.2em .7em;";

    private HtmlTable() {}

    /** The table as HTML; every text of it is escaped. */
    public static String of(Rows rows) {
        boolean whole = rows.size() <= LONGEST;
        StringBuilder html = new StringBuilder("<table class=\"rows\" style=\"border-collapse:collapse\">\n");
        if (!rows.title().isBlank()) {
            // A title may be wider than its table and must not widen the columns: its outer box takes no room.
            html.append("<caption style=\"text-align:left;font-weight:600;padding:.3em .7em\"><div style=\"width:0\">")
                    .append("<div style=\"width:max-content;max-width:min(42rem,85vw)\">")
                    .append(Html.escape(rows.title()))
                    .append("</div></div></caption>\n");
        }
        html.append("<thead><tr>");
        for (Rows.Column column : rows.columns()) {
            html.append("<th scope=\"col\" ")
                    .append(style(column, RULE))
                    .append('>')
                    .append(Html.escape(column.label()))
                    .append("</th>");
        }
        html.append("</tr></thead>\n<tbody>\n");
        IntStream.range(0, whole ? rows.size() : FIRST).forEach(row -> html.append(line(rows.columns(), row)));
        if (!whole) {
            html.append("<tr><td colspan=\"")
                    .append(rows.columns().size())
                    .append("\" style=\"")
                    .append(CELL)
                    .append("\">⋮</td></tr>\n");
            IntStream.range(rows.size() - LAST, rows.size()).forEach(row -> html.append(line(rows.columns(), row)));
        }
        html.append("</tbody>\n</table>\n");
        int shown = whole ? rows.size() : FIRST + LAST;
        notes(rows, shown).forEach(note -> html.append("<p class=\"note\" style=\"font-size:.9em;margin:.2em .7em\">")
                .append(Html.escape(note))
                .append("</p>\n"));
        return html.toString();
    }

    /** The table as plain text; one of more than {@value #LONGEST_PLAIN} rows is shortened and says so. */
    public static String plain(Rows rows) {
        return rows.size() <= LONGEST_PLAIN
                ? rows.toString()
                : rows.first(LONGEST_PLAIN, notes(rows, LONGEST_PLAIN)).toString();
    }

    private static List<String> notes(Rows rows, int shown) {
        List<String> notes = new ArrayList<>();
        if (shown < rows.size()) {
            notes.add(shown + " of " + rows.size() + " rows shown");
        }
        notes.addAll(rows.notes());
        return notes;
    }

    private static String line(List<Rows.Column> columns, int row) {
        return columns.stream()
                .map(column -> "<td " + style(column, "") + ">" + Html.escape(column.text(row)) + "</td>")
                .collect(Collectors.joining("", "<tr>", "</tr>\n"));
    }

    private static String style(Rows.Column column, String more) {
        String side = column instanceof Rows.NumberColumn ? "right" : "left";
        return "style=\"text-align:" + side + ";" + CELL + more + "\"";
    }
}
