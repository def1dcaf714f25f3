package org.meltbook.fit;

import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.figure.Axis;
import org.meltbook.units.Require;

/** Points, the model that should run through them, and how far they may lie from it. Immutable; wrong input throws. */
public final class DataSet {
    private final String name;
    private final Model model;
    private final Doubles x;
    private final Doubles y;
    private final Weighting weighting;
    private final Doubles deviations;
    private final boolean sizeKnown;
    private final Axis xAxis;
    private final Axis yAxis;

    private DataSet(Draft draft) {
        this.name = draft.name;
        this.model = draft.model;
        this.x = draft.x;
        this.y = draft.y;
        this.weighting = draft.weighting;
        this.deviations = draft.deviations;
        this.sizeKnown = draft.sizeKnown;
        this.xAxis = draft.xAxis;
        this.yAxis = draft.yAxis;
        check();
    }

    /**
     * Points with equal absolute errors of unknown size.
     *
     * @throws RangeException if there are not as many x as y, or one is not finite
     */
    public static DataSet of(String name, Model model, Doubles x, Doubles y) {
        return new DataSet(new Draft(name, model, x, y));
    }

    /** The same with the same absolute error at every point, its size not known. */
    public DataSet equal() {
        return weighted(Weighting.EQUAL, Doubles.of(1), false);
    }

    /** The same with a known standard deviation, in the unit of y. */
    public DataSet absolute(double deviation) {
        Require.positive("standard deviation", deviation, yAxis.unit());
        return weighted(Weighting.EQUAL, Doubles.of(deviation), true);
    }

    /** The same with the same relative error at every point, its size not known. */
    public DataSet relative() {
        return weighted(Weighting.RELATIVE, Doubles.of(1), false);
    }

    /** The same with a known relative standard deviation: 0.03 is 3 % of the measured value. */
    public DataSet relative(double share) {
        Require.positive("relative standard deviation", share, "1");
        return weighted(Weighting.RELATIVE, Doubles.of(share), true);
    }

    /** The same with the same error of ln y at every point, its size not known. */
    public DataSet logarithmic() {
        return weighted(Weighting.LOGARITHMIC, Doubles.of(1), false);
    }

    /** The same with a known standard deviation of ln y. */
    public DataSet logarithmic(double deviation) {
        Require.positive("standard deviation of the logarithm", deviation, "1");
        return weighted(Weighting.LOGARITHMIC, Doubles.of(deviation), true);
    }

    /** The same with a standard deviation for each point, in the unit of y. */
    public DataSet deviations(Doubles each) {
        return weighted(Weighting.DEVIATIONS, each, true);
    }

    /** The same with axes that say what x and y are. */
    public DataSet axes(Axis horizontal, Axis vertical) {
        Draft draft = new Draft(this);
        draft.xAxis = horizontal;
        draft.yAxis = vertical;
        return new DataSet(draft);
    }

    /** The same places with other measured values. */
    public DataSet measured(Doubles values) {
        Draft draft = new Draft(this);
        draft.y = values;
        return new DataSet(draft);
    }

    private DataSet weighted(Weighting kind, Doubles sizes, boolean known) {
        Draft draft = new Draft(this);
        draft.weighting = kind;
        draft.deviations = sizes;
        draft.sizeKnown = known;
        return new DataSet(draft);
    }

    /** What the points are called. */
    public String name() {
        return name;
    }

    /** The model that should run through the points. */
    public Model model() {
        return model;
    }

    /** Where the points lie. */
    public Doubles x() {
        return x;
    }

    /** What was measured there. */
    public Doubles y() {
        return y;
    }

    /** What x is. */
    public Axis xAxis() {
        return xAxis;
    }

    /** What y is. */
    public Axis yAxis() {
        return yAxis;
    }

    /** How far a point may lie from the model. */
    public Weighting weighting() {
        return weighting;
    }

    /** Whether the size of the errors was given, not only their ratios. */
    public boolean sizeKnown() {
        return sizeKnown;
    }

    /** How many points there are. */
    public int size() {
        return x.size();
    }

    /**
     * By what the misfit of a point is divided if {@code measured} was measured there: a standard deviation in the
     * unit of y, up to a common factor unless the size is known. Not used for errors of the logarithm.
     */
    double deviation(int point, double measured) {
        return switch (weighting) {
            case EQUAL -> deviations.at(0);
            case RELATIVE -> deviations.at(0) * Math.abs(measured);
            case LOGARITHMIC -> deviations.at(0);
            case DEVIATIONS -> deviations.at(point);
        };
    }

    private void check() {
        if (x.size() != y.size()) {
            throw new RangeException("a fit needs as many x as y, found " + x.size() + " and " + y.size());
        }
        for (int i = 0; i < x.size(); i++) {
            if (!Double.isFinite(x.at(i)) || !Double.isFinite(y.at(i))) {
                throw new RangeException("point " + (i + 1) + " of the fit is (" + x.at(i) + ", " + y.at(i)
                        + "): expected finite numbers");
            }
            if (weighting == Weighting.RELATIVE && y.at(i) == 0) {
                throw new RangeException(
                        "point " + (i + 1) + " of the fit is zero: relative errors need values " + "other than zero");
            }
            if (weighting == Weighting.LOGARITHMIC && !(y.at(i) > 0)) {
                throw new RangeException("point " + (i + 1) + " of the fit is " + y.at(i)
                        + ": errors of the logarithm need values above zero");
            }
        }
        if (weighting == Weighting.DEVIATIONS
                && (deviations.size() != y.size()
                        || !deviations.stream().allMatch(d -> d > 0 && d < Double.POSITIVE_INFINITY))) {
            throw new RangeException("a fit needs one standard deviation above zero for each of its " + y.size()
                    + " points, found " + deviations);
        }
    }

    private static final class Draft {
        private final String name;
        private final Model model;
        private final Doubles x;
        private Doubles y;
        private Weighting weighting = Weighting.EQUAL;
        private Doubles deviations = Doubles.of(1);
        private boolean sizeKnown;
        private Axis xAxis = new Axis("x", "1", Axis.Scale.LINEAR);
        private Axis yAxis = new Axis("y", "1", Axis.Scale.LINEAR);

        private Draft(String name, Model model, Doubles x, Doubles y) {
            this.name = name;
            this.model = model;
            this.x = x;
            this.y = y;
        }

        private Draft(DataSet pattern) {
            this(pattern.name, pattern.model, pattern.x, pattern.y);
            this.weighting = pattern.weighting;
            this.deviations = pattern.deviations;
            this.sizeKnown = pattern.sizeKnown;
            this.xAxis = pattern.xAxis;
            this.yAxis = pattern.yAxis;
        }
    }
}
