package org.meltbook.chart;

import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.Shape;
import java.awt.font.FontRenderContext;
import java.awt.font.TextLayout;
import java.awt.geom.AffineTransform;
import java.awt.geom.Point2D;

/** Measures and draws text as outlines, so that letters are the same on every machine. */
final class Lettering {
    private static final FontRenderContext PRECISE = new FontRenderContext(null, true, true);
    private static final String ELLIPSIS = "…";

    private Lettering() {}

    /** Which part of a text stands at the place where it is drawn. */
    enum Align {
        LEFT(0),
        MIDDLE(0.5),
        RIGHT(1);

        private final double share;

        Align(double share) {
            this.share = share;
        }
    }

    /** Width of the text in pixels; zero if blank. */
    static double width(String text, Font font) {
        return text.isBlank() ? 0 : new TextLayout(text, font, PRECISE).getAdvance();
    }

    /** The text if it is no wider than {@code most} pixels, else its beginning with an ellipsis. */
    static String within(String text, Font font, double most) {
        if (width(text, font) <= most) {
            return text;
        }
        int end = text.length();
        while (end > 0 && width(text.substring(0, end) + ELLIPSIS, font) > most) {
            end = text.offsetByCodePoints(end, -1);
        }
        return text.substring(0, end).stripTrailing() + ELLIPSIS;
    }

    /**
     * Draws the text in the colour of {@code g}.
     *
     * @param align which part of the text stands at {@code place}
     * @param place pixel on the base line
     */
    static void draw(Graphics2D g, String text, Font font, Align align, Point2D place) {
        double left = place.getX() - align.share * width(text, font);
        draw(g, text, font, AffineTransform.getTranslateInstance(left, place.getY()));
    }

    /** Draws the text upwards, its middle at {@code y} and its base line at {@code x}. */
    static void drawUpwards(Graphics2D g, String text, Font font, double x, double y) {
        AffineTransform place = AffineTransform.getTranslateInstance(x, y + width(text, font) / 2);
        place.rotate(-Math.PI / 2);
        draw(g, text, font, place);
    }

    private static void draw(Graphics2D g, String text, Font font, AffineTransform place) {
        if (!text.isBlank()) {
            Shape outline = new TextLayout(text, font, PRECISE).getOutline(place);
            g.fill(outline);
        }
    }
}
