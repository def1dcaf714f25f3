package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.apache.commons.math3.distribution.TDistribution;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.figure.Axis;

class BandsTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles NOISY = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);
    private static final Axis PLACE = new Axis("place", "m", Axis.Scale.LINEAR);
    private static final Axis PLAIN = new Axis("value", "1", Axis.Scale.LINEAR);
    private static final Axis RATIO = new Axis("value", "1", Axis.Scale.LOG);
    private static final Model LINE = new TestModel(2, (x, b) -> b[0] + b[1] * x, (x, b, d) -> {
        d[0] = 1;
        d[1] = x;
    });

    private static Fit line() {
        return Problem.of(LINE).data(X, NOISY).from(0, 0).solve();
    }

    @Test
    void the_bands_of_a_straight_line_are_those_of_linear_regression() {
        // closed form: s sqrt(1/n + (x − mean)² / Σ(x − mean)²), with 1 more under the root for a further value
        Fit fit = line();
        Doubles places = Doubles.of(1, 4.5, 6.2);
        Bands bands = Bands.ofModel(fit, 0, places, 0.9);
        double t = new TDistribution(6).inverseCumulativeProbability(0.95);
        double s = Math.sqrt(fit.reducedChiSquare());
        for (int i = 0; i < places.size(); i++) {
            double lever = 1.0 / 8 + Math.pow(places.at(i) - 4.5, 2) / 42;
            double value = fit.at(places.at(i));
            assertEquals(value + t * s * Math.sqrt(lever), bands.high().at(i), 1e-9);
            assertEquals(value - t * s * Math.sqrt(lever), bands.low().at(i), 1e-9);
            assertEquals(
                    value + t * s * Math.sqrt(1 + lever),
                    bands.highPrediction().orElseThrow().at(i),
                    1e-9);
        }
        assertTrue(bands.cautions().isEmpty());
    }

    @Test
    void the_band_of_a_parameter_is_its_interval_on_the_scale_of_the_axis() {
        Doubles y = X.map(x -> 3 * Math.exp(-0.4 * x) * (1 + 0.1 * Math.sin(9 * x)));
        Model decay = Model.of(
                "decay",
                List.of(Parameter.positive("height", "height", "Pa"), Parameter.positive("rate", "rate", "1/s")),
                (x, b) -> b[0] * Math.exp(-b[1] * x));
        Fit fit = Problem.of(decay).data(X, y).relative().from(1, 1).solve();
        Estimate rate = fit.estimate("rate");
        Bands ratio = Bands.of(fit, new BandCurve("rate", PLACE, RATIO, (x, all) -> all[1]), Doubles.of(0), 0.95);
        assertEquals(rate.low(), ratio.low().at(0), 1e-8 * rate.value());
        assertEquals(rate.high(), ratio.high().at(0), 1e-8 * rate.value());
        Bands plain = Bands.of(fit, new BandCurve("rate", PLACE, PLAIN, (x, all) -> all[1]), Doubles.of(0), 0.95);
        double half = new TDistribution(6).inverseCumulativeProbability(0.975) * rate.error();
        assertEquals(rate.value() + half, plain.high().at(0), 1e-6 * half);
        // ln of the model is linear in ln height and rate: variance of a sum from the covariances
        Bands model = Bands.of(
                fit,
                new BandCurve("model", PLACE, RATIO, (x, all) -> all[0] * Math.exp(-all[1] * x)),
                Doubles.of(2),
                0.95);
        double h = fit.values().at(0);
        double variance = fit.covariance("height", "height") / (h * h)
                - 4 * fit.covariance("height", "rate") / h
                + 4 * fit.covariance("rate", "rate");
        double t = new TDistribution(6).inverseCumulativeProbability(0.975);
        assertEquals(
                t * Math.sqrt(variance),
                Math.log(model.high().at(0) / model.value().at(0)),
                1e-6);
    }

    @Test
    void relative_errors_widen_the_prediction_with_the_value() {
        Fit fit = Problem.of(LINE)
                .data(X, NOISY)
                .relative()
                .errors(ErrorModel.SCALED)
                .from(0, 0)
                .solve();
        Bands bands = Bands.ofModel(fit, 0, Doubles.of(2, 8), 0.95);
        for (int i = 0; i < 2; i++) {
            double t = new TDistribution(6).inverseCumulativeProbability(0.975);
            double confidence = bands.high().at(i) - bands.value().at(i);
            double prediction =
                    bands.highPrediction().orElseThrow().at(i) - bands.value().at(i);
            // variances add: what is left over the confidence band is the scatter, a share of the value
            double scatter = Math.sqrt(prediction * prediction - confidence * confidence) / t;
            assertEquals(
                    Math.sqrt(fit.reducedChiSquare()), scatter / bands.value().at(i), 1e-9);
        }
    }

    @Test
    void the_band_from_refits_of_a_parameter_is_its_percentile_interval() {
        Bootstrap bootstrap = Bootstrap.of(line(), BootstrapSettings.residual(3));
        Bands bands = Bands.of(bootstrap, new BandCurve("slope", PLACE, PLAIN, (x, all) -> all[1]), Doubles.of(0, 1));
        ParameterInterval interval = bootstrap.percentile("b2");
        assertEquals(interval.low(), bands.low().at(1));
        assertEquals(interval.high(), bands.high().at(0));
        // and near the band of the covariance, which has t = 2.45 where the percentiles have 1.96
        Bands line = Bands.of(bootstrap, BandCurve.model(bootstrap.fit(), 0), Doubles.of(4.5));
        double s = Math.sqrt(bootstrap.fit().reducedChiSquare() / 8);
        // a 97.5 % quantile of 999 draws errs by about 0.085 of a standard deviation; three times that
        assertEquals(1.96 * s, (line.high().at(0) - line.low().at(0)) / 2, 0.26 * s);
    }

    @Test
    void a_function_that_the_data_do_not_fix_has_no_band_and_says_so() {
        Model product = new TestModel(3, (x, b) -> b[0] * b[1] * x + b[2], (x, b, d) -> {
            d[0] = b[1] * x;
            d[1] = b[0] * x;
            d[2] = 1;
        });
        Fit fit = Problem.of(product).data(X, NOISY).from(1, 2, 0).solve();
        Bands loose = Bands.of(fit, new BandCurve("b1", PLACE, PLAIN, (x, all) -> all[0]), Doubles.of(1), 0.95);
        assertTrue(Double.isNaN(loose.low().at(0)));
        assertTrue(loose.cautions().get(0).contains("no band at 1 of 1 places"));
        Bands fixed = Bands.of(fit, new BandCurve("b3", PLACE, PLAIN, (x, all) -> all[2]), Doubles.of(1), 0.95);
        assertEquals(fit.estimate("b3").high(), fixed.high().at(0), 1e-8);
    }

    @Test
    void points_with_their_own_deviations_have_no_prediction_band() {
        Fit fit = Problem.of(LINE)
                .data(X, NOISY)
                .deviations(X.map(x -> 0.1 * x))
                .from(0, 0)
                .solve();
        Bands bands = Bands.ofModel(fit, 0, Doubles.of(4), 0.95);
        assertTrue(bands.lowPrediction().isEmpty());
        assertTrue(bands.cautions().get(0).contains("no prediction band"));
    }

    @Test
    void a_band_beyond_the_points_says_so_and_is_drawn_with_them() {
        Bands bands = Bands.ofModel(line(), 0, Doubles.of(1, 5, 12), 0.95);
        assertTrue(bands.cautions().get(0).contains("beyond the measured points, which lie from 1.000 to 8.000"));
        assertEquals(4, bands.figures().get(0).layers().size());
        assertEquals(6, bands.rows().get(0).columns().size());
    }

    @Test
    void wrong_questions_throw_with_what_was_found() {
        assertThrows(RangeException.class, () -> Bands.ofModel(line(), 0, Doubles.of(), 0.95));
        assertThrows(RangeException.class, () -> Bands.ofModel(line(), 0, Doubles.of(Double.NaN), 0.95));
        assertThrows(RangeException.class, () -> Bands.ofModel(line(), 0, X, 0));
        Bootstrap few = Bootstrap.of(line(), BootstrapSettings.residual(3).refits(20));
        assertThrows(RangeException.class, () -> Bands.of(few, BandCurve.model(few.fit(), 0), X));
    }
}
