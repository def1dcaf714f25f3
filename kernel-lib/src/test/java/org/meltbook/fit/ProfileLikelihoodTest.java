package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Random;
import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.analysis.solvers.BrentSolver;
import org.apache.commons.math3.distribution.FDistribution;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

class ProfileLikelihoodTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles NOISY = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);
    private static final Model LINE = new TestModel(2, (x, b) -> b[0] + b[1] * x, (x, b, d) -> {
        d[0] = 1;
        d[1] = x;
    });

    private static Model decay(Parameter rate) {
        return new TestModel(
                List.of(rate), (x, b) -> Math.exp(-b[0] * x), (x, b, d) -> d[0] = -x * Math.exp(-b[0] * x));
    }

    private static ProfileLikelihood profile(Fit fit, String name, double level) {
        return ProfileLikelihood.of(fit, name, level, Progress.QUIET);
    }

    @Test
    void for_a_linear_model_it_is_the_interval_of_student() {
        // the profile of a linear model is an exact parabola: the interval is value ± t · standard error
        Fit fit = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        for (Estimate estimate : fit.estimates()) {
            ProfileLikelihood profile =
                    ProfileLikelihood.of(fit, estimate.parameter().name());
            assertEquals(estimate.low(), profile.low(), 1e-8 * estimate.error());
            assertEquals(estimate.high(), profile.high(), 1e-8 * estimate.error());
        }
    }

    @Test
    void its_threshold_is_that_of_f_or_of_chi_square_and_says_which() {
        Fit scaled = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        ProfileLikelihood byF = profile(scaled, "b2", 0.9);
        // F with 1 and 6 degrees of freedom from Commons Math
        assertEquals(new FDistribution(1, 6).inverseCumulativeProbability(0.9), byF.threshold(), 1e-6);
        assertTrue(byF.rows().get(0).notes().get(0).contains("F with 1 and 6 degrees of freedom"));
        Fit absolute = Problem.of(LINE)
                .data(X, NOISY)
                .deviations(X.map(x -> 0.2))
                .errors(ErrorModel.ABSOLUTE)
                .from(0, 0)
                .solve();
        ProfileLikelihood byChiSquare = ProfileLikelihood.of(absolute, "b2");
        // chi-square with 1 degree of freedom at 95 %: 3.841459 (any table)
        assertEquals(3.841459, byChiSquare.threshold(), 1e-6);
        assertTrue(byChiSquare.rows().get(0).notes().get(0).contains("chi-square with 1 degree of freedom"));
        // closed form: half-width 1.959964 · 0.2 / sqrt(Σ(x − 4.5)²), Σ = 42
        double half = new NormalDistribution().inverseCumulativeProbability(0.975) * 0.2 / Math.sqrt(42);
        assertEquals(absolute.values().at(1) + half, byChiSquare.high(), 1e-8 * half);
    }

    @ParameterizedTest
    @ValueSource(strings = {"LINEAR", "LOG"})
    void with_one_parameter_it_ends_where_the_sum_of_squares_meets_the_threshold(String scale) {
        Doubles x = Doubles.of(0.2, 0.5, 1, 2, 4);
        Doubles y = Doubles.of(0.9, 0.55, 0.5, 0.1, 0.12);
        Parameter rate = Parameter.positive("rate", "rate", "1/s").on(Parameter.Scale.valueOf(scale));
        Fit fit = Problem.of(decay(rate)).data(x, y).from(1).solve();
        DoubleUnaryOperator squares = k -> {
            double sum = 0;
            for (int i = 0; i < x.size(); i++) {
                sum += Math.pow(y.at(i) - Math.exp(-k * x.at(i)), 2);
            }
            return sum;
        };
        // direct roots of S(k) = S(least) (1 + F(1, 4) / 4) by Commons Math, from the formula alone
        double best = fit.values().at(0);
        double rim = squares.applyAsDouble(best) * (1 + new FDistribution(1, 4).inverseCumulativeProbability(0.95) / 4);
        BrentSolver roots = new BrentSolver(1e-14, 1e-14);
        double low = roots.solve(200, k -> squares.applyAsDouble(k) - rim, 1e-6, best);
        double high = roots.solve(200, k -> squares.applyAsDouble(k) - rim, best, 50);
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "rate");
        // Commons Math gives the F quantile to about 1e-9
        assertEquals(low, profile.low(), 1e-7 * low);
        assertEquals(high, profile.high(), 1e-7 * high);
        assertTrue(high - best > 1.2 * (best - low), "the case should be skewed");
    }

    @Test
    void agrees_with_a_general_purpose_tool_on_published_data() {
        // NIST StRD Misra1a; SciPy 1.10.1: S(b2) = least over b1 in closed form (f·y / f·f), S(b1) = root over b2 of
        // its
        // derivative, ends by brentq of (S − least S) / (least S / 12) = t(0.975, 12)²
        StatisticalReference misra = StatisticalReference.of("Misra1a");
        Model model = new TestModel(2, (x, b) -> b[0] * -Math.expm1(-b[1] * x), (x, b, d) -> {
            d[0] = -Math.expm1(-b[1] * x);
            d[1] = b[0] * x * Math.exp(-b[1] * x);
        });
        Fit fit = Problem.of(model)
                .data(misra.x(), misra.y())
                .from(misra.starts().get(0).toArray())
                .solve();
        ProfileLikelihood first = ProfileLikelihood.of(fit, "b1");
        assertEquals(233.1953079616704, first.low(), 1e-5);
        assertEquals(245.0173692432082, first.high(), 1e-5);
        ProfileLikelihood second = ProfileLikelihood.of(fit, "b2");
        assertEquals(5.34318267928763e-4, second.low(), 1e-11);
        assertEquals(5.660298972764162e-4, second.high(), 1e-11);
        assertTrue(second.cautions().isEmpty(), second.cautions().toString());
    }

    @Test
    void an_interval_that_the_data_do_not_close_says_so() {
        // 1 − exp(−k x) at large k x is 1 whatever k is: nothing closes the interval above
        Parameter rate = Parameter.positive("rate", "rate", "1/s");
        Model rise = new TestModel(
                List.of(rate), (x, b) -> -Math.expm1(-b[0] * x), (x, b, d) -> d[0] = x * Math.exp(-b[0] * x));
        Doubles y = Doubles.of(0.97, 1.01, 0.99, 1.02, 0.98, 1, 0.99, 1.01);
        Fit fit = Problem.of(rise).data(X, y).from(2).solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "rate");
        assertEquals(ProfileEnd.Kind.DATA, profile.lower().kind());
        assertEquals(ProfileEnd.Kind.OPEN, profile.upper().kind());
        assertEquals(Double.POSITIVE_INFINITY, profile.high());
        assertTrue(profile.headline().contains("the data do not end it above"), profile.headline());
        assertTrue(
                profile.cautions().get(0).contains("the upper end"),
                profile.cautions().toString());
        assertTrue(
                profile.cautions().get(0).contains("open"), profile.cautions().toString());
    }

    @Test
    void a_parameter_that_only_enters_in_a_product_is_open_on_both_sides() {
        Model product = new TestModel(2, (x, b) -> b[0] * b[1] * x, (x, b, d) -> {
            d[0] = b[1] * x;
            d[1] = b[0] * x;
        });
        Fit fit = Problem.of(product)
                .data(X, NOISY)
                .parameter(Parameter.positive("b1", "b1", "1"))
                .from(1, 2)
                .solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b1");
        assertEquals(ProfileEnd.Kind.OPEN, profile.lower().kind());
        assertEquals(ProfileEnd.Kind.OPEN, profile.upper().kind());
        assertTrue(profile.headline().contains("on either side"), profile.headline());
    }

    @Test
    void a_bound_within_the_interval_ends_it_and_says_so() {
        Fit free = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        double beyond = free.estimate("b1").value() - 0.5 * free.estimate("b1").error();
        Parameter bounded = Parameter.unbounded("b1", "1").within(beyond, 100);
        Fit fit = Problem.of(LINE).data(X, NOISY).parameter(bounded).from(50, 0).solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b1");
        assertEquals(ProfileEnd.Kind.BOUND, profile.lower().kind());
        assertEquals(beyond, profile.low());
        // the parabola of a linear model: half a standard error away the rise is a quarter
        assertEquals(0.25, profile.lower().rise(), 1e-6);
        assertEquals(ProfileEnd.Kind.DATA, profile.upper().kind());
        assertTrue(profile.rows().get(0).toString().contains("set by the bound"));
    }

    @Test
    void steps_back_where_the_model_has_no_value() {
        // sqrt(b) x has no value below zero, and the threshold lies beyond
        Model root = new TestModel(1, (x, b) -> Math.sqrt(b[0]) * x, (x, b, d) -> d[0] = x / (2 * Math.sqrt(b[0])));
        Doubles y = Doubles.of(1, -1, 1.5, -0.5, 1, -1, 1, 0.2);
        Fit fit = Problem.of(root).data(X, y).from(1).solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b1");
        assertEquals(ProfileEnd.Kind.LOST, profile.lower().kind());
        assertTrue(profile.lower().reached() >= 0);
        assertTrue(profile.cautions().get(0).contains("no value of the model"));
        assertEquals(ProfileEnd.Kind.DATA, profile.upper().kind());
    }

    @Test
    void with_a_robust_loss_it_meets_the_standard_error_near_the_optimum() {
        // identity: for a constant the curvature of the cost is n · mean curvature of the loss, so that a small level
        // gives value ± t · standard error; the outlier keeps its place
        Model constant = new TestModel(1, (x, b) -> b[0], (x, b, d) -> d[0] = 1);
        Doubles y = Doubles.of(1.1, 0.8, 1.3, 0.9, 1.05, 0.95, 1.2, 9);
        Fit fit = Problem.of(constant).data(X, y).loss(Loss.softL1(0.5)).from(1).solve();
        ProfileLikelihood profile = profile(fit, "b1", 0.01);
        double half = Math.sqrt(profile.threshold()) * fit.standardError("b1");
        assertEquals(2 * half, profile.high() - profile.low(), 1e-3 * half);
    }

    @Test
    void a_tied_parameter_follows_along_the_profile() {
        // y = b1 (1 + 2 x) is linear in b1: closed form of the interval by Student's t
        Tie tie = new Tie("b2", List.of("b1"), s -> 2 * s[0], "b2 = 2 b1");
        Fit fit = Problem.of(LINE).data(X, NOISY).tie(tie).from(1, 2).solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b1");
        assertEquals(fit.estimate("b1").low(), profile.low(), 1e-8);
        assertEquals(fit.estimate("b1").high(), profile.high(), 1e-8);
        ProfilePoint first = profile.points().get(0);
        assertEquals(2 * first.value(), first.values().at(1), 1e-12);
        assertThrows(RangeException.class, () -> ProfileLikelihood.of(fit, "b2"));
    }

    @Test
    void a_better_fit_met_on_the_way_is_told() {
        // cos(b x) has many optima; 5.9 is not the best one for data made with 5
        Doubles x = Doubles.of(0, 0.5, 1, 1.5, 2, 2.5, 3);
        Model wave = new TestModel(1, (t, b) -> Math.cos(b[0] * t), (t, b, d) -> d[0] = -t * Math.sin(b[0] * t));
        Doubles y = x.map(t -> Math.cos(5 * t) + 0.01 * Math.sin(40 * t));
        Fit fit = Problem.of(wave).data(x, y).from(3).solve();
        Fit best = Problem.of(wave).data(x, y).from(5).solve();
        assertTrue(fit.cost() > 10 * best.cost(), "the start should lead to a worse optimum");
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b1");
        assertTrue(
                profile.cautions().stream().anyMatch(c -> c.contains("a better fit was met")),
                profile + " " + profile.cautions());
    }

    @Test
    void shows_the_trace_as_table_and_figure() {
        Fit fit = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        ProfileLikelihood profile = ProfileLikelihood.of(fit, "b2");
        assertEquals(profile.points().size(), profile.rows().get(1).size());
        assertEquals(3, profile.figures().get(0).layers().size());
        assertFalse(profile.rows().get(1).column("b1").text(0).isBlank());
        // six steps a side to the threshold of a parabola, then a secant that meets it at once
        assertTrue(
                profile.points().size() < 22,
                "places solved: " + profile.points().size());
        // exact parabola: the profile and what the standard error says are one line
        for (ProfilePoint point : profile.points()) {
            double t = (point.value() - fit.values().at(1)) / fit.standardError("b2");
            assertEquals(t * t, point.rise(), 1e-8 * (1 + t * t));
        }
    }

    @Test
    void wrong_questions_throw_with_what_was_found() {
        Fit fit = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        assertThrows(RangeException.class, () -> ProfileLikelihood.of(fit, "b9"));
        assertThrows(RangeException.class, () -> profile(fit, "b1", 95));
        assertThrows(RangeException.class, () -> profile(fit, "b1", Double.NaN));
        Fit held = fit.problem().holding("b1", 1).solve();
        assertThrows(RangeException.class, () -> ProfileLikelihood.of(held, "b1"));
        Fit exact = Problem.of(LINE)
                .data(Doubles.of(1, 2), Doubles.of(3, 5))
                .from(0, 0)
                .solve();
        assertThrows(RangeException.class, () -> ProfileLikelihood.of(exact, "b1"));
    }

    @Test
    void stops_on_interrupt() {
        Fit fit = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, () -> ProfileLikelihood.of(fit, "b1"));
        } finally {
            Thread.interrupted();
        }
    }

    /** Nominal 95 %; of n seeded data sets 95 % ± 3 sqrt(0.95 · 0.05 / n) pass in 997 of 1000 studies. */
    @Test
    void covers_the_truth_at_the_stated_level() {
        int lines = 300;
        int covered = 0;
        for (int k = 0; k < lines; k++) {
            Random random = new Random(1000 + k);
            Doubles y = X.map(x -> 1 + 0.5 * x + 0.3 * random.nextGaussian());
            Fit fit = Problem.of(LINE).data(X, y).from(0, 0).solve();
            covered += holds(ProfileLikelihood.of(fit, "b2"), 0.5);
        }
        assertEquals(0.95, (double) covered / lines, 3 * Math.sqrt(0.95 * 0.05 / lines));
        // a saturating rise whose plateau lies beyond the data: the plateau is strongly skewed upward
        int skewed = 200;
        int held = 0;
        Parameter top = Parameter.positive("top", "top", "Pa").on(Parameter.Scale.LINEAR);
        Parameter rate = Parameter.positive("rate", "rate", "1/s");
        Model rise = new TestModel(List.of(top, rate), (x, b) -> b[0] * -Math.expm1(-b[1] * x), (x, b, d) -> {
            d[0] = -Math.expm1(-b[1] * x);
            d[1] = b[0] * x * Math.exp(-b[1] * x);
        });
        Doubles places = Doubles.logSpaced(0.2, 4, 20);
        for (int k = 0; k < skewed; k++) {
            Random random = new Random(5000 + k);
            Doubles y = places.map(x -> 10 * -Math.expm1(-0.25 * x) + 0.3 * random.nextGaussian());
            Fit fit = Problem.of(rise).data(places, y).from(10, 0.25).solve();
            held += holds(ProfileLikelihood.of(fit, "top"), 10);
        }
        assertEquals(0.95, (double) held / skewed, 3 * Math.sqrt(0.95 * 0.05 / skewed));
    }

    private static int holds(ProfileLikelihood profile, double truth) {
        return profile.low() <= truth && truth <= profile.high() ? 1 : 0;
    }
}
