package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTimeoutPreemptively;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.time.Duration;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/** Every wrong input gets a message that says what was found; nothing loops without end. */
class BadInputTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6);
    private static final Doubles Y = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2);
    private static final Parameter A = Parameter.unbounded("a", "Pa");
    private static final Parameter B = Parameter.unbounded("b", "Pa/s");

    private static Model line(Parameter a, Parameter b) {
        return Model.of("line", List.of(a, b), (x, p) -> p[0] + p[1] * x);
    }

    private static void refused(String words, org.junit.jupiter.api.function.Executable work) {
        String message = assertThrows(RangeException.class, work).getMessage();
        assertTrue(message.contains(words), message);
    }

    @Test
    void fewer_points_than_parameters() {
        refused(
                "found 1 points",
                () -> Problem.of(line(A, B)).data(X.pick(0), Y.pick(0)).from(0, 0));
    }

    @Test
    void all_x_identical() {
        refused(
                "at 1 different places",
                () -> Problem.of(line(A, B)).data(X.map(x -> 2), Y).from(0, 0));
    }

    @ParameterizedTest
    @ValueSource(doubles = {Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY})
    void data_that_are_not_finite(double bad) {
        refused("expected finite numbers", () -> Problem.of(line(A, B))
                .data(X, Y.map(y -> y > 7 ? bad : y))
                .from(0, 0));
        refused("expected finite numbers", () -> Problem.of(line(A, B))
                .data(X.map(x -> x > 5 ? bad : x), Y)
                .from(0, 0));
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -1, Double.NaN, Double.POSITIVE_INFINITY})
    void weights_that_are_zero_negative_or_not_finite(double bad) {
        refused("standard deviation above zero", () -> Problem.of(line(A, B))
                .data(X, Y)
                .deviations(X.map(x -> x > 5 ? bad : 0.1))
                .from(0, 0));
        assertThrows(
                RangeException.class, () -> DataSet.of("set", line(A, B), X, Y).absolute(bad));
    }

    @Test
    void bounds_that_contradict_each_other() {
        refused("contradictory bounds", () -> A.within(2, 1));
        refused("contradictory bounds", () -> A.within(Double.NaN, 1));
    }

    @Test
    void a_start_outside_its_bounds() {
        refused(
                "outside its bounds",
                () -> Problem.of(line(A.within(0, 1), B)).data(X, Y).from(2, 0));
    }

    @Test
    void a_start_that_is_missing_or_names_no_parameter() {
        Problem.Builder problem = Problem.of(line(A, B)).data(X, Y);
        refused("b has no start", () -> problem.from(Map.of("a", 1.0)));
        refused("[c]", () -> problem.from(Map.of("a", 1.0, "b", 1.0, "c", 1.0)));
    }

    @Test
    void a_model_without_a_value_at_some_parameters_makes_the_fit_step_back() {
        // the truth lies next to the edge beyond which there is no value
        Model edge = Model.of("edge", List.of(A.within(0, 100)), (x, p) -> p[0] < 0.9 ? Double.NaN : p[0] * p[0] * x);
        Fit fit = Problem.of(edge).data(X, X.map(x -> x)).from(50).solve();
        assertEquals(1, fit.values().at(0), 1e-8);
    }

    @Test
    void a_model_without_a_value_at_the_start_is_refused() {
        Model nowhere = Model.of("nowhere", List.of(A), (x, p) -> Double.NaN);
        refused("no finite value", () -> Problem.of(nowhere).data(X, Y).from(1).solve());
    }

    @Test
    void an_optimum_that_lies_where_the_model_has_no_value_is_not_called_reached() {
        Model cut = Model.of("cut", List.of(A), (x, p) -> p[0] > 2 ? p[0] * x : Double.NaN);
        Fit fit = assertTimeoutPreemptively(
                Duration.ofSeconds(10), () -> Problem.of(cut).data(X, X).from(3).solve());
        assertEquals(Fit.Status.STALLED, fit.status());
        assertTrue(fit.cautions().get(0).contains("without converging"));
    }

    @Test
    void a_singular_jacobian_ends_and_names_the_parameters() {
        Model twice = Model.of("twice", List.of(A, B), (x, p) -> (p[0] + p[1]) * x);
        Fit fit = assertTimeoutPreemptively(
                Duration.ofSeconds(10),
                () -> Problem.of(twice).data(X, Y).from(0, 0).solve());
        assertEquals(Fit.Status.CONVERGED, fit.status());
        assertEquals(Estimate.Status.NOT_IDENTIFIED, fit.estimate("a").status());
        assertTrue(fit.cautions().get(0).contains("do not tell a from b"));
    }

    @Test
    void parameter_names_used_twice() {
        refused(
                "uses the parameter name a twice",
                () -> Problem.of(line(A, A)).data(X, Y).from(0, 0));
    }

    @Test
    void data_sets_with_the_same_name_or_different_parameters_of_one_name() {
        DataSet first = DataSet.of("first", line(A, B), X, Y);
        refused("two data sets are called first", () -> Problem.of(first, first).from(0, 0));
        DataSet second = DataSet.of("second", line(A.within(0, 9), B), X, Y);
        refused("two models call different parameters a", () -> Problem.of(first, second)
                .from(0, 0));
    }

    @Test
    void ties_to_what_is_not_there_or_is_tied_itself() {
        Problem.Builder problem = Problem.of(line(A, B)).data(X, Y);
        refused("not there", () -> problem.tie(new Tie("a", List.of("c"), p -> p[0], "a = c"))
                .from(0, 0));
        Problem.Builder round = Problem.of(line(A, B)).data(X, Y);
        refused("tied itself", () -> round.tie(new Tie("a", List.of("b"), p -> p[0], "a = b"))
                .tie(new Tie("b", List.of("a"), p -> p[0], "b = a"))
                .from(0, 0));
    }

    @Test
    void absolute_deviations_that_were_not_given() {
        refused("their size was not given", () -> Problem.of(line(A, B))
                .data(X, Y)
                .relative()
                .errors(ErrorModel.ABSOLUTE)
                .from(0, 0));
    }

    @Test
    void an_interrupt_stops_a_fit_on_its_way() {
        Problem problem = Problem.of(line(A, B)).data(X, Y).from(0, 0);
        Progress interrupting = (done, total, work) -> Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, () -> problem.solve(interrupting));
        } finally {
            assertTrue(Thread.interrupted());
        }
    }
}
