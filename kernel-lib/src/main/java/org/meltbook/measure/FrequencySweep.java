package org.meltbook.measure;

import java.util.List;
import java.util.stream.DoubleStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.units.Quantity;

/**
 * Storage and loss modulus over angular frequency in small-amplitude oscillation. The two moduli may have frequencies
 * of their own, as when they were read off a printed figure; nothing is interpolated to bring them together.
 */
public final class FrequencySweep implements Measurement {
    /** How intake makes one. */
    static final MeasurementKind KIND = new MeasurementKind(
            "frequency sweep",
            "angular frequency, storage modulus and loss modulus",
            List.of(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS, Quantity.LOSS_MODULUS),
            found -> found.containsAll(
                    List.of(Quantity.ANGULAR_FREQUENCY, Quantity.STORAGE_MODULUS, Quantity.LOSS_MODULUS)),
            columns -> columns.frequencySweep());

    private final Conditions conditions;
    private final Curve storage;
    private final Curve loss;
    private final List<Note> trail;

    private FrequencySweep(Conditions conditions, Curve storage, Curve loss, List<Note> trail) {
        this.conditions = conditions;
        this.storage = storage;
        this.loss = loss;
        this.trail = List.copyOf(trail);
    }

    /**
     * A sweep from its two curves.
     *
     * @param storage storage modulus in Pa over angular frequency in rad/s
     * @param loss    loss modulus in Pa over angular frequency in rad/s
     * @throws RangeException if a curve holds another quantity
     */
    public static FrequencySweep of(Conditions conditions, Curve storage, Curve loss, List<Note> trail) {
        check(storage, Quantity.STORAGE_MODULUS);
        check(loss, Quantity.LOSS_MODULUS);
        return new FrequencySweep(conditions, storage, loss, trail);
    }

    private static void check(Curve curve, Quantity y) {
        if (curve.x().quantity() != Quantity.ANGULAR_FREQUENCY || curve.y().quantity() != y) {
            throw new RangeException("a frequency sweep needs " + y.label() + " over angular frequency, found "
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

    /** Storage modulus in Pa over angular frequency in rad/s. */
    public Curve storage() {
        return storage;
    }

    /** Loss modulus in Pa over angular frequency in rad/s. */
    public Curve loss() {
        return loss;
    }

    @Override
    public List<Curve> curves() {
        return List.of(storage, loss);
    }

    @Override
    public List<Note> trail() {
        return trail;
    }

    /** Whether both moduli were measured at the same frequencies. */
    public boolean sharesFrequencies() {
        return storage.x().values().equals(loss.x().values());
    }

    /** The same sweep with one more note. */
    public FrequencySweep noted(Note note) {
        return new FrequencySweep(conditions, storage, loss, Trail.longer(trail, note));
    }

    @Override
    public String headline() {
        return "Frequency sweep" + conditions.ofSample() + ": " + storage.size() + " storage and " + loss.size()
                + " loss moduli, "
                + (sharesFrequencies() ? "at common frequencies" : "at frequencies of their own") + ", "
                + Trail.range(curves()) + Trail.temperature(conditions) + Trail.setAside(curves()) + ".";
    }

    @Override
    public List<Rows> rows() {
        if (sharesFrequencies()) {
            Rows.Builder together = Rows.titled(title())
                    .numbers("ω", "rad/s", storage.x().values())
                    .numbers("G′", "Pa", storage.y().values())
                    .numbers("G″", "Pa", loss.y().values());
            return List.of(Trail.verdicts(together, storage, loss).build());
        }
        return List.of(
                Trail.rows(title() + ", storage modulus", storage), Trail.rows(title() + ", loss modulus", loss));
    }

    private String title() {
        return Trail.title(this);
    }

    @Override
    public List<Figure> figures() {
        Curve usableStorage = storage.usable();
        Curve usableLoss = loss.usable();
        Figure.Builder figure = Figure.titled("Moduli of " + title())
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("moduli G′, G″", "Pa", Axis.Scale.LOG))
                .marks("G′", usableStorage.x().values(), usableStorage.y().values())
                .marks("G″", usableLoss.x().values(), usableLoss.y().values());
        Trail.marksSetAside(figure, curves());
        return List.of(figure.build());
    }

    @Override
    public List<String> cautions() {
        return Trail.cautions(curves());
    }

    /** The angular frequencies at which anything usable was measured, in rad/s, rising. */
    public Doubles frequencies() {
        return Doubles.of(
                DoubleStream.concat(storage.usable().x().values().stream(), loss.usable().x().values().stream())
                        .distinct()
                        .sorted()
                        .toArray());
    }

    @Override
    public String toString() {
        return headline();
    }
}
