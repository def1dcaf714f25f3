package org.meltbook.base;

/**
 * Where a long computation says how far it is, and where it learns that it should stop.
 *
 * <p>Contract: (1) a computation calls {@link #at} at least every 100 ms of work; (2) it passes its progress on to the
 * computations that it starts; (3) it leaves nothing half-changed when {@code at} throws.
 */
@FunctionalInterface
public interface Progress {
    /** A progress that shows nothing and still stops on interrupt. */
    Progress QUIET = (done, total, work) -> {};

    /**
     * Shows that {@code done} of {@code total} steps of {@code work} are finished.
     *
     * @param done  steps finished, zero or more
     * @param total steps in all, or zero if not known
     * @param work  what is being done, in a few words
     */
    void show(long done, long total, String work);

    /**
     * Shows the step and stops the computation if its thread was interrupted.
     *
     * @throws InterruptedComputation if the current thread is interrupted; the thread's flag stays set
     */
    default void at(long done, long total, String work) {
        if (Thread.currentThread().isInterrupted()) {
            throw new InterruptedComputation(work);
        }
        show(done, total, work);
    }
}
