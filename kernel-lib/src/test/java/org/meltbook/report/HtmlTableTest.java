package org.meltbook.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Rows;

class HtmlTableTest {
    private static final String EVIL = "<script>alert('x')</script>\" onclick=\"alert(1)";

    @Test
    void every_text_of_a_table_is_escaped() {
        Rows rows = Rows.titled(EVIL)
                .text(EVIL, List.of(EVIL))
                .numbers(EVIL, EVIL, 1)
                .note(EVIL)
                .build();
        String html = HtmlTable.of(rows);
        assertFalse(html.contains("<script"));
        assertFalse(html.contains("\" onclick"));
        assertEquals(6, html.split("&lt;script&gt;", -1).length - 1);
    }

    @Test
    void columns_have_heads_with_units_and_numbers_stand_right() {
        String html = HtmlTable.of(Rows.titled("Fit")
                .text("name", List.of("η₀"))
                .numbers("value", "Pa·s", 51060)
                .build());
        assertTrue(html.contains("<caption"));
        assertTrue(html.matches("(?s).*<th scope=\"col\" style=\"text-align:right[^>]*>value \\[Pa·s\\]</th>.*"));
        assertTrue(html.matches("(?s).*<td style=\"text-align:right[^>]*>51060</td>.*"));
    }

    @Test
    void a_long_table_says_how_much_of_it_is_shown() {
        Rows rows = Rows.titled("Sweep")
                .numbers(
                        "row",
                        "",
                        IntStream.rangeClosed(1, 300).mapToDouble(i -> i).toArray())
                .note("made up")
                .build();
        String html = HtmlTable.of(rows);
        assertTrue(html.contains("12 of 300 rows shown"));
        assertTrue(html.contains(">8.000</td>") && html.contains(">⋮</td>") && html.contains(">297.0</td>"), html);
        assertEquals(13, html.split("<td ", -1).length - 1);
        List<String> plain = HtmlTable.plain(rows).lines().toList();
        assertEquals("  made up", plain.get(plain.size() - 1));
        assertEquals("  200 of 300 rows shown", plain.get(plain.size() - 2));
        assertEquals(2 + HtmlTable.LONGEST_PLAIN + 2, plain.size());
    }

    @Test
    void a_table_without_rows_is_a_table_still() {
        assertTrue(HtmlTable.of(Rows.titled("Nothing").text("lot", List.of()).build())
                .contains("<th"));
    }
}
