package org.meltbook.kernel;

/** Carries an interrupt through the code of a cell; an Error, so that code which catches exceptions lets it pass. */
final class CellStopped extends Error {
    private static final long serialVersionUID = 1L;

    CellStopped() {
        super("the cell was interrupted");
    }
}
