package org.meltbook.fit;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.distribution.TDistribution;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Profile-likelihood interval of one parameter: the values at which the best fit of all others is still good enough.
 *
 * <p>With S the cost (sum of squared residuals, or of what the loss makes of them), all other parameters fitted again
 * at each value, the interval holds the values for which (S − least S) / s² stays below a threshold. With {@link
 * ErrorModel#SCALED} s² is the residual variance and the threshold the F distribution with 1 and the degrees of freedom
 * of the fit; with {@link ErrorModel#ABSOLUTE} s² is 1 and the threshold chi-square with 1 degree of freedom. With a
 * robust loss s² is {@link Fit#variance()} times the mean curvature of the loss, so that near the optimum the interval
 * is that of the standard error. Source: D. M. Bates and D. G. Watts, Nonlinear Regression Analysis and Its
 * Applications (1988), section 6.1 (memory).
 *
 * <p>Unlike the interval of the standard error it need not be symmetric, does not depend on the scale of the parameter,
 * and may be open. It ends where the profile first meets the threshold on each side.
 */
public final class ProfileLikelihood implements Exhibit {
    /** By less than this a rise below zero is rounding. */
    private static final double ROUNDING = 1e-7;

    private final Fit fit;
    private final Parameter parameter;
    private final int place;
    private final double level;
    private final double quantile;
    private final ProfileEnd lower;
    private final ProfileEnd upper;
    private final List<ProfilePoint> points;
    private final int unconverged;

    private ProfileLikelihood(Fit fit, String name, double level, Progress progress) {
        this.fit = fit;
        this.place = fit.problem().place(name);
        this.parameter = fit.problem().parameters().get(place);
        this.level = level;
        this.quantile = quantile(fit, level);
        int held = coordinate(fit, place);
        double error = Math.sqrt(fit.covariance().getEntry(held, held));
        ProfileTrace trace = new ProfileTrace(fit, held, scale(fit), quantile, progress);
        this.lower = trace.walk(-1, error);
        this.upper = trace.walk(1, error);
        this.unconverged = trace.unconverged();
        List<ProfilePoint> all = new ArrayList<>(trace.points());
        all.add(new ProfilePoint(fit.values().at(place), 0, fit.values()));
        all.sort(Comparator.comparingDouble(ProfilePoint::value));
        this.points = List.copyOf(all);
    }

    /** The 95 % interval of a fitted parameter. */
    public static ProfileLikelihood of(Fit fit, String parameter) {
        return of(fit, parameter, 0.95, Progress.QUIET);
    }

    /**
     * The interval of a fitted parameter at a level, stopping on interrupt.
     *
     * @param level share of repeated data sets whose interval should hold the true value, 0 to 1
     * @throws RangeException if there is no such parameter, it was held or follows from others, the fit did not
     *     converge, no degree of freedom is left to judge the errors by, or the level is not between 0 and 1
     */
    public static ProfileLikelihood of(Fit fit, String parameter, double level, Progress progress) {
        Level.check(level);
        if (fit.status() != Fit.Status.CONVERGED) {
            throw new RangeException("the profile of " + parameter + " needs a fit that converged");
        }
        if (!(scale(fit) > 0)) {
            throw new RangeException("the profile of " + parameter
                    + " needs scatter around the model, found a residual " + "variance of " + fit.variance() + " at "
                    + fit.degreesOfFreedom() + " degrees of freedom");
        }
        return new ProfileLikelihood(fit, parameter, level, progress);
    }

    private static int coordinate(Fit fit, int place) {
        int[] free = fit.problem().free();
        return IntStream.range(0, free.length)
                .filter(j -> free[j] == place)
                .findFirst()
                .orElseThrow(() -> new RangeException("parameter "
                        + fit.problem().parameters().get(place).name()
                        + " was not fitted: it is held or follows from others, so it has no profile"));
    }

    private static double quantile(Fit fit, double level) {
        double share = 0.5 + level / 2;
        return fit.problem().errors() == ErrorModel.ABSOLUTE
                ? new NormalDistribution().inverseCumulativeProbability(share)
                : new TDistribution(fit.degreesOfFreedom()).inverseCumulativeProbability(share);
    }

    private static double scale(Fit fit) {
        Loss loss = fit.problem().loss();
        return fit.variance()
                * fit.residuals().stream().map(loss::curvature).average().orElse(Double.NaN);
    }

    /** The parameter whose profile this is. */
    public Parameter parameter() {
        return parameter;
    }

    /** The level of the interval, 0 to 1. */
    public double level() {
        return level;
    }

    /** Lower end in the unit of the parameter; its lower bound, −∞ if it has none, where the data set no end. */
    public double low() {
        return lower.value();
    }

    /** Upper end in the unit of the parameter; its upper bound, ∞ if it has none, where the data set no end. */
    public double high() {
        return upper.value();
    }

    /** How the interval ends below. */
    public ProfileEnd lower() {
        return lower;
    }

    /** How the interval ends above. */
    public ProfileEnd upper() {
        return upper;
    }

    /** Rise of the cost over the residual variance at which the interval ends. */
    public double threshold() {
        return quantile * quantile;
    }

    /** The places at which the other parameters were fitted again, from low to high values of this one. */
    public List<ProfilePoint> points() {
        return points;
    }

    /** The threshold in words, with the error model it follows from. */
    public String thresholdWords() {
        String number = NumberText.of(threshold());
        return fit.problem().errors() == ErrorModel.ABSOLUTE
                ? "chi-square with 1 degree of freedom, " + number + " (" + ErrorModel.ABSOLUTE.words() + ")"
                : "F with 1 and " + fit.degreesOfFreedom() + " degrees of freedom, " + number + " ("
                        + ErrorModel.SCALED.words() + ")";
    }

    private String percent() {
        return Level.words(level);
    }

    @Override
    public String headline() {
        boolean closed = lower.kind() == ProfileEnd.Kind.DATA && upper.kind() == ProfileEnd.Kind.DATA;
        return parameter.label() + " = " + NumberText.of(fit.values().at(place)) + unit() + ", " + percent()
                + " profile-likelihood interval " + ends()
                + (closed ? "." : ": the data do not end it " + openSides() + ".");
    }

    private String unit() {
        return parameter.unit().equals("1") ? "" : " " + parameter.unit();
    }

    private String openSides() {
        boolean below = lower.kind() != ProfileEnd.Kind.DATA;
        boolean above = upper.kind() != ProfileEnd.Kind.DATA;
        return below && above ? "on either side" : below ? "below" : "above";
    }

    private String ends() {
        return NumberText.of(low()) + " to " + NumberText.of(high()) + unit();
    }

    @Override
    public List<Rows> rows() {
        Rows interval = Rows.titled(percent() + " profile-likelihood interval of " + parameter.label())
                .text("end", List.of("lower", "upper"))
                .numbers("value", parameter.unit(), low(), high())
                .text("how it ends", List.of(lower.words(), upper.words()))
                .numbers("from the standard error", parameter.unit(), fromError(-1), fromError(1))
                .note("Threshold: " + thresholdWords() + ".")
                .note("Error model: " + fit.problem().errorWords() + ".")
                .build();
        Rows.Builder trace = Rows.titled("Profile of " + parameter.label())
                .numbers(parameter.label(), parameter.unit(), values())
                .numbers("rise of the cost / residual variance", "1", rises());
        for (int p = 0; p < fit.problem().parameters().size(); p++) {
            Parameter other = fit.problem().parameters().get(p);
            if (p != place && other.isFree()) {
                int at = p;
                trace.numbers(
                        other.label(),
                        other.unit(),
                        points.stream()
                                .mapToDouble(point -> point.values().at(at))
                                .toArray());
            }
        }
        return List.of(interval, trace.build());
    }

    private double fromError(int way) {
        double inner = fit.estimate(parameter.name()).error()
                / parameter.stretch(fit.values().at(place));
        return parameter.outward(parameter.inward(fit.values().at(place)) + way * quantile * inner);
    }

    private Doubles values() {
        return Doubles.of(points.stream().mapToDouble(ProfilePoint::value).toArray());
    }

    private Doubles rises() {
        return Doubles.of(points.stream().mapToDouble(ProfilePoint::rise).toArray());
    }

    @Override
    public List<Figure> figures() {
        Axis.Scale scale = parameter.scale() == Parameter.Scale.LOG ? Axis.Scale.LOG : Axis.Scale.LINEAR;
        Doubles values = values();
        Doubles ends = Doubles.of(values.smallest(), values.largest());
        double error = fit.estimate(parameter.name()).error()
                / parameter.stretch(fit.values().at(place));
        Figure.Builder figure = Figure.titled("Profile of " + parameter.label())
                .x(new Axis(parameter.label(), parameter.unit(), scale))
                .y(new Axis("rise of the cost / residual variance", "1", Axis.Scale.LINEAR))
                .line("others fitted again", values, rises());
        if (error > 0) {
            double centre = parameter.inward(fit.values().at(place));
            figure.dashed("what the standard error says", values, values.map(v -> {
                double t = (parameter.inward(v) - centre) / error;
                return t * t;
            }));
        }
        return List.of(figure.dashed("threshold, " + percent(), ends, Doubles.of(threshold(), threshold()))
                .caption("The interval holds the values whose profile lies below the threshold.")
                .build());
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        for (ProfileEnd end : List.of(lower, upper)) {
            if (end.kind() != ProfileEnd.Kind.DATA) {
                all.add(String.format(
                        Locale.ROOT,
                        "%s end of the interval of %s is %s (the rise there is %s, the threshold %s)",
                        end == lower ? "the lower" : "the upper",
                        parameter.label(),
                        end.words(),
                        NumberText.of(end.rise()),
                        NumberText.of(threshold())));
            }
        }
        double least = rises().smallest();
        if (least < -ROUNDING) {
            ProfilePoint best = points.stream()
                    .min(Comparator.comparingDouble(ProfilePoint::rise))
                    .orElseThrow();
            all.add("a better fit was met at " + parameter.label() + " = " + NumberText.of(best.value()) + unit()
                    + ": the fit is not the best one, and the interval does not hold; fit again from there");
        }
        if (unconverged > 0) {
            all.add(unconverged + " of " + (points.size() - 1) + " fits along the profile did not converge: the "
                    + "profile may lie lower there, and the interval be wider");
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
