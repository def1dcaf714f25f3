package org.meltbook.intake;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.meltbook.measure.Vocabulary;

/**
 * What the caller decided about a file, so that it need not be found out.
 *
 * @param delimiter  what stands between cells
 * @param decimal    how numbers are written
 * @param units      unit text by heading
 * @param vocabulary what headings mean
 * @param keys       headings of the columns that split the file; empty to split by what names a sample
 */
record Options(
        Optional<Delimiter> delimiter,
        Optional<DecimalSign> decimal,
        Map<String, String> units,
        Vocabulary vocabulary,
        List<String> keys) {
    static final Options NONE =
            new Options(Optional.empty(), Optional.empty(), Map.of(), Vocabulary.standard(), List.of());

    Options {
        units = Map.copyOf(units);
        keys = List.copyOf(keys);
    }

    Options splitBy(List<String> headings) {
        return new Options(delimiter, decimal, units, vocabulary, headings);
    }
}
