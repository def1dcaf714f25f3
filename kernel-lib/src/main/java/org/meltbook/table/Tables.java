package org.meltbook.table;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashSet;
import java.util.List;
import java.util.Locale;
import java.util.Set;
import java.util.stream.DoubleStream;
import java.util.stream.Stream;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Measurement;
import org.meltbook.measure.Verdict;
import org.meltbook.measure.Vocabulary;
import tech.tablesaw.api.DoubleColumn;
import tech.tablesaw.api.StringColumn;
import tech.tablesaw.api.Table;
import tech.tablesaw.columns.Column;

/**
 * Numbers of Meltbook as Tablesaw tables, and measurements from Tablesaw tables. A table is a view out and a source in:
 * its columns can change and carry their unit in the heading only, so that nothing of Meltbook is kept in one.
 */
public final class Tables {
    private Tables() {}

    /**
     * The rows as a table of the same title: a column of doubles, named as in {@code ω [rad/s]}, for each column of
     * numbers, and a column of strings for each column of text. Of columns whose names differ in case alone, which
     * Tablesaw takes for one, the later is marked {@code (2)}.
     */
    public static Table of(Rows rows) {
        Set<String> names = new HashSet<>();
        List<Column<?>> columns = new ArrayList<>();
        for (Rows.Column column : rows.columns()) {
            String name = column.label();
            for (int count = 2; !names.add(name.toLowerCase(Locale.ROOT)); count++) {
                name = column.label() + " (" + count + ")";
            }
            columns.add(column(name, column));
        }
        return Table.create(rows.title(), columns);
    }

    private static Column<?> column(String name, Rows.Column column) {
        if (column instanceof Rows.NumberColumn numbers) {
            return DoubleColumn.create(name, numbers.values().toArray());
        }
        return StringColumn.create(name, ((Rows.TextColumn) column).values());
    }

    /**
     * The measurement as one table in SI; where its curves have an x of their own, as many rows for each curve, with a
     * first column that names what the row holds.
     *
     * @throws RangeException if its curves neither share their x nor measure one unit; {@link #each} gives their tables
     */
    public static Table of(Measurement measurement) {
        List<Rows> parts = measurement.rows();
        if (parts.size() == 1) {
            return withVerdicts(of(parts.get(0)), measurement.curves());
        }
        if (measurement instanceof FrequencySweep sweep) {
            return stacked(sweep);
        }
        throw new RangeException(
                measurement.kind() + " of '" + measurement.conditions().sample() + "' makes "
                        + parts.size() + " tables, because not all of its curves share their "
                        + measurement.curves().get(0).x().quantity().label()
                        + " values: Tables.each(…), or tables(…) in a cell, gives them one by one");
    }

    /** One column of verdicts if all curves have the same, else one for each curve; none if there is nothing to say. */
    private static Table withVerdicts(Table table, List<Curve> curves) {
        if (!table.containsColumn(VerdictText.HEADING)) {
            return table;
        }
        table.removeColumns(VerdictText.HEADING);
        boolean same = curves.stream().map(Curve::verdicts).distinct().count() == 1;
        for (Curve curve : same ? curves.subList(0, 1) : curves) {
            String heading =
                    same ? VerdictText.HEADING : VerdictText.heading(curve.y().quantity());
            table.addColumns(
                    StringColumn.create(heading, curve.verdicts().stream().map(Verdict::text)));
        }
        return table;
    }

    /** The tables of the measurement, in SI. */
    public static List<Table> each(Measurement measurement) {
        return measurement.rows().stream().map(Tables::of).toList();
    }

    private static Table stacked(FrequencySweep sweep) {
        Curve storage = sweep.storage();
        Curve loss = sweep.loss();
        List<String> kinds = Stream.concat(
                        storage.verdicts().stream().map(v -> "storage"),
                        loss.verdicts().stream().map(v -> "loss"))
                .toList();
        List<String> verdicts = Stream.concat(storage.verdicts().stream(), loss.verdicts().stream())
                .map(Verdict::text)
                .toList();
        Table table = Table.create(
                sweep.conditions().sample(),
                StringColumn.create("quantity", kinds),
                DoubleColumn.create(
                        "ω [rad/s]", join(storage.x().toArray(), loss.x().toArray())),
                DoubleColumn.create(
                        "modulus [Pa]", join(storage.y().toArray(), loss.y().toArray())));
        return verdicts.stream().allMatch(String::isEmpty)
                ? table
                : table.addColumns(StringColumn.create(VerdictText.HEADING, verdicts));
    }

    private static double[] join(double[] first, double[] second) {
        return DoubleStream.concat(Arrays.stream(first), Arrays.stream(second)).toArray();
    }

    /**
     * The frequency sweep in a table whose headings name quantity and unit, as in a file: {@code ω [rad/s]},
     * {@code G' [kPa]}, {@code G'' [kPa]}, or {@code quantity}, {@code ω [rad/s]}, {@code modulus [Pa]}. Verdicts,
     * as {@link #of(Measurement)} writes them, are honoured.
     *
     * @throws RangeException                    if a column is missing or does not hold numbers
     * @throws org.meltbook.units.UnitException if a unit is missing, unknown or of the wrong kind
     */
    public static FrequencySweep frequencySweep(Table table, Conditions conditions) {
        return frequencySweep(table, conditions, Vocabulary.standard());
    }

    /** The frequency sweep in a table whose headings mean what the vocabulary says. */
    public static FrequencySweep frequencySweep(Table table, Conditions conditions, Vocabulary vocabulary) {
        TableReading reading = new TableReading(table, conditions, vocabulary);
        FrequencySweep sweep = reading.frequencySweep();
        return FrequencySweep.of(
                conditions, reading.judged(sweep.storage()), reading.judged(sweep.loss()), sweep.trail());
    }

    /**
     * The flow curve in a table whose headings name quantity and unit, as in a file: any two of shear rate, shear
     * stress and viscosity, with the first normal stress difference where it is there. Verdicts, as
     * {@link #of(Measurement)} writes them, are honoured.
     *
     * @throws RangeException                    if a column is missing or does not hold numbers
     * @throws org.meltbook.units.UnitException if a unit is missing, unknown or of the wrong kind
     */
    public static FlowCurve flowCurve(Table table, Conditions conditions) {
        return flowCurve(table, conditions, Vocabulary.standard());
    }

    /** The flow curve in a table whose headings mean what the vocabulary says. */
    public static FlowCurve flowCurve(Table table, Conditions conditions, Vocabulary vocabulary) {
        TableReading reading = new TableReading(table, conditions, vocabulary);
        FlowCurve curve = reading.flowCurve();
        return FlowCurve.of(
                conditions,
                reading.judged(curve.stress()),
                reading.judged(curve.viscosity()),
                curve.firstNormalStress().map(reading::judged),
                curve.trail());
    }
}
