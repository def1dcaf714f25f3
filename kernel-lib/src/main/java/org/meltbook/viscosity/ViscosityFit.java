package org.meltbook.viscosity;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.fit.Estimate;
import org.meltbook.fit.Fit;
import org.meltbook.fit.PredictionRows;
import org.meltbook.fit.Problem;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.numeric.LogLogLine;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * A viscosity law fitted to a flow curve with equal relative errors; only usable rows take part.
 *
 * <p>The zero-shear viscosity is given as a plain number only if the plateau was measured. Three things are asked of
 * the points within half a decade of the lowest rate (three points at least); the limits are common practice, not a
 * standard: the measured slope d ln η / d ln γ̇ lies within 0.1 of zero; the law at the lowest rate is within 5 % of
 * its limit at rate zero; the law lies within 5 % of the measured mean. Otherwise the lowest of these points is a lower
 * bound, if the viscosity does not rise with the rate there; if the law meets these points, its limit stands beside the
 * bound, marked as extrapolated.
 */
public final class ViscosityFit implements Exhibit {
    private static final String ZERO_SHEAR = "zero-shear viscosity";
    private static final double LEVEL_SLOPE = 0.1;
    private static final double NEAR = 0.05;
    private static final int LINE_POINTS = 121;

    private final FlowCurve curve;
    private final LawFamily family;
    private final Fit fit;
    private final ViscosityLaw law;

    private ViscosityFit(FlowCurve curve, LawFamily family, Fit fit) {
        this.curve = curve;
        this.family = family;
        this.fit = fit;
        this.law = family.of(fit.values());
    }

    /** The law of a family that lies nearest to the flow curve. */
    public static ViscosityFit of(FlowCurve curve, LawFamily family) {
        return of(curve, family, Progress.QUIET);
    }

    /**
     * The law of a family that lies nearest to the flow curve.
     *
     * @throws org.meltbook.base.RangeException if the usable rows are too few for the free parameters, or one has a
     *     rate or viscosity that is not above zero
     */
    public static ViscosityFit of(FlowCurve curve, LawFamily family, Progress progress) {
        Curve usable = curve.viscosity().usable();
        Doubles rates = usable.x().values();
        Doubles viscosities = usable.y().values();
        Doubles start = family.guess(rates, viscosities);
        Fit fit = Problem.of(family.model())
                .data(rates, viscosities)
                .axes(Axis.log(Quantity.SHEAR_RATE), Axis.log(Quantity.VISCOSITY))
                .relative()
                .from(start.toArray())
                .solve(progress);
        return new ViscosityFit(curve, family, fit);
    }

    /** The flow curve that was fitted. */
    public FlowCurve curve() {
        return curve;
    }

    /** The fitted law with its constants. */
    public ViscosityLaw law() {
        return law;
    }

    /** The fit with all its numbers: estimates, covariance, residuals, status. */
    public Fit fit() {
        return fit;
    }

    /** The zero-shear viscosity, a bound of it, or neither, and why. */
    public Prediction zeroShearViscosity() {
        CurveShape low = lowEnd();
        double slope = low.slope();
        if (slope > LEVEL_SLOPE) {
            return Prediction.undetermined(
                    ZERO_SHEAR,
                    Quantity.VISCOSITY,
                    "the viscosity rises with the rate at the low end, with slope " + NumberText.of(slope, 2));
        }
        String reason = refusal(low);
        if (reason.isEmpty()) {
            return limit(ZERO_SHEAR);
        }
        String beside = extrapolatedLimit()
                .map(limit -> "; the law's limit is " + number(limit) + " (extrapolated)")
                .orElse("");
        return Prediction.atLeast(
                ZERO_SHEAR,
                Quantity.VISCOSITY,
                low.viscosities().smallest(),
                reason + "; the bound is the lowest of the " + low.rates().size() + " points at the low end" + beside);
    }

    /**
     * The fitted law's limit at rate zero, extrapolated, where the points give only a bound; empty where the limit is
     * the zero-shear viscosity itself, or the law has none or misses the points at the low end.
     */
    public Optional<Prediction> extrapolatedLimit() {
        CurveShape low = lowEnd();
        boolean plain = refusal(low).isEmpty();
        boolean meets = Math.abs(miss(low)) <= NEAR && low.slope() <= LEVEL_SLOPE;
        if (plain || !meets || !Double.isFinite(law.zeroRateLimit())) {
            return Optional.empty();
        }
        return Optional.of(limit(ZERO_SHEAR + " of the fitted law")
                .extrapolated("another law that fits as well may have another limit"));
    }

    private CurveShape lowEnd() {
        return CurveShape.of(fit.problem().only().x(), fit.problem().only().y()).lowEnd();
    }

    private Prediction limit(String name) {
        double limit = law.zeroRateLimit();
        Optional<Estimate> eta0 =
                fit.estimates().stream().filter(e -> e.value() == limit).findFirst();
        return Prediction.of(
                name,
                Quantity.VISCOSITY,
                limit,
                eta0.map(Estimate::low).orElse(Double.NaN),
                eta0.map(Estimate::high).orElse(Double.NaN));
    }

    private static String number(Prediction viscosity) {
        String interval = Double.isNaN(viscosity.low())
                ? ""
                : " (95 %: " + NumberText.of(viscosity.low()) + " to " + NumberText.of(viscosity.high()) + ")";
        return NumberText.of(viscosity.value()) + " Pa·s" + interval;
    }

    private String refusal(CurveShape low) {
        double limit = law.zeroRateLimit();
        if (!Double.isFinite(limit)) {
            return "the " + family.name() + " has no plateau";
        }
        double lowest = low.rates().at(0);
        String where = " at the lowest rate, " + NumberText.of(lowest) + " 1/s";
        double slope = low.slope();
        if (!(Math.abs(slope) <= LEVEL_SLOPE)) {
            return "no plateau was reached: the measured slope d ln η / d ln γ̇ is still " + NumberText.of(slope, 2)
                    + where + " (" + NumberText.of(LEVEL_SLOPE, 1) + " allowed)";
        }
        double share = law.at(lowest) / limit;
        if (!(Math.abs(share - 1) <= NEAR)) {
            return "no plateau was reached: the fitted law is at " + NumberText.of(100 * share, 3) + " % of its limit"
                    + where + " (95 % asked)";
        }
        double miss = miss(low);
        if (!(Math.abs(miss) <= NEAR)) {
            return "the " + family.name() + " misses the points at the low end: it lies "
                    + NumberText.of(100 * Math.abs(miss), 2) + " % " + (miss > 0 ? "above" : "below")
                    + " them on average (5 % allowed)";
        }
        return "";
    }

    /** Geometric mean of law / measured − 1 at the low end. */
    private double miss(CurveShape low) {
        double law =
                LogLogLine.through(low.rates(), low.rates().map(this.law::at)).mean();
        return law / low.mean() - 1;
    }

    @Override
    public String headline() {
        String sample = curve.conditions().sample();
        List<String> values = fit.estimates().stream()
                .filter(e -> e.status() != Estimate.Status.HELD)
                .map(Estimate::toString)
                .toList();
        return capital(family.name()) + (sample.isEmpty() ? "" : " for " + sample) + ": " + String.join(", ", values)
                + "; " + fit.residuals().size() + " points used, "
                + curve.viscosity().setAside() + " set aside, "
                + fit.spread() + (fit.status() == Fit.Status.CONVERGED ? "" : "; NOT converged") + plateau() + ".";
    }

    private String plateau() {
        Prediction zeroShear = zeroShearViscosity();
        return switch (zeroShear.standing()) {
            case AT_LEAST -> (extrapolatedLimit().isPresent()
                            ? "; this η₀ is extrapolated, the points give at least "
                            : "; the points give a " + ZERO_SHEAR + " of at least ")
                    + NumberText.of(zeroShear.low()) + " Pa·s";
            case UNDETERMINED -> "; " + ZERO_SHEAR + " not determined";
            default -> "";
        };
    }

    private static String capital(String text) {
        return text.substring(0, 1).toUpperCase(Locale.ROOT) + text.substring(1);
    }

    @Override
    public List<Rows> rows() {
        List<Rows> all = new ArrayList<>();
        all.add(fit.rows().get(0));
        List<Prediction> plateau = new ArrayList<>(List.of(zeroShearViscosity()));
        extrapolatedLimit().ifPresent(plateau::add);
        all.add(PredictionRows.of("What the fit says of the plateau", plateau));
        all.addAll(fit.rows().subList(1, fit.rows().size()));
        return List.copyOf(all);
    }

    @Override
    public List<Figure> figures() {
        List<Figure> all = new ArrayList<>();
        all.add(overlay());
        all.addAll(fit.figures().subList(1, fit.figures().size()));
        return List.copyOf(all);
    }

    private Figure overlay() {
        Doubles rates = fit.problem().only().x();
        Doubles line = Doubles.logSpaced(rates.smallest(), rates.largest(), LINE_POINTS);
        Figure.Builder figure = Figure.titled(capital(family.name()) + " and measured viscosity"
                        + curve.conditions().ofSample())
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.VISCOSITY)
                .line(family.name(), line, line.map(law::at))
                .marks("measured", rates, fit.problem().only().y());
        if (curve.viscosity().setAside() > 0) {
            int[] rows = IntStream.range(0, curve.viscosity().size())
                    .filter(row -> !curve.viscosity().verdicts().get(row).usable())
                    .toArray();
            figure.marks(
                    "set aside",
                    curve.viscosity().x().values().pick(rows),
                    curve.viscosity().y().values().pick(rows));
        }
        return figure.caption("The line is drawn where it was fitted, " + NumberText.of(rates.smallest()) + " to "
                        + NumberText.of(rates.largest()) + " 1/s.")
                .build();
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>(fit.cautions());
        Prediction zeroShear = zeroShearViscosity();
        if (!zeroShear.hasValue()) {
            all.add(zeroShear.toString());
        }
        int aside = curve.viscosity().setAside();
        if (aside > 0) {
            all.add(aside + " of " + curve.viscosity().size() + (aside == 1 ? " points is" : " points are")
                    + " marked unusable and took no part");
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
