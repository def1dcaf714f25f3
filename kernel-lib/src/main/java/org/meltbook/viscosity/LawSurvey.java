package org.meltbook.viscosity;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.fit.Comparison;
import org.meltbook.fit.Estimate;
import org.meltbook.fit.Fit;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * Several laws fitted to one flow curve, side by side: how far each misses the points, and how well the points support
 * each after its parameters are paid for.
 */
public final class LawSurvey implements Exhibit {
    private final FlowCurve curve;
    private final List<ViscosityFit> fits;
    private final Optional<Comparison> comparison;

    private LawSurvey(FlowCurve curve, List<ViscosityFit> fits) {
        this.curve = curve;
        this.fits = List.copyOf(fits);
        Map<String, Fit> named = new LinkedHashMap<>();
        fits.forEach(fit -> named.put(fit.law().family().name(), fit.fit()));
        this.comparison = named.size() > 1 ? Optional.of(Comparison.of(named)) : Optional.empty();
    }

    /** Every law of the catalogue on the curve. */
    public static LawSurvey of(FlowCurve curve) {
        return of(curve, ViscosityLaws.all(), Progress.QUIET);
    }

    /**
     * The given laws on the curve.
     *
     * @throws RangeException if no law is given
     */
    public static LawSurvey of(FlowCurve curve, List<LawFamily> laws, Progress progress) {
        if (laws.isEmpty()) {
            throw new RangeException("a survey needs one law at least, found none");
        }
        List<ViscosityFit> fits = new ArrayList<>();
        for (LawFamily law : laws) {
            progress.at(fits.size(), laws.size(), law.name());
            fits.add(ViscosityFit.of(curve, law, progress));
        }
        return new LawSurvey(curve, fits);
    }

    /** The fits, in the order of the laws. */
    public List<ViscosityFit> fits() {
        return fits;
    }

    /** The laws ranked by Akaike's criterion; empty if there is one law only. */
    public Optional<Comparison> comparison() {
        return comparison;
    }

    @Override
    public String headline() {
        List<String> misses = fits.stream()
                .map(fit -> fit.law().family().name() + " by " + miss(fit) + " %")
                .toList();
        String sample = curve.conditions().sample();
        return (sample.isEmpty() ? "Flow curve" : sample) + ": the points are missed (root mean square) by the "
                + String.join(", the ", misses)
                + comparison.map(ranking -> ". " + ranking.sentence()).orElse(".");
    }

    private static String miss(ViscosityFit fit) {
        return NumberText.of(100 * fit.fit().rootMeanSquare(), 2);
    }

    @Override
    public List<Rows> rows() {
        List<Rows> all = new ArrayList<>(List.of(sideBySide()));
        comparison.ifPresent(ranking -> all.addAll(ranking.rows()));
        return List.copyOf(all);
    }

    private Rows sideBySide() {
        return Rows.titled("Laws side by side")
                .text("law", fits.stream().map(fit -> fit.law().family().name()).toList())
                .text(
                        "free parameters",
                        fits.stream().map(LawSurvey::freeParameters).toList())
                .numbers(
                        "miss (root mean square)",
                        "%",
                        Doubles.of(fits.stream()
                                .mapToDouble(fit -> 100 * fit.fit().rootMeanSquare())
                                .toArray()))
                .text(
                        "zero-shear viscosity [Pa·s]",
                        fits.stream().map(LawSurvey::plateau).toList())
                .note("A law with more parameters always comes closer; that alone is no reason to prefer it.")
                .build();
    }

    private static String freeParameters(ViscosityFit fit) {
        return Long.toString(fit.fit().estimates().stream()
                .filter(estimate -> estimate.status() != Estimate.Status.HELD)
                .count());
    }

    private static String plateau(ViscosityFit fit) {
        Prediction plateau = fit.zeroShearViscosity();
        return switch (plateau.standing()) {
            case AT_LEAST -> "at least " + NumberText.of(plateau.low());
            case AT_MOST -> "at most " + NumberText.of(plateau.high());
            case UNDETERMINED -> "not determined";
            default -> NumberText.of(plateau.value()) + " (" + NumberText.of(plateau.low()) + " to "
                    + NumberText.of(plateau.high()) + ")";
        };
    }

    @Override
    public List<Figure> figures() {
        Curve usable = curve.viscosity().usable();
        Doubles rates = Doubles.logSpaced(
                usable.x().values().smallest(), usable.x().values().largest(), 60);
        Figure.Builder figure = Figure.titled(
                        "Laws on the viscosity" + curve.conditions().ofSample())
                .x(Quantity.SHEAR_RATE)
                .y(Quantity.VISCOSITY);
        fits.forEach(fit -> figure.line(fit.law().family().name(), rates, rates.map(fit.law()::at)));
        return List.of(figure.marks("measured", usable.x().values(), usable.y().values())
                .caption("Each line is drawn where it was fitted.")
                .build());
    }

    @Override
    public List<String> cautions() {
        return comparison.map(Comparison::cautions).orElse(List.of());
    }

    @Override
    public String toString() {
        return headline();
    }
}
