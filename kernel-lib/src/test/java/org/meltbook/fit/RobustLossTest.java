package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Random;
import org.apache.commons.math3.analysis.differentiation.DerivativeStructure;
import org.apache.commons.math3.analysis.differentiation.FiniteDifferencesDifferentiator;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.base.Doubles;

/** A made decay with 5 % scatter of which every tenth point is off by a factor of 3 to 10: the truth is known. */
class RobustLossTest {
    private static final double SCATTER = 0.05;
    private static final Model DECAY = new TestModel(
            List.of(Parameter.positive("height", "height", "Pa"), Parameter.positive("rate", "rate", "1/s")),
            (x, b) -> b[0] * Math.exp(-b[1] * x),
            (x, b, d) -> {
                d[0] = Math.exp(-b[1] * x);
                d[1] = -x * b[0] * d[0];
            });

    static List<Loss> losses() {
        return List.of(Loss.softL1(SCATTER), Loss.huber(1.345 * SCATTER), Loss.tukey(4.685 * SCATTER));
    }

    private static Problem.Builder spoiled(long seed) {
        Random random = new Random(seed);
        Doubles x = Doubles.logSpaced(0.1, 5, 100);
        double[] y = new double[x.size()];
        for (int i = 0; i < y.length; i++) {
            double gross = i % 10 == 4 ? 3 + 7 * random.nextDouble() : 1;
            y[i] = 3 * Math.exp(-0.8 * x.at(i) + SCATTER * random.nextGaussian()) * gross;
        }
        return Problem.of(DECAY).data(x, Doubles.of(y)).logarithmic();
    }

    @ParameterizedTest
    @MethodSource("losses")
    void recovers_the_truth_with_a_tenth_of_the_points_grossly_wrong(Loss loss) {
        for (long seed = 1; seed <= 20; seed++) {
            Fit fit = spoiled(seed).loss(loss).from(1, 0.1).solve();
            assertEquals(Fit.Status.CONVERGED, fit.status());
            // Tukey's loss drops the gross points, the others only curb their pull
            double share = loss.kind() == Loss.Kind.TUKEY ? 0.03 : 0.06;
            assertEquals(3, fit.values().at(0), 3 * share, loss.words() + ", seed " + seed);
            assertEquals(0.8, fit.values().at(1), 0.8 * share, loss.words() + ", seed " + seed);
        }
    }

    @Test
    void least_squares_do_not_recover_it() {
        Fit fit = spoiled(1).from(1, 0.1).solve();
        assertTrue(fit.values().at(0) > 3 * 1.1, "height " + fit.values().at(0));
    }

    @Test
    void with_normal_scatter_only_the_estimates_and_errors_are_those_of_least_squares() {
        Random random = new Random(11);
        Doubles x = Doubles.logSpaced(0.1, 5, 2000);
        Doubles y = x.map(v -> 3 * Math.exp(-0.8 * v + SCATTER * random.nextGaussian()));
        Problem.Builder problem = Problem.of(DECAY).data(x, y).logarithmic();
        Fit squares = problem.from(1, 0.1).solve();
        for (Loss loss : losses()) {
            Fit robust = problem.loss(loss).from(1, 0.1).solve();
            double error = squares.standardError("rate");
            assertEquals(squares.values().at(1), robust.values().at(1), error);
            // 95 % efficiency: errors larger by 1/sqrt(0.95), give or take the scatter of 2,000 points
            double efficiency = loss.kind() == Loss.Kind.SOFT_L1 ? 1.05 : 1 / Math.sqrt(0.95);
            assertEquals(efficiency, robust.standardError("rate") / error, 0.04, loss.words());
        }
    }

    @ParameterizedTest
    @MethodSource("losses")
    void weight_and_curvature_are_the_derivatives_of_the_cost(Loss loss) {
        // derivatives by the finite differences of Commons Math, a general-purpose library
        var differentiator = new FiniteDifferencesDifferentiator(5, 1e-4);
        for (double residual : new double[] {-0.3, -0.08, 0.01, 0.06, 0.2, 1.5}) {
            DerivativeStructure cost =
                    differentiator.differentiate(loss::cost).value(new DerivativeStructure(1, 2, 0, residual));
            assertEquals(cost.getPartialDerivative(1) / 2, loss.weight(residual) * residual, 1e-7);
            assertEquals(cost.getPartialDerivative(2) / 2, loss.curvature(residual), 1e-4);
        }
    }

    @Test
    void the_report_names_the_loss() {
        Fit fit = spoiled(1).loss(Loss.huber(0.07)).from(1, 0.1).solve();
        assertTrue(fit.rows().get(0).notes().get(0).contains("Huber loss with scale 0.07"));
    }
}
