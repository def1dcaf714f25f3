package org.meltbook.measure;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.meltbook.units.Quantity;
import org.meltbook.units.UnitException;

class HeadingTest {
    @ParameterizedTest
    @CsvSource(
            delimiter = ';',
            quoteCharacter = '~',
            value = {
                "ω [rad/s]; ω; ANGULAR_FREQUENCY; rad/s",
                "Angular_Frequency (1/s); Angular_Frequency; ANGULAR_FREQUENCY; 1/s",
                "G' [Pa]; G'; STORAGE_MODULUS; Pa",
                "G′ [Pa]; G′; STORAGE_MODULUS; Pa",
                "G'' [kPa]; G''; LOSS_MODULUS; kPa",
                "G″ (Pa); G″; LOSS_MODULUS; Pa",
                "G\"[Pa]; G\"; LOSS_MODULUS; Pa",
                "tan(δ) [1]; tan(δ); LOSS_TANGENT; 1",
                "tan(delta) (-); tan(delta); LOSS_TANGENT; -",
                "γ̇ [1/s]; γ̇; SHEAR_RATE; 1/s",
                "N_1 [Pa]; N_1; FIRST_NORMAL_STRESS_DIFFERENCE; Pa",
                "N₁ [Pa]; N₁; FIRST_NORMAL_STRESS_DIFFERENCE; Pa",
                "SHEAR RATE [1/s]; SHEAR RATE; SHEAR_RATE; 1/s",
                "T [°C]; T; TEMPERATURE; °C",
                "t [s]; t; TIME; s",
                "|η*| (Pa·s); |η*|; COMPLEX_VISCOSITY; Pa·s"
            })
    void splits_name_from_unit_and_knows_the_name(String text, String name, Quantity quantity, String unit) {
        Heading heading = Heading.of(text, Vocabulary.standard());
        assertEquals(new Heading(text, name, Optional.of(quantity), Optional.of(unit)), heading);
        assertEquals(unit, heading.unit().text());
    }

    @Test
    void case_tells_symbols_apart_and_not_words() {
        assertEquals(Optional.of(Quantity.TEMPERATURE), Vocabulary.standard().quantity("T"));
        assertEquals(Optional.of(Quantity.TIME), Vocabulary.standard().quantity("t"));
        assertEquals(Optional.of(Quantity.TIME), Vocabulary.standard().quantity("TIME"));
        assertEquals(Optional.empty(), Vocabulary.standard().quantity("g'"));
    }

    @Test
    void a_symbol_that_two_quantities_share_names_neither() {
        assertEquals(Quantity.TORQUE.symbol(), Quantity.MOLAR_MASS.symbol());
        assertEquals(Optional.empty(), Vocabulary.standard().quantity("M"));
    }

    @Test
    void a_heading_without_unit_or_quantity_says_so() {
        Heading bare = Heading.of("viscosity", Vocabulary.standard());
        assertTrue(assertThrows(UnitException.class, bare::unit).getMessage().contains("'viscosity' has no unit"));
        assertEquals("mPa·s", bare.in("mPa·s").unit().text());
        Heading strange = Heading.of("goo [Pa]", Vocabulary.standard());
        assertTrue(assertThrows(UnitException.class, strange::unit).getMessage().contains("no known quantity"));
    }

    @Test
    void a_plain_frequency_per_second_leaves_a_choice_and_is_refused() {
        Heading plain = Heading.of("frequency [1/s]", Vocabulary.standard());
        assertTrue(assertThrows(UnitException.class, plain::unit).getMessage().contains("Hz or rad/s"));
        assertEquals(
                "Hz", Heading.of("frequency [Hz]", Vocabulary.standard()).unit().text());
        assertEquals(
                "rad/s", Heading.of("f [rad/s]", Vocabulary.standard()).unit().text());
        assertEquals("1/s", Heading.of("ω [1/s]", Vocabulary.standard()).unit().text());
    }

    @Test
    void a_new_name_stands_before_an_older_meaning_and_leaves_the_standard_as_it_is() {
        Vocabulary mine = Vocabulary.standard()
                .with("Speichermodul", Quantity.STORAGE_MODULUS)
                .with("γ", Quantity.RATIO);
        assertEquals(Optional.of(Quantity.STORAGE_MODULUS), mine.quantity("speicher-modul"));
        assertEquals(Optional.of(Quantity.RATIO), mine.quantity("γ"));
        assertEquals(Optional.of(Quantity.SHEAR_STRAIN), Vocabulary.standard().quantity("γ"));
    }

    @ParameterizedTest
    @EnumSource(Quantity.class)
    void each_quantity_is_known_by_its_own_heading(Quantity quantity) {
        Heading heading = Heading.of(quantity.label() + " [" + quantity.siUnit() + "]", Vocabulary.standard());
        assertEquals(Optional.of(quantity), heading.quantity());
        assertEquals(quantity.siUnit(), heading.unit().text());
    }
}
