package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CsvRecord;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.meltbook.intake.Layout.Role;
import org.meltbook.intake.Layout.Use;
import org.meltbook.measure.Heading;
import org.meltbook.measure.MeasurementKind;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;
import org.meltbook.units.UnitException;

/** Finds out from the header, and the row below it, what the columns of a file are for. */
final class LayoutFinder {
    /** Headings whose cells name a sample, in any case. */
    private static final List<String> SAMPLES = List.of("sample", "lot", "batch", "specimen", "material");

    /** Quantities that tell one sample from another. */
    private static final Set<Quantity> COMPOSITION =
            Set.of(Quantity.VOLUME_FRACTION, Quantity.MASS_FRACTION, Quantity.MOLAR_MASS);

    /** Quantities that are read where they are found: what any kind of measurement uses, and the temperature. */
    private static final Set<Quantity> READ = Stream.concat(
                    MeasurementKind.all().stream().flatMap(kind -> kind.uses().stream()),
                    Stream.of(Quantity.TEMPERATURE))
            .collect(Collectors.toUnmodifiableSet());

    private final String file;
    private final Options options;
    private final CsvRecord header;
    private final Optional<CsvRecord> next;

    private LayoutFinder(String file, Options options, CsvRecord header, Optional<CsvRecord> next) {
        this.file = file;
        this.options = options;
        this.header = header;
        this.next = next;
    }

    /**
     * The layout of a file.
     *
     * @param header its first row
     * @param next   the row below, if there is one
     * @throws IntakeException if headings are missing, double or unknown, or a unit is missing or does not fit
     */
    static Layout find(String file, Options options, CsvRecord header, Optional<CsvRecord> next) {
        return new LayoutFinder(file, options, header, next).find();
    }

    private Layout find() {
        List<Heading> headings = headings();
        List<Role> roles = roles(headings);
        boolean unitRow = hasUnitRow(headings, roles);
        List<Use> uses = new ArrayList<>();
        for (int i = 0; i < headings.size(); i++) {
            Heading heading = withUnit(headings.get(i), i, unitRow);
            boolean numbers = roles.get(i) == Role.NUMBERS || roles.get(i) == Role.MODULI;
            Optional<LabUnit> unit = numbers
                    ? Optional.of(
                            unit(heading, unitRow && headings.get(i).unitText().isEmpty()))
                    : Optional.empty();
            String why = roles.get(i) == Role.PASSED_OVER ? whyPassedOver(heading) : "";
            uses.add(new Use(i, heading, roles.get(i), unit, why));
        }
        long unitLine = unitRow ? next.orElseThrow().getStartingLineNumber() : 0;
        return new Layout(uses, unitLine, Math.max(unitLine, header.getStartingLineNumber()));
    }

    private static String whyPassedOver(Heading heading) {
        if (namesSample(heading)) {
            return "the file is split by another column";
        }
        return heading.quantity()
                .map(quantity -> "no measurement is made from " + quantity.label())
                .orElse("heading not known");
    }

    /** Whether the cells of the column tell one sample from another, unless the caller says which column does. */
    private static boolean namesSample(Heading heading) {
        return SAMPLES.stream().anyMatch(heading::isNamed)
                || heading.quantity().filter(COMPOSITION::contains).isPresent();
    }

    private List<Heading> headings() {
        List<String> cells = header.getFields();
        if (cells.stream().allMatch(LayoutFinder::looksLikeNumber)) {
            throw refused(
                    "",
                    "a header that names the columns",
                    "a row of numbers, " + IntakeException.quoted(String.join(" ", cells)));
        }
        List<Heading> headings = new ArrayList<>();
        Set<String> seen = new LinkedHashSet<>();
        for (String cell : cells) {
            if (cell.isBlank()) {
                throw refused("", "a heading for each column", "an empty one, the " + (headings.size() + 1) + ".");
            }
            if (!seen.add(cell.strip())) {
                throw refused(cell, "headings that differ", "this heading twice");
            }
            headings.add(Heading.of(cell, options.vocabulary()));
        }
        for (String named : options.units().keySet()) {
            find(headings, named);
        }
        return headings;
    }

    private static boolean looksLikeNumber(String cell) {
        String text = cell.strip();
        return text.equalsIgnoreCase("nan") || text.matches("[+−-]?[.,]?\\d[\\d.,]*([eE][+−-]?\\d+)?");
    }

    private int find(List<Heading> headings, String name) {
        for (int i = 0; i < headings.size(); i++) {
            if (headings.get(i).isNamed(name)) {
                return i;
            }
        }
        throw refused("", "a column named " + IntakeException.quoted(name), "the headings " + texts(headings));
    }

    private static String texts(List<Heading> headings) {
        return String.join(
                ", ",
                headings.stream().map(h -> IntakeException.quoted(h.text())).toList());
    }

    private List<Role> roles(List<Heading> headings) {
        List<Role> roles = new ArrayList<>();
        boolean longForm = isLong(headings);
        for (Heading heading : headings) {
            roles.add(longForm ? longRole(heading) : wideRole(heading));
        }
        for (String key : options.keys()) {
            roles.set(find(headings, key), Role.KEY);
        }
        refuseTwoOfOneKind(headings, roles);
        if (!longForm) {
            refuseTooLittle(headings, roles);
        }
        return roles;
    }

    private static boolean isLong(List<Heading> headings) {
        return headings.stream().anyMatch(h -> h.isNamed("quantity"))
                && headings.stream().anyMatch(h -> h.isNamed("modulus"))
                && headings.stream().anyMatch(h -> h.quantity().equals(Optional.of(Quantity.ANGULAR_FREQUENCY)));
    }

    private Role longRole(Heading heading) {
        if (heading.isNamed("quantity")) {
            return Role.KIND;
        } else if (heading.isNamed("modulus")) {
            return Role.MODULI;
        }
        return wideRole(heading);
    }

    private Role wideRole(Heading heading) {
        if (options.keys().isEmpty() && namesSample(heading)) {
            return Role.KEY;
        }
        return heading.quantity().filter(READ::contains).isPresent() ? Role.NUMBERS : Role.PASSED_OVER;
    }

    private void refuseTwoOfOneKind(List<Heading> headings, List<Role> roles) {
        Map<Quantity, Heading> first = new HashMap<>();
        for (int i = 0; i < headings.size(); i++) {
            Heading heading = headings.get(i);
            if (roles.get(i) == Role.NUMBERS) {
                Heading other = first.putIfAbsent(heading.quantity().orElseThrow(), heading);
                if (other != null) {
                    throw refused(
                            heading.text(),
                            "one column of " + heading.quantity().get().label(),
                            "another one, " + IntakeException.quoted(other.text()));
                }
            }
        }
    }

    private void refuseTooLittle(List<Heading> headings, List<Role> roles) {
        List<Quantity> found = new ArrayList<>();
        for (int i = 0; i < headings.size(); i++) {
            if (roles.get(i) == Role.NUMBERS) {
                found.add(headings.get(i).quantity().orElseThrow());
            }
        }
        if (MeasurementKind.all().stream().noneMatch(kind -> kind.enough().test(found))) {
            String known = found.isEmpty()
                    ? "none of these"
                    : "only "
                            + String.join(
                                    ", ", found.stream().map(Quantity::label).toList());
            throw refused(
                    "",
                    needed(),
                    known + " in the headings " + texts(headings)
                            + "; Exports.reading(file).where(name, quantity) tells what another name means");
        }
    }

    private static String needed() {
        return MeasurementKind.all().stream()
                .map(kind -> kind.needs() + " for a " + kind.name())
                .collect(Collectors.joining(", or "));
    }

    /** A unit row is there if a heading lacks its unit and the cell below it is not a number. */
    private boolean hasUnitRow(List<Heading> headings, List<Role> roles) {
        for (int i = 0; i < headings.size(); i++) {
            boolean lacks = (roles.get(i) == Role.NUMBERS || roles.get(i) == Role.MODULI)
                    && withUnit(headings.get(i), i, false).unitText().isEmpty();
            if (lacks
                    && next.isPresent()
                    && i < next.get().getFieldCount()
                    && !looksLikeNumber(next.get().getField(i))
                    && !next.get().getField(i).isBlank()) {
                return true;
            }
        }
        return false;
    }

    private Heading withUnit(Heading heading, int index, boolean unitRow) {
        for (Map.Entry<String, String> given : options.units().entrySet()) {
            if (heading.isNamed(given.getKey())) {
                return heading.in(given.getValue());
            }
        }
        boolean below = unitRow && index < next.orElseThrow().getFieldCount();
        String cell = below ? next.get().getField(index).strip() : "";
        if (cell.isEmpty() || heading.unitText().isPresent()) {
            return heading;
        }
        return heading.in(cell.replaceAll("^\\[(.*)\\]$|^\\((.*)\\)$", "$1$2"));
    }

    private LabUnit unit(Heading heading, boolean below) {
        Heading measured = heading.quantity().isPresent() ? heading : heading.measuring(Quantity.STORAGE_MODULUS);
        String label = measured.quantity().orElseThrow().label();
        long line = below ? next.orElseThrow().getStartingLineNumber() : header.getStartingLineNumber();
        if (heading.unitText().isEmpty()) {
            throw refused(
                    heading.text(),
                    "a unit of " + label + " in the heading, as in '" + heading.name() + " ["
                            + LabUnit.usualFor(measured.quantity().get()).get(0)
                            + "]', in a row below the header, or in code with Exports.reading(file).unit(\""
                            + heading.name()
                            + "\", …)",
                    "none");
        }
        try {
            return measured.unit();
        } catch (UnitException e) {
            String text = heading.unitText().get();
            throw new IntakeException(
                            file,
                            line,
                            heading.text(),
                            "a unit of " + label,
                            IntakeException.quoted(text) + " (" + e.getMessage() + ")")
                    .because(e);
        }
    }

    private IntakeException refused(String column, String expected, String found) {
        return new IntakeException(file, header.getStartingLineNumber(), column, expected, found);
    }
}
