package org.meltbook.scenario;

import java.util.List;
import java.util.Map;
import java.util.StringJoiner;
import java.util.function.Function;

/** The ways in which the invented laboratory's programs write a table. All are UTF-8 text. */
enum Dialect {
    /** Commas, names in words with the unit in brackets, LF. */
    COMMA(",", "\n", ".csv", false) {
        @Override
        List<Function<Column, String>> headings() {
            return List.of(column -> column.label() + " [" + column.unit() + "]");
        }
    },
    /** Semicolons and decimal commas, names in words, a row of units below, stresses and moduli in kPa, CRLF. */
    SEMICOLON(";", "\r\n", ".csv", true) {
        @Override
        List<Function<Column, String>> headings() {
            return List.of(Column::label, Column::unit);
        }

        @Override
        List<Column> written(List<Column> columns) {
            return withoutTime(columns).stream().map(Column::inKilopascal).toList();
        }
    },
    /** Tabs, symbols with the unit in brackets, the time of each point, LF. */
    TAB("\t", "\n", ".txt", false) {
        @Override
        List<Function<Column, String>> headings() {
            return List.of(column -> column.symbol() + " [" + column.unit() + "]");
        }

        @Override
        List<Column> written(List<Column> columns) {
            return columns;
        }
    };

    private final String separator;
    private final String lineEnd;
    private final String ending;
    private final boolean decimalComma;

    Dialect(String separator, String lineEnd, String ending, boolean decimalComma) {
        this.separator = separator;
        this.lineEnd = lineEnd;
        this.ending = ending;
        this.decimalComma = decimalComma;
    }

    /** How the heading rows are made from the columns, from top to bottom. */
    abstract List<Function<Column, String>> headings();

    /** The columns as this program writes them: which ones, and in which units. */
    List<Column> written(List<Column> columns) {
        return withoutTime(columns);
    }

    private static List<Column> withoutTime(List<Column> columns) {
        return columns.stream().filter(column -> !column.label().equals("time")).toList();
    }

    /** Ending of the file name, with its point. */
    String ending() {
        return ending;
    }

    /** The text of an export: the preamble as comment lines of key and value, the headings, and a line a row. */
    String write(Map<String, String> preamble, List<Column> readings) {
        List<Column> columns = written(readings);
        StringBuilder text = new StringBuilder();
        preamble.forEach((key, value) ->
                text.append("# ").append(key).append(": ").append(value).append(lineEnd));
        for (Function<Column, String> heading : headings()) {
            text.append(line(columns, heading));
        }
        for (int i = 0; i < columns.get(0).values().size(); i++) {
            int row = i;
            text.append(line(columns, column -> number(column.text(row))));
        }
        return text.toString();
    }

    private String number(String plain) {
        return decimalComma ? plain.replace('.', ',') : plain;
    }

    private String line(List<Column> columns, Function<Column, String> cell) {
        StringJoiner line = new StringJoiner(separator, "", lineEnd);
        columns.forEach(column -> line.add(cell.apply(column)));
        return line.toString();
    }
}
