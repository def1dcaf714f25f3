package org.meltbook.intake;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTimeout;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.BufferedWriter;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.Verdict;

/** What happens to files that are not as they should be: one clear error, or a flag on the row, never silence. */
class BadInputTest {
    @TempDir
    Path folder;

    @Test
    void a_file_with_no_unit_row_says_how_to_give_units() {
        refused(
                "run.csv:1, column 'shear rate': expected a unit of shear rate in the heading, as in 'shear rate"
                        + " [1/s]', in a row below the header, or in code with Exports.reading(file).unit(\"shear rate\","
                        + " …), found none",
                "shear rate,viscosity",
                "0.1,1000",
                "1,900");
    }

    @Test
    void units_can_be_given_in_code_where_the_file_has_none() {
        FlowCurve curve = Exports.reading(file("shear rate,viscosity", "0.1,1000", "1,900"))
                .unit("shear rate", "1/min")
                .unit("viscosity", "mPa·s")
                .read()
                .flowCurve();
        assertEquals(0.1 / 60, curve.viscosity().x().at(0), 1e-18);
        assertEquals(1, curve.viscosity().y().at(0), 0);
    }

    @Test
    void an_unknown_unit_is_named_with_line_and_column() {
        refused(
                "run.csv:1, column 'viscosity [goo]': expected a unit of viscosity, found 'goo' (unit 'goo' is not"
                        + " known",
                "shear rate [1/s],viscosity [goo]",
                "0.1,1000");
        refused(
                "run.csv:2, column 'viscosity': expected a unit of viscosity, found 'n.a.'",
                "shear rate,viscosity",
                "1/s,n.a.",
                "0.1,1000");
    }

    @Test
    void a_unit_of_the_wrong_kind_says_what_it_is_and_what_would_do() {
        refused(
                "run.csv:1, column 'shear rate [Pa]': expected a unit of shear rate, found 'Pa' (unit 'Pa' cannot"
                        + " measure shear rate: it is a stress, modulus or pressure; units that would do: 1/s, 1/min,"
                        + " %/s)",
                "shear rate [Pa],viscosity [Pa·s]", "0.1,1000");
        refused("it is a count of cycles per time", "shear rate [Hz],viscosity [Pa·s]", "0.1,1000");
        refused("may mean Hz or rad/s", "frequency [1/s],G' [Pa],G'' [Pa]", "1,2,3");
    }

    @Test
    void decimal_commas_are_read_as_such() {
        FlowCurve curve = read("shear rate [1/s];viscosity [Pa·s]", "0,031;12,5", "0,100;1,234")
                .flowCurve();
        assertEquals(
                List.of(0.031, 0.1),
                curve.viscosity().x().values().stream().boxed().toList());
        assertEquals(
                List.of(12.5, 1.234),
                curve.viscosity().y().values().stream().boxed().toList());
    }

    @Test
    void a_comma_with_two_readings_is_refused_with_both() {
        Path file = file("shear rate [1/s];viscosity [Pa·s]", "1;1,234", "2;1,100");
        assertMessage(
                "run.csv:2, column 'viscosity [Pa·s]': expected a decimal sign that is clear, found '1,234', which may"
                        + " mean 1.234 or 1234: say which with Exports.reading(file).decimalComma() or .decimalPoint()",
                () -> Exports.read(file));
        assertEquals(
                1.234,
                Exports.reading(file)
                        .decimalComma()
                        .read()
                        .flowCurve()
                        .viscosity()
                        .y()
                        .at(0),
                0);
        assertEquals(
                1234,
                Exports.reading(file)
                        .decimalPoint()
                        .read()
                        .flowCurve()
                        .viscosity()
                        .y()
                        .at(0),
                0);
    }

    @Test
    void points_and_commas_that_contradict_each_other_are_refused() {
        refused(
                "run.csv:3, column 'viscosity [Pa·s]': expected one decimal sign in the whole file, found '12,5' in"
                        + " line 3 with a comma and '0.1' in line 2 with a point",
                "shear rate [1/s];viscosity [Pa·s]",
                "0.1;1000",
                "1;12,5");
        refused("'1.234', which may mean 1.234 or 1234", "shear rate [1/s];viscosity [Pa·s]", "0,1;1.234");
    }

    @Test
    void groups_of_three_are_read_where_another_cell_proves_them() {
        FlowCurve curve = read("shear rate [1/s];viscosity [Pa·s]", "0.1;1,234.5", "1;1,100")
                .flowCurve();
        assertEquals(
                List.of(1234.5, 1100.0),
                curve.viscosity().y().values().stream().boxed().toList());
        refused(
                "expected a number, found '1,23,456'",
                "shear rate [1/s];viscosity [Pa·s]",
                "0.1;1,234.5",
                "1;1,23,456");
    }

    @Test
    void an_empty_file_is_refused() {
        assertMessage(
                "run.csv: expected a header and rows of numbers, found an empty file",
                () -> Exports.read(ExportFile.of(folder, new byte[0])));
        refused("found 'comment lines only'", "# nothing but", "", "# remarks");
        refused("run.csv: expected", "\ufeff");
    }

    @Test
    void a_header_only_is_refused() {
        refused(
                "run.csv: expected rows of numbers below the header, found a header only",
                "shear rate [1/s],viscosity [Pa·s]");
        refused("found a header only", "shear rate,viscosity", "1/s,Pa·s");
    }

    @Test
    void NaN_zero_and_negative_rates_are_kept_and_flagged() {
        Intake intake =
                read("shear rate [1/s],shear stress [Pa]", "-0.1,-5", "0,0", "NaN,5", "0.1,NaN", "0.2,20", "1,−3");
        FlowCurve curve = intake.flowCurve();
        assertEquals(6, curve.stress().size());
        assertEquals(6, intake.rowsOut());
        List<String> reasons =
                curve.stress().verdicts().stream().map(Verdict::reason).toList();
        assertEquals(
                List.of(
                        "shear rate −0.1000 1/s is negative",
                        "shear rate is zero",
                        "shear rate is not a number",
                        "shear stress is not a number",
                        "",
                        "shear stress −3.000 Pa is negative"),
                reasons);
        assertEquals(1, curve.stress().usable().size());
        assertEquals(-0.1, curve.stress().x().at(0), 0);
        assertEquals(5, curve.stress().setAside());
    }

    @Test
    void an_empty_cell_and_text_in_place_of_a_number_are_errors_with_their_place() {
        refused(
                "run.csv:3, column 'viscosity [Pa·s]': expected a number, found an empty cell (write NaN",
                "shear rate [1/s],viscosity [Pa·s]",
                "0.1,1000",
                "1,");
        refused(
                "run.csv:3, column 'viscosity [Pa·s]': expected a number, found 'n.a.'",
                "shear rate [1/s],viscosity [Pa·s]",
                "0.1,1000",
                "1,n.a.");
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "-",
                "Infinity",
                "0x1p3",
                "1d",
                "1e",
                "1 000",
                "1.2.3",
                "1e999",
                "--1",
                "e5",
                ".",
                "١٢",
                "<b>1</b>"
            })
    void text_that_only_looks_like_a_number_is_an_error(String cell) {
        IntakeException refused = assertThrows(
                IntakeException.class, () -> read("shear rate [1/s];viscosity [Pa·s]", "0.1;1000.5", "1;" + cell));
        assertEquals(3, refused.line());
        assertEquals("viscosity [Pa·s]", refused.column());
        assertEquals("a number", refused.expected());
        assertEquals("'" + cell + "'", refused.found());
    }

    @Test
    void double_headings_and_two_columns_of_one_quantity_are_refused() {
        refused(
                "column 'viscosity [Pa·s]': expected headings that differ, found this heading twice",
                "shear rate [1/s],viscosity [Pa·s],viscosity [Pa·s]",
                "1,2,3");
        refused(
                "column 'η [Pa·s]': expected one column of viscosity, found another one, 'viscosity [Pa·s]'",
                "shear rate [1/s],viscosity [Pa·s],η [Pa·s]",
                "1,2,3");
        refused(
                "expected a heading for each column, found an empty one, the 3.",
                "shear rate [1/s],viscosity [Pa·s],",
                "1,2,3");
    }

    @Test
    void missing_columns_are_named_with_what_is_there() {
        refused(
                "found only shear rate in the headings 'shear rate [1/s]', 'goo [Pa]'",
                "shear rate [1/s],goo [Pa]",
                "1,2");
        refused(
                "or two of shear rate, shear stress and viscosity for a flow curve, or relaxation time and relaxation modulus"
                        + " for a table of Maxwell modes, found none of these in the headings 'a', 'b'",
                "a,b",
                "1,2");
        refused("expected a header that names the columns, found a row of numbers", "0.1,1000", "1,900");
    }

    @Test
    void ragged_rows_are_refused_by_line() {
        refused(
                "run.csv:3: expected 2 cells, as in the header, found 3 cells",
                "shear rate [1/s],viscosity [Pa·s]",
                "0.1,1000",
                "1,900,7");
        refused(
                "run.csv:4: expected 2 cells, as in the header, found 1 cell",
                "shear rate [1/s],viscosity [Pa·s]",
                "0.1,1000",
                "",
                "1");
    }

    @Test
    void a_binary_file_is_refused() {
        byte[] noise = new byte[4096];
        new Random(7).nextBytes(noise);
        assertMessage(
                "run.csv: expected delimited text, found a binary file",
                () -> Exports.read(ExportFile.of(folder, noise)));
        refused("found a binary file (byte 00 at place 6)", "rate,\0viscosity", "1,2");
    }

    @Test
    void a_missing_file_and_a_folder_are_refused() {
        assertMessage("gone.csv: expected a file, found nothing at", () -> Exports.read(folder.resolve("gone.csv")));
        assertMessage("expected a file, found a folder", () -> Exports.read(folder));
    }

    @Test
    void a_wrong_word_in_a_column_of_kinds_is_refused() {
        refused(
                "run.csv:3, column 'quantity': expected storage or loss, found 'lost'",
                "quantity,angular frequency [rad/s],modulus [Pa]",
                "storage,1,2",
                "lost,1,3");
        refused(
                "run.csv, column 'quantity': expected rows of loss modulus, found none",
                "quantity,angular frequency [rad/s],modulus [Pa]",
                "storage,1,2");
    }

    @Test
    void text_that_two_delimiters_cut_equally_well_is_refused() {
        Path file = file("a;b,c;d", "1;2,3;4");
        assertMessage(
                "say which with Exports.reading(file).delimiter",
                () -> Exports.read(ExportFile.of(folder, "a;b,c", "1;2,3")));
        assertMessage(
                "none of these in the headings",
                () -> Exports.reading(file).delimiter(';').read());
        assertMessage(
                "expected a header and rows of two or more cells",
                () -> Exports.read(ExportFile.of(folder, "word", "1")));
    }

    @Test
    void a_first_line_without_end_is_refused() {
        refused("run.csv:1: expected a header, found a line of more than 65536 characters", "x".repeat(70_000));
    }

    @Test
    void html_in_a_cell_is_text_in_the_message() {
        refused("found '<script>'", "shear rate [1/s],viscosity [Pa·s]", "1,<script>");
    }

    @Test
    void an_interrupt_stops_the_reading_and_stays_set() {
        Path file = file("shear rate [1/s],viscosity [Pa·s]", "1,2");
        Thread.currentThread().interrupt();
        assertThrows(InterruptedComputation.class, () -> Exports.read(file));
        assertTrue(Thread.interrupted());
    }

    /** The tests run in a heap of 1 GB. The limit only catches a hang: the usual time is below 3 s. */
    @Test
    void a_50_MB_file_loads_with_every_row() throws IOException {
        Path big = folder.resolve("big.csv");
        long rows = 0;
        try (BufferedWriter out = Files.newBufferedWriter(big, StandardCharsets.UTF_8)) {
            out.write("shear rate [1/s];shear stress [kPa];viscosity [Pa·s]\n");
            for (long written = 0; written < 50_000_000; rows++) {
                String line = "0," + (100_000 + rows) + ";0," + (100_000 + rows) + ";1000,0\n";
                out.write(line);
                written += line.length();
            }
        }
        long expected = rows;
        assertTimeout(Duration.ofSeconds(60), () -> {
            Intake intake = Exports.read(big);
            assertEquals(expected, intake.rowsRead());
            assertEquals(expected, intake.flowCurve().viscosity().size());
            assertEquals(100, intake.flowCurve().stress().y().at(0), 0);
            assertEquals(List.of(), intake.cautions());
        });
    }

    private Path file(String... lines) {
        return ExportFile.of(folder, lines);
    }

    private Intake read(String... lines) {
        return Exports.read(file(lines));
    }

    private void refused(String message, String... lines) {
        assertMessage(message, () -> read(lines));
    }

    private static void assertMessage(String part, org.junit.jupiter.api.function.Executable call) {
        String message = assertThrows(IntakeException.class, call).getMessage();
        assertTrue(message.contains(part), message);
    }
}
