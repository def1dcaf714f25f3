package org.meltbook.kernel;

/** What the code of a cell may call: it shows values on the way, before the cell ends. */
public final class Cell {
    private Cell() {}

    /** Shows {@code value} as if it were a result; outside a session its text goes to standard output. */
    public static void display(Object value) {
        throw new UnsupportedOperationException("not yet");
    }
}
