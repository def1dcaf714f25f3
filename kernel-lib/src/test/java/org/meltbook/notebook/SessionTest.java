package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.time.Duration;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.CountDownLatch;
import org.junit.jupiter.api.Test;
import org.meltbook.kernel.Evaluator;
import org.meltbook.kernel.MimeBundle;
import org.meltbook.kernel.Outcome;
import org.meltbook.kernel.Outlet;

class SessionTest {
    /** While an evaluator is open the process may not end, and its streams belong to the cells. */
    @Test
    void closes_the_evaluator_under_a_cell_that_was_left_behind() {
        Deaf deaf = new Deaf();
        try (Session session = new Session(deaf, Duration.ofMillis(20))) {
            Outcome outcome = session.run("anything", new Recorder(), Duration.ofMillis(20));
            Outcome.Failed failed = assertInstanceOf(Outcome.Failed.class, outcome);
            assertEquals("TimeLimit", failed.kind());
            assertTrue(failed.message().endsWith("it did not react and was left behind"), failed.message());
        }
        assertTrue(deaf.closed);
        deaf.end.countDown();
    }

    /** Runs one cell until the test ends, whatever is asked of it. */
    private static final class Deaf implements Evaluator {
        private final CountDownLatch end = new CountDownLatch(1);
        private boolean closed;

        @Override
        public Outcome run(String cell, Outlet outlet) {
            try {
                end.await();
            } catch (InterruptedException e) {
                Thread.currentThread().interrupt();
            }
            return new Outcome.Done(Optional.empty());
        }

        @Override
        public void interrupt() {}

        @Override
        public Completion complete(String cell, int cursor) {
            return new Completion(List.of(), cursor, cursor);
        }

        @Override
        public Optional<MimeBundle> inspect(String cell, int cursor) {
            return Optional.empty();
        }

        @Override
        public Completeness completeness(String cell) {
            return Completeness.COMPLETE;
        }

        @Override
        public void close() {
            closed = true;
        }
    }
}
