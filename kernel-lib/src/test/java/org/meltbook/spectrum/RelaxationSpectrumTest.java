package org.meltbook.spectrum;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.apache.commons.math3.analysis.integration.IterativeLegendreGaussIntegrator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.numeric.ReferenceTable;

class RelaxationSpectrumTest {
    private static final RelaxationSpectrum MELT = PublishedMelts.meltOne();

    /**
     * The table is from memory of Laun 1978; two remembered figures agree: mean time 58.7 s, η₀ of 5.0e4 to 5.2e4
     * Pa·s.
     */
    @Test
    void the_published_low_density_polyethylene_has_its_known_sums() {
        assertEquals(51063.7, MELT.zeroShearViscosity(), 0.05);
        assertEquals(1.15017e-3, MELT.recoverableCompliance(), 5e-9);
        assertEquals(58.732, MELT.meanRelaxationTime(), 5e-4);
        assertEquals(320971, MELT.instantaneousModulus(), 1e-9 * 320971);
        assertEquals(5.99815e6, MELT.zeroRateNormalStressCoefficient(), 5);
    }

    @Test
    void its_moduli_are_those_of_the_computed_table() {
        ReferenceTable table = ReferenceTable.of("computed_ldpe_melt_I_saos.csv");
        double[] frequencies = table.numbers("angular_frequency_rad_per_s");
        for (int i = 0; i < frequencies.length; i++) {
            // printed to ten digits; frequencies between the decades to ten digits too
            double tolerance = 1e-9;
            near(table.numbers("storage_modulus_Pa")[i], MELT.storage(frequencies[i]), tolerance);
            near(table.numbers("loss_modulus_Pa")[i], MELT.loss(frequencies[i]), tolerance);
            near(table.numbers("complex_viscosity_Pa_s")[i], MELT.complexViscosity(frequencies[i]), tolerance);
            near(table.numbers("laun_N1_estimate_Pa")[i], LaunRule.of(MELT, frequencies[i]), tolerance);
        }
    }

    @Test
    void its_linear_start_up_is_that_of_the_computed_table() {
        ReferenceTable table = ReferenceTable.of("computed_ldpe_melt_I_startup_single_exp.csv");
        for (int i = 0; i < table.numbers("time_s").length; i++) {
            near(table.numbers("linear_envelope_Pa_s")[i], MELT.stressGrowth(table.numbers("time_s")[i]), 1e-9);
        }
    }

    @Test
    void limits_hold_at_low_and_high_frequency_and_time() {
        near(MELT.zeroShearViscosity(), MELT.loss(1e-8) / 1e-8, 1e-9);
        near(MELT.zeroRateNormalStressCoefficient() / 2, MELT.storage(1e-8) / 1e-16, 1e-9);
        near(MELT.instantaneousModulus(), MELT.storage(1e12), 1e-9);
        near(MELT.instantaneousModulus(), MELT.storage(1e200), 1e-15);
        near(MELT.zeroShearViscosity(), MELT.complexViscosity(0), 1e-15);
        near(MELT.zeroShearViscosity(), MELT.stressGrowth(1e6), 1e-12);
        near(MELT.instantaneousModulus(), MELT.relaxationModulus(0), 1e-15);
        assertEquals(0, MELT.stressGrowth(0));
        near(2 * MELT.storage(1e-7), LaunRule.of(MELT, 1e-7), 1e-6);
    }

    @Test
    void stress_growth_is_the_integral_of_the_relaxation_modulus() {
        var quadrature = new IterativeLegendreGaussIntegrator(16, 1e-12, 1e-12);
        double integral = quadrature.integrate(100_000, MELT::relaxationModulus, 0, 2);
        near(integral, MELT.stressGrowth(2), 1e-9);
    }

    private static void near(double expected, double found, double relative) {
        assertEquals(expected, found, relative * Math.abs(expected));
    }

    @Test
    void refuses_what_is_no_spectrum() {
        assertThrows(RangeException.class, () -> RelaxationSpectrum.of(List.of()));
        assertThrows(RangeException.class, () -> RelaxationSpectrum.of(Doubles.of(1, 2), Doubles.of(1)));
        RangeException twice =
                assertThrows(RangeException.class, () -> RelaxationSpectrum.of(Doubles.of(1, 2), Doubles.of(3, 3)));
        assertTrue(twice.getMessage().contains("add their moduli"));
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -1, Double.NaN, Double.POSITIVE_INFINITY})
    void refuses_a_mode(double bad) {
        assertThrows(RangeException.class, () -> RelaxationSpectrum.of(Doubles.of(bad), Doubles.of(1)));
        assertThrows(RangeException.class, () -> RelaxationSpectrum.of(Doubles.of(1), Doubles.of(bad)));
    }

    @ParameterizedTest
    @ValueSource(doubles = {-1, Double.NaN, Double.POSITIVE_INFINITY})
    void refuses_a_frequency_or_time(double bad) {
        assertThrows(RangeException.class, () -> MELT.storage(bad));
        assertThrows(RangeException.class, () -> MELT.loss(bad));
        assertThrows(RangeException.class, () -> MELT.relaxationModulus(bad));
        assertThrows(RangeException.class, () -> LaunRule.of(MELT, bad));
    }

    @Test
    void is_sorted_and_equal_whatever_the_order_given() {
        RelaxationSpectrum turned = RelaxationSpectrum.of(Doubles.of(2, 1), Doubles.of(30, 0.3));
        assertEquals(RelaxationSpectrum.of(Doubles.of(1, 2), Doubles.of(0.3, 30)), turned);
        assertEquals(0.3, turned.modes().get(0).time());
        assertTrue(turned.headline().startsWith("Relaxation spectrum of 2 modes from 0.3000 to 30.00 s"));
    }
}
