package org.meltbook.notebook;

import java.nio.file.Path;
import java.util.List;
import org.knowm.xchart.XYChart;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.chart.Drawing;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.kernel.Cell;
import org.meltbook.measure.Measurement;
import org.meltbook.table.Tables;
import tech.tablesaw.api.Table;

/** What every cell can call by its bare name. */
public final class Cells {
    private static final double ZERO_CELSIUS = 273.15;

    private Cells() {}

    /** Shows a value on the way, as the last line of a cell would. */
    public static void show(Object value) {
        Cell.display(value);
    }

    /**
     * A file of the project, such as {@code data/published/x.csv} or short {@code published/x.csv}: looked for from the
     * notebook's folder upwards.
     *
     * @throws NotebookException if there is none; the message lists where it was looked for
     */
    public static Path data(String name) {
        return DataFolder.find(name);
    }

    /**
     * A temperature in K from one in °C.
     *
     * @throws RangeException unless it is finite and not below absolute zero
     */
    public static double celsius(double degrees) {
        if (degrees >= -ZERO_CELSIUS && degrees < Double.POSITIVE_INFINITY) {
            return degrees + ZERO_CELSIUS;
        }
        throw new RangeException("a temperature lies at or above −273.15 °C, found " + degrees + " °C");
    }

    /** The table as a Tablesaw table, to go on with. */
    public static Table table(Rows rows) {
        return Tables.of(rows);
    }

    /**
     * Every number of a measurement as a Tablesaw table: a view, of which changes do not come back.
     *
     * @throws RangeException if its curves do not fit into one table; {@code tables(x)} gives theirs
     */
    public static Table table(Measurement measurement) {
        return Tables.of(measurement);
    }

    /**
     * The first table of a result as a Tablesaw table; {@code tables(x)} gives all.
     *
     * @throws RangeException if it has no table
     */
    public static Table table(Exhibit exhibit) {
        return exhibit.rows().stream()
                .findFirst()
                .map(Cells::table)
                .orElseThrow(() -> new RangeException("no table in: " + exhibit.headline()));
    }

    /** Every table of a result as a Tablesaw table. */
    public static List<Table> tables(Exhibit exhibit) {
        return exhibit.rows().stream().map(Cells::table).toList();
    }

    /** The figure as a chart of the chart library, to go on with. */
    public static XYChart chart(Figure figure) {
        return Drawing.of(figure).chart();
    }

    /**
     * The first figure of a measurement or result as a chart of the chart library; {@code charts(x)} gives all.
     *
     * @throws RangeException if it has no figure
     */
    public static XYChart chart(Exhibit exhibit) {
        return exhibit.figures().stream()
                .findFirst()
                .map(Cells::chart)
                .orElseThrow(() -> new RangeException("no figure in: " + exhibit.headline()));
    }

    /** Every figure of a measurement or result as a chart of the chart library. */
    public static List<XYChart> charts(Exhibit exhibit) {
        return exhibit.figures().stream().map(Cells::chart).toList();
    }
}
