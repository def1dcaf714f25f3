package org.meltbook.notebook;

import java.nio.file.Path;
import java.util.List;

/**
 * How the run of one notebook ended.
 *
 * @param notebook where it is
 * @param problems what went wrong or differs, one entry each, naming notebook, cell and cause; empty if all is well
 * @param status   the same in a few words, as the index shows it
 */
public record RunResult(Path notebook, List<String> problems, String status) {
    /** The status of a run that did not end by itself. */
    static final String INTERRUPTED = "interrupted";

    /** Copies the list. */
    public RunResult {
        problems = List.copyOf(problems);
    }

    /** Whether the run was interrupted, so that nothing was written. */
    public boolean isInterrupted() {
        return status.equals(INTERRUPTED);
    }

    /** Whether all is well. */
    public boolean isGood() {
        return problems.isEmpty();
    }
}
