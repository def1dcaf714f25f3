package org.meltbook.intake;

import java.util.List;
import java.util.Optional;
import java.util.stream.Stream;
import org.meltbook.measure.Heading;
import org.meltbook.units.LabUnit;
import org.meltbook.units.Quantity;

/**
 * What the columns of a file are for.
 *
 * @param columns  one for each heading, in the order of the file
 * @param unitLine line of the unit row, 0 if the units stand in the headings
 * @param body     line of the last row above the numbers
 */
record Layout(List<Use> columns, long unitLine, long body) {
    /** What a column is for. */
    enum Role {
        /** Its numbers are read. */
        NUMBERS,
        /** Its numbers are moduli of the kind that the row names. */
        MODULI,
        /** Its cells name the kind of modulus of the row. */
        KIND,
        /** Its cells tell to which measurement the row belongs. */
        KEY,
        /** It is not read. */
        PASSED_OVER
    }

    /**
     * One column.
     *
     * @param unit what its numbers are given in, for a column of numbers
     * @param why  why it is not read, for a column passed over
     */
    record Use(int index, Heading heading, Role role, Optional<LabUnit> unit, String why) {
        Quantity quantity() {
            return heading.quantity().orElseThrow();
        }
    }

    Layout {
        columns = List.copyOf(columns);
    }

    List<Use> with(Role role) {
        return columns.stream().filter(use -> use.role() == role).toList();
    }

    /** The columns whose numbers are read. */
    List<Use> numbers() {
        return Stream.concat(with(Role.NUMBERS).stream(), with(Role.MODULI).stream())
                .toList();
    }

    /** Whether each row names the quantity that it holds. */
    boolean isLong() {
        return !with(Role.KIND).isEmpty();
    }

    /** The quantities whose numbers are read, that of moduli named by row left out. */
    List<Quantity> quantities() {
        return with(Role.NUMBERS).stream().map(Use::quantity).toList();
    }
}
