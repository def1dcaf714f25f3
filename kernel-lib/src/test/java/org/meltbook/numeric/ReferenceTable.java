package org.meltbook.numeric;

import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.List;

/**
 * Numbers with a source, kept under {@code src/test/resources/reference}: lines starting with {@code #} tell the
 * source, the next line names the columns, the others hold values parted by commas.
 */
public final class ReferenceTable {
    private final List<String> names;
    private final List<String[]> lines;

    private ReferenceTable(List<String> names, List<String[]> lines) {
        this.names = names;
        this.lines = lines;
    }

    /** The table of the given file name. */
    public static ReferenceTable of(String file) {
        List<String> text = lines(file).stream()
                .filter(line -> !line.isBlank() && !line.startsWith("#"))
                .toList();
        return new ReferenceTable(
                List.of(text.get(0).split(",")),
                text.stream().skip(1).map(line -> line.split(",")).toList());
    }

    /** All lines of a file under {@code reference}. */
    public static List<String> lines(String file) {
        try (InputStream in = ReferenceTable.class.getResourceAsStream("/reference/" + file)) {
            if (in == null) {
                throw new IllegalStateException("no reference file " + file);
            }
            return new String(in.readAllBytes(), StandardCharsets.UTF_8).lines().toList();
        } catch (IOException unreadable) {
            throw new IllegalStateException(unreadable);
        }
    }

    /** Only the lines whose cell in {@code column} reads {@code value}. */
    public ReferenceTable where(String column, String value) {
        int place = place(column);
        return new ReferenceTable(
                names, lines.stream().filter(line -> line[place].equals(value)).toList());
    }

    /** The numbers of a column. */
    public double[] numbers(String column) {
        int place = place(column);
        return lines.stream()
                .mapToDouble(line -> Double.parseDouble(line[place]))
                .toArray();
    }

    /** The distinct texts of a column, in order. */
    public List<String> distinct(String column) {
        int place = place(column);
        return lines.stream().map(line -> line[place]).distinct().toList();
    }

    private int place(String column) {
        int place = names.indexOf(column);
        if (place < 0) {
            throw new IllegalStateException("no column " + column + " in " + names);
        }
        return place;
    }
}
