package org.meltbook.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Optional;
import java.util.regex.Pattern;
import org.junit.jupiter.api.Test;

class PageTest {
    /** What makes a browser fetch something: a source or a style that points outside the page. */
    private static final Pattern FETCHES = Pattern.compile(
            "(src|href|data|action|poster)\\s*=\\s*[\"']?(https?:)?//|url\\(\\s*[\"']?(?!data:)|@import|<link|<script|<iframe",
            Pattern.CASE_INSENSITIVE);

    private final Formulas formulas = new Formulas();

    @Test
    void a_page_fetches_nothing() {
        String html = page(
                "",
                new Block.Prose("# T\n\n$\\frac{a}{b}$ ![p](http://example.org/p.png)"),
                new Block.Code("var x = \"http://example.org\";", Optional.of(1)),
                new Block.Picture("image/png", "AAAA", "a dot", "A dot.", 10));
        String markup = html.replaceAll("<a href=\"[^\"]*\">", "");
        assertFalse(
                FETCHES.matcher(markup).find(),
                () -> FETCHES.matcher(markup).results().toList().toString());
        assertTrue(html.contains("default-src 'none'"));
    }

    @Test
    void only_a_page_with_formulas_carries_their_font() {
        assertTrue(page("", new Block.Prose("$x$")).contains("font/woff2"));
        assertFalse(page("", new Block.Prose("x")).contains("font/woff2"));
    }

    @Test
    void code_printed_text_and_captions_are_escaped() {
        String evil = "<script>alert(1)</script>";
        String html = Page.of(
                        evil,
                        evil,
                        List.of(
                                new Block.Code(evil, Optional.empty()),
                                new Block.Printed(evil, Block.Kind.OUT),
                                new Block.Printed(evil, Block.Kind.FAILURE),
                                new Block.Picture("image/png", "AAAA", "\"" + evil, evil, 0)),
                        formulas)
                .html();
        assertFalse(html.contains("<script"));
        assertFalse(html.contains("alt=\"\"&"));
    }

    @Test
    void the_same_blocks_give_the_same_page() {
        Block prose = new Block.Prose("# A\n\n$\\sum_i g_i$");
        assertEquals(page("b", prose), page("b", prose));
    }

    @Test
    void the_index_leads_to_each_page_with_its_status() {
        String html = IndexPage.of(
                "Notebooks",
                List.of(new IndexPage.Entry("First <look>", "00.html", "About melts.", "failed: x", false)));
        assertTrue(html.contains("<a href=\"00.html\">First &lt;look&gt;</a>"));
        assertTrue(html.contains("About melts."));
        assertTrue(html.contains("status bad\">failed: x"));
    }

    private String page(String banner, Block... blocks) {
        return Page.of("T", banner, List.of(blocks), formulas).html();
    }
}
