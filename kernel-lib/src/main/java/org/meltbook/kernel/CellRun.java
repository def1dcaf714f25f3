package org.meltbook.kernel;

/**
 * Who runs a cell now, and whether it should stop. The thread is interrupted only while it is in the cell's own code:
 * an interrupted compiler would close the jars it reads from.
 */
final class CellRun {
    private Thread runner;
    private boolean inCellCode;
    private boolean stopAsked;

    synchronized void begin() {
        runner = Thread.currentThread();
        stopAsked = false;
    }

    synchronized void end() {
        CellGuard.release(runner);
        runner = null;
        Thread.interrupted();
    }

    synchronized void stop() {
        if (runner != null) {
            stopAsked = true;
            CellGuard.stop(runner);
            if (inCellCode) {
                runner.interrupt();
            }
        }
    }

    synchronized boolean stopAsked() {
        return stopAsked;
    }

    /**
     * The thread goes from the kernel's code into the cell's.
     *
     * @throws CellStopped if the cell was interrupted before
     */
    synchronized void enterCellCode() {
        if (stopAsked) {
            throw new CellStopped();
        }
        inCellCode = true;
    }

    synchronized void leaveCellCode() {
        inCellCode = false;
        Thread.interrupted();
    }
}
