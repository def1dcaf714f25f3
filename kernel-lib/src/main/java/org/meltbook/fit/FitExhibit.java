package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;

/** How a fit is shown: its tables, figures and cautions. */
final class FitExhibit {
    private static final int LINE_POINTS = 121;

    private final Fit fit;
    private final Problem problem;

    FitExhibit(Fit fit) {
        this.fit = fit;
        this.problem = fit.problem();
    }

    String headline() {
        return problem.name() + " fitted to " + problem.points() + " points: " + spread() + ", "
                + (fit.status() == Fit.Status.CONVERGED ? "converged" : "NOT converged") + " after "
                + fit.evaluations() + " trials.";
    }

    String spread() {
        boolean relative = problem.dataSets().stream().allMatch(FitExhibit::inPercent);
        return relative
                ? "points lie " + NumberText.of(100 * fit.rootMeanSquare(), 2) + " % (root mean square) from the model"
                : "root mean square residual " + NumberText.of(fit.rootMeanSquare(), 3);
    }

    /** Relative errors of unknown size: the residual is a share of the measured value. */
    private static boolean inPercent(DataSet set) {
        return set.weighting() == Weighting.RELATIVE && !set.sizeKnown();
    }

    List<Rows> rows() {
        List<Rows> all = new ArrayList<>(List.of(parameterRows()));
        for (int d = 0; d < problem.dataSets().size(); d++) {
            all.add(residualRows(d));
        }
        return List.copyOf(all);
    }

    private Rows parameterRows() {
        List<Estimate> estimates = fit.estimates();
        return Rows.titled("Parameters of " + problem.name())
                .text(
                        "parameter",
                        estimates.stream().map(e -> e.parameter().label()).toList())
                .text(
                        "value ± standard error",
                        estimates.stream().map(FitExhibit::number).toList())
                .text(
                        "95 % interval",
                        estimates.stream().map(FitExhibit::interval).toList())
                .text("unit", estimates.stream().map(e -> e.parameter().unit()).toList())
                .text("status", estimates.stream().map(e -> e.status().words()).toList())
                .note("Error model: " + problem.errorWords() + ".")
                .note(intervalNote())
                .build();
    }

    private String intervalNote() {
        return problem.errors() == ErrorModel.ABSOLUTE
                ? "Intervals: normal distribution; chi-square " + NumberText.of(fit.sumOfSquares()) + " at "
                        + fit.degreesOfFreedom() + " degrees of freedom."
                : "Intervals: Student's t with " + fit.degreesOfFreedom() + " degrees of freedom; residual variance "
                        + NumberText.of(fit.reducedChiSquare()) + ".";
    }

    private static String number(Estimate estimate) {
        return estimate.status() == Estimate.Status.HELD
                ? NumberText.of(estimate.value())
                : NumberText.of(estimate.value(), estimate.error(), "");
    }

    private static String interval(Estimate estimate) {
        return Double.isNaN(estimate.error())
                ? "none"
                : NumberText.of(estimate.low()) + " to " + NumberText.of(estimate.high());
    }

    private Rows residualRows(int d) {
        DataSet set = problem.dataSets().get(d);
        Axis axis = residualAxis(set);
        return Rows.titled("Residuals of " + title(set))
                .numbers(set.xAxis().label(), set.xAxis().unit(), set.x())
                .numbers("measured", set.yAxis().unit(), set.y())
                .numbers("model", set.yAxis().unit(), fit.predictions(d))
                .numbers(axis.label(), axis.unit(), shownResiduals(d))
                .build();
    }

    private String title(DataSet set) {
        return problem.dataSets().size() == 1
                ? set.model().name()
                : set.name() + ", " + set.model().name();
    }

    private static Axis residualAxis(DataSet set) {
        return inPercent(set)
                ? new Axis("model / measured − 1", "%", Axis.Scale.LINEAR)
                : new Axis("residual / deviation", "1", Axis.Scale.LINEAR);
    }

    private Doubles shownResiduals(int d) {
        Doubles residuals = fit.residuals(d);
        return inPercent(problem.dataSets().get(d)) ? residuals.map(r -> 100 * r) : residuals;
    }

    List<Figure> figures() {
        List<Figure> all = new ArrayList<>();
        for (int d = 0; d < problem.dataSets().size(); d++) {
            all.add(modelFigure(d));
            all.add(residualFigure(d));
        }
        return List.copyOf(all);
    }

    private Figure modelFigure(int d) {
        DataSet set = problem.dataSets().get(d);
        Doubles line = line(set);
        return Figure.titled(title(set) + " and the points it was fitted to")
                .x(set.xAxis())
                .y(set.yAxis())
                .line(set.model().name(), line, line.map(x -> fit.at(d, x)))
                .marks("measured", set.x(), set.y())
                .caption("The line ends where the measured points end.")
                .build();
    }

    private Figure residualFigure(int d) {
        DataSet set = problem.dataSets().get(d);
        Doubles ends = Doubles.of(set.x().smallest(), set.x().largest());
        return Figure.titled("Residuals of " + title(set))
                .x(set.xAxis())
                .y(residualAxis(set))
                .line("no misfit", ends, Doubles.of(0, 0))
                .marks("residual", set.x(), shownResiduals(d))
                .build();
    }

    private static Doubles line(DataSet set) {
        double first = set.x().smallest();
        double last = set.x().largest();
        if (first == last) {
            return Doubles.of(first);
        }
        if (set.xAxis().scale() == Axis.Scale.LOG && first > 0) {
            return Doubles.logSpaced(first, last, LINE_POINTS);
        }
        double[] line = new double[LINE_POINTS];
        for (int i = 0; i < line.length; i++) {
            line[i] = first + (last - first) * i / (line.length - 1);
        }
        return Doubles.of(line);
    }

    List<String> cautions() {
        List<String> all = new ArrayList<>();
        switch (fit.status()) {
            case EVALUATIONS_SPENT -> all.add("the fit stopped after " + fit.evaluations()
                    + " trials without converging: its values are the best so far");
            case STALLED -> all.add("the fit stopped without converging where no step lowers the misfit although its "
                    + "slope is not zero: the model may jump or have no value nearby");
            case CONVERGED -> {}
        }
        all.addAll(fit.identification());
        fit.estimates().stream()
                .filter(e -> e.status() == Estimate.Status.WEAK)
                .forEach(e -> all.add(e.parameter().label()
                        + " is weakly determined: its 95 % interval spans more than " + "a factor of 100"));
        if (fit.degreesOfFreedom() <= 0) {
            all.add("as many parameters as points: nothing is left to judge the errors by");
        }
        return List.copyOf(all);
    }
}
