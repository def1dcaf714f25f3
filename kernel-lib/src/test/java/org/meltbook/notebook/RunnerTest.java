package org.meltbook.notebook;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTimeoutPreemptively;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

class RunnerTest {
    private static final Duration LIMIT = Duration.ofSeconds(30);

    @TempDir
    Path folder;

    private final ByteArrayOutputStream progress = new ByteArrayOutputStream();
    private final Runner runner =
            new Runner(FakeEvaluator::new, new PrintStream(progress, true, StandardCharsets.UTF_8));
    private Path notebooks;
    private Path into;

    @BeforeEach
    void folders() throws IOException {
        notebooks = Files.createDirectories(folder.resolve("notebooks"));
        into = folder.resolve("out");
    }

    @Test
    void writes_notebook_page_and_index_and_a_line_a_cell() throws IOException {
        store("00-look", "# A look\n\nIt looks. Twice.", "print a", "", "value 3");
        RunResult result = run(Plan.Stored.LEAVE).get(0);
        assertTrue(result.isGood(), result.toString());
        String notebook = Files.readString(into.resolve("00-look.ipynb"));
        assertEquals(List.of(), NotebookFileTest.violations(notebook));
        assertTrue(Files.readString(into.resolve("00-look.html")).contains("<h1 id=\"a-look\">A look</h1>"));
        String index = Files.readString(into.resolve("index.html"));
        assertTrue(index.contains("<a href=\"00-look.html\">A look</a>") && index.contains("It looks."));
        List<String> lines = progress.toString(StandardCharsets.UTF_8).lines().toList();
        assertEquals(2, lines.size());
        assertTrue(lines.get(0).matches("00-look {2}\\[1/2] cell2 {2}\\d+\\.\\d\\d s"), lines.get(0));
    }

    @Test
    void a_failing_cell_ends_its_notebook_and_the_others_go_on() throws IOException {
        Path broken = store("00-broken", "print a", "print b\nfail rate is negative", "print never");
        store("01-fine", "print fine");
        List<RunResult> results = run(Plan.Stored.LEAVE);
        assertEquals(
                List.of(broken + ": cell 2 (cell2), line 2: RangeException: rate is negative"),
                results.get(0).problems());
        assertTrue(results.get(1).isGood());
        String page = Files.readString(into.resolve("00-broken.html"));
        assertTrue(page.contains("role=\"status\">failed: cell 2"));
        assertFalse(Files.readString(into.resolve("00-broken.ipynb")).contains("never\\n"));
        assertTrue(Files.readString(into.resolve("index.html")).contains("failed: cell 2"));
    }

    @Test
    void a_file_that_is_no_notebook_does_not_keep_the_others_from_running() throws IOException {
        Path broken = Files.writeString(notebooks.resolve("00-broken.ipynb"), "not JSON");
        store("01-fine", "print fine");
        List<RunResult> results = run(Plan.Stored.LEAVE);
        assertTrue(results.get(0).problems().get(0).startsWith(broken + ": not a notebook"));
        assertTrue(results.get(1).isGood());
        assertFalse(Files.exists(into.resolve("00-broken.html")));
    }

    @Test
    void a_stored_notebook_passes_its_check_and_a_changed_number_does_not() throws IOException {
        Path file = store("00-look", "# Look", "value 51060", "print a\nprint 2.5");
        assertTrue(run(Plan.Stored.REPLACE).get(0).isGood());
        assertTrue(run(Plan.Stored.CHECK).get(0).isGood(), () -> progress.toString(StandardCharsets.UTF_8));
        String text = Files.readString(file);
        Files.writeString(file, text.replace("\"2.5\\n\"", "\"2.7\\n\""));
        assertEquals(
                List.of(file + ": cell 2 (cell3): line 2 of its output differs\n  expected: 2.7\n  found:    2.5"),
                run(Plan.Stored.CHECK).get(0).problems());
        Files.writeString(file, text.replace("51060", "51070").replace("value 51070", "value 51060"));
        assertEquals(
                List.of(file + ": cell 1 (cell2): line 1 of its output differs\n  expected: 51070\n  found:    51060"),
                run(Plan.Stored.CHECK).get(0).problems());
    }

    @Test
    void a_changed_table_is_found_even_if_its_text_is_the_same() throws IOException {
        Path file = store("00-look", "html <table><tr><td>1</td><td>2</td></tr></table>");
        run(Plan.Stored.REPLACE);
        Files.writeString(file, Files.readString(file).replaceFirst("<td>2</td>", "<td>3</td>"));
        String problem = run(Plan.Stored.CHECK).get(0).problems().get(0);
        assertTrue(problem.endsWith("  expected: 1 | 3 |\n  found:    1 | 2 |"), problem);
    }

    @Test
    void a_notebook_that_is_not_tidy_does_not_pass_its_check() throws IOException {
        Path file = store("00-look", "print a");
        run(Plan.Stored.REPLACE);
        Files.writeString(file, Files.readString(file).replace("\"execution_count\": 1", "\"execution_count\": 4"));
        assertTrue(run(Plan.Stored.CHECK).get(0).problems().get(0).contains("not tidy"));
    }

    @Test
    void two_runs_give_the_same_bytes() throws IOException {
        store("00-look", "# Look\n\n$\\eta_0$", "print a\nerr b\nprint c", "html <b>x</b>", "value 3");
        run(Plan.Stored.LEAVE);
        byte[] page = Files.readAllBytes(into.resolve("00-look.html"));
        byte[] notebook = Files.readAllBytes(into.resolve("00-look.ipynb"));
        run(Plan.Stored.LEAVE);
        assertArrayEquals(page, Files.readAllBytes(into.resolve("00-look.html")));
        assertArrayEquals(notebook, Files.readAllBytes(into.resolve("00-look.ipynb")));
    }

    @Test
    void a_failed_notebook_is_not_stored() throws IOException {
        Path file = store("00-broken", "print a", "fail x");
        String before = Files.readString(file);
        assertFalse(run(Plan.Stored.REPLACE).get(0).isGood());
        assertEquals(before, Files.readString(file));
    }

    @Test
    void a_cell_that_takes_too_long_is_stopped() throws IOException {
        Path file = store("00-slow", "endless");
        List<RunResult> results = assertTimeoutPreemptively(
                Duration.ofSeconds(20),
                () -> runner.run(List.of(file), new Plan(into, Plan.Stored.LEAVE, Duration.ofMillis(100))));
        assertEquals(
                List.of(file + ": cell 1 (cell1), line 1: TimeLimit: took longer than 0.1 s and was stopped"),
                results.get(0).problems());
    }

    @Test
    void an_interrupted_run_writes_nothing_of_what_it_did_not_finish() throws Exception {
        store("00-slow", "endless");
        store("01-next", "print a");
        Thread stopper = new Thread(() -> {
            while (!progress.toString(StandardCharsets.UTF_8).contains("before")) {
                runner.interrupt();
                Thread.onSpinWait();
            }
        });
        stopper.start();
        List<RunResult> results = assertTimeoutPreemptively(Duration.ofSeconds(20), () -> run(Plan.Stored.LEAVE));
        progress.writeBytes("before".getBytes(StandardCharsets.UTF_8));
        stopper.join();
        assertTrue(results.stream().noneMatch(RunResult::isGood));
        assertFalse(Files.exists(into));
    }

    @Test
    void nothing_is_half_written_where_a_file_cannot_be_replaced() throws IOException {
        store("00-look", "print a");
        // A folder with something in it stands where the page should go, so that the move into place must fail.
        Files.createDirectories(into.resolve("00-look.html").resolve("in-the-way"));
        NotebookException e = assertThrows(NotebookException.class, () -> run(Plan.Stored.LEAVE));
        assertTrue(e.getMessage().startsWith(into.resolve("00-look.html") + ": cannot be written: "), e.getMessage());
        try (Stream<Path> left = Files.list(into)) {
            assertTrue(left.noneMatch(f -> f.getFileName().toString().endsWith(".part")));
        }
    }

    @Test
    void results_never_overwrite_the_notebook_they_come_from() throws IOException {
        store("00-look", "print a");
        into = notebooks;
        assertThrows(NotebookException.class, () -> run(Plan.Stored.LEAVE));
    }

    @Test
    void a_folder_without_notebooks_is_refused() {
        assertThrows(NotebookException.class, () -> Runner.notebooks(List.of(notebooks)));
    }

    @Test
    void names_of_data_are_looked_for_from_the_notebook_upwards() throws IOException {
        Files.createDirectories(folder.resolve("data/published"));
        Files.createFile(folder.resolve("data/published/x.csv"));
        store("00-look", "folder data/published/x.csv", "folder published/x.csv");
        assertTrue(run(Plan.Stored.LEAVE).get(0).isGood());
        NotebookException e = assertThrows(NotebookException.class, () -> DataFolder.find("data/no.csv", notebooks));
        assertTrue(e.getMessage().contains(notebooks.resolve("data/no.csv").toString()));
        assertTrue(e.getMessage().contains(folder.resolve("data/no.csv").toString()));
    }

    private Path store(String name, String... cells) {
        Path file = notebooks.resolve(name + ".ipynb");
        WholeFile.write(file, NotebookFile.write(NotebookText.of(cells)));
        return file;
    }

    private List<RunResult> run(Plan.Stored stored) {
        return runner.run(Runner.notebooks(List.of(notebooks)), new Plan(into, stored, LIMIT));
    }
}
