package org.meltbook.kernel;

import java.util.List;
import java.util.Optional;

/** How a cell ended. */
public sealed interface Outcome permits Outcome.Done, Outcome.Failed {
    /**
     * The cell ran to its end.
     *
     * @param result what its last expression gave, if it gave anything
     */
    record Done(Optional<MimeBundle> result) implements Outcome {}

    /**
     * The cell did not reach its end.
     *
     * @param reason  what stopped it
     * @param kind    short name: the exception's simple name, or {@code CompileError}
     * @param message what went wrong, in one or a few lines
     * @param line    line of the cell, counted from 1; 0 if it cannot be told
     * @param report  lines to print: the cell's own line with a caret, the message, frames of the user's code only
     */
    record Failed(Reason reason, String kind, String message, int line, List<String> report) implements Outcome {
        /** Copies the lines. */
        public Failed {
            report = List.copyOf(report);
        }
    }

    /** What stopped a cell. */
    enum Reason {
        /** It does not compile. */
        COMPILE,
        /** It threw. */
        THROWN,
        /** It was interrupted. */
        INTERRUPTED
    }
}
