package org.meltbook.units;

import org.meltbook.base.MeltbookException;

/** A unit that is not known, or that cannot measure what it is written beside. */
public final class UnitException extends MeltbookException {
    private static final long serialVersionUID = 1L;

    /** An exception with the given message: the text found, the quantity, and the units that would do. */
    public UnitException(String message) {
        super(message);
    }
}
