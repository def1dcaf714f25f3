package org.meltbook.scenario;

import java.util.List;
import java.util.function.ToDoubleFunction;

/**
 * The fluid behind the invented data: a memory integral that no factorable model can equal, because each mode has a
 * damping of its own,
 *
 * <pre>τ = Σ ∫₀^∞ (g/λ) exp(−s/λ) exp(−n γ) [(1 − ψ) C⁻¹ − ψ C] ds</pre>
 *
 * with the Finger tensor C⁻¹ and the Cauchy tensor C of the deformation since {@code s} ago and γ its shear. In other
 * flows γ stands for the root of βI₁ + (1 − β)I₂ − 3, which in simple shear is γ for any β. Steady shear has
 * the closed forms below; ψ differs between the modes, so −N2/N1 changes with the rate. In oscillation of small
 * amplitude only g and λ count. Strict arithmetic is used so that the data are the same on every machine.
 */
record HiddenFluid(List<Mode> modes) {

    /**
     * One mode.
     *
     * @param modulus      g in Pa
     * @param time         λ in s
     * @param damping      n, no unit
     * @param secondNormal ψ = −N2/N1 of the mode, no unit
     */
    record Mode(double modulus, double time, double damping, double secondNormal) {}

    /** Copies the modes. */
    HiddenFluid {
        modes = List.copyOf(modes);
    }

    /** Storage modulus in Pa at {@code frequency} in rad/s. */
    double storage(double frequency) {
        return sum(mode -> {
            double x = frequency * mode.time();
            return mode.modulus() * x * x / (1 + x * x);
        });
    }

    /** Loss modulus in Pa at {@code frequency} in rad/s. */
    double loss(double frequency) {
        return sum(mode -> {
            double x = frequency * mode.time();
            return mode.modulus() * x / (1 + x * x);
        });
    }

    /** Viscosity in Pa·s of steady shear at {@code rate} in 1/s: Σ g λ/(1 + n λ γ̇)². */
    double viscosity(double rate) {
        return sum(mode -> {
            double slowed = 1 + mode.damping() * mode.time() * rate;
            return mode.modulus() * mode.time() / (slowed * slowed);
        });
    }

    /** First normal stress coefficient in Pa·s² of steady shear at {@code rate} in 1/s: 2 Σ g λ²/(1 + n λ γ̇)³. */
    double firstNormalCoefficient(double rate) {
        return sum(mode -> firstNormalCoefficient(mode, rate));
    }

    /** Second normal stress coefficient in Pa·s² at {@code rate} in 1/s: −ψ times the first, mode by mode. */
    double secondNormalCoefficient(double rate) {
        return sum(mode -> -mode.secondNormal() * firstNormalCoefficient(mode, rate));
    }

    private static double firstNormalCoefficient(Mode mode, double rate) {
        double slowed = 1 + mode.damping() * mode.time() * rate;
        return 2 * mode.modulus() * mode.time() * mode.time() / (slowed * slowed * slowed);
    }

    private double sum(ToDoubleFunction<Mode> part) {
        double sum = 0;
        for (Mode mode : modes) {
            sum += part.applyAsDouble(mode);
        }
        return sum;
    }
}
