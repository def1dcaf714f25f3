package org.meltbook.fit;

import java.util.List;

/** A model known by its values alone: derivatives are central differences, extrapolated once to step zero. */
record DifferencedModel(String name, List<Parameter> parameters, Formula formula) implements Model {
    /** Share of a parameter by which it is changed: rounding and the left-over fourth-order term are about equal. */
    private static final double STEP = 2e-4;
    /** A change below this share of the value drowns in rounding. */
    private static final double SEEN = 1e-9;

    DifferencedModel {
        parameters = List.copyOf(parameters);
    }

    @Override
    public double at(double x, double[] values) {
        return formula.at(x, values);
    }

    @Override
    public void gradient(double x, double[] values, double[] into) {
        double[] changed = values.clone();
        for (int k = 0; k < values.length; k++) {
            into[k] = slope(x, changed, k);
        }
    }

    private double slope(double x, double[] values, int k) {
        double kept = values[k];
        Parameter parameter = parameters.get(k);
        double room = Math.min(kept - parameter.low(), parameter.high() - kept);
        double step = STEP * (kept == 0 ? STEP : Math.abs(kept));
        if (room < step) {
            double inward = kept - parameter.low() < parameter.high() - kept ? step : -step;
            return oneSided(x, values, k, inward);
        }
        double least = SEEN * Math.abs(formula.at(x, values));
        double wide = difference(x, values, k, step);
        while (Math.abs(wide) <= least && step < STEP && 100 * step <= room) {
            step *= 100; // near zero a share of the parameter changes nothing that could be seen
            wide = difference(x, values, k, step);
        }
        return (8 * difference(x, values, k, step / 2) - wide) / (6 * step);
    }

    /** f(p + h) − f(p − h). */
    private double difference(double x, double[] values, int k, double h) {
        double kept = values[k];
        values[k] = kept + h;
        double above = formula.at(x, values);
        values[k] = kept - h;
        double below = formula.at(x, values);
        values[k] = kept;
        return above - below;
    }

    /** Fourth-order one-sided difference with steps h, for a parameter at its bound. */
    private double oneSided(double x, double[] values, int k, double h) {
        double kept = values[k];
        double sum = -25 * formula.at(x, values);
        int[] shares = {48, -36, 16, -3};
        for (int i = 0; i < shares.length; i++) {
            values[k] = kept + (i + 1) * h;
            sum += shares[i] * formula.at(x, values);
        }
        values[k] = kept;
        return sum / (12 * h);
    }
}
