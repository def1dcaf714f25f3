package org.meltbook.viscosity;

import org.meltbook.base.Doubles;
import org.meltbook.fit.Parameter;
import org.meltbook.fit.Parameter.Scale;
import org.meltbook.units.Require;

/**
 * A straight line in logarithms, {@code η = K γ̇^(n−1)}. Without a plateau: for n below 1 the viscosity grows without
 * bound as the rate goes to zero. Source: W. Ostwald, Kolloid-Zeitschrift 36 (1925) 99, and A. de Waele, 1923 (memory).
 *
 * @param k consistency in Pa·sⁿ, above zero
 * @param n exponent of the stress, no unit, 0 to 3
 */
public record PowerLaw(double k, double n) implements ViscosityLaw {
    /** The family: parameters {@code k} and {@code n}. */
    public static final LawFamily FAMILY = LawFamily.named("power law")
            .formula("η = K γ̇^(n−1)")
            .source("W. Ostwald, Kolloid-Zeitschrift 36 (1925) 99; A. de Waele, 1923 (memory)")
            .parameter(Parameter.positive("k", "consistency K", "Pa·sⁿ"))
            .parameter(
                    Parameter.positive("n", "exponent n", "1").on(Scale.LINEAR).within(0, 3))
            .made(v -> new PowerLaw(v.at(0), v.at(1)))
            .startingFrom(shape -> {
                double n = Math.min(2.9, Math.max(0.05, 1 + shape.slope()));
                double middle =
                        Math.exp(shape.rates().stream().map(Math::log).average().orElseThrow());
                return Doubles.of(shape.mean() * Math.pow(middle, 1 - n), n);
            })
            .build();

    /** Checks the constants. */
    public PowerLaw {
        Require.positive("k", k, "Pa·sⁿ");
        Require.within("n", n, 0, 3, "1");
    }

    @Override
    public LawFamily family() {
        return FAMILY;
    }

    @Override
    public Doubles values() {
        return Doubles.of(k, n);
    }

    @Override
    public double at(double rate) {
        return k * Math.pow(Require.notNegative("shear rate", rate, "1/s"), n - 1);
    }

    @Override
    public void gradient(double rate, double[] into) {
        into[0] = Math.pow(rate, n - 1);
        into[1] = at(rate) * Math.log(rate);
    }

    @Override
    public double zeroRateLimit() {
        return at(0);
    }

    @Override
    public double infiniteRateLimit() {
        return k * Math.pow(Double.POSITIVE_INFINITY, n - 1);
    }

    /**
     * Exponent of the stress when the rate is written as a power of it, 1/n: how creep laws of rock models are quoted.
     */
    public double stressExponent() {
        return 1 / n;
    }
}
