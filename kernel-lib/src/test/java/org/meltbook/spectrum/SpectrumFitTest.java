package org.meltbook.spectrum;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Series;
import org.meltbook.measure.Verdict;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

class SpectrumFitTest {
    private static final RelaxationSpectrum MELT = PublishedMelts.meltOne();

    private static FrequencySweep sweep(Doubles frequencies, Doubles storage, Doubles loss) {
        Series omega = Series.of(Quantity.ANGULAR_FREQUENCY, frequencies.toArray());
        return FrequencySweep.of(
                Conditions.of("made sample", "made in a test"),
                Curve.of(omega, Series.of(Quantity.STORAGE_MODULUS, storage.toArray())),
                Curve.of(omega, Series.of(Quantity.LOSS_MODULUS, loss.toArray())), List.of());
    }

    private static FrequencySweep made(double low, double high, int points) {
        Doubles frequencies = Doubles.logSpaced(low, high, points);
        return sweep(frequencies, frequencies.map(MELT::storage), frequencies.map(MELT::loss));
    }

    /** The grid of one mode a decade over 1e-3 to 1e4 rad/s holds the eight times of the melt: they must come back. */
    @Test
    void gives_back_the_modes_that_made_the_moduli() {
        SpectrumFit fit = SpectrumFit.of(made(1e-3, 1e4, 50), 1);
        assertEquals(8, fit.spectrum().modes().size());
        for (int i = 0; i < 8; i++) {
            double modulus = MELT.modes().get(i).modulus();
            // the longest mode shows in G″ by a part in a hundred only
            assertEquals(modulus, fit.spectrum().modes().get(i).modulus(), 1e-6 * modulus);
        }
        assertTrue(fit.rootMeanSquare() < 1e-10);
    }

    @Test
    void finds_the_zero_shear_viscosity_and_compliance_of_a_sweep_into_the_terminal_zone() {
        SpectrumFit fit = SpectrumFit.of(made(1e-5, 1e3, 80));
        assertEquals(51063.7, fit.zeroShearViscosity().value(), 0.01 * 51063.7);
        assertEquals(1.15017e-3, fit.recoverableCompliance().value(), 0.03 * 1.15017e-3);
        assertTrue(fit.headline().endsWith("terminal zone reached."));
    }

    @Test
    void bounds_lie_below_the_truth_where_the_terminal_zone_was_not_reached() {
        for (double low : new double[] {3e-3, 0.1, 1}) {
            SpectrumFit fit = SpectrumFit.of(made(low, 1e3, 40));
            assertEquals(Prediction.Standing.AT_LEAST, fit.zeroShearViscosity().standing());
            assertTrue(fit.zeroShearViscosity().low() < MELT.zeroShearViscosity());
            assertTrue(fit.zeroShearViscosity().low() > 0.9 * MELT.complexViscosity(low));
            assertTrue(fit.recoverableCompliance().low() < MELT.recoverableCompliance());
        }
    }

    /** One mode crosses over at ω = 1/λ and G′ = G″ = g/2 (closed form). */
    @Test
    void one_mode_crosses_over_at_the_inverse_of_its_time() {
        RelaxationSpectrum mode = RelaxationSpectrum.of(Doubles.of(2e4), Doubles.of(0.5));
        Doubles found = Crossover.frequencies(mode, 0.01, 100);
        assertEquals(1, found.size());
        assertEquals(2, found.at(0), 1e-9);
        assertEquals(1e4, mode.storage(found.at(0)), 1e-4);
    }

    @Test
    void names_no_crossover_outside_the_window() {
        assertTrue(SpectrumFit.of(made(1e-5, 1e-2, 30)).crossovers().isEmpty());
    }

    @Test
    void leaves_unusable_rows_out_and_says_so() {
        FrequencySweep whole = made(1e-3, 1e4, 50);
        double[] spoiled = whole.storage().y().toArray();
        spoiled[20] = 1;
        List<Verdict> verdicts = new ArrayList<>(Collections.nCopies(50, Verdict.SOUND));
        verdicts.set(20, Verdict.unusable("torque below the limit"));
        FrequencySweep flagged = FrequencySweep.of(
                whole.conditions(),
                new Curve(whole.storage().x(), Series.of(Quantity.STORAGE_MODULUS, spoiled), verdicts),
                whole.loss(), List.of());
        SpectrumFit fit = SpectrumFit.of(flagged, 1);
        assertTrue(fit.rootMeanSquare() < 1e-10);
        assertTrue(fit.cautions().contains("1 point is marked unusable and took no part"), fit.cautions().toString());
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -5, Double.NaN})
    void refuses_a_usable_modulus_that_is_none(double bad) {
        FrequencySweep whole = made(1e-3, 1e4, 10);
        double[] spoiled = whole.loss().y().toArray();
        spoiled[4] = bad;
        FrequencySweep broken = sweep(whole.loss().x().values(), whole.storage().y().values(), Doubles.of(spoiled));
        RangeException refused = assertThrows(RangeException.class, () -> SpectrumFit.of(broken));
        assertTrue(refused.getMessage().contains("point 5 of the loss modulus"), refused.getMessage());
    }

    @Test
    void refuses_too_little_to_fit() {
        assertThrows(RangeException.class, () -> SpectrumFit.of(made(1e-3, 1e4, 2)));
        Doubles one = Doubles.of(1, 1, 1);
        assertThrows(RangeException.class, () -> SpectrumFit.of(sweep(one, one, one)));
        assertThrows(RangeException.class, () -> SpectrumFit.of(made(1e-3, 1e4, 20), 0));
        assertThrows(RangeException.class, () -> SpectrumFit.of(made(1e-3, 1e4, 20), Double.NaN));
    }

    @Test
    void gives_the_same_intervals_each_time() {
        Prediction first = SpectrumFit.of(PublishedMelts.narrow290()).zeroShearViscosity();
        Prediction second = SpectrumFit.of(PublishedMelts.narrow290()).zeroShearViscosity();
        assertEquals(first.toString(), second.toString());
        assertTrue(first.low() < first.value() && first.value() < first.high());
    }

    @Test
    void stops_on_interrupt() {
        FrequencySweep whole = made(1e-3, 1e4, 50);
        Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, () -> SpectrumFit.of(whole));
        } finally {
            Thread.interrupted();
        }
    }
}
