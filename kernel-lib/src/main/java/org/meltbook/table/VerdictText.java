package org.meltbook.table;

import org.meltbook.measure.Verdict;
import org.meltbook.units.Quantity;

/** Where the verdicts of a table stand, and the verdict that the text of a cell gives. */
final class VerdictText {
    static final String HEADING = "verdict";

    private VerdictText() {}

    /** The heading above the verdicts of one curve of several. */
    static String heading(Quantity quantity) {
        return HEADING + " of " + quantity.symbol();
    }

    /** The verdict of a cell; text that is no verdict, such as a missing value, says nothing. */
    static Verdict parse(String text) {
        for (Verdict.Standing standing : Verdict.Standing.values()) {
            String start = standing.word() + ": ";
            if (text.startsWith(start)) {
                return new Verdict(standing, text.substring(start.length()));
            }
        }
        return Verdict.SOUND;
    }
}
