package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

/** A sine whose frequency is sought has a valley at every side lobe: the truth is known, most starts miss it. */
class MultiStartTest {
    private static final Doubles X =
            Doubles.of(IntStream.range(0, 40).mapToDouble(i -> 0.25 * i).toArray());
    private static final Problem SINE = Problem.of(Model.of(
                    "sine",
                    List.of(
                            Parameter.unbounded("height", "1").within(0.1, 10),
                            Parameter.unbounded("frequency", "1/s").within(0.1, 12)),
                    (x, b) -> b[0] * Math.sin(b[1] * x)))
            .data(X, X.map(x -> 2 * Math.sin(5 * x)))
            .from(1, 1);

    @Test
    void finds_the_valley_that_one_start_misses() {
        assertTrue(SINE.solve().sumOfSquares() > 1);
        MultiStart many = MultiStart.of(SINE, 40, 1, Progress.QUIET);
        assertEquals(5, many.best().values().at(1), 1e-8);
        assertEquals(2, many.best().values().at(0), 1e-8);
        assertTrue(many.reachedBest() < many.starts());
    }

    @Test
    void the_same_seed_gives_the_same_fits() {
        List<Fit> first = MultiStart.of(SINE, 20, 7, Progress.QUIET).fits();
        List<Fit> again = MultiStart.of(SINE, 20, 7, Progress.QUIET).fits();
        assertEquals(
                first.stream().map(Fit::values).toList(),
                again.stream().map(Fit::values).toList());
    }

    @Test
    void starts_without_a_value_are_passed_over_and_none_with_one_is_refused() {
        Model half = Model.of(
                "half",
                List.of(Parameter.unbounded("a", "1").within(-5, 5)),
                (x, b) -> b[0] < 0 ? Double.NaN : b[0] * x);
        Fit fit = Problem.of(half).data(X, X.map(x -> 3 * x)).from(-1).solveFromMany(10, 1);
        assertEquals(3, fit.values().at(0), 1e-9);
        Model nowhere = Model.of("nowhere", List.of(Parameter.unbounded("a", "1")), (x, b) -> Double.NaN);
        Problem none = Problem.of(nowhere).data(X, X).from(1);
        assertThrows(RangeException.class, () -> none.solveFromMany(5, 1));
    }

    @Test
    void stops_on_interrupt() {
        Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, () -> SINE.solveFromMany(20, 1));
        } finally {
            assertTrue(Thread.interrupted());
        }
    }
}
