package org.meltbook.intake;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Locale;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class CellNumberTest {
    /** The JDK's own reader of decimal numbers rounds correctly: agreement is to the last bit. */
    @Test
    void agrees_with_the_JDK_to_the_last_bit() {
        Random random = new Random(20260101);
        CellNumber point = new CellNumber(new DecimalSign('.', false));
        CellNumber comma = new CellNumber(new DecimalSign(',', false));
        for (int i = 0; i < 200_000; i++) {
            String text = written(random);
            assertTrue(point.read(text), text);
            assertEquals(Double.parseDouble(text), point.value(), 0, text);
            assertTrue(comma.read(text.replace('.', ',')), text);
            assertEquals(Double.parseDouble(text), comma.value(), 0, text);
        }
    }

    private static String written(Random random) {
        double value = (random.nextDouble() - 0.5) * Math.pow(10, random.nextInt(40) - 20);
        return switch (random.nextInt(5)) {
            case 0 -> Double.toString(value);
            case 1 -> String.format(Locale.ROOT, "%.4e", value);
            case 2 -> String.format(Locale.ROOT, "%.6f", value);
            case 3 -> Double.toString(Double.longBitsToDouble(random.nextLong() & 0x7fdfffffffffffffL));
            default -> Long.toString(random.nextLong());
        };
    }

    @ParameterizedTest
    @CsvSource({"1.50, 3", "0.0050, 2", "42100, 3", "42100.0, 6", "1e5, 1", "1.10e+05, 3", "-7, 1", "100.25, 5"})
    void counts_the_digits_that_were_surely_measured(String text, int digits) {
        CellNumber number = new CellNumber(new DecimalSign('.', false));
        assertTrue(number.read(text));
        assertEquals(digits, number.digits());
    }

    @ParameterizedTest
    @CsvSource({"'1,234', 1234", "'12,345,678.5', 12345678.5", "'-1,000', -1000", "123.5, 123.5"})
    void reads_groups_of_three(String text, double expected) {
        CellNumber number = new CellNumber(new DecimalSign('.', true));
        assertTrue(number.read(text));
        assertEquals(expected, number.value(), 0);
    }

    @ParameterizedTest
    @CsvSource({"'1,23'", "'1234,567'", "',123'", "'1,2345'", "'1,234,5'", "'1.5,000'", "'1,,234'"})
    void refuses_groups_of_another_size(String text) {
        assertEquals(false, new CellNumber(new DecimalSign('.', true)).read(text));
    }
}
