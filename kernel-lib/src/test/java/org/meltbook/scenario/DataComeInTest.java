package org.meltbook.scenario;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.meltbook.house.Repository;
import org.meltbook.intake.Exports;
import org.meltbook.intake.Intake;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Measurement;
import org.meltbook.measure.Verdict;
import org.meltbook.units.Quantity;

/** Every measurement of the repository's data is read without options, and none of its rows is lost. */
class DataComeInTest {
    private static final Path DATA = Repository.data();

    static List<Path> measurements() throws IOException {
        try (Stream<Path> files = Files.walk(DATA)) {
            return files.filter(file -> file.toString().matches(".*\\.(csv|txt)"))
                    .sorted()
                    .toList();
        }
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void every_row_of_every_file_comes_out_again(Path file) throws IOException {
        Intake intake = Exports.read(file);
        int rows = ExportText.of(file).rows().size();
        assertEquals(rows, intake.rowsRead(), "rows read of " + file);
        assertEquals(rows, intake.rowsOut(), "rows out of " + file);
        assertEquals(0, intake.rowsSetAside(), "rows set aside of " + file);
    }

    @ParameterizedTest
    @MethodSource("measurements")
    void no_row_is_doubted_but_a_first_normal_stress_difference_below_zero(Path file) {
        for (Measurement measurement : Exports.read(file).measurements()) {
            for (Curve curve : measurement.curves()) {
                boolean normal = curve.y().quantity() == Quantity.FIRST_NORMAL_STRESS_DIFFERENCE;
                for (int row = 0; row < curve.size(); row++) {
                    boolean sound = curve.verdicts().get(row).equals(Verdict.SOUND);
                    assertEquals(normal && curve.y().at(row) < 0, !sound, file + ", row " + row);
                }
            }
        }
    }

    @ParameterizedTest
    @CsvSource({
        // file, temperature in K, first storage modulus in Pa: the first cell of the file, from kPa where it says so
        "scenario/A-00/frequency-sweep-190C.csv, 463.15, 1",
        "scenario/R-01/frequency-sweep-150C.txt, 423.15, 1",
        "scenario/R-04/frequency-sweep-190C.csv, 463.15, 1000",
        "scenario/R-04/frequency-sweep-170C.csv, 443.15, 1000"
    })
    void sweeps_keep_their_temperature_and_come_to_pascal(String name, double kelvin, double unit) throws IOException {
        FrequencySweep sweep = Exports.read(DATA.resolve(name)).frequencySweep();
        ExportText text = ExportText.of(DATA.resolve(name));
        assertEquals(kelvin, sweep.conditions().temperature().orElseThrow(), 1e-9);
        assertEquals("QB-40 lot " + name.substring(9, 13), sweep.conditions().sample());
        assertEquals(text.number(0, 1) * unit, sweep.storage().y().at(0), 1e-9 * unit * text.number(0, 1));
        assertEquals(23, sweep.loss().usable().size());
    }

    @ParameterizedTest
    @CsvSource({"A-00/flow-curve-190C.csv", "R-01/flow-curve-190C.txt", "R-07/flow-curve-190C.csv"})
    void flow_curves_keep_first_normal_stress_differences_below_zero(String name) throws IOException {
        FlowCurve curve = Exports.read(DATA.resolve("scenario").resolve(name)).flowCurve();
        double unit = name.startsWith("R-07") ? 1000 : 1;
        double written = ExportText.of(DATA.resolve("scenario").resolve(name)).number(0, 3) * unit;
        assertEquals(written, curve.firstNormalStress().orElseThrow().y().at(0), 1e-9 * Math.abs(written));
        assertEquals(11, curve.stress().usable().size());
    }
}
