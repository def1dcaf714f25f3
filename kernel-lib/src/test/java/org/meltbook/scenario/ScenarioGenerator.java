package org.meltbook.scenario;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import java.util.function.ToDoubleFunction;
import org.meltbook.scenario.Protocol.Point;
import org.meltbook.scenario.Truth.Lot;

/**
 * Writes the exports of the invented company. Run {@link #main} to rewrite {@code data/scenario}; the same truth gives
 * the same bytes. One more lot is one more entry in {@code truth.json} and one more line in {@link #HABITS}.
 */
public final class ScenarioGenerator {
    private static final double ZERO_CELSIUS = 273.15;
    private static final List<Integer> SWEEP_TEMPERATURES = List.of(150, 170, 190);
    private static final int FLOW_CURVE_TEMPERATURE = 190;

    /** In which dialects the exports of a lot are written, and which of them carries a wrong unit, if any. */
    private record Habit(Dialect sweeps, Dialect flowCurve, String mislabelled) {}

    private static final Map<String, Habit> HABITS = Map.of(
            "A-00", new Habit(Dialect.COMMA, Dialect.COMMA, ""),
            "R-01", new Habit(Dialect.TAB, Dialect.TAB, ""),
            "R-04", new Habit(Dialect.SEMICOLON, Dialect.SEMICOLON, "R-04/frequency-sweep-170C"),
            "R-07", new Habit(Dialect.COMMA, Dialect.SEMICOLON, ""),
            "R-11", new Habit(Dialect.TAB, Dialect.COMMA, ""));

    private final Truth truth;

    /** A generator of what the laboratory would export if {@code truth} were so. */
    ScenarioGenerator(Truth truth) {
        this.truth = truth;
    }

    /** Rewrites the exports in {@code data/scenario}; takes no arguments. */
    public static void main(String... arguments) throws IOException {
        Path folder = Repository.data().resolve("scenario");
        for (Map.Entry<String, String> export : new ScenarioGenerator(Truth.load()).exports().entrySet()) {
            Path file = folder.resolve(export.getKey());
            Files.createDirectories(file.getParent());
            Files.write(file, export.getValue().getBytes(StandardCharsets.UTF_8));
        }
    }

    /** Every export: its path below {@code data/scenario} with slashes, and its text. */
    SortedMap<String, String> exports() {
        SortedMap<String, String> exports = new TreeMap<>();
        for (Lot lot : truth.lots()) {
            Habit habit = HABITS.get(lot.name());
            for (int celsius : SWEEP_TEMPERATURES) {
                String name = lot.name() + "/frequency-sweep-" + celsius + "C";
                exports.put(name + habit.sweeps().ending(), sweep(lot, celsius, name, habit));
            }
            String name = lot.name() + "/flow-curve-" + FLOW_CURVE_TEMPERATURE + "C";
            exports.put(name + habit.flowCurve().ending(), flowCurve(lot, name, habit));
        }
        return exports;
    }

    private String sweep(Lot lot, int celsius, String name, Habit habit) {
        List<Point> points = Protocol.frequencySweep();
        Scatter scatter = Scatter.of(truth.seed(), name);
        List<Double> storage = new ArrayList<>();
        List<Double> loss = new ArrayList<>();
        for (Point point : points) {
            HiddenFluid fluid = truth.fluid(lot, celsius + ZERO_CELSIUS, point.time());
            double trueStorage = fluid.storage(point.setting());
            double trueLoss = fluid.loss(point.setting());
            storage.add(scatter.about(trueStorage, truth.noise().ofModulus(trueStorage)));
            loss.add(scatter.about(trueLoss, truth.noise().ofModulus(trueLoss)));
        }
        List<Column> columns = new ArrayList<>();
        columns.add(column("angular frequency", "ω", "rad/s", points, Point::setting));
        columns.add(inHabit(new Column("storage modulus", "G'", "Pa", storage), habit.sweeps(), name, habit));
        columns.add(inHabit(new Column("loss modulus", "G''", "Pa", loss), habit.sweeps(), name, habit));
        if (habit.sweeps() == Dialect.TAB) {
            columns.add(column("time", "t", "s", points, Point::time));
        }
        Map<String, String> preamble = preamble(lot, celsius);
        preamble.put("geometry", "parallel plates, diameter 25 mm, gap 1 mm");
        preamble.put("strain amplitude", "3 %");
        return habit.sweeps().write(preamble, columns);
    }

    private String flowCurve(Lot lot, String name, Habit habit) {
        List<Point> points = Protocol.flowCurve();
        Scatter scatter = Scatter.of(truth.seed(), name);
        List<Double> stress = new ArrayList<>();
        List<Double> viscosity = new ArrayList<>();
        List<Double> firstNormal = new ArrayList<>();
        for (Point point : points) {
            double rate = point.setting();
            HiddenFluid fluid = truth.fluid(lot, FLOW_CURVE_TEMPERATURE + ZERO_CELSIUS, point.time());
            double trueStress = fluid.viscosity(rate) * rate;
            double trueDifference = fluid.firstNormalCoefficient(rate) * rate * rate;
            stress.add(scatter.about(trueStress, truth.noise().ofStress(trueStress)));
            viscosity.add(stress.get(stress.size() - 1) / rate);
            firstNormal.add(scatter.about(trueDifference, truth.noise().ofFirstNormal(trueDifference)));
        }
        Dialect dialect = habit.flowCurve();
        List<Column> columns = List.of(
                column("shear rate", "γ̇", "1/s", points, Point::setting),
                inHabit(new Column("shear stress", "σ", "Pa", stress), dialect, name, habit),
                new Column("viscosity", "η", "Pa·s", viscosity),
                inHabit(new Column("first normal stress difference", "N1", "Pa", firstNormal), dialect, name, habit));
        Map<String, String> preamble = preamble(lot, FLOW_CURVE_TEMPERATURE);
        preamble.put("geometry", "cone and plate, diameter 25 mm, cone angle 0.1 rad");
        return dialect.write(preamble, columns);
    }

    /** The program that writes semicolons writes stresses in kPa; the mislabelled export has the unit but not the numbers. */
    private static Column inHabit(Column column, Dialect dialect, String name, Habit habit) {
        if (name.equals(habit.mislabelled())) {
            return column.mislabelled("kPa");
        }
        return dialect == Dialect.SEMICOLON ? column.inThousands() : column;
    }

    private static Column column(
            String label, String symbol, String unit, List<Point> points, ToDoubleFunction<Point> value) {
        return new Column(
                label, symbol, unit, points.stream().mapToDouble(value).boxed().toList());
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
