package org.meltbook.fit;

import org.meltbook.base.NumberText;
import org.meltbook.base.RangeException;

/** The level of an interval: the share of repeated data sets whose interval should hold the true value. */
final class Level {
    private Level() {}

    static double check(double level) {
        if (level > 0 && level < 1) {
            return level;
        }
        throw new RangeException("an interval needs a level between 0 and 1, such as 0.95, found " + level);
    }

    static String words(double level) {
        return NumberText.of(100 * level).replaceAll("\\.?0+$", "") + " %";
    }
}
