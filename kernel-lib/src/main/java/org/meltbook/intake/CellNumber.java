package org.meltbook.intake;

/**
 * Reads the number of one cell after another. A reader of this kind is not shared between threads.
 *
 * <p>A number is an optional sign, digits with at most one decimal sign, and an optional power of ten ({@code 1.5e-3}).
 * {@code NaN} stands for a missing value. Everything else is no number: nothing is guessed.
 */
final class CellNumber {
    /** Powers of ten that a double holds exactly, so that one operation on a short mantissa rounds once. */
    private static final double[] POWERS = {
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19,
        1e20, 1e21, 1e22
    };

    private static final int SHORT = 15;
    private static final int LARGEST_EXPONENT = 100_000;

    private final DecimalSign decimal;
    private String cell;
    private int at;
    private long mantissa;
    private int kept;
    private int leading;
    private int decimals;
    private int closingZeros;
    private double value;

    CellNumber(DecimalSign decimal) {
        this.decimal = decimal;
    }

    /** The number last read. */
    double value() {
        return value;
    }

    /** With how many digits it was surely measured: closing zeros of a whole number may only fill it up. */
    int digits() {
        return kept - leading - (decimals == 0 ? closingZeros : 0);
    }

    /** Whether the cell is a finite number or NaN; then {@link #value} and {@link #digits} are those of the cell. */
    boolean read(String text) {
        cell = text.strip();
        at = 0;
        mantissa = 0;
        kept = 0;
        leading = 0;
        decimals = 0;
        closingZeros = 0;
        if (cell.equalsIgnoreCase("nan")) {
            value = Double.NaN;
            return true;
        }
        boolean negative = sign();
        if (!mantissa()) {
            return false;
        }
        int mantissaEnd = at;
        int exponent = exponent();
        if (at != cell.length() || Math.abs(exponent) > LARGEST_EXPONENT) {
            return false;
        }
        double size = size(mantissaEnd, exponent);
        value = negative ? -size : size;
        return Double.isFinite(size);
    }

    private boolean sign() {
        if (at < cell.length() && "+-−".indexOf(cell.charAt(at)) >= 0) {
            return cell.charAt(at++) != '+';
        }
        return false;
    }

    /** Digits, one decimal sign, and groups of three before it if the file has them. */
    private boolean mantissa() {
        boolean afterSign = false;
        int sinceGroup = -1;
        for (; at < cell.length(); at++) {
            char c = cell.charAt(at);
            if (c >= '0' && c <= '9') {
                digit(c - '0', afterSign);
                sinceGroup += sinceGroup < 0 ? 0 : 1;
            } else if (c == decimal.sign() && !afterSign) {
                if (sinceGroup >= 0 && sinceGroup != 3) {
                    return false;
                }
                sinceGroup = -1;
                afterSign = true;
            } else if (c == decimal.group() && decimal.grouped() && !afterSign) {
                boolean firstGroup = sinceGroup < 0 && kept >= 1 && kept <= 3;
                if (!firstGroup && sinceGroup != 3) {
                    return false;
                }
                sinceGroup = 0;
            } else {
                break;
            }
        }
        return kept > 0 && (sinceGroup < 0 || sinceGroup == 3);
    }

    private void digit(int digit, boolean afterSign) {
        if (kept == leading && digit == 0) {
            leading++;
        }
        if (kept - leading < SHORT) {
            mantissa = mantissa * 10 + digit;
        }
        kept++;
        closingZeros = digit == 0 ? closingZeros + 1 : 0;
        decimals += afterSign ? 1 : 0;
    }

    private int exponent() {
        if (at >= cell.length() || (cell.charAt(at) != 'e' && cell.charAt(at) != 'E')) {
            return 0;
        }
        int start = at++;
        boolean negative = sign();
        int firstDigit = at;
        int exponent = 0;
        while (at < cell.length() && Character.digit(cell.charAt(at), 10) >= 0 && cell.charAt(at) <= '9') {
            exponent = Math.min(exponent * 10 + cell.charAt(at++) - '0', LARGEST_EXPONENT + 1);
        }
        if (at == firstDigit) {
            at = start;
        }
        return negative ? -exponent : exponent;
    }

    /** The number without its sign, correctly rounded. */
    private double size(int mantissaEnd, int exponent) {
        int power = exponent - decimals;
        if (kept - leading <= SHORT && Math.abs(power) < POWERS.length) {
            return power < 0 ? mantissa / POWERS[-power] : mantissa * POWERS[power];
        }
        StringBuilder plain = new StringBuilder();
        for (char c : cell.substring(0, mantissaEnd).toCharArray()) {
            if (c >= '0' && c <= '9') {
                plain.append(c);
            }
        }
        return Double.parseDouble(plain.append('e').append(power).toString());
    }
}
