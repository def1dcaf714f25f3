package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.measure.ModeTable;
import org.meltbook.units.Quantity;
import org.meltbook.units.Require;

/**
 * A discrete relaxation spectrum: Maxwell modes of modulus g and relaxation time λ, and all that linear viscoelasticity
 * says of them. Formulas as in J. D. Ferry, Viscoelastic Properties of Polymers, 3rd ed. 1980 (memory).
 */
public final class RelaxationSpectrum implements Exhibit {
    private static final int POINTS_A_DECADE = 20;

    private final List<Mode> modes;

    private RelaxationSpectrum(List<Mode> modes) {
        this.modes = modes;
    }

    /**
     * One Maxwell mode.
     *
     * @param modulus g in Pa, above zero
     * @param time    λ in s, above zero
     */
    public record Mode(double modulus, double time) {
        /** Checks both numbers. */
        public Mode {
            Require.positive("modulus g", modulus, "Pa");
            Require.positive("relaxation time λ", time, "s");
        }

        /** g λ in Pa·s: what the mode adds to the zero-shear viscosity. */
        public double viscosity() {
            return modulus * time;
        }
    }

    /**
     * The spectrum of the given modes.
     *
     * @throws RangeException if there is none, or two have the same relaxation time
     */
    public static RelaxationSpectrum of(List<Mode> modes) {
        if (modes.isEmpty()) {
            throw new RangeException("a relaxation spectrum needs one mode at least, found none");
        }
        List<Mode> rising =
                modes.stream().sorted(Comparator.comparingDouble(Mode::time)).toList();
        for (int i = 1; i < rising.size(); i++) {
            if (rising.get(i).time() == rising.get(i - 1).time()) {
                throw new RangeException("two modes of the spectrum have the relaxation time "
                        + rising.get(i).time() + " s: add their moduli");
            }
        }
        return new RelaxationSpectrum(rising);
    }

    /**
     * The spectrum of the given moduli and times.
     *
     * @param moduli moduli g in Pa, above zero
     * @param times  relaxation times λ in s, as many
     */
    public static RelaxationSpectrum of(Doubles moduli, Doubles times) {
        if (moduli.size() != times.size()) {
            throw new RangeException("a spectrum needs as many moduli as relaxation times, found " + moduli.size()
                    + " and " + times.size());
        }
        List<Mode> modes = new ArrayList<>();
        for (int i = 0; i < moduli.size(); i++) {
            modes.add(new Mode(moduli.at(i), times.at(i)));
        }
        return of(modes);
    }

    /**
     * The spectrum that somebody printed as a table of modes; unusable rows are left out.
     *
     * @throws RangeException if no row is usable, or two have the same relaxation time
     */
    public static RelaxationSpectrum of(ModeTable table) {
        return of(
                table.modes().usable().y().values(), table.modes().usable().x().values());
    }

    /** The modes from short to long relaxation times. */
    public List<Mode> modes() {
        return modes;
    }

    /** Moduli g in Pa, in the order of {@link #modes}. */
    public Doubles moduli() {
        return Doubles.of(modes.stream().mapToDouble(Mode::modulus).toArray());
    }

    /** Relaxation times λ in s, rising. */
    public Doubles times() {
        return Doubles.of(modes.stream().mapToDouble(Mode::time).toArray());
    }

    /** Storage modulus G′ = Σ g (ωλ)²/(1 + (ωλ)²) in Pa at an angular frequency in rad/s, zero or more. */
    public double storage(double frequency) {
        Require.notNegative("angular frequency", frequency, "rad/s");
        return sum(mode -> mode.modulus() * storageShare(frequency * mode.time()));
    }

    /** Loss modulus G″ = Σ g ωλ/(1 + (ωλ)²) in Pa at an angular frequency in rad/s, zero or more. */
    public double loss(double frequency) {
        Require.notNegative("angular frequency", frequency, "rad/s");
        return sum(mode -> mode.modulus() * lossShare(frequency * mode.time()));
    }

    static double storageShare(double x) {
        double square = x * x;
        return square < Double.POSITIVE_INFINITY ? square / (1 + square) : 1;
    }

    static double lossShare(double x) {
        return x / (1 + x * x);
    }

    /**
     * Magnitude of the complex viscosity |η*| in Pa·s at an angular frequency in rad/s, zero or more. By the rule of
     * W. P. Cox and E. H. Merz, J. Polym. Sci. 28 (1958) 619 (memory), it is near the shear viscosity at that rate.
     */
    public double complexViscosity(double frequency) {
        Require.notNegative("angular frequency", frequency, "rad/s");
        double real = sum(mode -> mode.viscosity() / (1 + square(frequency * mode.time())));
        double imaginary = sum(mode -> mode.viscosity() * lossShare(frequency * mode.time()));
        return Math.hypot(real, imaginary);
    }

    /** Relaxation modulus G(t) = Σ g exp(−t/λ) in Pa at a time in s, zero or more. */
    public double relaxationModulus(double time) {
        Require.notNegative("time", time, "s");
        return sum(mode -> mode.modulus() * Math.exp(-time / mode.time()));
    }

    /** Linear shear stress growth coefficient η⁺(t) = Σ g λ (1 − exp(−t/λ)) in Pa·s at a time in s, zero or more. */
    public double stressGrowth(double time) {
        Require.notNegative("time", time, "s");
        return sum(mode -> mode.viscosity() * -Math.expm1(-time / mode.time()));
    }

    /** Zero-shear viscosity η₀ = Σ g λ in Pa·s. */
    public double zeroShearViscosity() {
        return sum(Mode::viscosity);
    }

    /** First normal stress coefficient at zero rate, Ψ₁,₀ = 2 Σ g λ² in Pa·s². */
    public double zeroRateNormalStressCoefficient() {
        return 2 * sum(mode -> mode.viscosity() * mode.time());
    }

    /** Steady recoverable compliance Jₑ⁰ = Σ g λ² / (Σ g λ)² in 1/Pa. */
    public double recoverableCompliance() {
        return meanRelaxationTime() / zeroShearViscosity();
    }

    /** Mean relaxation time Σ g λ² / Σ g λ in s, weighted by viscosity: it sets where nonlinear flow begins. */
    public double meanRelaxationTime() {
        return zeroRateNormalStressCoefficient() / 2 / zeroShearViscosity();
    }

    /** Modulus at time zero, G(0) = Σ g in Pa. */
    public double instantaneousModulus() {
        return sum(Mode::modulus);
    }

    private interface PerMode {
        double of(Mode mode);
    }

    private double sum(PerMode share) {
        double sum = 0;
        for (Mode mode : modes) {
            sum += share.of(mode);
        }
        return sum;
    }

    private static double square(double x) {
        return x * x;
    }

    @Override
    public String headline() {
        return "Relaxation spectrum of " + modes.size() + (modes.size() == 1 ? " mode at " : " modes from ")
                + NumberText.of(modes.get(0).time())
                + (modes.size() == 1
                        ? ""
                        : " to " + NumberText.of(modes.get(modes.size() - 1).time())) + " s: η₀ = "
                + NumberText.of(zeroShearViscosity()) + " Pa·s, mean relaxation time "
                + NumberText.of(meanRelaxationTime()) + " s.";
    }

    @Override
    public List<Rows> rows() {
        Rows sums = Rows.titled("Sums over the modes")
                .text(
                        "number",
                        List.of(
                                "zero-shear viscosity η₀ = Σ g λ",
                                "recoverable compliance Jₑ⁰ = Σ g λ² / η₀²",
                                "first normal stress coefficient Ψ₁,₀ = 2 Σ g λ²",
                                "mean relaxation time Σ g λ² / Σ g λ",
                                "modulus at time zero G(0) = Σ g"))
                .numbers(
                        "value",
                        "",
                        zeroShearViscosity(),
                        recoverableCompliance(),
                        zeroRateNormalStressCoefficient(),
                        meanRelaxationTime(),
                        instantaneousModulus())
                .text("unit", List.of("Pa·s", "1/Pa", "Pa·s²", "s", "Pa"))
                .note("Of a fitted spectrum these hold as far as the sweep reached: see what its fit says of them.")
                .build();
        return List.of(modeRows().build(), sums);
    }

    Rows.Builder modeRows() {
        double all = zeroShearViscosity();
        return Rows.titled("Modes")
                .numbers("λ", "s", times())
                .numbers("g", "Pa", moduli())
                .numbers(
                        "g λ",
                        "Pa·s",
                        Doubles.of(modes.stream().mapToDouble(Mode::viscosity).toArray()))
                .numbers(
                        "share of η₀",
                        "%",
                        Doubles.of(modes.stream()
                                .mapToDouble(m -> 100 * m.viscosity() / all)
                                .toArray()));
    }

    @Override
    public List<Figure> figures() {
        double low = 0.1 / modes.get(modes.size() - 1).time();
        double high = 10 / modes.get(0).time();
        Doubles frequencies = spread(low, high);
        Figure moduli = Figure.titled("Moduli of the spectrum")
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("moduli G′, G″", "Pa", Axis.Scale.LOG))
                .line("G′", frequencies, frequencies.map(this::storage))
                .dashed("G″", frequencies, frequencies.map(this::loss))
                .build();
        return List.of(modeFigure(), moduli);
    }

    Figure modeFigure() {
        return Figure.titled("Modes of the spectrum")
                .x(Quantity.RELAXATION_TIME)
                .y(new Axis("modulus g", "Pa", Axis.Scale.LOG))
                .marks("g", times(), moduli())
                .build();
    }

    /** Twenty points a decade from low to high, ends included. */
    static Doubles spread(double low, double high) {
        return Doubles.logSpaced(low, high, 2 + (int) Math.ceil(POINTS_A_DECADE * Math.log10(high / low)));
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof RelaxationSpectrum that && modes.equals(that.modes);
    }

    @Override
    public int hashCode() {
        return modes.hashCode();
    }

    @Override
    public String toString() {
        return headline();
    }
}
