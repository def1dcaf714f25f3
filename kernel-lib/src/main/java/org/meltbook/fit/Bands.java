package org.meltbook.fit;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.distribution.TDistribution;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;
import org.meltbook.base.Rows;
import org.meltbook.figure.Exhibit;
import org.meltbook.figure.Figure;

/**
 * Bands of a function of the parameters along x. The confidence band holds the function itself, the prediction band a
 * further measured value; both hold at each x taken alone, not for all x together.
 *
 * <p>From the covariance of a fit (delta method): value ± t · standard error, on ln y if the y axis is logarithmic, with
 * Student's t or, for {@link ErrorModel#ABSOLUTE}, the normal distribution; the prediction band adds the variance of a
 * measured value (G. A. F. Seber and C. J. Wild, Nonlinear Regression (1989), section 5.1; memory). From a bootstrap:
 * quantiles of the function over the refits, confidence band only.
 */
public final class Bands implements Exhibit {
    private final Fit fit;
    private final BandCurve curve;
    private final Optional<DataSet> measured;
    private final double level;
    private final String method;
    private final Doubles x;
    private final Doubles value;
    private final Doubles low;
    private final Doubles high;
    private final Optional<Edges> prediction;
    private final List<String> remarks;

    /** The ends of a band. */
    private record Edges(Doubles low, Doubles high) {}

    private Bands(Draft draft) {
        this.fit = draft.fit;
        this.curve = draft.curve;
        this.measured = draft.measured;
        this.level = draft.level;
        this.method = draft.method;
        this.x = draft.x;
        this.value = draft.value;
        this.low = Doubles.of(draft.low);
        this.high = Doubles.of(draft.high);
        this.prediction = draft.predicted
                ? Optional.of(new Edges(Doubles.of(draft.lowest), Doubles.of(draft.highest)))
                : Optional.empty();
        this.remarks = List.copyOf(draft.remarks);
    }

    /**
     * Confidence band of a function from the covariance of a fit.
     *
     * @param level share of repeated data sets whose band should hold the function at an x, 0 to 1
     * @throws RangeException if an x is not finite, there is none, or the level is not between 0 and 1
     */
    public static Bands of(Fit fit, BandCurve curve, Doubles x, double level) {
        Draft draft = new Draft(fit, curve, x, level);
        draft.fromCovariance();
        return new Bands(draft);
    }

    /**
     * Confidence and prediction band of the fitted model of a data set, counted from zero, from the covariance. There
     * is no prediction band where each point has its own standard deviation: that of a further point is not known.
     *
     * @throws RangeException as {@link #of(Fit, BandCurve, Doubles, double)}
     */
    public static Bands ofModel(Fit fit, int dataSet, Doubles x, double level) {
        Draft draft = new Draft(fit, BandCurve.model(fit, dataSet), x, level);
        draft.measured = Optional.of(fit.problem().dataSets().get(dataSet));
        draft.fromCovariance();
        return new Bands(draft);
    }

    /**
     * Confidence band of a function from the refits of a bootstrap, at the level of its settings.
     *
     * @throws RangeException if an x is not finite, there is none, or there are too few refits for the level
     */
    public static Bands of(Bootstrap bootstrap, BandCurve curve, Doubles x) {
        Draft draft = new Draft(bootstrap.fit(), curve, x, bootstrap.settings().level());
        draft.fromRefits(bootstrap);
        return new Bands(draft);
    }

    /** Works a band out. */
    private static final class Draft {
        private final Fit fit;
        private final BandCurve curve;
        private final double level;
        private final Doubles x;
        private final Doubles value;
        private final double[] low;
        private final double[] high;
        private final double[] lowest;
        private final double[] highest;
        private final List<String> remarks = new ArrayList<>();
        private Optional<DataSet> measured = Optional.empty();
        private boolean predicted;
        private String method = "";

        private Draft(Fit fit, BandCurve curve, Doubles x, double level) {
            Level.check(level);
            if (x.isEmpty() || !x.stream().allMatch(Double::isFinite)) {
                throw new RangeException("a band needs one x or more, all finite, found " + x);
            }
            this.fit = fit;
            this.curve = curve;
            this.level = level;
            this.x = x;
            this.value = x.map(at -> curve.formula().at(at, fit.values().toArray()));
            this.low = new double[x.size()];
            this.high = new double[x.size()];
            this.lowest = new double[x.size()];
            this.highest = new double[x.size()];
        }

        private void fromCovariance() {
            BandTangent tangent = new BandTangent(fit);
            double quantile = quantile();
            boolean logarithm = curve.logarithmic();
            predicted = measured.isPresent() && measured.get().weighting() != Weighting.DEVIATIONS;
            method = "from the covariance (delta method" + (logarithm ? " on the logarithm" : "") + ")";
            for (int i = 0; i < low.length; i++) {
                double error = tangent.error(curve.formula(), x.at(i), logarithm);
                lay(i, quantile * error, low, high);
                if (predicted) {
                    lay(i, quantile * Math.hypot(error, scatter(measured.get(), i)), lowest, highest);
                }
            }
            if (measured.isPresent() && !predicted) {
                remarks.add("no prediction band: each point has its own standard deviation, and that of a further "
                        + "point is not known");
            }
            if (predicted && !fit.problem().loss().plain()) {
                remarks.add("the prediction band takes the scatter of all points, outliers included");
            }
            remarks.addAll(fit.identification());
        }

        private double quantile() {
            double share = 0.5 + level / 2;
            if (fit.problem().errors() == ErrorModel.ABSOLUTE) {
                return new NormalDistribution().inverseCumulativeProbability(share);
            }
            return fit.degreesOfFreedom() > 0
                    ? new TDistribution(fit.degreesOfFreedom()).inverseCumulativeProbability(share)
                    : Double.NaN;
        }

        /** Standard deviation of a measured value at the model, on the scale of the band. */
        private double scatter(DataSet set, int i) {
            double factor = fit.problem().errors() == ErrorModel.ABSOLUTE ? 1 : Math.sqrt(fit.reducedChiSquare());
            double size = factor * set.deviation(0, value.at(i));
            boolean ofLogarithm = set.weighting() == Weighting.LOGARITHMIC;
            if (ofLogarithm == curve.logarithmic()) {
                return size;
            }
            return ofLogarithm ? size * Math.abs(value.at(i)) : size / Math.abs(value.at(i));
        }

        private void lay(int i, double half, double[] below, double[] above) {
            double centre = value.at(i);
            below[i] = curve.logarithmic() ? centre * Math.exp(-half) : centre - half;
            above[i] = curve.logarithmic() ? centre * Math.exp(half) : centre + half;
        }

        private void fromRefits(Bootstrap bootstrap) {
            int count = bootstrap.refits().size();
            if (count < Quantiles.needed(level)) {
                throw new RangeException("a " + Level.words(level) + " band needs at least " + Quantiles.needed(level)
                        + " refits, there are " + count);
            }
            method = "from " + count + " refits (" + bootstrap.settings().kind().words() + ", percentile)";
            double[][] refits =
                    bootstrap.refits().stream().map(Doubles::toArray).toArray(double[][]::new);
            double[] drawn = new double[count];
            for (int i = 0; i < low.length; i++) {
                for (int k = 0; k < count; k++) {
                    drawn[k] = curve.formula().at(x.at(i), refits[k]);
                }
                Quantiles quantiles = Quantiles.of(drawn);
                low[i] = quantiles.at((1 - level) / 2);
                high[i] = quantiles.at((1 + level) / 2);
            }
            remarks.addAll(bootstrap.cautions());
        }
    }

    /** Where the band was worked out. */
    public Doubles x() {
        return x;
    }

    /** The function at the fit. */
    public Doubles value() {
        return value;
    }

    /** Lower edge of the confidence band; NaN where the data give none. */
    public Doubles low() {
        return low;
    }

    /** Upper edge of the confidence band; NaN where the data give none. */
    public Doubles high() {
        return high;
    }

    /** Lower edge of the prediction band, if there is one. */
    public Optional<Doubles> lowPrediction() {
        return prediction.map(Edges::low);
    }

    /** Upper edge of the prediction band, if there is one. */
    public Optional<Doubles> highPrediction() {
        return prediction.map(Edges::high);
    }

    private String percent() {
        return Level.words(level);
    }

    /** Adds the bands and the line of the function to a figure that has its axes. */
    public Figure.Builder addTo(Figure.Builder figure) {
        prediction.ifPresent(ends -> figure.band(percent() + " prediction band", x, ends.low(), ends.high()));
        return figure.band(percent() + " confidence band", x, low, high)
                .likeBefore()
                .line(curve.name(), x, value);
    }

    @Override
    public String headline() {
        return curve.name() + " with its " + percent() + " confidence band"
                + (prediction.isPresent() ? " and prediction band, " : ", ") + method + ", at " + x.size() + " places.";
    }

    @Override
    public List<Rows> rows() {
        String unit = curve.y().unit();
        Rows.Builder table = Rows.titled("Bands of " + curve.name())
                .numbers(curve.x().label(), curve.x().unit(), x)
                .numbers(curve.y().label(), unit, value)
                .numbers(percent() + " confidence, low", unit, low)
                .numbers(percent() + " confidence, high", unit, high);
        prediction.ifPresent(ends -> table.numbers(percent() + " prediction, low", unit, ends.low())
                .numbers(percent() + " prediction, high", unit, ends.high()));
        return List.of(table.note("Bands " + method + "; they hold at each place taken alone.")
                .note("Error model: " + fit.problem().errorWords() + ".")
                .build());
    }

    @Override
    public List<Figure> figures() {
        Figure.Builder figure =
                Figure.titled("Bands of " + curve.name()).x(curve.x()).y(curve.y());
        addTo(figure);
        measured.ifPresent(set -> figure.marks("measured", set.x(), set.y()));
        return List.of(figure.caption("Bands " + method + "; they hold at each place taken alone.")
                .build());
    }

    @Override
    public List<String> cautions() {
        List<String> all = new ArrayList<>();
        measured.ifPresent(set -> {
            if (x.smallest() < set.x().smallest() || x.largest() > set.x().largest()) {
                all.add("the band reaches beyond the measured points, which lie from "
                        + NumberText.of(set.x().smallest()) + " to "
                        + NumberText.of(set.x().largest())
                        + ": there it holds only if the model does");
            }
        });
        long missing = low.stream().filter(Double::isNaN).count();
        if (missing > 0) {
            all.add("there is no band at " + missing + " of " + x.size() + " places: the data do not fix the function "
                    + "there, or it has no value");
        }
        all.addAll(remarks);
        return List.copyOf(all);
    }

    @Override
    public String toString() {
        return headline();
    }
}
