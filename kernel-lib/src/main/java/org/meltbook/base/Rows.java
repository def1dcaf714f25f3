package org.meltbook.base;

import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import java.util.stream.IntStream;

/**
 * A table as data: a title, columns of numbers or text, each with its unit, and notes below. Results hand their
 * numbers out in this form; {@code toString} gives it as aligned plain text.
 */
public final class Rows {
    private final String title;
    private final List<Column> columns;
    private final List<String> notes;

    private Rows(String title, List<Column> columns, List<String> notes) {
        this.title = title;
        this.columns = List.copyOf(columns);
        this.notes = List.copyOf(notes);
    }

    /** A table to be filled column by column. */
    public static Builder titled(String title) {
        return new Builder(title);
    }

    /** What the table is about. */
    public String title() {
        return title;
    }

    /** The columns from left to right. */
    public List<Column> columns() {
        return columns;
    }

    /** Remarks that belong below the table. */
    public List<String> notes() {
        return notes;
    }

    /** How many rows there are. */
    public int size() {
        return columns.isEmpty() ? 0 : columns.get(0).size();
    }

    /** The first rows, {@code count} at most, and then the given notes in place of its own. */
    public Rows first(int count, List<String> otherNotes) {
        int[] places = IntStream.range(0, Math.min(count, size())).toArray();
        List<Column> shorter = new ArrayList<>();
        for (Column column : columns) {
            shorter.add(
                    column instanceof NumberColumn numbers
                            ? new NumberColumn(
                                    numbers.heading(),
                                    numbers.unit(),
                                    numbers.values().pick(places),
                                    numbers.places())
                            : new TextColumn(
                                    column.heading(),
                                    ((TextColumn) column).values().subList(0, places.length)));
        }
        return new Rows(title, shorter, otherNotes);
    }

    /**
     * The column with the given heading.
     *
     * @throws RangeException if there is none; the message lists the headings
     */
    public Column column(String heading) {
        return columns.stream()
                .filter(c -> c.heading().equals(heading))
                .findFirst()
                .orElseThrow(() -> new RangeException("no column '" + heading + "' in '" + title + "', which has "
                        + columns.stream().map(Column::heading).toList()));
    }

    /** The table as aligned plain text: title, headings with units, one line a row, notes. */
    @Override
    public String toString() {
        List<List<String>> lines = new ArrayList<>();
        lines.add(columns.stream().map(Column::label).toList());
        for (int row = 0; row < size(); row++) {
            int index = row;
            lines.add(columns.stream().map(c -> c.text(index)).toList());
        }
        int[] widths = new int[columns.size()];
        for (List<String> line : lines) {
            for (int c = 0; c < widths.length; c++) {
                widths[c] = Math.max(widths[c], length(line.get(c)));
            }
        }
        StringBuilder text = new StringBuilder(title).append('\n');
        for (List<String> line : lines) {
            StringBuilder row = new StringBuilder();
            for (int c = 0; c < widths.length; c++) {
                String gap = " ".repeat(widths[c] - length(line.get(c)));
                boolean right = columns.get(c) instanceof NumberColumn;
                row.append(c == 0 ? "  " : "   ").append(right ? gap + line.get(c) : line.get(c) + gap);
            }
            text.append(row.toString().stripTrailing()).append('\n');
        }
        notes.forEach(note -> text.append("  ").append(note).append('\n'));
        return text.toString().stripTrailing();
    }

    /** Letters as seen: a combining dot, as in γ̇, takes no place of its own. */
    private static int length(String text) {
        return (int) text.codePoints()
                .filter(c -> Character.getType(c) != Character.NON_SPACING_MARK)
                .count();
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof Rows that
                && title.equals(that.title)
                && columns.equals(that.columns)
                && notes.equals(that.notes);
    }

    @Override
    public int hashCode() {
        return Objects.hash(title, columns, notes);
    }

    /** One column of a table. */
    public sealed interface Column permits NumberColumn, TextColumn {
        /** What stands above the column, without the unit. */
        String heading();

        /** How many rows it has. */
        int size();

        /** The cell of one row as text. */
        String text(int row);

        /** The heading with the unit in brackets, where there is one. */
        String label();
    }

    /**
     * A column of numbers.
     *
     * @param heading what the numbers are
     * @param unit    their unit as text; blank or {@code 1} if they have none
     * @param values  one number a row, NaN where there is none
     * @param places  digits shown behind the point, or {@link #SIGNIFICANT}
     */
    public record NumberColumn(String heading, String unit, Doubles values, int places) implements Column {
        /** As {@code places}: four significant digits, wherever the point stands. */
        public static final int SIGNIFICANT = -1;

        @Override
        public int size() {
            return values.size();
        }

        @Override
        public String text(int row) {
            double value = values.at(row);
            return places == SIGNIFICANT ? NumberText.of(value) : NumberText.withDecimals(value, places);
        }

        @Override
        public String label() {
            return unit.isBlank() || unit.equals("1") ? heading : heading + " [" + unit + "]";
        }
    }

    /**
     * A column of text.
     *
     * @param heading what the text is
     * @param values  one text a row
     */
    public record TextColumn(String heading, List<String> values) implements Column {
        /** Copies the list. */
        public TextColumn {
            values = List.copyOf(values);
        }

        @Override
        public int size() {
            return values.size();
        }

        @Override
        public String text(int row) {
            return values.get(row);
        }

        @Override
        public String label() {
            return heading;
        }
    }

    /** Collects columns and notes. */
    public static final class Builder {
        private final String title;
        private final List<Column> columns = new ArrayList<>();
        private final List<String> notes = new ArrayList<>();

        private Builder(String title) {
            this.title = Objects.requireNonNull(title, "title");
        }

        /** Adds a column of text. */
        public Builder text(String heading, List<String> values) {
            return add(new TextColumn(heading, values));
        }

        /** Adds a column of numbers that share a unit. */
        public Builder numbers(String heading, String unit, Doubles values) {
            return add(new NumberColumn(heading, unit, values, NumberColumn.SIGNIFICANT));
        }

        /** Adds a column of numbers that share a unit. */
        public Builder numbers(String heading, String unit, double... values) {
            return numbers(heading, unit, Doubles.of(values));
        }

        /**
         * Adds a column of numbers shown with two digits behind the point: differences, such as residuals, whose smaller
         * digits are only those of the arithmetic.
         */
        public Builder differences(String heading, String unit, Doubles values) {
            return add(new NumberColumn(heading, unit, values, 2));
        }

        /** Adds a remark below the table. */
        public Builder note(String note) {
            notes.add(note);
            return this;
        }

        /** The finished table. */
        public Rows build() {
            return new Rows(title, columns, notes);
        }

        private Builder add(Column column) {
            if (!columns.isEmpty() && columns.get(0).size() != column.size()) {
                throw new RangeException("column '" + column.heading() + "' of '" + title + "' has " + column.size()
                        + " rows, the columns before it have " + columns.get(0).size());
            }
            columns.add(column);
            return this;
        }
    }
}
