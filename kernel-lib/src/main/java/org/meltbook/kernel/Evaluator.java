package org.meltbook.kernel;

import java.util.List;
import java.util.Optional;

/**
 * Runs cells of Java one after another in one session. Jupyter and the headless runner use the same one, so a notebook
 * means the same in both.
 *
 * <p>Contract: (1) {@link #run} blocks and is called by one thread at a time; (2) it never throws for what a cell does;
 * (3) {@link #interrupt} may be called from any thread, ends the running cell with {@link Outcome.Reason#INTERRUPTED} and
 * leaves the session usable; (4) {@code System.exit} in a cell is refused and the session lives; (5) offsets are UTF-16
 * indices into the cell's text.
 */
public interface Evaluator extends AutoCloseable {
    /** Runs a cell; what it prints and shows goes to {@code outlet} while it runs. */
    Outcome run(String cell, Outlet outlet);

    /** Stops the running cell, if there is one. */
    void interrupt();

    /** What could stand at {@code cursor}. */
    Completion complete(String cell, int cursor);

    /** What is known of the name at {@code cursor}: signature and doc comment; empty if nothing. */
    Optional<MimeBundle> inspect(String cell, int cursor);

    /** Whether the text is a whole cell. */
    Completeness completeness(String cell);

    /** Ends the session. */
    @Override
    void close();

    /**
     * Completions.
     *
     * @param options texts that may replace the region
     * @param start   where the region starts
     * @param end     where it ends
     */
    record Completion(List<String> options, int start, int end) {
        /** Copies the list. */
        public Completion {
            options = List.copyOf(options);
        }
    }

    /** Whether a text can be run. */
    enum Completeness {
        /** It can. */
        COMPLETE,
        /** More must follow. */
        INCOMPLETE,
        /** It cannot become valid by adding more. */
        INVALID
    }
}
