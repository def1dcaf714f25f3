package org.meltbook.intake;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTimeout;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.Charset;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.MessageDigest;
import java.time.Duration;
import java.util.HexFormat;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Note;
import org.meltbook.measure.Verdict;
import org.meltbook.units.Quantity;

class IntakeTest {
    private static final Path RESOURCES = Path.of("src/test/resources/intake");

    @TempDir
    Path folder;

    /** Expected numbers: the rows of the file itself, which names its paper. */
    @Test
    void moduli_with_frequencies_of_their_own_make_one_sweep() {
        Intake intake = Exports.read(RESOURCES.resolve("published-moduli.csv"));
        FrequencySweep sweep = intake.frequencySweep();
        assertEquals(12, sweep.storage().size());
        assertEquals(12, sweep.loss().size());
        assertFalse(sweep.sharesFrequencies());
        assertEquals(0.01395, sweep.storage().x().at(0), 0);
        assertEquals(109, sweep.storage().y().at(0), 0);
        assertEquals(0.006778, sweep.loss().x().at(0), 0);
        assertEquals(1111, sweep.loss().y().at(0), 0);
        Conditions conditions = sweep.conditions();
        assertEquals("polystyrene, 290 kg/mol", conditions.sample());
        assertEquals(453.15, conditions.temperature().orElseThrow(), 1e-12);
        assertTrue(conditions.remarks().get("source").startsWith("Schausberger"));
        assertEquals(24, intake.rowsOut());
    }

    /** Expected numbers: the rows of the file itself, which names its data publication. */
    @Test
    void several_loadings_in_one_file_make_one_flow_curve_each() {
        Intake intake = Exports.read(RESOURCES.resolve("published-flow.csv"));
        List<FlowCurve> curves = intake.flowCurves();
        assertEquals(
                List.of(
                        "filled silicone, filler volume fraction 0.0000",
                        "filled silicone, filler volume fraction 0.0707",
                        "filled silicone, filler volume fraction 0.1044"),
                curves.stream().map(c -> c.conditions().sample()).toList());
        assertEquals(42100, curves.get(0).viscosity().y().at(0), 0);
        assertEquals("0.0707", curves.get(1).conditions().remarks().get("filler volume fraction [1]"));
        assertEquals(19, curves.stream().mapToInt(c -> c.stress().size()).sum());
        assertEquals(List.of(), intake.cautions(), "published stress is viscosity times rate within its digits");
        RangeException several = assertThrows(RangeException.class, intake::flowCurve);
        assertTrue(several.getMessage().contains("holds 3 flow curves"), several.getMessage());
        RangeException none = assertThrows(RangeException.class, intake::frequencySweep);
        assertTrue(none.getMessage().contains("no frequency sweep; it holds 3 flow curves"), none.getMessage());
    }

    @Test
    void headings_with_decimal_commas_and_thousands_of_pascal_become_SI() {
        FrequencySweep sweep = read("ω [rad/s];G' [kPa];G'' [kPa]", "0,1;12,5;0,031", "1;1,5E+01;2")
                .frequencySweep();
        assertEquals(
                List.of(0.1, 1.0), sweep.storage().x().values().stream().boxed().toList());
        assertEquals(
                List.of(12500.0, 15000.0),
                sweep.storage().y().values().stream().boxed().toList());
        assertEquals(31, sweep.loss().y().at(0), 1e-14);
        assertEquals("kPa", sweep.loss().y().originalUnit());
        assertTrue(sweep.sharesFrequencies());
        assertTrue(sweep.trail().contains(new Note("intake", "storage modulus came in kPa, × 1000 to Pa")));
    }

    @Test
    void a_unit_row_below_the_header_gives_the_units() {
        FrequencySweep sweep = read(
                        "Frequency\tStorage Modulus\tLoss_modulus\ttan(δ)", "Hz\t[MPa]\t(MPa)\t-", "1\t2\t3\t1.5")
                .frequencySweep();
        assertEquals(2 * Math.PI, sweep.storage().x().at(0), 0);
        assertEquals(2e6, sweep.storage().y().at(0), 0);
        assertEquals(3e6, sweep.loss().y().at(0), 0);
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                "shear rate [1/s],shear stress [Pa] | 2,60",
                "shear rate [1/s],viscosity [Pa·s] | 2,30",
                "shear stress [Pa],viscosity [Pa·s] | 60,30",
                "γ̇ (1/s),σ (Pa) | 2,60",
                "Shear-Rate [s^-1],eta [P] | 2,300"
            })
    void any_two_of_rate_stress_and_viscosity_make_a_flow_curve(String header, String row) {
        FlowCurve curve = read(header, row).flowCurve();
        assertEquals(2, curve.stress().x().at(0), 0);
        assertEquals(60, curve.stress().y().at(0), 0);
        assertEquals(30, curve.viscosity().y().at(0), 0);
        assertTrue(curve.trail().stream().anyMatch(note -> note.text().contains("was not given: computed as")));
    }

    @Test
    void a_normal_stress_difference_comes_along_and_a_negative_one_is_doubtful() {
        FlowCurve curve = read("shear rate [1/s],shear stress [Pa],N1 [kPa]", "1,60,0.2", "2,100,-0.1")
                .flowCurve();
        assertEquals(200, curve.firstNormalStress().orElseThrow().y().at(0), 0);
        assertEquals(
                Verdict.doubtful("first normal stress difference −100.0 Pa is negative"),
                curve.firstNormalStress().get().verdicts().get(1));
        assertEquals(0, curve.stress().setAside());
    }

    /** σ = η γ̇ is the definition of viscosity; 2 × 30 = 60, so that 66 is off by 6/66 = 9.1 %. */
    @Test
    void a_stress_that_is_not_viscosity_times_rate_is_doubtful_and_stays_as_it_is() {
        FlowCurve curve = read(
                        "shear rate [1/s],shear stress [Pa],viscosity [Pa·s]",
                        "2.00,60.0,30.0",
                        "2.00,66.0,30.0",
                        "3.33,99.7,30.0",
                        "2.00,60.1,30.0")
                .flowCurve();
        assertEquals(
                "shear stress is 9.1 % off viscosity × shear rate, where the digits given allow 0.49 %",
                curve.stress().verdicts().get(1).reason());
        assertEquals(66, curve.stress().y().at(1), 0);
        assertEquals(30, curve.viscosity().y().at(1), 0);
        assertTrue(curve.stress().verdicts().get(1).usable());
        assertEquals(Verdict.SOUND, curve.stress().verdicts().get(0));
        assertEquals(Verdict.SOUND, curve.stress().verdicts().get(2), "99.9 rounds to 99.7 within three digits each");
        assertEquals(Verdict.SOUND, curve.stress().verdicts().get(3), "60.1 within three digits each");
    }

    @Test
    void a_column_of_samples_splits_the_file_in_the_order_of_the_file() {
        Intake intake = read(
                "# temperature: 190 °C",
                "sample,shear rate [1/s],viscosity [Pa·s]",
                "B,1,10",
                "A,1,20",
                "B,2,9",
                "A,2,19");
        assertEquals(
                List.of("B", "A"),
                intake.flowCurves().stream().map(c -> c.conditions().sample()).toList());
        assertEquals(
                List.of(10.0, 9.0),
                intake.flowCurves().get(0).viscosity().y().values().stream()
                        .boxed()
                        .toList());
        assertEquals(
                463.15, intake.flowCurves().get(1).conditions().temperature().orElseThrow(), 1e-12);
    }

    @Test
    void any_other_column_splits_the_file_on_demand() throws IOException {
        Path file = file("gap,shear rate [1/s],viscosity [Pa·s]", "0.5,1,10", "1.0,1,20", "0.5,2,9");
        Intake whole = Exports.read(file);
        assertEquals(3, whole.flowCurve().stress().size());
        assertEquals(List.of("column 'gap' is passed over: heading not known"), whole.cautions());
        Intake split = whole.splitBy("gap");
        assertEquals(
                List.of("0.5", "1.0"),
                split.flowCurves().stream().map(c -> c.conditions().sample()).toList());
        IntakeException missing = assertThrows(IntakeException.class, () -> whole.splitBy("lid"));
        assertTrue(missing.getMessage().contains("expected a column named 'lid', found the headings 'gap'"));
        Files.writeString(file, "gap,shear rate [1/s],viscosity [Pa·s]\n0.5,1,11\n");
        IntakeException changed = assertThrows(IntakeException.class, () -> whole.splitBy("gap"));
        assertTrue(changed.getMessage().contains("a changed one"), changed.getMessage());
    }

    @Test
    void a_column_that_is_passed_over_says_why() {
        Path file = file(
                "sample,gap,density [g/cm3],t [s],shear rate [1/s],viscosity [Pa·s]",
                "A,0.5,0.95,1,1,10",
                "A,1.0,0.95,2,1,20");
        assertEquals(
                List.of(
                        "column 'sample' is passed over: the file is split by another column",
                        "column 'density [g/cm3]' is passed over: no measurement is made from density",
                        "column 't [s]' is passed over: no measurement is made from time"),
                Exports.read(file).splitBy("gap").cautions());
    }

    /** Every row of a file with many measurements is looked at a fixed number of times: the limit catches a square. */
    @Test
    void a_file_of_as_many_measurements_as_rows_is_read_in_time() {
        String[] lines = new String[40_001];
        lines[0] = "lot,shear rate [1/s],viscosity [Pa·s]";
        for (int i = 1; i < lines.length; i++) {
            lines[i] = "lot " + i + ",1,10";
        }
        assertTimeout(
                Duration.ofSeconds(20),
                () -> assertEquals(40_000, read(lines).flowCurves().size()));
    }

    @Test
    void moduli_of_several_samples_with_frequencies_of_their_own_stay_apart() {
        Intake intake = read(
                "sample,quantity,ω [rad/s],modulus [kPa]",
                "A,storage,1,2",
                "A,loss,3,4",
                "B,storage,5,6",
                "B,G'',7,8",
                "B,loss modulus,9,10");
        assertEquals(2, intake.frequencySweeps().size());
        FrequencySweep second = intake.frequencySweeps().get(1);
        assertEquals("B", second.conditions().sample());
        assertEquals(6000, second.storage().y().at(0), 0);
        assertEquals(
                List.of(7.0, 9.0), second.loss().x().values().stream().boxed().toList());
    }

    @Test
    void a_steady_temperature_column_is_a_condition_and_a_drifting_one_a_caution() {
        Intake steady = read("T [°C],shear rate [1/s],viscosity [Pa·s]", "179.9,1,10", "180.1,2,9");
        assertEquals(453.15, steady.flowCurve().conditions().temperature().orElseThrow(), 1e-9);
        Intake drifting = read("T [°C],shear rate [1/s],viscosity [Pa·s]", "169.85,1,10", "179.85,2,9");
        assertTrue(drifting.flowCurve().conditions().temperature().isEmpty());
        assertTrue(drifting.cautions().get(0).startsWith("temperature runs from 443.0 to 453.0 K"));
    }

    @Test
    void a_temperature_remark_that_cannot_be_used_is_a_caution() {
        Intake intake = read("# temperature: 180", "shear rate [1/s],viscosity [Pa·s]", "1,10");
        assertTrue(intake.flowCurve().conditions().temperature().isEmpty());
        assertTrue(
                intake.cautions().get(0).startsWith("temperature '180' is not used"),
                intake.cautions().get(0));
        assertEquals("180", intake.flowCurve().conditions().remarks().get("temperature"));
    }

    @Test
    void a_name_the_vocabulary_lacks_is_added_in_one_line() {
        FrequencySweep sweep = Exports.reading(file("ω [rad/s],Speicher [Pa],Verlust [Pa]", "1,2,3"))
                .where("Speicher", Quantity.STORAGE_MODULUS)
                .where("Verlust", Quantity.LOSS_MODULUS)
                .read()
                .frequencySweep();
        assertEquals(2, sweep.storage().y().at(0), 0);
        assertEquals(3, sweep.loss().y().at(0), 0);
    }

    @Test
    void rows_in_are_rows_out_and_rows_set_aside() {
        Intake intake = read("shear rate [1/s];viscosity [Pa·s]", "1;10", ";", "", "2;9", " ; ");
        assertEquals(4, intake.rowsRead());
        assertEquals(2, intake.rowsOut());
        assertEquals(2, intake.rowsSetAside());
        assertEquals("run.csv: 1 flow curve from 4 rows, 2 set aside.", intake.headline());
        Rows decisions = intake.rows().get(0);
        assertTrue(decisions.toString().contains("2: all cells empty in line 3, 6"), decisions.toString());
    }

    @Test
    void the_log_tells_what_was_found_out() throws Exception {
        Path file = file("ω [Hz];G' [kPa];G'' [kPa];operator", "1;0,5;2;7");
        Intake intake = Exports.read(file);
        String digest =
                HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(Files.readAllBytes(file)));
        assertEquals(digest, intake.digest());
        assertEquals(digest, intake.frequencySweep().conditions().digest());
        String decisions = intake.rows().get(0).toString();
        assertTrue(decisions.contains("delimiter              semicolon"), decisions);
        assertTrue(decisions.contains("decimal sign           comma"), decisions);
        assertTrue(decisions.contains(digest.substring(0, 12) + "…"), decisions);
        String columns = intake.rows().get(1).toString();
        assertTrue(columns.contains("× 6.28319 → rad/s"), columns);
        assertTrue(columns.contains("× 1000 → Pa"), columns);
        assertTrue(columns.contains("passed over: heading not known"), columns);
        assertEquals(intake.headline(), intake.toString());
    }

    @ParameterizedTest
    @ValueSource(strings = {"UTF-8", "UTF-16LE", "UTF-16BE"})
    void a_byte_order_mark_gives_the_encoding(String charset) {
        Path file = ExportFile.of(folder, Charset.forName(charset), "\ufeffω [rad/s],G′ [Pa],G″ [Pa]\r\n1,2,3\r\n");
        assertEquals(3, Exports.read(file).frequencySweep().loss().y().at(0), 0);
    }

    @Test
    void text_that_is_not_UTF_8_is_read_as_Latin_1_with_a_caution() {
        Path file = ExportFile.of(folder, StandardCharsets.ISO_8859_1, "shear rate [1/s];viscosity [Pa·s]\n1;2\n");
        Intake intake = Exports.read(file);
        assertEquals(2, intake.flowCurve().viscosity().y().at(0), 0);
        assertTrue(
                intake.cautions().get(0).startsWith("not UTF-8 text"),
                intake.cautions().get(0));
        assertNotEquals("", intake.digest());
    }

    @Test
    void quoted_cells_and_a_typed_double_prime_are_read() {
        FrequencySweep sweep =
                read("\"ω [rad/s]\",G' [Pa],G\" [Pa]", "\"1\",\"2\",3").frequencySweep();
        assertEquals(3, sweep.loss().y().at(0), 0);
    }

    @Test
    void comments_stand_anywhere_and_are_kept() {
        Intake intake = read("# operator: J.", "shear rate [1/s],viscosity [Pa·s]", "1,10", "# pause", "2,9", "# end");
        assertEquals("J.", intake.flowCurve().conditions().remarks().get("operator"));
        assertEquals("pause; end", intake.flowCurve().conditions().remarks().get("remark"));
        assertEquals(2, intake.rowsRead());
    }

    @Test
    void a_file_that_holds_both_tests_gives_both() {
        Intake intake = read("ω [rad/s],G' [Pa],G'' [Pa],shear rate [1/s],viscosity [Pa·s]", "1,2,3,4,5");
        assertEquals("run.csv: 1 frequency sweep and 1 flow curve from 1 rows, none set aside.", intake.headline());
    }

    private Path file(String... lines) {
        return ExportFile.of(folder, lines);
    }

    private Intake read(String... lines) {
        return Exports.read(file(lines));
    }
}
