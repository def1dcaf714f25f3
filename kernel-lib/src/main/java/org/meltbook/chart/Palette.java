package org.meltbook.chart;

import java.awt.BasicStroke;
import java.awt.Color;
import java.util.List;
import org.meltbook.figure.Layer;

/**
 * Colours that readers with any of the common colour deficiencies tell apart: the set of M. Okabe and K. Ito, "Color
 * Universal Design" (2008), with the published values. Their yellow is left out, being hardly seen on white (1.3 : 1).
 * The first five reach a contrast of 3 : 1 against white; orange and sky blue do not (2.2 : 1) and come last. Markers
 * have a darker outline, and no text is ever written in these colours.
 */
final class Palette {
    /** Text, frame and ticks. */
    static final Color INK = new Color(0x262626);
    /** Grid lines. */
    static final Color GRID = new Color(0xE4E4E4);
    /** The page. */
    static final Color PAPER = Color.WHITE;
    /** Nothing. */
    static final Color CLEAR = new Color(255, 255, 255, 0);

    static final List<Color> COLOURS = List.of(
            new Color(0, 114, 178), // blue
            new Color(213, 94, 0), // vermillion
            new Color(0, 158, 115), // bluish green
            new Color(204, 121, 167), // reddish purple
            new Color(0, 0, 0), // black
            new Color(230, 159, 0), // orange
            new Color(86, 180, 233)); // sky blue

    private static final float LINE_WIDTH = 1.8f;
    private static final int BAND_OPACITY = 56;

    private Palette() {}

    /** The colour of a family of layers; it comes again after seven. */
    static Color of(int family) {
        return COLOURS.get(family % COLOURS.size());
    }

    /** How often the colours were gone through before this family. */
    static int round(int family) {
        return family / COLOURS.size();
    }

    /** The colour for a band, through which grid and points are seen. */
    static Color faint(Color colour) {
        return new Color(colour.getRed(), colour.getGreen(), colour.getBlue(), BAND_OPACITY);
    }

    /** The stroke of a line; when the colours come again, dots between the strokes tell the lines apart. */
    static BasicStroke stroke(Layer.Style style, int family) {
        boolean again = round(family) > 0;
        if (style == Layer.Style.SOLID) {
            return again ? stroke(14, 3.5f, 2, 3.5f) : stroke();
        }
        return again ? stroke(7, 3.5f, 2, 3.5f, 2, 3.5f) : stroke(7, 4.5f);
    }

    private static BasicStroke stroke(float... dashes) {
        return dashes.length == 0
                ? new BasicStroke(LINE_WIDTH, BasicStroke.CAP_ROUND, BasicStroke.JOIN_ROUND)
                : new BasicStroke(LINE_WIDTH, BasicStroke.CAP_BUTT, BasicStroke.JOIN_ROUND, 10, dashes, 0);
    }
}
