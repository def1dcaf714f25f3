package org.meltbook.table;

import java.util.Locale;
import org.meltbook.measure.Verdict;
import org.meltbook.units.Quantity;

/** A verdict as the text of a cell, and back. */
final class VerdictText {
    static final String HEADING = "verdict";

    private VerdictText() {}

    static String of(Verdict verdict) {
        return verdict.equals(Verdict.SOUND) ? "" : word(verdict.standing()) + ": " + verdict.reason();
    }

    private static String word(Verdict.Standing standing) {
        return standing.name().toLowerCase(Locale.ROOT);
    }

    /** The heading above the verdicts of one curve of several. */
    static String heading(Quantity quantity) {
        return HEADING + " of " + quantity.symbol();
    }

    /** The verdict of a cell; text that is no verdict, such as a missing value, says nothing. */
    static Verdict parse(String text) {
        for (Verdict.Standing standing : Verdict.Standing.values()) {
            String start = word(standing) + ": ";
            if (text.startsWith(start)) {
                return new Verdict(standing, text.substring(start.length()));
            }
        }
        return Verdict.SOUND;
    }
}
