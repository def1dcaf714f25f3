package org.meltbook.notebook;

import java.nio.file.Path;
import java.time.Duration;

/**
 * What to do with notebooks that are run.
 *
 * @param into    folder for the executed notebooks, their pages and the index
 * @param stored  what to do about the results that are stored in the notebook
 * @param limit   longest time one cell may take
 */
public record Plan(Path into, Stored stored, Duration limit) {
    /** What to do about the results that are stored in a notebook. */
    public enum Stored {
        /** Nothing. */
        LEAVE,
        /** Hold the fresh ones against them. */
        CHECK,
        /** Put the fresh ones in their place. */
        REPLACE
    }
}
