package org.meltbook.measure;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Figure;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * Steady shear: shear stress and viscosity over shear rate, with the first normal stress difference where it was
 * measured. A curve is made from any two of rate, stress and viscosity; the third follows from σ = η γ̇.
 */
public final class FlowCurve implements Measurement {
    /** How intake makes one. */
    static final MeasurementKind KIND = new MeasurementKind(
            "flow curve",
            "two of shear rate, shear stress and viscosity",
            List.of(
                    Quantity.SHEAR_RATE,
                    Quantity.SHEAR_STRESS,
                    Quantity.VISCOSITY,
                    Quantity.FIRST_NORMAL_STRESS_DIFFERENCE),
            found -> Readings.STEADY_SHEAR.stream().filter(found::contains).count() >= 2,
            columns -> columns.flowCurve());

    private final Conditions conditions;
    private final Curve stress;
    private final Curve viscosity;
    private final Optional<Curve> firstNormalStress;
    private final List<Note> trail;

    private FlowCurve(
            Conditions conditions, Curve stress, Curve viscosity, Optional<Curve> firstNormalStress, List<Note> trail) {
        this.conditions = conditions;
        this.stress = stress;
        this.viscosity = viscosity;
        this.firstNormalStress = firstNormalStress;
        this.trail = List.copyOf(trail);
    }

    /**
     * A flow curve from its curves; stress and viscosity have one list of rates.
     *
     * @param stress            shear stress in Pa over shear rate in 1/s
     * @param viscosity         viscosity in Pa·s over the same shear rates
     * @param firstNormalStress first normal stress difference in Pa over shear rate, if measured
     * @throws RangeException if a curve holds another quantity or the rates differ
     */
    public static FlowCurve of(
            Conditions conditions, Curve stress, Curve viscosity, Optional<Curve> firstNormalStress, List<Note> trail) {
        check(stress, Quantity.SHEAR_STRESS);
        check(viscosity, Quantity.VISCOSITY);
        firstNormalStress.ifPresent(curve -> check(curve, Quantity.FIRST_NORMAL_STRESS_DIFFERENCE));
        if (!stress.x().values().equals(viscosity.x().values())) {
            throw new RangeException("stress and viscosity of a flow curve need the same shear rates");
        }
        return new FlowCurve(conditions, stress, viscosity, firstNormalStress, trail);
    }

    /**
     * A flow curve of sound points.
     *
     * @param rates    shear rates in 1/s, above zero
     * @param stresses shear stresses in Pa, above zero, as many
     * @throws RangeException if there are not as many of both, or one is not above zero
     */
    public static FlowCurve ofStress(Conditions conditions, double[] rates, double[] stresses) {
        if (rates.length != stresses.length) {
            throw new RangeException("a flow curve needs as many shear rates as shear stresses, found " + rates.length
                    + " and " + stresses.length);
        }
        Series rate = Series.of(Quantity.SHEAR_RATE, rates);
        Series stress = Series.of(Quantity.SHEAR_STRESS, stresses);
        double[] viscosities = new double[rates.length];
        for (int i = 0; i < rates.length; i++) {
            viscosities[i] = Require.positive("shear stress", stresses[i], "Pa")
                    / Require.positive("shear rate", rates[i], "1/s");
        }
        Series viscosity = Series.of(Quantity.VISCOSITY, viscosities);
        return of(conditions, Curve.of(rate, stress), Curve.of(rate, viscosity), Optional.empty(), List.of());
    }

    private static void check(Curve curve, Quantity y) {
        if (curve.x().quantity() != Quantity.SHEAR_RATE || curve.y().quantity() != y) {
            throw new RangeException("a flow curve needs " + y.label() + " over shear rate, found "
                    + curve.y().quantity().label() + " over "
                    + curve.x().quantity().label());
        }
    }

    @Override
    public String kind() {
        return KIND.name();
    }

    @Override
    public Conditions conditions() {
        return conditions;
    }

    /** Shear stress in Pa over shear rate in 1/s. */
    public Curve stress() {
        return stress;
    }

    /** Viscosity in Pa·s over shear rate in 1/s. */
    public Curve viscosity() {
        return viscosity;
    }

    /** First normal stress difference in Pa over shear rate in 1/s, if it was measured. */
    public Optional<Curve> firstNormalStress() {
        return firstNormalStress;
    }

    @Override
    public List<Curve> curves() {
        List<Curve> all = new ArrayList<>(List.of(stress, viscosity));
        firstNormalStress.ifPresent(all::add);
        return List.copyOf(all);
    }

    @Override
    public List<Note> trail() {
        return trail;
    }

    /** The same curve with one more note. */
    public FlowCurve noted(Note note) {
        return new FlowCurve(conditions, stress, viscosity, firstNormalStress, Trail.longer(trail, note));
    }

    @Override
    public String headline() {
        return "Flow curve" + conditions.ofSample() + ": " + viscosity.size() + " points, "
                + Trail.range(List.of(viscosity))
                + (firstNormalStress.isPresent() ? ", with first normal stress difference" : "")
                + Trail.temperature(conditions) + Trail.setAside(List.of(viscosity)) + ".";
    }

    @Override
    public List<Rows> rows() {
        Rows.Builder table = Rows.titled(title())
                .numbers("γ̇", "1/s", stress.x().values())
                .numbers("σ", "Pa", stress.y().values())
                .numbers("η", "Pa·s", viscosity.y().values());
        boolean together = firstNormalStress.isPresent()
                && firstNormalStress.get().x().values().equals(stress.x().values());
        if (together) {
            table.numbers("N₁", "Pa", firstNormalStress.get().y().values());
        }
        List<Rows> all = new ArrayList<>();
        all.add(Trail.verdicts(table, viscosity, together ? firstNormalStress.get() : viscosity)
                .build());
        if (firstNormalStress.isPresent() && !together) {
            all.add(Trail.rows(title() + ", first normal stress difference", firstNormalStress.get()));
        }
        return List.copyOf(all);
    }

    private String title() {
        return Trail.title(this);
    }

    @Override
    public List<Figure> figures() {
        List<Figure> all = new ArrayList<>();
        all.add(figure("Viscosity of " + title(), viscosity));
        firstNormalStress.ifPresent(curve -> all.add(figure("First normal stress difference of " + title(), curve)));
        return List.copyOf(all);
    }

    private static Figure figure(String title, Curve curve) {
        Curve usable = curve.usable();
        Figure.Builder figure = Figure.titled(title)
                .x(Quantity.SHEAR_RATE)
                .y(curve.y().quantity())
                .marks("measured", usable.x().values(), usable.y().values());
        Trail.marksSetAside(figure, List.of(curve));
        return figure.build();
    }

    @Override
    public List<String> cautions() {
        return Trail.cautions(curves());
    }

    @Override
    public String toString() {
        return headline();
    }
}
