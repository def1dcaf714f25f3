package org.meltbook.viscosity;

import org.meltbook.base.Doubles;
import org.meltbook.fit.Parameter;
import org.meltbook.fit.Parameter.Scale;
import org.meltbook.units.Require;

/**
 * The Cross law without a lower plateau, {@code η = η₀ / (1 + (λ γ̇)^m)}: η₀ at low rates, a power law of exponent −m
 * at high ones, half of η₀ at γ̇ = 1/λ. Source: M. M. Cross, J. Colloid Sci. 20 (1965) 417 (memory).
 *
 * @param eta0   zero-shear viscosity in Pa·s, above zero
 * @param lambda time constant in s, above zero
 * @param m      thinning exponent, no unit, 0 to 1 (above 1 the stress would fall with the rate)
 */
public record Cross(double eta0, double lambda, double m) implements ViscosityLaw {
    /** The family: parameters {@code eta0}, {@code lambda} and {@code m}. */
    public static final LawFamily FAMILY = LawFamily.named("Cross law")
            .formula("η = η₀ / (1 + (λ γ̇)^m)")
            .source("M. M. Cross, J. Colloid Sci. 20 (1965) 417 (memory)")
            .parameter(Parameter.positive("eta0", "zero-shear viscosity η₀", "Pa·s"))
            .parameter(Parameter.positive("lambda", "time constant λ", "s"))
            .parameter(Parameter.positive("m", "thinning exponent m", "1")
                    .on(Scale.LINEAR)
                    .within(0, 1))
            .made(v -> new Cross(v.at(0), v.at(1), v.at(2)))
            .startingFrom(shape -> Doubles.of(shape.lowEnd().mean(), shape.bendTime(), -shape.thinning()))
            .build();

    /** Checks the constants. */
    public Cross {
        Require.positive("eta0", eta0, "Pa·s");
        Require.positive("lambda", lambda, "s");
        Require.within("m", m, 0, 1, "1");
    }

    @Override
    public LawFamily family() {
        return FAMILY;
    }

    @Override
    public Doubles values() {
        return Doubles.of(eta0, lambda, m);
    }

    @Override
    public double at(double rate) {
        return eta0 / (1 + Math.pow(lambda * Require.notNegative("shear rate", rate, "1/s"), m));
    }

    @Override
    public void gradient(double rate, double[] into) {
        double reduced = Math.pow(lambda * rate, m);
        double share = 1 / (1 + reduced);
        double slope = -eta0 * share / (1 + 1 / reduced); // −η₀ q/(1+q)², finite for any q
        into[0] = share;
        into[1] = slope * m / lambda;
        into[2] = slope * Math.log(lambda * rate);
    }

    @Override
    public double zeroRateLimit() {
        return m == 0 ? eta0 / 2 : eta0;
    }

    @Override
    public double infiniteRateLimit() {
        return m == 0 ? eta0 / 2 : 0;
    }
}
