package org.meltbook.constitutive;

import java.util.List;
import org.apache.commons.math3.special.Gamma;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.flow.Flow;
import org.meltbook.flow.VelocityGradient;
import org.meltbook.spectrum.RelaxationSpectrum;
import org.meltbook.units.Require;

/**
 * The rubber-like liquid with damped memory: {@code τ(t) = ∫ m(t − t′) h(γ) C⁻¹ dt′} with the memory of a relaxation
 * spectrum, {@code m(s) = Σ (g/λ) exp(−s/λ)}, and the damping {@code h(γ) = exp(−n γ)} of the shear γ between t′ and t.
 * n = 0 is the rubber-like liquid itself. Simple shear that is steady or starts once is done by closed form; N₂ is
 * zero. Source: M. H. Wagner, Rheol. Acta 15 (1976) 136; n = 0.143 for the LDPE Melt I (memory).
 *
 * @param spectrum moduli g in Pa and relaxation times λ in s
 * @param damping  n, no unit, zero or more
 */
public record DampedIntegral(RelaxationSpectrum spectrum, double damping) implements ConstitutiveModel {
    /** Checks the damping. */
    public DampedIntegral {
        Require.notNegative("damping n", damping, "1");
    }

    @Override
    public String name() {
        return damping == 0 ? "rubber-like liquid" : "damped integral model";
    }

    @Override
    public String source() {
        return "M. H. Wagner, Rheol. Acta 15 (1976) 136 (memory)";
    }

    @Override
    public List<String> limits() {
        return List.of(
                "the damping n was measured in single steps of shear; on a reversal this form would let the network "
                        + "heal, which melts do not do, so reversals are refused",
                "n holds for shear only; extension needs a damping of its own",
                "N₂ = 0 in this model; measured melts have a small negative one");
    }

    @Override
    public Stress stress(Flow flow, double time) {
        Require.finite("time", time, "s");
        double rate = shearRate(flow, time);
        double since = flow.changes().isEmpty()
                ? Double.POSITIVE_INFINITY
                : Math.max(0, time - flow.changes().at(0));
        double shear = 0;
        double normal = 0;
        for (RelaxationSpectrum.Mode mode : spectrum.modes()) {
            double slowed = 1 + damping * mode.time() * rate;
            double strain = mode.time() * rate / slowed;
            double reduced = since * slowed / mode.time();
            double untouched = Math.exp(-reduced); // share of the memory from before the start
            double total = untouched == 0 ? 0 : rate * since;
            shear += mode.modulus() * (strain / slowed * grown(2, reduced) + total * untouched);
            normal += mode.modulus() * (2 * strain * strain / slowed * grown(3, reduced) + total * total * untouched);
        }
        return Stress.shear(normal, 0, 0, shear);
    }

    /** 1 − e^−x (1 + x + … + x^(k−1)/(k−1)!), accurate for small x too. */
    private static double grown(int k, double x) {
        return x == 0 ? 0 : Double.isInfinite(x) ? 1 : Gamma.regularizedGammaP(k, x);
    }

    /** The rate of a history of simple shear at one rate, since always or since one start from rest. */
    private static double shearRate(Flow flow, double time) {
        Doubles changes = flow.changes();
        boolean once = changes.isEmpty()
                || changes.size() == 1
                        && flow.gradient(Math.nextDown(changes.at(0))).equals(VelocityGradient.REST);
        VelocityGradient gradient = flow.gradient(changes.isEmpty() ? time : changes.at(0));
        double rate = gradient.at(0, 1);
        if (once && rate >= 0 && gradient.equals(VelocityGradient.simpleShear(rate))) {
            return rate;
        }
        throw new RangeException(
                "the damped integral model has closed forms for simple shear that is steady or starts once "
                        + "from rest; found " + flow.name());
    }
}
