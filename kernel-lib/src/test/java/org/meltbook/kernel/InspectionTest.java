package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.net.URL;
import java.net.URLClassLoader;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.TimeUnit;
import java.util.jar.JarEntry;
import java.util.jar.JarOutputStream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.Timeout;
import org.junit.jupiter.api.io.TempDir;

/** What a tooltip says: the signature as the compiler sees it, and the doc comment as it stands in the source. */
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
@Timeout(value = 60, unit = TimeUnit.SECONDS)
class InspectionTest {
    private JShellEvaluator evaluator;

    @BeforeAll
    void open() {
        evaluator = JShellEvaluator.open(
                Settings.plain().importing(List.of("import java.util.*;", "import org.meltbook.base.*;")));
        evaluator.run("Rows table = null;", new Collected());
    }

    @AfterAll
    void close() {
        evaluator.close();
    }

    private MimeBundle said(String cell) {
        return evaluator.inspect(cell, cell.length()).orElseThrow(() -> new AssertionError("nothing is known"));
    }

    private String text(String cell) {
        return said(cell).plainText();
    }

    @Test
    void tells_signature_and_comment_of_a_method_of_ours() {
        assertEquals(
                "Rows.Builder Rows.titled(String title)\n\nA table to be filled column by column.",
                text("Rows.titled"));
        assertEquals("int Rows.size()\n\nHow many rows there are.", text("int n = 1;\ntable.size"));
    }

    @Test
    void finds_the_name_when_the_cursor_stands_in_its_middle() {
        Optional<MimeBundle> found = evaluator.inspect("table.size() + 1", 8);
        assertTrue(found.orElseThrow().plainText().startsWith("int Rows.size()"));
    }

    @Test
    void tells_what_is_thrown_and_when() {
        String text = text("table.column");
        assertTrue(text.contains("\n  Throws RangeException: if there is none; the message lists the headings"), text);
    }

    @Test
    void keeps_overloads_apart() {
        String text = text("NumberText.of(");
        assertTrue(
                text.contains("String NumberText.of(double value, int digits)\n\n"
                        + "The number with the given count of significant digits."),
                text);
        assertTrue(text.contains("\n  unit: text of the unit, or blank for none"), text);
    }

    @Test
    void tells_of_a_type_and_of_a_variable_by_its_type() {
        String text = text("Rows");
        assertTrue(text.startsWith("org.meltbook.base.Rows\n\nA table as data: a title, columns"), text);
        assertTrue(text.contains("toString gives it as aligned plain text."), text);
        assertTrue(text("table").startsWith("table:org.meltbook.base.Rows\n\nA table as data"), text("table"));
    }

    @Test
    void tells_of_a_field() {
        assertTrue(text("Progress.QUIET").endsWith("\n\nA progress that shows nothing and still stops on interrupt."));
    }

    @Test
    void tells_of_a_nested_type_its_constructor_and_its_parts() {
        assertTrue(text("Rows.NumberColumn").contains("A column of numbers."));
        assertTrue(
                text("new Rows.NumberColumn(").contains("\n  unit: their unit as text; blank or 1 if they have none"));
        evaluator.run("Rows.NumberColumn numbers = null;", new Collected());
        assertTrue(text("numbers.unit").endsWith("\n\ntheir unit as text; blank or 1 if they have none"));
        assertTrue(text("Rows.titled(\"a\").note(").contains("Adds a remark below the table."));
    }

    @Test
    void takes_the_comment_of_the_interface_where_a_method_has_none() {
        evaluator.run("Rows.TextColumn words = null;", new Collected());
        assertTrue(text("words.label").contains("The heading with the unit in brackets, where there is one."));
    }

    @Test
    void says_the_same_in_html_without_losing_letters() {
        String html = said("new Rows.NumberColumn(").data().get("text/html").toString();
        assertTrue(html.contains("<dt><b>unit</b></dt><dd>their unit as text; blank or <code>1</code> if"), html);
        String generic = said("new ArrayList<>(").data().get("text/html").toString();
        assertTrue(generic.contains("<pre>ArrayList&lt;E&gt;(Collection&lt;? extends E&gt; c)</pre>"), generic);
    }

    @Test
    void tells_the_signature_of_what_the_jdk_brings() {
        assertTrue(text("Math.max").contains("double Math.max(double a, double b)"));
        assertTrue(text("String.valueOf(").contains("String String.valueOf(int i)"));
    }

    @Test
    void tells_of_what_a_cell_declared() {
        evaluator.run("int twice(int x) { return 2 * x; }", new Collected());
        assertTrue(text("twice").contains("int twice(int x)"), text("twice"));
    }

    @Test
    void reads_sources_from_a_jar(@TempDir Path folder) throws IOException {
        Path jar = folder.resolve("more.jar");
        try (JarOutputStream out = new JarOutputStream(Files.newOutputStream(jar))) {
            for (String name : List.of("META-INF/meltbook/sources/", "META-INF/meltbook/sources/shop/Press.java")) {
                out.putNextEntry(new JarEntry(name));
                if (name.endsWith("java")) {
                    out.write("package shop; /** Presses plates. */ class Press { /** One. */ void run(int... n) {} }"
                            .getBytes(StandardCharsets.UTF_8));
                }
                out.closeEntry();
            }
        }
        try (URLClassLoader classes = new URLClassLoader(new URL[] {jar.toUri().toURL()}, null)) {
            SourceComments comments = new SourceComments(classes);
            assertEquals("Presses plates.", found(comments, "shop.Press"));
            assertEquals("One.", found(comments, "void Press.run(int... n)"));
        }
    }

    private static String found(SourceComments comments, String signature) {
        return CommentText.of(comments.of(Named.in(signature).orElseThrow()).orElseThrow())
                .plain();
    }

    @Test
    void writes_out_the_constants_that_a_comment_cites() {
        // SpectrumFit.MODES_PER_DECADE is 3.
        String text = text("org.meltbook.spectrum.SpectrumFit.of(");
        assertTrue(text.contains("The spectrum of a sweep with 3 relaxation times a decade."), text);
        assertFalse(text.contains("@value"), text);
    }

    @Test
    void says_nothing_of_an_unknown_name() {
        assertFalse(evaluator.inspect("nothingOfThatName", 5).isPresent());
        assertFalse(evaluator.inspect("", 0).isPresent());
        assertFalse(evaluator.inspect("1 + ", 4).isPresent());
    }
}
