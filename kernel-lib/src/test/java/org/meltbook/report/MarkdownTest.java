package org.meltbook.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

class MarkdownTest {
    private static final Formulas FORMULAS = new Formulas();

    private final Markdown markdown = new Markdown(FORMULAS);

    @Test
    void brackets_of_a_formula_survive() {
        // mfenced is not in MathML Core (W3C, section 2.1): browsers draw its content without the brackets.
        String html = markdown.html("$\\eta(\\dot\\gamma)$");
        assertFalse(html.contains("mfenced"));
        assertTrue(
                html.matches(
                        "(?s).*<mo [^>]*>\\(</mo><mover accent=\"true\"><mi>γ</mi><mo>˙</mo></mover><mo [^>]*>\\)</mo>.*"),
                html);
    }

    @Test
    void an_interval_keeps_the_comma_between_its_ends() {
        String text = markdown.html("$[a, b)$").replaceAll("<[^>]*>", "").strip();
        assertEquals("[a,b)", text);
    }

    @Test
    void primes_stand_at_the_letter() {
        assertTrue(markdown.html("$G''(\\omega)$").contains("<mi>G</mi><mo lspace=\"0\" rspace=\"0\">″</mo>"));
    }

    @Test
    void upright_words_are_one_word() {
        assertTrue(markdown.html("$\\eta_{\\mathrm{rel}}$").contains("<mi mathvariant=\"normal\">rel</mi>"));
    }

    @Test
    void bold_does_not_reach_what_follows() {
        String html = markdown.html("$\\mathbf{D} = \\eta$");
        assertTrue(html.contains("font-weight:bold\">D</mi>"));
        assertTrue(html.contains("<mi>η</mi>"));
    }

    @Test
    void underscores_and_stars_in_a_formula_are_no_emphasis() {
        assertFalse(markdown.html("$a_1 * b_2$ and $c_1 * d_2$").contains("<em>"));
    }

    @Test
    void a_formula_on_its_own_lines_may_hold_what_would_start_a_list() {
        String html = markdown.html("$$\na\n- b\n$$\n\nafter");
        assertTrue(html.contains("display=\"block\""), html);
        assertFalse(html.contains("<li>"));
        assertTrue(html.contains("<p>after</p>"));
    }

    @Test
    void an_unknown_command_leaves_the_source_and_is_told() {
        String html = markdown.html("$\\nosuch{x} + 1$");
        assertFalse(html.contains("<math"));
        assertTrue(html.contains("\\nosuch{x} + 1"));
        assertEquals(List.of("formula not set, unknown command \\nosuch: \\nosuch{x} + 1"), markdown.problems());
    }

    @ParameterizedTest
    @ValueSource(strings = {"It costs $5 and $6.", "`$x$`", "    $x$", "\\$x\\$", "$ x $", "a $5 and `$y`"})
    void a_dollar_that_is_no_formula_stays_a_dollar(String text) {
        String html = markdown.html(text);
        assertFalse(html.contains("<math"), html);
        assertTrue(html.contains("$"));
        assertEquals(List.of(), markdown.problems());
    }

    @ParameterizedTest
    @ValueSource(strings = {"<script>alert(1)</script>", "a <img src=x onerror=alert(1)> b", "<svg onload=alert(1)>"})
    void markup_in_prose_is_shown_and_not_obeyed(String text) {
        assertFalse(markdown.html(text).matches("(?s).*<(script|img|svg).*"));
    }

    @Test
    void a_link_to_a_script_is_disarmed() {
        assertFalse(markdown.html("[x](javascript:alert(1))").contains("javascript:"));
    }

    @Test
    void a_picture_from_elsewhere_becomes_a_link_and_is_told() {
        String html = markdown.html("![a die](http://example.org/die.png)");
        assertFalse(html.contains("<img"));
        assertTrue(html.contains("picture: a die"));
        assertEquals(1, markdown.problems().size());
    }

    @Test
    void equal_headings_get_different_anchors() {
        String html = markdown.html("# Fit\n\n# Fit");
        assertTrue(html.contains("id=\"fit\"") && html.contains("id=\"fit-2\""));
    }

    @Test
    void tables_have_heads_that_say_what_they_head() {
        assertTrue(markdown.html("|a|b|\n|-|-:|\n|1|2|").contains("<th scope=\"col\""));
    }

    @Test
    void finds_heading_and_first_sentence() {
        String text = "# What `this` is\n\nA first sentence\nover two lines. A second one.";
        assertEquals("What this is", Markdown.heading(text));
        assertEquals("A first sentence over two lines.", Markdown.firstSentence(text));
    }
}
