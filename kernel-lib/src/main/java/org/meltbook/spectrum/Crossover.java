package org.meltbook.spectrum;

import java.util.ArrayList;
import java.util.List;
import java.util.function.DoubleUnaryOperator;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.apache.commons.math3.analysis.solvers.BrentSolver;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;
import org.meltbook.fit.PredictionRows;
import org.meltbook.units.Prediction;
import org.meltbook.units.Quantity;

/**
 * Where storage and loss modulus are equal.
 *
 * @param frequency angular frequency in rad/s
 * @param modulus   G′ = G″ there, in Pa
 */
public record Crossover(Prediction frequency, Prediction modulus) implements Exhibit {
    /** The crossovers of a spectrum at angular frequencies in rad/s between {@code low} and {@code high}, rising. */
    static List<Crossover> of(Refitted fit, double low, double high) {
        if (!(high > low)) {
            return List.of();
        }
        Doubles found = frequencies(fit.spectrum(), low, high);
        if (found.isEmpty()) {
            return List.of();
        }
        List<Doubles> again =
                fit.again().stream().map(s -> frequencies(s, low, high)).toList();
        return IntStream.range(0, found.size())
                .mapToObj(place -> crossover(fit, found, again, place))
                .toList();
    }

    private static Crossover crossover(Refitted fit, Doubles found, List<Doubles> again, int place) {
        double at = found.at(place);
        double modulus = fit.spectrum().storage(at);
        double[] places = again.stream()
                .mapToDouble(other -> other.size() == found.size() ? other.at(place) : Double.NaN)
                .toArray();
        Interval frequencies = Interval.about(at, DoubleStream.of(places));
        Interval moduli = Interval.about(
                modulus,
                IntStream.range(0, places.length)
                        .mapToDouble(k -> places[k] > 0 ? fit.again().get(k).storage(places[k]) : Double.NaN));
        String name = found.size() == 1 ? "crossover" : "crossover " + (place + 1);
        return new Crossover(
                Prediction.of(
                        name + " frequency", Quantity.ANGULAR_FREQUENCY, at, frequencies.low(), frequencies.high()),
                Prediction.of(name + " modulus", Quantity.STORAGE_MODULUS, modulus, moduli.low(), moduli.high()));
    }

    /**
     * Angular frequencies in rad/s between {@code low} and {@code high} where the moduli of a spectrum are equal,
     * rising.
     */
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
    public String headline() {
        return "The moduli cross at ω = " + NumberText.of(frequency.value()) + " rad/s with G′ = G″ = "
                + NumberText.of(modulus.value()) + " Pa.";
    }

    @Override
    public List<Rows> rows() {
        return List.of(PredictionRows.of("Crossover", List.of(frequency, modulus)));
    }

    @Override
    public List<Figure> figures() {
        return List.of();
    }

    @Override
    public String toString() {
        return headline();
    }
}
