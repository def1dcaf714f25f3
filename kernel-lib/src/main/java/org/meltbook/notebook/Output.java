package org.meltbook.notebook;

import java.util.List;
import java.util.Optional;
import org.meltbook.kernel.MimeBundle;

/** One thing a cell has put out, as notebook files know it. */
public sealed interface Output {
    /**
     * Printed text.
     *
     * @param name {@code stdout} or {@code stderr}
     */
    record Stream(String name, String text) implements Output {}

    /**
     * A value.
     *
     * @param bundle the value in every form in which it can be shown
     * @param count  the number of the cell whose result it is; empty if it was shown on the way
     */
    record Value(MimeBundle bundle, Optional<Integer> count) implements Output {}

    /**
     * Why the cell did not reach its end.
     *
     * @param kind   short name of the failure
     * @param lines  the report, line by line
     */
    record Failure(String kind, String message, List<String> lines) implements Output {
        /** Copies the lines. */
        public Failure {
            lines = List.copyOf(lines);
        }
    }
}
