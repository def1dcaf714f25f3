package org.meltbook.viscosity;

import org.meltbook.base.Doubles;
import org.meltbook.fit.Parameter;
import org.meltbook.fit.Parameter.Scale;
import org.meltbook.units.Require;

/**
 * The Carreau–Yasuda law, {@code η = η∞ + (η₀ − η∞) [1 + (λ γ̇)^a]^((n−1)/a)}; a = 2 is the Carreau law. Melts are
 * hardly ever measured down to η∞, so fits hold it at zero unless it is freed: {@code
 * CarreauYasuda.FAMILY.freeing("etaInf")}. Sources: P. J. Carreau, Trans. Soc. Rheol. 16 (1972) 99; K. Yasuda, R. C.
 * Armstrong, R. E. Cohen, Rheol. Acta 20 (1981) 163 (memory).
 *
 * @param eta0   zero-shear viscosity in Pa·s, above zero
 * @param lambda time constant in s, above zero
 * @param a      breadth of the bend, no unit, 0.05 to 50
 * @param n      exponent of the stress at high rates, no unit, 0 to 1
 * @param etaInf viscosity at infinite rate in Pa·s, zero or more
 */
public record CarreauYasuda(double eta0, double lambda, double a, double n, double etaInf) implements ViscosityLaw {
    /** The family: parameters {@code eta0}, {@code lambda}, {@code a}, {@code n}, and {@code etaInf} held at zero. */
    public static final LawFamily FAMILY = LawFamily.named("Carreau–Yasuda law")
            .formula("η = η∞ + (η₀ − η∞) [1 + (λ γ̇)^a]^((n−1)/a)")
            .source("P. J. Carreau, Trans. Soc. Rheol. 16 (1972) 99; K. Yasuda, R. C. Armstrong, R. E. Cohen, "
                    + "Rheol. Acta 20 (1981) 163 (memory)")
            .parameter(Parameter.positive("eta0", "zero-shear viscosity η₀", "Pa·s"))
            .parameter(Parameter.positive("lambda", "time constant λ", "s"))
            .parameter(Parameter.positive("a", "breadth of the bend a", "1").within(0.05, 50))
            .parameter(
                    Parameter.positive("n", "exponent n", "1").on(Scale.LINEAR).within(0, 1))
            .parameter(Parameter.positive("etaInf", "infinite-rate viscosity η∞", "Pa·s")
                    .on(Scale.LINEAR)
                    .heldAt(0))
            .made(v -> new CarreauYasuda(v.at(0), v.at(1), v.at(2), v.at(3), v.at(4)))
            .curve(CarreauYasuda::curve)
            .startingFrom(shape -> Doubles.of(shape.lowEnd().mean(), shape.bendTime(), 1, 1 + shape.thinning(), 0))
            .build();

    /** Checks the constants. */
    public CarreauYasuda {
        Require.positive("eta0", eta0, "Pa·s");
        Require.positive("lambda", lambda, "s");
        Require.within("a", a, 0.05, 50, "1");
        Require.within("n", n, 0, 1, "1");
        Require.notNegative("etaInf", etaInf, "Pa·s");
    }

    /** The law without a lower plateau, η∞ = 0. */
    public static CarreauYasuda of(double eta0, double lambda, double a, double n) {
        return new CarreauYasuda(eta0, lambda, a, n, 0);
    }

    @Override
    public LawFamily family() {
        return FAMILY;
    }

    @Override
    public Doubles values() {
        return Doubles.of(eta0, lambda, a, n, etaInf);
    }

    @Override
    public double at(double rate) {
        return etaInf + (eta0 - etaInf) * share(Require.notNegative("shear rate", rate, "1/s"));
    }

    /** [1 + (λ γ̇)^a]^((n−1)/a). */
    private double share(double rate) {
        return Math.exp((n - 1) / a * logBracket(a * Math.log(lambda * rate)));
    }

    /** ln(1 + e^z), without overflow. */
    private static double logBracket(double z) {
        return z > 0 ? z + Math.log1p(Math.exp(-z)) : Math.log1p(Math.exp(z));
    }

    @Override
    public void gradient(double rate, double[] into) {
        double log = Math.log(lambda * rate);
        double bracket = logBracket(a * log);
        double share = share(rate);
        double thinned = 1 / (1 + Math.exp(-a * log));
        double span = (eta0 - etaInf) * share;
        into[0] = share;
        into[1] = span * (n - 1) * thinned / lambda;
        into[2] = span * (n - 1) / a * (thinned * log - bracket / a);
        into[3] = span * bracket / a;
        into[4] = 1 - share;
    }

    /** The numbers of {@link #at} and {@link #gradient} from one logarithm and two exponentials a rate. */
    private static void curve(double[] rates, double[] constants, double[] viscosities, double[] derivatives) {
        double eta0 = constants[0];
        double lambda = constants[1];
        double a = constants[2];
        double n = constants[3];
        double etaInf = constants[4];
        double power = (n - 1) / a;
        int count = rates.length;
        for (int i = 0; i < count; i++) {
            double log = Math.log(lambda * rates[i]);
            double z = a * log;
            double small = Math.exp(-Math.abs(z));
            double sum = 1 + small;
            double bracket = sum == 1 ? small : Math.log(sum) * (small / (sum - 1)); // ln(1 + small), all digits
            bracket += Math.max(z, 0);
            double share = Math.exp(power * bracket);
            viscosities[i] = etaInf + (eta0 - etaInf) * share;
            if (derivatives.length > 0) {
                double thinned = (z > 0 ? 1 : small) / sum;
                double span = (eta0 - etaInf) * share;
                derivatives[i] = share;
                derivatives[count + i] = span * (n - 1) * thinned / lambda;
                derivatives[2 * count + i] = span * power * (thinned * log - bracket / a);
                derivatives[3 * count + i] = span * bracket / a;
                derivatives[4 * count + i] = 1 - share;
            }
        }
    }

    @Override
    public double zeroRateLimit() {
        return eta0;
    }

    @Override
    public double infiniteRateLimit() {
        return n < 1 ? etaInf : eta0;
    }
}
