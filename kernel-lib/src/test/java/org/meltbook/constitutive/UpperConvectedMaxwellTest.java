package org.meltbook.constitutive;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.flow.Component;
import org.meltbook.flow.Flow;
import org.meltbook.flow.StartUpShear;
import org.meltbook.flow.SteadyShear;
import org.meltbook.flow.VelocityGradient;
import org.meltbook.numeric.ReferenceTable;
import org.meltbook.spectrum.PublishedMelts;
import org.meltbook.spectrum.RelaxationSpectrum;

/** Closed forms: Bird, Armstrong, Hassager, Dynamics of Polymeric Liquids, vol. 1, 2nd ed. 1987. */
class UpperConvectedMaxwellTest {
    private static final RelaxationSpectrum MELT = PublishedMelts.meltOne();
    private static final UpperConvectedMaxwell MODEL = new UpperConvectedMaxwell(MELT);
    private static final UpperConvectedMaxwell ONE =
            new UpperConvectedMaxwell(RelaxationSpectrum.of(Doubles.of(20000), Doubles.of(0.5)));

    @ParameterizedTest
    @ValueSource(doubles = {1e-6, 1e-3, 1, 1e3, 1e6})
    void in_steady_shear_neither_viscosity_nor_normal_stress_coefficient_depends_on_the_rate(double rate) {
        SteadyShearResponse steady = MODEL.steadyShear(Doubles.of(rate));
        near(MELT.zeroShearViscosity(), steady.viscosity().at(0), 1e-13);
        near(
                MELT.zeroRateNormalStressCoefficient(),
                steady.firstNormalStressCoefficient().at(0),
                1e-13);
        assertEquals(0, steady.secondNormalStressDifference().at(0));
    }

    @Test
    void in_steady_shear_only_the_normal_stress_of_the_flow_direction_differs_from_zero() {
        Stress stress = MODEL.stress(new SteadyShear(2), 0);
        assertTrue(stress.at(Component.XX) > 0);
        for (Component zero : List.of(Component.YY, Component.ZZ, Component.XZ, Component.YZ)) {
            assertEquals(0, stress.at(zero), zero.toString());
        }
    }

    @ParameterizedTest
    @ValueSource(doubles = {1e-4, 0.1, 10, 1e3})
    void start_up_follows_its_closed_form(double rate) {
        for (double time : Doubles.logSpaced(1e-4, 1e4, 17).toArray()) {
            double shear = 0;
            double normal = 0;
            for (RelaxationSpectrum.Mode mode : MELT.modes()) {
                double reduced = time / mode.time();
                // Ψ₁⁺ = 2 η λ [1 − (1 + T) e^−T]; below T = 1e-3 by its series T²/2 − T³/3 + T⁴/8
                double grown = reduced < 1e-3
                        ? reduced * reduced * (0.5 - reduced / 3 + reduced * reduced / 8)
                        : 1 - (1 + reduced) * Math.exp(-reduced);
                shear += rate * mode.viscosity() * -Math.expm1(-reduced);
                normal += 2 * rate * rate * mode.viscosity() * mode.time() * grown;
            }
            Stress stress = MODEL.stress(new StartUpShear(rate), time);
            // rounding of the scaled matrix grows with λ γ̇, here up to 1e6; the closed form of N₁ loses six digits by
            // itself
            double tolerance = 1e-11 + 1e-15 * rate * 1000;
            near(shear, stress.shear(), tolerance);
            near(normal, stress.firstNormalDifference(), 1e-9 + 1e-15 * rate * 1000);
            assertEquals(0, stress.secondNormalDifference());
        }
    }

    @Test
    void start_up_ends_in_the_steady_state_and_begins_at_rest() {
        Stress steady = MODEL.stress(new SteadyShear(3), 0);
        Stress late = MODEL.stress(new StartUpShear(3), 1e6);
        near(steady.shear(), late.shear(), 1e-12);
        near(steady.firstNormalDifference(), late.firstNormalDifference(), 1e-12);
        assertEquals(
                Stress.NONE.components(), MODEL.stress(new StartUpShear(3), 0).components());
        assertEquals(
                Stress.NONE.components(), MODEL.stress(new StartUpShear(3), -1).components());
    }

    @Test
    void agrees_with_the_two_method_tables() {
        ReferenceTable steady = ReferenceTable.of("ucm_steady_shear.csv");
        double[] rates = steady.numbers("shear_rate[1/s]");
        for (int i = 0; i < rates.length; i++) {
            Stress stress = ONE.stress(new SteadyShear(rates[i]), 0);
            near(steady.numbers("sigma[Pa]")[i], stress.shear(), 1e-14);
            near(steady.numbers("N1[Pa]")[i], stress.firstNormalDifference(), 1e-14);
        }
        ReferenceTable growth = ReferenceTable.of("ucm_startup_shear.csv");
        for (int i = 0; i < growth.numbers("time[s]").length; i++) {
            Stress stress =
                    ONE.stress(new StartUpShear(growth.numbers("shear_rate[1/s]")[i]), growth.numbers("time[s]")[i]);
            // the two methods of the table agree to 1.2e-11
            near(growth.numbers("sigma[Pa]")[i], stress.shear(), 2e-11);
            near(growth.numbers("N1[Pa]")[i], stress.firstNormalDifference(), 2e-11);
        }
    }

    /** A cessation, given as a flow of its own: σ decays like exp(−t/λ), N₁ too (one mode, closed form). */
    @Test
    void carries_any_history_of_constant_pieces() {
        Flow cessation = new Pieces(
                VelocityGradient.simpleShear(4),
                VelocityGradient.REST,
                List.of(Component.XX, Component.YY, Component.ZZ, Component.XY));
        Stress stress = ONE.stress(cessation, 0.7);
        near(20000 * 0.5 * 4 * Math.exp(-0.7 / 0.5), stress.shear(), 1e-13);
        near(2 * 20000 * 0.25 * 16 * Math.exp(-0.7 / 0.5), stress.firstNormalDifference(), 1e-13);
    }

    /** Steady uniaxial extension, closed form: 3 g λ ε̇ / ((1 − 2 W)(1 + W)), without bound from W = 1/2 on. */
    @Test
    void knows_no_flow_by_name_and_refuses_a_steady_state_that_does_not_exist() {
        List<Component> normal = List.of(Component.XX, Component.YY, Component.ZZ);
        VelocityGradient slow = VelocityGradient.of(0.4, 0, 0, 0, -0.2, 0, 0, 0, -0.2);
        Stress stress = ONE.stress(new Pieces(slow, slow, normal), -1);
        double w = 0.5 * 0.4;
        near(3 * 20000 * w / ((1 - 2 * w) * (1 + w)), stress.firstNormalDifference(), 1e-13);
        VelocityGradient fast = VelocityGradient.of(2, 0, 0, 0, -1, 0, 0, 0, -1);
        RangeException refused =
                assertThrows(RangeException.class, () -> ONE.stress(new Pieces(fast, fast, normal), -1));
        assertTrue(refused.getMessage().contains("no steady state"), refused.getMessage());
    }

    @Test
    void refuses_a_flow_whose_components_do_not_close() {
        VelocityGradient shear = VelocityGradient.simpleShear(1);
        assertThrows(
                RangeException.class,
                () -> ONE.stress(new Pieces(shear, shear, List.of(Component.YY, Component.XX)), -1));
    }

    /**
     * Against the damped integral model of the published melt, n = 0.143. The damping enters with n λ γ̇, so the slowest
     * modes, which carry N₁ but little of η, go first: neither departure waits for Wi = 1.
     */
    @Test
    void its_limits_name_the_rates_where_melts_depart_from_it() {
        double rate = 1 / MELT.meanRelaxationTime();
        SteadyShearResponse damped = new DampedIntegral(MELT, 0.143).steadyShear(Doubles.of(0.05 * rate, 0.3 * rate));
        SteadyShearResponse maxwell = MODEL.steadyShear(damped.rates());
        assertEquals(
                -0.12,
                damped.firstNormalStressCoefficient().at(0)
                                / maxwell.firstNormalStressCoefficient().at(0)
                        - 1,
                0.005);
        assertEquals(-0.07, damped.viscosity().at(1) / maxwell.viscosity().at(1) - 1, 0.005);
        String limits = String.join("; ", MODEL.limits());
        assertTrue(limits.contains("N₁ from Wi ≈ 0.05 on"), limits);
        assertTrue(limits.contains("(12 % below the model), η from Wi ≈ 0.3 on"), limits);
        assertFalse(limits.contains("Wi = 1"), limits);
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -1, Double.NaN, Double.POSITIVE_INFINITY})
    void rejects_rates_and_times_that_are_none(double bad) {
        assertThrows(RangeException.class, () -> MODEL.steadyShear(Doubles.of(1, bad)));
        assertThrows(RangeException.class, () -> MODEL.startUpShear(bad, Doubles.of(1)));
        if (bad != 0) {
            assertThrows(RangeException.class, () -> MODEL.startUpShear(1, Doubles.of(bad)));
        }
        assertThrows(RangeException.class, () -> MODEL.steadyShear(Doubles.of()));
        assertThrows(RangeException.class, () -> MODEL.startUpShear(1, Doubles.of()));
    }

    @Test
    void a_spectrum_over_twelve_decades_keeps_its_linear_start_up() {
        RelaxationSpectrum wide = RelaxationSpectrum.of(Doubles.of(1e6, 1e3, 1), Doubles.of(1e-6, 1, 1e6));
        for (double time : new double[] {1e-7, 1e-3, 10, 1e7}) {
            near(
                    wide.stressGrowth(time),
                    new UpperConvectedMaxwell(wide)
                                    .stress(new StartUpShear(1e-3), time)
                                    .shear()
                            / 1e-3,
                    1e-11);
        }
    }

    private static void near(double expected, double found, double relative) {
        assertEquals(expected, found, relative * Math.abs(expected));
    }

    /** One gradient before time zero, another from then on. */
    private record Pieces(VelocityGradient before, VelocityGradient after, List<Component> components) implements Flow {
        @Override
        public String name() {
            return "two pieces";
        }

        @Override
        public VelocityGradient gradient(double time) {
            return time < 0 ? before : after;
        }

        @Override
        public Doubles changes() {
            return Doubles.of(0);
        }
    }

    @Test
    void a_stress_has_six_components() {
        assertThrows(RangeException.class, () -> new Stress(Doubles.of(1, 2, 3)));
        assertEquals(0, Stress.NONE.shear(), 0);
    }
}
