package org.meltbook.spectrum;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.function.Predicate;
import java.util.function.Supplier;
import java.util.stream.Stream;
import org.apache.commons.math3.stat.StatUtils;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.NumberText;
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
                Curve.of(omega, Series.of(Quantity.LOSS_MODULUS, loss.toArray())),
                List.of());
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
        assertTrue(fit.headline().contains("terminal zone reached; η₀ = "), fit.headline());
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

    /** A sweep of a spectrum at five points a decade up to 1000 rad/s, with normal scatter of the logarithms. */
    private static FrequencySweep scattered(RelaxationSpectrum melt, double low, double scatter, Random random) {
        Doubles frequencies = Doubles.logSpaced(low, 1e3, 1 + (int) Math.round(5 * Math.log10(1e3 / low)));
        return sweep(
                frequencies,
                frequencies.map(w -> melt.storage(w) * Math.exp(scatter * random.nextGaussian())),
                frequencies.map(w -> melt.loss(w) * Math.exp(scatter * random.nextGaussian())));
    }

    private static List<SpectrumFit> fits(int count, Supplier<FrequencySweep> sweeps) {
        return Stream.generate(sweeps).limit(count).map(SpectrumFit::of).toList();
    }

    /** Log-normal in λ. */
    private static RelaxationSpectrum smooth() {
        Doubles times = Doubles.logSpaced(1e-6, 100, 121);
        return RelaxationSpectrum.of(
                times.map(t -> 4000 * Math.exp(-0.5 * Math.pow((Math.log10(t) + 2.5) / 1.5, 2))), times);
    }

    /**
     * Sixty sweeps with 3 % scatter (seeded); nominal 95 %, found 85 % or more. Each modulus alone would give η₀ with a
     * deviation of 4 % and 2.6 % too high; both together have 0.6 % and no bias beyond it.
     */
    @Test
    void intervals_hold_the_truth_about_as_often_as_they_say_and_both_moduli_make_them_narrow() {
        RelaxationSpectrum smooth = smooth();
        double crossover = Crossover.frequencies(smooth, 0.01, 1e4).at(0);
        Random random = new Random(5);
        List<SpectrumFit> fits = fits(60, () -> scattered(smooth, 1e-3, 0.03, random));
        atLeast(51, fits, fit -> holds(fit.zeroShearViscosity(), smooth.zeroShearViscosity()));
        atLeast(51, fits, fit -> holds(fit.recoverableCompliance(), smooth.recoverableCompliance()));
        atLeast(51, fits, fit -> holds(fit.crossovers().get(0).frequency(), crossover));
        double[] errors = fits.stream()
                .mapToDouble(fit -> fit.zeroShearViscosity().value() / smooth.zeroShearViscosity() - 1)
                .toArray();
        assertEquals(0, StatUtils.mean(errors), 0.003);
        assertTrue(Math.sqrt(StatUtils.variance(errors)) < 0.01, "deviation of η₀ " + StatUtils.variance(errors));
        assertTrue(fits.stream()
                .allMatch(fit -> fit.zeroShearViscosity().cautions().isEmpty()));
    }

    private static void atLeast(int count, List<SpectrumFit> fits, Predicate<SpectrumFit> fulfilled) {
        long found = fits.stream().filter(fulfilled).count();
        assertTrue(found >= count, "held " + found + " times of " + fits.size());
    }

    /**
     * At 2e-3 rad/s G″ of the melt has come within 3 % of η₀ω while G′ is still at three quarters of its limit: slopes
     * 0.93 and 1.7. A slope through the four lowest points would scatter by 0.03.
     */
    @Test
    void a_storage_modulus_short_of_its_terminal_zone_does_not_refuse_the_viscosity_nor_does_scatter() {
        Random random = new Random(3);
        for (SpectrumFit fit : fits(20, () -> scattered(MELT, 2e-3, 0.02, random))) {
            assertEquals(
                    Prediction.Standing.WITHIN_WINDOW, fit.zeroShearViscosity().standing());
            assertEquals(51063.7, fit.zeroShearViscosity().value(), 0.03 * 51063.7);
            assertEquals(
                    Prediction.Standing.AT_LEAST, fit.recoverableCompliance().standing());
            assertTrue(fit.headline().contains("reached by G″, NOT by G′"), fit.headline());
        }
    }

    /** Three log-normal peaks, Σ g and median λ invented: segments, backbone and a long tail of branches. */
    private static RelaxationSpectrum branched() {
        Doubles times = Doubles.logSpaced(1e-6, 1e3, 46);
        return RelaxationSpectrum.of(
                times.map(t -> peak(t, 3e5, 1e-4, 1.8) + peak(t, 8e4, 0.01, 1.8) + peak(t, 1.2e4, 0.6, 1.5)), times);
    }

    private static double peak(double time, double strength, double centre, double width) {
        double z = Math.log(time / centre) / width;
        return strength / (5 * width) * Math.exp(-z * z / 2);
    }

    /**
     * Jₑ⁰ hangs on the tail, which a window down to 1.5e-3 rad/s cuts off: refits on the grid that ends there held the
     * truth 12 times of 19 only.
     */
    @Test
    void the_interval_of_the_compliance_sees_the_end_of_the_grid() {
        RelaxationSpectrum branched = branched();
        Random random = new Random(8);
        List<SpectrumFit> fits = fits(20, () -> scattered(branched, 1.5e-3, 0.02, random)).stream()
                .filter(fit -> fit.recoverableCompliance().hasValue())
                .toList();
        assertTrue(fits.size() >= 15, fits.size() + " plain compliances");
        atLeast(17, fits, fit -> holds(fit.recoverableCompliance(), branched.recoverableCompliance()));
    }

    @Test
    void a_bound_from_scattered_points_leaves_room_for_their_scatter() {
        Random random = new Random(4);
        double low = 3e-3;
        for (SpectrumFit fit : fits(10, () -> scattered(MELT, low, 0.05, random))) {
            double fitted = fit.spectrum().complexViscosity(low);
            assertEquals(Prediction.Standing.AT_LEAST, fit.zeroShearViscosity().standing());
            assertTrue(fit.zeroShearViscosity().low() < fitted);
            assertTrue(fit.zeroShearViscosity().low() > 0.9 * fitted);
        }
    }

    @Test
    void a_bound_has_the_extrapolated_limit_of_the_spectrum_beside_it() {
        SpectrumFit fit = SpectrumFit.of(made(3e-3, 1e3, 40));
        double limit = fit.spectrum().zeroShearViscosity();
        assertEquals(2, fit.extrapolatedLimits().size());
        assertEquals(
                Prediction.Standing.EXTRAPOLATED,
                fit.extrapolatedLimits().get(0).standing());
        assertEquals(limit, fit.extrapolatedLimits().get(0).value());
        String words = NumberText.of(limit) + " Pa·s";
        assertTrue(fit.headline().contains(words + ", extrapolated"), fit.headline());
        assertTrue(fit.zeroShearViscosity().toString().contains(words + " (extrapolated)"), fit.toString());
        assertEquals(
                NumberText.of(limit) + " (extrapolated)",
                fit.rows().get(0).column("value").text(2));
        assertTrue(SpectrumFit.of(made(1e-5, 1e3, 80)).extrapolatedLimits().isEmpty());
    }

    private static boolean holds(Prediction prediction, double truth) {
        return prediction.low() <= truth && truth <= prediction.high();
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
                whole.loss(),
                List.of());
        SpectrumFit fit = SpectrumFit.of(flagged, 1);
        assertTrue(fit.rootMeanSquare() < 1e-10);
        assertTrue(
                fit.cautions().contains("1 point is marked unusable and took no part"),
                fit.cautions().toString());
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -5, Double.NaN})
    void refuses_a_usable_modulus_that_is_none(double bad) {
        FrequencySweep whole = made(1e-3, 1e4, 10);
        double[] spoiled = whole.loss().y().toArray();
        spoiled[4] = bad;
        FrequencySweep broken =
                sweep(whole.loss().x().values(), whole.storage().y().values(), Doubles.of(spoiled));
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
