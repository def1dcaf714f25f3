package org.meltbook.units;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.RangeException;

class PredictionTest {
    private static final Prediction INSIDE = Prediction.of("viscosity", Quantity.VISCOSITY, 200, 180, 220);

    @Test
    void an_extrapolated_number_keeps_value_interval_and_cautions_and_says_why() {
        Prediction beyond = INSIDE.minding("one lot").extrapolated("a decade above the highest rate");
        assertEquals(Prediction.Standing.EXTRAPOLATED, beyond.standing());
        assertEquals(200, beyond.value());
        assertEquals(180, beyond.low());
        assertEquals(220, beyond.high());
        assertEquals(List.of("one lot", "a decade above the highest rate"), beyond.cautions());
        assertTrue(beyond.toString().contains("(extrapolated)"), beyond.toString());
        assertEquals(Prediction.Standing.WITHIN_WINDOW, INSIDE.standing());
    }

    @ParameterizedTest
    @ValueSource(doubles = {Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY})
    void refuses_to_call_a_number_what_is_none(double none) {
        assertThrows(RangeException.class, () -> Prediction.of("viscosity", Quantity.VISCOSITY, none, 1, 2));
    }

    @Test
    void a_bound_is_no_number_to_extrapolate() {
        Prediction bound = Prediction.atLeast("viscosity", Quantity.VISCOSITY, 100, "no plateau");
        assertThrows(RangeException.class, () -> bound.extrapolated("too far"));
    }

    @Test
    void a_ratio_shows_no_dash_for_the_symbol_it_does_not_have() {
        assertEquals(
                "stress exponent = 1.060 (95 %: 1.050 to 1.070)",
                Prediction.of("stress exponent", Quantity.RATIO, 1.06, 1.05, 1.07)
                        .toString());
        assertTrue(INSIDE.toString().startsWith("viscosity η = 200"), INSIDE.toString());
    }

    @Test
    void a_bound_reads_as_a_sentence() {
        assertEquals(
                "viscosity at least 100.0 Pa·s: no plateau",
                Prediction.atLeast("viscosity", Quantity.VISCOSITY, 100, "no plateau")
                        .toString());
        assertEquals(
                "viscosity not determined: rising",
                Prediction.undetermined("viscosity", Quantity.VISCOSITY, "rising")
                        .toString());
    }
}
