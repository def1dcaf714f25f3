package org.meltbook.scenario;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeSet;
import java.util.stream.Stream;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.apache.commons.math3.stat.inference.KolmogorovSmirnovTest;
import org.junit.jupiter.api.Test;
import org.meltbook.house.Repository;

/** The checked-in exports are what the generator writes, and scatter about the truth as stated. */
class ScenarioGeneratorTest {
    private static final Path FOLDER = Repository.data().resolve("scenario");
    private final Truth truth = Truth.load();
    private final SortedMap<String, String> exports = new ScenarioGenerator(truth).exports();

    @Test
    void the_checked_in_exports_are_the_bytes_the_generator_writes() throws IOException {
        for (Map.Entry<String, String> export : exports.entrySet()) {
            byte[] written = export.getValue().getBytes(StandardCharsets.UTF_8);
            assertArrayEquals(written, Files.readAllBytes(FOLDER.resolve(export.getKey())), export.getKey());
        }
    }

    @Test
    void no_lot_folder_holds_an_export_that_the_generator_does_not_write() throws IOException {
        TreeSet<String> found = new TreeSet<>();
        try (Stream<Path> files = Files.walk(FOLDER, 2)) {
            files.filter(Files::isRegularFile)
                    .map(file -> FOLDER.relativize(file).toString().replace('\\', '/'))
                    .filter(name -> name.contains("/"))
                    .forEach(found::add);
        }
        assertEquals(new TreeSet<>(exports.keySet()), found);
    }

    @Test
    void the_exports_are_the_same_in_a_locale_of_decimal_commas_and_other_digits() {
        Locale before = Locale.getDefault();
        try {
            for (String language : List.of("de-DE", "ar-EG-u-nu-arab")) {
                Locale.setDefault(Locale.forLanguageTag(language));
                assertEquals(exports, new ScenarioGenerator(truth).exports());
            }
        } finally {
            Locale.setDefault(before);
        }
    }

    @Test
    void leaving_out_a_lot_moves_no_number_of_the_others() {
        Truth fewer = new Truth(
                truth.seed(),
                truth.resin(),
                truth.nonlinear(),
                truth.shift(),
                truth.chalk(),
                truth.scission(),
                truth.noise(),
                truth.lots().stream().filter(lot -> !lot.name().equals("R-04")).toList());
        SortedMap<String, String> rest = new ScenarioGenerator(fewer).exports();
        assertEquals(exports.size() - 4, rest.size());
        rest.forEach((name, text) -> assertEquals(exports.get(name), text, name));
    }

    @Test
    void every_export_says_that_it_is_invented_and_is_small() throws IOException {
        for (String name : exports.keySet()) {
            ExportText text = ExportText.of(FOLDER.resolve(name));
            assertEquals(
                    "invented data: Quarrel Bank Compounds does not exist",
                    text.comments().get(0),
                    name);
            assertTrue(text.rows().size() > 10 && text.rows().size() <= 40, name);
        }
    }

    @Test
    void no_file_of_the_scenario_gives_the_truth_away() throws IOException {
        try (Stream<Path> files = Files.walk(FOLDER)) {
            for (Path file : files.filter(Files::isRegularFile).toList()) {
                String text = Files.readString(file).toLowerCase(Locale.ROOT);
                for (String word : List.of("truth", "seed", "scission", "mislabel", "wrong unit", "degrad")) {
                    assertTrue(!text.contains(word), file + " says " + word);
                }
            }
        }
    }

    @Test
    void the_readings_scatter_about_the_truth_as_the_noise_says() throws IOException {
        List<Double> residuals = new ArrayList<>();
        for (String name : exports.keySet()) {
            residuals.addAll(name.contains("sweep") ? sweepResiduals(name) : flowResiduals(name));
        }
        // 15 sweeps of 23 points with two moduli, 5 flow curves of 11 points with two stresses
        assertEquals(15 * 23 * 2 + 5 * 11 * 2, residuals.size());
        double sum = residuals.stream().mapToDouble(z -> z * z).sum();
        ChiSquaredDistribution expected = new ChiSquaredDistribution(residuals.size());
        assertTrue(
                sum > expected.inverseCumulativeProbability(0.005)
                        && sum < expected.inverseCumulativeProbability(0.995),
                "χ² = " + sum + " of " + residuals.size());
        double[] sample = residuals.stream().mapToDouble(Double::doubleValue).toArray();
        double shape = new KolmogorovSmirnovTest().kolmogorovSmirnovTest(new NormalDistribution(null, 0, 1), sample);
        assertTrue(shape > 0.01, "standardised residuals are not normal, p = " + shape);
    }

    @Test
    void the_readings_do_not_scatter_so_about_the_truth_of_another_lot() throws IOException {
        List<Double> residuals = residuals("R-07/frequency-sweep-190C.csv", "A-00");
        double sum = residuals.stream().mapToDouble(z -> z * z).sum();
        assertTrue(sum > 3 * residuals.size(), "χ² = " + sum + " of " + residuals.size());
    }

    @Test
    void first_normal_stress_differences_drown_in_the_floor_at_the_lowest_rate() throws IOException {
        HiddenFluid melt = truth.fluid(truth.lot("A-00"), 463.15);
        double lowest = melt.firstNormalCoefficient(0.01) * 1e-4;
        assertTrue(lowest < 2 * truth.noise().ofFirstNormal(lowest), "N1 = " + lowest + " Pa at 0.01 1/s");
        boolean negative = false;
        for (String name : exports.keySet()) {
            if (name.contains("flow")) {
                negative |= ExportText.of(FOLDER.resolve(name)).number(0, 3) < 0;
            }
        }
        assertTrue(negative, "no export has a negative first normal stress difference at 0.01 1/s");
    }

    private List<Double> sweepResiduals(String name) throws IOException {
        return residuals(name, name.substring(0, 4));
    }

    private List<Double> residuals(String name, String lot) throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve(name));
        double kelvin = Integer.parseInt(name.replaceAll(".*-(\\d+)C.*", "$1")) + 273.15;
        double unit = name.startsWith("R-04") && kelvin != 443.15 ? 1000 : 1; // the 170 °C export holds Pa under kPa
        List<Protocol.Point> points = Protocol.frequencySweep();
        List<Double> residuals = new ArrayList<>();
        for (int row = 0; row < points.size(); row++) {
            HiddenFluid melt =
                    truth.fluid(truth.lot(lot), kelvin, points.get(row).time());
            double frequency = text.number(row, 0);
            double storage = melt.storage(frequency);
            double loss = melt.loss(frequency);
            residuals.add((text.number(row, 1) * unit - storage) / Math.hypot(0.02 * storage, 1.0));
            residuals.add((text.number(row, 2) * unit - loss) / Math.hypot(0.02 * loss, 1.0));
        }
        return residuals;
    }

    private List<Double> flowResiduals(String name) throws IOException {
        ExportText text = ExportText.of(FOLDER.resolve(name));
        double unit = name.startsWith("R-04") || name.startsWith("R-07") ? 1000 : 1;
        List<Protocol.Point> points = Protocol.flowCurve();
        List<Double> residuals = new ArrayList<>();
        for (int row = 0; row < points.size(); row++) {
            HiddenFluid melt = truth.fluid(
                    truth.lot(name.substring(0, 4)), 463.15, points.get(row).time());
            double rate = text.number(row, 0);
            double stress = melt.viscosity(rate) * rate;
            double difference = melt.firstNormalCoefficient(rate) * rate * rate;
            residuals.add((text.number(row, 1) * unit - stress) / Math.hypot(0.02 * stress, 0.5));
            residuals.add((text.number(row, 3) * unit - difference) / Math.hypot(0.05 * difference, 80));
        }
        return residuals;
    }
}
