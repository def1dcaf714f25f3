package org.meltbook.viscosity;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.fit.Parameter;
import org.meltbook.numeric.ReferenceTable;

/** What every viscosity law must do; a law in the catalogue is tested here without further work. */
class ViscosityLawContractTest {
    private static final Doubles RATES = Doubles.logSpaced(1e-3, 1e3, 25);

    /** Every law of the reference file: constants, rate and viscosity. */
    record Known(ViscosityLaw law, double rate, double viscosity) {}

    static List<Known> known() {
        List<Known> all = new ArrayList<>();
        for (LawFamily family : ViscosityLaws.all()) {
            ReferenceTable table = ReferenceTable.of("viscosity_laws.csv").where("law", family.name());
            for (String text : table.distinct("values")) {
                ReferenceTable rows = table.where("values", text);
                Doubles values = Doubles.of(Arrays.stream(text.split(";"))
                        .mapToDouble(Double::parseDouble)
                        .toArray());
                for (int i = 0; i < rows.numbers("rate").length; i++) {
                    all.add(new Known(family.of(values), rows.numbers("rate")[i], rows.numbers("viscosity")[i]));
                }
            }
        }
        return all;
    }

    static Stream<ViscosityLaw> laws() {
        return known().stream().map(Known::law).distinct();
    }

    static List<LawFamily> families() {
        return ViscosityLaws.all();
    }

    @ParameterizedTest
    @MethodSource("families")
    void every_law_of_the_catalogue_has_reference_values(LawFamily family) {
        assertTrue(known().stream().anyMatch(k -> k.law().family().name().equals(family.name())));
    }

    @ParameterizedTest
    @MethodSource("known")
    void agrees_with_its_reference_values(Known known) {
        // four roundings of exp, log and pow
        assertEquals(known.viscosity(), known.law().at(known.rate()), 4e-15 * known.viscosity());
    }

    @ParameterizedTest
    @MethodSource("laws")
    void derivatives_are_those_of_the_value(ViscosityLaw law) {
        int count = law.values().size();
        double[] exact = new double[count];
        for (double rate : RATES.toArray()) {
            law.gradient(rate, exact);
            for (int i = 0; i < count; i++) {
                double value = law.values().at(i);
                double step = 1e-5 * Math.max(value, 1e-3);
                boolean edge =
                        value - 2 * step < law.family().parameters().get(i).low();
                double difference = edge ? forward(law, i, rate, step) : central(law, i, rate, step);
                // truncation of the difference (h² with h = 1e-5) and rounding (1e-16 / h) of a viscosity of this size
                double size = Math.abs(exact[i]) + law.at(rate) / Math.max(value, 1e-3);
                assertEquals(difference, exact[i], 1e-8 * size, "parameter " + i + " at rate " + rate);
            }
        }
    }

    @ParameterizedTest
    @MethodSource("laws")
    void a_curve_at_once_is_the_curve_rate_by_rate(ViscosityLaw law) {
        double[] rates = RATES.toArray();
        double[] constants = law.values().toArray();
        double[] together = new double[rates.length];
        double[] derivatives = new double[rates.length * constants.length];
        law.family().model().curve(rates, constants, together, derivatives);
        double[] gradient = new double[constants.length];
        for (int i = 0; i < rates.length; i++) {
            law.gradient(rates[i], gradient);
            assertEquals(law.at(rates[i]), together[i], 4e-15 * together[i]);
            for (int k = 0; k < gradient.length; k++) {
                // a derivative that is a difference of others loses as many digits as they share
                double size = Math.abs(gradient[k]) + together[i] / Math.max(constants[k], 1e-3);
                assertEquals(gradient[k], derivatives[k * rates.length + i], 1e-14 * size);
            }
        }
    }

    private static double central(ViscosityLaw law, int i, double rate, double step) {
        return (shifted(law, i, step).at(rate) - shifted(law, i, -step).at(rate)) / (2 * step);
    }

    private static double forward(ViscosityLaw law, int i, double rate, double step) {
        return (-3 * law.at(rate)
                        + 4 * shifted(law, i, step).at(rate)
                        - shifted(law, i, 2 * step).at(rate))
                / (2 * step);
    }

    private static ViscosityLaw shifted(ViscosityLaw law, int i, double by) {
        double[] values = law.values().toArray();
        values[i] += by;
        return law.family().of(Doubles.of(values));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void tends_to_its_limits(ViscosityLaw law) {
        assertEquals(law.zeroRateLimit(), law.at(0));
        if (Double.isFinite(law.zeroRateLimit())) {
            assertEquals(law.zeroRateLimit(), law.at(1e-200), 1e-9 * law.zeroRateLimit());
        } else {
            assertTrue(law.at(1e-200) > 1e50);
        }
        assertEquals(law.infiniteRateLimit(), law.at(1e200), 1e-9 * law.at(1));
        double[] gradient = new double[law.values().size()];
        for (double rate : new double[] {1e-150, 1e150}) {
            law.gradient(rate, gradient);
            assertTrue(Arrays.stream(gradient).allMatch(Double::isFinite), Arrays.toString(gradient));
        }
    }

    @ParameterizedTest
    @MethodSource("laws")
    void rejects_rates_that_are_no_rates(ViscosityLaw law) {
        for (double bad : new double[] {-1, Double.NaN, Double.POSITIVE_INFINITY}) {
            assertThrows(RangeException.class, () -> law.at(bad));
        }
    }

    @ParameterizedTest
    @MethodSource("laws")
    void rejects_constants_outside_their_bounds(ViscosityLaw law) {
        for (int i = 0; i < law.values().size(); i++) {
            Parameter parameter = law.family().parameters().get(i);
            for (double bad : new double[] {Double.NaN, Double.POSITIVE_INFINITY, parameter.low() - 1}) {
                double[] values = law.values().toArray();
                values[i] = bad;
                assertThrows(RangeException.class, () -> law.family().of(Doubles.of(values)));
            }
        }
        assertThrows(RangeException.class, () -> law.family().of(Doubles.of()));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void is_made_again_from_its_constants(ViscosityLaw law) {
        assertEquals(law, law.family().of(law.values()));
        assertEquals(law.at(2) * 2, law.stress(2));
        assertEquals(0, law.stress(0));
    }

    @ParameterizedTest
    @MethodSource("families")
    void names_a_source_a_formula_and_starts_from_any_curve(LawFamily family) {
        assertFalse(family.source().isBlank());
        assertTrue(family.toString().contains("η ="));
        Doubles two = Doubles.of(1, 2);
        for (Doubles viscosities :
                List.of(Doubles.of(5, 5), Doubles.of(5, 1), Doubles.of(1, 5), Doubles.of(1e6, 1e-6))) {
            assertTrue(family.of(family.guess(two, viscosities)).at(1) > 0, viscosities.toString());
        }
        assertThrows(RangeException.class, () -> family.guess(Doubles.of(1, 1), Doubles.of(2, 3)));
        assertThrows(RangeException.class, () -> family.guess(Doubles.of(0, 1), Doubles.of(2, 3)));
        assertThrows(RangeException.class, () -> family.guess(Doubles.of(2, 1), Doubles.of(2, Double.NaN)));
    }

    @Test
    void names_do_not_repeat_and_hold_no_locale() {
        List<String> names =
                families().stream().map(f -> f.name().toLowerCase(Locale.ROOT)).toList();
        assertEquals(names.size(), names.stream().distinct().count());
    }

    @Test
    void holding_and_freeing_change_what_a_fit_may_do() {
        assertFalse(CarreauYasuda.FAMILY.parameters().get(4).isFree());
        assertTrue(CarreauYasuda.FAMILY.freeing("etaInf").parameters().get(4).isFree());
        assertFalse(Cross.FAMILY.holding("m", 0.7).parameters().get(2).isFree());
        assertThrows(RangeException.class, () -> Cross.FAMILY.holding("etaInf", 0));
        assertThrows(RangeException.class, () -> Cross.FAMILY.holding("m", 2));
    }
}
