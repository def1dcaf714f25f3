package org.meltbook.chart;

import java.awt.Graphics2D;
import java.awt.RenderingHints;
import java.awt.image.BufferedImage;
import java.awt.image.DataBuffer;
import java.awt.image.DataBufferByte;
import java.awt.image.DataBufferInt;
import java.awt.image.IndexColorModel;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.Arrays;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import javax.imageio.IIOImage;
import javax.imageio.ImageIO;
import javax.imageio.ImageWriteParam;
import javax.imageio.ImageWriter;
import javax.imageio.stream.ImageOutputStream;
import org.knowm.xchart.internal.chartpart.IChart;

/**
 * Charts as PNG pictures, opaque and without metadata. A picture of few colours, as charts are, is written with a
 * palette of 256, which halves it; rare tones at the edges of letters and curves become the nearest of these.
 */
public final class Png {
    /** Pixels of the picture for each pixel of the chart: a page on a fine screen or on paper stays sharp. */
    public static final int SCALE = 2;

    private static final int PALETTE = 256;
    /** A palette is used if its colours are those of at least this part of all pixels. */
    private static final double MOST_PIXELS = 0.9;

    private Png() {}

    /** The bytes of the picture of any chart, {@value #SCALE} times as many pixels wide and high as the chart. */
    public static byte[] of(IChart chart) {
        BufferedImage image = image(chart);
        return encode(withPalette(image));
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

    /** The image with a palette, or as it is if it has too many colours. */
    private static BufferedImage withPalette(BufferedImage image) {
        int[] pixels = ((DataBufferInt) image.getRaster().getDataBuffer()).getData();
        Map<Integer, int[]> counts = new HashMap<>();
        for (int start = 0, end; start < pixels.length; start = end) {
            end = endOfRun(pixels, start);
            counts.computeIfAbsent(pixels[start], colour -> new int[1])[0] += end - start;
        }
        List<Integer> frequent = counts.keySet().stream()
                .sorted(Comparator.<Integer>comparingInt(colour -> -counts.get(colour)[0])
                        .thenComparing(Comparator.naturalOrder()))
                .limit(PALETTE)
                .toList();
        double covered =
                frequent.stream().mapToInt(colour -> counts.get(colour)[0]).sum();
        return covered < MOST_PIXELS * pixels.length ? image : indexed(image, pixels, frequent);
    }

    private static int endOfRun(int[] pixels, int start) {
        int end = start + 1;
        while (end < pixels.length && pixels[end] == pixels[start]) {
            end++;
        }
        return end;
    }

    private static BufferedImage indexed(BufferedImage image, int[] pixels, List<Integer> palette) {
        int[] colours = palette.stream().mapToInt(colour -> colour | 0xFF000000).toArray();
        IndexColorModel model = new IndexColorModel(8, colours.length, colours, 0, false, -1, DataBuffer.TYPE_BYTE);
        BufferedImage indexed =
                new BufferedImage(image.getWidth(), image.getHeight(), BufferedImage.TYPE_BYTE_INDEXED, model);
        byte[] bytes = ((DataBufferByte) indexed.getRaster().getDataBuffer()).getData();
        Map<Integer, Byte> known = new HashMap<>();
        for (int start = 0, end; start < pixels.length; start = end) {
            end = endOfRun(pixels, start);
            byte index = known.computeIfAbsent(pixels[start], colour -> (byte) nearest(colours, colour));
            Arrays.fill(bytes, start, end, index);
        }
        return indexed;
    }

    private static int nearest(int[] colours, int colour) {
        int best = 0;
        for (int i = 1; i < colours.length; i++) {
            best = distance(colours[i], colour) < distance(colours[best], colour) ? i : best;
        }
        return best;
    }

    private static int distance(int one, int other) {
        int red = (one >> 16 & 255) - (other >> 16 & 255);
        int green = (one >> 8 & 255) - (other >> 8 & 255);
        int blue = (one & 255) - (other & 255);
        return red * red + green * green + blue * blue;
    }

    private static byte[] encode(BufferedImage image) {
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        ImageWriter writer = ImageIO.getImageWritersByFormatName("png").next();
        try (ImageOutputStream out = ImageIO.createImageOutputStream(bytes)) {
            ImageWriteParam smallest = writer.getDefaultWriteParam();
            smallest.setCompressionMode(ImageWriteParam.MODE_EXPLICIT);
            smallest.setCompressionQuality(0);
            writer.setOutput(out);
            writer.write(null, new IIOImage(image, null, null), smallest);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        } finally {
            writer.dispose();
        }
        return bytes.toByteArray();
    }
}
