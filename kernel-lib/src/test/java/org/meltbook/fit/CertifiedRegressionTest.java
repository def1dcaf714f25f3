package org.meltbook.fit;

import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;

/**
 * The nonlinear regression sets of the Statistical Reference Datasets, NIST, certified to 11 digits: all 27, from both
 * starts as published.
 */
class CertifiedRegressionTest {
    @ParameterizedTest
    @EnumSource(CertifiedModel.Way.class)
    void reaches_the_certified_digits_from_both_starts(CertifiedModel.Way way) {
        StringBuilder table = new StringBuilder(
                "Digits that agree with the certified ones (least of all parameters), way: " + way + "\n");
        table.append(String.format(
                Locale.ROOT, "%-10s %5s %9s %9s %9s %s%n", "set", "start", "values", "errors", "trials", "status"));
        List<String> misses = new ArrayList<>();
        for (CertifiedModel model : CertifiedModel.values()) {
            StatisticalReference reference = StatisticalReference.of(model.name());
            for (int start = 0; start < 2; start++) {
                Fit fit = model.problem(reference, start, way).solve();
                int[] order = model.byRate(fit.values());
                double values = 11;
                double errors = 11;
                for (int i = 0; i < reference.values().size(); i++) {
                    values = Math.min(
                            values,
                            digits(fit.values().at(order[i]), reference.values().at(i)));
                    errors = Math.min(
                            errors,
                            digits(
                                    fit.estimates().get(order[i]).error(),
                                    reference.errors().at(i)));
                }
                table.append(String.format(
                        Locale.ROOT,
                        "%-10s %5d %9.1f %9.1f %9d %s%n",
                        model,
                        start + 1,
                        values,
                        errors,
                        fit.evaluations(),
                        fit.status()));
                if (!(values >= 6
                        && errors >= (model == CertifiedModel.Lanczos1 ? 2.5 : 4)
                        && fit.status() == Fit.Status.CONVERGED)) {
                    misses.add(model + " from start " + (start + 1));
                }
            }
        }
        System.out.println(table);
        assertTrue(misses.isEmpty(), misses.toString());
    }

    /** Log relative error: how many digits agree. */
    private static double digits(double found, double certified) {
        double share = Math.abs(found / certified - 1);
        return Double.isNaN(share) ? 0 : share == 0 ? 11 : Math.max(0, Math.min(11, -Math.log10(share)));
    }
}
