package org.meltbook.measure;

/**
 * One thing that was done to a measurement.
 *
 * @param step who did it: {@code intake}, {@code screening}, a correction
 * @param text what was done, with numbers and units
 */
public record Note(String step, String text) {
    @Override
    public String toString() {
        return step + ": " + text;
    }
}
