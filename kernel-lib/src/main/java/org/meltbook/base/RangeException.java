package org.meltbook.base;

/** A number that was given, or asked for, lies outside the range in which it means something. */
public final class RangeException extends MeltbookException {
    private static final long serialVersionUID = 1L;

    /** An exception with the given message: name, value and unit found, and the range expected. */
    public RangeException(String message) {
        super(message);
    }
}
