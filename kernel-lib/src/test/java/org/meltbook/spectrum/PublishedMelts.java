package org.meltbook.spectrum;

import java.nio.file.Path;
import java.util.List;
import org.meltbook.house.Repository;
import org.meltbook.intake.Exports;
import org.meltbook.measure.FlowCurve;
import org.meltbook.measure.FrequencySweep;

/** The published data of the repository, read as a notebook reads them. Each file names its source. */
public final class PublishedMelts {
    private PublishedMelts() {}

    /**
     * Narrow polystyrene, 290 kg/mol, 180 °C: Schausberger, Schindlauer, Janeschitz-Kriegl, Rheol. Acta 24 (1985) 220.
     */
    static FrequencySweep narrow290() {
        return Exports.read(file("polystyrene-290k-schausberger-1985.csv")).frequencySweep();
    }

    /** Narrow polystyrene, 750 kg/mol, 180 °C: same paper. */
    static FrequencySweep narrow750() {
        return Exports.read(file("polystyrene-750k-schausberger-1985.csv")).frequencySweep();
    }

    /** Broad polystyrene, 390 kg/mol, 160 °C: Montfort, Marin, Monge, Macromolecules 17 (1984) 1551. */
    static FrequencySweep broad390() {
        return Exports.read(file("polystyrene-390k-montfort-1984.csv")).frequencySweep();
    }

    /** Silicone with corundum sand at six loadings: Zwaan and others (2018), doi 10.5880/fidgeo.2018.023. */
    public static List<FlowCurve> filledSilicone() {
        return Exports.read(file("silicone-corundum-zwaan-2018.csv")).flowCurves();
    }

    /** LDPE Melt I, 150 °C: Laun, Rheol. Acta 17 (1978) 1, from memory. */
    public static RelaxationSpectrum meltOne() {
        return RelaxationSpectrum.of(
                Exports.read(file("ldpe-melt-i-laun-1978.csv")).modeTable());
    }

    private static Path file(String name) {
        return Repository.data().resolve("published").resolve(name);
    }
}
