package org.meltbook.base;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;

class DoublesTest {
    @Test
    void nobody_can_change_the_numbers_from_outside() {
        double[] source = {1, 2};
        Doubles numbers = Doubles.of(source);
        source[0] = 9;
        numbers.toArray()[1] = 9;
        assertEquals(Doubles.of(1, 2), numbers);
        assertEquals(Doubles.of(1, 2).hashCode(), numbers.hashCode());
        assertNotEquals(Doubles.of(1, 3), numbers);
        assertEquals(Doubles.of(Double.NaN), Doubles.of(Double.NaN));
    }

    /** Equal ratios by definition of log spacing; the ends are exact. */
    @Test
    void log_spacing_has_equal_ratios_and_exact_ends() {
        Doubles spaced = Doubles.logSpaced(0.01, 1000, 11);
        assertEquals(0.01, spaced.at(0), 0);
        assertEquals(1000, spaced.at(10), 0);
        for (int i = 1; i < spaced.size(); i++) {
            assertEquals(Math.sqrt(10), spaced.at(i) / spaced.at(i - 1), 1e-13);
        }
        assertThrows(RangeException.class, () -> Doubles.logSpaced(0, 1, 3));
        assertThrows(RangeException.class, () -> Doubles.logSpaced(Double.NaN, 1, 3));
        assertThrows(RangeException.class, () -> Doubles.logSpaced(1, 2, 1));
    }

    @Test
    void smallest_and_largest_pass_over_NaN() {
        Doubles numbers = Doubles.of(3, Double.NaN, -1);
        assertEquals(-1, numbers.smallest(), 0);
        assertEquals(3, numbers.largest(), 0);
        assertTrue(Double.isNaN(Doubles.of().smallest()));
        assertTrue(Doubles.of().isEmpty());
    }

    @Test
    void picks_and_maps_into_new_lists() {
        Doubles numbers = Doubles.of(1, 2, 3);
        assertEquals(Doubles.of(3, 1), numbers.pick(2, 0));
        assertEquals(Doubles.of(2, 4, 6), numbers.map(v -> 2 * v));
        assertEquals(6, numbers.stream().sum(), 0);
        assertEquals(Doubles.of(1, 2, 3), numbers);
        assertEquals("[1.000, 2.000, 3.000]", numbers.toString());
    }
}
