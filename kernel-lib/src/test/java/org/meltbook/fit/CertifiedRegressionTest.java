package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.stream.IntStream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** Six certified digits on parameters and four on standard errors, from both starts of each set. */
class CertifiedRegressionTest {
    @ParameterizedTest
    @CsvSource({
        "Misra1a, 0", "Misra1a, 1", "Kirby2, 0", "Kirby2, 1", "Hahn1, 0", "Hahn1, 1",
        "Chwirut2, 0", "Chwirut2, 1", "DanWood, 0", "DanWood, 1", "Rat42, 0", "Rat42, 1"
    })
    void reaches_the_certified_digits(String name, int start) {
        StatisticalReference reference = StatisticalReference.of(name);
        Fit fit = Problem.of(model(name, reference.values().size()))
                .data(reference.x(), reference.y())
                .from(reference.starts().get(start).toArray())
                .solve();
        assertEquals(Fit.Status.CONVERGED, fit.status());
        for (int i = 0; i < reference.values().size(); i++) {
            double value = reference.values().at(i);
            double error = reference.errors().at(i);
            assertEquals(value, fit.values().at(i), 5e-7 * Math.abs(value), "b" + (i + 1));
            assertEquals(error, fit.estimates().get(i).error(), 5e-5 * error, "error of b" + (i + 1));
        }
        assertEquals(reference.sumOfSquares(), fit.sumOfSquares(), 1e-9 * reference.sumOfSquares());
    }

    private static Model model(String name, int count) {
        return switch (name) {
            case "Misra1a" -> new TestModel(
                    count,
                    (x, b) -> b[0] * -Math.expm1(-b[1] * x),
                    (x, b, d) -> set(d, -Math.expm1(-b[1] * x), b[0] * x * Math.exp(-b[1] * x)));
            case "Chwirut2" -> new TestModel(count, (x, b) -> Math.exp(-b[0] * x) / (b[1] + b[2] * x), (x, b, d) -> {
                double y = Math.exp(-b[0] * x) / (b[1] + b[2] * x);
                set(d, -x * y, -y / (b[1] + b[2] * x), -x * y / (b[1] + b[2] * x));
            });
            case "DanWood" -> new TestModel(
                    count,
                    (x, b) -> b[0] * Math.pow(x, b[1]),
                    (x, b, d) -> set(d, Math.pow(x, b[1]), b[0] * Math.pow(x, b[1]) * Math.log(x)));
            case "Rat42" -> new TestModel(count, (x, b) -> b[0] / (1 + Math.exp(b[1] - b[2] * x)), (x, b, d) -> {
                double e = Math.exp(b[1] - b[2] * x);
                set(d, 1 / (1 + e), -b[0] * e / ((1 + e) * (1 + e)), b[0] * e * x / ((1 + e) * (1 + e)));
            });
            case "Kirby2" -> ratio(count, 3);
            default -> ratio(count, 4);
        };
    }

    /** (b1 + b2 x + …) / (1 + x (…)) with {@code above} terms above. */
    private static Model ratio(int count, int above) {
        return new TestModel(count, (x, b) -> top(x, b, above) / bottom(x, b, above), (x, b, d) -> {
            double bottom = bottom(x, b, above);
            double y = top(x, b, above) / bottom;
            for (int i = 0; i < d.length; i++) {
                d[i] = i < above ? Math.pow(x, i) / bottom : -y * Math.pow(x, i - above + 1) / bottom;
            }
        });
    }

    private static double top(double x, double[] b, int above) {
        return IntStream.range(0, above).mapToDouble(i -> b[i] * Math.pow(x, i)).sum();
    }

    private static double bottom(double x, double[] b, int above) {
        return 1
                + IntStream.range(above, b.length)
                        .mapToDouble(i -> b[i] * Math.pow(x, i - above + 1))
                        .sum();
    }

    private static void set(double[] into, double... values) {
        System.arraycopy(values, 0, into, 0, values.length);
    }
}
