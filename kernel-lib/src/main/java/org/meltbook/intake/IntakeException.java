package org.meltbook.intake;

import org.meltbook.base.MeltbookException;

/**
 * A file that cannot be read as measurements. The message names file, line and column, what was expected there and what
 * was found: {@code sweep.csv:14, column 'G′ [Pa]': expected a number, found 'n.a.'}.
 */
public final class IntakeException extends MeltbookException {
    private static final long serialVersionUID = 1L;
    private static final int SHOWN = 60;

    private final String file;
    private final long line;
    private final String column;
    private final String expected;
    private final String found;

    /**
     * An error at one place.
     *
     * @param file     name of the file
     * @param line     line of the file, counted from 1; 0 if the file as a whole is meant
     * @param column   heading of the column as written; empty if the line as a whole is meant
     * @param expected what should stand there
     * @param found    what stands there
     */
    public IntakeException(String file, long line, String column, String expected, String found) {
        super(message(file, line, column, expected, found));
        this.file = file;
        this.line = line;
        this.column = column;
        this.expected = expected;
        this.found = found;
    }

    /** The same error with the failure that led to it. */
    IntakeException because(Throwable cause) {
        initCause(cause);
        return this;
    }

    private static String message(String file, long line, String column, String expected, String found) {
        return file + (line > 0 ? ":" + line : "") + (column.isEmpty() ? "" : ", column '" + column + "'")
                + ": expected " + expected + ", found " + found;
    }

    /** A cell as it can be shown: in quotes, cut where it is long, control characters as question marks. */
    static String quoted(String cell) {
        String cut = cell.length() > SHOWN ? cell.substring(0, SHOWN) + "…" : cell;
        return "'" + cut.replaceAll("\\p{Cntrl}", "?") + "'";
    }

    /** Name of the file. */
    public String file() {
        return file;
    }

    /** Line of the file, counted from 1; 0 if the file as a whole is meant. */
    public long line() {
        return line;
    }

    /** Heading of the column as written; empty if the line or the file as a whole is meant. */
    public String column() {
        return column;
    }

    /** What should stand there. */
    public String expected() {
        return expected;
    }

    /** What stands there. */
    public String found() {
        return found;
    }
}
