package org.meltbook.scenario;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;

/**
 * The least that can read a data file of the repository: tests use it to look at the data without the library's own
 * intake, so that an error there cannot hide one here.
 *
 * @param comments lines that begin with {@code #}, without it
 * @param headings rows of cells above the first row with a number
 * @param rows     the cells below, with decimal points
 */
record ExportText(List<String> comments, List<List<String>> headings, List<List<String>> rows) {

    /** The content of a UTF-8 file with commas, semicolons (then with decimal commas) or tabs. */
    static ExportText of(Path file) throws IOException {
        List<String> lines =
                Files.readString(file, StandardCharsets.UTF_8).lines().toList();
        List<String> table =
                lines.stream().filter(line -> !line.startsWith("#")).toList();
        String separator = separator(table.get(0));
        List<List<String>> headings = new ArrayList<>();
        List<List<String>> rows = new ArrayList<>();
        for (String line : table) {
            List<String> cells = List.of(line.split(separator, -1));
            if (!cells.get(cells.size() - 1).matches("-?[0-9][-+0-9.,eE]*")) {
                headings.add(cells);
            } else {
                rows.add(
                        separator.equals(";")
                                ? cells.stream().map(c -> c.replace(',', '.')).toList()
                                : cells);
            }
        }
        List<String> comments = lines.stream()
                .filter(line -> line.startsWith("#"))
                .map(line -> line.substring(1).strip())
                .toList();
        return new ExportText(comments, headings, rows);
    }

    private static String separator(String headings) {
        return headings.contains("\t") ? "\t" : headings.contains(";") ? ";" : ",";
    }

    /** The number in a row and column, both counted from zero. */
    double number(int row, int column) {
        return Double.parseDouble(rows.get(row).get(column));
    }
}
