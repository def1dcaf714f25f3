package org.meltbook.table;

import java.util.Locale;
import org.meltbook.measure.Verdict;

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

    /** The verdict of a cell; of two that stand in one, the worse. */
    static Verdict parse(String text) {
        Verdict verdict = Verdict.SOUND;
        for (Verdict.Standing standing : Verdict.Standing.values()) {
            if (text.startsWith(word(standing) + ": ") || text.contains("; " + word(standing) + ": ")) {
                verdict = new Verdict(standing, text.replaceFirst("^" + word(standing) + ": ", ""));
            }
        }
        return verdict;
    }
}
