package org.meltbook.figure;

import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;

/** One thing drawn in a figure: measured points, a model line, or a band. A NaN leaves a gap. */
public sealed interface Layer permits Layer.Marks, Layer.Line, Layer.Band {
    /** Its name in the legend. */
    String name();

    /** Its places along x, in the unit of the axis. */
    Doubles x();

    /**
     * Measured points, drawn as markers, each with an error bar that may be asymmetric.
     *
     * @param low  lower end of the bar at each point, NaN for none; same length as {@code x}
     * @param high upper end of the bar at each point, NaN for none; same length as {@code x}
     */
    record Marks(String name, Doubles x, Doubles y, Doubles low, Doubles high) implements Layer {
        /** Checks that all lists have one length. */
        public Marks {
            sameLength(name, x, y);
            sameLength(name, x, low);
            sameLength(name, x, high);
        }
    }

    /**
     * A model, drawn as a line.
     *
     * @param style solid, or dashed to tell it from its neighbours
     */
    record Line(String name, Doubles x, Doubles y, Style style) implements Layer {
        /** Checks that both lists have one length. */
        public Line {
            sameLength(name, x, y);
        }
    }

    /** A region between two curves: an interval of a model, or a window of validity. */
    record Band(String name, Doubles x, Doubles low, Doubles high) implements Layer {
        /** Checks that all lists have one length. */
        public Band {
            sameLength(name, x, low);
            sameLength(name, x, high);
        }
    }

    /** How a line is drawn. */
    enum Style {
        /** One stroke. */
        SOLID,
        /** Broken stroke. */
        DASHED
    }

    private static void sameLength(String name, Doubles first, Doubles second) {
        if (first.size() != second.size()) {
            throw new RangeException(
                    "layer '" + name + "' has lists of " + first.size() + " and " + second.size() + " numbers");
        }
    }
}
