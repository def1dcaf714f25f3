package org.meltbook.notebook;

import java.io.IOException;
import java.io.PrintStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.function.Supplier;
import java.util.stream.Stream;
import org.meltbook.kernel.Evaluator;
import org.meltbook.kernel.Outcome;
import org.meltbook.report.Formulas;
import org.meltbook.report.IndexPage;

/**
 * Runs notebooks without Jupyter, each in a session of its own, and writes for each the executed notebook and a page,
 * and an index. A failing cell ends its notebook; the others go on.
 */
public final class Runner {
    private static final String SUFFIX = ".ipynb";
    private static final Duration GRACE = Duration.ofSeconds(10);

    private final Supplier<Evaluator> sessions;
    private final PrintStream progress;
    private final Formulas formulas = new Formulas();
    private volatile boolean stopped;
    private volatile Optional<Session> running = Optional.empty();

    /**
     * A runner.
     *
     * @param sessions gives a fresh evaluator for each notebook
     * @param progress where a line a cell goes; not what {@code System.out} is while cells run
     */
    public Runner(Supplier<Evaluator> sessions, PrintStream progress) {
        this.sessions = sessions;
        this.progress = progress;
    }

    /**
     * The notebooks that paths stand for: files as given, folders by the notebooks in them, sorted by name.
     *
     * @throws NotebookException if a path is not there, or a folder holds no notebook
     */
    public static List<Path> notebooks(List<Path> paths) {
        List<Path> notebooks = new ArrayList<>();
        for (Path path : paths) {
            if (!Files.isDirectory(path)) {
                notebooks.add(path);
                continue;
            }
            try (Stream<Path> files = Files.list(path)) {
                List<Path> found = files.filter(f -> f.getFileName().toString().endsWith(SUFFIX))
                        .sorted()
                        .toList();
                if (found.isEmpty()) {
                    throw new NotebookException(path + ": there is no notebook (*" + SUFFIX + ") in this folder");
                }
                notebooks.addAll(found);
            } catch (IOException e) {
                throw new NotebookException(path + ": cannot be listed: " + e.getMessage(), e);
            }
        }
        return notebooks;
    }

    /**
     * Runs notebooks one after another.
     *
     * @return one result each, in that order; fewer if {@link #interrupt} came
     * @throws NotebookException if the plan cannot be followed at all
     */
    public List<RunResult> run(List<Path> notebooks, Plan plan) {
        refuseCollisions(notebooks, plan);
        List<RunResult> results = new ArrayList<>();
        List<IndexPage.Entry> entries = new ArrayList<>();
        for (Path notebook : notebooks) {
            if (!stopped) {
                results.add(runOne(notebook, plan, entries));
            }
        }
        if (!stopped) {
            WholeFile.write(plan.into().resolve("index.html"), IndexPage.of("Notebooks", entries));
        }
        return results;
    }

    /** Stops the running cell and the run; what is not finished is not written. May be called from any thread. */
    public void interrupt() {
        stopped = true;
        running.ifPresent(Session::interrupt);
    }

    private RunResult runOne(Path file, Plan plan, List<IndexPage.Entry> entries) {
        String name = name(file);
        Notebook stored;
        String text;
        try {
            text = NotebookFile.text(file);
            stored = NotebookFile.parse(text, file.toString());
        } catch (NotebookException e) {
            progress.println(name + "  not run");
            entries.add(new IndexPage.Entry(name, "#", e.getMessage(), "not run", false));
            return new RunResult(file, List.of(e.getMessage()), "not run");
        }
        List<String> problems = new ArrayList<>();
        Notebook fresh = execute(file, stored, plan, problems);
        if (stopped) {
            String problem = file + ": interrupted, nothing was written for it";
            return new RunResult(file, List.of(problem), RunResult.INTERRUPTED);
        }
        String status = problems.isEmpty() ? "ran to its end" : "failed: " + withoutPath(problems.get(0), file);
        if (problems.isEmpty() && plan.stored() == Plan.Stored.CHECK) {
            problems.addAll(Comparison.of(file.toString(), stored, fresh).differences());
            problems.addAll(untidy(file, text, stored));
            status = problems.isEmpty()
                    ? "ran to its end, as stored"
                    : "differs from what is stored: " + withoutPath(problems.get(0), file);
        }
        write(file, fresh, plan, new Ending(status, problems.isEmpty()), entries);
        return new RunResult(file, problems, status);
    }

    private Notebook execute(Path file, Notebook stored, Plan plan, List<String> problems) {
        String name = name(file);
        long cells = stored.cells().stream().filter(Notebook.Cell::isRunnable).count();
        List<Notebook.Cell> run = new ArrayList<>();
        DataFolder.Place before = DataFolder.enter(file.toAbsolutePath().getParent());
        try (Session session = new Session(sessions.get(), GRACE)) {
            running = Optional.of(session);
            int count = 0;
            for (Notebook.Cell cell : Tidy.of(stored).cells()) {
                if (!cell.isRunnable() || !problems.isEmpty() || stopped) {
                    run.add(cell.with(Optional.empty(), List.of()));
                    continue;
                }
                count++;
                long start = System.nanoTime();
                Recorder recorder = new Recorder();
                Outcome outcome = session.run(cell.source(), recorder, plan.limit());
                run.add(cell.with(Optional.of(count), recorder.ended(outcome, count)));
                boolean failed = outcome instanceof Outcome.Failed;
                progress.printf(
                        Locale.ROOT,
                        "%s  [%d/%d] %s  %.2f s%s%n",
                        name,
                        count,
                        cells,
                        cell.id(),
                        (System.nanoTime() - start) / 1e9,
                        failed ? "  FAILED" : "");
                if (outcome instanceof Outcome.Failed failure) {
                    problems.add(problem(file, count, cell, failure));
                }
            }
        } finally {
            running = Optional.empty();
            before.restore();
        }
        return Tidy.of(new Notebook(run, stored.metadata()));
    }

    private static String problem(Path file, int count, Notebook.Cell cell, Outcome.Failed failure) {
        String line = failure.line() > 0 ? ", line " + failure.line() : "";
        return file + ": cell " + count + " (" + cell.id() + ")" + line + ": " + failure.kind() + ": "
                + failure.message();
    }

    private static List<String> untidy(Path file, String text, Notebook stored) {
        boolean tidy = NotebookFile.write(Tidy.of(stored)).equals(text);
        return tidy ? List.of() : List.of(file + ": not tidy (ids, counts, metadata or layout); `tidy` puts it right");
    }

    private void write(Path file, Notebook fresh, Plan plan, Ending ending, List<IndexPage.Entry> entries) {
        String name = name(file);
        NotebookPage page = NotebookPage.of(name, fresh, ending.good ? "" : ending.status, formulas);
        page.problems().forEach(problem -> progress.println(name + "  note: " + problem));
        String json = NotebookFile.write(fresh);
        WholeFile.write(plan.into().resolve(name + SUFFIX), json);
        WholeFile.write(plan.into().resolve(name + ".html"), page.html());
        if (ending.good && plan.stored() == Plan.Stored.REPLACE) {
            WholeFile.write(file, json);
        }
        entries.add(new IndexPage.Entry(page.title(), name + ".html", page.sentence(), ending.status, ending.good));
    }

    private static void refuseCollisions(List<Path> notebooks, Plan plan) {
        Map<String, Path> names = new HashMap<>();
        for (Path notebook : notebooks) {
            Path other = names.put(name(notebook), notebook);
            if (other != null) {
                throw new NotebookException(other + " and " + notebook + " would both be written to "
                        + plan.into().resolve(name(notebook) + ".html") + "; run them into different folders");
            }
            Path target = plan.into()
                    .resolve(name(notebook) + SUFFIX)
                    .toAbsolutePath()
                    .normalize();
            if (target.equals(notebook.toAbsolutePath().normalize())) {
                throw new NotebookException(notebook + " would be overwritten by its results; choose another folder,"
                        + " or --store to put them into the notebook");
            }
        }
    }

    private static String withoutPath(String problem, Path file) {
        String first = problem.lines().findFirst().orElse("");
        return first.startsWith(file + ": ") ? first.substring(file.toString().length() + 2) : first;
    }

    private static String name(Path file) {
        String name = file.getFileName().toString();
        return name.endsWith(SUFFIX) ? name.substring(0, name.length() - SUFFIX.length()) : name;
    }

    private record Ending(String status, boolean good) {}
}
