package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Optional;
import java.util.Random;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;

class NextMeasurementTest {
    private static final Parameter HEIGHT = Parameter.positive("height", "height", "Pa");
    private static final Parameter RATE = Parameter.positive("rate", "rate", "1/s");
    private static final Doubles TIMES =
            Doubles.of(IntStream.range(1, 400).mapToDouble(i -> 0.01 * i).toArray());

    private static Model decay(Parameter height) {
        return new TestModel(List.of(height, RATE), (x, b) -> b[0] * Math.exp(-b[1] * x), (x, b, d) -> {
            d[0] = Math.exp(-b[1] * x);
            d[1] = -x * b[0] * Math.exp(-b[1] * x);
        });
    }

    private static Problem.Builder decaying(Parameter height) {
        Random random = new Random(11);
        Doubles x = Doubles.of(0.2, 0.5, 1, 1.5, 2, 3);
        return Problem.of(decay(height)).data(x, x.map(t -> 3 * Math.exp(-0.8 * t) + 0.02 * random.nextGaussian()));
    }

    @Test
    void the_rate_of_a_decay_of_known_height_is_best_measured_after_one_over_the_rate() {
        Fit fit = decaying(HEIGHT.heldAt(3)).from(3, 1).solve();
        double rate = fit.values().at(1);
        // closed form: t exp(−k t) is largest at t = 1 / k; with one parameter both criteria are the same
        assertEquals(1 / rate, NextMeasurement.of(fit, TIMES).best().x(), 0.0051);
        NextMeasurement alone = NextMeasurement.of(fit, TIMES, "rate");
        assertEquals(1 / rate, alone.best().x(), 0.0051);
        assertEquals(
                NextMeasurement.of(fit, TIMES).best().shrink(), alone.best().shrink(), 1e-12);
    }

    @Test
    void relative_errors_make_the_latest_point_the_best_for_a_rate() {
        // closed form: d ln y / d k = −t
        Fit fit = decaying(HEIGHT.heldAt(3)).relative().from(3, 1).solve();
        NextMeasurement next = NextMeasurement.of(fit, TIMES);
        assertEquals(TIMES.largest(), next.best().x());
        assertTrue(next.headline().contains("outside the range measured"), next.headline());
        Fit logarithmic = decaying(HEIGHT.heldAt(3)).logarithmic().from(3, 1).solve();
        assertEquals(
                TIMES.largest(), NextMeasurement.of(logarithmic, TIMES).best().x());
    }

    @Test
    void the_error_of_a_line_shrinks_as_a_fit_with_the_point_shows() {
        Doubles x = Doubles.of(1, 2, 3, 4, 5);
        Doubles y = Doubles.of(1.1, 1.9, 3.2, 3.8, 5.1);
        Fit before = line(x, y);
        for (double added : new double[] {0, 2.5, 9}) {
            Fit after = line(with(x, added), with(y, before.at(added)));
            double expected = 1 - after.standardError("b2") / before.standardError("b2");
            Doubles candidate = Doubles.of(added);
            assertEquals(
                    expected, NextMeasurement.of(before, candidate, "b2").best().shrink(), 1e-9);
            // the volume is the root of the determinant of the covariance
            assertEquals(
                    1 - Math.sqrt(determinant(after) / determinant(before)),
                    NextMeasurement.of(before, candidate).best().shrink(),
                    1e-9);
        }
    }

    private static Fit line(Doubles x, Doubles y) {
        return Problem.of(StoppingDistances.polynomial(2))
                .data(x, y)
                .deviations(x.map(v -> 0.3))
                .errors(ErrorModel.ABSOLUTE)
                .from(0, 0)
                .solve();
    }

    private static Doubles with(Doubles before, double added) {
        return Doubles.of(
                DoubleStream.concat(before.stream(), DoubleStream.of(added)).toArray());
    }

    private static double determinant(Fit fit) {
        double cross = fit.covariance("b1", "b2");
        return fit.covariance("b1", "b1") * fit.covariance("b2", "b2") - cross * cross;
    }

    @Test
    void a_point_at_the_mean_tells_nothing_of_a_slope() {
        // closed form: the slope depends on distances from the mean only, here 3
        Fit fit = line(Doubles.of(1, 2, 3, 4, 5), Doubles.of(1.1, 1.9, 3.2, 3.8, 5.1));
        NextMeasurement next = NextMeasurement.of(fit, Doubles.of(3, 3.5, 5), "b2");
        assertEquals(5, next.best().x());
        assertEquals(0, next.ranked().get(2).shrink(), 1e-12);
        assertTrue(next.rows().get(0).notes().get(1).contains("median"));
        assertEquals(1, next.figures().size());
    }

    @Test
    void a_tied_parameter_shrinks_with_the_one_it_follows() {
        Tie tie = new Tie("height", List.of("rate"), source -> 4 * source[0], "height = 4 rate");
        Fit fit = decaying(HEIGHT).tie(tie).from(4, 1).solve();
        Doubles candidates = Doubles.of(0.1, 0.5, 2);
        // the relative error of both is the same
        assertEquals(
                NextMeasurement.of(fit, candidates, "rate").best().shrink(),
                NextMeasurement.of(fit, candidates, "height").best().shrink(),
                1e-9);
    }

    @Test
    void what_cannot_be_ranked_is_refused() {
        Fit held = decaying(HEIGHT.heldAt(3)).from(3, 1).solve();
        assertRefused("needs one candidate", held, Doubles.of(), Optional.empty());
        assertRefused("held", held, TIMES, Optional.of("height"));
        assertRefused("no parameter", held, TIMES, Optional.of("width"));
        assertRefused("x = NaN", held, Doubles.of(Double.NaN), Optional.empty());
        Model twice = new TestModel(2, (x, b) -> (b[0] + b[1]) * x, (x, b, d) -> {
            d[0] = x;
            d[1] = x;
        });
        Fit open = Problem.of(twice)
                .data(Doubles.of(1, 2, 3), Doubles.of(1, 2.1, 2.9))
                .from(1, 1)
                .solve();
        assertRefused("only the sum b1 + b2", open, TIMES, Optional.empty());
    }

    private static void assertRefused(String why, Fit fit, Doubles candidates, Optional<String> parameter) {
        String message = assertThrows(RangeException.class, () -> NextMeasurement.of(fit, 0, candidates, parameter))
                .getMessage();
        assertTrue(message.contains(why), message);
    }
}
