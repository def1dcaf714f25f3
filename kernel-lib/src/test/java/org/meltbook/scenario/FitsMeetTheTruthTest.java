package org.meltbook.scenario;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.nio.file.Path;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.meltbook.house.Repository;
import org.meltbook.intake.Exports;
import org.meltbook.spectrum.SpectrumFit;
import org.meltbook.units.Prediction;
import org.meltbook.viscosity.Cross;
import org.meltbook.viscosity.ViscosityFit;

/** What is read off the invented measurements, held against the fluid that made them: η₀ = Σ g λ. */
class FitsMeetTheTruthTest {
    private static final Truth TRUTH = Truth.load();

    private static double trueViscosity(String lot, int celsius) {
        return TRUTH.fluid(TRUTH.lot(lot), celsius + 273.15).modes().stream()
                .mapToDouble(mode -> mode.modulus() * mode.time())
                .sum();
    }

    private static Path export(String name) {
        return Repository.data().resolve("scenario").resolve(name);
    }

    /** The readings scatter by 2 %; the terminal zone of G″ is reached at 190 °C. */
    @ParameterizedTest
    @CsvSource({
        "A-00, A-00/frequency-sweep-190C.csv",
        "R-01, R-01/frequency-sweep-190C.txt",
        "R-04, R-04/frequency-sweep-190C.csv"
    })
    void sweeps_into_the_terminal_zone_give_the_zero_shear_viscosity(String lot, String file) {
        Prediction found =
                SpectrumFit.of(Exports.read(export(file)).frequencySweep()).zeroShearViscosity();
        double truth = trueViscosity(lot, 190);
        assertEquals(truth, found.value(), 0.02 * truth);
        assertTrue(found.low() <= truth && truth <= found.high(), found + ", truth " + truth);
    }

    @ParameterizedTest
    @CsvSource({
        "A-00, 150, A-00/frequency-sweep-150C.csv",
        "A-00, 170, A-00/frequency-sweep-170C.csv",
        "R-01, 150, R-01/frequency-sweep-150C.txt",
        "R-01, 170, R-01/frequency-sweep-170C.txt",
        "R-07, 150, R-07/frequency-sweep-150C.csv",
        "R-07, 190, R-07/frequency-sweep-190C.csv"
    })
    void sweeps_short_of_it_give_a_bound_below_the_truth_and_near_it(String lot, int celsius, String file) {
        Prediction found =
                SpectrumFit.of(Exports.read(export(file)).frequencySweep()).zeroShearViscosity();
        double truth = trueViscosity(lot, celsius);
        assertEquals(Prediction.Standing.AT_LEAST, found.standing());
        assertTrue(found.low() <= truth && found.low() > 0.7 * truth, found + ", truth " + truth);
    }

    /** The fluid is no Cross fluid; its flow curve ends just short of the plateau. */
    @Test
    void the_flow_curve_gives_a_bound_below_the_truth_and_the_limit_of_the_law_near_it() {
        ViscosityFit fit =
                ViscosityFit.of(Exports.read(export("A-00/flow-curve-190C.csv")).flowCurve(), Cross.FAMILY);
        double truth = trueViscosity("A-00", 190);
        assertTrue(fit.zeroShearViscosity().low() < truth, fit.toString());
        assertEquals(truth, fit.extrapolatedLimit().orElseThrow().value(), 0.05 * truth);
    }
}
