package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.Set;
import java.util.concurrent.TimeUnit;
import java.util.stream.Collectors;
import org.dflib.jjava.jupyter.kernel.display.Renderer;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.Timeout;

/** What a cell gives, prints and shows. One session serves all: each test uses names of its own. */
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
@Timeout(value = 60, unit = TimeUnit.SECONDS)
class JShellEvaluatorTest {
    private final Collected outlet = new Collected();
    private JShellEvaluator evaluator;

    @BeforeAll
    void open() {
        Renderer renderer = new Renderer();
        renderer.createRegistration(CharSequence.class)
                .preferring("text/html")
                .register((text, context) -> context.renderIfRequested(
                        org.dflib.jjava.jupyter.kernel.display.mime.MIMEType.TEXT_HTML, () -> "<b>" + text + "</b>"));
        evaluator = JShellEvaluator.open(Settings.plain()
                .importing(List.of(
                        "import java.util.*;", "import org.meltbook.base.*;", "import org.meltbook.kernel.Cell;"))
                .rendering(renderer));
    }

    @AfterAll
    void close() {
        evaluator.close();
    }

    private String result(String cell) {
        Outcome outcome = evaluator.run(cell, outlet);
        return assertInstanceOf(Outcome.Done.class, outcome, outcome::toString)
                .result()
                .orElseThrow(() -> new AssertionError("no result"))
                .plainText();
    }

    private boolean givesNothing(String cell) {
        Outcome outcome = evaluator.run(cell, outlet);
        return assertInstanceOf(Outcome.Done.class, outcome, outcome::toString)
                .result()
                .isEmpty();
    }

    @Test
    void gives_the_value_of_the_last_expression() {
        assertEquals("3", result("1 + 2"));
        assertEquals("12", result("int six = 6;\nint two = 2;\nsix * two"));
        assertEquals("6", result("six // the same again;"));
        assertEquals("null", result("new HashMap<String, String>().get(\"none\")"));
    }

    @Test
    void gives_nothing_for_declarations_statements_and_comments() {
        assertTrue(givesNothing("int quiet = 3;"));
        assertTrue(givesNothing("int quietToo = 3"));
        assertTrue(givesNothing("quiet + 1; // said with a semicolon"));
        assertTrue(givesNothing("if (quiet > 2) quiet = 1;"));
        assertTrue(givesNothing("class Quiet {}"));
        assertTrue(givesNothing("// nothing"));
        assertTrue(givesNothing(""));
        assertTrue(givesNothing("/* nothing */\n\n"));
        assertTrue(givesNothing("void say() {}\nsay()"));
    }

    @Test
    void keeps_the_type_of_a_value_between_cells() {
        evaluator.run("var kept = new ArrayList<>(List.of(1.5, 2.5));", outlet);
        assertEquals("4.0", result("kept.get(0) + kept.get(1)"));
    }

    @Test
    void renders_a_value_by_an_interface_of_its_class() {
        Outcome outcome = evaluator.run("new StringBuilder(\"melt\")", outlet);
        MimeBundle bundle = ((Outcome.Done) outcome).result().orElseThrow();
        assertEquals("<b>melt</b>", bundle.data().get("text/html"));
        assertEquals("melt", bundle.plainText());
    }

    @Test
    void shows_arrays_and_plain_objects_without_an_address() {
        assertEquals("[1.0, 2.0]", result("new double[] {1, 2}"));
        assertFalse(result("new Object()").contains("@"));
    }

    @Test
    void shows_values_on_the_way_and_replaces_them_by_name() {
        Collected own = new Collected();
        evaluator.run("Cell.display(\"first\");\nCell.display(1, \"n\");\nCell.update(2, \"n\");", own);
        assertEquals(
                List.of("first", "1"),
                own.displays.stream().map(MimeBundle::plainText).toList());
        assertEquals("2", own.updates.get(0).plainText());
        assertEquals("n", own.updates.get(0).displayId());
    }

    @Test
    void streams_what_a_cell_prints_while_it_runs() throws InterruptedException {
        Collected own = new Collected();
        String wait = "System.err.print(\"careful\");\nSystem.out.println(\"γ̇ in 1/s\");\n"
                + "while (!Thread.interrupted()) Thread.onSpinWait();";
        Thread cell = new Thread(() -> evaluator.run(wait, own));
        cell.start();
        assertTrue(own.printed.await(30, TimeUnit.SECONDS), "nothing came while the cell was running");
        evaluator.interrupt();
        cell.join();
        assertEquals("γ̇ in 1/s" + System.lineSeparator(), own.printed());
        assertEquals("careful", own.complained());
    }

    @Test
    void puts_a_letter_together_that_is_printed_byte_by_byte() {
        Collected own = new Collected();
        evaluator.run("for (byte b : \"η₀ 🜂\".getBytes(\"UTF-8\")) System.out.write(b);\nSystem.out.flush();", own);
        assertEquals("η₀ 🜂", own.printed());
    }

    @Test
    void sends_late_output_of_a_thread_to_the_last_cell() throws InterruptedException {
        Collected first = new Collected();
        Collected second = new Collected();
        evaluator.run(
                "var go = new java.util.concurrent.CountDownLatch(1);\nvar late = new Thread(() -> {\n"
                        + "    try { go.await(); } catch (InterruptedException e) { return; }\n"
                        + "    System.out.print(\"late\");\n});\nlate.start();",
                first);
        evaluator.run("int between = 1;", second);
        evaluator.run("go.countDown();\nlate.join();", second);
        assertEquals("", first.printed());
        assertEquals("late", second.printed());
    }

    @Test
    void reads_standard_input_from_the_person() {
        Collected own = new Collected();
        own.answers.add("240 °C");
        own.answers.add("12");
        evaluator.run(
                "var keys = new Scanner(System.in, \"UTF-8\");\nvar first = keys.nextLine();\nint n = keys.nextInt();",
                own);
        assertEquals("240 °C/12", result("first + \"/\" + n"));
    }

    @Test
    void says_that_nobody_can_be_asked() {
        for (String asking : List.of("System.in.read()", "new Scanner(System.in, \"UTF-8\").nextLine()")) {
            Outcome outcome = evaluator.run(asking, new Collected());
            Outcome.Failed failed = assertInstanceOf(Outcome.Failed.class, outcome);
            assertEquals("UncheckedIOException", failed.kind());
            assertEquals("nobody is here", failed.message());
        }
    }

    @Test
    void takes_declarations_that_need_each_other_in_one_cell() {
        assertEquals(
                "5",
                result("class Hen { Egg lay() { return new Egg(this); } }\n"
                        + "record Egg(Hen from) { Hen hatch() { return new Hen(); } }\n"
                        + "int even(int n) { return n == 0 ? 0 : 1 + odd(n - 1); }\n"
                        + "int odd(int n) { return n == 0 ? 0 : 1 + even(n - 1); }\n"
                        + "var egg = new Hen().lay().hatch().lay();\neven(5)"));
    }

    @Test
    void takes_a_declaration_that_is_used_before_what_it_needs() {
        assertEquals("ok", result("class Early { Late late; }\nvar early = new Early();\nclass Late {}\n\"ok\""));
        assertTrue(givesNothing("class Sooner { Later l; }\n3 + 4\n;class Later {}"));
    }

    @Test
    void takes_a_statement_that_ends_with_a_comment() {
        assertTrue(givesNothing("int ended = 3 // 1/s"));
        assertEquals("4", result("/* first */ ended + 1 /* last */"));
    }

    @Test
    void takes_a_method_that_is_written_anew() {
        assertEquals("1", result("static int level() { return 1; }\nlevel()"));
        assertEquals("2", result("static int level() { return 2; }\nlevel()"));
    }

    @Test
    void does_not_get_slower_with_each_expression() {
        for (int i = 0; i < 300; i++) {
            assertEquals(Integer.toString(i), result(i + " + 0"));
        }
        assertEquals(0, evaluator.leftovers());
    }

    @Test
    void completes_a_member_and_says_where_it_goes() {
        String cell = "var title = \"η₀\";\ntitle.subs";
        Evaluator.Completion completion = evaluator.complete(cell, cell.length());
        assertEquals(Set.of("substring("), completion.options().stream().collect(Collectors.toSet()));
        assertEquals(cell.length() - 4, completion.start());
        assertEquals(cell.length(), completion.end());
    }

    @Test
    void completes_nothing_where_nothing_fits() {
        Evaluator.Completion completion = evaluator.complete("noSuchThingAtAll", 16);
        assertEquals(List.of(), completion.options());
    }

    @Test
    void tells_whole_cells_from_unfinished_and_wrong_ones() {
        assertEquals(Evaluator.Completeness.COMPLETE, evaluator.completeness("1 + 2"));
        assertEquals(Evaluator.Completeness.COMPLETE, evaluator.completeness(""));
        assertEquals(Evaluator.Completeness.COMPLETE, evaluator.completeness("int a = 1;\na + 1"));
        assertEquals(Evaluator.Completeness.INCOMPLETE, evaluator.completeness("class A {"));
        assertEquals(Evaluator.Completeness.INCOMPLETE, evaluator.completeness("int a = 1;\nfoo("));
        assertEquals(Evaluator.Completeness.INCOMPLETE, evaluator.completeness("if (true)"));
        assertEquals(Evaluator.Completeness.INVALID, evaluator.completeness("int = 3 }"));
        assertEquals(Evaluator.Completeness.INVALID, evaluator.completeness("}"));
    }

    @Test
    void refuses_an_import_that_cannot_be_compiled() {
        Settings wrong = Settings.plain().importing(List.of("import no.such.Thing;"));
        assertThrows(IllegalArgumentException.class, () -> JShellEvaluator.open(wrong));
    }
}
