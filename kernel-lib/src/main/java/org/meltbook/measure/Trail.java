package org.meltbook.measure;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.meltbook.base.Doubles;
import org.meltbook.base.NumberText;
import org.meltbook.base.Rows;
import org.meltbook.figure.Figure;

/** How measurements of all kinds tell of their verdicts, in headline, table, figure and cautions. */
final class Trail {
    private Trail() {}

    static String temperature(Conditions conditions) {
        return conditions.temperature().isPresent()
                ? ", at " + NumberText.of(conditions.temperature().getAsDouble() - 273.15) + " °C"
                : "";
    }

    /** What to call a measurement above a table: its sample, or else its kind. */
    static String title(Measurement measurement) {
        String sample = measurement.conditions().sample();
        return sample.isEmpty() ? measurement.kind() : sample;
    }

    /** From where to where the usable points reach along x, with the unit. */
    static String range(List<Curve> curves) {
        double[] usable = curves.stream()
                .flatMapToDouble(curve -> curve.usable().x().values().stream())
                .toArray();
        if (usable.length == 0) {
            return "none usable";
        }
        Doubles all = Doubles.of(usable);
        return NumberText.of(all.smallest()) + " to " + NumberText.of(all.largest()) + " "
                + curves.get(0).x().quantity().siUnit();
    }

    /** The notes with one more. */
    static List<Note> longer(List<Note> trail, Note note) {
        return Stream.concat(trail.stream(), Stream.of(note)).toList();
    }

    static String setAside(List<Curve> curves) {
        int count = curves.stream().mapToInt(Curve::setAside).sum();
        return count == 0 ? "" : "; " + count + " set aside";
    }

    static Rows rows(String title, Curve curve) {
        Rows.Builder table = Rows.titled(title)
                .numbers(
                        curve.x().quantity().symbol(),
                        curve.x().quantity().siUnit(),
                        curve.x().values())
                .numbers(
                        curve.y().quantity().symbol(),
                        curve.y().quantity().siUnit(),
                        curve.y().values());
        return verdicts(table, curve, curve).build();
    }

    /** Adds a verdict column where there is anything to say. */
    static Rows.Builder verdicts(Rows.Builder table, Curve first, Curve second) {
        List<String> words = IntStream.range(0, first.size())
                .mapToObj(row ->
                        words(first.verdicts().get(row), second.verdicts().get(row)))
                .toList();
        return words.stream().allMatch(String::isEmpty) ? table : table.text("verdict", words);
    }

    private static String words(Verdict first, Verdict second) {
        if (first.equals(second) || second.equals(Verdict.SOUND)) {
            return first.text();
        }
        return first.equals(Verdict.SOUND) ? second.text() : first.text() + "; " + second.text();
    }

    static void marksSetAside(Figure.Builder figure, List<Curve> curves) {
        for (Curve curve : curves) {
            int[] rows = IntStream.range(0, curve.size())
                    .filter(row -> !curve.verdicts().get(row).usable())
                    .toArray();
            if (rows.length > 0) {
                figure.marks(
                        curve.y().quantity().symbol() + " set aside",
                        curve.x().values().pick(rows),
                        curve.y().values().pick(rows));
            }
        }
    }

    /** One caution for all curves with the same verdicts, where there is anything to say. */
    static List<String> cautions(List<Curve> curves) {
        Map<List<Verdict>, List<Curve>> alike = curves.stream()
                .collect(Collectors.groupingBy(Curve::verdicts, LinkedHashMap::new, Collectors.toList()));
        List<String> all = new ArrayList<>();
        alike.forEach((verdicts, same) -> {
            long unusable = count(verdicts, Verdict.Standing.UNUSABLE);
            long doubtful = count(verdicts, Verdict.Standing.DOUBTFUL);
            if (unusable + doubtful > 0) {
                String labels =
                        same.stream().map(curve -> curve.y().quantity().label()).collect(Collectors.joining(" and "));
                all.add(labels + ": " + unusable + " of " + verdicts.size() + " points unusable, " + doubtful
                        + " doubtful; the table gives the reason of each");
            }
        });
        return List.copyOf(all);
    }

    private static long count(List<Verdict> verdicts, Verdict.Standing standing) {
        return verdicts.stream().filter(v -> v.standing() == standing).count();
    }
}
