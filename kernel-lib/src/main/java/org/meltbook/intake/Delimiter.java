package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CommentStrategy;
import de.siegmar.fastcsv.reader.CsvParseException;
import de.siegmar.fastcsv.reader.CsvReader;
import de.siegmar.fastcsv.reader.CsvRecord;
import java.io.IOException;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import org.meltbook.measure.Heading;
import org.meltbook.measure.Vocabulary;

/** What stands between the cells of a row. */
enum Delimiter {
    TAB('\t', "tab"),
    SEMICOLON(';', "semicolon"),
    COMMA(',', "comma");

    private static final int LOOKED_AT = 200;

    private final char character;
    private final String word;

    Delimiter(char character, String word) {
        this.character = character;
        this.word = word;
    }

    @Override
    public String toString() {
        return word;
    }

    /** The rows and comment lines of delimited text. */
    CsvReader.CsvReaderBuilder reader() {
        return CsvReader.builder()
                .fieldSeparator(character)
                .commentStrategy(CommentStrategy.READ)
                .skipEmptyLines(true)
                .allowExtraFields(true)
                .allowMissingFields(true);
    }

    /** The delimiter of that character. */
    static Delimiter of(char character) {
        for (Delimiter delimiter : values()) {
            if (delimiter.character == character) {
                return delimiter;
            }
        }
        throw new IllegalArgumentException("a delimiter is comma, semicolon or tab, found '" + character + "'");
    }

    /** How one delimiter would read the beginning of a file. */
    private record Trial(Delimiter delimiter, int cells, boolean even, long known) {}

    /**
     * The delimiter that cuts all rows of the beginning of a file into the same number of cells, with a heading that
     * the vocabulary knows best.
     *
     * @throws IntakeException if none gives two cells a row, or two do equally well
     */
    static Delimiter find(String file, String beginning, Vocabulary vocabulary) {
        List<Trial> trials = new ArrayList<>();
        for (Delimiter delimiter : values()) {
            List<CsvRecord> rows = delimiter.rows(beginning, LOOKED_AT);
            if (!rows.isEmpty() && rows.get(0).getFieldCount() >= 2) {
                trials.add(trial(delimiter, rows, vocabulary));
            }
        }
        trials.sort(Comparator.comparing(Trial::even)
                .thenComparing(Trial::known)
                .thenComparing(Trial::cells)
                .reversed());
        if (trials.isEmpty()) {
            throw new IntakeException(
                    file,
                    0,
                    "",
                    "a header and rows of two or more cells, set apart by comma, semicolon or tab",
                    IntakeException.quoted(beginning
                            .lines()
                            .filter(line -> !line.startsWith("#") && !line.isBlank())
                            .findFirst()
                            .orElse("comment lines only")));
        }
        if (trials.size() > 1 && sameRank(trials.get(0), trials.get(1))) {
            throw new IntakeException(
                    file,
                    0,
                    "",
                    "one delimiter",
                    "text that can be cut by " + trials.get(0).delimiter() + " as well as by "
                            + trials.get(1).delimiter() + ": say which with Exports.reading(file).delimiter(…)");
        }
        return trials.get(0).delimiter();
    }

    private static boolean sameRank(Trial first, Trial second) {
        return first.even() == second.even() && first.known() == second.known() && first.cells() == second.cells();
    }

    private static Trial trial(Delimiter delimiter, List<CsvRecord> rows, Vocabulary vocabulary) {
        int cells = rows.get(0).getFieldCount();
        boolean even = rows.stream().allMatch(row -> row.getFieldCount() == cells);
        long known = rows.get(0).getFields().stream()
                .filter(cell -> Heading.of(cell, vocabulary).quantity().isPresent())
                .count();
        return new Trial(delimiter, cells, even, known);
    }

    /** The first rows of the beginning of a file, up to {@code most}; none if its quotes do not pair. */
    List<CsvRecord> rows(String beginning, int most) {
        List<CsvRecord> rows = new ArrayList<>();
        try (CsvReader<CsvRecord> reader = reader().ofCsvRecord(beginning)) {
            for (CsvRecord row : reader) {
                if (rows.size() == most) {
                    break;
                }
                if (!row.isComment()) {
                    rows.add(row);
                }
            }
        } catch (CsvParseException | IOException badlyQuoted) {
            return List.of();
        }
        return rows;
    }
}
