package org.meltbook.base;

/** A computation that stopped because its thread was interrupted: nothing is wrong with its input. */
public final class InterruptedComputation extends MeltbookException {
    private static final long serialVersionUID = 1L;

    /** An exception that names the work that was stopped. */
    public InterruptedComputation(String work) {
        super("stopped on interrupt: " + work);
    }
}
