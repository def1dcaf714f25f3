package org.meltbook.chart;

import java.awt.Font;
import java.awt.FontFormatException;
import java.io.IOException;
import java.io.InputStream;
import java.nio.file.Files;
import java.nio.file.Path;

/**
 * The font of all figures, DejaVu Sans, which comes with the library. Java reads no font at all where the system has no
 * fontconfig; there a small configuration of our own is named to Java (system property {@code sun.awt.fontconfig}) and
 * the font read again. If that does not help, the font of the system is used and {@link #remark} says so.
 */
final class ChartFont {
    private static final String FILE = "DejaVuSans.ttf";
    private static final String PROPERTY = "sun.awt.fontconfig";

    /** Filled at the first use and never changed. */
    private static final class Loaded {
        static final ChartFont FONT = load();
    }

    private final Font font;
    private final String remark;

    private ChartFont(Font font, String remark) {
        this.font = font;
        this.remark = remark;
    }

    /** The font in the given size. */
    static Font of(double size) {
        return Loaded.FONT.font.deriveFont((float) size);
    }

    /** One line if the font of the library could not be read, else blank. */
    static String remark() {
        return Loaded.FONT.remark;
    }

    private static ChartFont load() {
        try {
            return new ChartFont(read(), "");
        } catch (IOException | FontFormatException | LinkageError | InternalError first) {
            return loadWithoutFontconfig();
        }
    }

    private static ChartFont loadWithoutFontconfig() {
        try {
            if (System.getProperty(PROPERTY) == null) {
                System.setProperty(PROPERTY, configuration().toString());
            }
            return new ChartFont(read(), "");
        } catch (IOException | FontFormatException | LinkageError | InternalError second) {
            return new ChartFont(
                    new Font(Font.SANS_SERIF, Font.PLAIN, 12),
                    "The font of the library could not be read (" + second.getMessage()
                            + "): letters may differ from machine to machine.");
        }
    }

    private static Font read() throws IOException, FontFormatException {
        try (InputStream bytes = ChartFont.class.getResourceAsStream(FILE)) {
            if (bytes == null) {
                throw new IOException("no " + FILE + " beside " + ChartFont.class.getName());
            }
            return Font.createFont(Font.TRUETYPE_FONT, bytes);
        }
    }

    private static Path configuration() throws IOException {
        Path file = Files.createTempFile("meltbook-fonts", ".properties");
        file.toFile().deleteOnExit();
        return Files.writeString(file, "version=1\nsequence.allfonts=default\n");
    }
}
