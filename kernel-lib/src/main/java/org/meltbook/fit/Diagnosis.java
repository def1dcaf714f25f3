package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Whether a fit may be believed: what is left over, whether it looks like independent errors, which points decide it,
 * and how well it predicts points it has not seen.
 */
public final class Diagnosis implements Exhibit {
    /** Below this probability a test counts as failed; common practice. */
    private static final double DOUBTFUL = 0.05;

    private final Fit fit;
    private final InformationCriteria criteria;
    private final HatMatrix hat;
    private final Doubles leverage;
    private final List<ResidualOrder> orders;
    private final Optional<LackOfFit> lackOfFit;
    private final Optional<CrossValidation> leftOut;

    private Diagnosis(Fit fit, Optional<CrossValidation> leftOut) {
        this.fit = fit;
        this.criteria = InformationCriteria.of(fit);
        this.hat = HatMatrix.of(fit);
        this.leverage = hat.leverage();
        this.orders = IntStream.range(0, fit.problem().dataSets().size())
                .mapToObj(d -> ResidualOrder.of(fit, d, hat))
                .toList();
        this.lackOfFit = LackOfFit.of(fit);
        this.leftOut = leftOut;
    }

    /** What can be said about the fit. */
    public static Diagnosis of(Fit fit) {
        return of(fit, Progress.QUIET);
    }

    /** What can be said about the fit, showing progress while points are left out and stopping on interrupt. */
    public static Diagnosis of(Fit fit, Progress progress) {
        Optional<CrossValidation> leftOut =
                fit.problem().points() > fit.problem().free().length
                        ? Optional.of(CrossValidation.leavingOneOut(fit, progress))
                        : Optional.empty();
        return new Diagnosis(fit, leftOut);
    }

    /** The fit that was looked at. */
    public Fit fit() {
        return fit;
    }

    /** Akaike's and Schwarz's criteria. */
    public InformationCriteria criteria() {
        return criteria;
    }

    /** The residuals followed along x, one entry a data set. */
    public List<ResidualOrder> orders() {
        return orders;
    }

    /** The test against replicates, if there are any. */
    public Optional<LackOfFit> lackOfFit() {
        return lackOfFit;
    }

    /** Errors of prediction of points left out one by one; empty if there are only as many points as parameters. */
    public Optional<CrossValidation> leavingOneOut() {
        return leftOut;
    }

    /** Share of each point in its own fitted value, 0 to 1, the data sets one behind the other. */
    public Doubles leverage() {
        return leverage;
    }

    /**
     * Residual of each point over its own standard deviation, s √(1 − h); NaN for a point that decides its own fitted
     * value, or without degrees of freedom.
     */
    public Doubles standardisedResiduals() {
        double s = Math.sqrt(fit.variance());
        return each(i ->
                leverage.at(i) < 1 - 1e-10 ? fit.residuals().at(i) / (s * Math.sqrt(1 - leverage.at(i))) : Double.NaN);
    }

    /**
     * Cook's distance of each point: by how much the fit moves without it, in units of its own uncertainty. R. D. Cook,
     * Technometrics 19 (1977) 15 (memory). NaN where the standardised residual is.
     */
    public Doubles cooksDistances() {
        Doubles standardised = standardisedResiduals();
        return each(i -> {
            double r = standardised.at(i);
            return r * r * leverage.at(i) / (1 - leverage.at(i)) / hat.rank();
        });
    }

    /** Probability of so large a chi-square or a larger one; empty unless deviations are taken as absolute. */
    public Optional<Double> chiSquareProbability() {
        boolean judged = fit.problem().errors() == ErrorModel.ABSOLUTE
                && fit.degreesOfFreedom() > 0
                && fit.problem().loss().plain();
        return judged
                ? Optional.of(1
                        - new ChiSquaredDistribution(fit.degreesOfFreedom()).cumulativeProbability(fit.sumOfSquares()))
                : Optional.empty();
    }

    private Doubles each(IntToDoubleFunction value) {
        return Doubles.of(IntStream.range(0, leverage.size()).mapToDouble(value).toArray());
    }

    /** What speaks against the fit, in words; empty if nothing does. */
    public List<String> doubts() {
        List<String> doubts = new ArrayList<>();
        if (fit.status() != Fit.Status.CONVERGED) {
            doubts.add("the fit did not converge");
        }
        lackOfFit
                .filter(test -> test.probability() < DOUBTFUL)
                .ifPresent(test -> doubts.add("the model misses the means of the replicates by more than they scatter "
                        + "(F = " + NumberText.of(test.ratio(), 3) + ", p = " + NumberText.of(test.probability(), 2)
                        + ")"));
        chiSquareProbability()
                .filter(p -> p < DOUBTFUL)
                .ifPresent(p -> doubts.add("the points miss the model by more than their stated deviations (p = "
                        + NumberText.of(p, 2) + ")"));
        chiSquareProbability()
                .filter(p -> p > 1 - DOUBTFUL)
                .ifPresent(p -> doubts.add("the points lie closer to the model than their stated deviations allow (p = "
                        + NumberText.of(1 - p, 2) + "): the deviations look too large"));
        if (orders.stream().anyMatch(Diagnosis::follows)) {
            doubts.add("the residuals follow a course along x instead of scattering");
        }
        int decisive = decisive();
        if (decisive >= 0) {
            doubts.add("point " + (decisive + 1) + " decides much of the result (Cook's distance "
                    + NumberText.of(cooksDistances().at(decisive), 2) + ")");
        }
        return List.copyOf(doubts);
    }

    private static boolean follows(ResidualOrder order) {
        return order.fewRuns() < DOUBTFUL || order.lowDurbinWatson() < DOUBTFUL;
    }

    /** Place of the point with the largest Cook's distance above 1, a limit of common practice; −1 if there is none. */
    private int decisive() {
        Doubles distances = cooksDistances();
        return IntStream.range(0, distances.size())
                .filter(i -> distances.at(i) > 1)
                .reduce((a, b) -> distances.at(b) > distances.at(a) ? b : a)
                .orElse(-1);
    }

    @Override
    public String headline() {
        List<String> doubts = doubts();
        String subject = fit.problem().name() + " on " + fit.problem().points() + " points: ";
        return fit.degreesOfFreedom() <= 0
                ? subject + "as many parameters as points, so nothing is left to judge the fit by."
                : subject
                        + (doubts.isEmpty()
                                ? "the tests made here find nothing against the fit"
                                : String.join("; ", doubts))
                        + ".";
    }

    @Override
    public List<Rows> rows() {
        return new DiagnosisExhibit(this).rows();
    }

    @Override
    public List<Figure> figures() {
        return new DiagnosisExhibit(this).figures();
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        if (!fit.problem().loss().plain()) {
            all.add("a robust loss is not the likelihood of normal errors: information criteria and the tests of "
                    + "chi-square and lack of fit are not given, and leverage is that of least squares");
        }
        leftOut.filter(out -> out.unconverged() > 0)
                .ifPresent(out -> all.add(out.unconverged() + " of the " + out.refits()
                        + " fits with a point left out did not converge"));
        all.addAll(fit.identification());
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
