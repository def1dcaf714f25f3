package org.meltbook.flow;

import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.units.Require;

/**
 * Simple shear that starts at time zero, after a rest since always.
 *
 * @param rate shear rate from time zero on in 1/s, zero or more
 */
public record StartUpShear(double rate) implements Flow {
    /** Checks the rate. */
    public StartUpShear {
        Require.notNegative("shear rate", rate, "1/s");
    }

    @Override
    public String name() {
        return "start-up of shear at " + NumberText.of(rate) + " 1/s";
    }

    @Override
    public VelocityGradient gradient(double time) {
        return Require.finite("time", time, "s") < 0 ? VelocityGradient.REST : VelocityGradient.simpleShear(rate);
    }

    @Override
    public Doubles changes() {
        return Doubles.of(0);
    }

    @Override
    public List<Component> components() {
        return SteadyShear.COMPONENTS;
    }
}
