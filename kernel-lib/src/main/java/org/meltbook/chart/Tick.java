package org.meltbook.chart;

/**
 * A place on an axis that is marked.
 *
 * @param value where
 * @param label its number as text, blank for a minor tick
 */
record Tick(double value, String label) {
    /** Whether it has a number beside it. */
    boolean labelled() {
        return !label.isEmpty();
    }
}
