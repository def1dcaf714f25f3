package org.meltbook.notebook;

import java.time.Duration;
import java.util.List;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.TimeUnit;
import java.util.concurrent.TimeoutException;
import org.meltbook.kernel.Evaluator;
import org.meltbook.kernel.Outcome;
import org.meltbook.kernel.Outlet;

/** An evaluator with a clock beside it: a cell that takes too long is interrupted, and left behind if it goes on. */
final class Session implements AutoCloseable {
    private final Evaluator evaluator;
    private final Duration grace;
    private final ExecutorService thread;

    /**
     * A session.
     *
     * @param grace how long a cell that was interrupted has to react before it is left behind
     */
    Session(Evaluator evaluator, Duration grace) {
        this.evaluator = evaluator;
        this.grace = grace;
        this.thread = Executors.newSingleThreadExecutor(work -> {
            Thread cells = new Thread(work, "cells");
            cells.setDaemon(true);
            return cells;
        });
    }

    Outcome run(String cell, Outlet outlet, Duration limit) {
        Future<Outcome> running = thread.submit(() -> evaluator.run(cell, outlet));
        try {
            return running.get(limit.toMillis(), TimeUnit.MILLISECONDS);
        } catch (TimeoutException e) {
            evaluator.interrupt();
            return tooLong(running, limit);
        } catch (InterruptedException e) {
            evaluator.interrupt();
            Thread.currentThread().interrupt();
            return failed("Interrupted", "the run was interrupted", 0);
        } catch (ExecutionException e) {
            throw new IllegalStateException("the evaluator broke on a cell", e.getCause());
        }
    }

    void interrupt() {
        evaluator.interrupt();
    }

    private Outcome tooLong(Future<Outcome> running, Duration limit) {
        String message = "took longer than " + limit.toMillis() / 1000.0 + " s and was stopped";
        try {
            Outcome outcome = running.get(grace.toMillis(), TimeUnit.MILLISECONDS);
            int line = outcome instanceof Outcome.Failed stopped ? stopped.line() : 0;
            return failed("TimeLimit", message, line);
        } catch (TimeoutException e) {
            return failed("TimeLimit", message + "; it did not react and was left behind", 0);
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            return failed("Interrupted", "the run was interrupted", 0);
        } catch (ExecutionException e) {
            throw new IllegalStateException("the evaluator broke on a cell", e.getCause());
        }
    }

    private static Outcome failed(String kind, String message, int line) {
        return new Outcome.Failed(Outcome.Reason.INTERRUPTED, kind, message, line, List.of(kind + ": " + message));
    }

    /** Ends the session, also under a cell that was left behind: streams and exit of the process become free again. */
    @Override
    public void close() {
        thread.shutdown();
        evaluator.close();
    }
}
