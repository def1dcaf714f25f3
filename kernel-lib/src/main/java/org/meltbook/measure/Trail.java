package org.meltbook.measure;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
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
            return words(first);
        }
        return first.equals(Verdict.SOUND) ? words(second) : words(first) + "; " + words(second);
    }

    private static String words(Verdict verdict) {
        return verdict.equals(Verdict.SOUND)
                ? ""
                : verdict.standing().name().toLowerCase(java.util.Locale.ROOT) + ": " + verdict.reason();
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

    static List<String> cautions(List<Curve> curves) {
        List<String> all = new ArrayList<>();
        for (Curve curve : curves) {
            long doubtful = curve.verdicts().stream()
                    .filter(v -> v.standing() == Verdict.Standing.DOUBTFUL)
                    .count();
            if (curve.setAside() + doubtful > 0) {
                all.add(curve.y().quantity().label() + ": " + curve.setAside() + " of " + curve.size()
                        + " points unusable, " + doubtful + " doubtful; the table gives the reason of each");
            }
        }
        return List.copyOf(all);
    }
}
