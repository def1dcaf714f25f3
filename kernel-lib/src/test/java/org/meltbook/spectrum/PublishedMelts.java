package org.meltbook.spectrum;

import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.measure.Conditions;
import org.meltbook.measure.Curve;
import org.meltbook.measure.FrequencySweep;
import org.meltbook.measure.Series;
import org.meltbook.numeric.ReferenceTable;
import org.meltbook.units.Quantity;

/** Published data of the reference files as measurements and spectra. */
public final class PublishedMelts {
    private PublishedMelts() {}

    /**
     * Narrow polystyrene, 290 kg/mol, 180 °C: Schausberger, Schindlauer, Janeschitz-Kriegl, Rheol. Acta 24 (1985) 220.
     */
    static FrequencySweep narrow290() {
        return sweep("polystyrene 290 kg/mol", "saos_ps_290k_narrow_180C.csv");
    }

    /** Narrow polystyrene, 750 kg/mol, 180 °C: same paper. */
    static FrequencySweep narrow750() {
        return sweep("polystyrene 750 kg/mol", "saos_ps_750k_narrow_180C.csv");
    }

    /** Broad polystyrene, 390 kg/mol, 160 °C: Montfort, Marin, Monge, Macromolecules 17 (1984) 1551. */
    static FrequencySweep broad390() {
        return sweep("polystyrene 390 kg/mol, broad", "saos_ps_390k_polydisperse_160C.csv");
    }

    private static FrequencySweep sweep(String sample, String file) {
        ReferenceTable table = ReferenceTable.of(file);
        return FrequencySweep.of(
                Conditions.of(sample, file),
                curve(table.where("quantity", "storage"), Quantity.STORAGE_MODULUS),
                curve(table.where("quantity", "loss"), Quantity.LOSS_MODULUS),
                List.of());
    }

    private static Curve curve(ReferenceTable table, Quantity modulus) {
        return Curve.of(
                Series.of(Quantity.ANGULAR_FREQUENCY, table.numbers("angular_frequency_rad_per_s")),
                Series.of(modulus, table.numbers("modulus_Pa")));
    }

    /** LDPE Melt I, 150 °C: Laun, Rheol. Acta 17 (1978) 1, from memory. */
    public static RelaxationSpectrum meltOne() {
        ReferenceTable table = ReferenceTable.of("ldpe_melt_I_spectrum_150C.csv");
        return RelaxationSpectrum.of(
                Doubles.of(table.numbers("modulus_Pa")), Doubles.of(table.numbers("relaxation_time_s")));
    }
}
