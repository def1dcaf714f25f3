package org.meltbook.spectrum;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.stream.IntStream;
import org.apache.commons.math3.fitting.PolynomialCurveFitter;
import org.apache.commons.math3.fitting.WeightedObservedPoints;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.units.Prediction;

/** Real moduli of published polystyrenes, and what must and must not be said of them. */
class PublishedModuliTest {
    private static final SpectrumFit LIGHT = SpectrumFit.of(PublishedMelts.narrow290());
    private static final SpectrumFit HEAVY = SpectrumFit.of(PublishedMelts.narrow750());
    private static final SpectrumFit BROAD = SpectrumFit.of(PublishedMelts.broad390());

    /** η₀ of 1.64e5 and 4.3e6 Pa·s as read from the published terminal zones, to 5 %. */
    @Test
    void narrow_samples_give_their_zero_shear_viscosities() {
        assertEquals(1.64e5, LIGHT.zeroShearViscosity().value(), 0.05 * 1.64e5);
        assertEquals(4.3e6, HEAVY.zeroShearViscosity().value(), 0.05 * 4.3e6);
        assertEquals(
                Prediction.Standing.WITHIN_WINDOW, LIGHT.zeroShearViscosity().standing());
        assertEquals(
                Prediction.Standing.WITHIN_WINDOW, HEAVY.zeroShearViscosity().standing());
    }

    /** 3.45 between 290 and 750 kg/mol from the published values, to 5 %; the broad sample has no part in it. */
    @Test
    void their_scaling_is_near_the_usual_power_of_the_molar_mass() {
        MassScaling scaling = MassScaling.between(290, LIGHT.zeroShearViscosity(), 750, HEAVY.zeroShearViscosity());
        assertEquals(3.45, scaling.exponent().value(), 0.05 * 3.45);
        assertTrue(scaling.exponent().low() < 3.4 && 3.4 < scaling.exponent().high(), scaling.headline());
        assertThrows(
                RangeException.class,
                () -> MassScaling.between(290, LIGHT.zeroShearViscosity(), 390, BROAD.zeroShearViscosity()));
        assertThrows(
                RangeException.class,
                () -> MassScaling.between(290, LIGHT.zeroShearViscosity(), 290, HEAVY.zeroShearViscosity()));
    }

    /** Published crossovers of the narrow samples lie at 4.1e4 to 4.7e4 Pa, read to 5 %. */
    @Test
    void narrow_samples_cross_over_at_the_published_modulus() {
        for (SpectrumFit fit : new SpectrumFit[] {LIGHT, HEAVY}) {
            assertEquals(1, fit.crossovers().size());
            double modulus = fit.crossovers().get(0).modulus().value();
            assertTrue(modulus > 0.95 * 4.1e4 && modulus < 1.05 * 4.7e4, "crossover modulus " + modulus);
        }
    }

    /** 0.053 rad/s and 1.7e4 Pa, to 10 %. */
    @Test
    void the_broad_sample_crosses_over_where_published() {
        assertEquals(1, BROAD.crossovers().size());
        assertEquals(0.053, BROAD.crossovers().get(0).frequency().value(), 0.1 * 0.053);
        assertEquals(1.7e4, BROAD.crossovers().get(0).modulus().value(), 0.1 * 1.7e4);
    }

    @Test
    void the_broad_sample_is_refused_a_plain_zero_shear_viscosity() {
        Prediction zeroShear = BROAD.zeroShearViscosity();
        assertEquals(Prediction.Standing.AT_LEAST, zeroShear.standing());
        RangeException refused = assertThrows(RangeException.class, zeroShear::value);
        assertTrue(refused.getMessage().contains("terminal zone was not reached"), refused.getMessage());
        assertEquals(Prediction.Standing.AT_LEAST, BROAD.recoverableCompliance().standing());
        assertTrue(BROAD.headline().contains("terminal zone NOT reached"));
        // the bound may not exceed the largest viscosity that the loss points themselves show
        Curve loss = BROAD.sweep().loss();
        double largest = IntStream.range(0, loss.size())
                .mapToDouble(i -> loss.y().at(i) / loss.x().at(i))
                .max()
                .orElseThrow();
        assertTrue(zeroShear.low() < largest);
    }

    /** Two curves read off one figure need not belong together; here they differ by a tenth in η₀, and this is said. */
    @Test
    void a_mismatch_of_the_two_moduli_is_said() {
        for (SpectrumFit fit : new SpectrumFit[] {LIGHT, HEAVY}) {
            assertTrue(
                    fit.cautions().stream().anyMatch(c -> c.contains("do not quite belong together")),
                    fit.cautions().toString());
        }
    }

    /**
     * The scatter of a curve is that of its points about a parabola through each and its three neighbours on either
     * side, in logarithms: no spectrum is involved. It is 2.0 % (G′) and 3.0 % (G″) for 290 kg/mol, 2.5 % and 2.6 % for
     * 750 kg/mol, 6.0 % and 4.5 % for the broad sample. A spectrum of each modulus alone meets it within 1.3 times
     * that: the ends of the curves, which have no neighbours on one side, count here and not there.
     *
     * <p>One spectrum of both moduli has to share their mismatch. Shifting the frequencies of G′ by 13 % would remove
     * it for both narrow samples, which is 26 % of G′ or 13 % of G″ in the terminal zone: 15 % at any one point is
     * allowed there.
     */
    @Test
    void spectra_meet_the_published_moduli_within_their_scatter() {
        for (SpectrumFit fit : new SpectrumFit[] {LIGHT, HEAVY, BROAD}) {
            FrequencySweep sweep = fit.sweep();
            double storageAlone = alone(sweep, true);
            double lossAlone = alone(sweep, false);
            assertTrue(storageAlone < 1.3 * scatter(sweep.storage()), "storage " + storageAlone);
            assertTrue(lossAlone < 1.3 * scatter(sweep.loss()), "loss " + lossAlone);
        }
        for (SpectrumFit fit : new SpectrumFit[] {LIGHT, HEAVY}) {
            double worst = Math.max(
                    fit.storageResiduals().map(Math::abs).largest(),
                    fit.lossResiduals().map(Math::abs).largest());
            assertTrue(worst < 0.15, "worst misfit " + worst);
        }
    }

    private static double alone(FrequencySweep sweep, boolean storage) {
        Doubles times = Doubles.logSpaced(
                1 / sweep.frequencies().largest(), 1 / sweep.frequencies().smallest(), 30);
        return (storage
                        ? ModulusFit.ofStorage(sweep.storage(), times, Progress.QUIET)
                        : ModulusFit.ofLoss(sweep.loss(), times, Progress.QUIET))
                .rootMeanSquare();
    }

    private static double scatter(Curve curve) {
        int reach = 3;
        double sum = 0;
        int count = 0;
        for (int i = reach; i + reach < curve.size(); i++) {
            WeightedObservedPoints near = new WeightedObservedPoints();
            double centre = Math.log(curve.x().at(i));
            for (int k = i - reach; k <= i + reach; k++) {
                near.add(Math.log(curve.x().at(k)) - centre, Math.log(curve.y().at(k)));
            }
            double level = PolynomialCurveFitter.create(2).fit(near.toList())[0];
            double off = Math.log(curve.y().at(i)) - level;
            // a parabola through seven points follows the middle one by a third: 1 − 1/3 of its variance is left
            sum += off * off / (1 - 1.0 / 3);
            count++;
        }
        return Math.sqrt(sum / count);
    }

    @ParameterizedTest
    @ValueSource(doubles = {2, 4, 6})
    void another_density_of_modes_gives_the_same_numbers(double modesPerDecade) {
        SpectrumFit other = SpectrumFit.of(PublishedMelts.narrow750(), modesPerDecade);
        // two modes a decade, the coarsest here, ripple by one to two per cent between their times
        assertEquals(
                HEAVY.zeroShearViscosity().value(), other.zeroShearViscosity().value(), 0.02 * 4.3e6);
        assertEquals(
                HEAVY.crossovers().get(0).modulus().value(),
                other.crossovers().get(0).modulus().value(),
                0.02 * 4.4e4);
    }
}
