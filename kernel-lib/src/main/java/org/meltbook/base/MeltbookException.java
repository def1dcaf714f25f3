package org.meltbook.base;

/**
 * What Meltbook throws when it cannot do what was asked. The message says what was asked, what was found, where, and
 * what to do; a notebook shows it without the stack.
 */
public abstract class MeltbookException extends RuntimeException {
    private static final long serialVersionUID = 1L;

    /** An exception with the given message. */
    protected MeltbookException(String message) {
        super(message);
    }

    /** An exception with the given message and the failure that led to it. */
    protected MeltbookException(String message, Throwable cause) {
        super(message, cause);
    }
}
