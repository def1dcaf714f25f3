package org.meltbook.kernel;

/**
 * Where a running cell puts what it has to show, and where it asks. Implementations may be called from any thread.
 */
public interface Outlet {
    /** Text printed on standard output, in pieces as they come. */
    void out(String text);

    /** Text printed on standard error, in pieces as they come. */
    void err(String text);

    /** A value shown on the way, before the cell ends. */
    void display(MimeBundle bundle);

    /** Replaces what was shown under the display id of {@code bundle}. */
    void update(MimeBundle bundle);

    /** Clears what the cell has shown; if {@code wait}, only when something new comes. */
    void clear(boolean wait);

    /**
     * Asks the person at the keyboard.
     *
     * @throws java.io.UncheckedIOException if nobody can be asked here
     */
    String ask(String prompt, boolean secret);
}
