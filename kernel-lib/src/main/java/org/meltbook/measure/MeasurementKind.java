package org.meltbook.measure;

import java.util.Collection;
import java.util.List;
import java.util.function.Function;
import java.util.function.Predicate;
import org.meltbook.units.Quantity;

/**
 * A kind of measurement that columns can make. Intake knows measurements only through {@link #all}: one more is a class
 * with its kind, and a line there.
 *
 * @param name   what it is called: {@code frequency sweep}
 * @param needs  which columns it needs, in words for messages
 * @param uses   the quantities that go into it, needed or not
 * @param enough whether these quantities are enough for one
 * @param made   the measurement from columns that are enough
 */
public record MeasurementKind(
        String name,
        String needs,
        List<Quantity> uses,
        Predicate<Collection<Quantity>> enough,
        Function<Readings, Measurement> made) {
    /** Copies the list. */
    public MeasurementKind {
        uses = List.copyOf(uses);
    }

    /** Every kind that intake can make. */
    public static List<MeasurementKind> all() {
        return List.of(FrequencySweep.KIND, FlowCurve.KIND, ModeTable.KIND);
    }
}
