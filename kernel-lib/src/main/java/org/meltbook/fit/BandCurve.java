package org.meltbook.fit;

import java.util.Objects;
import org.meltbook.figure.Axis;

/**
 * A function of the parameters along x, whose band is wanted.
 *
 * @param name    what it is called
 * @param x       what x is
 * @param y       what the function is; with a logarithmic axis the band of the standard errors is worked out on ln y
 * @param formula its value from x and all parameters, in the order of {@link Problem#parameters()}; smooth, keeps
 *     neither and changes nothing
 */
public record BandCurve(String name, Axis x, Axis y, Model.Formula formula) {
    /** Checks that all is there. */
    public BandCurve {
        Objects.requireNonNull(name, "name");
        Objects.requireNonNull(x, "x");
        Objects.requireNonNull(y, "y");
        Objects.requireNonNull(formula, "formula");
    }

    /** The fitted model of a data set, counted from zero. */
    public static BandCurve model(Fit fit, int dataSet) {
        Problem problem = fit.problem();
        DataSet set = problem.dataSets().get(dataSet);
        int[] places = set.model().parameters().stream()
                .mapToInt(parameter -> problem.place(parameter.name()))
                .toArray();
        return new BandCurve(set.model().name(), set.xAxis(), set.yAxis(), (x, all) -> {
            double[] own = new double[places.length];
            for (int k = 0; k < own.length; k++) {
                own[k] = all[places[k]];
            }
            return set.model().at(x, own);
        });
    }

    boolean logarithmic() {
        return y.scale() == Axis.Scale.LOG;
    }
}
