package org.meltbook.notebook;

import org.meltbook.base.MeltbookException;

/** A notebook, or a place for its results, could not be used: the message names the file and what to do. */
public final class NotebookException extends MeltbookException {
    private static final long serialVersionUID = 1L;

    /** An exception with the given message. */
    public NotebookException(String message) {
        super(message);
    }

    /** An exception with the given message and the failure that led to it. */
    public NotebookException(String message, Throwable cause) {
        super(message, cause);
    }
}
