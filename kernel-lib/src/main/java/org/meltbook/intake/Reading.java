package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CsvRecord;
import java.nio.charset.CharacterCodingException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.meltbook.measure.Vocabulary;
import org.meltbook.units.Quantity;

/**
 * A file about to be read, with what the caller decides about it. Whatever is not decided here is found out, and the
 * intake log says what was found. Each method gives a new reading; {@link #read} does the work.
 */
public final class Reading {
    /** As much of a file as is looked at to find its delimiter and header. */
    private static final int BEGINNING = 1 << 16;

    private final Path path;
    private final Options options;

    Reading(Path path, Options options) {
        this.path = path;
        this.options = options;
    }

    /** Cells are set apart by this character: comma, semicolon or tab. */
    public Reading delimiter(char character) {
        return with(Optional.of(Delimiter.of(character)), options.decimal(), options.units(), options.vocabulary());
    }

    /** A comma stands before the decimals; points may set off groups of three digits. */
    public Reading decimalComma() {
        return decimal(new DecimalSign(',', true));
    }

    /** A point stands before the decimals; commas may set off groups of three digits. */
    public Reading decimalPoint() {
        return decimal(new DecimalSign('.', true));
    }

    private Reading decimal(DecimalSign sign) {
        return with(options.delimiter(), Optional.of(sign), options.units(), options.vocabulary());
    }

    /** The column with this heading, or name without unit, is given in this unit, whatever the file says. */
    public Reading unit(String heading, String unit) {
        Map<String, String> units = new LinkedHashMap<>(options.units());
        units.put(heading, unit);
        return with(options.delimiter(), options.decimal(), units, options.vocabulary());
    }

    /** A heading of this name means this quantity. */
    public Reading where(String name, Quantity quantity) {
        return using(options.vocabulary().with(name, quantity));
    }

    /** Headings mean what this vocabulary says. */
    public Reading using(Vocabulary vocabulary) {
        return with(options.delimiter(), options.decimal(), options.units(), vocabulary);
    }

    /** Rows with equal cells in these columns make one measurement each. */
    public Reading splitBy(String... headings) {
        return new Reading(path, options.splitBy(List.of(headings)));
    }

    private Reading with(
            Optional<Delimiter> delimiter, Optional<DecimalSign> decimal, Map<String, String> units, Vocabulary names) {
        return new Reading(path, new Options(delimiter, decimal, units, names, options.keys()));
    }

    /**
     * The measurements of the file, with the log of how they were read.
     *
     * @throws IntakeException if the file, or any cell of it, cannot be read: nothing is passed over in silence
     */
    public Intake read() {
        SourceFile file = SourceFile.of(path);
        try {
            return read(file, new ArrayList<>());
        } catch (RuntimeException e) {
            if (!isMalformed(e)) {
                throw e;
            }
            if (!file.isUtf8()) {
                throw new IntakeException(file.name(), 0, "", "text in " + file.encoding(), "malformed characters")
                        .because(e);
            }
            return read(
                    file.asLatin(),
                    new ArrayList<>(List.of("not UTF-8 text: read as ISO 8859-1, in which every byte"
                            + " is a letter; check µ, ° and names")));
        }
    }

    private static boolean isMalformed(Throwable e) {
        for (Throwable cause = e; cause != null; cause = cause.getCause()) {
            if (cause instanceof CharacterCodingException) {
                return true;
            }
        }
        return false;
    }

    private Intake read(SourceFile file, List<String> warnings) {
        String beginning = file.beginning(BEGINNING);
        Delimiter delimiter =
                options.delimiter().orElseGet(() -> Delimiter.find(file.name(), beginning, options.vocabulary()));
        Layout layout = layout(file, delimiter, beginning);
        RowPass pass = new RowPass(file, delimiter);
        Survey survey = new Survey(file.name(), layout);
        pass.walk(survey.remarks()::add, survey::see);
        if (survey.rowsRead() == 0) {
            throw new IntakeException(file.name(), 0, "", "rows of numbers below the header", "a header only");
        }
        DecimalSign decimal = options.decimal().orElseGet(survey::decimal);
        Body body = new Body(file.name(), layout, options.vocabulary(), decimal);
        String digest = pass.walk(comment -> {}, row -> {
            if (survey.isData(row)) {
                body.add(row);
            }
        });
        Dialect dialect = new Dialect(file.encoding(), delimiter, decimal);
        return new Gathering(file.name(), digest, layout, body, survey.remarks())
                .gather(options.vocabulary(), warnings)
                .intake(this, dialect, survey);
    }

    private Layout layout(SourceFile file, Delimiter delimiter, String beginning) {
        List<CsvRecord> first = delimiter.rows(beginning, 2);
        if (first.isEmpty()) {
            throw new IntakeException(
                    file.name(), 0, "", "a header and rows of numbers", "blank and comment lines only");
        }
        return LayoutFinder.find(
                file.name(), options, first.get(0), first.stream().skip(1).findFirst());
    }
}
