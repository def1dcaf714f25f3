package org.meltbook.report;

import java.util.Optional;

/** One piece of a page, from top to bottom. */
public sealed interface Block {
    /** Text in markdown. */
    record Prose(String markdown) implements Block {}

    /**
     * Code that was run.
     *
     * @param source the code
     * @param count  which one it was in the order of running, from 1; empty if it was not run
     */
    record Code(String source, Optional<Integer> count) implements Block {}

    /** Text as a program printed it. */
    record Printed(String text, Kind kind) implements Block {}

    /** HTML that a result made of itself; taken as it is, with nothing fetched and no script run. */
    record Rich(String html) implements Block {}

    /**
     * A picture.
     *
     * @param mime    {@code image/png} or another image type
     * @param base64  its bytes
     * @param text    what it shows, for those who cannot see it
     * @param caption the sentence below it; blank for none
     * @param width   how wide to show it in CSS pixels, where there is room; 0 for its own width
     */
    record Picture(String mime, String base64, String text, String caption, int width) implements Block {}

    /** What printed text is. */
    enum Kind {
        /** Standard output. */
        OUT,
        /** Standard error. */
        ERR,
        /** The value of a cell. */
        VALUE,
        /** Why a cell failed. */
        FAILURE
    }
}
