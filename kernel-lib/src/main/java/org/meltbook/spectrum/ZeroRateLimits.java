package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleFunction;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * What a sweep says of the limits at rate zero, η₀ and Jₑ⁰: numbers where the terminal zone was reached, else bounds
 * and, apart from them, the extrapolated limits of the fitted spectrum.
 */
final class ZeroRateLimits {
    private static final String VISCOSITY = "zero-shear viscosity";
    private static final String COMPLIANCE = "recoverable compliance";
    private static final String NOT_REACHED = "the terminal zone was not reached: ";
    private static final String BEYOND = "slower motion than the window shows would add to it";

    /** By this factor the residual variance of both moduli together may exceed that of each alone. */
    private static final double STRAIN = 2;

    private final Moduli moduli;
    private final double modesPerDecade;
    private final Refitted joint;
    private final TerminalZone zone;
    private final Prediction viscosity;
    private final Prediction compliance;
    private final List<Prediction> extrapolated = new ArrayList<>();

    /** The limits from a fit of both moduli and, where the terminal zone was reached, from further fits. */
    ZeroRateLimits(Moduli moduli, double modesPerDecade, ModulusFit both, Refitted joint, Progress progress) {
        this.moduli = moduli;
        this.modesPerDecade = modesPerDecade;
        this.joint = joint;
        this.zone = TerminalZone.of(joint.spectrum(), moduli);
        Optional<Alone> alone = zone.givesViscosity() ? mismatch(both, progress) : Optional.empty();
        if (alone.isPresent()) {
            this.viscosity = ofLoss(alone.get().loss());
            this.compliance = zone.givesCompliance() ? ofEach(alone.get()) : leastCompliance();
        } else if (zone.givesViscosity()) {
            Refitted slower = slower(progress);
            this.viscosity = ofBoth(VISCOSITY, Quantity.VISCOSITY, RelaxationSpectrum::zeroShearViscosity, slower);
            this.compliance = zone.givesCompliance()
                    ? ofBoth(COMPLIANCE, Quantity.COMPLIANCE, RelaxationSpectrum::recoverableCompliance, slower)
                    : leastCompliance();
        } else {
            this.viscosity = leastViscosity();
            this.compliance = leastCompliance();
        }
    }

    /** Fits of each modulus alone. */
    private record Alone(Refitted storage, Refitted loss) {}

    /** The fits of each modulus alone if the two do not belong together, else nothing. */
    private Optional<Alone> mismatch(ModulusFit both, Progress progress) {
        Doubles times = moduli.grid(modesPerDecade);
        ModulusFit storage = ModulusFit.ofStorage(moduli.storage(), times, progress);
        ModulusFit loss = ModulusFit.ofLoss(moduli.loss(), times, progress);
        double apart = (storage.sumOfSquares() + loss.sumOfSquares()) / (storage.spare() + loss.spare());
        if (both.sumOfSquares() / both.spare() <= STRAIN * apart) {
            return Optional.empty();
        }
        Alone alone = new Alone(Refitted.of(storage, 2, progress), Refitted.of(loss, 1, progress));
        boolean agree = joint.agrees(alone.loss(), RelaxationSpectrum::zeroShearViscosity)
                && (!zone.givesCompliance()
                        || joint.agrees(alone.storage(), RelaxationSpectrum::zeroRateNormalStressCoefficient));
        return agree ? Optional.empty() : Optional.of(alone);
    }

    private Refitted slower(Progress progress) {
        ModulusFit fit = ModulusFit.joint(moduli.storage(), moduli.loss(), moduli.slowerGrid(modesPerDecade), progress);
        return Refitted.of(fit, 3, progress);
    }

    /** From both moduli; the interval takes in what modes half a decade slower than the window would change. */
    private Prediction ofBoth(
            String name, Quantity quantity, ToDoubleFunction<RelaxationSpectrum> number, Refitted slower) {
        Interval interval =
                joint.interval(number).and(Interval.of(slower.again().stream().mapToDouble(number)));
        return Prediction.of(name, quantity, number.applyAsDouble(joint.spectrum()), interval.low(), interval.high());
    }

    private Prediction ofLoss(Refitted loss) {
        double value = loss.spectrum().zeroShearViscosity();
        double both = joint.spectrum().zeroShearViscosity();
        Interval interval = loss.interval(RelaxationSpectrum::zeroShearViscosity);
        return Prediction.of(VISCOSITY, Quantity.VISCOSITY, value, interval.low(), interval.high())
                .minding("the two moduli do not quite belong together: the value is that of the loss modulus alone, the"
                        + " spectrum of both gives " + NumberText.of(both) + " Pa·s, "
                        + NumberText.of(100 * Math.abs(both / value - 1), 2) + " % "
                        + (both > value ? "more" : "less"));
    }

    /** Σ g λ² from the storage modulus alone, η₀ from the loss modulus alone. */
    private static Prediction ofEach(Alone alone) {
        Refitted storage = alone.storage();
        Refitted loss = alone.loss();
        double value = compliance(storage.spectrum(), loss.spectrum());
        Interval interval = Interval.about(
                value,
                IntStream.range(0, loss.again().size())
                        .mapToDouble(k ->
                                compliance(storage.again().get(k), loss.again().get(k))));
        return Prediction.of(COMPLIANCE, Quantity.COMPLIANCE, value, interval.low(), interval.high())
                .minding("from each modulus alone, as the two do not quite belong together");
    }

    private static double compliance(RelaxationSpectrum storage, RelaxationSpectrum loss) {
        double eta0 = loss.zeroShearViscosity();
        return storage.zeroRateNormalStressCoefficient() / 2 / (eta0 * eta0);
    }

    /** |η*| never exceeds η₀, so its value at the low end of the window is a bound. */
    private Prediction leastViscosity() {
        double at = moduli.lowestOfBoth();
        double limit = joint.spectrum().zeroShearViscosity();
        extrapolated.add(limit(VISCOSITY, Quantity.VISCOSITY, limit));
        return Prediction.atLeast(
                VISCOSITY,
                Quantity.VISCOSITY,
                joint.interval(spectrum -> spectrum.complexViscosity(at)).low(),
                NOT_REACHED + zone.againstViscosity() + "; the bound is " + bound("|η*|", at)
                        + "; the fitted spectrum gives " + NumberText.of(limit) + " Pa·s (extrapolated)");
    }

    /** J′ = G′/(G′² + G″²) never exceeds Jₑ⁰, so its value at the low end of the window is a bound. */
    private Prediction leastCompliance() {
        double at = moduli.lowestOfBoth();
        double limit = joint.spectrum().recoverableCompliance();
        extrapolated.add(limit(COMPLIANCE, Quantity.COMPLIANCE, limit));
        return Prediction.atLeast(
                COMPLIANCE,
                Quantity.COMPLIANCE,
                joint.interval(spectrum -> storageCompliance(spectrum, at)).low(),
                NOT_REACHED + zone.againstCompliance() + "; the bound is " + bound("J′", at)
                        + "; the fitted spectrum gives " + NumberText.of(limit) + " 1/Pa (extrapolated)");
    }

    private static double storageCompliance(RelaxationSpectrum spectrum, double frequency) {
        double elastic = spectrum.storage(frequency);
        double viscous = spectrum.loss(frequency);
        return elastic / (elastic * elastic + viscous * viscous);
    }

    private static String bound(String symbol, double frequency) {
        return symbol + " at " + NumberText.of(frequency) + " rad/s, low end of its 95 % interval";
    }

    private static Prediction limit(String name, Quantity quantity, double value) {
        return Prediction.of(name + " of the fitted spectrum", quantity, value, Double.NaN, Double.NaN)
                .extrapolated(BEYOND);
    }

    TerminalZone zone() {
        return zone;
    }

    Prediction viscosity() {
        return viscosity;
    }

    Prediction compliance() {
        return compliance;
    }

    /** The limits of the fitted spectrum where the sweep gives only bounds. */
    List<Prediction> extrapolated() {
        return List.copyOf(extrapolated);
    }
}
