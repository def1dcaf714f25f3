package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;

class IdentifiabilityTest {
    private static final Doubles X = Doubles.of(1, 2, 3, 4, 5, 6, 7, 8);
    private static final Doubles Y = Doubles.of(2.1, 2.9, 4.2, 4.8, 6.1, 7.2, 7.8, 9.1);

    private static List<Parameter> positive(String... names) {
        return Arrays.stream(names)
                .map(name -> Parameter.positive(name, name, "1"))
                .toList();
    }

    private static Identifiability of(Model.Formula formula, List<Parameter> parameters) {
        double[] start = new double[parameters.size()];
        Arrays.setAll(start, i -> 1 + 0.3 * i);
        return Identifiability.of(Problem.of(Model.of("made model", parameters, formula))
                .data(X, Y)
                .from(start)
                .solve());
    }

    private static String found(Model.Formula formula, List<Parameter> parameters) {
        Identifiability found = of(formula, parameters);
        assertEquals(1, found.combinations().size(), found.headline());
        assertEquals(Combination.Grade.NOT_FIXED, found.combinations().get(0).grade());
        assertEquals(Double.POSITIVE_INFINITY, found.conditionNumber());
        return found.combinations().get(0).words();
    }

    // in these each expected combination can be read off the formula

    @Test
    void names_the_product_of_which_alone_the_data_know() {
        assertEquals(
                "only the product a·b is determined, not a and b apart",
                found((x, p) -> p[0] * p[1] * x, positive("a", "b")));
        assertEquals(
                "only the product a·b^0.5 is determined, not a and b apart",
                found((x, p) -> p[0] * Math.sqrt(p[1]) * x, positive("a", "b")));
        assertEquals(
                "only the product a/b^2 is determined, not a and b apart",
                found((x, p) -> p[0] / (p[1] * p[1]) * x, positive("a", "b")));
    }

    @Test
    void spares_the_reader_high_powers() {
        assertEquals(
                "only the product b·a^0.1 is determined, not a and b apart",
                found((x, p) -> p[0] * Math.pow(p[1], 10) * x, positive("a", "b")));
    }

    @Test
    void names_a_product_also_of_parameters_stepped_by_differences() {
        assertEquals(
                "only the product a·b is determined, not a and b apart",
                found(
                        (x, p) -> p[0] * p[1] * x,
                        List.of(Parameter.unbounded("a", "1"), Parameter.unbounded("b", "1"))));
    }

    @Test
    void names_a_sum_whatever_the_scale() {
        assertEquals(
                "only the sum a + 2·b is determined, not a and b apart",
                found((x, p) -> (p[0] + 2 * p[1]) * x, positive("a", "b")));
        assertEquals(
                "only the sum a − b is determined, not a and b apart",
                found(
                        (x, p) -> (p[0] - p[1]) * x,
                        List.of(Parameter.unbounded("a", "1"), Parameter.unbounded("b", "1"))));
    }

    @Test
    void names_several_products_where_one_direction_moves_three_parameters() {
        // a k, b k and c / k give the same
        assertEquals(
                "only the products a·c and b·c are determined, not a, b and c apart",
                found((x, p) -> p[0] * p[2] + p[1] * p[2] * x, positive("a", "b", "c")));
    }

    @Test
    void separates_two_open_directions() {
        Identifiability found = of((x, p) -> p[0] * p[1] + p[2] * p[3] * x, positive("a", "b", "c", "d"));
        List<String> words = found.combinations().stream()
                .map(c -> String.join("", c.fixed()))
                .sorted()
                .toList();
        assertEquals(List.of("a·b", "c·d"), words);
    }

    @Test
    void singular_values_of_a_line_follow_from_the_angle_of_its_columns() {
        Identifiability line = Identifiability.of(Problem.of(StoppingDistances.polynomial(2))
                .data(X, Y)
                .from(0, 0)
                .solve());
        // closed form for two columns of length one: √(1 ± cos), cos = Σx / √(n Σx²) = 36 / √(8 · 204)
        double cosine = 36 / Math.sqrt(8 * 204);
        assertArrayEquals(
                new double[] {Math.sqrt(1 + cosine), Math.sqrt(1 - cosine)},
                line.singularValues().toArray(),
                1e-12);
        assertEquals(Math.sqrt((1 + cosine) / (1 - cosine)), line.conditionNumber(), 1e-10);
        assertTrue(line.combinations().isEmpty());
        assertTrue(line.headline().contains("determine all fitted parameters"), line.headline());
        assertEquals(line.headline(), line.toString());
    }

    @Test
    void parameters_far_from_the_origin_are_called_linked() {
        Identifiability far = Identifiability.of(Problem.of(StoppingDistances.polynomial(2))
                .data(X.map(x -> x + 1000), Y)
                .from(0, 0)
                .solve());
        assertEquals(Combination.Grade.LINKED, far.combinations().get(0).grade());
        // closed form: columns of length one meet at the root mean square of x, √(1004.5² + 5.25) = 1004.503
        assertEquals(List.of("b1 + 1005·b2"), far.combinations().get(0).fixed());
    }

    @Test
    void parameters_known_within_a_factor_of_more_than_ten_are_called_weak() {
        // an offset of 0.01 where the points have a deviation of 0.1: its error alone is a factor of e^(2 · 0.1 / 0.01)
        Model line = Model.of("made line", positive("a", "b"), (x, p) -> p[0] * x + 0.01 * p[1]);
        Identifiability found = Identifiability.of(Problem.of(line)
                .data(X, X.map(x -> x + 0.01))
                .deviations(X.map(x -> 0.1))
                .errors(ErrorModel.ABSOLUTE)
                .from(1, 1)
                .solve());
        assertEquals(Combination.Grade.WEAK, found.combinations().get(0).grade(), found.headline());
        assertEquals(List.of("b"), found.combinations().get(0).parameters());
        assertTrue(found.headline().contains("hardly determine b"), found.headline());
    }

    @Test
    void a_parameter_without_effect_and_one_at_its_bound_are_named() {
        Identifiability idle = of((x, p) -> p[0] * x + 0 * p[1], positive("a", "b"));
        assertTrue(idle.headline().contains("do not determine b at all"), idle.headline());
        Identifiability capped = of(
                (x, p) -> p[0] + p[1] * x,
                List.of(
                        Parameter.unbounded("a", "1"),
                        Parameter.unbounded("b", "1").within(1.2, 1.5)));
        assertEquals(List.of("b"), capped.atBound());
        assertTrue(capped.headline().contains("at a bound: b"), capped.headline());
    }
}
