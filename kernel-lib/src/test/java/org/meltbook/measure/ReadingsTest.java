package org.meltbook.measure;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;

class ReadingsTest {
    private static final Readings NONE = Readings.of("test", Conditions.of("sample", "made in the test"));

    @Test
    void two_columns_of_one_quantity_or_of_two_lengths_are_refused() {
        Readings rate = NONE.with(Quantity.SHEAR_RATE, LabUnit.parse("1/s"), Doubles.of(1, 2));
        assertThrows(
                RangeException.class, () -> rate.with(Quantity.SHEAR_RATE, LabUnit.parse("1/s"), Doubles.of(1, 2)));
        assertThrows(RangeException.class, () -> rate.with(Quantity.VISCOSITY, LabUnit.parse("P"), Doubles.of(1)));
    }

    @Test
    void too_few_columns_are_refused_by_name() {
        Readings rate = NONE.with(Quantity.SHEAR_RATE, LabUnit.parse("1/s"), Doubles.of(1, 2));
        String flow = assertThrows(RangeException.class, rate::flowCurve).getMessage();
        assertTrue(flow.contains("missing are shear stress and viscosity"), flow);
        String sweep = assertThrows(RangeException.class, rate::frequencySweep).getMessage();
        assertTrue(sweep.contains("no column of angular frequency; there is shear rate"), sweep);
    }

    /** Whichever of the three is left out, σ = η γ̇ gives it back. */
    @Test
    void the_missing_one_of_rate_stress_and_viscosity_is_the_same_from_either_side() {
        Random random = new Random(3);
        double[] rates = random.doubles(500, 1e-3, 1e3).toArray();
        double[] viscosities = random.doubles(500, 1e2, 1e6).toArray();
        double[] stresses = new double[500];
        for (int i = 0; i < 500; i++) {
            stresses[i] = rates[i] * viscosities[i];
        }
        FlowCurve curve = NONE.with(Quantity.SHEAR_STRESS, LabUnit.parse("Pa"), Doubles.of(stresses))
                .with(Quantity.VISCOSITY, LabUnit.parse("Pa·s"), Doubles.of(viscosities))
                .flowCurve();
        for (int i = 0; i < 500; i++) {
            assertEquals(rates[i], curve.stress().x().at(i), 2 * Math.ulp(rates[i]));
        }
    }

    @Test
    void a_stress_of_zero_beside_a_viscosity_leaves_the_viscosity_in_doubt() {
        FlowCurve curve = NONE.with(Quantity.SHEAR_RATE, LabUnit.parse("1/s"), Doubles.of(1, 2))
                .with(Quantity.SHEAR_STRESS, LabUnit.parse("Pa"), Doubles.of(0, 600))
                .with(Quantity.VISCOSITY, LabUnit.parse("Pa·s"), Doubles.of(300, 300))
                .flowCurve();
        assertEquals(Verdict.Standing.UNUSABLE, curve.stress().verdicts().get(0).standing());
        assertEquals(
                Verdict.Standing.DOUBTFUL, curve.viscosity().verdicts().get(0).standing());
        assertEquals(Verdict.SOUND, curve.viscosity().verdicts().get(1));
    }

    @Test
    void rounding_to_three_digits_is_no_doubt_and_one_digit_wrong_is() {
        Random random = new Random(5);
        for (int i = 0; i < 300; i++) {
            double rate = three(Math.exp(random.nextDouble() * 14 - 7));
            double viscosity = three(Math.exp(random.nextDouble() * 10));
            double stress = three(rate * viscosity);
            assertEquals(Verdict.SOUND, verdict(rate, stress, viscosity), rate + " " + viscosity);
            Verdict off = verdict(rate, stress * 1.03, viscosity);
            assertEquals(Verdict.Standing.DOUBTFUL, off.standing(), rate + " " + viscosity);
        }
    }

    private static Verdict verdict(double rate, double stress, double viscosity) {
        return NONE.with(Quantity.SHEAR_RATE, LabUnit.parse("1/s"), Doubles.of(rate), 3)
                .with(Quantity.SHEAR_STRESS, LabUnit.parse("Pa"), Doubles.of(stress), 3)
                .with(Quantity.VISCOSITY, LabUnit.parse("Pa·s"), Doubles.of(viscosity), 3)
                .flowCurve()
                .stress()
                .verdicts()
                .get(0);
    }

    private static double three(double value) {
        return new BigDecimal(value).round(new MathContext(3)).doubleValue();
    }

    @Test
    void two_verdicts_on_a_row_give_the_worse_with_both_reasons() {
        Verdict doubtful = Verdict.doubtful("a");
        Verdict unusable = Verdict.unusable("b");
        assertEquals(new Verdict(Verdict.Standing.UNUSABLE, "a; b"), doubtful.and(unusable));
        assertEquals(new Verdict(Verdict.Standing.UNUSABLE, "b; a"), unusable.and(doubtful));
        assertEquals(doubtful, doubtful.and(Verdict.SOUND));
        assertEquals(doubtful, Verdict.SOUND.and(doubtful));
        assertEquals(doubtful, doubtful.and(doubtful));
    }
}
