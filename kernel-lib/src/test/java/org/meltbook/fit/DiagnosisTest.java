package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.stream.IntStream;
import org.apache.commons.math3.stat.regression.SimpleRegression;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;

class DiagnosisTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles Y = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);
    private static final Model LINE = StoppingDistances.polynomial(2);
    private static final Model CONSTANT = StoppingDistances.polynomial(1);

    @Test
    void criteria_are_those_of_general_statistics_software() {
        InformationCriteria criteria = Diagnosis.of(StoppingDistances.line()).criteria();
        // R: AIC(lm(dist ~ speed, cars)) and BIC (memory), the same to all digits from numpy 1.24.2
        assertEquals(419.156863, criteria.aic(), 1e-6);
        assertEquals(424.892932, criteria.bic(), 1e-6);
        // by hand: 2 k (k + 1) / (n − k − 1) with n = 50 and k = 3, the variance being one
        assertEquals(3, criteria.parameters());
        assertEquals(24.0 / 46, criteria.aicc() - criteria.aic(), 1e-12);
    }

    @Test
    void a_given_deviation_is_not_counted_as_a_parameter() {
        Fit fit = Problem.of(LINE)
                .data(X, Y)
                .deviations(X.map(x -> 0.2))
                .errors(ErrorModel.ABSOLUTE)
                .from(0, 0)
                .solve();
        InformationCriteria criteria = InformationCriteria.of(fit);
        assertEquals(2, criteria.parameters());
        // by hand: −2 Σ ln of the normal density
        double density = 8 * Math.log(2 * Math.PI * 0.04) + fit.sumOfSquares();
        assertEquals(density + 4, criteria.aic(), 1e-12);
        assertEquals(12.0 / 5, criteria.aicc() - criteria.aic(), 1e-12);
        assertTrue(Diagnosis.of(fit).rows().get(0).toString().contains("the variance is not one of them"));
    }

    @Test
    void too_few_points_have_no_corrected_criterion() {
        Fit fit = Problem.of(LINE)
                .data(Doubles.of(1, 2, 3, 4), Doubles.of(1, 2.1, 2.9, 4.2))
                .from(0, 0)
                .solve();
        assertTrue(Double.isNaN(InformationCriteria.of(fit).aicc()));
    }

    @Test
    void leverage_of_a_straight_line_is_that_of_the_textbook() {
        Doubles leverage =
                Diagnosis.of(Problem.of(LINE).data(X, Y).from(0, 0).solve()).leverage();
        for (int i = 0; i < X.size(); i++) {
            // 1 / n + (x − mean)² / Σ (x − mean)², closed form; the mean is 4.5 and the sum 42
            assertEquals(1.0 / 8 + Math.pow(X.at(i) - 4.5, 2) / 42, leverage.at(i), 1e-12);
        }
        assertEquals(2, leverage.stream().sum(), 1e-12);
    }

    @Test
    void cooks_distance_is_how_far_the_line_moves_without_the_point() {
        Fit fit = Problem.of(LINE).data(X, Y).from(0, 0).solve();
        Doubles distances = Diagnosis.of(fit).cooksDistances();
        for (int left = 0; left < X.size(); left++) {
            // the definition, with the other line from Commons Math SimpleRegression
            SimpleRegression without = new SimpleRegression();
            for (int i = 0; i < X.size(); i++) {
                if (i != left) {
                    without.addData(X.at(i), Y.at(i));
                }
            }
            double moved = X.stream()
                    .map(x -> fit.at(x) - without.predict(x))
                    .map(m -> m * m)
                    .sum();
            assertEquals(moved / 2 / fit.reducedChiSquare(), distances.at(left), 1e-9);
        }
    }

    @Test
    void finds_the_most_weighty_of_the_stopping_distances() {
        Doubles distances = Diagnosis.of(StoppingDistances.line()).cooksDistances();
        // R: cooks.distance(lm(dist ~ speed, cars))[49] (memory), the same from numpy 1.24.2
        assertEquals(0.340396, distances.at(48), 1e-6);
        assertEquals(distances.largest(), distances.at(48));
    }

    @Test
    void durbin_watson_agrees_with_general_statistics_software() {
        ResidualOrder order = Diagnosis.of(StoppingDistances.line()).orders().get(0);
        // R: lmtest::dwtest(dist ~ speed, data = cars) gives DW = 1.6762, p = 0.09522 (memory); the statistic also
        // from numpy 1.24.2. The exact probability against the beta approximation: four digits are not to be had
        assertEquals(1.676225, order.durbinWatson(), 1e-6);
        assertEquals(0.09522, order.lowDurbinWatson(), 5e-4);
    }

    @Test
    void low_durbin_watson_numbers_have_the_probability_of_random_errors() {
        Doubles x = Doubles.of(IntStream.rangeClosed(1, 15).mapToDouble(i -> i).toArray());
        HatMatrix hat = HatMatrix.of(
                Problem.of(LINE).data(x, x.map(Math::sin)).from(0, 0).solve());
        int[] order = IntStream.range(0, 15).toArray();
        // upper limit at 5 % for 15 points and one slope: 1.361, N. E. Savin, K. J. White, Econometrica 45 (1977) 1989
        // (memory); an even course of x comes close to it. The others: 2 million draws with numpy 1.24.2, ±0.0004
        assertEquals(0.0504, hat.durbinWatsonBelow(1.361, order), 1e-3);
        assertEquals(0.0105, hat.durbinWatsonBelow(1.077, order), 1e-3);
        assertEquals(0.3772, hat.durbinWatsonBelow(2, order), 2e-3);
    }

    @Test
    void residuals_are_followed_along_x_however_they_were_given() {
        // by hand: the mean of 1, 2, 3, 4 leaves 1.5, 0.5, −0.5, −1.5, so steps of 1: 3 / 5
        ResidualOrder order = ResidualOrder.of(
                Problem.of(CONSTANT)
                        .data(Doubles.of(3, 1, 4, 2), Doubles.of(3, 1, 4, 2))
                        .from(0)
                        .solve(),
                0);
        assertEquals(0.6, order.durbinWatson(), 1e-12);
        assertEquals(2, order.runs());
        // of the 6 orders of two signs twice each, 2 have two runs
        assertEquals(1.0 / 3, order.fewRuns(), 1e-12);
    }

    @Test
    void probabilities_of_runs_are_those_of_counting_all_orders() {
        int[] withRuns = new int[10];
        for (int signs = 0; signs < 1 << 9; signs++) {
            if (Integer.bitCount(signs) == 5) {
                withRuns[1 + Integer.bitCount((signs ^ signs >> 1) & 0xff)]++;
            }
        }
        int atMost = 0;
        for (int runs = 2; runs <= 9; runs++) {
            atMost += withRuns[runs];
            assertEquals(atMost / 126.0, ResidualOrder.runsAtMost(runs, 5, 4), 1e-12);
        }
        // table of F. S. Swed, C. Eisenhart, Ann. Math. Stat. 14 (1943) 66: 0.019 and 0.051 for ten of each (memory)
        assertEquals(0.019, ResidualOrder.runsAtMost(6, 10, 10), 5e-4);
        assertEquals(0.051, ResidualOrder.runsAtMost(7, 10, 10), 5e-4);
        assertTrue(Double.isNaN(ResidualOrder.runsAtMost(1, 10, 0)));
    }

    @Test
    void lack_of_fit_agrees_with_general_statistics_software() {
        LackOfFit test = Diagnosis.of(StoppingDistances.line()).lackOfFit().orElseThrow();
        // R: anova(lm(dist ~ speed), lm(dist ~ factor(speed))) gives F = 1.2369 on 17 and 31, p = 0.2948 (memory), the
        // same from numpy 1.24.2 and scipy 1.10.1
        assertEquals(17, test.misfitFreedom());
        assertEquals(31, test.scatterFreedom());
        assertEquals(6764.783333, test.scatterSquares(), 1e-5);
        assertEquals(1.236950, test.ratio(), 1e-6);
        assertEquals(0.294837, test.probability(), 1e-6);
    }

    @Test
    void lack_of_fit_needs_replicates() {
        assertTrue(LackOfFit.of(Problem.of(LINE).data(X, Y).from(0, 0).solve()).isEmpty());
    }

    @Test
    void leaving_a_point_out_of_a_linear_model_is_known_in_closed_form() {
        Fit fit = StoppingDistances.line();
        Diagnosis diagnosis = Diagnosis.of(fit);
        double[] closed = IntStream.range(0, 50)
                .mapToDouble(
                        i -> fit.residuals().at(i) / (1 - diagnosis.leverage().at(i)))
                .toArray();
        CrossValidation out = diagnosis.leavingOneOut().orElseThrow();
        // a fit stops within a hundred-millionth of the scatter, 15 here
        assertArrayEquals(closed, out.errors().toArray(), 1e-6);
        assertEquals(0, out.unconverged());
        // as many folds as points is the same
        assertEquals(
                out.rootMeanSquare(),
                CrossValidation.folds(fit, 50, 3, Progress.QUIET).rootMeanSquare(),
                1e-9);
    }

    @Test
    void folds_that_leave_too_few_points_are_refused() {
        Fit fit = Problem.of(LINE).data(X, Y).from(0, 0).solve();
        assertThrows(RangeException.class, () -> CrossValidation.folds(fit, 1, 1, Progress.QUIET));
        assertThrows(RangeException.class, () -> CrossValidation.folds(fit, 9, 1, Progress.QUIET));
        assertEquals(2, CrossValidation.folds(fit, 2, 1, Progress.QUIET).refits());
    }

    @Test
    void a_course_in_the_residuals_is_named() {
        Doubles x = Doubles.of(IntStream.rangeClosed(0, 20).mapToDouble(i -> i).toArray());
        Diagnosis bent = Diagnosis.of(
                Problem.of(LINE).data(x, x.map(v -> v * v)).from(0, 0).solve());
        assertTrue(bent.headline().contains("follow a course"), bent.headline());
        Diagnosis sound = Diagnosis.of(StoppingDistances.line());
        assertTrue(sound.headline().contains("nothing against the fit"), sound.headline());
    }

    @Test
    void a_point_that_decides_the_result_is_named() {
        Doubles x = Doubles.of(1, 1.1, 0.9, 1.05, 0.95, 10);
        Diagnosis diagnosis = Diagnosis.of(Problem.of(LINE)
                .data(x, Doubles.of(1, 1.3, 0.8, 0.9, 1.2, 40))
                .from(0, 0)
                .solve());
        assertTrue(diagnosis.headline().contains("point 6 decides"), diagnosis.headline());
    }

    @Test
    void a_robust_loss_has_no_criteria_and_says_so() {
        Diagnosis diagnosis = Diagnosis.of(
                Problem.of(LINE).data(X, Y).loss(Loss.huber(0.1)).from(0, 0).solve());
        assertTrue(Double.isNaN(diagnosis.criteria().aic()));
        assertTrue(diagnosis.cautions().get(0).contains("robust loss"));
    }

    @Test
    void shows_each_data_set_and_one_figure_of_quantiles() {
        Fit fit = Problem.of(DataSet.of("first", LINE, X, Y), DataSet.of("second", LINE, X, Y.map(y -> y + 0.1)))
                .from(0, 0)
                .solve();
        Diagnosis diagnosis = Diagnosis.of(fit);
        assertEquals(4, diagnosis.rows().size());
        assertEquals(3, diagnosis.figures().size());
        assertEquals(2, diagnosis.orders().size());
        assertEquals(diagnosis.headline(), diagnosis.toString());
    }
}
