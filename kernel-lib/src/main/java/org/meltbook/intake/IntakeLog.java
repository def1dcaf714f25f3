package org.meltbook.intake;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.Stream;
import org.meltbook.base.Rows;
import org.meltbook.intake.Layout.Role;
import org.meltbook.intake.Layout.Use;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;

/**
 * How a file was read.
 *
 * @param file       its name
 * @param digest     its SHA-256 in hexadecimal
 * @param dialect    how it is written
 * @param layout     what its columns are for
 * @param emptyLines lines of rows set aside because all cells are empty
 * @param rowsRead   rows below the header
 * @param rowsOut    rows that went into measurements
 */
record IntakeLog(
        String file,
        String digest,
        Dialect dialect,
        Layout layout,
        List<Long> emptyLines,
        long rowsRead,
        long rowsOut) {
    private static final int DIGEST_SHOWN = 12;
    private static final int LINES_SHOWN = 20;

    /** Checks that no row is lost: rows read = rows out + rows set aside. */
    IntakeLog {
        emptyLines = List.copyOf(emptyLines);
        if (rowsRead != rowsOut + emptyLines.size()) {
            throw new IllegalStateException(file + ": " + rowsRead + " rows in, but " + rowsOut + " out and "
                    + emptyLines.size() + " set aside");
        }
    }

    /** What was found out about the file, line by line. */
    Rows decisions() {
        List<String> what = new ArrayList<>();
        List<String> found = new ArrayList<>();
        Stream.of(
                        new String[] {"file", file},
                        new String[] {"SHA-256", digest.substring(0, DIGEST_SHOWN) + "…"},
                        new String[] {"encoding", dialect.encoding()},
                        new String[] {"delimiter", dialect.delimiter().toString()},
                        new String[] {"decimal sign", dialect.decimal().toString()},
                        new String[] {"units", units()},
                        new String[] {"split by", splitBy()},
                        new String[] {"rows read", Long.toString(rowsRead)},
                        new String[] {"rows in measurements", Long.toString(rowsOut)},
                        new String[] {"rows set aside", setAside()})
                .forEach(line -> {
                    what.add(line[0]);
                    found.add(line[1]);
                });
        return Rows.titled("Intake of " + file)
                .text("what", what)
                .text("found", found)
                .build();
    }

    private String units() {
        return layout.unitLine() > 0
                ? "row in line " + layout.unitLine() + ", where not in the headings"
                : "in the headings";
    }

    private String splitBy() {
        List<Use> keys = layout.with(Role.KEY);
        return keys.isEmpty()
                ? "nothing"
                : String.join(", ", keys.stream().map(k -> k.heading().text()).toList());
    }

    private String setAside() {
        if (emptyLines.isEmpty()) {
            return "0";
        }
        List<String> shown =
                emptyLines.stream().limit(LINES_SHOWN).map(String::valueOf).toList();
        return emptyLines.size() + ": all cells empty in line " + String.join(", ", shown)
                + (emptyLines.size() > LINES_SHOWN ? ", …" : "");
    }

    /** What each column was taken for, and what was done to its numbers. */
    Rows columns() {
        List<Use> uses = layout.columns();
        return Rows.titled("Columns of " + file)
                .text("heading", uses.stream().map(use -> use.heading().text()).toList())
                .text("read as", uses.stream().map(IntakeLog::readAs).toList())
                .text(
                        "unit",
                        uses.stream()
                                .map(use -> use.unit().map(LabUnit::text).orElse("–"))
                                .toList())
                .text("to SI", uses.stream().map(IntakeLog::conversion).toList())
                .build();
    }

    private static String readAs(Use use) {
        return switch (use.role()) {
            case NUMBERS -> use.quantity().label();
            case MODULI -> "modulus of the kind that the row names";
            case KIND -> "kind of modulus";
            case KEY -> "name of the measurement";
            case PASSED_OVER -> "passed over: " + use.why();
        };
    }

    private static String conversion(Use use) {
        if (use.unit().isEmpty()) {
            return "–";
        }
        Quantity quantity = use.role() == Role.MODULI ? Quantity.STORAGE_MODULUS : use.quantity();
        return use.unit().get().conversion(quantity) + " → " + quantity.siUnit();
    }
}
