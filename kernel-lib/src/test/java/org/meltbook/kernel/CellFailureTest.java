package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import java.util.concurrent.TimeUnit;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.Timeout;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.meltbook.base.MeltbookException;

/** How a cell goes wrong, what is said of it, and that the session lives on. */
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
@Timeout(value = 60, unit = TimeUnit.SECONDS)
class CellFailureTest {
    private final Collected outlet = new Collected();
    private JShellEvaluator evaluator;

    @BeforeAll
    void open() {
        evaluator = JShellEvaluator.open(Settings.plain()
                .importing(List.of("import java.util.*;", "import java.util.stream.*;", "import org.meltbook.base.*;"))
                .trustingMessagesOf(thrown -> thrown instanceof MeltbookException));
    }

    @AfterAll
    void close() {
        evaluator.close();
    }

    @AfterEach
    void the_session_lives_on() {
        Outcome outcome = evaluator.run("20 + 1", outlet);
        assertEquals(
                "21",
                assertInstanceOf(Outcome.Done.class, outcome, outcome::toString)
                        .result()
                        .orElseThrow()
                        .plainText());
    }

    private Outcome.Failed failure(String cell) {
        Outcome outcome = evaluator.run(cell, outlet);
        Outcome.Failed failed = assertInstanceOf(Outcome.Failed.class, outcome);
        String report = String.join("\n", failed.report());
        assertFalse(report.contains("jshell") || report.contains("JShell") || report.contains("REPL"), report);
        return failed;
    }

    @Test
    void points_at_the_place_that_does_not_compile() {
        Outcome.Failed failed = failure("int rate = 3;\n\n    int stress = rate * viscosity;\nint after = 1;");
        assertEquals(Outcome.Reason.COMPILE, failed.reason());
        assertEquals("CompileError", failed.kind());
        assertEquals(3, failed.line());
        assertEquals(
                List.of(
                        "cannot find symbol",
                        "  symbol:   variable viscosity",
                        "line 3:     int stress = rate * viscosity;",
                        "                                ^"),
                failed.report());
    }

    @Test
    void runs_nothing_of_a_cell_that_cannot_be_read() {
        Collected own = new Collected();
        Outcome outcome = evaluator.run("System.out.print(\"ran\");\nint x = ;\nint y = 2;", own);
        Outcome.Failed failed = assertInstanceOf(Outcome.Failed.class, outcome);
        assertEquals(2, failed.line());
        assertEquals("illegal start of expression", failed.message());
        assertEquals("", own.printed());
    }

    @ParameterizedTest
    @ValueSource(
            strings = {"class A {", "foo(", "}", "int x = 1; }", "\"open", "if (true)", "@Deprecated", "#", "/* open"})
    void names_the_line_of_text_that_is_no_java(String code) {
        Outcome.Failed failed = failure("int fine = 1;\n" + code);
        assertEquals(Outcome.Reason.COMPILE, failed.reason());
        assertEquals(2, failed.line());
    }

    @Test
    void names_the_line_of_a_declaration_whose_needs_were_never_met() {
        Outcome.Failed failed = failure("// a comment\nint area(int x) {\n    return x * width;\n}");
        assertEquals(3, failed.line());
        assertEquals("cannot find variable width", failed.message());
        assertEquals("line 3:     return x * width;", failed.report().get(1));
        assertEquals("                       ^", failed.report().get(2));
        assertEquals(Outcome.Reason.COMPILE, failure("area(2)").reason());
    }

    @Test
    void names_the_line_that_threw_and_shows_the_cause() {
        Outcome.Failed failed = failure("// first\n\nint zero = 0;\n"
                + "try {\n    System.out.print(1 / zero);\n} catch (ArithmeticException e) {\n"
                + "    throw new IllegalStateException(\"no rate\", e);\n}");
        assertEquals(Outcome.Reason.THROWN, failed.reason());
        assertEquals("IllegalStateException", failed.kind());
        assertEquals("no rate", failed.message());
        assertEquals(7, failed.line());
        assertEquals(
                List.of(
                        "IllegalStateException: no rate",
                        "line 7:     throw new IllegalStateException(\"no rate\", e);",
                        "            ^",
                        "caused by ArithmeticException: / by zero"),
                failed.report());
    }

    @Test
    void shows_the_lines_that_led_to_a_failure_in_an_earlier_cell() {
        evaluator.run("\nint share(int n) {\n    return IntStream.of(1, 2).map(i -> i / n).sum();\n}", outlet);
        Outcome.Failed failed = failure("int none = 0;\nint got = \n    share(none);");
        assertEquals("ArithmeticException: / by zero", failed.report().get(0));
        assertTrue(failed.report().contains("line 3:     return IntStream.of(1, 2).map(i -> i / n).sum();"));
        assertEquals(3, failed.line(), () -> String.join("\n", failed.report()));
        assertTrue(failed.report().get(1).startsWith("in the cell run as number "), failed.report()::toString);
        assertTrue(failed.report().containsAll(List.of("in this cell:", "line 3:     share(none);")));
    }

    @Test
    void names_the_cell_whose_declaration_no_longer_holds() {
        evaluator.run("class Batch { int size; }", outlet);
        evaluator.run("\nint sizeOf(Batch b) { return b.size; }", outlet);
        evaluator.run("class Batch { }", outlet);
        Outcome.Failed failed = failure("int fine = 1;\nsizeOf(new Batch())");
        assertEquals(2, failed.line(), () -> String.join("\n", failed.report()));
        assertTrue(failed.report().get(0).startsWith("this needs a declaration of the cell run as number"));
        assertTrue(
                failed.report().contains("line 2: int sizeOf(Batch b) { return b.size; }"), failed.report()::toString);
    }

    @Test
    void says_only_the_message_of_an_exception_that_speaks_for_itself() {
        Outcome.Failed failed = failure("int i = 1;\nthrow new RangeException(\"rate is -1 1/s, expected above 0\");");
        assertEquals("RangeException", failed.kind());
        assertEquals(2, failed.line());
        assertEquals("rate is -1 1/s, expected above 0", failed.report().get(0));
    }

    @Test
    void does_not_tell_a_cause_whose_words_the_message_has_already() {
        Outcome.Failed failed = failure("var inner = new IllegalArgumentException(\"unit 'pas' is not known\");\n"
                + "throw new IllegalStateException(\"line 3: unit 'pas' is not known\", inner);");
        assertEquals(
                List.of(),
                failed.report().stream().filter(l -> l.startsWith("caused by")).toList());
    }

    @Test
    void names_a_variable_that_is_null_as_the_reader_wrote_it() {
        Outcome.Failed failed = failure("String lot = null;\nlot.length()");
        assertEquals("Cannot invoke \"String.length()\" because \"lot\" is null", failed.message());
    }

    @Test
    void says_which_value_cannot_be_shown() {
        evaluator.run("class Shy { public String toString() { throw new IllegalStateException(\"no\"); } }", outlet);
        Outcome.Failed failed = failure("new Shy()");
        assertEquals(
                "the result cannot be shown: IllegalStateException: no",
                failed.report().get(0));
        assertEquals(1, failed.line());
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "System.exit(0);",
                "Runtime.getRuntime().exit(0);",
                "Runtime.getRuntime().halt(0);",
                "java.util.function.IntConsumer leave = System::exit;\nleave.accept(0);",
                "java.util.function.IntConsumer stop = Runtime.getRuntime()::halt;\nstop.accept(0);",
                "class Leaver { static void go() { Runnable r = () -> System.exit(0); r.run(); } }\nLeaver.go();"
            })
    void refuses_to_end_the_process(String cell) {
        Outcome.Failed failed = failure(cell);
        assertEquals("ExitRefused", failed.kind());
    }

    @Test
    void survives_a_stack_overflow() {
        Outcome.Failed failed = failure("int down(int n) {\n    return down(n + 1) + 1;\n}\ndown(0)");
        assertEquals("StackOverflowError", failed.kind());
        assertEquals(2, failed.line());
        assertTrue(failed.report().size() < 20, "a short report");
    }

    @Test
    void survives_an_expression_beyond_the_compiler() {
        Outcome.Failed failed = failure("1" + " + 1".repeat(20_000));
        assertEquals("an expression of this cell is nested too deeply to be compiled", failed.message());
        evaluator.run("int afterwards = 5;", outlet);
    }

    @Test
    void says_that_a_result_cannot_be_shown_whatever_its_text_throws() {
        evaluator.run("class Odd { public String toString() { throw new AssertionError(\"odd\"); } }", outlet);
        assertEquals("AssertionError", failure("new Odd()").kind());
    }

    @Test
    void survives_an_exhausted_heap() {
        Outcome.Failed failed =
                failure("var hoard = new ArrayList<long[]>();\nfor (;;) hoard.add(new long[8_000_000]);");
        assertEquals("OutOfMemoryError", failed.kind());
        assertEquals(2, failed.line());
        evaluator.run("hoard = null;", outlet);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "while (true) {}",
                "for (;;) ;",
                "int turns = 0;\ndo { turns++; } while (turns >= 0 || turns < 0);",
                "Thread.sleep(1_000_000);",
                "while (true) { try { Thread.sleep(1_000_000); } catch (Throwable t) { } }",
                "while (true) { try { turns++; } catch (Throwable t) { continue; } finally { turns--; } }",
                "IntStream.iterate(0, i -> i + 1).filter(i -> i < 0).findAny();",
                "new Object() { void spin() { for (;;) {} } }.spin();",
                "new java.util.concurrent.CountDownLatch(1).await();",
                "Progress p = Progress.QUIET;\nwhile (true) p.at(0, 0, \"work\");",
                "class Slow { public String toString() { for (;;) ; } }\nnew Slow()"
            })
    void stops_on_interrupt(String code) throws InterruptedException {
        Collected own = new Collected();
        evaluator.run("int turns = 0;", outlet);
        Outcome[] outcome = new Outcome[1];
        Thread cell = new Thread(() -> outcome[0] = evaluator.run("System.out.print(\"begun\");\n" + code, own));
        cell.start();
        assertTrue(own.printed.await(30, TimeUnit.SECONDS), "the cell did not begin");
        evaluator.interrupt();
        cell.join(30_000);
        assertFalse(cell.isAlive(), "still running");
        Outcome.Failed failed = assertInstanceOf(Outcome.Failed.class, outcome[0]);
        assertEquals(Outcome.Reason.INTERRUPTED, failed.reason());
    }

    @Test
    void an_interrupt_between_cells_does_nothing() {
        evaluator.interrupt();
        assertInstanceOf(Outcome.Done.class, evaluator.run("Thread.sleep(1);", outlet));
    }
}
