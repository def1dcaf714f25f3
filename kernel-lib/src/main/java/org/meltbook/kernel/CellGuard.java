package org.meltbook.kernel;

import java.util.Set;
import java.util.concurrent.ConcurrentHashMap;

/**
 * What the class files of cells call after rewriting: a look at the interrupt, and a refusal in the place of an exit.
 * Public only because those classes live in another package; cell code has no reason to name it.
 */
public final class CellGuard {
    private static final Set<Thread> STOPPED = ConcurrentHashMap.newKeySet();
    private static volatile boolean anyStopped;

    private CellGuard() {}

    /**
     * Ends the cell if it was interrupted; otherwise costs one read.
     *
     * @throws CellStopped if the current thread runs a cell that was interrupted
     */
    public static void check() {
        if (anyStopped && STOPPED.contains(Thread.currentThread())) {
            throw new CellStopped();
        }
    }

    /** Stands for {@code System.exit}. */
    public static void exit(int status) {
        throw new ExitRefused();
    }

    /** Stands for {@code Runtime.exit} and {@code Runtime.halt}. */
    public static void exit(Runtime runtime, int status) {
        throw new ExitRefused();
    }

    static synchronized void stop(Thread cellThread) {
        STOPPED.add(cellThread);
        anyStopped = true;
    }

    static synchronized void release(Thread cellThread) {
        STOPPED.remove(cellThread);
        anyStopped = !STOPPED.isEmpty();
    }
}
