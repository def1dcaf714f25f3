package org.meltbook.spectrum;

import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.numeric.LogLogLine;

/**
 * Whether a sweep reaches down to where the melt flows like a simple liquid: G″ grows with ω¹ and G′ with ω². Asked of
 * the fitted moduli at the measured frequencies within half a decade of the lowest one of each curve, three points at
 * least: all points of the sweep carry these slopes, so that they scatter ten times less than those of the few points
 * themselves (measured). η₀ asks a slope of ln G″ of {@value #LOSS_SLOPE} or more; Jₑ⁰ asks of ln G′
 * {@value #STORAGE_SLOPE} or more too (common practice, not a standard).
 *
 * @param lossSlope    d ln G″ / d ln ω at the low end
 * @param storageSlope d ln G′ / d ln ω at the low end
 */
record TerminalZone(double lossSlope, double storageSlope) {
    static final double LOSS_SLOPE = 0.9;
    static final double STORAGE_SLOPE = 1.8;

    static TerminalZone of(RelaxationSpectrum spectrum, Moduli moduli) {
        Doubles losses = moduli.loss().x().values();
        Doubles storages = moduli.storage().x().values();
        return new TerminalZone(
                LogLogLine.lowEnd(losses, losses.map(spectrum::loss)).slope(),
                LogLogLine.lowEnd(storages, storages.map(spectrum::storage)).slope());
    }

    /** Whether G″ carries η₀. */
    boolean givesViscosity() {
        return lossSlope >= LOSS_SLOPE;
    }

    /** Whether G′ carries Jₑ⁰ too. */
    boolean givesCompliance() {
        return givesViscosity() && storageSlope >= STORAGE_SLOPE;
    }

    /** The verdict for a headline. */
    String verdict() {
        if (givesCompliance()) {
            return "terminal zone reached";
        }
        return givesViscosity() ? "terminal zone reached by G″, NOT by G′" : "terminal zone NOT reached";
    }

    /** The slope found and asked for where η₀ is refused. */
    String againstViscosity() {
        return words("G″", lossSlope, LOSS_SLOPE, "1");
    }

    /** The slope found and asked for where Jₑ⁰ is refused. */
    String againstCompliance() {
        return storageSlope < STORAGE_SLOPE ? words("G′", storageSlope, STORAGE_SLOPE, "2") : againstViscosity();
    }

    private static String words(String symbol, double slope, double asked, String terminal) {
        return "at the lowest frequencies " + symbol + " grows with ω to the power " + NumberText.of(slope, 3) + " ("
                + NumberText.of(asked, 2) + " asked, " + terminal + " in the terminal zone)";
    }
}
