package org.meltbook.spectrum;

import java.util.List;
import java.util.function.ToDoubleFunction;
import org.meltbook.base.Progress;

/**
 * A fitted spectrum and its refits to residuals drawn again.
 *
 * @param spectrum what was fitted
 * @param again    {@value #REPLICATES} refits, which show what the scatter of the points leaves open
 */
record Refitted(RelaxationSpectrum spectrum, List<RelaxationSpectrum> again) {
    private static final int REPLICATES = 200;
    private static final long SEED = 20260101;

    /** The fit with its refits; another {@code stream} of random numbers for each fit of one sweep. */
    static Refitted of(ModulusFit fit, int stream, Progress progress) {
        return new Refitted(fit.spectrum(), fit.replicates(REPLICATES, SEED + stream, progress));
    }

    /** The 95 % interval of a number read from the spectrum. */
    Interval interval(ToDoubleFunction<RelaxationSpectrum> number) {
        return Interval.about(number.applyAsDouble(spectrum), again.stream().mapToDouble(number));
    }

    /** Whether the intervals of a number meet that two fits give for it. */
    boolean agrees(Refitted other, ToDoubleFunction<RelaxationSpectrum> number) {
        return interval(number).meets(other.interval(number));
    }
}
