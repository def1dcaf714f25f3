package org.meltbook.intake;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.intake.Body.Group;
import org.meltbook.intake.Layout.Role;
import org.meltbook.intake.Layout.Use;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Measurement;
import org.meltbook.measure.MeasurementKind;
import org.meltbook.measure.Readings;
import org.meltbook.measure.Vocabulary;
import org.meltbook.units.Quantity;

/** Makes measurements of the rows of a file, group by group. */
final class Gathering {
    /** A run whose readings of temperature stay within this many kelvin is one at their mean. Common practice. */
    private static final double STEADY_KELVIN = 1;

    private final String file;
    private final String digest;
    private final Layout layout;
    private final Body body;
    private final Remarks remarks;
    private final List<Measurement> made = new ArrayList<>();
    private final List<String> warnings = new ArrayList<>();
    private OptionalDouble temperature = OptionalDouble.empty();
    private long rowsOut;

    Gathering(String file, String digest, Layout layout, Body body, Remarks remarks) {
        this.file = file;
        this.digest = digest;
        this.layout = layout;
        this.body = body;
        this.remarks = remarks;
    }

    /** Makes all measurements of the file. */
    Gathering gather(Vocabulary vocabulary, List<String> before) {
        warnings.addAll(before);
        temperature = remarks.temperature(vocabulary, warnings);
        for (Use use : layout.with(Role.PASSED_OVER)) {
            warnings.add("column " + IntakeException.quoted(use.heading().text()) + " is passed over: " + use.why());
        }
        Map<List<String>, List<Group>> together = new LinkedHashMap<>();
        body.groups().forEach(group -> together.computeIfAbsent(group.keys(), k -> new ArrayList<>())
                .add(group));
        together.values().forEach(layout.isLong() ? this::gatherLong : this::gatherWide);
        return this;
    }

    Intake intake(Reading reading, Dialect dialect, Survey survey) {
        IntakeLog log = new IntakeLog(file, digest, dialect, layout, survey.emptyLines(), survey.rowsRead(), rowsOut);
        return new Intake(reading, log, made, warnings);
    }

    private void gatherWide(List<Group> groups) {
        Group group = groups.get(0);
        int[] rows = body.rowsOf(group);
        Conditions conditions = conditions(group.keys(), rows);
        List<Quantity> quantities = layout.quantities();
        for (MeasurementKind kind : MeasurementKind.all()) {
            if (kind.enough().test(quantities)) {
                made.add(kind.made().apply(readings(conditions, kind.uses(), rows)));
            }
        }
        rowsOut += rows.length;
    }

    private Readings readings(Conditions conditions, List<Quantity> wanted, int[] rows) {
        Readings readings = Readings.of("intake", conditions);
        for (Use use : layout.with(Role.NUMBERS)) {
            if (wanted.contains(use.quantity())) {
                readings = with(readings, use, use.quantity(), rows);
            }
        }
        return readings;
    }

    private Readings with(Readings readings, Use use, Quantity quantity, int[] rows) {
        return readings.with(quantity, use.unit().orElseThrow(), body.numbers(use, rows), body.digits(use));
    }

    private void gatherLong(List<Group> groups) {
        int[] storage = rowsOf(groups, Quantity.STORAGE_MODULUS);
        int[] loss = rowsOf(groups, Quantity.LOSS_MODULUS);
        int[] all = IntStream.concat(IntStream.of(storage), IntStream.of(loss)).toArray();
        Conditions conditions = conditions(groups.get(0).keys(), all);
        made.add(Readings.frequencySweep(
                modulus(conditions, Quantity.STORAGE_MODULUS, storage),
                modulus(conditions, Quantity.LOSS_MODULUS, loss)));
        rowsOut += all.length;
    }

    private int[] rowsOf(List<Group> groups, Quantity kind) {
        Group group = groups.stream()
                .filter(g -> g.kind().equals(Optional.of(kind)))
                .findFirst()
                .orElseThrow(() -> new IntakeException(
                        file,
                        0,
                        layout.with(Role.KIND).get(0).heading().text(),
                        "rows of " + kind.label() + keysText(groups.get(0).keys()),
                        "none"));
        return body.rowsOf(group);
    }

    private static String keysText(List<String> keys) {
        return keys.isEmpty() ? "" : " for " + String.join(", ", keys);
    }

    private Readings modulus(Conditions conditions, Quantity kind, int[] rows) {
        Readings readings = readings(conditions, List.of(Quantity.ANGULAR_FREQUENCY), rows);
        return with(readings, layout.with(Role.MODULI).get(0), kind, rows);
    }

    private Conditions conditions(List<String> keys, int[] rows) {
        List<Use> uses = layout.with(Role.KEY);
        Map<String, String> entries = remarks.entries();
        List<String> names = new ArrayList<>();
        for (int i = 0; i < uses.size(); i++) {
            entries.put(uses.get(i).heading().text(), keys.get(i));
            names.add(name(uses.get(i), keys.get(i)));
        }
        String own = remarks.sample();
        boolean named = uses.stream().anyMatch(use -> use.heading().isNamed("sample"));
        if (!own.isEmpty() && !named) {
            names.add(0, own);
        }
        String sample = String.join(", ", names);
        return conditions(sample, entries, temperatureOf(sample, rows));
    }

    /** A name speaks for itself; a number needs what it is, and its unit. */
    private static String name(Use use, String key) {
        boolean number = use.heading().quantity().isPresent();
        String unit = use.heading()
                .unitText()
                .filter(text -> !text.equals("1"))
                .map(text -> " " + text)
                .orElse("");
        return number ? use.heading().name() + " " + key + unit : key;
    }

    private Conditions conditions(String sample, Map<String, String> entries, OptionalDouble kelvin) {
        try {
            return new Conditions(sample, kelvin, file, digest, entries);
        } catch (RangeException e) {
            throw new IntakeException(file, 0, "", "a temperature above absolute zero", e.getMessage()).because(e);
        }
    }

    private OptionalDouble temperatureOf(String sample, int[] rows) {
        Optional<Use> column = layout.with(Role.NUMBERS).stream()
                .filter(use -> use.quantity() == Quantity.TEMPERATURE)
                .findFirst();
        if (column.isEmpty()) {
            return temperature;
        }
        Doubles kelvin = column.get()
                .unit()
                .orElseThrow()
                .conversion(Quantity.TEMPERATURE)
                .toSi(body.numbers(column.get(), rows));
        double spread = kelvin.largest() - kelvin.smallest();
        if (spread <= STEADY_KELVIN) {
            return OptionalDouble.of(
                    kelvin.stream().filter(Double::isFinite).average().orElseThrow());
        }
        warnings.add((sample.isEmpty() ? "" : sample + ": ")
                + (Double.isNaN(spread)
                        ? "the temperature column holds no number"
                        : "temperature runs from " + NumberText.of(kelvin.smallest()) + " to "
                                + NumberText.of(kelvin.largest())
                                + " K: not used as one; splitBy its heading if these are several runs"));
        return OptionalDouble.empty();
    }
}
