package org.meltbook.scenario;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;
import java.util.List;

/**
 * One column of an export.
 *
 * @param label  name in words
 * @param symbol short name
 * @param unit   unit as written above the numbers
 * @param values the numbers, in that unit
 */
record Column(String label, String symbol, String unit, List<Double> values) {
    private static final MathContext DIGITS = new MathContext(4, RoundingMode.HALF_EVEN);

    /** Copies the values. */
    Column {
        values = List.copyOf(values);
    }

    /** The same column in kPa, if it is in Pa; else itself. */
    Column inKilopascal() {
        return unit.equals("Pa")
                ? new Column(
                        label,
                        symbol,
                        "kPa",
                        values.stream().map(value -> value / 1000).toList())
                : this;
    }

    /** The same numbers under kPa, if they are in Pa: a mistake of whoever made the export. */
    Column mislabelledKilopascal() {
        return unit.equals("Pa") ? new Column(label, symbol, "kPa", values) : this;
    }

    /** The number in {@code row} with four significant digits and a decimal point, never with an exponent. */
    String text(int row) {
        double value = values.get(row);
        if (value == 0) {
            return "0";
        }
        BigDecimal rounded = new BigDecimal(value).round(DIGITS);
        int digitsBeforePoint = rounded.precision() - rounded.scale();
        return rounded.setScale(Math.max(0, DIGITS.getPrecision() - digitsBeforePoint), RoundingMode.HALF_EVEN)
                .toPlainString();
    }
}
