package org.meltbook.intake;

import java.util.Optional;
import java.util.regex.Matcher;
import java.util.regex.Pattern;

/**
 * What all cells of a file together say about its decimal sign. {@code 12,5} proves a decimal comma; {@code 1,234} may
 * be 1.234 or 1234, and if no other cell settles it the file is refused rather than guessed at.
 */
final class DecimalEvidence {
    private static final Pattern ONE_SIGN = Pattern.compile("[+−-]?(\\d*)[.,](\\d*)([eE].*)?");
    private static final Pattern GROUPS = Pattern.compile("[+−-]?\\d{1,3}([.,])\\d{3}(\\1\\d{3})+");
    private static final Pattern BOTH = Pattern.compile("[+−-]?\\d{1,3}(?:([.,])\\d{3})+(?!\\1)([.,])\\d*(?:[eE].*)?");

    /** A cell that settles something, and where it stands. */
    private record Witness(String cell, long line, String column) {
        @Override
        public String toString() {
            return "'" + cell + "' in line " + line;
        }
    }

    private final String file;
    private Optional<Witness> comma = Optional.empty();
    private Optional<Witness> point = Optional.empty();
    private Optional<Witness> commaOrGroup = Optional.empty();
    private Optional<Witness> pointOrGroup = Optional.empty();
    private boolean grouped;

    DecimalEvidence(String file) {
        this.file = file;
    }

    /** Takes one cell into account. Cells without comma and point, or that are no number, say nothing. */
    void see(String cell, long line, String column) {
        boolean hasComma = cell.indexOf(',') >= 0;
        boolean hasPoint = cell.indexOf('.') >= 0;
        if (!hasComma && (!hasPoint || point.isPresent()) || !hasPoint && comma.isPresent()) {
            return;
        }
        String number = cell.strip();
        Matcher both = BOTH.matcher(number);
        Matcher groups = GROUPS.matcher(number);
        Matcher one = ONE_SIGN.matcher(number);
        Witness witness = new Witness(number, line, column);
        if (hasComma && hasPoint && both.matches()) {
            grouped = true;
            prove(both.group(2).charAt(0), witness);
        } else if (groups.matches()) {
            grouped = true;
            prove(groups.group(1).equals(",") ? '.' : ',', witness);
        } else if (one.matches()) {
            seeOneSign(one, hasComma ? ',' : '.', witness);
        }
    }

    private void seeOneSign(Matcher one, char sign, Witness witness) {
        String before = one.group(1);
        boolean looksGrouped = one.group(2).length() == 3
                && !before.isEmpty()
                && before.length() <= 3
                && before.charAt(0) != '0'
                && one.group(3) == null;
        if (!looksGrouped) {
            prove(sign, witness);
        } else if (sign == ',' && commaOrGroup.isEmpty()) {
            commaOrGroup = Optional.of(witness);
        } else if (sign == '.' && pointOrGroup.isEmpty()) {
            pointOrGroup = Optional.of(witness);
        }
    }

    private void prove(char sign, Witness witness) {
        if (sign == ',' && comma.isEmpty()) {
            comma = Optional.of(witness);
        } else if (sign == '.' && point.isEmpty()) {
            point = Optional.of(witness);
        }
    }

    /**
     * The decimal sign that all cells agree on.
     *
     * @throws IntakeException if cells contradict each other, or leave two readings
     */
    DecimalSign decide() {
        if (comma.isPresent() && point.isPresent()) {
            Witness later = comma.get().line() >= point.get().line() ? comma.get() : point.get();
            throw refused(
                    later,
                    "one decimal sign in the whole file",
                    comma.get() + " with a comma and " + point.get() + " with a point");
        }
        Optional<Witness> twoReadings = comma.isPresent() ? pointOrGroup : commaOrGroup;
        if (twoReadings.isPresent() && !grouped) {
            throw twoReadings(twoReadings.get());
        }
        return new DecimalSign(comma.isPresent() ? ',' : '.', grouped);
    }

    private IntakeException twoReadings(Witness witness) {
        String cell = witness.cell();
        String small = cell.replace(',', '.');
        String large = cell.replaceAll("[.,]", "");
        return refused(
                witness,
                "a decimal sign that is clear",
                "'" + cell + "', which may mean " + small + " or " + large
                        + ": say which with Exports.reading(file).decimalComma() or .decimalPoint()");
    }

    private IntakeException refused(Witness at, String expected, String found) {
        return new IntakeException(file, at.line(), at.column(), expected, found);
    }
}
