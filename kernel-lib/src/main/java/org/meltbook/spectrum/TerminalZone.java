package org.meltbook.spectrum;

import org.meltbook.base.NumberText;
import org.meltbook.measure.Curve;
import org.meltbook.numeric.LogLogLine;

/**
 * Whether a sweep reaches down to where the melt flows like a simple liquid: G″ grows with ω¹ and G′ with ω². Asked of the
 * measured points within half a decade of the lowest frequency of each curve, three points at least: slope of ln G″ of
 * {@value #LOSS_SLOPE} or more and of ln G′ of {@value #STORAGE_SLOPE} or more (common practice, not a standard).
 *
 * @param lossSlope    d ln G″ / d ln ω at the low end
 * @param storageSlope d ln G′ / d ln ω at the low end
 */
record TerminalZone(double lossSlope, double storageSlope) {
    static final double LOSS_SLOPE = 0.9;
    static final double STORAGE_SLOPE = 1.8;

    static TerminalZone of(Curve storage, Curve loss) {
        return new TerminalZone(
                LogLogLine.lowEnd(loss.x().values(), loss.y().values()).slope(),
                LogLogLine.lowEnd(storage.x().values(), storage.y().values()).slope());
    }

    boolean reached() {
        return lossSlope >= LOSS_SLOPE && storageSlope >= STORAGE_SLOPE;
    }

    /** The slopes found and asked for. */
    String words() {
        return "at the lowest frequencies G″ grows with ω to the power " + NumberText.of(lossSlope, 3) + " and G′ to the power "
                + NumberText.of(storageSlope, 3) + " (" + NumberText.of(LOSS_SLOPE, 2) + " and "
                + NumberText.of(STORAGE_SLOPE, 2) + " asked, 1 and 2 in the terminal zone)";
    }
}
