package org.meltbook.intake;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.Charset;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;

/** Writes the files that the tests read. */
final class ExportFile {
    private ExportFile() {}

    static Path of(Path folder, String... lines) {
        return of(folder, StandardCharsets.UTF_8, String.join("\n", lines) + "\n");
    }

    static Path of(Path folder, Charset charset, String text) {
        return of(folder, text.getBytes(charset));
    }

    static Path of(Path folder, byte[] bytes) {
        try {
            return Files.write(folder.resolve("run.csv"), bytes);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
