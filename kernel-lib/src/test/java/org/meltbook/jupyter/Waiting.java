package org.meltbook.jupyter;

import java.time.Duration;
import java.util.function.BooleanSupplier;

/** Waits for something that another process does, and fails by name if it does not come. */
final class Waiting {
    private Waiting() {}

    static void until(String what, Duration limit, BooleanSupplier holds) throws InterruptedException {
        long end = System.nanoTime() + limit.toNanos();
        while (!holds.getAsBoolean()) {
            if (System.nanoTime() > end) {
                throw new AssertionError("within " + limit.toSeconds() + " s it did not come to this: " + what);
            }
            Thread.sleep(100);
        }
    }
}
