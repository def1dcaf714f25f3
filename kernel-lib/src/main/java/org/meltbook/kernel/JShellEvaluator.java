package org.meltbook.kernel;

import java.io.File;
import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.Deque;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.atomic.AtomicBoolean;
import java.util.stream.Stream;
import jdk.jshell.DeclarationSnippet;
import jdk.jshell.JShell;
import jdk.jshell.JShellException;
import jdk.jshell.Snippet.Kind;
import jdk.jshell.Snippet.Status;
import jdk.jshell.Snippet.SubKind;
import jdk.jshell.SnippetEvent;
import jdk.jshell.SourceCodeAnalysis;
import jdk.jshell.SourceCodeAnalysis.CompletionInfo;
import jdk.jshell.UnresolvedReferenceException;
import jdk.jshell.VarSnippet;
import org.meltbook.kernel.Failures.Origin;

/**
 * Cells of Java run by JShell inside this process, so that values keep their types. While a session is open, standard
 * output, error and input of the process belong to its cells: who prints for another purpose keeps the former streams.
 */
public final class JShellEvaluator implements Evaluator {
    private final Settings settings;
    private final CellRun run = new CellRun();
    private final InProcessControl control;
    private final JShell shell;
    private final SourceCodeAnalysis analysis;
    private final Failures failures;
    private final Inspection inspection;
    private final CellStreams streams;
    private final AtomicBoolean open = new AtomicBoolean(true);
    private Optional<Cell.Stage> stage = Optional.empty();
    private int cells;

    private JShellEvaluator(Settings settings) {
        this.settings = settings;
        CellLoader loader = new CellLoader();
        control = new InProcessControl(loader, run);
        shell = JShell.builder().executionEngine(control.provider(), null).build();
        analysis = shell.sourceCodeAnalysis();
        failures = new Failures(shell, settings.speaksForItself());
        inspection = new Inspection(shell, loader.classes());
        streams = new CellStreams();
        ExitGuard.raise();
    }

    /**
     * A new session; the working folder is that of this process.
     *
     * @throws IllegalArgumentException if an import of the settings cannot be compiled
     */
    public static JShellEvaluator open(Settings settings) {
        JShellEvaluator evaluator = new JShellEvaluator(settings);
        evaluator.shell.addToClasspath(String.join(File.pathSeparator, settings.classPath()));
        for (String declaration : settings.imports()) {
            boolean known = evaluator.shell.eval(declaration).stream().allMatch(e -> e.status() == Status.VALID);
            if (!known) {
                evaluator.close();
                throw new IllegalArgumentException("not an import that can be compiled: " + declaration);
            }
        }
        return evaluator;
    }

    @Override
    public Outcome run(String cell, Outlet outlet) {
        streams.to(outlet);
        stage = Optional.of(Cell.enter(settings.renderer(), outlet));
        run.begin();
        try {
            return runPieces(new CellText(cell), ++cells);
        } catch (RuntimeException | Error e) {
            // Cell code never gets here with what it throws: this is the compiler, on code beyond its strength.
            return failures.beyondCompiler(e);
        } finally {
            streams.flush();
            run.end();
        }
    }

    private Outcome runPieces(CellText cell, int number) {
        Parts parts = split(cell, number);
        if (parts.broken.isPresent()) {
            // Nothing of a cell runs if a part of it cannot be read.
            return refusal(parts.broken.get());
        }
        List<Declared> declared = new ArrayList<>();
        Optional<MimeBundle> result = Optional.empty();
        Deque<Piece> waiting = new ArrayDeque<>(parts.pieces);
        while (!waiting.isEmpty()) {
            Step step = runPiece(next(waiting, declared), declared);
            if (step.failure.isPresent()) {
                dropOpen(declared);
                return step.failure.get();
            }
            result = step.result;
        }
        return unresolved(declared).map(Outcome.class::cast).orElse(new Outcome.Done(result));
    }

    /** The next piece in order; but while a declaration still needs something, declarations come before statements. */
    private Piece next(Deque<Piece> waiting, List<Declared> declared) {
        if (waiting.size() > 1 && declared.stream().anyMatch(d -> isOpen(shell.status(d.snippet)))) {
            Optional<Piece> declaration =
                    waiting.stream().filter(this::declares).findFirst();
            if (declaration.isPresent()) {
                waiting.remove(declaration.get());
                return declaration.get();
            }
        }
        return waiting.removeFirst();
    }

    private boolean declares(Piece piece) {
        return analysis.sourceToSnippets(piece.source).stream()
                .allMatch(s -> s.kind() == Kind.TYPE_DECL || s.kind() == Kind.METHOD);
    }

    /** The cell's snippets, and the rest that cannot be read, if there is one. */
    private Parts split(CellText cell, int number) {
        List<Piece> pieces = new ArrayList<>();
        int offset = CellText.firstCode(cell.text());
        while (offset < cell.text().length()) {
            Origin origin = new Origin(number, cell, offset);
            String rest = cell.text().substring(offset);
            CompletionInfo info = analysis.analyzeCompletion(rest);
            if (isUnreadable(rest, info)) {
                return new Parts(pieces, Optional.of(origin));
            }
            boolean whole = info.completeness() == SourceCodeAnalysis.Completeness.CONSIDERED_INCOMPLETE;
            int end = cell.text().length() - (whole ? 0 : info.remaining().length());
            boolean silent = CellText.endsWithSemicolon(cell.text().substring(offset, end));
            offset = end + CellText.firstCode(cell.text().substring(end));
            boolean last = offset == cell.text().length();
            pieces.add(new Piece(origin, whole ? rest : info.source(), last && !silent));
        }
        return new Parts(pieces, Optional.empty());
    }

    private boolean isUnreadable(String rest, CompletionInfo info) {
        return switch (info.completeness()) {
            case COMPLETE, COMPLETE_WITH_SEMI, EMPTY -> false;
            case DEFINITELY_INCOMPLETE -> true;
            case CONSIDERED_INCOMPLETE, UNKNOWN -> isErroneous(rest);
        };
    }

    private boolean isErroneous(String source) {
        return analysis.sourceToSnippets(source).stream().anyMatch(s -> s.kind() == Kind.ERRONEOUS);
    }

    private Outcome refusal(Origin broken) {
        String rest = broken.cell().text().substring(broken.offset());
        if (!isErroneous(rest)) {
            // The compiler would run what stands before the part that never ends.
            return failures.unfinished(broken);
        }
        return failures.refused(shell.eval(rest).get(0).snippet(), broken);
    }

    private Step runPiece(Piece piece, List<Declared> declared) {
        control.clear();
        SnippetEvent event = shell.eval(piece.source).stream()
                .filter(e -> e.causeSnippet() == null)
                .findFirst()
                .orElseThrow(() -> new IllegalStateException("nothing to run in: " + piece.source));
        failures.remember(event.snippet(), piece.origin);
        boolean temporary = event.snippet().subKind() == SubKind.TEMP_VAR_EXPRESSION_SUBKIND;
        try {
            Optional<Outcome.Failed> failure = failureOf(event, piece.origin);
            if (failure.isPresent()) {
                return new Step(failure, Optional.empty());
            }
            if (event.snippet() instanceof DeclarationSnippet declaration) {
                declared.add(new Declared(declaration, piece.origin));
            }
            boolean expression = temporary || event.snippet().kind() == Kind.EXPRESSION;
            return piece.shows && expression ? shown(event, piece.origin) : Step.QUIET;
        } finally {
            if (temporary) {
                drop(event);
            }
            control.clear();
        }
    }

    /** JShell gives each bare expression a variable, and each variable slows all later cells. */
    private void drop(SnippetEvent event) {
        if (event.status() == Status.VALID) {
            control.release(((VarSnippet) event.snippet()).name());
            shell.drop(event.snippet());
        }
    }

    private Optional<Outcome.Failed> failureOf(SnippetEvent event, Origin piece) {
        if (event.status() == Status.REJECTED) {
            return Optional.of(failures.refused(event.snippet(), piece));
        }
        if (control.notLoaded().isPresent()) {
            return control.notLoaded().map(failures::beyondCompiler);
        }
        JShellException seen = event.exception();
        if (run.stopAsked()) {
            return Optional.of(failures.interrupted(Stream.ofNullable(seen), piece));
        }
        if (seen instanceof UnresolvedReferenceException missing) {
            return Optional.of(failures.unresolved(missing.getSnippet(), piece));
        }
        if (seen != null) {
            return Optional.of(failures.threw(control.thrown().orElse(seen), seen, piece));
        }
        return Optional.empty();
    }

    private Step shown(SnippetEvent event, Origin piece) {
        Optional<InProcessControl.Value> value = control.take(event.value());
        if (value.isEmpty()) {
            return Step.QUIET;
        }
        try {
            run.enterCellCode();
            return new Step(
                    Optional.empty(), Optional.of(Rendering.of(value.get().object(), settings.renderer())));
        } catch (Throwable e) {
            // A renderer, or a toString of the cell, may throw anything.
            Outcome.Failed failed =
                    run.stopAsked() ? failures.interrupted(Stream.empty(), piece) : failures.notShown(e, piece);
            return new Step(Optional.of(failed), Optional.empty());
        } finally {
            run.leaveCellCode();
        }
    }

    /** Declarations may need each other in any order, so a cell is judged at its end; what stays open goes. */
    private Optional<Outcome.Failed> unresolved(List<Declared> declared) {
        Optional<Outcome.Failed> failure = declared.stream()
                .filter(d -> isOpen(shell.status(d.snippet)))
                .findFirst()
                .map(d -> failures.unresolved(d.snippet, d.origin));
        dropOpen(declared);
        return failure;
    }

    private void dropOpen(List<Declared> declared) {
        declared.stream()
                .map(Declared::snippet)
                .filter(s -> isOpen(shell.status(s)))
                .forEach(shell::drop);
    }

    private static boolean isOpen(Status status) {
        return status == Status.RECOVERABLE_DEFINED || status == Status.RECOVERABLE_NOT_DEFINED;
    }

    @Override
    public void interrupt() {
        run.stop();
    }

    @Override
    public Completion complete(String cell, int cursor) {
        int[] anchor = {cursor};
        List<String> options = analysis.completionSuggestions(cell, cursor, anchor).stream()
                .sorted(Comparator.comparing(s -> !s.matchesType()))
                .map(SourceCodeAnalysis.Suggestion::continuation)
                .distinct()
                .toList();
        return new Completion(options, options.isEmpty() ? cursor : anchor[0], cursor);
    }

    @Override
    public Optional<MimeBundle> inspect(String cell, int cursor) {
        return inspection.of(cell, cursor);
    }

    @Override
    public Completeness completeness(String cell) {
        return split(new CellText(cell), 0)
                .broken
                .map(rest -> switch (analysis.analyzeCompletion(cell.substring(rest.offset()))
                        .completeness()) {
                    case DEFINITELY_INCOMPLETE, CONSIDERED_INCOMPLETE -> Completeness.INCOMPLETE;
                    default -> Completeness.INVALID;
                })
                .orElse(Completeness.COMPLETE);
    }

    @Override
    public void close() {
        if (open.getAndSet(false)) {
            ExitGuard.lower();
            stage.ifPresent(Cell::leave);
            streams.close();
            shell.close();
        }
    }

    /** Variables that bare expressions left behind; none in a healthy session. */
    long leftovers() {
        return shell.variables()
                .filter(v -> v.subKind() == SubKind.TEMP_VAR_EXPRESSION_SUBKIND)
                .filter(v -> shell.status(v) == Status.VALID)
                .count();
    }

    /**
     * One snippet of a cell.
     *
     * @param shows whether its value, if it has one, is the cell's: it is the last and ends without a semicolon
     */
    private record Piece(Origin origin, String source, boolean shows) {}

    private record Parts(List<Piece> pieces, Optional<Origin> broken) {}

    private record Declared(DeclarationSnippet snippet, Origin origin) {}

    private record Step(Optional<Outcome.Failed> failure, Optional<MimeBundle> result) {
        static final Step QUIET = new Step(Optional.empty(), Optional.empty());
    }
}
