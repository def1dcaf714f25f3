package org.meltbook.units;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Random;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.junit.jupiter.params.provider.ValueSource;

class LabUnitTest {
    /**
     * Factors of NIST Special Publication 811 (2008), appendix B, quoted from memory: those of bar, poise, inch, kgf,
     * atmosphere, minute and degree are exact there; psi (6.894757 E+03) and lbf (4.448222) are rounded to 7 digits.
     */
    @ParameterizedTest(name = "1 {0} of {1} is {2}")
    @CsvSource(
            delimiter = ';',
            value = {
                "kPa; STORAGE_MODULUS; 1e3; 0",
                "MPa; SHEAR_STRESS; 1e6; 0",
                "bar; PRESSURE; 1e5; 0",
                "atm; PRESSURE; 101325; 0",
                "psi; PRESSURE; 6.894757e3; 1e-7",
                "kgf/cm²; PRESSURE; 9.80665e4; 1e-14",
                "dyn/cm2; SHEAR_STRESS; 0.1; 1e-14",
                "P; VISCOSITY; 0.1; 0",
                "cP; VISCOSITY; 1e-3; 0",
                "mPa·s; VISCOSITY; 1e-3; 0",
                "lbf; NORMAL_FORCE; 4.448222; 1e-7",
                "kgf; NORMAL_FORCE; 9.80665; 1e-14",
                "in; LENGTH; 0.0254; 1e-14",
                "µm; LENGTH; 1e-6; 0",
                "h; TIME; 3600; 0",
                "min; TIME; 60; 0",
                "1/min; SHEAR_RATE; 0.016666666666666666; 1e-15",
                "g/cm³; DENSITY; 1000; 1e-14",
                "g/mol; MOLAR_MASS; 1e-3; 1e-14",
                "°; ANGLE; 0.017453292519943295; 1e-14",
                "%; SHEAR_STRAIN; 0.01; 0",
                "g/10 min; MELT_MASS_FLOW_RATE; 1.6666666666666667e-6; 1e-14",
                "uN.m; TORQUE; 1e-6; 1e-14",
                "1/MPa; COMPLIANCE; 1e-6; 0"
            })
    void converts_by_the_factors_of_NIST_SP_811(String unit, Quantity quantity, double factor, double tolerance) {
        assertEquals(factor, LabUnit.parse(unit).toSi(quantity, 1), tolerance * factor);
    }

    /** One cycle is 2π radians, by definition. */
    @Test
    void one_hertz_of_an_angular_frequency_is_two_pi_radians_per_second() {
        assertEquals(2 * Math.PI, LabUnit.parse("Hz").toSi(Quantity.ANGULAR_FREQUENCY, 1), 0);
        assertEquals(2 * Math.PI / 1000, LabUnit.parse("mHz").toSi(Quantity.ANGULAR_FREQUENCY, 1), 1e-18);
        assertEquals(2 * Math.PI, LabUnit.parse("rpm").toSi(Quantity.ANGULAR_FREQUENCY, 60), 1e-14);
        assertEquals(1, LabUnit.parse("rad/s").toSi(Quantity.ANGULAR_FREQUENCY, 1), 0);
        assertEquals(1, LabUnit.parse("1/s").toSi(Quantity.ANGULAR_FREQUENCY, 1), 0);
    }

    /** Fixed points: 0 °C = 273.15 K and 32 °F = 0 °C, 212 °F = 100 °C, by definition of the scales. */
    @Test
    void converts_temperatures_with_their_zero() {
        assertEquals(453.15, LabUnit.parse("°C").toSi(Quantity.TEMPERATURE, 180), 1e-12);
        assertEquals(273.15, LabUnit.parse("°F").toSi(Quantity.TEMPERATURE, 32), 1e-12);
        assertEquals(373.15, LabUnit.parse("degF").toSi(Quantity.TEMPERATURE, 212), 1e-12);
        assertEquals(180, LabUnit.parse("degC").fromSi(Quantity.TEMPERATURE, 453.15), 1e-12);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {"Pa·s", "Pa.s", "Pa s", "Pa*s", "Pas", "Pa⋅s", "Pa • s", "Pa×s", " Pa·s ", "N·s/m²", "N s/m^2"})
    void reads_every_spelling_of_pascal_second(String spelling) {
        assertEquals(12.5, LabUnit.parse(spelling).toSi(Quantity.VISCOSITY, 12.5), 0);
        assertEquals(spelling.strip(), LabUnit.parse(spelling).text());
    }

    @ParameterizedTest
    @ValueSource(strings = {"1/s", "s^-1", "s⁻¹", "s-1", "/s", "1 / s", "1/sec", "s^{-1}", "s−1"})
    void reads_every_spelling_of_per_second(String spelling) {
        assertEquals(3, LabUnit.parse(spelling).toSi(Quantity.SHEAR_RATE, 3), 0);
    }

    @ParameterizedTest
    @ValueSource(strings = {"°C", "° C", "degC", "deg C", "℃", "Cel"})
    void reads_every_spelling_of_degree_Celsius(String spelling) {
        assertEquals(273.15, LabUnit.parse(spelling).toSi(Quantity.TEMPERATURE, 0), 0);
    }

    @ParameterizedTest
    @ValueSource(strings = {"g/10 min", "g/10min", "g / 10 min", "g/(10 min)", "g/(10.min)", "g/(10·min)"})
    void reads_every_spelling_of_gram_per_ten_minutes(String spelling) {
        assertEquals(1e-3 / 600, LabUnit.parse(spelling).toSi(Quantity.MELT_MASS_FLOW_RATE, 1), 1e-20);
    }

    @ParameterizedTest
    @ValueSource(strings = {"µN·m", "μN·m", "uNm", "µNm", "uN m"})
    void reads_both_micro_signs(String spelling) {
        assertEquals(1e-6, LabUnit.parse(spelling).toSi(Quantity.TORQUE, 1), 1e-20);
    }

    @ParameterizedTest
    @ValueSource(strings = {"", " ", "\u00a0", "\t"})
    void rejects_a_blank_unit(String blank) {
        assertMessage("blank", () -> LabUnit.parse(blank));
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "furlongs",
                "Pa~s",
                "12..",
                "((",
                "Pa·",
                "n.a.",
                "£",
                "Pa/",
                "g per 10 min",
                "1,5",
                "{rpm}",
                "80 °C",
                "0/s",
                "2 Pa"
            })
    void rejects_an_unknown_unit_by_name(String unknown) {
        assertMessage("'" + unknown + "'", () -> LabUnit.parse(unknown));
    }

    /** The UCUM library reads these without complaint as something else. */
    @Test
    void refuses_what_would_be_misread_in_silence() {
        assertMessage("two ways", () -> LabUnit.parse("g/10.min"));
        assertMessage("two ways", () -> LabUnit.parse("W/m.K"));
        assertMessage("two ways", () -> LabUnit.parse("J/kg K"));
        assertMessage("did you mean Pa?", () -> LabUnit.parse("PA").toSi(Quantity.STORAGE_MODULUS, 1));
        assertMessage("electric current", () -> LabUnit.parse("PA").toSi(Quantity.STORAGE_MODULUS, 1));
        assertMessage("did you mean Pa·s?", () -> LabUnit.parse("Pa.S").toSi(Quantity.VISCOSITY, 1));
        assertMessage("electric charge", () -> LabUnit.parse("C").toSi(Quantity.TEMPERATURE, 1));
    }

    @Test
    void refuses_hertz_for_a_shear_rate_and_for_anything_made_of_it() {
        assertMessage("cycles", () -> LabUnit.parse("Hz").toSi(Quantity.SHEAR_RATE, 1));
        assertMessage("angle", () -> LabUnit.parse("rad/s").toSi(Quantity.SHEAR_RATE, 1));
        assertFalse(LabUnit.parse("Pa/Hz").measures(Quantity.VISCOSITY));
        assertFalse(LabUnit.parse("1/Hz").measures(Quantity.TIME));
        assertMessage("turns or radians", () -> LabUnit.parse("1/min").toSi(Quantity.ANGULAR_FREQUENCY, 1));
    }

    @Test
    void tells_shares_by_mass_from_shares_by_volume_and_both_from_angles() {
        assertEquals(0.4, LabUnit.parse("wt%").toSi(Quantity.MASS_FRACTION, 40), 1e-16);
        assertEquals(0.4, LabUnit.parse("vol.-%").toSi(Quantity.VOLUME_FRACTION, 40), 1e-16);
        assertFalse(LabUnit.parse("wt.%").measures(Quantity.VOLUME_FRACTION));
        assertFalse(LabUnit.parse("vol%").measures(Quantity.MASS_FRACTION));
        assertFalse(LabUnit.parse("°").measures(Quantity.SHEAR_STRAIN));
        assertFalse(LabUnit.parse("%").measures(Quantity.ANGLE));
        assertMessage("power of an angle", () -> LabUnit.parse("rad²"));
        assertTrue(LabUnit.parse("-").measures(Quantity.LOSS_TANGENT));
    }

    @Test
    void an_error_names_unit_quantity_kind_and_what_would_do() {
        UnitException refused =
                assertThrows(UnitException.class, () -> LabUnit.parse("kPa").toSi(Quantity.SHEAR_RATE, 1));
        assertEquals(
                "unit 'kPa' cannot measure shear rate: it is a stress, modulus or pressure; units that would do: 1/s, "
                        + "1/min, %/s",
                refused.getMessage());
        assertMessage("density", () -> LabUnit.parse("cSt").toSi(Quantity.VISCOSITY, 1));
    }

    @ParameterizedTest
    @EnumSource(Quantity.class)
    void the_SI_unit_of_each_quantity_leaves_its_numbers_as_they_are(Quantity quantity) {
        assertTrue(LabUnit.parse(quantity.siUnit()).conversion(quantity).isIdentity());
    }

    @ParameterizedTest
    @EnumSource(Quantity.class)
    void each_usual_unit_measures_its_quantity_there_and_back(Quantity quantity) {
        Random random = new Random(811);
        for (String unit : LabUnit.usualFor(quantity)) {
            Conversion conversion = LabUnit.parse(unit).conversion(quantity);
            for (int i = 0; i < 200; i++) {
                double value = Math.exp(random.nextDouble() * 40 - 20);
                // a zero shifted by 273 K costs the digits of a small number: five roundings of the larger one
                double scale = Math.max(value, conversion.offset() * conversion.divisor() / conversion.multiplier());
                assertEquals(value, conversion.fromSi(conversion.toSi(value)), 5 * Math.ulp(scale), unit);
            }
        }
    }

    @Test
    void says_what_a_conversion_does() {
        assertEquals(
                "× 1000", LabUnit.parse("kPa").conversion(Quantity.PRESSURE).toString());
        assertEquals(
                "÷ 1000", LabUnit.parse("mPa·s").conversion(Quantity.VISCOSITY).toString());
        assertEquals(
                "+ 273.15", LabUnit.parse("°C").conversion(Quantity.TEMPERATURE).toString());
        assertEquals(
                "as it is", LabUnit.parse("Pa").conversion(Quantity.PRESSURE).toString());
        assertEquals(
                "× 6.28319",
                LabUnit.parse("Hz").conversion(Quantity.ANGULAR_FREQUENCY).toString());
    }

    @Test
    void divides_once_where_a_factor_has_no_exact_double() {
        assertEquals(12.3 / 1000, LabUnit.parse("mPa·s").toSi(Quantity.VISCOSITY, 12.3), 0);
    }

    /** Whatever stands in a heading, the answer is a unit or the one error: nothing of the library behind shows. */
    @Test
    void any_text_is_a_unit_or_a_unit_error() {
        Random random = new Random(385);
        String letters = "PasmkrdHzCelgNb%°µ·./()[]^-+0123 {}*'\"~_€Ω";
        int known = 0;
        for (int i = 0; i < 3_000; i++) {
            StringBuilder text = new StringBuilder();
            for (int length = 1 + random.nextInt(7); length > 0; length--) {
                text.append(letters.charAt(random.nextInt(letters.length())));
            }
            try {
                LabUnit unit = LabUnit.parse(text.toString());
                known++;
                unit.kind();
                for (Quantity quantity : Quantity.values()) {
                    if (unit.measures(quantity)) {
                        assertTrue(unit.toSi(quantity, 1) > 0, text.toString());
                    }
                }
            } catch (UnitException expected) {
                assertFalse(expected.getMessage().isBlank());
            }
        }
        assertTrue(known > 50, "only " + known + " texts were units: the letters should be chosen anew");
    }

    @Test
    void parses_on_many_threads_at_once() {
        AtomicInteger right = new AtomicInteger();
        IntStream.range(0, 2_000).parallel().forEach(i -> {
            LabUnit unit = LabUnit.parse("mPa.s" + " ".repeat(i % 30));
            right.addAndGet(unit.toSi(Quantity.VISCOSITY, 1000) == 1 ? 1 : 0);
        });
        assertEquals(2_000, right.get());
    }

    private static void assertMessage(String part, org.junit.jupiter.api.function.Executable call) {
        String message = assertThrows(UnitException.class, call).getMessage();
        assertTrue(message.contains(part), message);
    }
}
