package org.meltbook.numeric;

import java.util.Comparator;
import java.util.stream.IntStream;
import org.apache.commons.math3.stat.regression.SimpleRegression;
import org.meltbook.base.Doubles;

/**
 * The straight line through points in logarithms: how steep a curve is where it was measured.
 *
 * @param slope  d ln y / d ln x
 * @param mean   geometric mean of y
 * @param points how many points it goes through
 */
public record LogLogLine(double slope, double mean, int points) {
    private static final double HALF_DECADE = Math.sqrt(10);
    private static final int FEWEST = 3;

    /** The line through all points; both numbers of each above zero. */
    public static LogLogLine through(Doubles x, Doubles y) {
        SimpleRegression line = new SimpleRegression();
        double sum = 0;
        for (int i = 0; i < x.size(); i++) {
            line.addData(Math.log(x.at(i)), Math.log(y.at(i)));
            sum += Math.log(y.at(i));
        }
        return new LogLogLine(line.getSlope(), Math.exp(sum / x.size()), x.size());
    }

    /** The line through the {@link #lowEndOf low end} of the points. */
    public static LogLogLine lowEnd(Doubles x, Doubles y) {
        int[] low = lowEndOf(x);
        return through(x.pick(low), y.pick(low));
    }

    /** Places of the points within half a decade of the lowest x, rising, three at least where there are three. */
    public static int[] lowEndOf(Doubles x) {
        double limit = x.smallest() * HALF_DECADE;
        int within = (int) x.stream().filter(v -> v <= limit).count();
        return IntStream.range(0, x.size())
                .boxed()
                .sorted(Comparator.comparingDouble(x::at))
                .limit(Math.max(FEWEST, within))
                .mapToInt(Integer::intValue)
                .toArray();
    }
}
