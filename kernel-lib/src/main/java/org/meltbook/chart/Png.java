package org.meltbook.chart;

import java.awt.Graphics2D;
import java.awt.RenderingHints;
import java.awt.image.BufferedImage;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import javax.imageio.ImageIO;
import org.knowm.xchart.internal.chartpart.IChart;

/** Charts as PNG pictures. */
public final class Png {
    /** Pixels of the picture for each pixel of the chart: a page on a fine screen or on paper stays sharp. */
    public static final int SCALE = 2;

    private Png() {}

    /** The bytes of the picture of any chart, {@value #SCALE} times as many pixels wide and high as the chart. */
    public static byte[] of(IChart chart) {
        return encode(image(chart));
    }

    static BufferedImage image(IChart chart) {
        BufferedImage image =
                new BufferedImage(chart.getWidth() * SCALE, chart.getHeight() * SCALE, BufferedImage.TYPE_INT_RGB);
        Graphics2D g = image.createGraphics();
        try {
            g.setRenderingHint(RenderingHints.KEY_ANTIALIASING, RenderingHints.VALUE_ANTIALIAS_ON);
            g.scale(SCALE, SCALE);
            chart.paint(g, chart.getWidth(), chart.getHeight());
        } finally {
            g.dispose();
        }
        return image;
    }

    private static byte[] encode(BufferedImage image) {
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try {
            ImageIO.write(image, "png", bytes);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return bytes.toByteArray();
    }
}
