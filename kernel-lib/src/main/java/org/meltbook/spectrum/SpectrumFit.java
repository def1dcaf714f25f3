package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import java.util.function.ToDoubleFunction;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.fit.PredictionRows;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * A discrete relaxation spectrum found from a frequency sweep, and what the sweep allows to say from it.
 *
 * <p>Relaxation times stand on a logarithmic grid, two a decade unless said otherwise, from 1/(10 ω_max) to 1/ω_min of the
 * usable points. The decade beyond the window stands for all faster motion, which G″ feels as a viscosity: only g λ of these
 * modes means anything. On the slow side the grid ends with the window. The moduli come by non-negative least squares of the relative misfit, storage and loss each at its own
 * frequencies. Modes that the data do not need are zero and left out.
 *
 * <p>Zero-shear viscosity and recoverable compliance are plain numbers only if the terminal zone was reached (see the
 * caution for the slopes asked), else bounds. Each is then read from the modulus that holds it: η₀ = lim G″/ω from a
 * spectrum of the loss modulus alone, Σ g λ² = lim G′/ω² from one of the storage modulus alone, so that a mismatch between
 * the two curves cannot leak from one to the other; if the joint spectrum disagrees by more than 5 %, a caution says by
 * how much.
 * Crossovers are those of the joint spectrum, inside the window where both moduli were measured.
 *
 * <p>Intervals (95 %) come from 200 refits to residuals drawn again with a fixed seed: they hold the scatter of the
 * points, not an error that all points share.
 */
public final class SpectrumFit implements Exhibit {
    /** Relaxation times a decade of the grid, unless said otherwise. */
    public static final double MODES_PER_DECADE = 2;

    /** Up to this share the two moduli may disagree about the zero-shear viscosity before a caution says so. */
    private static final double AGREEMENT = 0.05;

    /** By this factor the grid goes beyond the window on the fast side. */
    private static final double FAST_SIDE = 10;

    private static final int REPLICATES = 200;
    private static final long SEED = 20260101;

    private final FrequencySweep sweep;
    private final Curve storage;
    private final Curve loss;
    private final double modesPerDecade;
    private final int gridSize;
    private final ModulusFit joint;
    private final TerminalZone terminal;
    private final List<Crossover> crossovers;
    private final Prediction zeroShearViscosity;
    private final Prediction recoverableCompliance;

    private SpectrumFit(FrequencySweep sweep, double modesPerDecade, Progress progress) {
        this.sweep = sweep;
        this.storage = ModulusFit.checked(sweep.storage().usable());
        this.loss = ModulusFit.checked(sweep.loss().usable());
        this.modesPerDecade = modesPerDecade;
        Doubles times = grid(Math.min(low(storage), low(loss)), Math.max(high(storage), high(loss)), modesPerDecade);
        this.gridSize = times.size();
        this.joint = ModulusFit.joint(storage, loss, times, progress);
        this.terminal = TerminalZone.of(storage, loss);
        this.crossovers = findCrossovers(progress);
        if (terminal.reached()) {
            ModulusFit fromLoss = ModulusFit.ofLoss(loss, times, progress);
            ModulusFit fromStorage = ModulusFit.ofStorage(storage, times, progress);
            List<RelaxationSpectrum> lossAgain = fromLoss.replicates(REPLICATES, SEED, progress);
            List<RelaxationSpectrum> storageAgain = fromStorage.replicates(REPLICATES, SEED + 1, progress);
            this.zeroShearViscosity = viscosity(fromLoss.spectrum(), lossAgain);
            this.recoverableCompliance = compliance(fromStorage.spectrum(), storageAgain, fromLoss.spectrum(), lossAgain);
        } else {
            this.zeroShearViscosity = leastViscosity();
            this.recoverableCompliance = leastCompliance();
        }
    }

    /** The spectrum of a sweep with {@value #MODES_PER_DECADE} relaxation times a decade. */
    public static SpectrumFit of(FrequencySweep sweep) {
        return of(sweep, MODES_PER_DECADE, Progress.QUIET);
    }

    /** The spectrum of a sweep with the given number of relaxation times a decade, 0.5 to 10. */
    public static SpectrumFit of(FrequencySweep sweep, double modesPerDecade) {
        return of(sweep, modesPerDecade, Progress.QUIET);
    }

    /**
     * The spectrum of a sweep.
     *
     * @param modesPerDecade relaxation times a decade of the grid, 0.5 to 10
     * @throws RangeException if a curve has fewer than three usable points, a usable modulus or frequency is not above
     *     zero, or all frequencies are equal
     */
    public static SpectrumFit of(FrequencySweep sweep, double modesPerDecade, Progress progress) {
        Require.within("modes per decade", modesPerDecade, 0.5, 10, "1");
        return new SpectrumFit(sweep, modesPerDecade, progress);
    }

    private static Doubles grid(double lowest, double highest, double modesPerDecade) {
        if (!(highest > lowest)) {
            throw new RangeException("a spectrum needs more than one frequency, found only " + NumberText.of(lowest) + " rad/s");
        }
        int count = 1 + (int) Math.ceil(modesPerDecade * Math.log10(FAST_SIDE * highest / lowest));
        return Doubles.logSpaced(1 / (FAST_SIDE * highest), 1 / lowest, count);
    }

    private static double low(Curve curve) {
        return curve.x().values().smallest();
    }

    private static double high(Curve curve) {
        return curve.x().values().largest();
    }

    private List<Crossover> findCrossovers(Progress progress) {
        double low = Math.max(low(storage), low(loss));
        double high = Math.min(high(storage), high(loss));
        if (!(high > low)) {
            return List.of();
        }
        Doubles found = Crossover.frequencies(joint.spectrum(), low, high);
        if (found.isEmpty()) {
            return List.of();
        }
        List<RelaxationSpectrum> again = joint.replicates(REPLICATES, SEED + 2, progress);
        List<Crossover> all = new ArrayList<>();
        for (int i = 0; i < found.size(); i++) {
            int place = i;
            Interval omega = Interval.of(again.stream()
                    .mapToDouble(s -> sameCount(Crossover.frequencies(s, low, high), found, place)));
            Interval modulus = Interval.of(again.stream().mapToDouble(s -> {
                double at = sameCount(Crossover.frequencies(s, low, high), found, place);
                return Double.isNaN(at) ? Double.NaN : s.storage(at);
            }));
            String name = found.size() == 1 ? "crossover" : "crossover " + (i + 1);
            double at = found.at(i);
            all.add(new Crossover(
                    Prediction.of(name + " frequency", Quantity.ANGULAR_FREQUENCY, at, omega.low(), omega.high()),
                    Prediction.of(
                            name + " modulus", Quantity.STORAGE_MODULUS, joint.spectrum().storage(at), modulus.low(),
                            modulus.high())));
        }
        return List.copyOf(all);
    }

    private static double sameCount(Doubles again, Doubles found, int place) {
        return again.size() == found.size() ? again.at(place) : Double.NaN;
    }

    private Prediction viscosity(RelaxationSpectrum fromLoss, List<RelaxationSpectrum> again) {
        double value = fromLoss.zeroShearViscosity();
        Interval interval = Interval.of(again.stream().mapToDouble(RelaxationSpectrum::zeroShearViscosity));
        Prediction prediction =
                Prediction.of("zero-shear viscosity", Quantity.VISCOSITY, value, interval.low(), interval.high());
        double both = joint.spectrum().zeroShearViscosity();
        if (Math.abs(both / value - 1) <= AGREEMENT) {
            return prediction;
        }
        return prediction.minding("the two moduli do not quite belong together: the spectrum of both gives "
                + NumberText.of(both) + " Pa·s, " + NumberText.of(100 * (both / value - 1), 2) + " % "
                + (both > value ? "more" : "less") + " than the loss modulus alone");
    }

    private static Prediction compliance(
            RelaxationSpectrum storage, List<RelaxationSpectrum> storageAgain, RelaxationSpectrum loss,
            List<RelaxationSpectrum> lossAgain) {
        Interval interval = Interval.of(IntStream.range(0, storageAgain.size())
                .mapToDouble(k -> compliance(storageAgain.get(k), lossAgain.get(k))));
        return Prediction.of(
                "recoverable compliance", Quantity.COMPLIANCE, compliance(storage, loss), interval.low(), interval.high());
    }

    private static double compliance(RelaxationSpectrum storage, RelaxationSpectrum loss) {
        double eta0 = loss.zeroShearViscosity();
        return storage.zeroRateNormalStressCoefficient() / 2 / (eta0 * eta0);
    }

    /** |η*| never exceeds η₀, so its value at the low end of the window is a bound. */
    private Prediction leastViscosity() {
        double at = Math.max(low(storage), low(loss));
        return Prediction.atLeast(
                "zero-shear viscosity", Quantity.VISCOSITY, joint.spectrum().complexViscosity(at),
                "the terminal zone was not reached, " + terminal.words() + "; the bound is |η*| of the fitted spectrum at "
                        + NumberText.of(at) + " rad/s");
    }

    /** J′ = G′/(G′² + G″²) never exceeds Jₑ⁰, so its value at the low end of the window is a bound. */
    private Prediction leastCompliance() {
        double at = Math.max(low(storage), low(loss));
        double elastic = joint.spectrum().storage(at);
        double viscous = joint.spectrum().loss(at);
        return Prediction.atLeast(
                "recoverable compliance", Quantity.COMPLIANCE, elastic / (elastic * elastic + viscous * viscous),
                "the terminal zone was not reached; the bound is the storage compliance at " + NumberText.of(at) + " rad/s");
    }

    /** The sweep that was fitted. */
    public FrequencySweep sweep() {
        return sweep;
    }

    /** The spectrum of both moduli together. */
    public RelaxationSpectrum spectrum() {
        return joint.spectrum();
    }

    /** Root mean square of model / measured − 1 over all usable points. */
    public double rootMeanSquare() {
        return joint.rootMeanSquare();
    }

    /** model / measured − 1 of the usable storage points, in their order. */
    public Doubles storageResiduals() {
        return Doubles.of(joint.residuals()).pick(IntStream.range(0, storage.size()).toArray());
    }

    /** model / measured − 1 of the usable loss points, in their order. */
    public Doubles lossResiduals() {
        return Doubles.of(joint.residuals())
                .pick(IntStream.range(storage.size(), storage.size() + loss.size()).toArray());
    }

    /** The zero-shear viscosity, or a lower bound if the terminal zone was not reached. */
    public Prediction zeroShearViscosity() {
        return zeroShearViscosity;
    }

    /** The steady recoverable compliance, or a lower bound if the terminal zone was not reached. */
    public Prediction recoverableCompliance() {
        return recoverableCompliance;
    }

    /** Where the moduli are equal inside the window in which both were measured, from low to high frequency. */
    public List<Crossover> crossovers() {
        return crossovers;
    }

    @Override
    public String headline() {
        return "Relaxation spectrum" + of(sweep.conditions().sample()) + ": " + spectrum().modes().size()
                + " modes out of a grid of " + gridSize + " (" + NumberText.of(modesPerDecade, 2) + " a decade, "
                + NumberText.of(1 / (FAST_SIDE * Math.max(high(storage), high(loss))), 3) + " to "
                + NumberText.of(1 / Math.min(low(storage), low(loss)), 3) + " s); moduli met within "
                + NumberText.of(100 * rootMeanSquare(), 2) + " % (root mean square); terminal zone "
                + (terminal.reached() ? "reached." : "NOT reached.");
    }

    private static String of(String sample) {
        return sample.isEmpty() ? "" : " of " + sample;
    }

    @Override
    public List<Rows> rows() {
        List<Prediction> numbers = new ArrayList<>(List.of(zeroShearViscosity, recoverableCompliance));
        crossovers.forEach(c -> numbers.addAll(List.of(c.frequency(), c.modulus())));
        return List.of(
                PredictionRows.of("What the sweep says", numbers), modeRows(),
                residualRows("G′", storage, storageResiduals(), spectrum()::storage),
                residualRows("G″", loss, lossResiduals(), spectrum()::loss));
    }

    private Rows modeRows() {
        double fastest = 1 / Math.max(high(storage), high(loss));
        return spectrum().modeRows()
                .note("Modes faster than " + NumberText.of(fastest, 3) + " s lie beyond the window: they stand for all faster "
                        + "motion, and only their g λ means anything.")
                .build();
    }

    private static Rows residualRows(
            String symbol, Curve curve, Doubles residuals, java.util.function.DoubleUnaryOperator model) {
        return Rows.titled("Measured and fitted " + symbol)
                .numbers("ω", "rad/s", curve.x().values())
                .numbers("measured " + symbol, "Pa", curve.y().values())
                .numbers("fitted " + symbol, "Pa", curve.x().values().map(model))
                .numbers("fitted / measured − 1", "%", residuals.map(r -> 100 * r))
                .build();
    }

    @Override
    public List<Figure> figures() {
        return List.of(moduliFigure(), residualFigure(), spectrum().modeFigure());
    }

    private Figure moduliFigure() {
        Doubles storageLine = RelaxationSpectrum.spread(low(storage), high(storage));
        Doubles lossLine = RelaxationSpectrum.spread(low(loss), high(loss));
        return Figure.titled("Moduli" + of(sweep.conditions().sample()) + ", measured and from the spectrum")
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("moduli G′, G″", "Pa", Axis.Scale.LOG))
                .line("G′ of the spectrum", storageLine, storageLine.map(spectrum()::storage))
                .dashed("G″ of the spectrum", lossLine, lossLine.map(spectrum()::loss))
                .marks("G′ measured", storage.x().values(), storage.y().values())
                .marks("G″ measured", loss.x().values(), loss.y().values())
                .caption("Each line ends where its modulus was measured.")
                .build();
    }

    private Figure residualFigure() {
        Doubles ends = Doubles.of(Math.min(low(storage), low(loss)), Math.max(high(storage), high(loss)));
        return Figure.titled("Misfit of the spectrum" + of(sweep.conditions().sample()))
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("fitted / measured − 1", "%", Axis.Scale.LINEAR))
                .line("no misfit", ends, Doubles.of(0, 0))
                .marks("G′", storage.x().values(), storageResiduals().map(r -> 100 * r))
                .marks("G″", loss.x().values(), lossResiduals().map(r -> 100 * r))
                .build();
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        for (Prediction prediction : List.of(zeroShearViscosity, recoverableCompliance)) {
            if (!prediction.hasValue()) {
                all.add(prediction.toString());
            } else {
                all.addAll(prediction.cautions());
            }
        }
        int aside = sweep.storage().setAside() + sweep.loss().setAside();
        if (aside > 0) {
            all.add(aside + (aside == 1 ? " point is" : " points are") + " marked unusable and took no part");
        }
        all.add("the modes are one way to write the moduli inside the window; they are no picture of the chains, and outside "
                + "the window they only continue it");
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
