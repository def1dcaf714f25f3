package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CsvParseException;
import de.siegmar.fastcsv.reader.CsvReader;
import de.siegmar.fastcsv.reader.CsvRecord;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.function.Consumer;
import org.meltbook.base.Progress;

/** One walk through the rows of a file, from the first to the last. */
final class RowPass {
    private static final int LOOK_UP = 4096;

    private final SourceFile file;
    private final Delimiter delimiter;

    RowPass(SourceFile file, Delimiter delimiter) {
        this.file = file;
        this.delimiter = delimiter;
    }

    /**
     * Hands out comment lines and rows in the order of the file; blank lines are passed over.
     *
     * @return SHA-256 of the file in hexadecimal
     * @throws IntakeException if the text cannot be cut into rows
     */
    String walk(Consumer<String> comments, Consumer<CsvRecord> rows) {
        long line = 0;
        try (SourceFile.Text text = file.open();
                CsvReader<CsvRecord> reader = delimiter.reader().ofCsvRecord(text.reader())) {
            long seen = 0;
            for (CsvRecord row : reader) {
                line = row.getStartingLineNumber();
                if (seen++ % LOOK_UP == 0) {
                    Progress.QUIET.at(seen, 0, "reading " + file.name());
                }
                if (row.isComment()) {
                    comments.accept(row.getField(0));
                } else {
                    rows.accept(row);
                }
            }
            return text.sha256();
        } catch (CsvParseException e) {
            throw new IntakeException(
                            file.name(),
                            line + 1,
                            "",
                            "rows of cells",
                            "text that cannot be cut into cells (" + e.getMessage() + ")")
                    .because(e);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
