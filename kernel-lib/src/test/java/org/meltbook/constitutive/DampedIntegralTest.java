package org.meltbook.constitutive;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.apache.commons.math3.analysis.integration.IterativeLegendreGaussIntegrator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
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

class DampedIntegralTest {
    private static final RelaxationSpectrum MELT = PublishedMelts.meltOne();
    private static final DampedIntegral MODEL = new DampedIntegral(MELT, 0.143);

    @Test
    void agrees_with_the_computed_tables_of_the_published_melt() {
        ReferenceTable steady = ReferenceTable.of("computed_ldpe_melt_I_steady_shear.csv");
        SteadyShearResponse response = MODEL.steadyShear(Doubles.of(steady.numbers("shear_rate_1_per_s")));
        // ten digits printed
        for (int i = 0; i < response.rates().size(); i++) {
            near(steady.numbers("eta_single_exp_Pa_s")[i], response.viscosity().at(i), 1e-9);
            near(
                    steady.numbers("Psi1_single_exp_Pa_s2")[i],
                    response.firstNormalStressCoefficient().at(i),
                    1e-9);
        }
        ReferenceTable growth = ReferenceTable.of("computed_ldpe_melt_I_startup_single_exp.csv");
        for (int i = 0; i < growth.numbers("time_s").length; i++) {
            StartUpResponse startUp = MODEL.startUpShear(
                    growth.numbers("shear_rate_1_per_s")[i], Doubles.of(growth.numbers("time_s")[i]));
            near(growth.numbers("eta_plus_Pa_s")[i], startUp.shearStressGrowth().at(0), 1e-9);
            near(
                    growth.numbers("Psi1_plus_Pa_s2")[i],
                    startUp.firstNormalStressGrowth().at(0),
                    1e-9);
        }
    }

    /** The memory integral itself, by Gauss quadrature of Commons Math, for one mode. */
    @ParameterizedTest
    @CsvSource({"0.01, 0.3", "0.5, 2", "3, 1", "20, 0.1", "20, 40"})
    void agrees_with_quadrature_of_the_memory_integral(double rate, double time) {
        double g = 3000;
        double lambda = 1.7;
        double n = 0.2;
        DampedIntegral model = new DampedIntegral(RelaxationSpectrum.of(Doubles.of(g), Doubles.of(lambda)), n);
        var quadrature = new IterativeLegendreGaussIntegrator(24, 1e-13, 1e-13);
        double[] found = new double[2];
        for (int power = 1; power <= 2; power++) {
            int p = power;
            double recent = quadrature.integrate(
                    100_000, s -> g / lambda * Math.exp(-s / lambda - n * rate * s) * Math.pow(rate * s, p), 0, time);
            double old = g * Math.exp(-time / lambda - n * rate * time) * Math.pow(rate * time, p);
            found[p - 1] = recent + old;
        }
        Stress stress = model.stress(new StartUpShear(rate), time);
        near(found[0], stress.shear(), 1e-11);
        near(found[1], stress.firstNormalDifference(), 1e-11);
        assertEquals(0, stress.secondNormalDifference());
    }

    @Test
    void without_damping_it_is_the_convected_maxwell_model() {
        DampedIntegral undamped = new DampedIntegral(MELT, 0);
        UpperConvectedMaxwell maxwell = new UpperConvectedMaxwell(MELT);
        for (double time : new double[] {1e-3, 0.1, 10, 1e3}) {
            Stress integral = undamped.stress(new StartUpShear(5), time);
            Stress differential = maxwell.stress(new StartUpShear(5), time);
            near(integral.shear(), differential.shear(), 1e-11);
            near(integral.firstNormalDifference(), differential.firstNormalDifference(), 1e-10);
        }
    }

    /** Both models have the same linear limit; the damping enters in first order with n λ γ̇, λ up to 1000 s here. */
    @Test
    void at_low_rates_it_agrees_with_the_convected_maxwell_model() {
        double rate = 1e-9;
        Stress damped = MODEL.stress(new SteadyShear(rate), 0);
        Stress maxwell = new UpperConvectedMaxwell(MELT).stress(new SteadyShear(rate), 0);
        near(maxwell.shear(), damped.shear(), 1e-6);
        near(maxwell.firstNormalDifference(), damped.firstNormalDifference(), 1e-6);
    }

    @Test
    void start_up_ends_in_the_steady_state_after_a_maximum() {
        Stress steady = MODEL.stress(new SteadyShear(10), 0);
        near(steady.shear(), MODEL.stress(new StartUpShear(10), 1e5).shear(), 1e-12);
        assertTrue(MODEL.stress(new StartUpShear(10), 1).shear() > steady.shear());
        assertEquals(0, MODEL.stress(new StartUpShear(10), 0).shear());
        assertEquals(0, MODEL.stress(new SteadyShear(0), 0).shear());
    }

    @Test
    void refuses_histories_without_a_closed_form() {
        Flow reversal = new Flow() {
            @Override
            public String name() {
                return "reversal";
            }

            @Override
            public VelocityGradient gradient(double time) {
                return VelocityGradient.simpleShear(time < 0 ? 1 : -1);
            }

            @Override
            public Doubles changes() {
                return Doubles.of(0);
            }

            @Override
            public List<Component> components() {
                return new SteadyShear(1).components();
            }
        };
        RangeException refused = assertThrows(RangeException.class, () -> MODEL.stress(reversal, 1));
        assertTrue(refused.getMessage().contains("found reversal"));
    }

    @Test
    void says_that_it_has_no_second_normal_stress_and_that_its_damping_is_for_shear() {
        String limits = String.join("; ", MODEL.limits());
        assertTrue(limits.contains("N₂ = 0"), limits);
        assertTrue(limits.contains("n holds for shear only"), limits);
    }

    @ParameterizedTest
    @ValueSource(doubles = {-1, Double.NaN, Double.POSITIVE_INFINITY})
    void rejects_a_damping(double bad) {
        assertThrows(RangeException.class, () -> new DampedIntegral(MELT, bad));
    }

    private static void near(double expected, double found, double relative) {
        assertEquals(expected, found, relative * Math.abs(expected));
    }
}
