package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** The program as a user calls it, with the real evaluator. */
class MainTest {
    @TempDir
    Path folder;

    private final ByteArrayOutputStream out = new ByteArrayOutputStream();
    private final ByteArrayOutputStream err = new ByteArrayOutputStream();

    @Test
    void runs_stores_and_checks_a_notebook_with_tables_and_figures() throws IOException {
        Path file = store(
                "00-look",
                "# A look\n\n$\\eta(\\dot\\gamma)$",
                "var rate = Doubles.logSpaced(0.01, 100, 9);\nSystem.out.println(\"γ̇ from \" + rate.at(0));",
                "Rows.titled(\"Lots\").text(\"lot\", List.of(\"<script>A-00</script>\")).numbers(\"η₀\", \"Pa·s\", 51060).build()",
                "Figure.titled(\"Flow\").x(Quantity.SHEAR_RATE).y(Quantity.VISCOSITY)"
                        + ".marks(\"measured\", rate, rate.map(r -> 1e4 / (1 + r))).build()",
                "show(celsius(190));\ntable(Rows.titled(\"T\").numbers(\"a\", \"\", 1, 2).build())");
        assertEquals(0, run("run", folder.toString(), "--into", into(), "--store"), this::said);
        assertEquals(List.of(), NotebookFileTest.violations(Files.readString(file)));
        assertEquals(0, run("run", folder.toString(), "--into", into(), "--check"), this::said);
        assertEquals(Files.readString(file), Files.readString(folder.resolve("out/00-look.ipynb")));
        String page = Files.readString(folder.resolve("out/00-look.html"));
        assertTrue(page.contains("data:image/png;base64,") && page.contains("463.1") && !page.contains("<script"));
        Files.writeString(file, Files.readString(file).replace("51060\"\n      ]", "51070\"\n      ]"));
        assertEquals(1, run("run", folder.toString(), "--into", into(), "--check"), this::said);
        assertTrue(said().contains(file + ": cell 2 (cell3): line 3 of its output differs"), said());
    }

    /** What the README tells under "Your own file", word for word. */
    @Test
    void reads_the_file_of_the_readme_by_the_line_of_the_readme() throws IOException {
        String readme = Files.readString(Path.of("..", "README.md"));
        String part = readme.substring(readme.indexOf("## Your own file"));
        Files.writeString(folder.resolve("lot-7.csv"), part.split("```")[1].strip());
        String line = part.substring(part.indexOf("`Exports.read(") + 1).split("`")[0];
        store("00-own", line + ".frequencySweep()", "Path.of(\"known from the start\")");
        assertEquals(0, run("run", folder.toString(), "--into", into()), this::said);
        String page = Files.readString(folder.resolve("out/00-own.html"));
        assertTrue(page.contains("at 190.0 °C") && page.contains(">840.0<"), page);
    }

    @Test
    void a_failing_cell_is_named_with_its_line_and_cause_and_no_stack() throws IOException {
        Path file = store("00-broken", "int[] few = {1};\nfew[3]");
        assertEquals(1, run("run", file.toString(), "--into", into()));
        String said = err.toString(StandardCharsets.UTF_8);
        assertTrue(said.startsWith(file + ": cell 1 (cell1), line 2: ArrayIndexOutOfBoundsException: "), said);
        assertFalse(said.contains("\tat "), said);
    }

    @Test
    void an_endless_cell_is_stopped_at_its_limit() throws IOException {
        Path file = store("00-endless", "while (true) { }");
        assertEquals(1, run("run", file.toString(), "--into", into(), "--limit", "0.5"));
        assertTrue(said().contains("took longer than 0.5 s"), said());
    }

    @Test
    void a_notebook_that_is_not_json_is_refused_in_one_line_without_a_stack() throws IOException {
        Path file = Files.writeString(folder.resolve("broken.ipynb"), "{ not JSON");
        assertEquals(1, run("run", file.toString(), "--into", into()));
        assertTrue(err.toString(StandardCharsets.UTF_8).startsWith(file + ": not a notebook: it is not JSON"), said());
        assertEquals(2, run("tidy", file.toString()));
        assertFalse(said().contains("\tat "), said());
    }

    @Test
    void wrong_use_ends_with_2_and_a_hint() {
        assertEquals(2, run("run"));
        assertEquals(2, run("run", folder.toString(), "--check", "--store"));
        assertEquals(2, run("run", folder.resolve("missing").toString() + "/", "--limit", "0"));
        assertEquals(2, run("bake"));
        assertEquals(2, run("run", folder.toString()));
        assertEquals(2, run("kernel", folder.resolve("no-connection.json").toString()));
        assertFalse(said().contains("\tat "), said());
    }

    @Test
    void tidy_tells_what_it_did_and_does_it_once() throws IOException {
        Path file = store("00-look", "1 + 1");
        assertEquals(0, run("tidy", file.toString()));
        assertEquals(0, run("tidy", file.toString()));
        assertEquals(
                List.of(file + ": tidied", file + ": tidy already"),
                out.toString(StandardCharsets.UTF_8).lines().toList());
    }

    @Test
    void help_and_version_answer() {
        assertEquals(0, run("--help"));
        assertEquals(0, run("--version"));
        assertTrue(said().contains("run") && said().contains("attach") && said().contains("Meltbook "));
    }

    private Path store(String name, String... cells) {
        Path file = folder.resolve(name + ".ipynb");
        WholeFile.write(file, NotebookFile.write(NotebookText.of(cells)));
        return file;
    }

    private String into() {
        return folder.resolve("out").toString();
    }

    private int run(String... arguments) {
        return Main.run(
                new PrintStream(out, true, StandardCharsets.UTF_8),
                new PrintStream(err, true, StandardCharsets.UTF_8),
                arguments);
    }

    private String said() {
        return out.toString(StandardCharsets.UTF_8) + err.toString(StandardCharsets.UTF_8);
    }
}
