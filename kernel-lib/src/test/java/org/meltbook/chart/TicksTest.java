package org.meltbook.chart;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** Expected labels are by hand: the round numbers that lie within the range. */
class TicksTest {
    @Test
    void decades_are_written_as_powers_of_ten() {
        assertEquals(List.of("10⁻²", "10⁻¹", "10⁰", "10¹", "10²"), labels(new Scale(4e-3, 300, true)));
    }

    @Test
    void three_decades_of_moderate_numbers_are_written_plainly() {
        assertEquals(List.of("0.1", "1", "10", "100"), labels(new Scale(0.09, 110, true)));
    }

    @Test
    void three_decades_of_large_numbers_are_not_written_plainly() {
        assertEquals(List.of("10⁵", "10⁶", "10⁷"), labels(new Scale(5e4, 2e7, true)));
    }

    @Test
    void an_axis_inside_one_decade_has_labels() {
        assertEquals(List.of("2", "3", "4", "5"), labels(new Scale(2, 5.1, true)));
        assertEquals(List.of("3×10⁶", "4×10⁶", "5×10⁶", "6×10⁶"), labels(new Scale(2.1e6, 6.3e6, true)));
    }

    @Test
    void an_axis_over_a_decade_and_more_is_labelled_at_one_two_and_five() {
        assertEquals(List.of("0.5", "1", "2", "5", "10", "20", "50"), labels(new Scale(0.4, 74, true)));
    }

    @Test
    void an_axis_between_two_neighbouring_digits_has_labels() {
        assertEquals(List.of("2.2", "2.3", "2.4", "2.5", "2.6", "2.7"), labels(new Scale(2.15, 2.78, true)));
    }

    @Test
    void fifteen_decades_are_labelled_at_every_second() {
        List<Tick> ticks = ticks(new Scale(2e-9, 5e6, true), 400);
        assertEquals(
                List.of("10⁻⁸", "10⁻⁶", "10⁻⁴", "10⁻²", "10⁰", "10²", "10⁴", "10⁶"),
                ticks.stream().filter(Tick::labelled).map(Tick::label).toList());
        assertEquals(15, ticks.size(), "one tick a decade: 10⁻⁸ to 10⁶");
    }

    @Test
    void each_decade_has_eight_minor_ticks() {
        List<Tick> ticks = ticks(new Scale(0.99, 10100, true), 600);
        assertEquals(5, ticks.stream().filter(Tick::labelled).count(), "1 to 10⁴");
        assertEquals(4 * 8, ticks.stream().filter(tick -> !tick.labelled()).count());
    }

    @Test
    void a_linear_axis_has_round_steps() {
        assertEquals(List.of("150", "160", "170", "180", "190", "200"), labels(new Scale(146, 204, false)));
        assertEquals(List.of("−1.0", "−0.5", "0", "0.5", "1.0"), labels(new Scale(-1.1, 1.1, false), 250));
    }

    @Test
    void a_linear_axis_of_tiny_numbers_has_labels() {
        assertEquals(List.of("0", "1×10⁻¹²", "2×10⁻¹²", "3×10⁻¹²"), labels(new Scale(-1e-13, 3.1e-12, false), 300));
    }

    @ParameterizedTest
    @CsvSource({
        "1e-300, 1e300, true", "1e-300, 1.1e-300, true", "4.999, 5.001, true", "0.999999, 1.000001, true",
        "-1e300, 1e300, false", "1e15, 1.0000001e15, false", "-1e-300, 1e-300, false", "99999, 100001, false"
    })
    void ticks_rise_within_the_axis_and_their_labels_differ(double min, double max, boolean logarithmic) {
        List<Tick> ticks = ticks(new Scale(min, max, logarithmic), 600);
        List<String> labels =
                ticks.stream().filter(Tick::labelled).map(Tick::label).toList();
        assertTrue(labels.size() >= 2 && labels.size() <= 12, labels.toString());
        assertEquals(labels.size(), labels.stream().distinct().count(), labels.toString());
        for (int i = 0; i < ticks.size(); i++) {
            double value = ticks.get(i).value();
            assertTrue(value >= min && value <= max, "within the axis: " + value);
            assertTrue(i == 0 || value > ticks.get(i - 1).value(), "rising: " + value);
        }
    }

    private static List<String> labels(Scale scale) {
        return labels(scale, 600);
    }

    private static List<String> labels(Scale scale, double length) {
        return ticks(scale, length).stream()
                .filter(Tick::labelled)
                .map(Tick::label)
                .toList();
    }

    private static List<Tick> ticks(Scale scale, double length) {
        return new Ticks(scale, length, label -> 8.0 * label.length()).choose();
    }
}
