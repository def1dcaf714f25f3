package org.meltbook.intake;

import java.nio.file.Path;

/** Where files of a laboratory come in: {@code Exports.read("data/sweep.csv").frequencySweep()}. */
public final class Exports {
    private Exports() {}

    /**
     * The measurements of a delimited text file, with the log of how they were read.
     *
     * @throws IntakeException if the file, or any cell of it, cannot be read
     */
    public static Intake read(Path path) {
        return reading(path).read();
    }

    /** The measurements of the file with that path. */
    public static Intake read(String path) {
        return read(Path.of(path));
    }

    /** A file about to be read, for those who decide how: {@code Exports.reading(path).decimalComma().read()}. */
    public static Reading reading(Path path) {
        return new Reading(path, Options.NONE);
    }

    /** A file about to be read, for those who decide how. */
    public static Reading reading(String path) {
        return reading(Path.of(path));
    }
}
