package org.meltbook.scenario;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedMap;
import java.util.TreeMap;
import org.meltbook.house.Repository;
import org.meltbook.scenario.Truth.Lot;

/**
 * Writes the exports of the invented company. Run {@link #main} to rewrite {@code data/scenario}; the same truth gives
 * the same bytes. One more lot is one more entry in {@code truth.json} and one more line in {@link #HABITS}; one more
 * kind of test is one more method of {@link Laboratory} and one more line in {@link #exports}.
 */
public final class ScenarioGenerator {
    /** Which programs wrote the exports of a lot. */
    private record Habit(Dialect sweeps, Dialect flowCurves) {}

    private static final Map<String, Habit> HABITS = Map.of(
            "A-00", new Habit(Dialect.COMMA, Dialect.COMMA),
            "R-01", new Habit(Dialect.TAB, Dialect.TAB),
            "R-04", new Habit(Dialect.SEMICOLON, Dialect.SEMICOLON),
            "R-07", new Habit(Dialect.COMMA, Dialect.SEMICOLON),
            "R-11", new Habit(Dialect.TAB, Dialect.COMMA));
    private static final Set<String> MISLABELLED = Set.of("R-04/frequency-sweep-170C");

    private final Truth truth;

    /** A generator of what the laboratory would export if {@code truth} were so. */
    ScenarioGenerator(Truth truth) {
        this.truth = truth;
    }

    /** Rewrites the exports in {@code data/scenario}; takes no arguments. */
    public static void main(String... arguments) throws IOException {
        Path folder = Repository.data().resolve("scenario");
        for (Map.Entry<String, String> export :
                new ScenarioGenerator(Truth.load()).exports().entrySet()) {
            Path file = folder.resolve(export.getKey());
            Files.createDirectories(file.getParent());
            Files.writeString(file, export.getValue(), StandardCharsets.UTF_8);
        }
    }

    /** Every export: its path below {@code data/scenario} with slashes, and its text. */
    SortedMap<String, String> exports() {
        Laboratory laboratory = new Laboratory(truth);
        SortedMap<String, String> exports = new TreeMap<>();
        for (Lot lot : truth.lots()) {
            Habit habit = Optional.ofNullable(HABITS.get(lot.name())).orElseThrow();
            for (int celsius : List.of(150, 170, 190)) {
                String name = lot.name() + "/frequency-sweep-" + celsius + "C";
                Map<String, String> preamble = preamble(lot, celsius);
                preamble.put("geometry", "parallel plates, diameter 25 mm, gap 1 mm");
                preamble.put("strain amplitude", "3 %");
                List<Column> readings = laboratory.frequencySweep(lot, celsius, Scatter.of(truth.seed(), name));
                exports.put(name + habit.sweeps().ending(), text(name, habit.sweeps(), preamble, readings));
            }
            String name = lot.name() + "/flow-curve-190C";
            Map<String, String> preamble = preamble(lot, 190);
            preamble.put("geometry", "cone and plate, diameter 25 mm, cone angle 0.1 rad");
            List<Column> readings = laboratory.flowCurve(lot, 190, Scatter.of(truth.seed(), name));
            exports.put(name + habit.flowCurves().ending(), text(name, habit.flowCurves(), preamble, readings));
        }
        return exports;
    }

    private static String text(String name, Dialect dialect, Map<String, String> preamble, List<Column> readings) {
        boolean mislabelled = MISLABELLED.contains(name);
        return dialect.write(
                preamble,
                mislabelled
                        ? readings.stream().map(Column::mislabelledKilopascal).toList()
                        : readings);
    }

    private static Map<String, String> preamble(Lot lot, int celsius) {
        Map<String, String> preamble = new LinkedHashMap<>();
        preamble.put("invented data", "Quarrel Bank Compounds does not exist");
        preamble.put("sample", "QB-40 lot " + lot.name());
        preamble.put("lot", lot.name());
        preamble.put("temperature", celsius + " °C");
        return preamble;
    }
}
