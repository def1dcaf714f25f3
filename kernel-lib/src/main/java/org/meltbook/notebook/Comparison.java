package org.meltbook.notebook;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.stream.Stream;
import org.meltbook.kernel.MimeBundle;

/**
 * The results stored in a notebook held against those of a fresh run: every printed line, every table, every figure's
 * numbers. Pictures themselves are not compared.
 */
public final class Comparison {
    private final List<String> differences;

    private Comparison(List<String> differences) {
        this.differences = List.copyOf(differences);
    }

    /**
     * Compares cell by cell.
     *
     * @param name   what messages call the notebook
     * @param stored the notebook as it was
     * @param fresh  the same notebook after a run to its end
     */
    public static Comparison of(String name, Notebook stored, Notebook fresh) {
        List<Notebook.Cell> before = Tidy.of(stored).cells();
        List<Notebook.Cell> now = Tidy.of(fresh).cells();
        List<String> differences = new ArrayList<>();
        int number = 0;
        for (int i = 0; i < now.size(); i++) {
            if (!now.get(i).isRunnable()) {
                continue;
            }
            number++;
            String where = name + ": cell " + number + " (" + now.get(i).id() + "): ";
            difference(before.get(i).outputs(), now.get(i).outputs()).ifPresent(d -> differences.add(where + d));
        }
        return new Comparison(differences);
    }

    /** The first difference of each cell that differs, with what was expected and what was found; empty if none. */
    public List<String> differences() {
        return differences;
    }

    private static Optional<String> difference(List<Output> before, List<Output> now) {
        Optional<String> text = firstLine(lines(before, false), lines(now, false));
        return text.or(() -> figures(before, now)).or(() -> firstLine(lines(before, true), lines(now, true)));
    }

    private static Optional<String> firstLine(List<String> before, List<String> now) {
        for (int i = 0; i < Math.max(before.size(), now.size()); i++) {
            String expected = i < before.size() ? before.get(i) : "(nothing more)";
            String found = i < now.size() ? now.get(i) : "(nothing more)";
            if (!expected.equals(found)) {
                return Optional.of("line " + (i + 1) + " of its output differs\n  expected: " + expected
                        + "\n  found:    " + found);
            }
        }
        return Optional.empty();
    }

    private static Optional<String> figures(List<Output> before, List<Output> now) {
        return FigureData.difference("figure", figures(before), figures(now))
                .map(d -> d.place() + " differs\n  expected: " + d.expected() + "\n  found:    " + d.found());
    }

    private static List<Object> figures(List<Output> outputs) {
        List<Object> figures = new ArrayList<>();
        for (Output output : outputs) {
            if (output instanceof Output.Value value
                    && value.bundle().data().get(FigureData.MIME) instanceof List<?> several) {
                figures.addAll(several);
            }
        }
        return figures;
    }

    private static List<String> lines(List<Output> outputs, boolean rich) {
        return outputs.stream().flatMap(output -> lines(output, rich)).toList();
    }

    private static Stream<String> lines(Output output, boolean rich) {
        if (output instanceof Output.Stream stream) {
            return rich ? Stream.empty() : stream.text().lines();
        } else if (output instanceof Output.Failure failure) {
            return rich ? Stream.empty() : (failure.kind() + ": " + failure.message()).lines();
        }
        MimeBundle bundle = ((Output.Value) output).bundle();
        if (!rich) {
            return bundle.plainText().lines();
        }
        return bundle.data().entrySet().stream()
                .filter(form ->
                        form.getKey().startsWith("text/") && !form.getKey().equals("text/plain"))
                .flatMap(form -> visible(form.getValue().toString()));
    }

    /** What a reader sees of HTML, about line by line. */
    private static Stream<String> visible(String html) {
        return html.replaceAll("</(td|th)>", " | ")
                .replaceAll("<[^>]*>", "")
                .lines()
                .map(String::strip)
                .filter(line -> !line.isEmpty());
    }
}
