package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Map;
import java.util.Random;
import org.apache.commons.math3.stat.regression.OLSMultipleLinearRegression;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;

/** Data sets that share parameters, ties, held parameters, and the two error models, against linear regression. */
class JointFitTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles FIRST = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);
    private static final Doubles SECOND = Doubles.of(12.3, 12.8, 14.1, 15.2, 15.8, 17.1, 18.2, 18.7);

    private static Model line(String level) {
        return new TestModel(
                List.of(Parameter.unbounded(level, "Pa"), Parameter.unbounded("slope", "Pa/s")),
                (x, b) -> b[0] + b[1] * x,
                (x, b, d) -> {
                    d[0] = 1;
                    d[1] = x;
                });
    }

    private static Problem.Builder both() {
        return Problem.of(
                DataSet.of("first", line("low"), X, FIRST).absolute(0.5),
                DataSet.of("second", line("high"), X, SECOND).absolute(0.5));
    }

    /** Commons Math's linear regression of both lines at once: columns low, slope, high. */
    private static OLSMultipleLinearRegression outside() {
        double[] y = new double[16];
        double[][] columns = new double[16][];
        for (int i = 0; i < 8; i++) {
            y[i] = FIRST.at(i);
            y[8 + i] = SECOND.at(i);
            columns[i] = new double[] {1, X.at(i), 0};
            columns[8 + i] = new double[] {0, X.at(i), 1};
        }
        OLSMultipleLinearRegression regression = new OLSMultipleLinearRegression();
        regression.setNoIntercept(true);
        regression.newSampleData(y, columns);
        return regression;
    }

    @Test
    void two_lines_with_one_slope_are_a_linear_regression() {
        Fit fit = both().from(Map.of("low", 0.0, "high", 0.0, "slope", 0.0)).solve();
        assertArrayEquals(outside().estimateRegressionParameters(), fit.values().toArray(), 1e-9);
        double[] errors = outside().estimateRegressionParametersStandardErrors();
        assertEquals(errors[1], fit.standardError("slope"), 1e-9);
        assertEquals(errors[2], fit.standardError("high"), 1e-9);
        assertEquals(13, fit.degreesOfFreedom());
        assertEquals(
                SECOND.at(3) + 0.5 * fit.residuals(1).at(3), fit.predictions(1).at(3), 1e-12);
    }

    @Test
    void absolute_deviations_give_errors_that_do_not_depend_on_the_scatter() {
        Fit fit = both().errors(ErrorModel.ABSOLUTE).from(0, 0, 0).solve();
        double scale = 0.5 / Math.sqrt(outside().estimateErrorVariance());
        assertEquals(
                scale * outside().estimateRegressionParametersStandardErrors()[1], fit.standardError("slope"), 1e-9);
        // normal quantile 1.959964 (table)
        double half = fit.estimate("slope").high() - fit.values().at(1);
        assertEquals(1.959964, half / fit.standardError("slope"), 1e-6);
        assertTrue(fit.rows().get(0).notes().get(0).contains("taken as absolute"));
    }

    @Test
    void a_tie_is_the_same_as_the_model_with_the_rule_put_in() {
        Tie rule = new Tie("high", List.of("low", "slope"), p -> 10 + p[0] * p[1], "high = 10 Pa + low · slope");
        Fit tied = both().tie(rule).from(1, 1, 0).solve();
        Model put = Model.of(
                "put in",
                List.of(Parameter.unbounded("low", "Pa"), Parameter.unbounded("slope", "Pa/s")),
                (x, b) -> 10 + b[0] * b[1] + b[1] * x);
        Fit plain = Problem.of(
                        DataSet.of("first", line("low"), X, FIRST).absolute(0.5),
                        DataSet.of("second", put, X, SECOND).absolute(0.5))
                .from(1, 1)
                .solve();
        assertEquals(plain.values().at(0), tied.values().at(0), 1e-8);
        assertEquals(plain.standardError("slope"), tied.standardError("slope"), 1e-8);
        assertEquals(Estimate.Status.TIED, tied.estimate("high").status());
        // law of error propagation for 10 + low · slope
        double a = tied.values().at(0);
        double b = tied.values().at(1);
        double variance = b * b * tied.covariance("low", "low")
                + a * a * tied.covariance("slope", "slope")
                + 2 * a * b * tied.covariance("low", "slope");
        assertEquals(Math.sqrt(variance), tied.standardError("high"), 1e-7);
    }

    @Test
    void a_held_coordinate_of_a_solver_is_a_held_parameter() {
        Problem problem = both().from(0, 0, 0);
        Solver solver = Solver.of(problem);
        solver.hold(1, 1.2);
        assertEquals(Fit.Status.CONVERGED, solver.solve(Progress.QUIET));
        Fit held = problem.holding("slope", 1.2).solve();
        assertEquals(held.sumOfSquares(), solver.cost(), 1e-9);
        solver.release(1);
        solver.solve(Progress.QUIET);
        assertEquals(problem.solve().sumOfSquares(), solver.cost(), 1e-9);
    }

    @Test
    void a_solver_with_exchanged_data_gives_the_fit_of_those_data() {
        Problem problem = both().from(0, 0, 0);
        double[] other = new double[16];
        Random random = new Random(3);
        for (int i = 0; i < 16; i++) {
            other[i] = 3 + X.at(i % 8) + random.nextGaussian();
        }
        Solver solver = Solver.of(problem);
        solver.workspace().measured(other);
        solver.solve(Progress.QUIET);
        Fit fit = problem.measured(Doubles.of(other)).solve();
        double[] reached = new double[3];
        solver.coordinates(reached);
        assertArrayEquals(fit.coordinates().toArray(), reached, 1e-8);
    }

    @Test
    void a_point_that_counts_zero_is_left_out_and_one_that_counts_twice_is_there_twice() {
        Problem problem = Problem.of(line("low")).data(X, FIRST).from(0, 0);
        Solver solver = Solver.of(problem);
        solver.workspace().counting(new double[] {0, 2, 1, 1, 1, 1, 1, 1});
        solver.solve(Progress.QUIET);
        int[] rows = {1, 1, 2, 3, 4, 5, 6, 7};
        Fit fit = Problem.of(line("low"))
                .data(X.pick(rows), FIRST.pick(rows))
                .from(0, 0)
                .solve();
        assertEquals(fit.sumOfSquares(), solver.cost(), 1e-9);
    }

    @Test
    void the_plain_jacobian_is_the_scaled_one_without_the_logarithm() {
        Model power = Model.of(
                "power",
                List.of(Parameter.positive("k", "k", "Pa"), Parameter.unbounded("m", "1")),
                (x, p) -> p[0] * Math.pow(x, p[1]));
        Fit fit = Problem.of(power).data(X, FIRST).from(1, 1).solve();
        double k = fit.values().at(0);
        for (int i = 0; i < 8; i++) {
            assertEquals(Math.pow(X.at(i), fit.values().at(1)), fit.jacobian().getEntry(i, 0), 1e-8);
            assertEquals(k * fit.jacobian().getEntry(i, 0), fit.scaledJacobian().getEntry(i, 0), 1e-12);
        }
    }
}
