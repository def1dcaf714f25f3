package org.meltbook.table;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Series;
import org.meltbook.measure.Verdict;
import org.meltbook.units.Quantity;
import org.meltbook.units.UnitException;
import tech.tablesaw.api.DoubleColumn;
import tech.tablesaw.api.IntColumn;
import tech.tablesaw.api.StringColumn;
import tech.tablesaw.api.Table;

class TablesTest {
    private static final Conditions CONDITIONS = Conditions.of("QB-40 (invented)", "made in the test");

    @Test
    void rows_become_columns_with_the_unit_in_the_heading() {
        Rows rows = Rows.titled("Modes")
                .numbers("λ", "s", 1, Double.NaN)
                .text("note", List.of("a", ""))
                .build();
        Table table = Tables.of(rows);
        assertEquals("Modes", table.name());
        assertEquals(List.of("λ [s]", "note"), table.columnNames());
        assertEquals(1, table.doubleColumn("λ [s]").getDouble(0), 0);
        assertTrue(table.doubleColumn("λ [s]").isMissing(1));
        assertEquals("a", table.stringColumn("note").get(0));
    }

    @Test
    void columns_that_differ_in_case_alone_both_stay() {
        Table table = Tables.of(
                Rows.titled("x").numbers("n", "", 1).numbers("N", "", 2).build());
        assertEquals(List.of("n", "N (2)"), table.columnNames());
    }

    @Test
    void a_sweep_comes_back_from_its_table_as_it_was() {
        Random random = new Random(11);
        double[] frequencies = random.doubles(40, 1e-2, 1e2).sorted().toArray();
        frequencies[3] = -1;
        frequencies[4] = Double.NaN;
        FrequencySweep sweep = FrequencySweep.of(
                CONDITIONS,
                judged(
                        curve(frequencies, Quantity.STORAGE_MODULUS, random),
                        7,
                        Verdict.unusable("below the torque floor")),
                judged(curve(frequencies, Quantity.LOSS_MODULUS, random), 8, Verdict.doubtful("edge looked rough")),
                List.of());
        FrequencySweep back = Tables.frequencySweep(Tables.of(sweep), CONDITIONS);
        assertSame(sweep.storage(), back.storage());
        assertSame(sweep.loss(), back.loss());
    }

    @Test
    void a_sweep_with_frequencies_of_their_own_comes_back_from_its_table_as_it_was() {
        Random random = new Random(12);
        FrequencySweep sweep = FrequencySweep.of(
                CONDITIONS,
                judged(curve(new double[] {1, 2, 3}, Quantity.STORAGE_MODULUS, random), 1, Verdict.unusable("no: why")),
                curve(new double[] {0.5, 5}, Quantity.LOSS_MODULUS, random),
                List.of());
        Table table = Tables.of(sweep);
        assertEquals(List.of("quantity", "ω [rad/s]", "modulus [Pa]", "verdict"), table.columnNames());
        assertEquals(5, table.rowCount());
        FrequencySweep back = Tables.frequencySweep(table, CONDITIONS);
        assertSame(sweep.storage(), back.storage());
        assertSame(sweep.loss(), back.loss());
        assertEquals(2, Tables.each(sweep).size());
    }

    @Test
    void a_flow_curve_comes_back_from_its_table_as_it_was() {
        FlowCurve plain = FlowCurve.ofStress(CONDITIONS, new double[] {0.1, 1, 10}, new double[] {123.4, 999, 5000});
        Curve normal = Curve.of(plain.stress().x(), Series.of(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE, 1, 20, 3000));
        FlowCurve curve = FlowCurve.of(
                CONDITIONS,
                judged(plain.stress(), 0, Verdict.doubtful("not yet steady")),
                judged(plain.viscosity(), 0, Verdict.doubtful("not yet steady")),
                Optional.of(normal),
                List.of());
        FlowCurve back = Tables.flowCurve(Tables.of(curve), CONDITIONS);
        assertSame(curve.stress(), back.stress());
        assertSame(curve.viscosity(), back.viscosity());
        assertSame(normal, back.firstNormalStress().orElseThrow());
    }

    @Test
    void a_table_made_elsewhere_is_read_by_its_headings() {
        Table table = Table.create(
                "from elsewhere",
                DoubleColumn.create("Frequency [Hz]", 1, 2),
                IntColumn.create(
                        "G' [kPa]",
                        new int[] {3, IntColumn.create("x").appendMissing().getInt(0)}),
                DoubleColumn.create("G'' [Pa]", 5, 6),
                StringColumn.create("operator", "J.", "J."));
        FrequencySweep sweep = Tables.frequencySweep(table, CONDITIONS);
        assertEquals(4 * Math.PI, sweep.loss().x().at(1), 1e-15);
        assertEquals(3000, sweep.storage().y().at(0), 0);
        assertTrue(Double.isNaN(sweep.storage().y().at(1)), "a missing value is NaN");
        assertEquals(
                "storage modulus is not a number",
                sweep.storage().verdicts().get(1).reason());
        assertEquals(Verdict.SOUND, sweep.loss().verdicts().get(1));
    }

    @Test
    void a_table_that_is_not_one_of_measurements_is_refused_by_column() {
        Table text =
                Table.create("t", StringColumn.create("shear rate [1/s]", "1"), DoubleColumn.create("η [Pa·s]", 1));
        String message = assertThrows(RangeException.class, () -> Tables.flowCurve(text, CONDITIONS))
                .getMessage();
        assertEquals("table 't', column 'shear rate [1/s]': expected numbers, found STRING", message);
        Table bare = Table.create("t", DoubleColumn.create("shear rate", 1), DoubleColumn.create("η [Pa·s]", 1));
        assertThrows(UnitException.class, () -> Tables.flowCurve(bare, CONDITIONS));
        Table little = Table.create("t", DoubleColumn.create("η [Pa·s]", 1));
        assertThrows(RangeException.class, () -> Tables.flowCurve(little, CONDITIONS));
        Table kinds = Table.create(
                "t",
                StringColumn.create("quantity", "lost"),
                DoubleColumn.create("ω [rad/s]", 1),
                DoubleColumn.create("modulus [Pa]", 1));
        assertTrue(assertThrows(RangeException.class, () -> Tables.frequencySweep(kinds, CONDITIONS))
                .getMessage()
                .contains("row 1, column 'quantity': expected storage or loss, found 'lost'"));
    }

    @Test
    void a_flow_curve_whose_normal_stresses_have_rates_of_their_own_makes_two_tables() {
        FlowCurve plain = FlowCurve.ofStress(CONDITIONS, new double[] {1, 2}, new double[] {3, 4});
        Curve normal =
                Curve.of(Series.of(Quantity.SHEAR_RATE, 5), Series.of(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE, 6));
        FlowCurve curve = FlowCurve.of(CONDITIONS, plain.stress(), plain.viscosity(), Optional.of(normal), List.of());
        String message =
                assertThrows(RangeException.class, () -> Tables.of(curve)).getMessage();
        assertEquals(
                "flow curve of 'QB-40 (invented)' makes 2 tables, because not all of its curves share their shear rate"
                        + " values: Tables.each(…), or tables(…) in a cell, gives them one by one",
                message);
        assertEquals(2, Tables.each(curve).size());
    }

    private static Curve curve(double[] frequencies, Quantity modulus, Random random) {
        double[] values = random.doubles(frequencies.length, 1, 1e6).toArray();
        return Curve.of(Series.of(Quantity.ANGULAR_FREQUENCY, frequencies), Series.of(modulus, values));
    }

    /** The curve as intake would judge it, with one more verdict. */
    private static Curve judged(Curve curve, int at, Verdict verdict) {
        List<Verdict> verdicts = new ArrayList<>();
        for (int row = 0; row < curve.size(); row++) {
            double x = curve.x().at(row);
            String label = curve.x().quantity().label();
            verdicts.add(
                    row == at
                            ? verdict
                            : x < 0
                                    ? Verdict.unusable(label + " −1.000 rad/s is negative")
                                    : Double.isNaN(x) ? Verdict.unusable(label + " is not a number") : Verdict.SOUND);
        }
        return new Curve(curve.x(), curve.y(), verdicts);
    }

    private static void assertSame(Curve expected, Curve found) {
        assertEquals(expected.x().values(), found.x().values());
        assertEquals(expected.y().values(), found.y().values());
        assertEquals(expected.verdicts(), found.verdicts());
    }
}
