package org.meltbook.viscosity;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows.TextColumn;
import org.meltbook.fit.Estimate;
import org.meltbook.fit.Fit;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.Series;
import org.meltbook.measure.Verdict;
import org.meltbook.spectrum.PublishedMelts;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

class ViscosityFitTest {
    private static FlowCurve curve(Doubles rates, Doubles viscosities) {
        double[] stresses = new double[rates.size()];
        for (int i = 0; i < stresses.length; i++) {
            stresses[i] = rates.at(i) * viscosities.at(i);
        }
        return FlowCurve.ofStress(Conditions.of("made sample", "made in a test"), rates.toArray(), stresses);
    }

    private static FlowCurve silicone(String fraction) {
        return PublishedMelts.filledSilicone().stream()
                .filter(curve -> curve.conditions().sample().endsWith(" " + fraction))
                .findFirst()
                .orElseThrow();
    }

    static List<ViscosityLaw> truths() {
        return List.of(
                new Newtonian(812),
                new PowerLaw(5200, 0.41),
                new Cross(9300, 0.8, 0.66),
                CarreauYasuda.of(51000, 3.1, 0.7, 0.35),
                CarreauYasuda.of(420, 0.05, 2, 0.6));
    }

    @ParameterizedTest
    @MethodSource("truths")
    void gives_back_the_law_that_made_the_data(ViscosityLaw truth) {
        Doubles rates = Doubles.logSpaced(1e-3, 1e4, 40);
        ViscosityFit fit = ViscosityFit.of(curve(rates, rates.map(truth::at)), truth.family());
        assertEquals(Fit.Status.CONVERGED, fit.fit().status());
        for (int i = 0; i < truth.values().size(); i++) {
            assertEquals(
                    truth.values().at(i),
                    fit.law().values().at(i),
                    1e-7 * truth.values().at(i));
        }
    }

    /**
     * The published summary of Zwaan et al. 2018 gives stress exponents from 1.06 to 1.10 over the six loadings. The
     * value of each loading is the slope of ln rate over ln stress through all 19 points, worked out elsewhere from the
     * same data.
     */
    @ParameterizedTest
    @CsvSource({"0.0000, 1.060", "0.0707, 1.064", "0.1044, 1.071", "0.1380, 1.081", "0.1717, 1.090", "0.2054, 1.103"})
    void finds_the_published_stress_exponents_of_the_filled_silicone(String fraction, double exponent) {
        Prediction found = StressExponent.of(silicone(fraction));
        assertEquals(exponent, found.value(), 0.005);
        // 1.06 and 1.10 as printed, to their last digit
        assertTrue(found.value() > 1.055 && found.value() < 1.105, found.toString());
        PowerLaw law =
                (PowerLaw) ViscosityFit.of(silicone(fraction), PowerLaw.FAMILY).law();
        assertEquals(found.value(), law.stressExponent(), 0.005);
    }

    @Test
    void a_survey_fits_every_law_of_the_catalogue_to_the_same_points() {
        LawSurvey survey = LawSurvey.of(silicone("0.0000"));
        assertEquals(
                ViscosityLaws.all(),
                survey.fits().stream().map(fit -> fit.law().family()).toList());
        for (ViscosityFit fit : survey.fits()) {
            assertEquals(ViscosityFit.of(silicone("0.0000"), fit.law().family()).law(), fit.law());
        }
        // the power law has a parameter more than the Newtonian, Carreau–Yasuda one more than Cross
        assertEquals(
                "[1, 2, 3, 4]",
                ((TextColumn) survey.rows().get(0).column("free parameters"))
                        .values()
                        .toString());
        assertTrue(survey.fits().get(1).fit().rootMeanSquare()
                < survey.fits().get(0).fit().rootMeanSquare());
        assertThrows(RangeException.class, () -> LawSurvey.of(silicone("0.0000"), List.of(), Progress.QUIET));
    }

    @Test
    void the_stress_exponent_of_a_power_law_is_the_inverse_of_its_own() {
        Doubles rates = Doubles.logSpaced(1e-2, 10, 7);
        assertEquals(
                1 / 0.4,
                StressExponent.of(curve(rates, rates.map(new PowerLaw(50, 0.4)::at)))
                        .value(),
                1e-12);
        assertThrows(RangeException.class, () -> StressExponent.of(curve(Doubles.of(1, 2), Doubles.of(1, 1))));
        assertThrows(RangeException.class, () -> StressExponent.of(curve(Doubles.of(0, 1, 2), Doubles.of(1, 1, 1))));
    }

    @Test
    void gives_a_plain_zero_shear_viscosity_where_the_plateau_was_measured() {
        Prediction zeroShear = ViscosityFit.of(silicone("0.99"), Cross.FAMILY).zeroShearViscosity();
        assertEquals(Prediction.Standing.WITHIN_WINDOW, zeroShear.standing());
        // the unfilled silicone stands at 42100 to 43200 Pa·s below 1e-3 1/s (published points)
        assertEquals(43000, zeroShear.value(), 0.03 * 43000);
        assertTrue(zeroShear.low() < zeroShear.value() && zeroShear.value() < zeroShear.high());
    }

    @Test
    void refuses_a_plain_zero_shear_viscosity_where_no_plateau_was_reached() {
        Cross truth = new Cross(9300, 8, 0.66);
        Doubles rates = Doubles.logSpaced(1, 1e3, 20);
        ViscosityFit fit = ViscosityFit.of(curve(rates, rates.map(truth::at)), Cross.FAMILY);
        Prediction zeroShear = fit.zeroShearViscosity();
        assertEquals(Prediction.Standing.AT_LEAST, zeroShear.standing());
        assertTrue(zeroShear.low() > 0 && zeroShear.low() <= 9300);
        assertThrows(RangeException.class, zeroShear::value);
        assertTrue(zeroShear.toString().contains("no plateau was reached"), zeroShear.toString());
        assertTrue(fit.cautions().stream().anyMatch(c -> c.contains("at least")));
    }

    @Test
    void refuses_it_from_a_law_without_plateau_or_a_law_that_misses_it() {
        Doubles rates = Doubles.logSpaced(1e-3, 1e3, 30);
        FlowCurve thinning = curve(rates, rates.map(new Cross(9300, 0.8, 0.66)::at));
        Prediction straight = ViscosityFit.of(thinning, PowerLaw.FAMILY).zeroShearViscosity();
        assertTrue(straight.toString().contains("has no plateau"), straight.toString());
        Prediction level = ViscosityFit.of(thinning, Newtonian.FAMILY).zeroShearViscosity();
        assertTrue(level.toString().contains("misses the points at the low end"), level.toString());
        Prediction rising = ViscosityFit.of(curve(rates, rates.map(new PowerLaw(5, 1.3)::at)), PowerLaw.FAMILY)
                .zeroShearViscosity();
        assertEquals(Prediction.Standing.UNDETERMINED, rising.standing());
    }

    /**
     * λ γ̇ = 0.0155 at the lowest rate: (λ γ̇)^0.66 = 0.0639, so the law is at 1/1.0639 = 94.0 % of its limit there (closed
     * form), just short of the 95 % asked.
     */
    @Test
    void a_curve_just_short_of_the_plateau_shows_the_limit_of_the_law_beside_the_bound() {
        Cross truth = new Cross(9300, 8, 0.66);
        Doubles rates = Doubles.logSpaced(0.0155 / 8, 10, 20);
        ViscosityFit fit = ViscosityFit.of(curve(rates, rates.map(truth::at)), Cross.FAMILY);
        Prediction bound = fit.zeroShearViscosity();
        assertEquals(Prediction.Standing.AT_LEAST, bound.standing());
        assertTrue(bound.toString().contains("94.0 % of its limit"), bound.toString());
        assertTrue(bound.toString().contains("the law's limit is 9300 Pa·s"), bound.toString());
        Prediction limit = fit.extrapolatedLimit().orElseThrow();
        assertEquals(Prediction.Standing.EXTRAPOLATED, limit.standing());
        assertEquals(9300, limit.value(), 1e-3);
        assertTrue(fit.headline().contains("at least"), fit.headline());
        assertTrue(fit.headline().contains("extrapolated"), fit.headline());
        assertEquals("9300 (extrapolated)", fit.rows().get(1).column("value").text(1));
        assertTrue(fit.cautions().stream().anyMatch(c -> c.contains("9300 Pa·s") && c.contains("(extrapolated)")));
    }

    /** The mean of level points lies above the truth every other time, the lowest of them hardly ever. */
    @Test
    void a_bound_lies_no_higher_than_any_point_of_the_low_end() {
        Doubles rates = Doubles.of(0.01, 0.02, 0.03, 1, 10);
        Doubles viscosities = Doubles.of(1020, 990, 1010, 500, 200);
        Prediction bound =
                ViscosityFit.of(curve(rates, viscosities), PowerLaw.FAMILY).zeroShearViscosity();
        assertEquals(990, bound.low(), 1e-9);
    }

    @Test
    void shows_no_limit_of_a_law_that_has_none_or_misses_the_points_or_carries_it() {
        Doubles rates = Doubles.logSpaced(1e-3, 1e3, 30);
        FlowCurve thinning = curve(rates, rates.map(new Cross(9300, 0.8, 0.66)::at));
        assertTrue(
                ViscosityFit.of(thinning, PowerLaw.FAMILY).extrapolatedLimit().isEmpty());
        assertTrue(
                ViscosityFit.of(thinning, Newtonian.FAMILY).extrapolatedLimit().isEmpty());
        assertTrue(ViscosityFit.of(thinning, Cross.FAMILY).extrapolatedLimit().isEmpty());
    }

    @Test
    void a_law_that_lies_too_low_misses_by_a_percentage_and_not_by_a_difference_of_logarithms() {
        Doubles rates = Doubles.logSpaced(1e-3, 1e3, 30);
        ViscosityFit fit = ViscosityFit.of(curve(rates, rates.map(new Cross(9300, 0.8, 0.66)::at)), Newtonian.FAMILY);
        double mean =
                CurveShape.of(rates, fit.fit().problem().only().y()).lowEnd().mean();
        double below = 1 - fit.law().zeroRateLimit() / mean;
        assertTrue(below > 0.5, "the case has to tell a share from a logarithm: " + below);
        String words = NumberText.of(100 * below, 2) + " % below";
        assertTrue(fit.zeroShearViscosity().toString().contains(words), fit.zeroShearViscosity() + " without " + words);
    }

    @Test
    void a_power_law_through_a_level_curve_is_no_failure() {
        Doubles rates = Doubles.logSpaced(1e-3, 1, 12);
        ViscosityFit fit = ViscosityFit.of(curve(rates, rates.map(r -> 64)), PowerLaw.FAMILY);
        assertEquals(1, ((PowerLaw) fit.law()).n(), 1e-9);
        assertTrue(fit.zeroShearViscosity().toString().contains("zero-shear viscosity"));
    }

    @Test
    void leaves_unusable_rows_out_and_says_how_many() {
        Cross truth = new Cross(9300, 0.8, 0.66);
        Doubles rates = Doubles.logSpaced(1e-3, 1e3, 20);
        double[] viscosities = rates.map(truth::at).toArray();
        viscosities[3] = 1;
        List<Verdict> verdicts = new ArrayList<>(java.util.Collections.nCopies(20, Verdict.SOUND));
        verdicts.set(3, Verdict.unusable("torque below the limit"));
        Series rate = Series.of(Quantity.SHEAR_RATE, rates.toArray());
        FlowCurve made = FlowCurve.of(
                Conditions.of("", "made in a test"),
                new Curve(rate, Series.of(Quantity.SHEAR_STRESS, viscosities), verdicts),
                new Curve(rate, Series.of(Quantity.VISCOSITY, viscosities), verdicts),
                Optional.empty(),
                List.of());
        ViscosityFit fit = ViscosityFit.of(made, Cross.FAMILY);
        assertEquals(9300, fit.law().zeroRateLimit(), 1e-3);
        assertTrue(fit.headline().contains("19 points used, 1 set aside"), fit.headline());
        assertTrue(fit.cautions().stream().anyMatch(c -> c.contains("1 of 20 points is marked unusable")));
    }

    @Test
    void holds_the_infinite_rate_viscosity_at_zero_unless_it_is_freed() {
        CarreauYasuda truth = new CarreauYasuda(51000, 3.1, 0.7, 0.35, 40);
        Doubles rates = Doubles.logSpaced(1e-3, 1e6, 60);
        FlowCurve made = curve(rates, rates.map(truth::at));
        ViscosityFit held = ViscosityFit.of(made, CarreauYasuda.FAMILY);
        assertEquals(Estimate.Status.HELD, held.fit().estimate("etaInf").status());
        ViscosityFit freed = ViscosityFit.of(made, CarreauYasuda.FAMILY.freeing("etaInf"));
        assertEquals(40, freed.fit().estimate("etaInf").value(), 1e-5);
    }

    @Test
    void says_that_a_level_curve_does_not_tell_where_it_would_bend() {
        Doubles rates = Doubles.logSpaced(1e-3, 1, 20);
        Doubles viscosities = rates.map(r -> 812 * (1 + 0.001 * Math.sin(1e5 * r)));
        ViscosityFit fit = ViscosityFit.of(curve(rates, viscosities), Cross.FAMILY);
        assertFalse(fit.fit().estimate("lambda").status() == Estimate.Status.ESTIMATED, fit.toString());
        assertFalse(fit.cautions().isEmpty());
    }

    @Test
    void refuses_too_few_points_and_rows_without_a_viscosity() {
        assertThrows(
                RangeException.class, () -> ViscosityFit.of(curve(Doubles.of(1, 2), Doubles.of(3, 2)), Cross.FAMILY));
        assertThrows(
                RangeException.class,
                () -> ViscosityFit.of(curve(Doubles.of(1, 2, 3), Doubles.of(3, -2, 1)), Newtonian.FAMILY));
    }

    @Test
    void shows_value_error_interval_unit_and_status_of_each_parameter() {
        ViscosityFit fit = ViscosityFit.of(silicone("1.6"), CarreauYasuda.FAMILY);
        assertEquals(
                List.of("parameter", "value ± standard error", "95 % interval", "unit", "status"),
                fit.rows().get(0).columns().stream().map(c -> c.heading()).toList());
        assertEquals(fit.headline(), fit.toString());
        assertEquals(2, fit.figures().size());
    }
}
