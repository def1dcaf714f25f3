package org.meltbook.scenario;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.TreeSet;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.house.Repository;

/** The published measurements are whole, name their source, and say what their papers say. */
class PublishedDataTest {
    private static final Path FOLDER = Repository.data().resolve("published");

    static List<Path> files() throws IOException {
        try (Stream<Path> files = Files.list(FOLDER)) {
            return files.sorted().toList();
        }
    }

    @ParameterizedTest
    @MethodSource("files")
    void every_file_names_its_source_how_it_was_got_and_its_licence(Path file) throws IOException {
        for (String key : List.of("source: ", "obtained: ", "licence: ", "sample: ")) {
            long lines = ExportText.of(file).comments().stream()
                    .filter(line -> line.startsWith(key) && line.length() > key.length() + 10)
                    .count();
            assertEquals(1, lines, file.getFileName() + " lines with " + key);
        }
    }

    @ParameterizedTest
    @MethodSource("files")
    void every_row_has_a_positive_number_under_each_heading(Path file) throws IOException {
        ExportText text = ExportText.of(file);
        assertEquals(1, text.headings().size());
        List<String> headings = text.headings().get(0);
        for (int row = 0; row < text.rows().size(); row++) {
            assertEquals(headings.size(), text.rows().get(row).size(), file.getFileName() + ", row " + row);
            for (int column = 0; column < headings.size(); column++) {
                boolean mayBeZero = headings.get(column).startsWith("filler");
                if (headings.get(column).contains("[")) {
                    double number = text.number(row, column);
                    assertTrue(number > 0 || mayBeZero && number == 0, file.getFileName() + ", row " + row);
                }
            }
        }
    }

    /** Counts of points as they were read off the figures. */
    @ParameterizedTest
    @CsvSource({
        "polystyrene-290k-schausberger-1985.csv, 27, 33",
        "polystyrene-750k-schausberger-1985.csv, 35, 34",
        "polystyrene-3000k-schausberger-1985.csv, 43, 43",
        "polystyrene-390k-montfort-1984.csv, 85, 69"
    })
    void moduli_are_complete(String name, int storage, int loss) throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve(name));
        assertEquals(
                List.of("quantity", "angular frequency [rad/s]", "modulus [Pa]"),
                text.headings().get(0));
        assertEquals(storage, count(text, "storage"));
        assertEquals(loss, count(text, "loss"));
        assertEquals(storage + loss, text.rows().size());
    }

    private static long count(ExportText text, String quantity) {
        return text.rows().stream().filter(row -> row.get(0).equals(quantity)).count();
    }

    @Test
    void the_silicone_has_six_loadings_of_nineteen_rates_and_stress_is_viscosity_times_rate() throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve("silicone-corundum-zwaan-2018.csv"));
        var loadings = text.rows().stream().collect(Collectors.groupingBy(row -> row.get(0), Collectors.counting()));
        assertEquals(6, loadings.size());
        assertEquals(new TreeSet<>(List.of(19L)), new TreeSet<>(loadings.values()));
        for (int row = 0; row < text.rows().size(); row++) {
            double ratio = text.number(row, 4) * text.number(row, 2) / text.number(row, 3);
            assertEquals(1, ratio, 0.006, "row " + row); // all three are printed with three digits
        }
    }

    @Test
    void the_volume_fractions_of_the_silicone_follow_from_its_densities() throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve("silicone-corundum-zwaan-2018.csv"));
        for (int row = 0; row < text.rows().size(); row++) {
            double fraction = (text.number(row, 1) - 0.99) / (3.96 - 0.99); // densities in g/cm³ as the file states
            assertEquals(fraction, text.number(row, 0), 5.1e-5, "row " + row); // four decimals
        }
    }

    /** From memory, as the spectrum itself: a mean relaxation time of 58.7 s and η0 of 5.0e4 to 5.2e4 Pa·s. */
    @Test
    void the_spectrum_of_melt_i_has_its_eight_modes_and_its_remembered_sums() throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve("ldpe-melt-i-laun-1978.csv"));
        assertEquals(8, text.rows().size());
        double viscosity = 0;
        double elasticity = 0;
        for (int row = 0; row < 8; row++) {
            viscosity += text.number(row, 1) * text.number(row, 0);
            elasticity += text.number(row, 1) * text.number(row, 0) * text.number(row, 0);
        }
        assertTrue(viscosity > 5.0e4 && viscosity < 5.2e4, "η0 = " + viscosity);
        assertEquals(58.7, elasticity / viscosity, 0.05);
    }
}
