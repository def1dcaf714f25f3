package org.meltbook.chart;

import org.meltbook.base.Doubles;
import org.meltbook.figure.Axis;
import org.meltbook.figure.Figure;
import org.meltbook.units.Quantity;

/** Figures of an invented fluid with one relaxation time, for tests. */
final class Samples {
    private Samples() {}

    /** Storage and loss modulus of g = 10⁵ Pa, λ = 1 s, as points with lines through them. */
    static Drawing moduli() {
        Doubles points = Doubles.logSpaced(0.01, 100, 17);
        Doubles fine = Doubles.logSpaced(0.01, 100, 200);
        return Drawing.of(Figure.titled("One mode, invented")
                .x(Quantity.ANGULAR_FREQUENCY)
                .y(new Axis("storage and loss modulus G′, G″", "Pa", Axis.Scale.LOG))
                .marks("G′", points, points.map(Samples::storage))
                .likeBefore()
                .line("G′, fit", fine, fine.map(Samples::storage))
                .marks("G″", points, points.map(Samples::loss))
                .likeBefore()
                .dashed("G″, fit", fine, fine.map(Samples::loss))
                .build());
    }

    /** A figure on logarithmic axes. */
    static Figure.Builder loglog() {
        return Figure.titled("Flow curve").x(Quantity.SHEAR_RATE).y(Quantity.VISCOSITY);
    }

    private static double storage(double w) {
        return 1e5 * w * w / (1 + w * w);
    }

    private static double loss(double w) {
        return 1e5 * w / (1 + w * w);
    }
}
