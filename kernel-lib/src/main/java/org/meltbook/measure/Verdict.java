package org.meltbook.measure;

import java.util.Locale;

/**
 * What a row is worth, and why.
 *
 * @param standing sound, doubtful or unusable
 * @param reason   why, with the number behind it; empty for a sound row
 */
public record Verdict(Standing standing, String reason) {
    /** The three things that can be said of a row. */
    public enum Standing {
        /** Nothing speaks against it. */
        SOUND,
        /** Used, but something speaks against it. */
        DOUBTFUL,
        /** Kept and shown, never used in a fit. */
        UNUSABLE;

        /** The standing as it is written in tables: {@code doubtful}. */
        public String word() {
            return name().toLowerCase(Locale.ROOT);
        }
    }

    /** A row against which nothing is known. */
    public static final Verdict SOUND = new Verdict(Standing.SOUND, "");

    /** A row that is used with a doubt. */
    public static Verdict doubtful(String reason) {
        return new Verdict(Standing.DOUBTFUL, reason);
    }

    /** A row that no fit uses. */
    public static Verdict unusable(String reason) {
        return new Verdict(Standing.UNUSABLE, reason);
    }

    /** The verdict as it stands in a table: {@code doubtful: …} with the reason; empty for a sound row. */
    public String text() {
        return equals(SOUND) ? "" : standing.word() + ": " + reason;
    }

    /** Whether a fit may use the row. */
    public boolean usable() {
        return standing != Standing.UNUSABLE;
    }

    /** The worse of two standings, with both reasons: what two checks say of one row. */
    public Verdict and(Verdict other) {
        if (equals(other) || other.equals(SOUND)) {
            return this;
        }
        if (equals(SOUND)) {
            return other;
        }
        Standing worse = standing.compareTo(other.standing) > 0 ? standing : other.standing;
        return new Verdict(worse, reason + "; " + other.reason);
    }
}
