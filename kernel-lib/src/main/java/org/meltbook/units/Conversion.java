package org.meltbook.units;

import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;

/**
 * How numbers of one unit become SI: {@code si = value · multiplier / divisor + offset}. One of multiplier and divisor
 * is 1, so that 12 mPa·s becomes 12/1000 Pa·s, rounded once.
 *
 * @param multiplier above zero, no unit
 * @param divisor    above zero, no unit
 * @param offset     in SI; zero but for temperatures
 */
public record Conversion(double multiplier, double divisor, double offset) {
    static Conversion of(double scale, double offset) {
        double inverse = Math.rint(1 / scale);
        boolean whole = scale < 1 && 1 / inverse == scale;
        return whole ? new Conversion(1, inverse, offset) : new Conversion(scale, 1, offset);
    }

    /** The number in SI. */
    public double toSi(double value) {
        return value * multiplier / divisor + offset;
    }

    /** The numbers in SI. */
    public Doubles toSi(Doubles values) {
        return isIdentity() ? values : values.map(this::toSi);
    }

    /** The number in the unit, from one in SI. */
    public double fromSi(double value) {
        return (value - offset) * divisor / multiplier;
    }

    /** Whether the numbers stay what they are. */
    public boolean isIdentity() {
        return multiplier == 1 && divisor == 1 && offset == 0;
    }

    /** What is done to a number, in short: {@code × 1000}, {@code ÷ 1000}, {@code + 273.15}, {@code as it is}. */
    @Override
    public String toString() {
        String times = multiplier != 1 ? "× " + plain(multiplier) : divisor != 1 ? "÷ " + plain(divisor) : "";
        String plus = offset == 0 ? "" : "+ " + plain(offset);
        String both = (times + " " + plus).strip();
        return both.isEmpty() ? "as it is" : both;
    }

    private static String plain(double factor) {
        String text = NumberText.of(factor, 6);
        return text.contains("×") || !text.contains(".") ? text : text.replaceAll("\\.?0+$", "");
    }
}
