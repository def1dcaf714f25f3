package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CsvRecord;
import java.util.ArrayList;
import java.util.List;
import org.meltbook.intake.Layout.Use;

/** What a first walk through a file tells: remarks, how many rows there are, which are empty, how decimals look. */
final class Survey {
    private final String file;
    private final Layout layout;
    private final List<Use> numbers;
    private final DecimalEvidence evidence;
    private final Remarks remarks = new Remarks();
    private final List<Long> emptyLines = new ArrayList<>();
    private long rowsRead;

    Survey(String file, Layout layout) {
        this.file = file;
        this.layout = layout;
        this.evidence = new DecimalEvidence(file);
        this.numbers = layout.numbers();
    }

    /**
     * Takes one row into account.
     *
     * @throws IntakeException if it has more or fewer cells than the header
     */
    void see(CsvRecord row) {
        if (row.getStartingLineNumber() <= layout.body()) {
            return;
        }
        int cells = row.getFieldCount();
        if (cells != layout.columns().size()) {
            throw new IntakeException(
                    file,
                    row.getStartingLineNumber(),
                    "",
                    layout.columns().size() + " cells, as in the header",
                    cells + (cells == 1 ? " cell" : " cells"));
        }
        rowsRead++;
        if (isEmpty(row)) {
            emptyLines.add(row.getStartingLineNumber());
            return;
        }
        for (Use use : numbers) {
            evidence.see(
                    row.getField(use.index()),
                    row.getStartingLineNumber(),
                    use.heading().text());
        }
    }

    private static boolean isEmpty(CsvRecord row) {
        for (int i = 0; i < row.getFieldCount(); i++) {
            if (!row.getField(i).isBlank()) {
                return false;
            }
        }
        return true;
    }

    /** Whether the row holds anything below the header. */
    boolean isData(CsvRecord row) {
        return row.getStartingLineNumber() > layout.body() && !isEmpty(row);
    }

    Remarks remarks() {
        return remarks;
    }

    /** How many rows stand below the header, empty ones included. */
    long rowsRead() {
        return rowsRead;
    }

    /** The lines of rows in which all cells are empty. */
    List<Long> emptyLines() {
        return List.copyOf(emptyLines);
    }

    DecimalSign decimal() {
        return evidence.decide();
    }
}
