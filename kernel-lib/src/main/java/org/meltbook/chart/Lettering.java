package org.meltbook.chart;

import java.awt.Font;
import java.awt.Graphics2D;
import java.awt.Shape;
import java.awt.font.FontRenderContext;
import java.awt.font.TextLayout;
import java.awt.geom.AffineTransform;

/** Measures and draws text as outlines, so that letters are the same on every machine. */
final class Lettering {
    private static final FontRenderContext PRECISE = new FontRenderContext(null, true, true);
    private static final String ELLIPSIS = "…";

    private Lettering() {}

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
     * @param align 0 if {@code x} is its left end, 0.5 its middle, 1 its right end
     * @param x     pixel along x
     * @param y     pixel of the base line
     */
    static void draw(Graphics2D g, String text, Font font, double align, double x, double y) {
        draw(g, text, font, AffineTransform.getTranslateInstance(x - align * width(text, font), y));
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
