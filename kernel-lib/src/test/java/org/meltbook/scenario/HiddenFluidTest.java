package org.meltbook.scenario;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.analysis.integration.gauss.GaussIntegrator;
import org.apache.commons.math3.analysis.integration.gauss.GaussIntegratorFactory;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.MatrixUtils;
import org.apache.commons.math3.linear.RealMatrix;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.scenario.HiddenFluid.Mode;
import org.meltbook.scenario.Truth.Peak;

/** The truth must itself be true: closed forms against quadrature of the defining integral, limits and moments. */
class HiddenFluidTest {
    private static final double REFERENCE = 463.15;
    private final Truth truth = Truth.load();
    private final HiddenFluid fluid = truth.fluid(truth.lot("A-00"), REFERENCE);

    @ParameterizedTest
    @ValueSource(doubles = {1e-4, 0.01, 0.3, 1, 10, 300})
    void steady_shear_equals_the_defining_integral_of_finger_and_cauchy_tensors(double rate) {
        double[][] stress = extraStress(rate);
        // 1e-9: the quadrature converges to rounding; the sum of 46 modes loses a few digits
        assertRelative(stress[0][1], fluid.viscosity(rate) * rate, 1e-9);
        assertRelative(stress[0][0] - stress[1][1], fluid.firstNormalCoefficient(rate) * rate * rate, 1e-9);
        assertRelative(stress[1][1] - stress[2][2], fluid.secondNormalCoefficient(rate) * rate * rate, 1e-9);
    }

    /**
     * Σ ∫ (g/λ) exp(−s/λ) exp(−n γ) [(1 − ψ) C⁻¹ − ψ C] ds from the deformation gradient, less the isotropic value at
     * rest, by Gauss–Legendre panels of Commons Math until the kernel has faded to exp(−60).
     */
    private double[][] extraStress(double rate) {
        double[][] sum = new double[3][3];
        for (Mode mode : fluid.modes()) {
            for (int row = 0; row < 3; row++) {
                for (int column = 0; column <= row; column++) {
                    int i = row;
                    int j = column;
                    double fading = 1 / mode.time() + mode.damping() * rate;
                    double part = integral(
                            60 / fading,
                            s -> memory(mode, s, rate) * strain(mode, rate * s).getEntry(i, j));
                    sum[i][j] += part;
                    sum[j][i] = sum[i][j];
                }
            }
        }
        return sum;
    }

    private static double memory(Mode mode, double elapsed, double rate) {
        return mode.modulus() / mode.time() * Math.exp(-elapsed / mode.time() - mode.damping() * rate * elapsed);
    }

    private static RealMatrix strain(Mode mode, double shear) {
        RealMatrix gradient = new Array2DRowRealMatrix(new double[][] {{1, shear, 0}, {0, 1, 0}, {0, 0, 1}});
        RealMatrix finger = gradient.multiply(gradient.transpose());
        RealMatrix back = new LUDecomposition(gradient).getSolver().getInverse();
        RealMatrix cauchy = back.transpose().multiply(back);
        double psi = mode.secondNormal();
        return finger.scalarMultiply(1 - psi)
                .subtract(cauchy.scalarMultiply(psi))
                .subtract(MatrixUtils.createRealIdentityMatrix(3).scalarMultiply(1 - 2 * psi));
    }

    private static double integral(double end, DoubleUnaryOperator integrand) {
        GaussIntegratorFactory rules = new GaussIntegratorFactory();
        double sum = 0;
        double from = 0;
        for (double to = end * Math.pow(0.5, 12); from < end; to = Math.min(end, 2 * to)) {
            GaussIntegrator panel = rules.legendre(20, from, to);
            sum += panel.integrate(integrand::applyAsDouble);
            from = to;
        }
        return sum;
    }

    @Test
    void at_low_rate_viscosity_and_first_normal_stress_are_the_moments_of_the_linear_spectrum() {
        double viscosity = moment(1);
        double elasticity = moment(2);
        double low = 1e-9; // λ up to 1e3 s: what is left out is of order 1e-6
        assertRelative(viscosity, fluid.viscosity(low), 1e-6);
        assertRelative(2 * elasticity, fluid.firstNormalCoefficient(low), 3e-6);
        assertRelative(viscosity, fluid.loss(low) / low, 1e-6);
        assertRelative(elasticity, fluid.storage(low) / (low * low), 1e-6);
    }

    @Test
    void the_moments_of_the_unfilled_resin_are_those_of_its_log_normal_peaks() {
        // Σ g λ^k of a log-normal peak is strength · centre^k · exp(k² width²/2); the grid's ends cut off the rest
        assertRelative(peakMoment(1), gridMoment(1), 1e-3);
        assertRelative(peakMoment(2), gridMoment(2), 2e-2);
    }

    private double peakMoment(int order) {
        double sum = 0;
        for (Peak peak : truth.resin().peaks()) {
            sum += peak.strength()
                    * Math.pow(peak.centre(), order)
                    * Math.exp(order * order * peak.width() * peak.width() / 2);
        }
        return sum;
    }

    private double gridMoment(int order) {
        double stiffer = truth.chalk()
                .onModuli(truth.chalk()
                        .volumeFraction(truth.lot("A-00").chalk(), truth.shift().meltDensity()));
        return moment(order) / stiffer;
    }

    private double moment(int order) {
        return fluid.modes().stream()
                .mapToDouble(mode -> mode.modulus() * Math.pow(mode.time(), order))
                .sum();
    }

    @Test
    void shear_stress_rises_with_rate_so_that_no_shear_band_can_form() {
        double before = 0;
        for (double rate = 1e-4; rate < 1e4; rate *= 1.1) {
            double stress = fluid.viscosity(rate) * rate;
            assertTrue(stress > before, "stress falls at " + rate + " 1/s");
            before = stress;
        }
    }

    @Test
    void the_ratio_of_normal_stresses_changes_with_rate_as_in_no_factorable_model() {
        double low = -fluid.secondNormalCoefficient(1e-6) / fluid.firstNormalCoefficient(1e-6);
        double high = -fluid.secondNormalCoefficient(1e3) / fluid.firstNormalCoefficient(1e3);
        assertTrue(low > 0.2 && low < 0.3, "low rate: " + low);
        assertTrue(high > 0.1 && high < 0.8 * low, "high rate: " + high);
    }

    @Test
    void time_and_temperature_superpose_in_oscillation_and_in_steady_shear() {
        HiddenFluid cold = truth.fluid(truth.lot("A-00"), 423.15);
        double aT = truth.shift().time(423.15);
        double bT = truth.shift().modulus(423.15);
        for (double rate : new double[] {1e-3, 0.1, 10}) {
            assertRelative(bT * fluid.storage(rate), cold.storage(rate / aT), 1e-12);
            assertRelative(bT * aT * fluid.viscosity(rate), cold.viscosity(rate / aT), 1e-12);
        }
        // Arrhenius by hand: exp(56000/8.314463·(1/423.15 − 1/463.15)) = exp(6735.25 · 2.04098e-4) = exp(1.374652)
        assertRelative(3.9537, aT, 1e-4);
    }

    @Test
    void zero_shear_viscosity_is_that_of_a_branched_polyethylene() {
        assertTrue(moment(1) > 2e4 && moment(1) < 5e4, "η0 = " + moment(1) + " Pa·s");
    }

    @Test
    void the_lots_differ_as_their_plot_says() {
        HiddenFluid shorter = truth.fluid(truth.lot("R-01"), REFERENCE);
        HiddenFluid branched = truth.fluid(truth.lot("R-07"), REFERENCE);
        HiddenFluid fresh = truth.fluid(truth.lot("R-11"), REFERENCE);
        HiddenFluid tested = truth.fluid(truth.lot("R-11"), REFERENCE, 5000);
        assertTrue(shorter.viscosity(1e-6) < 0.85 * fluid.viscosity(1e-6), "R-01 flows more easily");
        assertTrue(tested.loss(1) < 0.9 * fresh.loss(1), "R-11 changes while it is tested");
        for (double rate : new double[] {0.1, 1, 10}) {
            assertRelative(fluid.viscosity(rate), branched.viscosity(rate), 0.1);
        }
        assertTrue(
                differenceAtTwentyKilopascal(branched) > 1.15 * differenceAtTwentyKilopascal(fluid),
                "R-07 flows as A-00 but swells more");
    }

    /** N1 in Pa at a shear stress of 20 kPa. */
    private static double differenceAtTwentyKilopascal(HiddenFluid melt) {
        double low = 1e-3;
        double high = 1e3;
        for (int i = 0; i < 100; i++) {
            double middle = Math.sqrt(low * high);
            if (melt.viscosity(middle) * middle < 20e3) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return melt.firstNormalCoefficient(low) * low * low;
    }

    private static void assertRelative(double expected, double actual, double tolerance) {
        assertEquals(expected, actual, tolerance * Math.abs(expected));
    }
}
