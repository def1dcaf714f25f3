package org.meltbook.kernel;

import java.util.Optional;

/** Cells of Java run by JShell inside this process, so that values keep their types. */
public final class JShellEvaluator implements Evaluator {
    private JShellEvaluator(Settings settings) {}

    /** A new session; the working folder is that of this process. */
    public static JShellEvaluator open(Settings settings) {
        return new JShellEvaluator(settings);
    }

    @Override
    public Outcome run(String cell, Outlet outlet) {
        throw new UnsupportedOperationException("not yet");
    }

    @Override
    public void interrupt() {
        throw new UnsupportedOperationException("not yet");
    }

    @Override
    public Completion complete(String cell, int cursor) {
        throw new UnsupportedOperationException("not yet");
    }

    @Override
    public Optional<MimeBundle> inspect(String cell, int cursor) {
        throw new UnsupportedOperationException("not yet");
    }

    @Override
    public Completeness completeness(String cell) {
        throw new UnsupportedOperationException("not yet");
    }

    @Override
    public void close() {}
}
