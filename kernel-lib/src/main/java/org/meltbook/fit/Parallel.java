package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.function.Supplier;
import org.meltbook.base.InterruptedComputation;
import org.meltbook.base.Progress;

/**
 * Does independent pieces of work on several threads, the caller's among them, which alone shows progress and hears an
 * interrupt. Which thread does which piece is left to chance, so a piece must depend on its number alone.
 */
final class Parallel {
    private final int count;
    private final Progress progress;
    private final String words;
    private final AtomicInteger next = new AtomicInteger();
    private volatile boolean stopped;
    private volatile RuntimeException failure;

    private Parallel(int count, Progress progress, String words) {
        this.count = count;
        this.progress = progress;
        this.words = words;
    }

    /** One piece of work. */
    @FunctionalInterface
    interface Work {
        /**
         * Does the piece of that number.
         *
         * @param pause to be asked often: throws once the work should stop
         */
        void piece(int number, Progress pause);
    }

    /**
     * Does the pieces 0 to count − 1.
     *
     * @param maker gives each thread its own worker
     * @throws InterruptedComputation if the caller's thread is interrupted; no thread is left working
     */
    static void each(int count, int threads, Supplier<Work> maker, Progress progress, String words) {
        new Parallel(count, progress, words).run(threads, maker);
    }

    private void run(int threads, Supplier<Work> maker) {
        List<Thread> others = new ArrayList<>();
        for (int k = 1; k < Math.min(threads, count); k++) {
            Thread other = new Thread(() -> help(maker), words + " " + (k + 1));
            other.setDaemon(true);
            other.start();
            others.add(other);
        }
        try {
            Work work = maker.get();
            for (int k = next.getAndIncrement(); k < count; k = next.getAndIncrement()) {
                progress.at(k, count, words);
                work.piece(k, Progress.QUIET);
            }
            join(others);
        } finally {
            stopped = true;
            joinQuietly(others);
        }
        if (failure != null) {
            throw failure;
        }
    }

    private void help(Supplier<Work> maker) {
        Progress pause = (done, total, what) -> {
            if (stopped) {
                throw new InterruptedComputation(what);
            }
        };
        try {
            Work work = maker.get();
            for (int k = next.getAndIncrement(); k < count && !stopped; k = next.getAndIncrement()) {
                work.piece(k, pause);
            }
        } catch (InterruptedComputation stop) {
            stopped = true;
        } catch (RuntimeException | Error wrong) {
            failure = wrong instanceof RuntimeException known ? known : new IllegalStateException(words, wrong);
            next.set(count);
        }
    }

    private void join(List<Thread> others) {
        for (Thread other : others) {
            try {
                other.join();
            } catch (InterruptedException interrupt) {
                Thread.currentThread().interrupt();
                throw new InterruptedComputation(words);
            }
        }
    }

    /** Waits for the threads to see that they should stop, an interrupt kept for later. */
    private static void joinQuietly(List<Thread> others) {
        boolean interrupted = Thread.interrupted();
        for (Thread other : others) {
            while (other.isAlive()) {
                try {
                    other.join();
                } catch (InterruptedException again) {
                    interrupted = true;
                }
            }
        }
        if (interrupted) {
            Thread.currentThread().interrupt();
        }
    }
}
