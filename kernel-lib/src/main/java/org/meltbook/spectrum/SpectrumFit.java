package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import java.util.function.DoubleUnaryOperator;
import java.util.stream.IntStream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Progress;
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
 * <p>Relaxation times stand on a logarithmic grid, three a decade unless said otherwise, from 1/(10 ω_max) to 1/ω_min
 * of the usable points. The decade beyond the window stands for all faster motion, which G″ feels as a viscosity: only
 * g λ of these modes means anything. On the slow side the grid ends with the window. The moduli come by non-negative
 * least squares of the relative misfit, storage and loss each at its own frequencies. Modes that the data do not need
 * are zero and left out.
 *
 * <p>η₀ is a plain number if G″ reaches the terminal zone, Jₑ⁰ if G′ does too (the cautions name the slopes asked), else
 * each is a bound and the limit of the fitted spectrum stands beside it, marked as extrapolated. The numbers are those
 * of the spectrum of both moduli, unless the two curves do not belong together, as when they were read off a figure: if
 * the spectrum of both misses the points by a residual variance more than twice that of a spectrum of each alone, and
 * its η₀ or Σ g λ² lies beyond the intervals of theirs. Then each number is read from the modulus that holds it, η₀ =
 * lim G″/ω and Σ g λ² = lim G′/ω², and a caution says so. Crossovers are those of the spectrum of both, inside the window
 * where both were measured.
 *
 * <p>Intervals (95 %) come from 200 refits to residuals drawn again with a fixed seed: they hold the scatter of the
 * points, not an error that all points share. Those of η₀ and Jₑ⁰ from both moduli also take in 200 refits on a grid
 * that goes half a decade further on the slow side: Jₑ⁰ hangs on the slowest modes, and where the window cuts them off
 * its interval grows upwards. On seeded sweeps with 2 and 3 % scatter, from a sparse and two smooth spectra, intervals
 * of η₀ and Jₑ⁰ held the truth 94 to 100 times in a hundred, those of crossovers 85 to 99 (measured). Two modes a decade
 * are too few for that: on a sparse spectrum the grid itself then moved the crossover by more than the interval.
 */
public final class SpectrumFit implements Exhibit {
    /** Relaxation times a decade of the grid, unless said otherwise. */
    public static final double MODES_PER_DECADE = 3;

    private final FrequencySweep sweep;
    private final Moduli moduli;
    private final double modesPerDecade;
    private final ModulusFit joint;
    private final ZeroRateLimits limits;
    private final List<Crossover> crossovers;

    private SpectrumFit(FrequencySweep sweep, double modesPerDecade, Progress progress) {
        this.sweep = sweep;
        this.moduli = new Moduli(sweep.storage().usable(), sweep.loss().usable());
        this.modesPerDecade = modesPerDecade;
        this.joint = ModulusFit.joint(moduli.storage(), moduli.loss(), moduli.grid(modesPerDecade), progress);
        Refitted refitted = Refitted.of(joint, 0, progress);
        this.limits = new ZeroRateLimits(moduli, modesPerDecade, joint, refitted, progress);
        this.crossovers = Crossover.of(refitted, moduli.lowestOfBoth(), moduli.highestOfBoth());
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
        return Doubles.of(joint.residuals())
                .pick(IntStream.range(0, moduli.storage().size()).toArray());
    }

    /** model / measured − 1 of the usable loss points, in their order. */
    public Doubles lossResiduals() {
        return Doubles.of(joint.residuals())
                .pick(IntStream.range(moduli.storage().size(), joint.residuals().length)
                        .toArray());
    }

    /** The zero-shear viscosity, or a lower bound if G″ does not reach the terminal zone. */
    public Prediction zeroShearViscosity() {
        return limits.viscosity();
    }

    /** The steady recoverable compliance, or a lower bound if G′ does not reach the terminal zone. */
    public Prediction recoverableCompliance() {
        return limits.compliance();
    }

    /** The limits of the fitted spectrum, extrapolated, where the sweep itself gives only bounds; else empty. */
    public List<Prediction> extrapolatedLimits() {
        return limits.extrapolated();
    }

    /** Where the moduli are equal inside the window in which both were measured, from low to high frequency. */
    public List<Crossover> crossovers() {
        return crossovers;
    }

    @Override
    public String headline() {
        return "Relaxation spectrum" + sweep.conditions().ofSample() + ": " + modeCount() + " within "
                + NumberText.of(100 * rootMeanSquare(), 2) + " % (root mean square); "
                + limits.zone().verdict() + "; η₀ " + viscosityWords() + ".";
    }

    private String modeCount() {
        int count = spectrum().modes().size();
        return count == 1 ? "1 mode meets the moduli" : count + " modes meet the moduli";
    }

    private String viscosityWords() {
        Prediction viscosity = zeroShearViscosity();
        if (!viscosity.hasValue()) {
            return "at least " + NumberText.of(viscosity.low()) + " Pa·s (fitted spectrum: "
                    + NumberText.of(spectrum().zeroShearViscosity()) + " Pa·s, extrapolated)";
        }
        return "= " + NumberText.of(viscosity.value()) + " Pa·s (95 %: " + NumberText.of(viscosity.low()) + " to "
                + NumberText.of(viscosity.high()) + ")";
    }

    @Override
    public List<Rows> rows() {
        List<Prediction> numbers = new ArrayList<>(List.of(zeroShearViscosity(), recoverableCompliance()));
        numbers.addAll(extrapolatedLimits());
        crossovers.forEach(c -> numbers.addAll(List.of(c.frequency(), c.modulus())));
        return List.of(
                PredictionRows.of("What the sweep says", numbers),
                modeRows(),
                residualRows("G′", moduli.storage(), storageResiduals(), spectrum()::storage),
                residualRows("G″", moduli.loss(), lossResiduals(), spectrum()::loss));
    }

    private Rows modeRows() {
        Doubles grid = moduli.grid(modesPerDecade);
        return spectrum()
                .modeRows()
                .note("Left over from a grid of " + grid.size() + " times, " + NumberText.of(modesPerDecade, 2)
                        + " a decade from " + NumberText.of(grid.smallest(), 3) + " to "
                        + NumberText.of(grid.largest(), 3) + " s.")
                .note("Modes faster than " + NumberText.of(1 / moduli.highest(), 3)
                        + " s stand for all motion beyond the window: only their g λ means anything.")
                .build();
    }

    private static Rows residualRows(String symbol, Curve curve, Doubles residuals, DoubleUnaryOperator model) {
        return Rows.titled("Measured and fitted " + symbol)
                .numbers("ω", "rad/s", curve.x().values())
                .numbers("measured " + symbol, "Pa", curve.y().values())
                .numbers("fitted " + symbol, "Pa", curve.x().values().map(model))
                .differences("fitted / measured − 1", "%", residuals.map(r -> 100 * r))
                .build();
    }

    @Override
    public List<Figure> figures() {
        return List.of(moduliFigure(), residualFigure(), spectrum().modeFigure());
    }

    private Figure moduliFigure() {
        Doubles storages = moduli.storage().x().values();
        Doubles losses = moduli.loss().x().values();
        Doubles storageLine = RelaxationSpectrum.spread(storages.smallest(), storages.largest());
        Doubles lossLine = RelaxationSpectrum.spread(losses.smallest(), losses.largest());
        return Figure.titled("Moduli" + sweep.conditions().ofSample() + ", measured and from the spectrum")
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("moduli G′, G″", "Pa", Axis.Scale.LOG))
                .line("G′ of the spectrum", storageLine, storageLine.map(spectrum()::storage))
                .dashed("G″ of the spectrum", lossLine, lossLine.map(spectrum()::loss))
                .marks("G′ measured", storages, moduli.storage().y().values())
                .marks("G″ measured", losses, moduli.loss().y().values())
                .caption("Each line ends where its modulus was measured.")
                .build();
    }

    private Figure residualFigure() {
        Doubles ends = Doubles.of(moduli.lowest(), moduli.highest());
        return Figure.titled("Misfit of the spectrum" + sweep.conditions().ofSample())
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("fitted / measured − 1", "%", Axis.Scale.LINEAR))
                .line("no misfit", ends, Doubles.of(0, 0))
                .marks("G′", moduli.storage().x().values(), storageResiduals().map(r -> 100 * r))
                .marks("G″", moduli.loss().x().values(), lossResiduals().map(r -> 100 * r))
                .build();
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        for (Prediction prediction : List.of(zeroShearViscosity(), recoverableCompliance())) {
            if (!prediction.hasValue()) {
                all.add(prediction.toString());
            } else {
                prediction.cautions().forEach(caution -> all.add(prediction.name() + ": " + caution));
            }
        }
        int aside = sweep.storage().setAside() + sweep.loss().setAside();
        if (aside > 0) {
            all.add(aside + (aside == 1 ? " point is" : " points are") + " marked unusable and took no part");
        }
        all.add("the modes are one way of many to write the moduli inside the window, not a picture of the chains;"
                + " outside it they only continue it");
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
