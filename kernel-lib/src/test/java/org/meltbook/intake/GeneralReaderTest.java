package org.meltbook.intake;

import static org.junit.jupiter.api.Assertions.assertEquals;

import com.univocity.parsers.csv.CsvParser;
import com.univocity.parsers.csv.CsvParserSettings;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Locale;
import java.util.Random;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.measure.FlowCurve;

/** On plain files a general-purpose reader must find the same numbers, cell by cell. */
class GeneralReaderTest {
    @TempDir
    Path folder;

    @ParameterizedTest
    @ValueSource(longs = {1, 2, 3, 4, 5, 6, 7, 8, 9, 10})
    void univocity_parsers_agrees_cell_by_cell(long seed) throws IOException {
        Random random = new Random(seed);
        char delimiter = ",;\t".charAt(random.nextInt(3));
        boolean comma = delimiter != ',' && random.nextBoolean();
        Path file = Files.writeString(folder.resolve("plain.csv"), plain(random, delimiter, comma));
        FlowCurve curve = Exports.read(file).flowCurve();

        CsvParserSettings settings = new CsvParserSettings();
        settings.getFormat().setDelimiter(delimiter);
        List<String[]> rows = new CsvParser(settings).parseAll(file.toFile());
        assertEquals(rows.size() - 1, curve.stress().size());
        for (int row = 1; row < rows.size(); row++) {
            assertEquals(number(rows.get(row)[0], comma), curve.stress().x().at(row - 1), 0);
            assertEquals(number(rows.get(row)[1], comma), curve.stress().y().at(row - 1), 0);
        }
    }

    private static double number(String cell, boolean comma) {
        return Double.parseDouble(comma ? cell.replace(',', '.') : cell);
    }

    private static String plain(Random random, char delimiter, boolean comma) {
        String lineEnd = random.nextBoolean() ? "\n" : "\r\n";
        StringBuilder text = new StringBuilder("shear rate [1/s]" + delimiter + "shear stress [Pa]" + lineEnd);
        for (int row = 0; row < 200; row++) {
            for (int column = 0; column < 2; column++) {
                String form = random.nextBoolean() ? "%.2f" : "%.5e";
                String cell = String.format(Locale.ROOT, form, Math.exp(random.nextDouble() * 20 - 10) + 0.01);
                String written = comma ? cell.replace('.', ',') : cell;
                text.append(random.nextInt(4) == 0 ? '"' + written + '"' : written);
                text.append(column == 0 ? String.valueOf(delimiter) : lineEnd);
            }
        }
        return text.toString();
    }
}
