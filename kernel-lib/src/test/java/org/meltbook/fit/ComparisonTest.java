package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.FDistribution;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

class ComparisonTest {
    private static final Doubles X = StoppingDistances.SPEED;
    private static final Doubles Y = StoppingDistances.DISTANCE;

    private static Problem.Builder problem(int terms) {
        return Problem.of(StoppingDistances.polynomial(terms)).data(X, Y);
    }

    @Test
    void weights_and_ratios_follow_from_the_criteria() {
        Comparison comparison = Comparison.of(Map.of(
                "constant", problem(1).from(0).solve(),
                "line", problem(2).from(0, 0).solve(),
                "parabola", problem(3).from(0, 0, 0).solve()));
        List<Comparison.Entry> ranked = comparison.ranked();
        double total = ranked.stream()
                .mapToDouble(e -> Math.exp(
                        -(e.criteria().aicc() - ranked.get(0).criteria().aicc()) / 2))
                .sum();
        assertEquals(1, ranked.stream().mapToDouble(Comparison.Entry::weight).sum(), 1e-12);
        assertEquals(1 / total, ranked.get(0).weight(), 1e-12);
        assertEquals(0, ranked.get(0).difference());
        for (Comparison.Entry entry : ranked) {
            assertEquals(ranked.get(0).weight() / entry.weight(), entry.evidenceRatio(), 1e-9 * entry.evidenceRatio());
        }
        assertEquals("constant", ranked.get(2).name());
        // R (memory): residual sums of squares 11354 and 10825; so the parabola is ahead by
        // 50 ln(11354 / 10825) − (8 + 40 / 45) + (6 + 24 / 46), far below 2
        assertEquals("line", ranked.get(1).name());
        assertEquals(
                50 * Math.log(11354 / 10825.0) - 2 - 40.0 / 45 + 24.0 / 46,
                ranked.get(1).difference(),
                0.005);
        assertTrue(comparison.sentence().contains("do not decide between parabola and line"), comparison.sentence());
        assertTrue(comparison.sentence().contains("line has the fewest"), comparison.sentence());
    }

    @Test
    void a_clear_case_is_called_clear() {
        Comparison comparison =
                Comparison.of(problem(1).from(0).solve(), problem(2).from(0, 0).solve());
        // by hand: Δ = n ln(RSS₁ / RSS₂) + 2 (2 − 3) + 12 / 47 − 24 / 46, with R² = 0.6511 of R (memory)
        double difference = -50 * Math.log(1 - 0.6511) - 2 + 12.0 / 47 - 24.0 / 46;
        assertEquals(difference, comparison.ranked().get(1).difference(), 0.01);
        assertTrue(comparison.sentence().contains("support test model (2) best"), comparison.sentence());
        assertEquals(comparison.sentence(), comparison.toString());
    }

    @Test
    void fits_on_other_rows_or_weightings_are_refused() {
        Fit fit = problem(2).from(0, 0).solve();
        assertRefused("49 rows", fit, shortened().from(0, 0).solve());
        Doubles moved = Y.map(y -> y == 120 ? 121 : y);
        assertRefused(
                "row 49",
                fit,
                Problem.of(StoppingDistances.polynomial(2))
                        .data(X, moved)
                        .from(0, 0)
                        .solve());
        assertRefused("weightings", fit, problem(2).relative().from(0, 0).solve());
        assertRefused(
                "absolute",
                fit,
                problem(2).errors(ErrorModel.ABSOLUTE).deviations(X).from(0, 0).solve());
        assertRefused(
                "deviation of row 1",
                problem(2).deviations(X).from(0, 0).solve(),
                problem(2).deviations(Y).from(0, 0).solve());
        assertRefused("Huber", fit, problem(2).loss(Loss.huber(10)).from(0, 0).solve());
        assertThrows(RangeException.class, () -> Comparison.of(fit));
    }

    private static Problem.Builder shortened() {
        int[] places = IntStream.range(0, 49).toArray();
        return Problem.of(StoppingDistances.polynomial(2)).data(X.pick(places), Y.pick(places));
    }

    private static void assertRefused(String why, Fit one, Fit other) {
        String message = assertThrows(RangeException.class, () -> Comparison.of(one, other))
                .getMessage();
        assertTrue(message.contains(why), message);
    }

    @Test
    void a_model_with_too_many_parameters_for_the_points_is_not_ranked() {
        Doubles x = Doubles.of(1, 2, 3, 4, 5);
        Doubles y = Doubles.of(1, 2.2, 2.9, 4.1, 5.3);
        Comparison comparison = Comparison.of(
                Problem.of(StoppingDistances.polynomial(4))
                        .data(x, y)
                        .from(0, 0, 0, 0)
                        .solve(),
                Problem.of(StoppingDistances.polynomial(2))
                        .data(x, y)
                        .from(0, 0)
                        .solve());
        assertTrue(Double.isNaN(comparison.ranked().get(1).weight()));
        assertEquals(1, comparison.ranked().get(0).weight(), 1e-12);
        assertTrue(comparison.cautions().get(0).contains("has no AICc"));
        assertTrue(comparison.sentence().contains("but test model (2)"), comparison.sentence());
    }

    /** Rates of 8, 12 and 14 %: theory for a fifth parameter where four are true, the last column. */
    @ParameterizedTest
    @CsvSource({"20, 0.08", "40, 0.12", "100, 0.14"})
    void a_spare_parameter_is_taken_at_the_rate_of_theory(int points, double rounded) {
        int draws = 4000;
        Doubles x = Doubles.of(IntStream.range(0, points)
                .mapToDouble(i -> 2.0 * i / (points - 1) - 1)
                .toArray());
        Solver enough = solver(4, x);
        Solver spare = solver(5, x);
        Random random = new Random(20 + points);
        int taken = 0;
        for (int draw = 0; draw < draws; draw++) {
            double[] y = x.map(v -> 1 + v - v * v + 0.5 * v * v * v + 0.1 * random.nextGaussian())
                    .toArray();
            taken += corrected(spare, y) < corrected(enough, y) ? 1 : 0;
        }
        // closed form: n ln(1 + F / (n − 5)) must exceed the difference of the penalties, F with 1 and n − 5
        double penalty = 12 + 84.0 / (points - 7) - 10 - 60.0 / (points - 6);
        double rate =
                1 - new FDistribution(1, points - 5).cumulativeProbability((points - 5) * Math.expm1(penalty / points));
        assertEquals(rounded, rate, 0.005);
        // three standard errors of the count: 0.013 to 0.017
        double error = Math.sqrt(rate * (1 - rate) / draws);
        assertEquals(rate, (double) taken / draws, 3 * error);
    }

    private static Solver solver(int terms, Doubles x) {
        return Solver.of(
                Problem.of(StoppingDistances.polynomial(terms)).data(x, x).from(new double[terms]));
    }

    /** What {@link Comparison} ranks by, for other measured values. */
    private static double corrected(Solver solver, double[] measured) {
        solver.workspace().measured(measured);
        assertEquals(Fit.Status.CONVERGED, solver.solve(Progress.QUIET));
        return InformationCriteria.of(solver.workspace().problem(), solver.cost())
                .aicc();
    }
}
