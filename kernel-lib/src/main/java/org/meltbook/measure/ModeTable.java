package org.meltbook.measure;

import java.util.List;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Figure;
import org.meltbook.units.Quantity;

/**
 * Maxwell modes as somebody printed them: moduli over relaxation times. Not a measurement in itself but what a
 * publication made of one, and kept with its conditions like any other.
 */
public final class ModeTable implements Measurement {
    /** How intake makes one. */
    static final MeasurementKind KIND = new MeasurementKind(
            "table of Maxwell modes",
            "relaxation time and relaxation modulus",
            List.of(Quantity.RELAXATION_TIME, Quantity.RELAXATION_MODULUS),
            found -> found.containsAll(List.of(Quantity.RELAXATION_TIME, Quantity.RELAXATION_MODULUS)),
            columns -> columns.modeTable());

    private final Conditions conditions;
    private final Curve modes;
    private final List<Note> trail;

    private ModeTable(Conditions conditions, Curve modes, List<Note> trail) {
        this.conditions = conditions;
        this.modes = modes;
        this.trail = List.copyOf(trail);
    }

    /**
     * A table of modes.
     *
     * @param modes relaxation modulus in Pa over relaxation time in s
     * @throws RangeException if the curve holds other quantities
     */
    public static ModeTable of(Conditions conditions, Curve modes, List<Note> trail) {
        if (modes.x().quantity() != Quantity.RELAXATION_TIME || modes.y().quantity() != Quantity.RELAXATION_MODULUS) {
            throw new RangeException("a table of modes needs relaxation moduli over relaxation times, found "
                    + modes.y().quantity().label() + " over "
                    + modes.x().quantity().label());
        }
        return new ModeTable(conditions, modes, trail);
    }

    /** Relaxation modulus in Pa over relaxation time in s. */
    public Curve modes() {
        return modes;
    }

    @Override
    public String kind() {
        return KIND.name();
    }

    @Override
    public Conditions conditions() {
        return conditions;
    }

    @Override
    public List<Curve> curves() {
        return List.of(modes);
    }

    @Override
    public List<Note> trail() {
        return trail;
    }

    @Override
    public String headline() {
        return "Table of Maxwell modes" + conditions.ofSample() + ": " + modes.size() + " modes, "
                + Trail.range(curves()) + Trail.temperature(conditions) + Trail.setAside(curves()) + ".";
    }

    @Override
    public List<Rows> rows() {
        return List.of(Trail.rows(Trail.title(this), modes));
    }

    @Override
    public List<Figure> figures() {
        Curve usable = modes.usable();
        Figure.Builder figure = Figure.titled("Modes of " + Trail.title(this))
                .x(Quantity.RELAXATION_TIME)
                .y(Quantity.RELAXATION_MODULUS)
                .marks("modes", usable.x().values(), usable.y().values());
        Trail.marksSetAside(figure, curves());
        return List.of(figure.build());
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
