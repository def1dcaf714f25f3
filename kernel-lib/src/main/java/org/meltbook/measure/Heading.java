package org.meltbook.measure;

import java.util.Optional;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;
import org.meltbook.units.UnitException;

/**
 * What stands above a column, as {@code ω [rad/s]} or {@code viscosity (Pa·s)}: a name, and the unit if it is there.
 *
 * @param text     the heading as written
 * @param name     the heading without its unit
 * @param quantity what the column measures, empty if the vocabulary does not know the name
 * @param unitText the unit as written, empty if there is none
 */
public record Heading(String text, String name, Optional<Quantity> quantity, Optional<String> unitText) {
    private static final Pattern BRACKETS = Pattern.compile("(.*?)\\s*\\[([^\\[\\]]*)\\]");
    private static final Pattern PARENTHESES = Pattern.compile("(.*?)\\s*\\(((?:[^()]|\\([^()]*\\))*)\\)");

    /** The heading of a column, split into name and unit; parentheses that belong to a name, as in tan(δ), stay. */
    public static Heading of(String text, Vocabulary vocabulary) {
        String whole = text.strip();
        Matcher brackets = BRACKETS.matcher(whole);
        Matcher parentheses = PARENTHESES.matcher(whole);
        Optional<Quantity> known = vocabulary.quantity(whole);
        if (known.isEmpty() && brackets.matches()) {
            return split(text, brackets, vocabulary);
        }
        if (known.isEmpty() && parentheses.matches()) {
            return split(text, parentheses, vocabulary);
        }
        return new Heading(text, whole, known, Optional.empty());
    }

    private static Heading split(String text, Matcher parts, Vocabulary vocabulary) {
        String name = parts.group(1);
        return new Heading(text, name, vocabulary.quantity(name), Optional.of(parts.group(2)));
    }

    /** The same heading with a unit that stands elsewhere, as in a row below. */
    public Heading in(String unit) {
        return new Heading(text, name, quantity, Optional.of(unit));
    }

    /** The same heading as that of another quantity, as when a cell of each row names it. */
    public Heading measuring(Quantity other) {
        return new Heading(text, name, Optional.of(other), unitText);
    }

    /** Whether the heading has this name, or reads so as a whole. */
    public boolean isNamed(String other) {
        return Vocabulary.same(name, other) || text.strip().equals(other.strip());
    }

    /**
     * The unit of the column, known to measure its quantity.
     *
     * @throws UnitException if there is no unit, or it is not known, or is of the wrong kind, or leaves a choice
     */
    public LabUnit unit() {
        Quantity measured = quantity.orElseThrow(() -> new UnitException("'" + text + "' names no known quantity"));
        LabUnit unit = LabUnit.parse(unitText.orElseThrow(() -> new UnitException("'" + text + "' has no unit")));
        unit.conversion(measured);
        boolean plainFrequency = measured == Quantity.ANGULAR_FREQUENCY && (isNamed("frequency") || isNamed("f"));
        if (plainFrequency && unit.measures(Quantity.SHEAR_RATE)) {
            throw new UnitException("unit '" + unit + "' beside '" + name
                    + "' may mean Hz or rad/s, which differ by 2π:" + " write one of the two");
        }
        return unit;
    }
}
