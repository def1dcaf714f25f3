package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;

/** How a diagnosis is shown: its tables and figures. */
final class DiagnosisExhibit {
    private static final Axis STANDARDISED = new Axis("standardised residual", "1", Axis.Scale.LINEAR);

    private final Diagnosis diagnosis;
    private final Fit fit;
    private final Problem problem;

    DiagnosisExhibit(Diagnosis diagnosis) {
        this.diagnosis = diagnosis;
        this.fit = diagnosis.fit();
        this.problem = fit.problem();
    }

    List<Rows> rows() {
        List<Rows> all = new ArrayList<>(List.of(numbers(), tests()));
        for (int d = 0; d < problem.dataSets().size(); d++) {
            all.add(points(d));
        }
        return List.copyOf(all);
    }

    private Rows numbers() {
        InformationCriteria criteria = diagnosis.criteria();
        Lines lines = new Lines();
        lines.add("sum of squares (χ²)", fit.sumOfSquares());
        lines.add("degrees of freedom", Integer.toString(fit.degreesOfFreedom()));
        lines.add("reduced χ²", fit.reducedChiSquare());
        lines.add("root mean square residual", fit.rootMeanSquare());
        lines.add(
                "root mean square error of points left out one by one",
                diagnosis.leavingOneOut().map(CrossValidation::rootMeanSquare).orElse(Double.NaN));
        lines.add("AIC", criteria.aic());
        lines.add("AICc", criteria.aicc());
        lines.add("BIC", criteria.bic());
        return Rows.titled("What is left over by " + problem.name())
                .text("number", lines.names)
                .text("value", lines.values)
                .note("Error model: " + problem.errorWords()
                        + ". Residuals are (model − measured) / deviation, without "
                        + "unit where deviations carry that of y.")
                .note("Information criteria: normal errors, " + criteria.words(problem.errors()) + ".")
                .build();
    }

    private Rows tests() {
        List<String> names = new ArrayList<>();
        List<String> statistics = new ArrayList<>();
        List<String> probabilities = new ArrayList<>();
        for (int d = 0; d < problem.dataSets().size(); d++) {
            ResidualOrder order = diagnosis.orders().get(d);
            String where = problem.dataSets().size() == 1
                    ? ""
                    : ", " + problem.dataSets().get(d).name();
            names.add("runs of one sign" + where);
            statistics.add(order.runs() + " among " + order.above() + " above and " + (order.points() - order.above())
                    + " below");
            probabilities.add(NumberText.of(order.fewRuns(), 2));
            names.add("Durbin–Watson" + where);
            statistics.add(NumberText.of(order.durbinWatson(), 3));
            probabilities.add(NumberText.of(order.lowDurbinWatson(), 2));
        }
        diagnosis.lackOfFit().ifPresent(test -> {
            names.add("lack of fit against replicates");
            statistics.add("F(" + test.misfitFreedom() + ", " + test.scatterFreedom() + ") = "
                    + NumberText.of(test.ratio(), 3));
            probabilities.add(NumberText.of(test.probability(), 2));
        });
        diagnosis.chiSquareProbability().ifPresent(p -> {
            names.add("χ² against the stated deviations");
            statistics.add(NumberText.of(fit.sumOfSquares()) + " at " + fit.degreesOfFreedom());
            probabilities.add(NumberText.of(p, 2));
        });
        return Rows.titled("Does what is left over look like errors?")
                .text("test", names)
                .text("statistic", statistics)
                .text("probability if it does", probabilities)
                .note(
                        "Residuals are followed along x; points at one x keep their order. Probabilities below 0.05 count "
                                + "as doubt, one test in twenty gives one by chance (common practice).")
                .build();
    }

    private Rows points(int d) {
        DataSet set = problem.dataSets().get(d);
        int[] places = places(d);
        return Rows.titled("Weight of each point of " + set.name())
                .numbers(set.xAxis().label(), set.xAxis().unit(), set.x())
                .numbers("measured", set.yAxis().unit(), set.y())
                .numbers(
                        "standardised residual",
                        "1",
                        diagnosis.standardisedResiduals().pick(places))
                .numbers("leverage", "1", diagnosis.leverage().pick(places))
                .numbers("Cook's distance", "1", diagnosis.cooksDistances().pick(places))
                .note("Leverage is the share of a point in its own fitted value. A Cook's distance above 1 means the "
                        + "point decides the result (common practice).")
                .build();
    }

    private int[] places(int d) {
        int from = problem.offset(d);
        return IntStream.range(from, from + problem.dataSets().get(d).size()).toArray();
    }

    List<Figure> figures() {
        List<Figure> all = new ArrayList<>();
        for (int d = 0; d < problem.dataSets().size(); d++) {
            residuals(d, all);
        }
        quantiles(all);
        return List.copyOf(all);
    }

    private void residuals(int d, List<Figure> into) {
        DataSet set = problem.dataSets().get(d);
        Doubles standardised = diagnosis.standardisedResiduals().pick(places(d));
        if (standardised.stream().anyMatch(Double::isFinite)) {
            Doubles ends = Doubles.of(set.x().smallest(), set.x().largest());
            into.add(Figure.titled("Standardised residuals of " + set.name())
                    .x(set.xAxis())
                    .y(STANDARDISED)
                    .band("±2", ends, Doubles.of(-2, -2), Doubles.of(2, 2))
                    .marks("residual", set.x(), standardised)
                    .caption("About one point in twenty lies outside ±2 if errors are normal.")
                    .build());
        }
    }

    private void quantiles(List<Figure> into) {
        double[] sorted = diagnosis.standardisedResiduals().stream()
                .filter(Double::isFinite)
                .sorted()
                .toArray();
        if (sorted.length > 1) {
            Doubles expected = normalScores(sorted.length);
            double end = Math.max(expected.largest(), Math.max(-sorted[0], sorted[sorted.length - 1]));
            into.add(Figure.titled("Residuals against the normal distribution")
                    .x(new Axis("expected for normal errors", "1", Axis.Scale.LINEAR))
                    .y(STANDARDISED)
                    .line("normal", Doubles.of(-end, end), Doubles.of(-end, end))
                    .marks("residual", expected, Doubles.of(sorted))
                    .caption("Points along the line: errors look normal. Places after Blom, (i − 3/8) / (n + 1/4).")
                    .build());
        }
    }

    /** Where sorted normal errors are expected: G. Blom, Statistical Estimates (1958) (memory). */
    static Doubles normalScores(int count) {
        NormalDistribution normal = new NormalDistribution();
        double[] scores = new double[count];
        Arrays.setAll(scores, i -> normal.inverseCumulativeProbability((i + 1 - 0.375) / (count + 0.25)));
        return Doubles.of(scores);
    }

    private static final class Lines {
        private final List<String> names = new ArrayList<>();
        private final List<String> values = new ArrayList<>();

        private void add(String name, double value) {
            add(name, NumberText.of(value));
        }

        private void add(String name, String value) {
            names.add(name);
            values.add(value);
        }
    }
}
