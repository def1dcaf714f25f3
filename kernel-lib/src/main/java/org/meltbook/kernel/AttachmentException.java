package org.meltbook.kernel;

/** The kernel could not be attached to Jupyter, or detached; the message says why and what to do. */
public final class AttachmentException extends RuntimeException {
    private static final long serialVersionUID = 1L;

    /** An exception with the given message. */
    AttachmentException(String message) {
        super(message);
    }

    /** An exception with the given message and the failure that led to it. */
    AttachmentException(String message, Throwable cause) {
        super(message, cause);
    }
}
