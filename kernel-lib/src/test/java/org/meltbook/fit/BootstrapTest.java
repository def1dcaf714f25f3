package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Random;
import java.util.concurrent.atomic.AtomicLong;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.distribution.TDistribution;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.RangeException;

class BootstrapTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12);
    private static final Doubles SCATTERED = Doubles.of(5.1, 4.2, 6.3, 5.5, 4.9, 5.0, 3.8, 5.7, 6.1, 4.6, 5.2, 4.4);
    private static final Model CONSTANT = new TestModel(1, (x, b) -> b[0], (x, b, d) -> d[0] = 1);
    private static final Model RISE = new TestModel(
            List.of(
                    Parameter.positive("top", "top", "Pa").on(Parameter.Scale.LINEAR),
                    Parameter.positive("rate", "rate", "1/s")),
            (x, b) -> b[0] * -Math.expm1(-b[1] * x),
            (x, b, d) -> {
                d[0] = -Math.expm1(-b[1] * x);
                d[1] = b[0] * x * Math.exp(-b[1] * x);
            });

    private static Fit mean() {
        return Problem.of(CONSTANT).data(X, SCATTERED).from(1).solve();
    }

    private static Fit rise(long seed) {
        Random random = new Random(seed);
        Doubles places = Doubles.logSpaced(0.2, 6, 20);
        Doubles y = places.map(x -> 10 * -Math.expm1(-0.25 * x) + 0.3 * random.nextGaussian());
        return Problem.of(RISE).data(places, y).from(10, 0.25).solve();
    }

    @ParameterizedTest
    @EnumSource(BootstrapSettings.Kind.class)
    void the_spread_of_a_mean_is_its_standard_error(BootstrapSettings.Kind kind) {
        Fit fit = mean();
        int refits = 4000;
        Bootstrap bootstrap = Bootstrap.of(fit, new BootstrapSettings(5, refits, kind, 2, 0.95));
        // closed form: s / sqrt(n); a standard deviation of R draws errs by its 1 / sqrt(2 R), three times that allowed
        double error = Math.sqrt(fit.reducedChiSquare() / X.size());
        assertEquals(error, bootstrap.standardError("b1"), 3 * error / Math.sqrt(2.0 * refits));
        assertEquals(0, bootstrap.bias("b1"), 3 * error / Math.sqrt(refits));
        assertEquals(0, bootstrap.failed());
        assertTrue(bootstrap.cautions().isEmpty());
    }

    @Test
    void studentised_normal_draws_of_a_mean_give_the_interval_of_student() {
        Fit fit = mean();
        int refits = 4000;
        Bootstrap bootstrap = Bootstrap.of(fit, BootstrapSettings.parametric(6).refits(refits));
        Estimate exact = fit.estimate("b1");
        // (mean − true mean) / standard error has Student's t distribution exactly; a quantile of share p of R draws
        // errs
        // by sqrt(p (1 − p) / R) over the density there
        TDistribution student = new TDistribution(11);
        double density = student.density(student.inverseCumulativeProbability(0.975));
        double allowed = 3 * Math.sqrt(0.025 * 0.975 / refits) / density * exact.error();
        assertEquals(exact.low(), bootstrap.studentised("b1").low(), allowed);
        assertEquals(exact.high(), bootstrap.studentised("b1").high(), allowed);
        // a percentile interval uses the normal distribution where Student's t belongs: 1.96 instead of 2.20
        assertTrue(bootstrap.percentile("b1").high() < exact.high() - allowed / 2);
    }

    @Test
    void corrected_intervals_agree_with_a_general_purpose_tool() {
        // SciPy 1.10.1, scipy.stats.bootstrap((y,), mean, n_resamples=200000), seeds 1 and 2: BCa 0.89375 to 2.425 and
        // 2.43125, percentile 0.8 to 2.194 and 2.2. It draws y itself; here residuals are widened by sqrt(16 / 15)
        Doubles y = Doubles.of(0.4, 0.1, 2.3, 0.9, 1.7, 5.8, 0.6, 0.3, 1.1, 3.2, 0.8, 0.2, 1.4, 0.5, 2.7, 0.7);
        double mean = y.stream().average().orElseThrow();
        double wider = Math.sqrt(16.0 / 15);
        Fit fit = Problem.of(CONSTANT).data(y, y).from(1).solve();
        Bootstrap bootstrap = Bootstrap.of(fit, BootstrapSettings.residual(11).refits(10_000));
        // 10000 draws: a percentile errs by up to 0.010, a corrected one by 0.015; three times allowed
        ParameterInterval corrected = bootstrap.corrected("b1");
        assertEquals(mean + wider * (0.89375 - mean), corrected.low(), 0.045);
        assertEquals(mean + wider * (2.428 - mean), corrected.high(), 0.045);
        ParameterInterval percentile = bootstrap.percentile("b1");
        assertEquals(mean + wider * (0.8 - mean), percentile.low(), 0.03);
        assertEquals(mean + wider * (2.197 - mean), percentile.high(), 0.03);
    }

    @ParameterizedTest
    @EnumSource(BootstrapSettings.Kind.class)
    void the_seed_alone_settles_the_numbers_not_the_threads(BootstrapSettings.Kind kind) {
        Fit fit = rise(1);
        BootstrapSettings settings = new BootstrapSettings(42, 200, kind, 1, 0.9);
        Bootstrap one = Bootstrap.of(fit, settings);
        assertEquals(one.refits(), Bootstrap.of(fit, settings.threads(2)).refits());
        assertEquals(one.rows(), Bootstrap.of(fit, settings.threads(3)).rows());
        Bootstrap other = Bootstrap.of(fit, new BootstrapSettings(43, 200, kind, 1, 0.9));
        assertNotEquals(one.refits(), other.refits());
        // more refits begin with the same ones
        Bootstrap more = Bootstrap.of(fit, settings.refits(250));
        assertEquals(one.refits(), more.refits().subList(0, one.refits().size()));
    }

    @Test
    void a_draw_has_the_residuals_drawn_whatever_the_weighting() {
        // identity: the residuals of drawn data at the fitted model are numbers out of the pool of the fit
        Doubles y = X.map(x -> 2 * Math.exp(-0.2 * x) * (1 + 0.1 * Math.sin(37 * x)));
        Model decay = Model.of(
                "decay",
                List.of(Parameter.positive("height", "height", "Pa"), Parameter.positive("rate", "rate", "1/s")),
                (x, b) -> b[0] * Math.exp(-b[1] * x));
        Problem.Builder builder = Problem.of(decay).data(X, y);
        for (Problem problem : List.of(
                builder.from(1, 1),
                builder.relative().from(1, 1),
                builder.logarithmic().from(1, 1),
                builder.deviations(y.map(v -> 0.1 * v)).from(1, 1))) {
            Fit fit = problem.solve();
            double[] first = new double[X.size()];
            double[] second = new double[X.size()];
            RefitPool pool = RefitPool.of(fit, BootstrapSettings.Kind.RESIDUAL);
            assertTrue(pool.draw(new Random(3), first));
            Random same = new Random(3);
            int[] places = X.stream().mapToInt(x -> same.nextInt(X.size())).toArray();
            Workspace workspace = Workspace.of(problem);
            workspace.measured(first);
            assertTrue(workspace.residuals(fit.coordinates().toArray(), second));
            for (int a = 0; a < places.length; a++) {
                for (int b = 0; b < a; b++) {
                    boolean alike = Math.abs(second[a] - second[b]) < 1e-10;
                    assertEquals(places[a] == places[b], alike, problem.errorWords());
                }
            }
        }
    }

    @Test
    void failed_refits_are_counted_and_told() {
        // a normal relative error below −1 leaves no measured value: a refit of 12 points fails with the chance
        // 1 − Φ(1 / s)¹², s the relative scatter
        Doubles wide = SCATTERED.map(v -> 5 + 3 * (v - 5));
        Fit fit = Problem.of(CONSTANT).data(X, wide).relative().from(5).solve();
        double share = Math.sqrt(fit.reducedChiSquare());
        double chance = 1 - Math.pow(new NormalDistribution().cumulativeProbability(1 / share), X.size());
        int refits = 2000;
        Bootstrap bootstrap = Bootstrap.of(fit, BootstrapSettings.parametric(8).refits(refits));
        assertTrue(chance > 0.02, "the case should fail now and then: " + chance);
        assertEquals(chance, bootstrap.failed() / (double) refits, 3 * Math.sqrt(chance * (1 - chance) / refits));
        assertEquals(refits - bootstrap.failed(), bootstrap.samples("b1").size());
        assertTrue(bootstrap.cautions().get(0).contains(bootstrap.failed() + " of 2000 refits failed"));
        assertTrue(bootstrap.cautions().get(0).contains("too narrow"));
    }

    @Test
    void refits_that_rest_on_a_bound_are_told_and_leave_no_studentised_interval() {
        Fit fit = Problem.of(CONSTANT)
                .data(X, SCATTERED)
                .parameter(Parameter.unbounded("b1", "1").within(5, 9))
                .from(6)
                .solve();
        Bootstrap bootstrap = Bootstrap.of(fit, BootstrapSettings.residual(8));
        assertEquals(5, bootstrap.percentile("b1").low());
        assertTrue(Double.isNaN(bootstrap.studentised("b1").low()));
        assertTrue(bootstrap.cautions().get(0).contains("rests on a bound in"));
        assertTrue(bootstrap.headline().contains("(BCa)"), bootstrap.headline());
    }

    @Test
    void too_few_refits_for_the_level_give_no_interval() {
        Bootstrap few = Bootstrap.of(mean(), BootstrapSettings.residual(1).refits(38));
        assertTrue(Double.isNaN(few.percentile("b1").low()));
        assertTrue(few.cautions().get(0).contains("at least 39 refits"));
        // 39 refits: place 40 · 0.025 is the first one
        Bootstrap enough = Bootstrap.of(mean(), BootstrapSettings.residual(1).refits(39));
        assertEquals(enough.samples("b1").smallest(), enough.percentile("b1").low());
    }

    @Test
    void wrong_questions_throw_with_what_was_found() {
        assertThrows(RangeException.class, () -> BootstrapSettings.residual(1).refits(5));
        assertThrows(RangeException.class, () -> BootstrapSettings.residual(1).threads(0));
        assertThrows(RangeException.class, () -> BootstrapSettings.residual(1).level(1));
        Fit exact = Problem.of(CONSTANT).data(X, X.map(x -> 2)).from(1).solve();
        assertThrows(RangeException.class, () -> Bootstrap.of(exact, BootstrapSettings.residual(1)));
        Fit robust = Problem.of(CONSTANT)
                .data(X, SCATTERED)
                .loss(Loss.huber(1))
                .from(1)
                .solve();
        assertThrows(RangeException.class, () -> Bootstrap.of(robust, BootstrapSettings.parametric(1)));
        assertTrue(Double.isNaN(Bootstrap.of(robust, BootstrapSettings.residual(1))
                .studentised("b1")
                .low()));
    }

    @Test
    void shows_progress_and_stops_on_interrupt_with_no_thread_left_working() {
        AtomicLong shown = new AtomicLong();
        Bootstrap.of(mean(), BootstrapSettings.residual(1).threads(1).refits(100), (done, total, work) -> {
            shown.incrementAndGet();
            assertEquals(work.equals("refits") ? 100 : 12, total);
        });
        assertEquals(112, shown.get());
        try {
            assertThrows(
                    InterruptedComputation.class,
                    () -> Bootstrap.of(rise(1), BootstrapSettings.residual(1).refits(1_000_000), (d, t, w) -> {
                        if (d > 50) {
                            Thread.currentThread().interrupt();
                        }
                    }));
            assertTrue(Thread.currentThread().isInterrupted());
        } finally {
            Thread.interrupted();
        }
        assertTrue(Thread.getAllStackTraces().keySet().stream()
                .noneMatch(t -> t.getName().startsWith("refits")));
    }

    @Test
    void what_a_model_throws_on_another_thread_is_thrown_to_the_caller() {
        Thread caller = Thread.currentThread();
        Model touchy = new TestModel(
                1,
                (x, b) -> {
                    if (Thread.currentThread() != caller) {
                        throw new IllegalStateException("not here");
                    }
                    return b[0];
                },
                (x, b, d) -> d[0] = 1);
        Fit fit = Problem.of(touchy).data(X, SCATTERED).from(1).solve();
        assertThrows(
                IllegalStateException.class,
                () -> Bootstrap.of(fit, BootstrapSettings.residual(1).refits(100_000)));
    }

    /** Studentised intervals at nominal 95 % on 200 skewed data sets: within 3 sqrt(0.95 · 0.05 / 200) of it. */
    @Test
    void studentised_intervals_cover_the_truth_at_the_stated_level() {
        int sets = 200;
        int held = 0;
        for (int k = 0; k < sets; k++) {
            Bootstrap bootstrap =
                    Bootstrap.of(rise(7000 + k), BootstrapSettings.residual(k).refits(199));
            held += bootstrap.studentised("rate").holds(0.25) ? 1 : 0;
        }
        assertEquals(0.95, (double) held / sets, 3 * Math.sqrt(0.95 * 0.05 / sets));
    }
}
