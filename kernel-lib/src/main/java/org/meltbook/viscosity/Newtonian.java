package org.meltbook.viscosity;

import org.meltbook.base.Doubles;
import org.meltbook.fit.Parameter;
import org.meltbook.units.Require;

/**
 * The same viscosity at every rate, {@code η = η₀}. Source: I. Newton, Principia, 1687, book II, section IX (memory).
 *
 * @param eta0 viscosity in Pa·s, above zero
 */
public record Newtonian(double eta0) implements ViscosityLaw {
    /** The family: one parameter, {@code eta0}. */
    public static final LawFamily FAMILY = LawFamily.named("Newtonian law")
            .formula("η = η₀")
            .source("I. Newton, Principia, 1687, book II, section IX (memory)")
            .parameter(Parameter.positive("eta0", "viscosity η₀", "Pa·s"))
            .made(v -> new Newtonian(v.at(0)))
            .startingFrom(shape -> Doubles.of(shape.mean()))
            .build();

    /** Checks the constant. */
    public Newtonian {
        Require.positive("eta0", eta0, "Pa·s");
    }

    @Override
    public LawFamily family() {
        return FAMILY;
    }

    @Override
    public Doubles values() {
        return Doubles.of(eta0);
    }

    @Override
    public double at(double rate) {
        Require.notNegative("shear rate", rate, "1/s");
        return eta0;
    }

    @Override
    public void gradient(double rate, double[] into) {
        into[0] = 1;
    }

    @Override
    public double zeroRateLimit() {
        return eta0;
    }

    @Override
    public double infiniteRateLimit() {
        return eta0;
    }
}
