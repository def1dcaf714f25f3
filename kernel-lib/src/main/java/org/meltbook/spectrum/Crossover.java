package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.analysis.solvers.BrentSolver;
import org.meltbook.base.Doubles;
import org.meltbook.units.Prediction;

/**
 * Where storage and loss modulus are equal.
 *
 * @param frequency angular frequency in rad/s
 * @param modulus   G′ = G″ there, in Pa
 */
public record Crossover(Prediction frequency, Prediction modulus) {
    /** Angular frequencies in rad/s between {@code low} and {@code high} where the moduli of a spectrum are equal, rising. */
    static Doubles frequencies(RelaxationSpectrum spectrum, double low, double high) {
        DoubleUnaryOperator lead = log -> Math.log(spectrum.storage(Math.exp(log)) / spectrum.loss(Math.exp(log)));
        double[] logs = RelaxationSpectrum.spread(low, high).map(Math::log).toArray();
        List<Double> found = new ArrayList<>();
        for (int i = 1; i < logs.length; i++) {
            double before = lead.applyAsDouble(logs[i - 1]);
            double after = lead.applyAsDouble(logs[i]);
            if (before == 0) {
                found.add(Math.exp(logs[i - 1]));
            } else if (before * after < 0) {
                found.add(Math.exp(new BrentSolver(1e-12).solve(200, lead::applyAsDouble, logs[i - 1], logs[i])));
            }
        }
        return Doubles.of(found.stream().mapToDouble(Double::doubleValue).toArray());
    }

    @Override
    public String toString() {
        return frequency + "; " + modulus;
    }
}
