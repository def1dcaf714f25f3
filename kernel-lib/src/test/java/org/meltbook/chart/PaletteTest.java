package org.meltbook.chart;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertNotEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.awt.Color;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.stream.DoubleStream;
import org.junit.jupiter.api.Test;
import org.meltbook.figure.Layer;

class PaletteTest {
    /** Okabe and Ito, "Color Universal Design" (2008), table of RGB values; from memory. */
    @Test
    void the_colours_are_the_published_ones() {
        List<Color> published = List.of(
                new Color(0x0072B2),
                new Color(0xD55E00),
                new Color(0x009E73),
                new Color(0xCC79A7),
                new Color(0x000000),
                new Color(0xE69F00),
                new Color(0x56B4E9));
        assertEquals(published, Palette.COLOURS);
    }

    /** Contrast as defined by WCAG 2.1, which asks 3 : 1 for graphics (1.4.11) and 7 : 1 for the best text (1.4.6). */
    @Test
    void the_first_five_colours_stand_out_from_the_page() {
        Palette.COLOURS.subList(0, 5).forEach(colour -> assertTrue(contrast(colour) >= 3, colour + ""));
        assertTrue(contrast(Palette.INK) >= 7);
        assertTrue(contrast(new Color(0xF0E442)) < 1.5, "yellow, which is left out");
    }

    @Test
    void twelve_families_differ_in_marker_and_in_line() {
        Set<String> lines = new HashSet<>();
        for (int family = 0; family < 12; family++) {
            float[] dashes = Palette.stroke(Layer.Style.SOLID, family).getDashArray();
            lines.add(Palette.of(family) + " " + (dashes == null ? "" : dashes.length));
        }
        assertEquals(12, lines.size());
    }

    @Test
    void dashed_is_never_drawn_like_solid() {
        for (int family = 0; family < 12; family++) {
            assertNotEquals(Palette.stroke(Layer.Style.SOLID, family), Palette.stroke(Layer.Style.DASHED, family));
        }
    }

    private static double contrast(Color colour) {
        double[] linear = DoubleStream.of(colour.getRed(), colour.getGreen(), colour.getBlue())
                .map(c -> c / 255)
                .map(c -> c <= 0.04045 ? c / 12.92 : Math.pow((c + 0.055) / 1.055, 2.4))
                .toArray();
        return 1.05 / (0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2] + 0.05);
    }
}
