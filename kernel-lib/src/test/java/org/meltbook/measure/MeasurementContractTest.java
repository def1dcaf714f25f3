package org.meltbook.measure;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertNotSame;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;

/**
 * What {@link Measurement} and its exhibit side promise, for each kind of the catalogue, made of all that it uses, and
 * for the forms that a kind has besides.
 */
class MeasurementContractTest {
    private static final Conditions CONDITIONS = new Conditions(
            "QB-40 lot A-00 (invented)", OptionalDouble.of(463.15), "made in the test", "", Map.of("operator", "J."));

    static Stream<Arguments> measurements() {
        Stream<Arguments> kinds = MeasurementKind.all().stream()
                .map(kind -> Arguments.of(kind.made().apply(readings(kind.uses().toArray(Quantity[]::new)))));
        return Stream.concat(kinds, otherForms());
    }

    private static Stream<Arguments> otherForms() {
        return Stream.of(
                Arguments.of(Readings.frequencySweep(
                        readings(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS),
                        shifted(Quantity.ANGULAR_FREQUENCY, Quantity.LOSS_MODULUS))),
                Arguments.of(
                        readings(Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS).flowCurve()),
                Arguments.of(readings(Quantity.SHEAR_RATE, Quantity.VISCOSITY, Quantity.FIRST_NORMAL_STRESS_DIFFERENCE)
                        .flowCurve()));
    }

    private static Readings readings(Quantity... quantities) {
        return columns(Doubles.of(-1, 0, Double.NaN, 0.1, 1, 10), quantities);
    }

    private static Readings shifted(Quantity... quantities) {
        return columns(Doubles.of(0.2, 2, 20), quantities);
    }

    private static Readings columns(Doubles values, Quantity... quantities) {
        Readings readings = Readings.of("test", CONDITIONS);
        for (Quantity quantity : quantities) {
            readings = readings.with(quantity, LabUnit.parse(quantity.siUnit()), values);
        }
        return readings;
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void shows_its_headline_as_text(Measurement measurement) {
        assertEquals(measurement.headline(), measurement.toString());
        assertTrue(measurement.headline().contains("QB-40"), measurement.headline());
        assertTrue(measurement.headline().contains("190.0 °C"), measurement.headline());
        assertTrue(measurement.headline().endsWith("."), measurement.headline());
        assertFalse(measurement.kind().isBlank());
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void keeps_a_verdict_for_every_row_and_shows_every_row(Measurement measurement) {
        int rows = measurement.rows().stream().mapToInt(Rows::size).sum();
        int points = measurement.curves().stream().mapToInt(Curve::size).sum();
        assertTrue(rows > 0 && rows <= points);
        for (Curve curve : measurement.curves()) {
            assertEquals(curve.size(), curve.verdicts().size());
            assertEquals(curve.size(), curve.usable().size() + curve.setAside());
            assertTrue(measurement.rows().stream().anyMatch(table -> table.size() == curve.size()));
        }
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void flags_unusable_rows_and_says_so(Measurement measurement) {
        assertEquals(3, measurement.curves().get(0).setAside());
        assertTrue(measurement.headline().contains("set aside"), measurement.headline());
        assertFalse(measurement.cautions().isEmpty());
        assertTrue(measurement.rows().get(0).column("verdict").text(0).startsWith("unusable: "));
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void cannot_be_changed_from_outside(Measurement measurement) {
        Curve curve = measurement.curves().get(0);
        double before = curve.x().at(3);
        Arrays.fill(curve.x().toArray(), 99);
        Arrays.fill(curve.y().toArray(), 99);
        assertEquals(before, curve.x().at(3), 0);
        assertThrows(
                UnsupportedOperationException.class, () -> measurement.curves().add(curve));
        assertThrows(
                UnsupportedOperationException.class, () -> measurement.trail().add(new Note("a", "b")));
        assertThrows(UnsupportedOperationException.class, () -> curve.verdicts().set(0, Verdict.SOUND));
        assertThrows(
                UnsupportedOperationException.class,
                () -> measurement.conditions().remarks().put("a", "b"));
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void draws_what_is_usable_apart_from_what_is_set_aside(Measurement measurement) {
        assertFalse(measurement.figures().isEmpty());
        measurement
                .figures()
                .forEach(figure -> assertTrue(
                        figure.layers().stream().anyMatch(layer -> layer.name().endsWith("set aside")),
                        figure.toString()));
    }

    /** Of the six x values −1, 0, NaN, 0.1, 1, 10 the last three are usable. */
    @ParameterizedTest
    @MethodSource("measurements")
    void the_headline_gives_the_range_that_can_be_used(Measurement measurement) {
        String from = measurement.curves().stream().anyMatch(curve -> curve.size() == 3)
                ? "0.1000 to 20.00 "
                : "0.1000 to 10.00 ";
        assertTrue(measurement.headline().contains(from), measurement.headline());
    }

    @Test
    void a_measurement_without_a_usable_row_says_so_in_place_of_a_range() {
        FlowCurve none = columns(Doubles.of(-1, Double.NaN), Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS)
                .flowCurve();
        assertTrue(none.headline().contains("2 points, none usable"), none.headline());
    }

    @Test
    void curves_with_the_same_verdicts_share_one_caution_and_others_keep_theirs() {
        FlowCurve alike = readings(Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS).flowCurve();
        assertEquals(
                List.of("shear stress and viscosity: 3 of 6 points unusable, 0 doubtful;"
                        + " the table gives the reason of each"),
                alike.cautions());
        Series rate = Series.of(Quantity.SHEAR_RATE, 1, 2);
        FlowCurve apart = FlowCurve.of(
                CONDITIONS,
                Curve.of(rate, Series.of(Quantity.SHEAR_STRESS, 3, 4)),
                new Curve(
                        rate,
                        Series.of(Quantity.VISCOSITY, 3, 2),
                        List.of(Verdict.SOUND, Verdict.doubtful("not yet steady"))),
                Optional.empty(),
                List.of());
        assertEquals(1, apart.cautions().size());
        assertTrue(apart.cautions().get(0).startsWith("viscosity: 0 of 2 points unusable, 1 doubtful"));
    }

    @Test
    void a_measurement_of_no_named_sample_is_titled_by_its_kind() {
        ModeTable modes = Readings.of("test", Conditions.of("", "made in the test"))
                .with(Quantity.RELAXATION_TIME, LabUnit.parse("s"), Doubles.of(1, 2))
                .with(Quantity.RELAXATION_MODULUS, LabUnit.parse("Pa"), Doubles.of(3, 4))
                .modeTable();
        assertEquals("Modes of table of Maxwell modes", modes.figures().get(0).title());
        assertEquals("table of Maxwell modes", modes.rows().get(0).title());
    }

    @Test
    void one_more_note_makes_a_new_measurement() {
        FlowCurve curve = readings(Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS).flowCurve();
        FlowCurve noted = curve.noted(new Note("test", "looked at"));
        assertNotSame(curve, noted);
        assertEquals(curve.trail().size() + 1, noted.trail().size());
        assertEquals(curve.stress(), noted.stress());
        FrequencySweep sweep = readings(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS, Quantity.LOSS_MODULUS)
                .frequencySweep();
        assertEquals(
                List.of(new Note("test", "looked at")),
                sweep.noted(new Note("test", "looked at")).trail());
        assertEquals(List.of(), sweep.trail());
    }

    @Test
    void curves_of_other_quantities_or_lengths_are_refused() {
        Series rate = Series.of(Quantity.SHEAR_RATE, 1, 2);
        Curve stress = Curve.of(rate, Series.of(Quantity.SHEAR_STRESS, 3, 4));
        assertThrows(RangeException.class, () -> FrequencySweep.of(CONDITIONS, stress, stress, List.of()));
        assertThrows(RangeException.class, () -> FlowCurve.of(CONDITIONS, stress, stress, Optional.empty(), List.of()));
        assertThrows(RangeException.class, () -> Curve.of(rate, Series.of(Quantity.SHEAR_STRESS, 3)));
        Curve elsewhere = Curve.of(Series.of(Quantity.SHEAR_RATE, 1, 3), Series.of(Quantity.VISCOSITY, 3, 4));
        assertThrows(
                RangeException.class, () -> FlowCurve.of(CONDITIONS, stress, elsewhere, Optional.empty(), List.of()));
    }

    @Test
    void a_flow_curve_of_sound_points_takes_no_others() {
        for (double wrong : new double[] {0, -1, Double.NaN, Double.POSITIVE_INFINITY}) {
            double[] one = {1};
            double[] other = {wrong};
            assertThrows(RangeException.class, () -> FlowCurve.ofStress(CONDITIONS, one, other));
            assertThrows(RangeException.class, () -> FlowCurve.ofStress(CONDITIONS, other, one));
        }
        assertThrows(RangeException.class, () -> FlowCurve.ofStress(CONDITIONS, new double[] {1, 2}, new double[] {1}));
    }

    @Test
    void a_temperature_at_or_below_absolute_zero_is_refused() {
        assertThrows(RangeException.class, () -> Conditions.of("x", "y").at(0));
        assertThrows(RangeException.class, () -> Conditions.of("x", "y").at(Double.NaN));
    }

    @Test
    void frequencies_of_a_sweep_are_the_usable_ones_of_both_moduli_rising() {
        FrequencySweep sweep = Readings.frequencySweep(
                readings(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS),
                shifted(Quantity.ANGULAR_FREQUENCY, Quantity.LOSS_MODULUS));
        assertEquals(Doubles.of(0.1, 0.2, 1, 2, 10, 20), sweep.frequencies());
    }
}
