package org.meltbook.notebook;

import java.util.stream.IntStream;
import org.meltbook.base.Rows;
import tech.tablesaw.api.ColumnType;
import tech.tablesaw.api.NumericColumn;
import tech.tablesaw.columns.Column;
import tech.tablesaw.table.Relation;

/** A Tablesaw table as it is shown: decimal numbers by the formatter of the house, anything else as its own text. */
final class TableRows {
    private TableRows() {}

    static Rows of(Relation table) {
        Rows.Builder rows = Rows.titled(table.name() == null ? "" : table.name());
        for (Column<?> column : table.columns()) {
            if (column instanceof NumericColumn<?> numbers && isDecimal(column)) {
                rows.numbers(column.name(), "", numbers.asDoubleArray());
            } else {
                rows.text(
                        column.name(),
                        IntStream.range(0, column.size())
                                .mapToObj(column::getString)
                                .toList());
            }
        }
        return rows.build();
    }

    private static boolean isDecimal(Column<?> column) {
        return column.type().equals(ColumnType.DOUBLE) || column.type().equals(ColumnType.FLOAT);
    }
}
