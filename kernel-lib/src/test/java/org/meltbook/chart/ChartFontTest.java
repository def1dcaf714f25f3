package org.meltbook.chart;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;

import java.awt.Font;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Base64;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.meltbook.units.Quantity;

class ChartFontTest {
    @Test
    void the_font_is_the_one_that_comes_with_the_library() {
        assertEquals("DejaVu Sans", ChartFont.of(12).getFamily());
        assertEquals(12, ChartFont.of(12).getSize());
        assertEquals("", ChartFont.remark());
    }

    @ParameterizedTest
    @EnumSource(Quantity.class)
    void the_font_has_every_letter_of_every_quantity(Quantity quantity) {
        assertEquals(-1, ChartFont.of(12).canDisplayUpTo(quantity.label() + quantity.symbol() + quantity.siUnit()));
    }

    @Test
    void the_font_has_the_signs_of_numbers() {
        assertEquals(-1, ChartFont.of(12).canDisplayUpTo("0123456789⁰¹²³⁴⁵⁶⁷⁸⁹⁻−×.…°±∞–"));
    }

    /** A mark that combines with the letter before it takes no room of its own. */
    @Test
    void the_dot_of_a_rate_stands_above_its_letter() {
        Font font = ChartFont.of(100);
        assertEquals(Lettering.width("γ", font), Lettering.width("γ̇", font), 1);
    }

    /**
     * A second Java in which the fontconfig library cannot be loaded (an empty file stands in its place) and which
     * finds no configuration either.
     */
    @Test
    void without_fontconfig_the_picture_is_the_same(@TempDir Path folder) throws Exception {
        Files.createFile(folder.resolve("libfontconfig.so.1"));
        Files.createFile(folder.resolve("libfontconfig.so"));
        ProcessBuilder java = new ProcessBuilder(List.of(
                        Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                        "-Djava.awt.headless=true",
                        "-cp",
                        System.getProperty("java.class.path"),
                        Picture.class.getName()))
                .redirectError(folder.resolve("errors").toFile());
        java.environment().put("LD_LIBRARY_PATH", folder.toString());
        java.environment().put("FONTCONFIG_PATH", folder.toString());
        java.environment().put("FONTCONFIG_FILE", folder.resolve("none.conf").toString());
        Process process = java.start();
        byte[] printed = process.getInputStream().readAllBytes();
        assertEquals(0, process.waitFor(), () -> read(folder.resolve("errors")));
        String[] lines = new String(printed, StandardCharsets.US_ASCII).strip().split("\\R");
        assertArrayEquals(Samples.moduli().png(), Base64.getDecoder().decode(lines[0]));
        assertEquals("configured", lines[1], "the remedy was needed, so this Java was indeed without fontconfig");
    }

    private static String read(Path file) {
        try {
            return Files.readString(file);
        } catch (IOException e) {
            return e.toString();
        }
    }

    /** Prints the picture and whether a configuration had to be given to Java. */
    static final class Picture {
        private Picture() {}

        public static void main(String[] arguments) throws IOException {
            ByteArrayOutputStream out = new ByteArrayOutputStream();
            out.write(Base64.getEncoder().encode(Samples.moduli().png()));
            out.write('\n');
            boolean configured = System.getProperty("sun.awt.fontconfig") != null;
            out.write((configured ? "configured" : "plain").getBytes(StandardCharsets.US_ASCII));
            out.writeTo(System.out);
            System.out.flush();
        }
    }
}
