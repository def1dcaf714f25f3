package org.meltbook.scenario;

import java.util.ArrayList;
import java.util.List;

/**
 * In which order and at what pace the invented laboratory takes its points. Times are counted from when the sample
 * reached its temperature.
 */
final class Protocol {
    private static final double[] FIVE_A_DECADE = {10, 6.31, 3.98, 2.51, 1.58};
    private static final double[] FOUR_A_DECADE = {1, 1.78, 3.16, 5.62};

    private Protocol() {}

    /**
     * A point of a test.
     *
     * @param setting angular frequency in rad/s or shear rate in 1/s
     * @param time    when its reading is taken, in s
     */
    record Point(double setting, double time) {}

    /**
     * A frequency sweep from 100 down to 0.01 rad/s, five points a decade, then 10 and 1 rad/s once more as a check
     * of the sample. A point takes three cycles, 10 s at least.
     */
    static List<Point> frequencySweep() {
        List<Double> settings = new ArrayList<>();
        for (double decade = 10; decade > 0.005; decade /= 10) {
            for (double mantissa : FIVE_A_DECADE) {
                settings.add(rounded(mantissa * decade));
            }
        }
        settings.addAll(List.of(0.01, 10.0, 1.0));
        double time = 0;
        List<Point> points = new ArrayList<>();
        for (double frequency : settings) {
            time += Math.max(10, 3 * 2 * Math.PI / frequency);
            points.add(new Point(frequency, time));
        }
        return points;
    }

    /**
     * A steady flow curve from 0.01 up to 3.16 1/s, four points a decade. A point takes 30 s and six units of strain;
     * at higher rates such a melt leaves the gap.
     */
    static List<Point> flowCurve() {
        List<Double> settings = new ArrayList<>();
        for (double decade = 0.01; decade < 0.5; decade *= 10) {
            for (double mantissa : FOUR_A_DECADE) {
                settings.add(rounded(mantissa * decade));
            }
        }
        settings.addAll(List.of(1.0, 1.78, 3.16));
        double time = 0;
        List<Point> points = new ArrayList<>();
        for (double rate : settings) {
            time += 30 + 6 / rate;
            points.add(new Point(rate, time));
        }
        return points;
    }

    /** Takes off the last digits that repeated division by ten leaves, so that the setting is what the export says. */
    private static double rounded(double setting) {
        return Math.rint(setting * 1e6) / 1e6;
    }
}
