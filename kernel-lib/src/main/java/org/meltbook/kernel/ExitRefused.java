package org.meltbook.kernel;

/** Thrown in a cell that asks the whole process to end. */
public final class ExitRefused extends SecurityException {
    static final String MESSAGE =
            "a cell may not end the kernel: the session goes on. To end it, shut the kernel down in the notebook.";

    private static final long serialVersionUID = 1L;

    /** The refusal, saying what to do instead. */
    ExitRefused() {
        super(MESSAGE);
    }
}
