package org.meltbook.constitutive;

import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.flow.Flow;
import org.meltbook.spectrum.RelaxationSpectrum;

/**
 * A fluid with memory: what extra stress it carries in a homogeneous flow.
 *
 * <p>Contract: (1) immutable; (2) at low rates it tends to the linear viscoelasticity of its spectrum; (3) {@code
 * stress} gives the stress at a time in s after the whole history of the flow up to it, the rest or steady flow before
 * its first change included; (4) a flow that it cannot do, or that has no finite answer, throws with the reason.
 */
public interface ConstitutiveModel {
    /** What the model is called. */
    String name();

    /** Where it was published. */
    String source();

    /** Its linear relaxation spectrum. */
    RelaxationSpectrum spectrum();

    /** What to mind with this model, whatever the flow. */
    List<String> limits();

    /**
     * The extra stress at a time.
     *
     * @param time time in s on the clock of the flow
     * @throws org.meltbook.base.RangeException if the model cannot do the flow, or the stress there has no bound
     */
    Stress stress(Flow flow, double time);

    /** Steady shear at many rates in 1/s, above zero: viscosity, N₁, N₂ and their coefficients. */
    default SteadyShearResponse steadyShear(Doubles rates) {
        return SteadyShearResponse.of(this, rates, Progress.QUIET);
    }

    /** Start-up of shear at a rate in 1/s, above zero, at many times in s, zero or more: growth of stress and N₁. */
    default StartUpResponse startUpShear(double rate, Doubles times) {
        return StartUpResponse.of(this, rate, times, Progress.QUIET);
    }
}
