package org.meltbook.measure;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.Collections;
import java.util.EnumMap;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.IntFunction;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.units.Conversion;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;

/**
 * Columns of readings with their units, on the way to a measurement. Here units become SI, each row gets its first
 * verdict, and each step leaves a note; no row is dropped and no number is changed otherwise.
 */
public final class Readings {
    static final List<Quantity> STEADY_SHEAR = List.of(Quantity.SHEAR_RATE, Quantity.SHEAR_STRESS, Quantity.VISCOSITY);
    private static final int MOST_DIGITS = 17;

    private final String step;
    private final Conditions conditions;
    private final Map<Quantity, Column> columns;
    private final List<Note> trail;

    private Readings(String step, Conditions conditions, Map<Quantity, Column> columns, List<Note> trail) {
        this.step = step;
        this.conditions = conditions;
        this.columns = columns;
        this.trail = trail;
    }

    /** One column: SI values, the conversion that led to them, and with how many digits they came. */
    private record Column(Series series, Conversion conversion, int digits) {
        /** Half a unit of the last digit given, relative to the number of that row; a zero is taken as written. */
        double rounding(int row) {
            double written = Math.abs(conversion.fromSi(series.at(row)));
            if (written == 0) {
                return 0;
            }
            double exponent = Math.floor(Math.log10(written) + 1e-12);
            return 0.5 * Math.pow(10, exponent - digits + 1) / written;
        }
    }

    /**
     * No columns yet.
     *
     * @param step who reads, as it will stand in the notes: {@code intake}
     */
    public static Readings of(String step, Conditions conditions) {
        return new Readings(step, conditions, Map.of(), List.of());
    }

    /**
     * The same with one more column.
     *
     * @param unit   the unit of {@code values}
     * @param digits with how many significant digits the most precise of the values was written
     * @throws RangeException if there is a column of that quantity, or its length differs from the others
     */
    public Readings with(Quantity quantity, LabUnit unit, Doubles values, int digits) {
        if (columns.containsKey(quantity)) {
            throw new RangeException("two columns of " + quantity.label() + ": which one is meant?");
        }
        for (Column other : columns.values()) {
            if (other.series().size() != values.size()) {
                throw new RangeException(quantity.label() + " has " + values.size() + " rows, "
                        + other.series().quantity().label() + " has "
                        + other.series().size());
            }
        }
        Conversion conversion = unit.conversion(quantity);
        Map<Quantity, Column> more = new EnumMap<>(Quantity.class);
        more.putAll(columns);
        more.put(quantity, new Column(new Series(quantity, conversion.toSi(values), unit.text()), conversion, digits));
        return new Readings(
                step, conditions, more, conversion.isIdentity() ? trail : noted(quantity, unit, conversion));
    }

    /** The same with one more column, whose digits are those of the shortest decimal text of its numbers. */
    public Readings with(Quantity quantity, LabUnit unit, Doubles values) {
        return with(quantity, unit, values, digits(values));
    }

    private List<Note> noted(Quantity quantity, LabUnit unit, Conversion conversion) {
        return longer(quantity.label() + " came in " + unit + ", " + conversion + " to " + quantity.siUnit());
    }

    private List<Note> longer(String text) {
        return Stream.concat(trail.stream(), Stream.of(new Note(step, text))).toList();
    }

    private static int digits(Doubles values) {
        int most = 1;
        for (int row = 0; row < values.size() && most < MOST_DIGITS; row++) {
            double value = values.at(row);
            if (Double.isFinite(value) && value != 0) {
                BigDecimal shortest = new BigDecimal(Double.toString(value)).stripTrailingZeros();
                most = Math.max(most, shortest.precision());
            }
        }
        return most;
    }

    /** Whether there is a column of the quantity. */
    public boolean has(Quantity quantity) {
        return columns.containsKey(quantity);
    }

    /**
     * The frequency sweep of these columns.
     *
     * @throws RangeException if angular frequency, storage or loss modulus is missing
     */
    public FrequencySweep frequencySweep() {
        return frequencySweep(this, this);
    }

    /** The frequency sweep of a storage and a loss modulus that have frequencies of their own. */
    public static FrequencySweep frequencySweep(Readings storage, Readings loss) {
        List<Note> notes = Stream.concat(storage.trail.stream(), loss.trail.stream())
                .distinct()
                .toList();
        return FrequencySweep.of(
                storage.conditions,
                storage.modulus(Quantity.STORAGE_MODULUS),
                loss.modulus(Quantity.LOSS_MODULUS),
                notes);
    }

    private Curve modulus(Quantity modulus) {
        return positive(Quantity.ANGULAR_FREQUENCY, modulus);
    }

    /**
     * The table of Maxwell modes of these columns.
     *
     * @throws RangeException if relaxation time or relaxation modulus is missing
     */
    public ModeTable modeTable() {
        return ModeTable.of(conditions, positive(Quantity.RELAXATION_TIME, Quantity.RELAXATION_MODULUS), trail);
    }

    /** One quantity over another, both of which must be above zero to be used. */
    private Curve positive(Quantity x, Quantity y) {
        return over(x, scanned(x), y, RowCheck::aboveZero);
    }

    /** What is said of each rate or frequency. */
    private List<Verdict> scanned(Quantity quantity) {
        Series series = column(quantity).series();
        return verdicts(series.size(), row -> RowCheck.aboveZero(quantity, series.at(row)));
    }

    /** What a check says of one number of a quantity. */
    private interface Check {
        Verdict of(Quantity quantity, double value);
    }

    /** One quantity over another. Without a rate or frequency to stand at, nothing more need be said of a row. */
    private Curve over(Quantity x, List<Verdict> scanned, Quantity y, Check check) {
        Series values = column(y).series();
        return new Curve(column(x).series(), values, verdicts(values.size(), row -> {
            Verdict first = scanned.get(row);
            return first.usable() ? first.and(check.of(y, values.at(row))) : first;
        }));
    }

    /**
     * The flow curve of these columns: what is missing of shear rate, shear stress and viscosity follows from
     * σ = η γ̇; where all three are given, rows in which they disagree are doubtful.
     *
     * @throws RangeException if fewer than two of the three are there
     */
    public FlowCurve flowCurve() {
        Readings full = completed();
        List<Verdict> rates = full.scanned(Quantity.SHEAR_RATE);
        List<Verdict> products = full == this ? products() : Collections.nCopies(rates.size(), Verdict.SOUND);
        Optional<Curve> normal = Optional.of(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE)
                .filter(columns::containsKey)
                .map(quantity -> full.over(Quantity.SHEAR_RATE, rates, quantity, RowCheck::normalStress));
        Curve stress = full.over(Quantity.SHEAR_RATE, rates, Quantity.SHEAR_STRESS, RowCheck::aboveZero);
        Curve viscosity = full.over(Quantity.SHEAR_RATE, rates, Quantity.VISCOSITY, RowCheck::aboveZero);
        return FlowCurve.of(conditions, also(stress, products), also(viscosity, products), normal, full.trail);
    }

    /** The curve in which usable points carry a second verdict too. */
    private static Curve also(Curve curve, List<Verdict> second) {
        return new Curve(curve.x(), curve.y(), verdicts(curve.size(), row -> {
            Verdict first = curve.verdicts().get(row);
            return first.usable() ? first.and(second.get(row)) : first;
        }));
    }

    private Readings completed() {
        List<Quantity> missing =
                STEADY_SHEAR.stream().filter(q -> !columns.containsKey(q)).toList();
        if (missing.size() > 1) {
            throw new RangeException("a flow curve needs two of shear rate, shear stress and viscosity; missing are "
                    + String.join(" and ", missing.stream().map(Quantity::label).toList()));
        }
        return missing.isEmpty() ? this : withThird(missing.get(0));
    }

    private Readings withThird(Quantity missing) {
        Column first = column(
                STEADY_SHEAR.stream().filter(q -> q != missing).findFirst().orElseThrow());
        int size = first.series().size();
        double[] third = new double[size];
        for (int row = 0; row < size; row++) {
            double value =
                    switch (missing) {
                        case SHEAR_RATE -> at(Quantity.SHEAR_STRESS, row) / at(Quantity.VISCOSITY, row);
                        case SHEAR_STRESS -> at(Quantity.VISCOSITY, row) * at(Quantity.SHEAR_RATE, row);
                        default -> at(Quantity.SHEAR_STRESS, row) / at(Quantity.SHEAR_RATE, row);
                    };
            third[row] = Double.isFinite(value) ? value : Double.NaN;
        }
        Readings more = with(missing, LabUnit.parse(missing.siUnit()), Doubles.of(third), MOST_DIGITS);
        String how =
                switch (missing) {
                    case SHEAR_RATE -> "shear stress / viscosity";
                    case SHEAR_STRESS -> "viscosity × shear rate";
                    default -> "shear stress / shear rate";
                };
        List<Note> notes = more.longer(missing.label() + " was not given: computed as " + how);
        return new Readings(step, conditions, more.columns, notes);
    }

    private double at(Quantity quantity, int row) {
        return columns.get(quantity).series().at(row);
    }

    /** Whether stress, rate and viscosity of each row agree within the digits given. */
    private List<Verdict> products() {
        Map<List<Double>, Verdict> said = new HashMap<>();
        return verdicts(column(Quantity.SHEAR_RATE).series().size(), row -> {
            double allowed = 0;
            for (Quantity quantity : STEADY_SHEAR) {
                allowed += columns.get(quantity).rounding(row);
            }
            double off = RowCheck.offProduct(
                    at(Quantity.SHEAR_RATE, row), at(Quantity.SHEAR_STRESS, row), at(Quantity.VISCOSITY, row), allowed);
            return off == 0
                    ? Verdict.SOUND
                    : said.computeIfAbsent(
                            List.of(RowCheck.twoDigits(off), RowCheck.twoDigits(allowed)),
                            key -> RowCheck.offProduct(key.get(0), key.get(1)));
        });
    }

    private static List<Verdict> verdicts(int size, IntFunction<Verdict> check) {
        List<Verdict> all = new ArrayList<>(size);
        IntStream.range(0, size).mapToObj(check).forEach(all::add);
        return all;
    }

    private Column column(Quantity quantity) {
        if (!columns.containsKey(quantity)) {
            throw new RangeException("no column of " + quantity.label() + "; there is "
                    + String.join(
                            ", ", columns.keySet().stream().map(Quantity::label).toList()));
        }
        return columns.get(quantity);
    }
}
