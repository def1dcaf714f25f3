package org.meltbook.base;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Locale;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class NumberTextTest {
    /** Expected texts by rule: four significant digits, powers of ten outside 0.001 to 999999. */
    @ParameterizedTest
    @CsvSource({
        "51063.7, 51060",
        "0.01395, 0.01395",
        "0.0000164, 1.640×10⁻⁵",
        "1e6, 1.000×10⁶",
        "999999, 1.000×10⁶",
        "-12.5, −12.50",
        "0, 0",
        "NaN, –",
        "Infinity, ∞",
        "-Infinity, −∞",
        "0.001, 0.001000",
        "0.00099999, 0.001000",
        "1, 1.000",
        "9999.6, 10000",
        "-1.5e-300, −1.500×10⁻³⁰⁰"
    })
    void shows_four_significant_digits(double value, String text) {
        assertEquals(text, NumberText.of(value));
    }

    /** Expected texts by rule: two digits of the error, the same decimals for the value, the unit once. */
    @ParameterizedTest
    @CsvSource({
        "164000, 1200, Pa·s, 164000 ± 1200 Pa·s",
        "1640000, 12000, Pa·s, (1.640 ± 0.012)×10⁶ Pa·s",
        "0.0512, 0.00031, 1, 0.05120 ± 0.00031",
        "12.5, NaN, s, 12.50 ± unknown s",
        "12.5, 0, s, 12.50 ± 0 s",
        "0.9123, 0.05, '', 0.912 ± 0.050"
    })
    void shows_value_and_error_with_matching_digits(double value, double error, String unit, String text) {
        assertEquals(text, NumberText.of(value, error, unit));
    }

    @Test
    void is_never_off_by_more_than_half_a_unit_of_the_fourth_digit() {
        Random random = new Random(4);
        for (int i = 0; i < 2_000; i++) {
            double value = Math.exp(random.nextDouble() * 60 - 30);
            String text = NumberText.of(value);
            String plain = text.contains("×") ? text.substring(0, text.indexOf('×')) : text;
            int exponent = text.contains("×") ? exponent(text.substring(text.indexOf("10") + 2)) : 0;
            double shown = Double.parseDouble(plain + "e" + exponent);
            assertTrue(Math.abs(shown - value) <= 0.50001e-3 * value, text);
        }
    }

    private static int exponent(String raised) {
        StringBuilder plain = new StringBuilder();
        for (char c : raised.replaceAll(".*×10", "").toCharArray()) {
            plain.append(c == '⁻' ? '-' : (char) ('0' + "⁰¹²³⁴⁵⁶⁷⁸⁹".indexOf(c)));
        }
        return Integer.parseInt(plain.toString());
    }

    @Test
    void raises_the_digits_of_a_power() {
        assertEquals("⁻³⁰⁸", NumberText.raised(-308));
        assertEquals("⁰", NumberText.raised(0));
        assertEquals("¹²", NumberText.raised(12));
    }

    @Test
    void reads_the_same_under_every_default_locale() {
        Locale before = Locale.getDefault();
        try {
            Locale.setDefault(Locale.forLanguageTag("ar-EG"));
            assertEquals("1.640×10⁻⁵", NumberText.of(1.64e-5));
            assertEquals("12.50 ± 0.10 s", NumberText.of(12.5, 0.1, "s"));
        } finally {
            Locale.setDefault(before);
        }
    }
}
