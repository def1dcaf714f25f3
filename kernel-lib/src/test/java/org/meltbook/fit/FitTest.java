package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Random;
import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.fitting.leastsquares.LeastSquaresBuilder;
import org.apache.commons.math3.fitting.leastsquares.LevenbergMarquardtOptimizer;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.stat.regression.SimpleRegression;
import org.apache.commons.math3.util.Pair;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.RangeException;

class FitTest {
    /** Nearer to the optimum than this, a sum of squares changes by less than its rounding. */
    private static final double FLAT = 1e-8;

    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles NOISY = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);
    private static final Model LINE = new TestModel(2, (x, b) -> b[0] + b[1] * x, (x, b, d) -> {
        d[0] = 1;
        d[1] = x;
    });

    private static Model decay(Parameter height, Parameter rate) {
        return new TestModel(List.of(height, rate), (x, b) -> b[0] * Math.exp(-b[1] * x), (x, b, d) -> {
            d[0] = Math.exp(-b[1] * x);
            d[1] = -x * b[0] * Math.exp(-b[1] * x);
        });
    }

    private static final Parameter HEIGHT = Parameter.positive("height", "height", "Pa");
    private static final Parameter RATE = Parameter.positive("rate", "rate", "1/s");

    @Test
    void a_straight_line_has_the_errors_of_linear_regression() {
        // Commons Math SimpleRegression is the outside check
        SimpleRegression outside = new SimpleRegression();
        for (int i = 0; i < X.size(); i++) {
            outside.addData(X.at(i), NOISY.at(i));
        }
        Fit fit = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        assertEquals(outside.getIntercept(), fit.values().at(0), FLAT);
        assertEquals(outside.getSlope(), fit.values().at(1), FLAT);
        assertEquals(outside.getInterceptStdErr(), fit.standardError("b1"), FLAT);
        assertEquals(outside.getSlopeStdErr(), fit.standardError("b2"), FLAT);
        assertEquals(outside.getMeanSquareError(), fit.reducedChiSquare(), FLAT);
        assertEquals(6, fit.degreesOfFreedom());
        double half = new TDistribution(6).inverseCumulativeProbability(0.975) * outside.getSlopeStdErr();
        assertEquals(outside.getSlope() + half, fit.estimate("b2").high(), FLAT);
        // for a line the correlation is −mean(x) / root mean square(x): 4.5 / sqrt(25.5)
        assertEquals(-4.5 / Math.sqrt(25.5), fit.correlation("b1", "b2"), FLAT);
        assertEquals(fit.standardError("b1") * fit.standardError("b1"), fit.covariance("b1", "b1"), FLAT);
    }

    @Test
    void finds_the_optimum_of_the_general_purpose_optimiser() {
        double[] made = made(0.05);
        Doubles x = Doubles.logSpaced(0.1, 5, made.length);
        Fit fit = Problem.of(decay(HEIGHT, RATE))
                .data(x, Doubles.of(made))
                .from(1, 1)
                .solve();
        var outside = new LevenbergMarquardtOptimizer()
                .withCostRelativeTolerance(1e-15)
                .withParameterRelativeTolerance(1e-15)
                .optimize(new LeastSquaresBuilder()
                        .start(new double[] {1, 1})
                        .target(made)
                        .maxEvaluations(1000)
                        .maxIterations(1000)
                        .model(point -> {
                            double[] value = new double[made.length];
                            double[][] slope = new double[made.length][2];
                            for (int i = 0; i < made.length; i++) {
                                slope[i][0] = Math.exp(-point.getEntry(1) * x.at(i));
                                value[i] = point.getEntry(0) * slope[i][0];
                                slope[i][1] = -x.at(i) * value[i];
                            }
                            return new Pair<>(new ArrayRealVector(value), new Array2DRowRealMatrix(slope));
                        })
                        .build());
        assertArrayEquals(outside.getPoint().toArray(), fit.values().toArray(), 1e-7);
        assertEquals(outside.getRMS(), fit.rootMeanSquare(), 1e-12);
    }

    private static double[] made(double noise) {
        Random random = new Random(7);
        return Doubles.logSpaced(0.1, 5, 25)
                .map(x -> 3 * Math.exp(-0.8 * x) + noise * random.nextGaussian())
                .toArray();
    }

    @Test
    void equal_deviations_give_the_same_fit_whatever_their_size() {
        Fit plain = Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
        Fit weighted = Problem.of(LINE)
                .data(X, NOISY)
                .deviations(X.map(x -> 12.5))
                .from(0, 0)
                .solve();
        assertArrayEquals(plain.values().toArray(), weighted.values().toArray(), 1e-12);
        assertEquals(plain.standardError("b2"), weighted.standardError("b2"), 1e-12);
    }

    @Test
    void bounds_hold_at_every_trial_and_a_parameter_at_its_bound_says_so() {
        Parameter capped = RATE.within(0, 0.5);
        Model watched = new TestModel(
                List.of(HEIGHT, capped),
                (x, b) -> {
                    assertTrue(b[0] > 0 && b[1] > 0 && b[1] <= 0.5, "tried outside its bounds: " + b[1]);
                    return b[0] * Math.exp(-b[1] * x);
                },
                decay(HEIGHT, capped)::gradient);
        Fit fit = Problem.of(watched)
                .data(Doubles.logSpaced(0.1, 5, 25), Doubles.of(made(0.05)))
                .from(1, 0.1)
                .solve();
        assertEquals(Fit.Status.CONVERGED, fit.status());
        assertEquals(0.5, fit.values().at(1));
        assertEquals(Estimate.Status.AT_BOUND, fit.estimate("rate").status());
        assertTrue(Double.isNaN(fit.standardError("rate")));
        assertTrue(fit.standardError("height") > 0);
        assertTrue(
                fit.cautions().get(0).contains("rate rests on its bound"),
                fit.cautions().toString());
    }

    @Test
    void a_held_parameter_keeps_its_value() {
        Fit fit = Problem.of(decay(HEIGHT, RATE.heldAt(0.9)))
                .data(Doubles.logSpaced(0.1, 5, 25), Doubles.of(made(0.05)))
                .from(1, 0.1)
                .solve();
        assertEquals(0.9, fit.values().at(1));
        assertEquals(Estimate.Status.HELD, fit.estimate("rate").status());
        assertEquals(24, fit.degreesOfFreedom());
    }

    @Test
    void names_the_parameters_that_the_data_do_not_tell_apart() {
        Model product = new TestModel(3, (x, b) -> b[0] * b[1] * x + b[2], (x, b, d) -> {
            d[0] = b[1] * x;
            d[1] = b[0] * x;
            d[2] = 1;
        });
        Fit fit = Problem.of(product).data(X, NOISY).from(1, 2, 0).solve();
        assertEquals(Estimate.Status.NOT_IDENTIFIED, fit.estimate("b1").status());
        assertEquals(Estimate.Status.NOT_IDENTIFIED, fit.estimate("b2").status());
        assertEquals(Estimate.Status.ESTIMATED, fit.estimate("b3").status());
        assertTrue(
                fit.cautions().get(0).contains("do not tell b1 from b2"),
                fit.cautions().toString());
    }

    @Test
    void says_when_a_parameter_does_not_matter_at_all() {
        Model idle = new TestModel(2, (x, b) -> b[0], (x, b, d) -> {
            d[0] = 1;
            d[1] = 0;
        });
        Fit fit = Problem.of(idle).data(X, NOISY).from(1, 1).solve();
        assertEquals(Estimate.Status.NOT_IDENTIFIED, fit.estimate("b2").status());
        assertTrue(
                fit.cautions().get(0).contains("do not depend on b2"),
                fit.cautions().toString());
    }

    @Test
    void steps_back_where_the_model_has_no_value() {
        Model root =
                new TestModel(1, (x, b) -> Math.sqrt(b[0] - 1) * x, (x, b, d) -> d[0] = x / (2 * Math.sqrt(b[0] - 1)));
        Fit fit = Problem.of(root).data(X, X.map(x -> 0.01 * x)).from(400).solve();
        assertEquals(1.0001, fit.values().at(0), 1e-9);
        assertEquals(Fit.Status.CONVERGED, fit.status());
    }

    @Test
    void an_early_stop_is_a_status_and_a_caution() {
        Fit fit = Fit.at(
                Problem.of(LINE).data(X, NOISY).from(0, 0), new double[] {1, 1}, Fit.Status.EVALUATIONS_SPENT, 2000);
        assertTrue(fit.headline().contains("NOT converged"));
        assertTrue(fit.cautions().get(0).contains("without converging"));
    }

    @Test
    void relative_errors_are_shown_in_percent_of_the_measured_value() {
        Fit fit = Problem.of(LINE).data(X, NOISY).relative().from(0, 0).solve();
        double first = fit.residuals().at(0);
        assertEquals(fit.at(1) / 2.1 - 1, first, 1e-14);
        assertTrue(fit.rows().get(0).notes().get(0).contains("equal relative errors"));
        assertTrue(fit.rows().get(0).notes().get(0).contains("scaled by the residual variance"));
    }

    @Test
    void as_many_parameters_as_points_leave_no_error() {
        Fit fit = Problem.of(LINE)
                .data(Doubles.of(1, 2), Doubles.of(3, 5))
                .from(0, 0)
                .solve();
        assertEquals(2, fit.values().at(1), 1e-12);
        assertTrue(Double.isNaN(fit.standardError("b2")));
        assertTrue(fit.cautions().get(0).contains("nothing is left to judge the errors by"));
    }

    @Test
    void wrong_input_throws_with_what_was_found() {
        Problem.Builder line = Problem.of(LINE);
        assertThrows(RangeException.class, () -> line.data(Doubles.of(1), Doubles.of(1))
                .from(0, 0));
        assertThrows(RangeException.class, () -> line.data(Doubles.of(1, 1, 1), Doubles.of(1, 2, 3))
                .from(0, 0));
        assertThrows(RangeException.class, () -> line.data(X, X.pick(0)).from(0, 0));
        assertThrows(
                RangeException.class, () -> line.data(X, X.map(x -> Double.NaN)).from(0, 0));
        assertThrows(RangeException.class, () -> line.data(X, NOISY).from(0));
        assertThrows(RangeException.class, () -> line.data(X, NOISY).from(0, Double.NaN));
        assertThrows(
                RangeException.class,
                () -> Problem.of(LINE).data(X, X.map(x -> x - 1)).relative().from(0, 0));
        assertThrows(RangeException.class, () -> RATE.within(2, 1));
        assertThrows(RangeException.class, () -> RATE.within(-1, 1));
        assertThrows(RangeException.class, () -> RATE.within(0, 1).heldAt(2));
        assertThrows(
                RangeException.class,
                () -> Problem.of(decay(RATE, RATE)).data(X, NOISY).from(1, 1));
        assertThrows(
                RangeException.class,
                () -> Problem.of(decay(HEIGHT, RATE)).data(X, NOISY).from(1, -1));
        RangeException unknown = assertThrows(
                RangeException.class,
                () -> Problem.of(LINE).data(X, NOISY).from(0, 0).solve().estimate("b9"));
        assertTrue(unknown.getMessage().contains("[b1, b2]"));
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, -1, Double.NaN, Double.POSITIVE_INFINITY})
    void rejects_a_standard_deviation(double bad) {
        assertThrows(RangeException.class, () -> Problem.of(LINE)
                .data(X, NOISY)
                .deviations(X.map(x -> x == 3 ? bad : 1))
                .from(0, 0));
    }

    @Test
    void stops_on_interrupt() {
        Problem problem = Problem.of(LINE).data(X, NOISY).from(0, 0);
        Thread.currentThread().interrupt();
        try {
            assertThrows(InterruptedComputation.class, problem::solve);
        } finally {
            Thread.interrupted();
        }
    }
}
