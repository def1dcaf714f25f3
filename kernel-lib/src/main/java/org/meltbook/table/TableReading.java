package org.meltbook.table;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.Predicate;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Heading;
import org.meltbook.measure.Readings;
import org.meltbook.measure.Verdict;
import org.meltbook.measure.Vocabulary;
import org.meltbook.units.Quantity;
import tech.tablesaw.api.NumericColumn;
import tech.tablesaw.api.Table;
import tech.tablesaw.columns.Column;

/** Finds the columns of a measurement in a table by their headings. */
final class TableReading {
    private static final List<Quantity> STEADY_SHEAR = List.of(
            Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS, Quantity.VISCOSITY, Quantity.FIRST_NORMAL_STRESS_DIFFERENCE);

    private final Table table;
    private final Conditions conditions;
    private final Vocabulary vocabulary;
    private final List<Heading> headings = new ArrayList<>();

    TableReading(Table table, Conditions conditions, Vocabulary vocabulary) {
        this.table = table;
        this.conditions = conditions;
        this.vocabulary = vocabulary;
        table.columnNames().forEach(name -> headings.add(Heading.of(name, vocabulary)));
    }

    FlowCurve flowCurve() {
        return readings(STEADY_SHEAR, allRows()).flowCurve();
    }

    FrequencySweep frequencySweep() {
        if (!isLong()) {
            return readings(
                            List.of(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS, Quantity.LOSS_MODULUS),
                            allRows())
                    .frequencySweep();
        }
        return Readings.frequencySweep(modulus(Quantity.STORAGE_MODULUS), modulus(Quantity.LOSS_MODULUS));
    }

    /** The curve with what the table says of its rows; a row of which it says nothing keeps the verdict it has. */
    Curve judged(Curve curve) {
        Quantity quantity = curve.y().quantity();
        Optional<Heading> own = heading(h -> h.isNamed(VerdictText.heading(quantity)));
        Optional<Heading> any = own.or(() -> heading(h -> h.isNamed(VerdictText.HEADING)));
        if (any.isEmpty()) {
            return curve;
        }
        Column<?> cells = table.column(headings.indexOf(any.get()));
        int[] rows = isLong() && isModulus(quantity) ? rowsOf(quantity) : allRows();
        List<Verdict> verdicts = new ArrayList<>();
        for (int i = 0; i < rows.length; i++) {
            Verdict said = VerdictText.parse(cells.getString(rows[i]));
            verdicts.add(said.equals(Verdict.SOUND) ? curve.verdicts().get(i) : said);
        }
        return new Curve(curve.x(), curve.y(), verdicts);
    }

    private static boolean isModulus(Quantity quantity) {
        return quantity == Quantity.STORAGE_MODULUS || quantity == Quantity.LOSS_MODULUS;
    }

    private boolean isLong() {
        return heading(h -> h.isNamed("quantity")).isPresent()
                && heading(h -> h.isNamed("modulus")).isPresent();
    }

    private Readings modulus(Quantity kind) {
        int[] rows = rowsOf(kind);
        Heading heading = heading(h -> h.isNamed("modulus")).orElseThrow();
        return readings(List.of(Quantity.ANGULAR_FREQUENCY), rows)
                .with(kind, heading.measuring(kind).unit(), numbers(heading, rows));
    }

    private Readings readings(List<Quantity> wanted, int[] rows) {
        Readings readings = Readings.of("table", conditions);
        for (Heading heading : headings) {
            if (heading.quantity().filter(wanted::contains).isPresent()) {
                readings = readings.with(heading.quantity().get(), heading.unit(), numbers(heading, rows));
            }
        }
        return readings;
    }

    private Optional<Heading> heading(Predicate<Heading> which) {
        return headings.stream().filter(which).findFirst();
    }

    private int[] allRows() {
        return IntStream.range(0, table.rowCount()).toArray();
    }

    private int[] rowsOf(Quantity kind) {
        Column<?> kinds = table.column(
                headings.indexOf(heading(h -> h.isNamed("quantity")).orElseThrow()));
        for (int row = 0; row < table.rowCount(); row++) {
            Optional<Quantity> named = vocabulary.quantity(kinds.getString(row));
            if (named.filter(TableReading::isModulus).isEmpty()) {
                throw new RangeException("table '" + table.name() + "', row " + (row + 1)
                        + ", column 'quantity': expected" + " storage or loss, found '" + kinds.getString(row) + "'");
            }
        }
        return IntStream.range(0, table.rowCount())
                .filter(row -> vocabulary.quantity(kinds.getString(row)).get() == kind)
                .toArray();
    }

    /** The numbers of a column at the given rows; a missing value is NaN. */
    private Doubles numbers(Heading heading, int[] rows) {
        Column<?> column = table.column(headings.indexOf(heading));
        if (column instanceof NumericColumn<?> numbers) {
            return Doubles.of(IntStream.of(rows).mapToDouble(numbers::getDouble).toArray());
        }
        throw new RangeException("table '" + table.name() + "', column '" + heading.text()
                + "': expected numbers, found " + column.type().name());
    }
}
