package org.meltbook.base;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;

class RowsTest {
    @Test
    void shows_aligned_text_with_units_and_notes() {
        Rows rows = Rows.titled("Steps")
                .text("step", List.of("a", "longer"))
                .numbers("γ̇", "1/s", 1, Double.NaN)
                .note("two steps")
                .build();
        assertEquals(
                String.join(
                        "\n",
                        "Steps",
                        "  step     γ̇ [1/s]",
                        "  a          1.000",
                        "  longer         –",
                        "  two steps"),
                rows.toString());
        assertEquals(2, rows.size());
        assertEquals(List.of("two steps"), rows.notes());
    }

    @Test
    void columns_of_other_lengths_are_refused() {
        Rows.Builder builder = Rows.titled("x").numbers("a", "s", 1, 2);
        String message = assertThrows(RangeException.class, () -> builder.numbers("b", "s", 1))
                .getMessage();
        assertEquals("column 'b' of 'x' has 1 rows, the columns before it have 2", message);
    }

    @Test
    void a_missing_column_is_named_with_those_that_are_there() {
        Rows rows = Rows.titled("x").numbers("a", "s", 1).build();
        assertEquals("1.000", rows.column("a").text(0));
        String message =
                assertThrows(RangeException.class, () -> rows.column("b")).getMessage();
        assertTrue(message.contains("no column 'b' in 'x', which has [a]"), message);
    }

    @Test
    void equal_tables_are_equal_and_later_changes_of_a_list_do_not_reach_them() {
        List<String> names = new ArrayList<>(List.of("a"));
        Rows rows = Rows.titled("x").text("n", names).build();
        names.set(0, "b");
        assertEquals(Rows.titled("x").text("n", List.of("a")).build(), rows);
        assertEquals(Rows.titled("x").text("n", List.of("a")).build().hashCode(), rows.hashCode());
        assertThrows(UnsupportedOperationException.class, () -> rows.columns().clear());
    }

    @Test
    void differences_show_two_digits_behind_the_point_and_keep_them_all() {
        Rows rows = Rows.titled("x")
                .differences("off", "%", Doubles.of(2.6197, -0.5786, 2.894e-4, -1e-9, Double.NaN))
                .build();
        Rows.Column column = rows.columns().get(0);
        assertEquals(
                List.of("2.62", "−0.58", "0.00", "0.00", "–"),
                IntStream.range(0, 5).mapToObj(column::text).toList());
        assertEquals(2.894e-4, ((Rows.NumberColumn) column).values().at(2));
    }

    @Test
    void a_pure_number_has_no_unit_in_its_heading() {
        assertEquals(
                "φ",
                Rows.titled("x").numbers("φ", "1", 0.2).build().columns().get(0).label());
    }

    @Test
    void its_first_rows_are_those_of_the_whole_table() {
        Rows rows = Rows.titled("x")
                .numbers("a", "s", 1, 2, 3)
                .text("b", List.of("p", "q", "r"))
                .note("old")
                .build();
        assertEquals(
                Rows.titled("x")
                        .numbers("a", "s", 1, 2)
                        .text("b", List.of("p", "q"))
                        .note("new")
                        .build(),
                rows.first(2, List.of("new")));
        assertEquals(rows, rows.first(9, List.of("old")));
    }

    @Test
    void an_empty_table_has_no_rows() {
        assertEquals(0, Rows.titled("none").build().size());
        assertEquals("none", Rows.titled("none").build().toString().strip());
    }
}
