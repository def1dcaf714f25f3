package org.meltbook.intake;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.OptionalDouble;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.meltbook.measure.Vocabulary;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;
import org.meltbook.units.UnitException;

/** The comment lines of a file: {@code # temperature: 180 °C}, {@code # sample: …}, and whatever else is said there. */
final class Remarks {
    private static final Pattern PAIR = Pattern.compile("\\s*([^:]{1,60}?)\\s*:\\s+(.*?)\\s*");
    private static final Pattern NUMBER_AND_UNIT = Pattern.compile("([+−-]?\\d+(?:[.,]\\d+)?)\\s*(.*)");

    private final Map<String, String> entries = new LinkedHashMap<>();

    /** Takes one comment line, without its mark, into account. */
    void add(String comment) {
        Matcher pair = PAIR.matcher(comment);
        if (pair.matches()) {
            put(pair.group(1), pair.group(2));
        } else if (!comment.isBlank()) {
            put("remark", comment.strip());
        }
    }

    private void put(String key, String value) {
        entries.merge(key, value, (first, second) -> first + "; " + second);
    }

    Map<String, String> entries() {
        return new LinkedHashMap<>(entries);
    }

    /** What the file calls its sample; empty if it does not say. */
    String sample() {
        return entries.entrySet().stream()
                .filter(entry -> entry.getKey().toLowerCase(Locale.ROOT).equals("sample"))
                .map(Map.Entry::getValue)
                .findFirst()
                .orElse("");
    }

    /**
     * Temperature in K, if the file gives one with its unit.
     *
     * @param warnings takes a line if there is a temperature that cannot be used
     */
    OptionalDouble temperature(Vocabulary vocabulary, List<String> warnings) {
        for (Map.Entry<String, String> entry : entries.entrySet()) {
            if (vocabulary
                    .quantity(entry.getKey())
                    .filter(Quantity.TEMPERATURE::equals)
                    .isPresent()) {
                return kelvin(entry.getValue(), warnings);
            }
        }
        return OptionalDouble.empty();
    }

    private static OptionalDouble kelvin(String text, List<String> warnings) {
        Matcher parts = NUMBER_AND_UNIT.matcher(text);
        try {
            if (parts.matches()) {
                double value =
                        Double.parseDouble(parts.group(1).replace('−', '-').replace(',', '.'));
                double kelvin = LabUnit.parse(parts.group(2)).toSi(Quantity.TEMPERATURE, value);
                if (kelvin > 0) {
                    return OptionalDouble.of(kelvin);
                }
            }
            warnings.add("temperature " + IntakeException.quoted(text)
                    + " is no temperature above absolute zero: kept as a remark");
        } catch (UnitException e) {
            warnings.add("temperature " + IntakeException.quoted(text) + " is not used: " + e.getMessage());
        }
        return OptionalDouble.empty();
    }
}
