package org.meltbook.flow;

import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.units.Require;

/**
 * Simple shear at one rate since always.
 *
 * @param rate shear rate in 1/s, zero or more
 */
public record SteadyShear(double rate) implements Flow {
    static final List<Component> COMPONENTS = List.of(Component.XX, Component.YY, Component.ZZ, Component.XY);

    /** Checks the rate. */
    public SteadyShear {
        Require.notNegative("shear rate", rate, "1/s");
    }

    @Override
    public String name() {
        return "steady shear at " + NumberText.of(rate) + " 1/s";
    }

    @Override
    public VelocityGradient gradient(double time) {
        Require.finite("time", time, "s");
        return VelocityGradient.simpleShear(rate);
    }

    @Override
    public Doubles changes() {
        return Doubles.of();
    }

    @Override
    public List<Component> components() {
        return COMPONENTS;
    }
}
