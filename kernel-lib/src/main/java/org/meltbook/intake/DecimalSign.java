package org.meltbook.intake;

/**
 * How the numbers of a file are written.
 *
 * @param sign    what stands before the decimals: a point or a comma
 * @param grouped whether the other of the two may set off groups of three digits
 */
record DecimalSign(char sign, boolean grouped) {
    /** The character that may set off groups of three digits. */
    char group() {
        return sign == '.' ? ',' : '.';
    }

    @Override
    public String toString() {
        return (sign == '.' ? "point" : "comma") + (grouped ? ", groups of three set off by " + group() : "");
    }
}
