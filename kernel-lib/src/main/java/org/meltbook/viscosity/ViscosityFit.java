package org.meltbook.viscosity;

import java.util.ArrayList;
import java.util.List;
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
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * A viscosity law fitted to a flow curve with equal relative errors; only usable rows take part.
 *
 * <p>The zero-shear viscosity is given as a plain number only if the plateau was measured. Three things are asked of the
 * points within half a decade of the lowest rate (three points at least); the limits are common practice, not a standard:
 * the measured slope d ln η / d ln γ̇ lies within 0.1 of zero; the law at the lowest rate is within 5 % of its limit at
 * rate zero; the law lies within 5 % of the measured mean. Otherwise the mean of these points is a lower bound, if the
 * viscosity does not rise with the rate there.
 */
public final class ViscosityFit implements Exhibit {
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
     * @throws org.meltbook.base.RangeException if the usable rows are too few for the free parameters, or one has a rate
     *     or viscosity that is not above zero
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
        CurveShape low = CurveShape.of(fit.problem().x(), fit.problem().y()).lowEnd();
        double lowest = low.rates().at(0);
        double slope = low.slope();
        String name = "zero-shear viscosity";
        if (slope > LEVEL_SLOPE) {
            return Prediction.undetermined(name, Quantity.VISCOSITY, "the viscosity rises with the rate at the low end, "
                    + "with slope " + NumberText.of(slope, 2));
        }
        String reason = refusal(low, lowest, slope);
        if (!reason.isEmpty()) {
            return Prediction.atLeast(name, Quantity.VISCOSITY, low.mean(), reason);
        }
        Estimate eta0 = fit.estimate("eta0");
        return Prediction.of(name, Quantity.VISCOSITY, law.zeroRateLimit(), eta0.low(), eta0.high());
    }

    private String refusal(CurveShape low, double lowest, double slope) {
        String where = " at the lowest rate, " + NumberText.of(lowest) + " 1/s";
        double limit = law.zeroRateLimit();
        if (!Double.isFinite(limit)) {
            return "the " + family.name() + " has no plateau";
        }
        if (!(Math.abs(slope) <= LEVEL_SLOPE)) {
            return "no plateau was reached: the measured slope d ln η / d ln γ̇ is still " + NumberText.of(slope, 2)
                    + where + " (" + NumberText.of(LEVEL_SLOPE, 1) + " allowed)";
        }
        double share = law.at(lowest) / limit;
        if (!(Math.abs(share - 1) <= NEAR)) {
            return "no plateau was reached: the fitted law is at " + NumberText.of(100 * share, 2)
                    + " % of its limit" + where + " (95 % asked)";
        }
        double miss = low.rates().stream().map(law::at).map(Math::log).average().orElse(Double.NaN) - Math.log(low.mean());
        if (!(Math.abs(miss) <= NEAR)) {
            return "the " + family.name() + " misses the points at the low end by " + NumberText.of(100 * miss, 2)
                    + " % on average (5 % allowed)";
        }
        return "";
    }

    @Override
    public String headline() {
        String sample = curve.conditions().sample();
        List<String> values = fit.estimates().stream()
                .filter(e -> e.status() != Estimate.Status.HELD)
                .map(Estimate::toString)
                .toList();
        return capital(family.name()) + (sample.isEmpty() ? "" : " for " + sample) + ": " + String.join(", ", values)
                + "; " + fit.residuals().size() + " points used, " + curve.viscosity().setAside() + " set aside, "
                + fit.spread() + (fit.status() == Fit.Status.CONVERGED ? "" : "; NOT converged") + ".";
    }

    private static String capital(String text) {
        return text.substring(0, 1).toUpperCase(java.util.Locale.ROOT) + text.substring(1);
    }

    @Override
    public List<Rows> rows() {
        List<Rows> all = new ArrayList<>();
        all.add(fit.rows().get(0));
        all.add(PredictionRows.of("What the fit says of the plateau", List.of(zeroShearViscosity())));
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
        Doubles rates = fit.problem().x();
        Doubles line = Doubles.logSpaced(rates.smallest(), rates.largest(), LINE_POINTS);
        Figure.Builder figure = Figure.titled(capital(family.name()) + " and measured viscosity"
                        + (curve.conditions().sample().isEmpty() ? "" : " of " + curve.conditions().sample()))
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.VISCOSITY)
                .line(family.name(), line, line.map(law::at))
                .marks("measured", rates, fit.problem().y());
        if (curve.viscosity().setAside() > 0) {
            int[] rows = java.util.stream.IntStream.range(0, curve.viscosity().size())
                    .filter(row -> !curve.viscosity().verdicts().get(row).usable())
                    .toArray();
            figure.marks("set aside", curve.viscosity().x().values().pick(rows), curve.viscosity().y().values().pick(rows));
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
            all.add(aside + " of " + curve.viscosity().size() + " points are marked unusable and took no part");
        }
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
