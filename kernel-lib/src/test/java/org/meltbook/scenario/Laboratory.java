package org.meltbook.scenario;

import java.util.ArrayList;
import java.util.List;
import java.util.function.ToDoubleFunction;
import org.meltbook.scenario.Protocol.Point;
import org.meltbook.scenario.Truth.Lot;

/** The invented laboratory: what its instruments read off a lot, in SI units. */
final class Laboratory {
    private static final double ZERO_CELSIUS = 273.15;
    private final Truth truth;

    /** A laboratory in a world where {@code truth} holds. */
    Laboratory(Truth truth) {
        this.truth = truth;
    }

    /** Angular frequency, storage and loss modulus and time of a frequency sweep on a fresh sample. */
    List<Column> frequencySweep(Lot lot, int celsius, Scatter scatter) {
        List<Point> points = Protocol.frequencySweep();
        List<Double> storage = new ArrayList<>();
        List<Double> loss = new ArrayList<>();
        for (Point point : points) {
            HiddenFluid fluid = truth.fluid(lot, celsius + ZERO_CELSIUS, point.time());
            double trueStorage = fluid.storage(point.setting());
            double trueLoss = fluid.loss(point.setting());
            storage.add(scatter.about(trueStorage, truth.noise().ofModulus(trueStorage)));
            loss.add(scatter.about(trueLoss, truth.noise().ofModulus(trueLoss)));
        }
        return List.of(
                column("angular frequency", "ω", "rad/s", points, Point::setting),
                new Column("storage modulus", "G'", "Pa", storage),
                new Column("loss modulus", "G''", "Pa", loss),
                column("time", "t", "s", points, Point::time));
    }

    /**
     * Shear rate, shear stress, viscosity, first normal stress difference and time of a steady flow curve on a fresh
     * sample. The viscosity is the noisy stress over the rate, as an instrument works it out.
     */
    List<Column> flowCurve(Lot lot, int celsius, Scatter scatter) {
        List<Point> points = Protocol.flowCurve();
        List<Double> stress = new ArrayList<>();
        List<Double> viscosity = new ArrayList<>();
        List<Double> firstNormal = new ArrayList<>();
        for (Point point : points) {
            double rate = point.setting();
            HiddenFluid fluid = truth.fluid(lot, celsius + ZERO_CELSIUS, point.time());
            double trueStress = fluid.viscosity(rate) * rate;
            double trueDifference = fluid.firstNormalCoefficient(rate) * rate * rate;
            double reading = scatter.about(trueStress, truth.noise().ofStress(trueStress));
            stress.add(reading);
            viscosity.add(reading / rate);
            firstNormal.add(scatter.about(trueDifference, truth.noise().ofFirstNormal(trueDifference)));
        }
        return List.of(
                column("shear rate", "γ̇", "1/s", points, Point::setting),
                new Column("shear stress", "σ", "Pa", stress),
                new Column("viscosity", "η", "Pa·s", viscosity),
                new Column("first normal stress difference", "N1", "Pa", firstNormal),
                column("time", "t", "s", points, Point::time));
    }

    private static Column column(
            String label, String symbol, String unit, List<Point> points, ToDoubleFunction<Point> value) {
        return new Column(
                label, symbol, unit, points.stream().mapToDouble(value).boxed().toList());
    }
}
