package org.meltbook.intake;

import de.siegmar.fastcsv.reader.CsvRecord;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.meltbook.base.Doubles;
import org.meltbook.intake.Layout.Role;
import org.meltbook.intake.Layout.Use;
import org.meltbook.measure.Vocabulary;
import org.meltbook.units.Quantity;

/** The numbers of a file as they were written, column by column, each row with the group that it belongs to. */
final class Body {
    /**
     * Which rows belong together.
     *
     * @param keys cells of the key columns
     * @param kind the modulus that the rows hold, where each row names its own
     */
    record Group(List<String> keys, Optional<Quantity> kind) {}

    private final String file;
    private final Vocabulary vocabulary;
    private final CellNumber cell;
    private final List<Use> numbers;
    private final Optional<Use> kind;
    private final List<Use> keys;
    private final double[][] values;
    private final int[] digits;
    private final Map<Group, Integer> groups = new HashMap<>();
    private final List<Group> order = new ArrayList<>();
    private int[] groupOfRow = new int[64];
    private int[][] rowsByGroup = {};
    private int rows;
    private List<String> lastCells = List.of();
    private int lastGroup = -1;

    Body(String file, Layout layout, Vocabulary vocabulary, DecimalSign decimal) {
        this.file = file;
        this.vocabulary = vocabulary;
        this.cell = new CellNumber(decimal);
        this.numbers = layout.numbers();
        this.kind = layout.with(Role.KIND).stream().findFirst();
        this.keys = layout.with(Role.KEY);
        this.values = new double[numbers.size()][64];
        this.digits = new int[numbers.size()];
        Arrays.fill(digits, 1);
    }

    /**
     * Takes one row.
     *
     * @throws IntakeException if a cell is not what its column needs
     */
    void add(CsvRecord row) {
        if (rows == groupOfRow.length) {
            grow();
        }
        for (int i = 0; i < values.length; i++) {
            String text = row.getField(numbers.get(i).index());
            if (!cell.read(text)) {
                throw refused(row, numbers.get(i), "a number", text);
            }
            values[i][rows] = cell.value();
            digits[i] = Math.max(digits[i], cell.digits());
        }
        groupOfRow[rows++] = group(row);
    }

    private IntakeException refused(CsvRecord row, Use use, String expected, String text) {
        String found =
                text.isBlank() ? "an empty cell (write NaN where a value is missing)" : IntakeException.quoted(text);
        return new IntakeException(
                file, row.getStartingLineNumber(), use.heading().text(), expected, found);
    }

    private void grow() {
        int size = rows + (rows >> 1);
        groupOfRow = Arrays.copyOf(groupOfRow, size);
        for (int i = 0; i < values.length; i++) {
            values[i] = Arrays.copyOf(values[i], size);
        }
    }

    /** Rows of one group mostly follow each other: only a change is looked up. */
    private int group(CsvRecord row) {
        List<String> cells = keys.isEmpty()
                ? List.of()
                : keys.stream().map(k -> row.getField(k.index()).strip()).toList();
        if (kind.isEmpty() && lastGroup >= 0 && cells.equals(lastCells)) {
            return lastGroup;
        }
        for (int i = 0; i < cells.size(); i++) {
            if (cells.get(i).isEmpty()) {
                throw refused(row, keys.get(i), "a name or number that tells which measurement the row belongs to", "");
            }
        }
        lastCells = cells;
        lastGroup = groups.computeIfAbsent(new Group(cells, kind.map(use -> kind(row, use))), group -> {
            order.add(group);
            return order.size() - 1;
        });
        return lastGroup;
    }

    private Quantity kind(CsvRecord row, Use use) {
        String word = row.getField(use.index());
        return vocabulary
                .quantity(word)
                .filter(q -> q == Quantity.STORAGE_MODULUS || q == Quantity.LOSS_MODULUS)
                .orElseThrow(() -> refused(row, use, "storage or loss", word));
    }

    int rows() {
        return rows;
    }

    /** The groups in the order in which they appear. */
    List<Group> groups() {
        return List.copyOf(order);
    }

    /** The rows of a group, counted from zero; asked when all rows are there. */
    int[] rowsOf(Group group) {
        if (rowsByGroup.length != order.size()) {
            rowsByGroup = rowsByGroup();
        }
        return rowsByGroup[groups.get(group)].clone();
    }

    private int[][] rowsByGroup() {
        int[] counts = new int[order.size()];
        for (int row = 0; row < rows; row++) {
            counts[groupOfRow[row]]++;
        }
        int[][] found = new int[order.size()][];
        Arrays.setAll(found, group -> new int[counts[group]]);
        for (int row = rows - 1; row >= 0; row--) {
            int group = groupOfRow[row];
            found[group][--counts[group]] = row;
        }
        return found;
    }

    /** The numbers of a column at the given rows, as they were written. */
    Doubles numbers(Use use, int[] at) {
        double[] column = values[numbers.indexOf(use)];
        double[] picked = new double[at.length];
        for (int i = 0; i < at.length; i++) {
            picked[i] = column[at[i]];
        }
        return Doubles.of(picked);
    }

    /** With how many significant digits the most precise number of a column was written. */
    int digits(Use use) {
        return digits[numbers.indexOf(use)];
    }
}
